package fitting

import (
	"errors"
	"fmt"
	"math"

	"afterbeat/data"
)

// Beats are the used beats of a recording, cut at the same instants in both
// channels and resampled to one length. A fit keeps the slices and does not
// change them.
type Beats struct {
	Rate     float64     // Hz
	Pressure [][]float64 // mmHg; beats x samples
	Flow     [][]float64 // mL/s, or cm/s where PerArea
	// OutflowPressure is Pv, mmHg; OutflowMeasured tells that it was measured
	// and is not a default.
	OutflowPressure float64
	OutflowMeasured bool
	Site            data.Site // where the flow was measured
	PerArea         bool      // Flow is a velocity, and the fit per unit area
	BreathPeriod    float64   // s; 0: not known, 4 s
	Systematic      Systematic
}

// Systematic holds 95 % half-widths of the errors that all beats share.
type Systematic struct {
	Flow            float64 // of the scale of flow, relative: 0.25 for 25 %
	PressureScale   float64 // of the scale of pressure, relative
	PressurePivot   float64 // mmHg: the pressure that an error of scale leaves as it is, no width
	PressureOffset  float64 // mmHg
	Delay           float64 // of pressure behind flow, s
	OutflowPressure float64 // mmHg
}

// defaultBreath is the period of a breath, s, where none was found (an
// assumption: 15 a minute).
const defaultBreath = 4

// Settings of a fit. The zero value works.
type Settings struct {
	Replicates int    // 0: 1000
	Seed       uint64 // of everything drawn; 0: 1
}

// WithDefaults is s with every default in its place.
func (s Settings) WithDefaults() Settings {
	if s.Replicates <= 0 {
		s.Replicates = 1000
	}
	if s.Seed == 0 {
		s.Seed = 1
	}
	return s
}

// Count is the number of beats.
func (b Beats) Count() int { return len(b.Pressure) }

// Samples is the length of a beat.
func (b Beats) Samples() int { return len(b.Pressure[0]) }

// Average is the mean of the beats, sample by sample.
func (b Beats) Average() (pressure, flow data.Period) {
	return data.Period{Samples: meanOf(b.Pressure), Rate: b.Rate}, data.Period{Samples: meanOf(b.Flow), Rate: b.Rate}
}

func meanOf(beats [][]float64) []float64 {
	mean := make([]float64, len(beats[0]))
	for _, beat := range beats {
		for j, v := range beat {
			mean[j] += v
		}
	}
	for j := range mean {
		mean[j] /= float64(len(beats))
	}
	return mean
}

// shortest is the least number of samples that makes a beat: two harmonics.
const shortest = 4

// check tells what makes beats unfit for a fit.
func (b Beats) check() error {
	if len(b.Pressure) == 0 || len(b.Pressure) != len(b.Flow) {
		return fmt.Errorf("fitting: %d beats of pressure and %d of flow", len(b.Pressure), len(b.Flow))
	}
	if !(b.Rate > 0) || math.IsInf(b.Rate, 0) || !finite(b.OutflowPressure) {
		return fmt.Errorf("fitting: rate %v Hz, outflow pressure %v mmHg", b.Rate, b.OutflowPressure)
	}
	for _, v := range []float64{b.BreathPeriod, b.Systematic.Flow, b.Systematic.PressureScale, b.Systematic.PressureOffset, b.Systematic.Delay, b.Systematic.OutflowPressure, math.Abs(b.Systematic.PressurePivot)} {
		if !finite(v) || v < 0 {
			return fmt.Errorf("fitting: breath period and errors must be 0 or more: %v", v)
		}
	}
	n := len(b.Pressure[0])
	if n < shortest {
		return fmt.Errorf("fitting: beats of %d samples, want at least %d", n, shortest)
	}
	for i := range b.Pressure {
		if len(b.Pressure[i]) != n || len(b.Flow[i]) != n {
			return errors.New("fitting: beats differ in length")
		}
		for j := range n {
			if !finite(b.Pressure[i][j]) || !finite(b.Flow[i][j]) {
				return fmt.Errorf("fitting: sample %d of beat %d is not a number", j, i+1)
			}
		}
	}
	return nil
}

func finite(v float64) bool { return !math.IsNaN(v) && !math.IsInf(v, 0) }
