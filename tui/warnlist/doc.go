// Package warnlist is the counted line of warnings on a screen, "2 warnings: v
// to read", and the list that it opens into, each warning with its cure.
package warnlist
