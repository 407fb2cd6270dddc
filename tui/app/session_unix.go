//go:build unix

package app

import (
	"os"

	"golang.org/x/sys/unix"
)

// sessionLeader tells that the program leads its session, as one started by
// ssh -t does: nobody could wake it after it was stopped.
func sessionLeader() bool {
	id, err := unix.Getsid(0)
	return err == nil && id == os.Getpid()
}
