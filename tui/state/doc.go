// Package state keeps the choices of a running study in a recovery file, so
// that a lost connection loses none of them.
//
// The file lies in $XDG_STATE_HOME/afterbeat, or ~/.local/state/afterbeat (XDG
// Base Directory Specification), a folder that its owner alone may enter, and
// its owner alone may read it. It holds choices, as a case file does, and no
// measurement. One file stands for one recording or case file; its name is a
// hash, and tells nothing of theirs.
package state
