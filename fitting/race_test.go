//go:build race

package fitting

// slow tells that the race detector makes everything five to ten times slower.
const slow = true
