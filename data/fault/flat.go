package fault

import (
	"fmt"
	"math"

	"afterbeat/data"
)

const (
	leastFlat   = 2.0  // s
	flatOfPulse = 0.01 // of the pulse
)

// flat finds stretches in which the trace does not move.
func (t Trace) flat(s scale) []Finding {
	runs := level(t.Values, flatOfPulse*s.pulse, t.samples(leastFlat))
	f := Finding{Code: data.CodeFlat, Runs: runs, Unusable: true}
	n := f.Samples()
	if n == 0 || n == len(t.Values) {
		return nil
	}
	f.Number = float64(n) / t.Rate
	f.Text = fmt.Sprintf("the trace does not move for %.3g s in all, in %s, at %.4g %s", f.Number, counted(len(runs), "stretch", "stretches"), t.Values[runs[0].From], t.Unit)
	f.Cure = "the samples are left out; look whether the sensor was off, closed or at the end of its range"
	return []Finding{f}
}

// level are the runs of at least n samples within a range of tolerance.
func level(values []float64, tolerance float64, n int) []Run {
	var out []Run
	from, low, high := 0, math.Inf(1), math.Inf(-1)
	end := func(to int) {
		if to-from >= n {
			out = append(out, Run{from, to})
		}
		from, low, high = to, math.Inf(1), math.Inf(-1)
	}
	for i, v := range values {
		switch {
		case math.IsNaN(v):
			end(i)
			from = i + 1
			continue
		case i > from && max(high, v)-min(low, v) > tolerance:
			end(i)
		}
		low, high = min(low, v), max(high, v)
	}
	end(len(values))
	return out
}

// counted writes a number with its noun.
func counted(n int, one, many string) string {
	if n == 1 {
		return "1 " + one
	}
	return fmt.Sprintf("%d %s", n, many)
}
