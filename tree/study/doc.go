// Package study is the whole run without a screen: one function a stage, each
// taking the stage before it as its argument and returning a value with its own
// warnings.
//
//	Inputs -> TakeIn -> FindBeats -> FitLoad -> Compare -> Predict -> Note
//	                                    \-> GrowTree
//
// It is the only place that knows the order of the steps, and everything that a
// screen shows or a report prints comes out of it. [Run] does all of them. The
// reports ([CheckReport], [FitReport], [Report]) are what --json prints; their
// keys are a contract, in the internal units of package data.
//
// # What the recording allows
//
// A pressure and a flow of the same beats allow all models. A pressure and a
// velocity without a diameter allow them per unit area (R in mmHg s/cm). A
// pressure alone allows the time constant of diastole and nothing else. Where
// the flow was measured decides what a fit means: with the flow of the root,
// the outflow tract or a graft it is the load of the body, elsewhere that of one
// bed, and is called regional.
//
// # The forecast
//
// [Predict] sets up a ventricle that natively ejects into the fitted load what
// was measured ([support.SetUp]), couples it to the pump of the case, and reads
// the periodic state at each speed. Of the ventricle the traces fix three things
// (stroke volume, ejection time, period; end-systolic pressure follows with the
// load). The rest (end-diastolic volume, V0, filling pressure, valves) is drawn
// from stated ranges inside every total interval, together with the replicates
// of the fit and the error of the filling slope.
//
// # What a person must choose
//
// Where two columns fit a role equally well, or a value given makes no sense,
// an error says which flag settles it: [ChoiceError], [data.AmbiguousError]. A
// recording that cannot carry an answer is no error: the stage returns what
// could be computed, with a Reason.
package study
