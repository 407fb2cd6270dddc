package chart

import (
	"math"
	"slices"
	"strconv"
	"testing"

	"pgregory.net/rapid"
)

// Worked by hand: the smallest of 1, 2, 5 times a power of ten that divides the
// span into at most n parts.
func TestCoarsest(t *testing.T) {
	for _, c := range []struct {
		span float64
		n    int
		want float64
	}{
		{50, 5, 10},
		{51, 5, 20},
		{0.8, 8, 0.1},
		{1, 1, 1},
		{3, 4, 1},
		{0.0123, 10, 0.002},
		{9e5, 3, 5e5},
		{1e-290, 4, 5e-291},
		{1.9e300, 2, 1e300},
	} {
		if got := coarsest(c.span, c.n).size; math.Abs(got/c.want-1) > 1e-12 {
			t.Errorf("span %g in %d parts: step %g, want %g", c.span, c.n, got, c.want)
		}
	}
}

func TestCovering(t *testing.T) {
	nan, inf := math.NaN(), math.Inf(1)
	for _, c := range []struct {
		values    []float64
		low, high float64
	}{
		{[]float64{71.2, 121.3, nan}, 70, 130}, // 50.1 in at most eight parts: 10
		{[]float64{70, 120}, 70, 120},
		{[]float64{-0.3, inf, 0.1}, -0.3, 0.1},
		{[]float64{100, 100}, 94, 106}, // a constant: a twentieth of room, in steps of 2
		{[]float64{0, -inf}, -1, 1},
		{[]float64{nan, inf, 1.1e300}, 0, 0},
		{nil, 0, 0},
	} {
		got := Covering("mmHg", c.values)
		if math.Abs(got.Low-c.low) > 1e-12 || math.Abs(got.High-c.high) > 1e-12 || got.Unit != "mmHg" {
			t.Errorf("%v: %+v, want %g to %g mmHg", c.values, got, c.low, c.high)
		}
	}
}

func labels(ticks []tick) []string {
	var out []string
	for _, k := range ticks {
		out = append(out, k.label)
	}
	return out
}

func TestLineTicks(t *testing.T) {
	for _, c := range []struct {
		low, high float64
		lines     int
		want      []string
	}{
		{60, 140, 11, []string{"60", "80", "100", "120", "140"}},
		{-1.5, 1.5, 4, []string{"-1.5", "0", "1.5"}}, // a step of 5 would label 0 alone
		{-1, 2, 4, []string{"-1", "2"}},
		{-2, 2, 5, []string{"-2", "0", "2"}},
		{0.301, 0.92, 3, []string{"0.30", "0.92"}},
		{1.1e7, 1.3e7, 9, []string{"1.10e+07", "1.15e+07", "1.20e+07", "1.25e+07", "1.30e+07"}},
		{0, 8e-6, 9, []string{"0e+00", "2e-06", "4e-06", "6e-06", "8e-06"}},
		{5, 5, 9, nil},
		{0, math.Inf(1), 9, nil},
	} {
		got := labels(lineTicks(Axis{Low: c.low, High: c.high}, c.lines))
		if !slices.Equal(got, c.want) {
			t.Errorf("%g to %g on %d lines: %v, want %v", c.low, c.high, c.lines, got, c.want)
		}
	}
}

// A label says the value of its line or column to half a step of the grid, labels
// rise, differ, and leave room between them.
func TestTicksProperties(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		low := rapid.Float64Range(-1e3, 1e3).Draw(t, "low") * math.Pow10(rapid.IntRange(-9, 9).Draw(t, "scale"))
		span := rapid.Float64Range(1e-6, 1e3).Draw(t, "span") * math.Pow10(rapid.IntRange(-9, 9).Draw(t, "span scale"))
		n := rapid.IntRange(2, 200).Draw(t, "places")
		a := Axis{Low: low, High: low + span}
		if !a.valid() {
			t.Skip("no room between the bounds")
		}
		lines, columns := lineTicks(a, n), columnTicks(a, n)
		if len(lines) < 2 || len(columns) < 2 {
			t.Fatalf("fewer than two ticks: %v, %v", lines, columns)
		}
		for k, tick := range append(slices.Clone(lines), columns...) {
			v, err := strconv.ParseFloat(tick.label, 64)
			if err != nil {
				t.Fatal(err)
			}
			at := (v - a.Low) / (a.High - a.Low) * float64(n-1)
			slack := 0.5 + 0.02*float64(n) // a bound is written to a hundredth of the span
			if math.Abs(at-float64(tick.at)) > slack {
				t.Fatalf("tick %d, %q, stands at %d, belongs at %g", k, tick.label, tick.at, at)
			}
		}
		for k := 1; k < len(lines); k++ {
			if lines[k].at <= lines[k-1].at || lines[k].label == lines[k-1].label {
				t.Fatalf("lines do not rise: %v", lines)
			}
		}
		for k := 1; k < len(columns); k++ {
			if columns[k].at <= columns[k-1].at || columns[k].label == columns[k-1].label {
				t.Fatalf("columns do not rise: %v", columns)
			}
		}
	})
}
