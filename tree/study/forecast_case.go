package study

import (
	"fmt"
	"math"
	"slices"

	"afterbeat/data"
	"afterbeat/data/casefile"
	"afterbeat/tree/pump"
)

// speedSteps is the number of steps in the range of a pump where the case names
// no speeds.
const speedSteps = 8

// farBeyond is the highest speed over the upper bound of a pump's range at which
// anything is computed.
const farBeyond = 2

// speedsOf are the speeds that the case asks for, 1000/min, rising and above 0;
// else even steps over the range of the pump. Speed 0 is the native state, which
// is always there.
func speedsOf(c casefile.Case, p pump.Set) ([]float64, error) {
	if len(c.Speed) == 0 {
		all := make([]float64, speedSteps+1)
		for i := range all {
			all[i] = p.Low + (p.High-p.Low)*float64(i)/speedSteps
		}
		return all, nil
	}
	for _, n := range c.Speed {
		if !(n >= 0 && n <= farBeyond*p.High) {
			return nil, &ChoiceError{
				Key: "speed", What: fmt.Sprintf("%v is not between 0 and %g", n, farBeyond*p.High),
				Hint: fmt.Sprintf("in 1000/min; %s makes sense from %g to %g, for instance --speed %g", p.Name, p.Low, p.High, (p.Low+p.High)/2),
			}
		}
	}
	all := slices.DeleteFunc(slices.Clone(c.Speed), func(n float64) bool { return n == 0 })
	slices.Sort(all)
	if all = slices.Compact(all); len(all) == 0 {
		return nil, &ChoiceError{Key: "speed", What: "0 alone is the native state", Hint: fmt.Sprintf("add a speed in 1000/min, for instance --speed %g", (p.Low+p.High)/2)}
	}
	return all, nil
}

// middleOf is the index of the speed that stands for all: the one nearest to the
// middle of those asked for.
func middleOf(speeds []float64) int {
	middle, best := (speeds[0]+speeds[len(speeds)-1])/2, 0
	for i, n := range speeds {
		if math.Abs(n-middle) < math.Abs(speeds[best]-middle) {
			best = i
		}
	}
	return best
}

// quoted is the index of the speed that the note quotes, and the speeds with it
// among them: that of the case, else the middle one.
func quoted(c casefile.Case, speeds []float64) (int, []float64) {
	if c.Quote == nil {
		return middleOf(speeds), speeds
	}
	if !slices.Contains(speeds, *c.Quote) {
		speeds = append(slices.Clone(speeds), *c.Quote)
		slices.Sort(speeds)
	}
	return slices.Index(speeds, *c.Quote), speeds
}

// freeRange is a range within which a parameter is drawn, evenly.
type freeRange struct{ low, high float64 }

func (r freeRange) middle() float64 { return (r.low + r.high) / 2 }

// at is the place of a share of the range.
func (r freeRange) at(share float64) float64 { return r.low + share*(r.high-r.low) }

// free are the ranges of what arterial traces do not fix of a ventricle.
type free struct {
	pfill, v0, edv, rmv, rav freeRange
	volumeOrigin             data.Origin // of the end-diastolic volume
	volumeWhy                string
	given                    map[string]bool // symbols that the case gives
}

// 95 % half-widths of a given end-diastolic volume (relative) and ejection
// fraction (absolute): assumptions, of the size that repeated echocardiography
// differs by (common practice).
const (
	volumeError   = 0.15
	fractionError = 0.05
)

// freeOf are the ranges for a case with that stroke volume, mL: assumptions,
// unless the case has an end-diastolic volume or an ejection fraction.
func freeOf(c casefile.Case, strokeVolume float64) (free, error) {
	f := free{
		pfill: freeRange{8, 28}, v0: freeRange{0, 30}, edv: freeRange{110, 300}, rmv: freeRange{0.005, 0.03}, rav: freeRange{0.002, 0.02},
		volumeOrigin: data.Assumed, volumeWhy: "not fixed by the traces; drawn evenly",
	}
	if ef := c.EF; ef != nil {
		if !(*ef > fractionError && *ef < 1-fractionError) {
			return f, &ChoiceError{Key: "ef", What: fmt.Sprintf("%v is not between %g and %g", *ef, fractionError, 1-fractionError), Hint: "a fraction, for instance --ef 0.25"}
		}
		f.edv = freeRange{strokeVolume / (*ef + fractionError), strokeVolume / (*ef - fractionError)}
		f.volumeOrigin, f.volumeWhy = data.Measured, fmt.Sprintf("from the ejection fraction of %.3g, +-%.2g (assumed)", *ef, fractionError)
	}
	if edv := c.EDVML; edv != nil {
		if !(*edv > strokeVolume && *edv <= 1000) {
			return f, &ChoiceError{Key: "edv_ml", What: fmt.Sprintf("%v mL is not between the stroke volume of %.3g mL and 1000 mL", *edv, strokeVolume), Hint: "the end-diastolic volume of the left ventricle, for instance --edv-ml 220"}
		}
		f.edv = freeRange{*edv * (1 - volumeError), *edv * (1 + volumeError)}
		f.volumeOrigin, f.volumeWhy = data.Measured, fmt.Sprintf("given, +-%.0f %% (assumed)", 100*volumeError)
	}
	return f, f.take(c)
}

// take narrows the ranges to what the case gives of the ventricle.
func (f *free) take(c casefile.Case) error {
	own, err := numbersOf("ventricle", c.Ventricle)
	if err != nil {
		return err
	}
	f.given = map[string]bool{}
	for symbol, r := range map[string]*freeRange{"V0": &f.v0, "Pfill": &f.pfill, "Rmv": &f.rmv, "Rav": &f.rav} {
		if v, ok := own[symbol]; ok {
			*r, f.given[symbol] = freeRange{v, v}, true
		}
	}
	return nil
}

// choice is one point of the ranges.
type choice struct{ pfill, v0, edv, rmv, rav float64 }

func (f free) nominal() choice {
	return choice{f.pfill.middle(), f.v0.middle(), f.edv.middle(), f.rmv.middle(), f.rav.middle()}
}

// draw takes a point; uniform gives numbers from 0 to 1.
func (f free) draw(uniform func() float64) choice {
	return choice{f.pfill.at(uniform()), f.v0.at(uniform()), f.edv.at(uniform()), f.rmv.at(uniform()), f.rav.at(uniform())}
}
