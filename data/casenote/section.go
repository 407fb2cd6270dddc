package casenote

import "afterbeat/data"

// Caution heads and ends every note, and stands on every screen and output.
const Caution = "Research use only. Not a medical device. Not for decisions about treatment."

// Section is a titled part of a note.
type Section struct {
	Title string
	// Chief tells that it stands in a brief note too.
	Chief bool
	// Words are paragraphs above the rows; they are wrapped on rendering.
	Words  []data.Text
	Rows   []Row
	Tables []Table
}

// Row is one labelled line of a section: a number, or words.
type Row struct {
	Label  string
	Number *Number   // nil where the row has words
	Words  data.Text // used where Number is nil
}

// Number is a value with its unit, its doubt and where it came from.
type Number struct {
	data.Estimate
	Unit   string // as printed; "" for a pure number
	Origin data.Origin
}

// Words makes a row of words.
func Words(label, words string) Row { return Row{Label: label, Words: data.Clean(words)} }

// Quantity makes a row of a number.
func Quantity(label string, e data.Estimate, unit string, origin data.Origin) Row {
	return Row{Label: label, Number: &Number{Estimate: e, Unit: unit, Origin: origin}}
}

// Table is a table within a section. The header names units; a row has as many
// cells as the header. A cell is a number (aligned right) or words.
type Table struct {
	Header []string
	Rows   [][]Cell
	// Foot is a line below the table; may be empty.
	Foot string
}

// Cell is a cell of a table.
type Cell struct {
	Number *Number // nil where the cell has words; its unit stands in the header
	Words  data.Text
}
