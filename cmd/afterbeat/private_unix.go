//go:build unix

package main

import (
	"syscall"

	"golang.org/x/sys/unix"
)

// private keeps what the screens hold from others: no file that anybody else
// may read, and no image of the memory on the disk.
func private() {
	syscall.Umask(0o077)
	_ = unix.Setrlimit(unix.RLIMIT_CORE, &unix.Rlimit{}) // where it is refused, nothing can be done
}
