// Package fit is the screen of the third stage: the average beat with a model's
// pressure over it, what is left over below, the parameters with their
// intervals, and what speaks for which model.
//
// Left and right step through all ways to the numbers: the models on each basis,
// then the estimators of the literature. c takes the fit shown to the next stages,
// which the case records; nothing else does. Up and down move through the numbers,
// and enter opens the one under the cursor into what stands behind it. r opens the
// recommendation, and what is not identified, in full. z shows the impedance of the
// beats with the model over it, w their waves.
//
// [ and ] move one assumption: the fit shown is made anew in a command, for every
// assumption at once, and so are its pictures, so that a step draws at once. A
// what-if is marked as one and left with esc; nothing of it is kept.
//
// Bounds and labels stay as they are from way to way, so that the eye sees the
// difference and a slow line carries little; only the residual has the range of its
// own size, where it would else be a line of 0.
package fit
