package fault

import (
	"fmt"
	"math"

	"afterbeat/data"
	"afterbeat/data/unit"
)

const (
	cuffLevel   = 0.25 // s that a level is held at least
	cuffStep    = 0.25 // s between levels at most
	cuffWithin  = 0.06 // of the pulse, that a level may move
	cuffLeast   = 1.0  // s in all
	cuffLevels  = 2
	cuffBeyond  = 0.25 // of the pulse, that a level may lie outside the range of the trace
	cuffBefore  = 0.10 // s left out before
	cuffAfter   = 0.25 // s left out after
	cuffSmooth  = 0.03 // s of the running mean
	cuffMost    = 0.4  // of the trace: more is no calibration now and then
	cuffTooLong = 10.0 // s
)

// recalibrated finds the stretches in which a finger cuff calibrates itself.
func (t Trace) recalibrated(s scale) []Finding {
	if t.Quantity != unit.Pressure {
		return nil
	}
	y := smoothed(t.Values, t.samples(cuffSmooth)/2)
	levels := level(y, cuffWithin*s.pulse, t.samples(cuffLevel))
	f := Finding{Code: data.CodeRecalibrated, Unusable: true}
	for i := 0; i < len(levels); {
		j := i + 1
		for j < len(levels) && levels[j].From-levels[j-1].To <= t.samples(cuffStep) {
			j++
		}
		if t.isCuff(y, levels[i:j], s) {
			f.Runs = append(f.Runs, Run{
				max(0, levels[i].From-t.samples(cuffBefore)),
				min(len(y), levels[j-1].To+t.samples(cuffAfter)),
			})
		}
		i = j
	}
	if n := f.Samples(); n == 0 || float64(n) > cuffMost*float64(len(y)) {
		return nil
	}
	f.Number = float64(len(f.Runs))
	f.Text = fmt.Sprintf("the cuff calibrates itself %s, %.3g s in all, while it measures no pressure", times(len(f.Runs)), float64(f.Samples())/t.Rate)
	if n := len(f.Runs); n > 1 {
		f.Text += fmt.Sprintf("; every %.3g s", float64(f.Runs[n-1].From-f.Runs[0].From)/float64(n-1)/t.Rate)
	}
	f.Cure = "the samples are left out; after each the level may jump: compare with a cuff at the arm, or use the span between two of them"
	return []Finding{f}
}

// isCuff tells whether level stretches that follow one another are those of a cuff.
func (t Trace) isCuff(y []float64, levels []Run, s scale) bool {
	first, last := levels[0], levels[len(levels)-1]
	length := last.To - first.From
	if len(levels) < cuffLevels || length < t.samples(cuffLeast) || length > t.samples(cuffTooLong) {
		return false
	}
	changes := 0
	for k, r := range levels {
		at := y[(r.From+r.To)/2]
		if at < s.low-cuffBeyond*s.pulse || at > s.high+cuffBeyond*s.pulse {
			return false
		}
		if k > 0 && math.Abs(at-y[(levels[k-1].From+levels[k-1].To)/2]) > cuffWithin*s.pulse {
			changes++
		}
	}
	return changes > 0
}

// smoothed is the running mean over half samples on either side; NaN where one of
// them is missing.
func smoothed(x []float64, half int) []float64 {
	out := make([]float64, len(x))
	sum, missing, n := 0.0, 0, 0
	put := func(i, sign int) {
		if i < 0 || i >= len(x) {
			return
		}
		n += sign
		if math.IsNaN(x[i]) {
			missing += sign
			return
		}
		sum += float64(sign) * x[i]
	}
	for i := -half; i < half; i++ {
		put(i, 1)
	}
	for i := range x {
		put(i+half, 1)
		out[i] = sum / float64(n)
		if missing > 0 {
			out[i] = math.NaN()
		}
		put(i-half, -1)
	}
	return out
}

func times(n int) string {
	if n == 1 {
		return "once"
	}
	return fmt.Sprintf("%d times", n)
}
