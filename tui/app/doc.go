// Package app is the root of the screens: a switchboard between the keyboard,
// the screens of the stages, and the study that is computed behind them. It
// never looks inside a screen; whoever starts it hands the screens in.
//
// The root holds the case, with every change of it as one step of undo and
// redo, and the study of that case as far as it has come. A change of the case
// goes through [study.Study.With], which keeps what the change does not bear
// on, and the stages left are computed one after the other in commands: each
// has a context and the number of its request, a result of an older request is
// dropped, and every screen is shown each stage as soon as it is done.
//
// # The frame
//
//	Research use only. Not a medical device. ...   row 1, on every frame
//	afterbeat  pilot-07   1 Intake  2 Beats [3 Fit](4 Tree)...
//	the screen of the open stage
//	what the last key did, a question, or progress
//	the keys that work now
//
// An error lies over the last rows of the stage, in full and with what to do
// about it, until it is answered. One function, clamp, cuts every frame to the
// size of the terminal and lets no control byte through but colours.
//
// # Saving
//
// A note is written where the user says, never over an existing file. Choices
// since then are unsaved: quitting asks about them, and package state keeps
// them for a restart in case the program does not end in an orderly way.
package app
