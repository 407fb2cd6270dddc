package study

import (
	"cmp"
	"context"
	"fmt"
	"math"
	"math/rand/v2"
	"runtime"
	"slices"
	"sync"
	"sync/atomic"

	"afterbeat/data"
	"afterbeat/fitting"
	"afterbeat/tree/heart"
	"afterbeat/tree/support"
)

const (
	// forecastDraws is how many replicates of a fit, each with a ventricle of its
	// own, go through the coupled state for either kind of interval.
	forecastDraws = 100
	// forecastTolerance leaves the states of the draws good to about 1e-5, far
	// below their scatter.
	forecastTolerance = 1e-7
	// mostTries is how many points of the free ranges are tried for one draw.
	mostTries = 30
)

// patient is what a fit and its flow say of one patient, or of a replicate.
type patient struct {
	load         support.Windkessel
	period       float64 // s
	strokeVolume float64 // net, mL
	ejection     float64 // s
	relaxation   float64 // Tr/Tes; 0: one half
	own          ownVentricle
}

// patientOf reads a patient off a flow, mL/s, and the load fitted to it.
func patientOf(m fitting.Model, v fitting.Values, pv float64, flow data.Period) patient {
	return patient{
		load:   support.Windkessel{Kind: support.LoadKind(m.Name), Values: v, OutflowPressure: pv},
		period: flow.Duration(), strokeVolume: flow.Mean() * flow.Duration(), ejection: ejectionTime(flow),
	}
}

// ventricle sets up a ventricle for the patient at a point of the free ranges.
func (p patient) ventricle(c choice, slope float64) support.Coupling {
	k := support.Coupling{
		Ventricle: heart.Ventricle{Period: p.period, V0: c.v0, Rmv: c.rmv, Rav: c.rav},
		Filling:   heart.Filling{Pressure: c.pfill, Slope: slope},
		Load:      p.load,
	}
	p.own.into(&k.Ventricle)
	return k
}

// setUp is a coupling whose native state is met; pump and tolerance are to come.
func (p patient) setUp(c choice, slope, tolerance float64) (support.Coupling, error) {
	k := p.ventricle(c, slope)
	k.Tolerance = tolerance
	if p.own.whole {
		return asGiven(k)
	}
	return support.SetUp(k, p.asked(c))
}

// asGiven lays the filling line of a ventricle that is given through its native
// state.
func asGiven(k support.Coupling) (support.Coupling, error) {
	at := k
	at.Filling.Slope = 0
	c, err := support.NewCoupled(at)
	if err != nil {
		return k, fmt.Errorf("%w: %w", support.ErrNotMet, err)
	}
	s, err := c.At(0)
	if err != nil || !s.Settled || !s.ValveOpened {
		return k, fmt.Errorf("%w: the ventricle that is given does not eject into the fitted load", support.ErrNotMet)
	}
	k.Filling.Flow = s.Flow()
	return k, nil
}

// asked is what the ventricle of the patient does natively.
func (p patient) asked(c choice) support.Ejection {
	return support.Ejection{StrokeVolume: p.strokeVolume, Time: p.ejection, EndDiastolic: c.edv, Relaxation: p.relaxation}
}

// draw is one answer that data and ranges allow.
type draw struct {
	coupling support.Coupling
	choice   choice
	met      bool
}

// drawing is how draws are made.
type drawing struct {
	forecast   *Forecast
	replicates fitting.Replicates
	model      fitting.Model
	seed       uint64
	nominal    patient
	choice     choice
	slopeError float64 // relative 95 % half-width
	chosen     []int   // of the total replicates: evenly spread over the scales of flow
}

// choose picks count of the total replicates, evenly spread over what matters
// most of them, the error of the flow.
func (d *drawing) choose(count int) {
	all := d.replicates.Total
	ranks := make([]int, len(all))
	for i := range ranks {
		ranks[i] = i
	}
	slices.SortStableFunc(ranks, func(a, b int) int { return cmp.Compare(all[a].FlowScale, all[b].FlowScale) })
	for i := range count {
		d.chosen = append(d.chosen, ranks[(2*i+1)*len(all)/(2*count)])
	}
}

// random is draw i of random error alone: the ventricle at the nominal point.
func (d *drawing) random(i int) draw {
	p := d.patient(d.replicates.Random[i])
	k, err := p.setUp(d.choice, p.own.slope, forecastTolerance)
	return draw{k, d.choice, err == nil}
}

