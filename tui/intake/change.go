package intake

import (
	"fmt"
	"maps"
	"slices"

	"afterbeat/data"
	"afterbeat/data/casefile"
	"afterbeat/data/unit"
)

// names is the part of a case that is written by the names of channels.
type names []data.Channel

// is tells whether a name in the case means channel i.
func (n names) is(name string, i int) bool {
	k, err := data.FindChannel(n, name, "")
	return err == nil && k == i
}

// set is the table with v for channel i, under its whole name and no other.
func set[V any](n names, table map[string]V, i int, v V) map[string]V {
	out := cleared(n, table, i)
	out[n[i].Name.String()] = v
	return out
}

// cleared is the table without channel i.
func cleared[V any](n names, table map[string]V, i int) map[string]V {
	out := map[string]V{}
	maps.Copy(out, table)
	maps.DeleteFunc(out, func(name string, _ V) bool { return n.is(name, i) })
	return out
}

// entry is what the table has for channel i.
func entry[V any](n names, table map[string]V, i int) (v V, ok bool) {
	for _, name := range slices.Sorted(maps.Keys(table)) {
		if n.is(name, i) {
			return table[name], true
		}
	}
	return v, false
}

// inverted tells whether the case inverts channel i.
func (n names) inverted(c casefile.Case, i int) bool {
	odd := false
	for _, name := range c.Invert {
		odd = odd != n.is(name, i)
	}
	return odd
}

// invert changes the sign of channel i.
func (n names) invert(c casefile.Case, i int) casefile.Case {
	was := n.inverted(c, i)
	c.Invert = slices.DeleteFunc(slices.Clone(c.Invert), func(name string) bool { return n.is(name, i) })
	if !was {
		c.Invert = append(c.Invert, n[i].Name.String())
	}
	return c
}

// use makes channel i the one of its quantity. ok is false where it has none.
func (n names) use(c casefile.Case, i int) (out casefile.Case, role string, ok bool) {
	name := n[i].Name.String()
	switch n[i].Quantity {
	case unit.Pressure:
		c.Pressure = name
	case unit.Flow:
		c.Flow, c.Velocity = name, ""
	case unit.Velocity:
		c.Velocity, c.Flow = name, ""
	default:
		return c, "", false
	}
	return c, string(n[i].Quantity), true
}

// withoutOtherRole takes back what channel i is named for, where its new unit is
// one of another quantity.
func (n names) withoutOtherRole(c casefile.Case, i int, text string) casefile.Case {
	u, _ := unit.Parse(text)
	for q, role := range map[unit.Quantity]*string{unit.Pressure: &c.Pressure, unit.Flow: &c.Flow, unit.Velocity: &c.Velocity} {
		if *role != "" && n.is(*role, i) && u.Calibrated && u.Quantity != q {
			*role = ""
		}
	}
	return c
}

// siteAfter is the site that follows by steps in the list of all, round.
func siteAfter(s data.Site, steps int) data.Site {
	all := data.Sites()
	k := slices.Index(all, s) + steps
	return all[(k%len(all)+len(all))%len(all)]
}

// span sets an end of the span; refused says why it cannot be there.
func span(c casefile.Case, at float64, end bool) (out casefile.Case, refused string) {
	s := spanOf(c)
	if end {
		s.To, c.To = at, &at
	} else {
		s.From, c.From = at, &at
	}
	if s.To > s.From {
		return c, ""
	}
	if end {
		return c, fmt.Sprintf("the span starts at %s s, not before the cursor: set its start first, or w for the whole", seconds(s.From))
	}
	return c, fmt.Sprintf("the span ends at %s s, not after the cursor: set its end first, or w for the whole", seconds(s.To))
}
