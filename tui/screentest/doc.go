// Package screentest drives a screen without a program, for its tests: keys are
// pressed, commands are run to their end, what is meant for the root is kept,
// and views are compared with files.
package screentest
