// Package casenote knows what a note is (sections, rows, tables, warnings,
// cautions) and how it is rendered as plain text of at most 80 columns. It
// knows text and units only: every layer describes its own results as a
// [Section], tree/study decides their order, and this package alone formats
// numbers, so that a value, its interval and its unit look the same everywhere.
package casenote
