// Package intake is the screen of stage 1: the channels of the recording, what
// each is taken for, and the trace of the chosen one with what cannot be used
// of it.
//
// The trace is the channel calibrated as the case says, over the whole
// recording: the span and the stretches left out are marked under it, so that
// they can be moved. It comes from [study.TakeIn] with the case less its span.
// Where a choice of the case makes no sense, or several columns fit a role
// equally well, the screen still shows the channels as they were read, and says
// what has to be settled.
//
// What was measured beside the recording, and is no channel of it, is stated in
// one line: the diameter and the angle of a velocity, the delay and the outflow
// pressure. Once the beats are computed, their warnings of unlikely values stand
// with the channels that they name.
//
// A choice is a changed copy of the case, sent to the root; the screen keeps
// the copy, so that keys pressed before the answer comes build on it.
package intake
