package study

import (
	"cmp"
	"errors"
	"fmt"
	"math"
	"slices"

	"afterbeat/data/casefile"
	"afterbeat/fitting"
	"afterbeat/tree/support"
)

// forecastMove is one assumption moved: how natively, and what else on support.
type forecastMove struct {
	assumption, change string
	patient            patient
	choice             choice
	slope              float64
	beyond             bool
	// supported changes what is held only natively; nil: nothing.
	supported func(*support.Coupling)
}

// sensitivities moves one assumption at a time, sets the ventricle up again, and
// asks for the retained pulse at the middle speed; the largest effect first. A
// move under which the native state is not met is left out.
func (f *Forecast) sensitivities(d *drawing, nominal support.Coupling) ([]ForecastSensitivity, error) {
	retained := f.Speeds[f.Middle].RetainedPulse.Value
	var out []ForecastSensitivity
	for _, m := range f.forecastMoves(d, nominal) {
		native, err := m.patient.setUp(m.choice, m.slope, forecastTolerance)
		if errors.Is(err, support.ErrNotMet) {
			continue
		}
		if err != nil {
			return nil, err
		}
		pulse, left, err := f.movedPulse(native, m.supported)
		if err != nil {
			return nil, err
		}
		if math.IsNaN(left) { // what is matched cannot be met
			continue
		}
		out = append(out, ForecastSensitivity{Assumption: m.assumption, Change: m.change, RetainedPulse: left, Difference: left - retained, PulsePressure: pulse, Beyond: m.beyond})
	}
	slices.SortStableFunc(out, func(a, b ForecastSensitivity) int {
		return cmp.Compare(math.Abs(b.Difference), math.Abs(a.Difference))
	})
	return out, nil
}

// movedPulse is the pulse pressure at the middle speed, mmHg, and what it is of
// the native one.
func (f *Forecast) movedPulse(native support.Coupling, change func(*support.Coupling)) (pulse, retained float64, err error) {
	native = f.supported(native)
	at := func(c support.Coupling, speed float64) float64 {
		k, e := support.NewCoupled(c)
		if e != nil {
			err = errors.Join(err, e)
			return math.NaN()
		}
		s, e := k.At(speed)
		err = errors.Join(err, e)
		return drawnOf(&s)[drawnPulse]
	}
	before := at(native, 0)
	if change != nil {
		change(&native)
	}
	pulse = at(native, f.Speeds[f.Middle].Speed)
	return pulse, pulse / before, err
}

// forecastMoves lists the assumptions moved.
func (f *Forecast) forecastMoves(d *drawing, nominal support.Coupling) []forecastMove {
	base := forecastMove{patient: d.nominal, choice: d.choice, slope: f.own.slope}
	var all []forecastMove
	move := func(assumption, change string, apply func(*forecastMove)) {
		m := base
		m.assumption, m.change = assumption, change
		apply(&m)
		all = append(all, m)
	}
	for _, s := range f.Comparison.Fit.Sensitivity {
		move(s.Assumption, s.Change, func(m *forecastMove) { m.patient = refitted(d.nominal, s) })
	}
	if f.Comparison.Fit.Beats.FlowInfo.Conversion != nil {
		for _, share := range []float64{-0.05, 0.05} {
			move("diameter", fmt.Sprintf("%+.0f %%", 100*share), func(m *forecastMove) { m.patient = flowTimes(d.nominal, square(1+share)) })
		}
	}
	for _, share := range []float64{-0.2, 0.2} {
		change := fmt.Sprintf("%+.0f %% on support", 100*share)
		move("contractility, Emax", change, func(m *forecastMove) {
			m.supported = func(k *support.Coupling) { k.Ventricle.Emax = max(k.Ventricle.Emin, k.Ventricle.Emax*(1+share)) }
		})
		move("resistance R", change, func(m *forecastMove) {
			m.supported = func(k *support.Coupling) { k.Load.R *= 1 + share }
		})
	}
	for _, share := range []float64{-d.slopeError, d.slopeError} {
		move("filling slope", fmt.Sprintf("%+.0f %%", 100*share), func(m *forecastMove) { m.slope = max(0, m.slope*(1+share)) })
	}
	move("filling slope", "0, constant filling", func(m *forecastMove) { m.slope, m.beyond = 0, true })
	f.movesOfRanges(d, move)
	if !f.own.whole {
		for _, relaxation := range []float64{support.QuickestRelaxation, support.SlowestRelaxation} {
			move("relaxation, Tr", fmt.Sprintf("%.2g Tes", relaxation), func(m *forecastMove) { m.patient.relaxation = relaxation })
		}
	}
	mean := f.Speeds[f.Middle].Arterial.Mean
	move("compliance", fmt.Sprintf("C at %.0f mmHg", mean), func(m *forecastMove) {
		m.supported = func(k *support.Coupling) {
			k.Load.C *= complianceRatio(f.Native.Arterial.Mean, mean, ageOf(f.caseOf()))
		}
	})
	return all
}

