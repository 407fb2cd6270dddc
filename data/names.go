package data

import (
	"fmt"
	"strings"
)

// title is what a column can be called by: its whole header, or the part of it
// before the unit.
type title struct{ name, part Text }

// UnknownNameError says that no column has the name that the user gave.
type UnknownNameError struct {
	Name    Text
	Nearest Text   // the name most like it; empty where there is none
	Flag    string // the flag that gave it
}

func (e *UnknownNameError) Error() string {
	text := fmt.Sprintf("there is no column %q", e.Name)
	if e.Nearest.String() != "" {
		text += fmt.Sprintf("; the nearest is %q", e.Nearest)
	}
	return text + " (" + e.Flag + ")"
}

// AmbiguousError says that several columns fit equally well, and that a person
// must choose.
type AmbiguousError struct {
	Role  string // "pressure", "flow", "velocity"; empty where a name is ambiguous
	Names []Text
	Flag  string // the flag that decides
}

func (e *AmbiguousError) Error() string {
	names := make([]string, len(e.Names))
	for i, n := range e.Names {
		names[i] = n.String()
	}
	what := "the name fits"
	if e.Role != "" {
		what = "the " + e.Role + " could be"
	}
	last := len(names) - 1
	return fmt.Sprintf("%s %s or %s; choose with %s", what, strings.Join(names[:last], ", "), names[last], e.Flag)
}

// find returns the column that the user calls name: by its whole header, else
// by the part of it before the unit, else by either in another case. flag is
// the flag that gave the name.
func find(name string, in []title, flag string) (int, error) {
	want := Clean(name)
	for _, same := range []func(title) bool{
		func(t title) bool { return t.name == want },
		func(t title) bool { return t.part == want },
		func(t title) bool { return strings.EqualFold(t.name.String(), want.String()) },
		func(t title) bool { return strings.EqualFold(t.part.String(), want.String()) },
	} {
		var hits []int
		for i, t := range in {
			if same(t) {
				hits = append(hits, i)
			}
		}
		switch {
		case len(hits) == 1:
			return hits[0], nil
		case len(hits) > 1:
			e := &AmbiguousError{Flag: flag}
			for _, i := range hits {
				e.Names = append(e.Names, in[i].name)
			}
			return 0, e
		}
	}
	return 0, &UnknownNameError{Name: want, Nearest: nearest(want, in), Flag: flag}
}

// nearest is the header that takes the fewest changes to become name, or whose
// part before the unit does.
func nearest(name Text, in []title) Text {
	best, at := Text{}, -1
	for _, t := range in {
		for _, s := range []Text{t.name, t.part} {
			d := distance(strings.ToLower(name.String()), strings.ToLower(s.String()))
			if at < 0 || d < at {
				best, at = t.name, d
			}
		}
	}
	return best
}

// distance is the number of runes to insert, delete or replace to make a of b
// (Levenshtein 1966); only their first 100 count.
func distance(a, b string) int {
	x, y := []rune(a), []rune(b)
	x, y = x[:min(len(x), 100)], y[:min(len(y), 100)]
	row := make([]int, len(y)+1)
	for j := range row {
		row[j] = j
	}
	for i := range x {
		diagonal := row[0]
		row[0]++
		for j := range y {
			change := diagonal
			if x[i] != y[j] {
				change++
			}
			diagonal = row[j+1]
			row[j+1] = min(change, row[j]+1, row[j+1]+1)
		}
	}
	return row[len(y)]
}

// shellWord is s as one word of a POSIX shell, for a flag that can be pasted.
func shellWord(s string) string {
	plain := func(r rune) bool {
		return r < 0x80 && (r >= 'a' && r <= 'z' || r >= 'A' && r <= 'Z' || r >= '0' && r <= '9' || strings.ContainsRune("_-./:%+,", r))
	}
	s = Clean(s).String()
	if s != "" && strings.IndexFunc(s, func(r rune) bool { return !plain(r) }) < 0 {
		return s
	}
	return "'" + strings.ReplaceAll(s, "'", `'\''`) + "'"
}
