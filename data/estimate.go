package data

import "math"

// Interval is a 95 % interval. Both ends are NaN where there is none.
type Interval struct{ Low, High float64 }

// NoInterval is what stands where nothing could be said.
func NoInterval() Interval { return Interval{math.NaN(), math.NaN()} }

// Defined tells whether there is an interval.
func (i Interval) Defined() bool { return !math.IsNaN(i.Low) && !math.IsNaN(i.High) }

// Width is High - Low; NaN where there is no interval.
func (i Interval) Width() float64 { return i.High - i.Low }

// Contains tells whether x lies in the interval, its ends included.
func (i Interval) Contains(x float64) bool { return i.Low <= x && x <= i.High }

// Origin says how a number came about.
type Origin string

const (
	Measured  Origin = "measured"  // read off the recording, or given by the user as a measurement
	Estimated Origin = "estimated" // came out of a fit or a model
	Assumed   Origin = "assumed"   // a default, or a choice that no measurement supports
)

// Estimate is a number with its doubt.
type Estimate struct {
	Value float64
	// Total is the interval of random and systematic errors together.
	Total Interval
	// Random is the interval of random error alone.
	Random Interval
	// Identified is false where the data do not determine the value: it lies
	// on a bound, or its interval is wider than 100 % of it, or it trades
	// against another parameter. Such a value is never shown bare.
	Identified bool
	// Why says why there is no interval, or why the value is not identified.
	Why string
}

// Exact is an estimate without doubt: a value given, not estimated.
func Exact(v float64) Estimate {
	return Estimate{Value: v, Total: Interval{v, v}, Random: Interval{v, v}, Identified: true}
}
