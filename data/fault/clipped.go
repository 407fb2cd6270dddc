package fault

import (
	"fmt"
	"math"

	"afterbeat/data"
	"afterbeat/data/unit"
)

const (
	leastClipped   = 3    // samples, or held values, on the rail
	leastRuns      = 3    // visits of the rail
	leastLong      = 0.2  // s: a single visit of this length is enough
	cornerSteps    = 12.0 // see the package's page
	windowsClipped = 2.5  // s
	mostClipped    = 0.5  // of the windows: above, every pulse is clipped
)

// clipped finds samples at the upper and the lower end of the scale. k is the
// number of samples in a held value.
func (t Trace) clipped(s scale, k float64) []Finding {
	low, high := math.Inf(1), math.Inf(-1)
	for _, v := range t.Values {
		if !math.IsNaN(v) {
			low, high = min(low, v), max(high, v)
		}
	}
	var out []Finding
	for _, end := range []struct {
		at    float64
		sign  float64
		words string
	}{{high, 1, "upper"}, {low, -1, "lower"}} {
		if end.sign < 0 && end.at == 0 && t.Quantity != unit.Pressure {
			continue // no flow is no rail
		}
		runs := t.onRail(end.at, end.sign, max(leastClipped, int(math.Ceil(leastClipped*k))), cornerSteps*max(s.step, 1e-6*s.pulse))
		if len(runs) >= leastRuns || len(runs) > 0 && longest(runs) >= t.samples(leastLong) {
			out = append(out, t.clipping(runs, end.at, end.words))
		}
	}
	return out
}

// onRail are the runs of samples at a value that begin and end with a corner.
func (t Trace) onRail(rail, sign float64, least int, corner float64) []Run {
	var out []Run
	x := t.Values
	off := func(i, step, n int) bool { // the trace leaves the rail by more than a corner within n samples
		for range n {
			if i += step; i < 0 || i >= len(x) || math.IsNaN(x[i]) {
				return true // cut off there
			}
			if sign*(rail-x[i]) > corner {
				return true
			}
		}
		return false
	}
	for i := 0; i < len(x); i++ {
		from := i
		for i < len(x) && x[i] == rail {
			i++
		}
		if n := i - from; n >= least && off(from, -1, n) && off(i-1, 1, n) {
			out = append(out, Run{from, i})
		}
	}
	return out
}

func longest(runs []Run) int {
	n := 0
	for _, r := range runs {
		n = max(n, r.To-r.From)
	}
	return n
}

func (t Trace) clipping(runs []Run, rail float64, words string) Finding {
	f := Finding{Code: data.CodeClipped, Number: rail, Runs: runs}
	n := f.Samples()
	f.Text = fmt.Sprintf("clipped at %.4g %s, the %s end of the scale, %d times: %.2g %% of the samples", rail, t.Unit, words, len(runs), 100*float64(n)/float64(len(t.Values)))
	if t.share(runs) > mostClipped {
		f.Text += "; nearly every pulse, so that the samples stay in use and the extreme and the pulse are bounds"
		f.Cure = "record with a wider range; a compliance from this pulse is too high"
		return f
	}
	f.Unusable = true
	f.Cure = "the samples are left out, and so are their beats; record with a wider range"
	return f
}

// share is how many windows hold some of the runs.
func (t Trace) share(runs []Run) float64 {
	n := t.samples(windowsClipped)
	hit := map[int]bool{}
	for _, r := range runs {
		for w := r.From / n; w <= (r.To-1)/n; w++ {
			hit[w] = true
		}
	}
	return float64(len(hit)) / math.Ceil(float64(len(t.Values))/float64(n))
}
