package beat

import (
	"fmt"
	"math"

	"afterbeat/data"
)

// Average is the average beat of one signal.
type Average struct {
	Period data.Period
	// StdErr is the standard error of each sample, SD/sqrt(Count), as if beats
	// were independent; with breathing they are not, and it is too small. NaN
	// for a single beat.
	StdErr []float64
	Count  int
	// EndMinusStart is the mean over the beats of value(To) - value(From).
	EndMinusStart float64
}

// Average is the mean of the beats of a signal, sample by sample. Without a beat
// the period is empty and Count 0.
func (e Ensemble) Average(signal int) Average {
	n := len(e.Used)
	a := Average{
		Period: data.Period{Samples: make([]float64, e.N), Rate: e.Rate},
		StdErr: make([]float64, e.N), Count: n, EndMinusStart: e.EndMinusStart[signal],
	}
	column := make([]float64, n)
	for j := range a.StdErr {
		for i, beat := range e.Beats[signal] {
			column[i] = beat[j]
		}
		mean, sd := meanSD(column)
		a.Period.Samples[j] = mean
		a.StdErr[j] = sd / math.Sqrt(float64(n))
	}
	return a
}

// Limits of an open beat: 2 mmHg a beat put some 4 % on a fitted resistance.
const (
	openPressure = 1.0  // mmHg
	openPart     = 0.02 // of the pulse pressure
)

// Closed warns where the average beat of a pressure, in mmHg, ends more than
// 1 mmHg or 2 % of its pulse pressure from where it began. An uncalibrated
// pressure is judged by the 2 % alone.
func (a Average) Closed(channel data.Text, calibrated bool) []data.Warning {
	if a.Count == 0 {
		return nil
	}
	low, high := a.Period.Extremes()
	gap := math.Abs(a.EndMinusStart)
	if gap <= openPart*(high-low) && (!calibrated || gap <= openPressure) {
		return nil
	}
	unit := ""
	if calibrated {
		unit = " mmHg"
	}
	return []data.Warning{{
		Code: data.CodeOpenBeat, Channel: channel,
		Text: fmt.Sprintf("the average beat ends %.2g%s (%.2g %% of the pulse) %s than it began",
			gap, unit, 100*gap/(high-low), higherOrLower(a.EndMinusStart)),
		Cure: "choose a steadier span, with --from and --to",
	}}
}

func higherOrLower(x float64) string {
	if x > 0 {
		return "higher"
	}
	return "lower"
}
