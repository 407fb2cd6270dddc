//go:build !race

package fitting

const slow = false
