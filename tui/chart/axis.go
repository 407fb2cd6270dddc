package chart

import "math"

// Axis is the range that a drawing shows in one direction. The zero Axis says
// nothing: of y, a plot then takes [Covering] of its series; of x, it draws no
// ticks.
type Axis struct {
	Low, High float64
	Name      string // "time": heads the column of a table
	Unit      string // "s"
}

// valid says whether the range can be divided into lines or columns: finite,
// High above Low by more than rounding.
func (a Axis) valid() bool {
	return math.Max(math.Abs(a.Low), math.Abs(a.High)) <= 10*largest &&
		a.High-a.Low > 1e-12*max(math.Abs(a.Low), math.Abs(a.High), 1e-280)
}

// place is the number, of n equal steps from Low to High, nearest to v: the
// column or line of the package comment. It is outside 0 .. n-1 where v is
// outside the range, and clipped one step away from it.
func (a Axis) place(v float64, n int) int {
	p := math.Round((v - a.Low) / (a.High - a.Low) * float64(n-1))
	return int(min(max(p, -1), float64(n)))
}

// Covering is the y axis that holds every value of the traces, rounded
// outwards to a step of 1, 2 or 5 times a power of ten. A constant gets room
// above and below. Without any value it is the zero Axis with its unit.
func Covering(unit string, traces ...[]float64) Axis {
	low, high := math.Inf(1), math.Inf(-1)
	for _, trace := range traces {
		for _, v := range trace {
			if present(v) {
				low, high = min(low, v), max(high, v)
			}
		}
	}
	if low > high {
		return Axis{Unit: unit}
	}
	return Axis{Low: low, High: high, Unit: unit}.rounded()
}

// steps is into how many parts a rounded axis is divided, at most.
const steps = 8

// rounded widens the axis outwards to whole steps.
func (a Axis) rounded() Axis {
	if !a.valid() {
		room := math.Abs(a.Low) / 20
		if room < 1e-280 {
			room = 1
		}
		a.Low, a.High = a.Low-room, a.High+room
	}
	s := coarsest(a.High-a.Low, steps)
	// A value on a step stays there although the division rounds.
	low, high := math.Floor(a.Low/s.size+1e-9)*s.size, math.Ceil(a.High/s.size-1e-9)*s.size
	a.Low, a.High = min(low, a.Low), max(high, a.High)
	return a
}