// movesOfRanges moves what arterial traces do not fix to the ends of its range.
func (f *Forecast) movesOfRanges(d *drawing, move func(assumption, change string, apply func(*forecastMove))) {
	ranges, err := freeOf(f.caseOf(), d.nominal.strokeVolume)
	if err != nil {
		return
	}
	for _, one := range []struct {
		name, unit string
		r          freeRange
		of         func(*choice) *float64
	}{
		{"end-diastolic volume", "mL", ranges.edv, func(c *choice) *float64 { return &c.edv }},
		{"native filling pressure", "mmHg", ranges.pfill, func(c *choice) *float64 { return &c.pfill }},
		{"V0", "mL", ranges.v0, func(c *choice) *float64 { return &c.v0 }},
		{"mitral valve, Rmv", "mmHg s/mL", ranges.rmv, func(c *choice) *float64 { return &c.rmv }},
		{"aortic valve, Rav", "mmHg s/mL", ranges.rav, func(c *choice) *float64 { return &c.rav }},
	} {
		if one.r.low == one.r.high || f.own.whole && one.name == "end-diastolic volume" { // given, or it follows
			continue
		}
		for _, end := range []float64{one.r.low, one.r.high} {
			move(one.name, fmt.Sprintf("%.3g %s", end, one.unit), func(m *forecastMove) { *one.of(&m.choice) = end })
		}
	}
}

// refitted is the patient with what a sensitivity of the fit made of the load, and
// with the flow or the outflow pressure that belongs to it.
func refitted(p patient, s Sensitivity) patient {
	p.load.Values = s.Values
	switch s.Assumption {
	case "outflow-pressure":
		p.load.OutflowPressure += s.By
	case "output":
		p.strokeVolume *= 1 + s.By
	}
	return p
}

// flowTimes is the patient whose flow was measured by a factor too low.
func flowTimes(p patient, factor float64) patient {
	v := p.load.Values
	p.load.Values = fitting.Values{R: v.R / factor, C: v.C * factor, Zc: v.Zc / factor, L: v.L / factor}
	p.strokeVolume *= factor
	return p
}

func square(x float64) float64 { return x * x }

// years is an age, and the sex, with which compliance falls with pressure.
type years struct {
	age     float64
	female  bool
	assumed bool // no age is given
}

// assumedAge is taken where the case has none: an assumption.
const assumedAge = 60

// ageOf is what the case says; a man of assumedAge where it says nothing. The
// regression is of 20 to 90 years.
func ageOf(c casefile.Case) years {
	y := years{age: assumedAge, female: c.Sex == "female", assumed: c.Age == nil}
	if c.Age != nil {
		y.age = min(max(*c.Age, 20), 90)
	}
	return y
}

func (y years) words() string {
	who := "a man"
	if y.female {
		who = "a woman"
	}
	text := fmt.Sprintf("%s of %g years", who, y.age)
	if y.assumed {
		text += " (assumed: --age, --sex)"
	}
	return text
}

// complianceRatio is C at a mean pressure over C at another, mmHg, by the
// pressure-area relation of the aorta (Langewouters 1984; with p0 and p1 of
// Wesseling 1993, from memory; g is 1 for women, 0 for men):
//
//	C(P)/C(Pref) = (1 + ((Pref-p0)/p1)²)/(1 + ((P-p0)/p1)²),  p0 = 76 - 4 g - 0.89 a,  p1 = 57 - 0.44 a
//
// A regression of the aorta, applied to the whole tree: an upper bound.
func complianceRatio(from, to float64, y years) float64 {
	p0, p1 := 76-0.89*y.age, 57-0.44*y.age
	if y.female {
		p0 -= 4
	}
	return (1 + square((from-p0)/p1)) / (1 + square((to-p0)/p1))
}
