package data

import (
	"fmt"
	"maps"
	"slices"

	"afterbeat/data/unit"
)

// heading is what the header says of one column.
type heading struct {
	name  Text      // as shown; "column 4" where the header is empty
	part  string    // the header without the unit
	blank bool      // the header is empty
	unit  unit.Unit // the zero Unit where none is named
	given bool      // the unit is the user's, not the header's
}

// quantified is the unit of the channel under h, with its quantity. The user's
// word for a calibrated unit is believed whatever the name says.
func (h heading) quantified() unit.Unit {
	if h.given && h.unit.Calibrated && h.unit.Quantity != unit.Time {
		return h.unit
	}
	return unit.Guess(h.part, h.unit)
}

// headings reads the header. A name that stands twice is told apart by the
// number of its column: "abp_mmHg (column 3)".
func headings(header []string) []heading {
	count := map[Text]int{}
	out := make([]heading, len(header))
	for i, text := range header {
		h := heading{name: Clean(text)}
		h.part, h.unit, _ = unit.Header(text)
		if h.blank = h.name.String() == ""; h.blank {
			h.name = Clean(fmt.Sprintf("column %d", i+1))
		}
		count[h.name]++
		out[i] = h
	}
	for i := range out {
		if name := out[i].name; count[name] > 1 {
			out[i].name = Clean(fmt.Sprintf("%s (column %d)", name, i+1))
		}
	}
	return out
}

// apply gives the columns that the user has named the units that he has given.
func apply(units map[string]string, heads []heading) error {
	for _, name := range slices.Sorted(maps.Keys(units)) {
		text := units[name]
		u, ok := unit.Parse(text)
		if !ok {
			return fmt.Errorf("%q is no unit known here (for column %q)", Clean(text), Clean(name))
		}
		i, err := find(name, titles(heads), "--unit "+shellWord(name)+"=UNIT")
		if err != nil {
			return err
		}
		heads[i].unit, heads[i].given = u, true
	}
	return nil
}

// titles are the names by which a user may call the columns.
func titles(heads []heading) []title {
	out := make([]title, len(heads))
	for i, h := range heads {
		out[i] = title{h.name, Clean(h.part)}
	}
	return out
}
