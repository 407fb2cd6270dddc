package study

import (
	"fmt"
	"math"

	"afterbeat/data"
	"afterbeat/data/beat"
	"afterbeat/data/unit"
	"afterbeat/tree/anatomy"
)

// leastDistal is how many beats a distal trace needs, or all where there are
// fewer.
const leastDistal = 5

// distal are the traces beyond the root that the tree can be held against: other
// columns of a pressure or a velocity at a site that the tree has, averaged over
// the beats in use. A velocity is compared over its mean, so that its unit and
// its diameter do not matter; nor does the level of a distal pressure.
func distal(b Beats) ([]anatomy.Trace, error) {
	var out []anatomy.Trace
	held := b.Intake.Case.HoldOut
	for i, ch := range b.Intake.Channels {
		if i == b.Lead || i == b.FlowInfo.Channel || !reached(ch) {
			continue
		}
		mean, ok := b.averageOf(ch)
		if !ok {
			continue
		}
		out = append(out, anatomy.Trace{
			Name: ch.Name, Site: ch.Site, Quantity: ch.Quantity, Beat: mean,
			HeldOut: held != "" && ch.Name.String() == held,
		})
	}
	if held == "" {
		return out, nil
	}
	for _, t := range out {
		if t.HeldOut {
			return out, nil
		}
	}
	return nil, &ChoiceError{Key: "hold_out", What: fmt.Sprintf("%q is no distal trace that the tree can be held against", data.Clean(held)), Hint: "a calibrated pressure or a velocity with a pulse, at a site of the tree (--site NAME=radial), that is not the one fitted"}
}

// reached tells whether a column is a trace of the systemic arteries beyond the
// root.
func reached(ch data.Channel) bool {
	switch ch.Site {
	case data.SiteCarotid, data.SiteMCA, data.SiteBrachial, data.SiteRadial, data.SiteFinger, data.SiteFemoral, data.SiteRenal:
	default:
		return false
	}
	return ch.Quantity == unit.Pressure && ch.Unit.Calibrated || ch.Quantity == unit.Velocity || ch.Quantity == unit.Flow
}

// averageOf is the average beat of a column over the beats in use; false where
// too few of them have it, or it has no pulse of its own.
func (b Beats) averageOf(ch data.Channel) (data.Period, bool) {
	if b.Intake.Case.OneBeat {
		return data.Period{Samples: ch.Values, Rate: b.Intake.Grid.Rate}, !hasNaN(ch.Values) && len(ch.Values) == b.Ensemble.N
	}
	lead, _ := b.Intake.Chosen(b.Lead)
	e := beat.Cut(b.Beats, b.Intake.Grid.Rate, beat.Signal{Values: lead.Values}, beat.Signal{Values: ch.Values})
	if len(e.Used) < min(leastDistal, len(b.Ensemble.Used)) {
		return data.Period{}, false
	}
	mean := e.Average(1).Period
	low, high := mean.Extremes()
	return mean, high-low > 0 && math.Abs(mean.Mean()) > 0
}

func hasNaN(values []float64) bool {
	for _, v := range values {
		if math.IsNaN(v) {
			return true
		}
	}
	return false
}

// withoutBlocks are the average beats with one block of them left out in turn.
func withoutBlocks(e beat.Ensemble) []anatomy.Pair {
	flows, pressures := e.LeaveOutAverages(1), e.LeaveOutAverages(0)
	out := make([]anatomy.Pair, len(flows))
	for i := range out {
		out[i] = anatomy.Pair{Flow: flows[i], Pressure: pressures[i]}
	}
	return out
}
