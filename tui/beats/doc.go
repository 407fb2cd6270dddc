// Package beats is the screen of stage 2: the onsets on the trace, the beats
// that are used over one another with their average, the beats that are not
// used and why, and the indices of the average beat.
//
// The beats are those of the leading channel, as package study found them. Of a
// flow they are shown moved by the delay, where it is sampled for the average.
// Where no channel leads, every channel that has a pulse can be looked at.
//
// A beat is left out, or used against a rule, by a time inside it: it goes into
// the case, and what follows is computed again.
package beats
