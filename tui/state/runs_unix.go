//go:build unix

package state

import "golang.org/x/sys/unix"

// runs tells whether a process of this user runs. One of another user that has
// the number now is none of ours.
func runs(id int) bool { return id > 0 && unix.Kill(id, 0) == nil }
