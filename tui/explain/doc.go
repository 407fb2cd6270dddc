// Package explain opens a number into what stands behind it: its value with both
// intervals and how they came about, what dominates its doubt, its equation and
// source, and what is published of healthy people and of people on support. The
// words are those of the layer that computed the number ([data.Account]); this
// package only sets them.
//
// The numbers of a screen are a list with a cursor, ">"; the one under it is
// read beside the list, or below its name where there is no room.
package explain
