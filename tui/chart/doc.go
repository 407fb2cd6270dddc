// Package chart draws curves in terminal cells, and the same as a table for
// people who cannot use a picture. It knows nothing of screens: numbers and
// sizes in, text out, colours only as the numbers that a [Theme] hands down.
//
// The straight line of the work is
//
//	trace -> Columns (one value a cell, cached by the caller) -> Plot -> Draw
//
// # One map from samples to cells
//
// A window of n samples is drawn in w columns. Sample i, i = 0 .. n-1, belongs to
//
//	column(i) = round(i (w-1)/(n-1)),
//
// so the first sample stands in the first column and the last in the last, and
// the x axis runs from the time of the first sample (Low) to that of the last
// (High) by the same map:
//
//	column(x) = round((x-Low)/(High-Low) (w-1)).
//
// In the other direction, with h lines between the bounds of y,
//
//	line(y) = round((y-Low)/(High-Low) (h-1)), counted from below.
//
// Where several samples share a column, [Columns] keeps the one furthest from
// their mean, so that a peak of a single sample is never lost, and then pins the
// extremes of the whole window. Numbers that are printed come from the samples,
// never from the columns.
//
// # Characters
//
// The first curve is a line, the second is made of *. Where two curves share
// cells, four columns show the later one and four the earlier, in turns, so that
// a model that lies on its data does not hide them. A ^ on the top line or a v on the
// bottom line is a value beyond the bounds of y. Every drawing has exactly the
// height asked for and at most the width; trailing spaces are not written.
// All strings handed in are cleaned ([data.Clean]) before they are shown.
package chart
