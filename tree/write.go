package tree

import (
	"encoding/csv"
	"io"
	"slices"
)

// Write writes the segments as a table that [Read] reads as the same segments.
// Columns that would be blank altogether are left out, if Read can do without.
// Blood, wall and outflow pressure are not part of the table.
func (n Network) Write(w io.Writer) error {
	if err := n.Check(); err != nil {
		return err
	}
	rows := make([][]string, len(n.Segments))
	for i, s := range n.Segments {
		rows[i] = s.fields()
	}
	var kept []int
	for i, column := range columns {
		always := slices.Contains(needed, column) || column == "name"
		if always || slices.ContainsFunc(rows, func(row []string) bool { return row[i] != "" }) {
			kept = append(kept, i)
		}
	}
	out := csv.NewWriter(w)
	for _, row := range append([][]string{columns}, rows...) {
		var fields []string
		for _, i := range kept {
			fields = append(fields, row[i])
		}
		if err := out.Write(fields); err != nil {
			return err
		}
	}
	out.Flush()
	return out.Error()
}

// fields are those of the segment's row, in the order of columns.
func (s Segment) fields() []string {
	optional := func(v float64, shift int) string {
		if v == 0 {
			return ""
		}
		return formatDecimal(v, shift)
	}
	row := []string{
		s.ID, s.Parent, s.Name, formatDecimal(s.Length, 0), formatDecimal(s.Radius, 0), optional(s.RadiusDistal, 0),
		optional(s.WaveSpeed, 2), optional(s.Eh, 0), optional(s.Poisson, 0), "", "", "", s.Bed,
	}
	if t := s.Terminal; t != nil {
		if !t.Matched {
			row[9] = formatDecimal(t.R1, 0)
		}
		row[10], row[11] = optional(t.C, 0), formatDecimal(t.R2, 0)
	}
	return row
}
