// Package state keeps the choices of a running study in a recovery file, so
// that a lost connection loses none of them.
//
// The file lies in $XDG_STATE_HOME/afterbeat, or ~/.local/state/afterbeat (XDG
// Base Directory Specification), a folder that its owner alone may enter, and
// its owner alone may read it. It holds choices, as a case file does, and no
// measurement. Its name is a hash that stands for the recording or case file, and
// tells nothing of them, with the process and a token of the session: each
// session writes and removes its own file, and beside it only removes one that
// somebody has answered for.
package state
