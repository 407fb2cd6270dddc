//go:build !unix

package app

// sessionLeader is true where a program cannot be stopped and woken.
func sessionLeader() bool { return true }
