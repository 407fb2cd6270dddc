// Package page is a window on text that is longer than its area, with the keys
// that move it.
package page