// total is draw i of all errors: ranges and filling slope as well. Its chance
// depends on i and the seed alone, not on who draws it or when.
func (d *drawing) total(i int) draw {
	rng := newRand(d.seed, 1000+uint64(i))
	p := d.patient(d.replicates.Total[d.chosen[i]])
	slope := max(0, p.own.slope*(1+d.slopeError/z95*rng.NormFloat64()))
	ranges, err := freeOf(d.forecast.caseOf(), p.strokeVolume)
	if err != nil {
		return draw{}
	}
	for range mostTries {
		c := ranges.draw(rng.Float64)
		if k, err := p.setUp(c, slope, forecastTolerance); err == nil {
			return draw{k, c, true}
		}
	}
	return draw{}
}

// z95 is the half-width of the 95 % interval of a normal distribution, in
// standard deviations.
const z95 = 1.959963984540054

func (d *drawing) patient(r fitting.Replicate) patient {
	p := patientOf(d.model, r.Values, r.OutflowPressure, r.Flow())
	p.relaxation, p.own = d.nominal.relaxation, d.nominal.own
	if math.IsNaN(p.ejection) {
		p.ejection = d.nominal.ejection
	}
	return p
}

// The numbers of one state of a draw.
const (
	drawnMean = iota
	drawnOutput
	drawnPulse
	drawnSHE
	drawnEEP
	drawnFilling
	drawnOpen
	drawnSwing
	drawnRootSwing
	drawnSteady
	drawnPulsatile
	drawnResistance // R, mmHg s/mL
	drawnBeatPulse  // mean over the beats of max - min, mmHg
	drawnNumbers
)

type drawn [drawnNumbers]float64

// drawnOf reads a state; all is NaN of one that has no numbers.
func drawnOf(s *support.CoupledState) drawn {
	if missing(s) != "" {
		var none drawn
		for i := range none {
			none[i] = math.NaN()
		}
		return none
	}
	return drawn{
		drawnResistance: s.Resistance, drawnBeatPulse: s.PulsePressure(),
		drawnMean: s.Arterial.Mean, drawnOutput: s.Flow(), drawnPulse: s.PulsePressure(),
		drawnSHE: s.SHE, drawnEEP: s.EEP, drawnFilling: s.Filling, drawnOpen: s.ValveOpen, drawnSwing: s.PumpFlow.Swing(),
		drawnRootSwing: s.RootFlow.Swing(), drawnSteady: s.Arterial.Mean * s.Flow(), drawnPulsatile: (s.EEP - s.Arterial.Mean) * s.Flow(),
	}
}

// row is a draw carried through all states.
type row struct {
	ventricle heart.Ventricle
	filling   heart.Filling
	edv       float64
	states    []drawn // native, then one a speed
	opened    []bool
	limit     float64 // 1000/min
	modulated drawn
	steady    drawn // at the mean speed of the modulation
	ok        bool
}

// rows carries draws through the states, on all cores. The rows do not depend on
// how many there are.
func (d *drawing) rows(ctx context.Context, count int, take func(int) draw) ([]row, error) {
	all := make([]row, count)
	var next atomic.Int64
	var workers sync.WaitGroup
	for range min(runtime.GOMAXPROCS(0), count) {
		workers.Go(func() {
			for ctx.Err() == nil {
				i := int(next.Add(1)) - 1
				if i >= count {
					return
				}
				if one := take(i); one.met {
					all[i] = d.row(one)
				}
			}
		})
	}
	workers.Wait()
	return slices.DeleteFunc(all, func(r row) bool { return !r.ok }), ctx.Err()
}

// row carries one draw through the states.
func (d *drawing) row(one draw) row {
	f := d.forecast
	r := row{ventricle: one.coupling.Ventricle, filling: one.coupling.Filling, edv: one.choice.edv, limit: math.NaN()}
	k, err := support.NewCoupled(f.supported(one.coupling))
	if err != nil {
		return r
	}
	speeds := append([]float64{0}, f.speeds()...)
	states, err := k.Sweep(speeds)
	if err != nil {
		return r
	}
	for i := range states {
		if !states[i].Settled && (i == 0 || f.match.what == MatchNone) {
			return r
		}
		r.states = append(r.states, drawnOf(&states[i]))
		r.opened = append(r.opened, states[i].ValveOpened)
	}
	if f.own.whole {
		r.edv = states[0].Volume.Max
	}
	if f.modulation != nil {
		r.modulated, r.steady = f.modulation.drawn(k)
	}
	r.limit = min(valveLimit(k, states, f.farthest()), f.farthest())
	r.ok = true
	return r
}

func newRand(seed, stream uint64) *rand.Rand { return rand.New(rand.NewPCG(seed, stream)) }
