package fault

import (
	"fmt"
	"math"

	"afterbeat/data"
	"afterbeat/data/unit"
)

const (
	leastZeros   = 3   // samples, or held values
	leastSilent  = 3   // runs of zeros
	floorTimes   = 2.5 // the step inside, that the step from zero is at least
	floorOfPulse = 0.02
)

// wallFiltered finds a velocity that a wall filter sets to zero below some speed: it
// comes out of zero, and goes into it, by a step that is far larger than those next to
// it. k is the number of samples in a held value.
func (t Trace) wallFiltered(s scale, k float64) []Finding {
	if t.Quantity != unit.Velocity {
		return nil
	}
	x, hold := t.Values, max(1, int(math.Round(k)))
	var floors, ratios []float64
	f := Finding{Code: data.CodeWallFilter}
	edge := func(outside, inside int) {
		if outside < 0 || inside < 0 || outside >= len(x) || inside >= len(x) || math.IsNaN(x[outside]) || math.IsNaN(x[inside]) {
			return
		}
		floor := math.Abs(x[outside])
		floors = append(floors, floor)
		ratios = append(ratios, floor/max(math.Abs(x[inside]-x[outside]), s.step, 1e-9*s.pulse))
	}
	for i := 0; i < len(x); i++ {
		from := i
		for i < len(x) && x[i] == 0 {
			i++
		}
		if i-from < leastZeros*hold {
			continue
		}
		f.Runs = append(f.Runs, Run{from, i})
		edge(from-1, from-1-hold)
		edge(i, i+hold)
	}
	floor := median(floors)
	if len(f.Runs) < leastSilent || !(median(ratios) >= floorTimes) || floor < floorOfPulse*s.pulse {
		return nil
	}
	f.Number = floor
	f.Text = fmt.Sprintf("velocities under about %.3g %s are cut off by a wall filter (%.2g %% of the samples are 0): the diastolic velocity lies between 0 and that, so that a pulsatility index from it is an upper bound, the mean a lower one", floor, t.Unit, 100*float64(f.Samples())/float64(len(x)))
	f.Cure = "record with a lower wall filter"
	return []Finding{f}
}
