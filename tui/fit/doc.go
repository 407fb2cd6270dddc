// Package fit is the screen of the third stage: the average beat with a model's
// pressure over it, what is left over below, the parameters with their
// intervals, and what speaks for which model.
//
// Left and right step through the models at hand, enter takes the one shown to
// the next stages, up and down move through its numbers and x opens the one
// under the cursor into its equation, its source and how its interval came
// about; r opens the recommendation, and what is not identified, in full. [ and ]
// move one assumption, by fits that the study has made already.
// Bounds and labels stay as they are from model to model, so that the eye sees
// the difference and a slow line carries little; only the residual has the range
// of its own size, where it would else be a line of 0.
package fit
