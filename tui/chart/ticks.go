package chart

import (
	"math"
	"strconv"
	"strings"
)

// step is mantissa times ten to the exponent, mantissa 1, 2 or 5.
type step struct {
	size     float64
	mantissa int
	exponent int
}

func newStep(mantissa, exponent int) step {
	size := float64(mantissa)
	if exponent < 0 {
		size /= math.Pow10(-exponent) // exact where 0.1 times something is not
	} else {
		size *= math.Pow10(exponent)
	}
	return step{size, mantissa, exponent}
}

// next is the step above s.
func (s step) next() step {
	switch s.mantissa {
	case 1:
		return newStep(2, s.exponent)
	case 2:
		return newStep(5, s.exponent)
	}
	return newStep(1, s.exponent+1)
}

// coarsest is the smallest step that divides span, above 0, into at most n
// parts.
func coarsest(span float64, n int) step {
	s := newStep(1, int(math.Floor(math.Log10(span/float64(n))))-1)
	for s.size*float64(n) < span*(1-1e-9) {
		s = s.next()
	}
	return s
}

// tick is a labelled place on an axis, counted in lines or columns from Low.
type tick struct {
	at    int
	label string
}

// ticksAt places the multiples of s that lie within the axis on n places.
func ticksAt(a Axis, s step, n int) []tick {
	var ticks []tick
	first := math.Ceil(a.Low/s.size - 1e-9)
	write := formatter(a, s)
	for k := 0; k < n; k++ {
		v := (first + float64(k)) * s.size
		if v > a.High+1e-9*s.size {
			break
		}
		ticks = append(ticks, tick{a.place(min(max(v, a.Low), a.High), n), write(v)})
	}
	return ticks
}

// lineTicks labels a y axis of n lines: at most every second line, and the
// bounds themselves where fewer than two round numbers fit, with 0 where it lies
// in their middle.
func lineTicks(a Axis, n int) []tick {
	if !a.valid() || n < 2 {
		return nil
	}
	ticks := ticksAt(a, coarsest(a.High-a.Low, max((n-1)/2, 1)), n)
	if len(ticks) >= 2 {
		return ticks
	}
	bounds := boundTicks(a, n)
	if a.Low == -a.High && n > 2 {
		return []tick{bounds[0], {a.place(0, n), "0"}, bounds[1]}
	}
	return bounds
}

// boundTicks labels the bounds, to a hundredth of the range or better.
func boundTicks(a Axis, n int) []tick {
	write := formatter(a, coarsest(a.High-a.Low, 100))
	low, high := write(a.Low), write(a.High)
	for decimals(low) > 0 && strings.HasSuffix(low, "0") && strings.HasSuffix(high, "0") {
		low, high = low[:len(low)-1], high[:len(high)-1]
		low, high = strings.TrimSuffix(low, "."), strings.TrimSuffix(high, ".")
	}
	return []tick{{0, low}, {n - 1, high}}
}

// decimals counts the digits after the point of a number without exponent.
func decimals(label string) int {
	_, fraction, _ := strings.Cut(label, ".")
	if strings.Contains(fraction, "e") {
		return 0
	}
	return len(fraction)
}

// columnTicks labels an x axis of n columns as densely as leaves two cells
// between the labels.
func columnTicks(a Axis, n int) []tick {
	if !a.valid() || n < 2 {
		return nil
	}
	for s := coarsest(a.High-a.Low, max(n/4, 1)); s.size < a.High-a.Low; s = s.next() {
		ticks := ticksAt(a, s, n)
		if len(ticks) < 2 {
			break
		}
		if roomy(ticks) {
			return ticks
		}
	}
	return boundTicks(a, n)
}

func roomy(ticks []tick) bool {
	for k := 1; k < len(ticks); k++ {
		if ticks[k].at-ticks[k-1].at < max(len(ticks[k].label), len(ticks[k-1].label))+2 {
			return false
		}
	}
	return true
}

// formatter writes numbers of an axis so that multiples of s differ: with the
// decimals of s, or with an exponent where that would be long.
func formatter(a Axis, s step) func(float64) string {
	top := max(math.Abs(a.Low), math.Abs(a.High))
	format, digits := byte('f'), max(-s.exponent, 0)
	if top >= 1e6 || digits > 4 {
		format, digits = 'e', min(max(int(math.Floor(math.Log10(top)))-s.exponent, 0), 15)
	}
	return func(v float64) string {
		text := strconv.FormatFloat(v, format, digits, 64)
		if strings.Trim(text, "-0.e+") == "" {
			return strings.TrimPrefix(text, "-") // no -0.0
		}
		return text
	}
}
