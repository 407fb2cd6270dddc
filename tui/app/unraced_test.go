//go:build !race

package app

// raced tells that the race detector is on, which is too slow for a test that
// waits for frames.
const raced = false
