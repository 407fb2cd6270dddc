// Package casenote knows what a note is (sections, rows, tables, warnings,
// cautions) and how it is rendered as plain text of at most 80 columns. It
// knows text and units only: every layer describes its own results as a
// [Section], tree/study decides their order, and this package alone formats
// numbers, so that a value, its interval and its unit look the same everywhere.
//
// # What a note promises
//
// The [Caution] is its first line and its last. No number stands without its
// unit, its 95 % interval (or the reason why there is none) and one of the
// words measured, estimated, assumed. A number that the data do not identify is
// shown as its range only; one that does not exist is "undefined", with the
// reason. The cells of a table have their unit in the header, their total
// interval in brackets, and their origin and reasons below the table; the
// interval of random error stands in rows only. Every warning is there, counted,
// with its cure. The text depends on the [Note] alone: no date, no machine.
//
// # Numbers
//
// A value is rounded to two significant digits of the half-width of its
// interval, and to five of its own at most; without an interval it keeps four
// ([Format]).
//
// # Characters
//
// The program's own words are ASCII in every note, because a note travels
// through mail, forms and terminals that each know another set. Letters of file
// names, column names and remarks stay as they are, unless [Options] asks for
// ASCII: then known signs are spelled out (degree as deg, micro as u) and every
// other letter is written as \u{e4}.
package casenote
