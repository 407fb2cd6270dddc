package fitting

import (
	"fmt"
	"math"
)

// Run is a stretch of successive used beats of a recording, without a gap.
type Run struct {
	Pressure []float64 // mmHg
	Flow     []float64 // mL/s, or cm/s where per unit area
	// Onsets are the samples at which the beats begin, the first of them 0, and the
	// last sample, where the last beat ends.
	Onsets []int
}

// Span is all that is usable of a recording: its beats, resampled to one length,
// and the samples that they were cut from.
type Span struct {
	Beats
	Runs []Run
}

// first is the beginning of the span, about as long as said, in whole beats.
func (s Span) first(samples int) Span {
	out := Span{Beats: s.Beats}
	for _, r := range s.Runs {
		if samples <= 0 {
			break
		}
		last := r.beats()
		for last > 1 && r.Onsets[last-1] >= samples {
			last--
		}
		end := r.Onsets[last] + 1
		out.Runs = append(out.Runs, Run{r.Pressure[:end], r.Flow[:end], r.Onsets[:last+1]})
		samples -= end
	}
	return out
}

// total is the number of samples.
func (s Span) total() int {
	n := 0
	for _, r := range s.Runs {
		n += len(r.Flow)
	}
	return n
}

func (s Span) beatsInRuns() int {
	n := 0
	for _, r := range s.Runs {
		n += r.beats()
	}
	return n
}

// check tells what makes runs unfit for a fit.
func (s Span) check() error {
	if err := s.Beats.check(); err != nil {
		return err
	}
	for i, r := range s.Runs {
		last := r.beats()
		if len(r.Pressure) != len(r.Flow) || last < 1 || r.Onsets[0] != 0 || r.Onsets[last] != len(r.Flow)-1 {
			return fmt.Errorf("fitting: run %d: %d samples of pressure, %d of flow, onsets %v", i+1, len(r.Pressure), len(r.Flow), r.Onsets)
		}
		for k, from := range r.Onsets[:last] {
			if r.Onsets[k+1]-from < 2 {
				return fmt.Errorf("fitting: run %d: beat %d has %d samples", i+1, k+1, r.Onsets[k+1]-from)
			}
		}
		for j := range r.Pressure {
			if !finite(r.Pressure[j]) || !finite(r.Flow[j]) {
				return fmt.Errorf("fitting: run %d: sample %d is not a number", i+1, j)
			}
		}
	}
	return nil
}

// beats is the number of beats of the run.
func (r Run) beats() int { return len(r.Onsets) - 1 }

// rise is dQ/dt at the samples of flow: the mean of the two adjacent slopes, and
// the one there is at the ends.
func rise(flow []float64, rate float64) []float64 {
	out := make([]float64, len(flow))
	last := len(flow) - 1
	for j := range out {
		before, after := max(0, j-1), min(last, j+1)
		out[j] = (flow[after] - flow[before]) * rate / math.Max(1, float64(after-before))
	}
	return out
}
