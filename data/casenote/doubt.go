package casenote

import (
	"math"

	"afterbeat/data"
)

// undefined tells that there is no such number: neither a value nor a range.
func (n Number) undefined() bool {
	return math.IsNaN(n.Value) && (n.Identified || !n.Total.Defined())
}

// exact tells that the number has no doubt: it was counted, or given.
func (n Number) exact() bool { return n.Total.Low == n.Total.High }

// String writes the number in one sentence with its unit, its doubt and its
// origin: "0.951 mmHg s/mL, 95 % 0.912 to 0.993 (random 0.945 to 0.955),
// estimated". A number that is not identified is its range and the reason.
func (n Number) String() string {
	if n.undefined() {
		return "undefined (" + n.reason() + ")"
	}
	return n.amount() + ", " + n.origin()
}

// amount is [Number.String] without the origin.
func (n Number) amount() string {
	switch {
	case !n.Identified && n.Total.Defined() && n.exact():
		return "not identified (" + n.reason() + "), " + Format(n.Value, n.Total) + " in every replicate" + spaced(n.Unit)
	case !n.Identified && n.Total.Defined():
		return "not identified (" + n.reason() + "), range " + FormatRange(n.Value, n.Total) + spaced(n.Unit)
	case !n.Identified:
		return "not identified (" + n.reason() + "), range unknown"
	}
	s := Format(n.Value, n.Total) + spaced(n.Unit) + ", "
	switch {
	case !n.Total.Defined() && n.Why != "":
		return s + "no interval (" + n.Why + ")"
	case !n.Total.Defined(), n.exact():
		return s + n.interval()
	}
	s += "95 % " + n.interval()
	if random := n.random(); random != "" {
		s += " (random " + random + ")"
	}
	return s
}

// interval is the total interval in print. A value that somebody assumed is
// not exact but fixed.
func (n Number) interval() string {
	if n.exact() && n.Origin == data.Assumed {
		return "fixed"
	}
	return FormatRange(n.Value, n.Total)
}

// random is the interval of random error in print; empty where there is none,
// or where it looks the same as the total one.
func (n Number) random() string {
	if !n.Random.Defined() || !n.Total.Defined() || n.exact() {
		return ""
	}
	s := ends(n.Random, places(n.Value, n.Total))
	if s == n.interval() {
		return ""
	}
	return s
}

func (n Number) reason() string {
	if n.Why == "" {
		return "no reason given"
	}
	return n.Why
}

func (n Number) origin() string {
	if n.Origin == "" {
		return "unstated"
	}
	return string(n.Origin)
}

// spaced puts a blank before a unit, where there is one.
func spaced(unit string) string {
	if unit == "" {
		return ""
	}
	return " " + unit
}
