package chart

import (
	"math"
	"strings"
	"testing"
)

// Single values are seen, each in its cell, although a curve runs through them.
func TestPointsCoverACurve(t *testing.T) {
	const columns = 40
	line, points := make([]float64, columns), make([]float64, columns)
	for i := range line {
		line[i], points[i] = 1, math.NaN()
	}
	points[5], points[20] = 1, 1
	p := Plot{
		X: Axis{Low: 0, High: 1}, Y: Axis{Low: 0, High: 2},
		Series: []Series{{Name: "model", Values: line}, {Name: "data", Values: points, Glyph: Points}},
	}
	v := p.Draw(columns+4, 6, Theme{ASCII: true})
	for _, row := range strings.Split(v, "\n")[1:] {
		if strings.Contains(row, "-o-") {
			if strings.Count(row, "o") != 2 {
				t.Errorf("%q", row)
			}
			return
		}
	}
	t.Errorf("no points:\n%s", v)
}
