package data

import (
	"io"
	"math"
	"slices"

	"afterbeat/data/unit"
)

// ReadSpans reads the stretches of a recording to leave out: comma-separated
// values with the columns start_s and end_s (or start and end, in s; another
// unit of time may stand in their place), one stretch a row, on the
// recording's own clock. Further columns and lines that begin with # are left
// out. A stretch may be empty, not reversed. A file without rows is no error.
// Errors are [*FileError].
func ReadSpans(name string, r io.Reader) ([]Span, error) {
	raw, err := readAll(name, r)
	if err != nil {
		return nil, err
	}
	text, err := decode(name, raw)
	if err != nil {
		return nil, err
	}
	t, header, err := openTable(name, text)
	if err != nil {
		return nil, err
	}
	columns := make([]column, len(header))
	heads := headings(header)
	for i, h := range heads {
		columns[i] = column{name: h.name, blank: h.blank}
	}
	var ends [2]int
	var per [2]float64
	for i, part := range []string{"start", "end"} {
		k := slices.IndexFunc(heads, func(h heading) bool { return h.key() == part && (h.unit.Name == "" || h.unit.Quantity == unit.Time) })
		if k < 0 {
			return nil, t.fail(0, "its header must be start_s,end_s", "has no column %s_s", part)
		}
		columns[k].need = required
		ends[i], per[i] = k, 1
		if p := heads[k].unit.PerSecond(); p > 0 {
			per[i] = p
		}
	}
	var spans []Span
	err = t.rows(columns, func(line int) error {
		from, to := &columns[ends[0]], &columns[ends[1]]
		s := Span{from.values[len(spans)] / per[0], to.values[len(spans)] / per[1]}
		if !(s.From <= s.To) || math.IsInf(s.To, 0) {
			return t.fail(line, "", "the stretch from %v s to %v s ends before it begins", s.From, s.To)
		}
		spans = append(spans, s)
		return nil
	})
	return spans, err
}
