package chart

import "github.com/guptarohit/asciigraph"

// Glyph is what a curve is made of.
type Glyph int

// The glyphs. Only Line and Stars have a colour. Dots and Points are not joined.
// Dots never cover another curve: they are for a cloud of many series behind one;
// Points cover all: they are for single values that a curve runs through.
const (
	ByOrder Glyph = iota // Line for the first series, Stars for the second, Circles, Crosses, then Dots
	Line
	Stars
	Circles
	Crosses
	Dots
	Points
)

// of resolves ByOrder for series k, counted from 0.
func (g Glyph) of(k int) Glyph {
	if g == ByOrder {
		return min(Line+Glyph(k), Dots)
	}
	return g
}

func (g Glyph) ink() ink {
	switch g {
	case Line:
		return first
	case Stars:
		return second
	}
	return plain
}

// key is the sample of the glyph that a legend shows.
func (g Glyph) key(t Theme) string {
	switch g {
	case Stars:
		return "*"
	case Circles, Points:
		return "o"
	case Crosses:
		return "+"
	case Dots:
		return "."
	}
	return string(t.pick('─', '-'))
}

// asciiLine draws rounded corners as . above and ' below, and nothing where a
// curve sets in after a gap, which would hide a gap of one column.
var asciiLine = asciigraph.CharSet{
	Horizontal: "-", VerticalLine: "|",
	ArcDownRight: ".", ArcDownLeft: ".", ArcUpRight: "'", ArcUpLeft: "'",
	EndCap: "-", StartCap: " ",
}

func (g Glyph) charSet(t Theme) asciigraph.CharSet {
	if g == Line && !t.ASCII {
		return asciigraph.DefaultCharSet
	}
	if g == Line {
		return asciiLine
	}
	set := asciigraph.CreateCharSet(g.key(t))
	set.StartCap = " "
	return set
}
