package support

import (
	"errors"
	"fmt"
	"math"

	"afterbeat/data"
	"afterbeat/data/unit"
	"afterbeat/fitting"
	"afterbeat/tree/heart"
	"afterbeat/tree/pump"
)

// LoadKind names the circuit of a [Windkessel].
type LoadKind string

// The lumped loads that can be coupled; see package fitting for the sketches.
const (
	WK2  LoadKind = "wk2"
	WK3  LoadKind = "wk3"
	WK4S LoadKind = "wk4s" // L in series with Zc
	WK4P LoadKind = "wk4p" // L parallel to Zc
)

// LoadKinds lists them, the simplest first.
func LoadKinds() []LoadKind { return []LoadKind{WK2, WK3, WK4S, WK4P} }

// Symbols are the names of the parameters that a load of that kind has.
func (k LoadKind) Symbols() []string {
	switch k {
	case WK2:
		return []string{"R", "C"}
	case WK3:
		return []string{"R", "C", "Zc"}
	case WK4S, WK4P:
		return []string{"R", "C", "Zc", "L"}
	}
	return nil
}

// Windkessel is a lumped load with its values.
type Windkessel struct {
	Kind LoadKind
	fitting.Values
	OutflowPressure float64 // Pv, mmHg
}

// Check tells why these cannot be the values of a load: an error for a person
// to read.
func (w Windkessel) Check() error { return w.check(0) }

// check is Check with the least outflow pressure that passes. A drawn one may be
// below 0, as the error of a given one says.
func (w Windkessel) check(leastPv float64) error {
	if w.Kind.Symbols() == nil {
		return fmt.Errorf("model %q is none of %v", w.Kind, LoadKinds())
	}
	for _, p := range []struct {
		name  string
		value float64
		ok    bool
		want  string
	}{
		{"R", w.R, w.R > 0, "above 0"},
		{"C", w.C, w.C > 0, "above 0"},
		{"Zc", w.Zc, w.Zc >= 0, "of 0 or more"},
		{"L", w.L, w.L >= 0, "of 0 or more"},
		{"Pv", w.OutflowPressure, w.OutflowPressure >= leastPv, "of 0 or more"},
	} {
		if !p.ok || math.IsInf(p.value, 0) {
			return fmt.Errorf("%s = %v is not a number %s", p.name, p.value, p.want)
		}
	}
	return nil
}

// Coupling is a ventricle, a load and a pump between them.
type Coupling struct {
	Ventricle heart.Ventricle
	// Filling is the line of the filling pressure. A Flow of NaN stands for the
	// mean flow of the same ventricle and load, pump absent, at its Pressure.
	Filling heart.Filling
	Load    Windkessel
	Pump    pump.Pump // not looked at where the speed is 0
	// FillingLag is the time after which filling pressure has gone 63 % of the
	// way to the line, in transients, s; 0: [DefaultFillingLag].
	FillingLag float64
	// Tolerance is the relative error of a step of the integration; 0:
	// [DefaultTolerance].
	Tolerance float64
}

const (
	// DefaultFillingLag is an assumption, s.
	DefaultFillingLag = 5
	// DefaultTolerance leaves results good to about 1e-7.
	DefaultTolerance = 1e-9
)

// Coupled finds the periodic states of a [Coupling]. It keeps what it learnt of
// one to find the next faster, and so is for one goroutine at a time.
type Coupled struct {
	Coupling
	shooter shooter
	// last is the orbit found last, a start for the next.
	last     orbit
	haveLast bool
}

// NewCoupled checks a coupling, and settles the flow of its filling line. Errors
// are for a person to read.
func NewCoupled(c Coupling) (*Coupled, error) {
	if c.FillingLag == 0 {
		c.FillingLag = DefaultFillingLag
	}
	if c.Tolerance == 0 {
		c.Tolerance = DefaultTolerance
	}
	line := c.Filling
	if math.IsNaN(line.Flow) {
		line.Flow = 0
	}
	if err := errors.Join(c.Ventricle.Check(), line.Check(), c.Load.check(math.Inf(-1))); err != nil {
		return nil, firstOf(err)
	}
	if !(c.FillingLag > 0) || math.IsInf(c.FillingLag, 0) {
		return nil, fmt.Errorf("filling_lag_s = %v is not a number above 0", c.FillingLag)
	}
	k := &Coupled{Coupling: c}
	k.shooter = shooter{run: run{circuit: circuitOf(c), tolerance: c.Tolerance}, window: 1}
	if math.IsNaN(c.Filling.Flow) {
		k.Filling.Flow = k.nativeFlow()
	}
	k.shooter.line = k.Filling
	return k, nil
}

// firstOf is the first of joined errors.
func firstOf(err error) error {
	var joined interface{ Unwrap() []error }
	if errors.As(err, &joined) {
		return joined.Unwrap()[0]
	}
	return err
}

// circuitOf brings a coupling into the form that is integrated.
func circuitOf(c Coupling) *circuit {
	w := c.Load
	k := &circuit{
		heart: c.Ventricle, corners: c.Ventricle.Corners(), pump: c.Pump,
		r: w.R, c: w.C, zc: w.Zc, pv: w.OutflowPressure,
	}
	switch {
	case w.Kind == WK2:
		k.zc = 0
	case w.Kind == WK4P && w.Zc > 0 && w.L > 0:
		k.parallel, k.l = true, w.L
	case w.Kind == WK4P: // L or Zc shorts the other
		k.zc = 0
	case w.Kind == WK4S && w.L > 0:
		k.series, k.l = true, w.L
	}
	return k
}

// nativeFlow is the mean flow with the pump absent, at the filling pressure P0.
func (k *Coupled) nativeFlow() float64 {
	k.shooter.line = heart.Filling{Pressure: k.Filling.Pressure}
	k.shooter.drive = drive{}
	o := k.shooter.find(k.guess(), false)
	y := o.start
	k.shooter.fill = o.start[out]
	k.shooter.beat(&y)
	return y[out] / k.Ventricle.Period
}

// guess is a state to start from where nothing is known, after a few beats.
func (k *Coupled) guess() vector {
	s := &k.shooter
	v := k.Ventricle
	z := vector{vol: v.V0 + 120, pc: s.pv + 80, out: k.Filling.Pressure}
	if s.parallel {
		z[qx] = 80 / s.r
	}
	for range 3 {
		y, ok := s.after(&z)
		if !ok {
			break
		}
		y[out] = z[out]
		z = y
	}
	return z
}

// ErrNoPump is that a speed was asked for and there is no pump to run at it.
var ErrNoPump = errors.New("no pump is given to run at a speed")

// checkSpeed tells why a pump cannot run at a speed, 1000/min.
func (k *Coupled) checkSpeed(speed float64) error {
	if !(speed >= 0) || math.IsInf(speed, 0) {
		return fmt.Errorf("speed %v is not a number of 0 or more, in 1000/min", speed)
	}
	if speed == 0 {
		return nil
	}
	if k.Pump == (pump.Pump{}) {
		return ErrNoPump
	}
	return k.Pump.Check()
}

// orbitAt finds the periodic state at a constant speed.
func (k *Coupled) orbitAt(speed float64) (orbit, error) {
	if err := k.checkSpeed(speed); err != nil {
		return orbit{}, err
	}
	s := &k.shooter
	was := s.running
	s.window, s.books = 1, nil
	s.drive = drive{running: speed > 0, speed: speed, fill: k.Filling.Pressure}
	start := k.last.start
	if !k.haveLast || was != s.running {
		start = k.guess()
	}
	if !s.running {
		start[qp] = 0
	}
	o := s.find(start, k.Filling.Slope > 0)
	if !o.settled { // once more, from nothing
		s.known = false
		o = s.find(k.guess(), k.Filling.Slope > 0)
	}
	k.last, k.haveLast = o, o.settled
	return o, nil
}

// At is the periodic state at a speed in 1000/min; 0 is that without a pump, its
// branch closed. An error is a speed or a pump that cannot be. A state that could
// not be found is returned all the same, not Settled.
func (k *Coupled) At(speed float64) (CoupledState, error) {
	o, err := k.orbitAt(speed)
	if err != nil {
		return CoupledState{}, err
	}
	s := &k.shooter
	var b books
	b.begin()
	s.books = &b
	y := o.start
	s.fill = o.start[out]
	held := s.beat(&y)
	s.books = nil
	y[out] = o.start[out]
	o.settled = o.settled && held && gap(&y, &o.start, s.active) < 100*closed
	return k.stateOf(o, speed, &b), nil
}

// Sweep is [Coupled.At] at each of the speeds, in their order.
func (k *Coupled) Sweep(speeds []float64) ([]CoupledState, error) {
	states := make([]CoupledState, len(speeds))
	for i, speed := range speeds {
		var err error
		if states[i], err = k.At(speed); err != nil {
			return nil, err
		}
	}
	return states, nil
}

// CoupledState is the periodic state of ventricle, pump and load at one speed.
type CoupledState struct {
	Speed   float64 // 1000/min; 0: no pump
	Beats   int     // integrated to find it
	Settled bool

	Arterial    Range   // Pao, mmHg
	PumpFlow    Range   // mL/s
	ValveFlow   Range   // through the aortic valve, mL/s
	RootFlow    Range   // Qav + Qp, mL/s
	ValveOpen   float64 // s a beat
	ValveOpened bool
	Volume      Range   // of the ventricle, mL
	Ventricular Range   // Plv, mmHg
	Filling     float64 // Pfill, mmHg
	StrokeWork  float64 // int Plv (Qav + Qp - Qmv) dt, mmHg mL
	EEP, SHE    float64 // mmHg, erg/cm³; the flow is Qav + Qp
	Energy      CoupledEnergy
	Suction     bool // V within 2 mL of V0, or Plv below 0
	Warnings    []data.Warning
}

// PulsePressure is max - min of arterial pressure, mmHg.
func (s *CoupledState) PulsePressure() float64 { return s.Arterial.Swing() }

// Flow is the mean flow into the arteries, mL/s.
func (s *CoupledState) Flow() float64 { return s.PumpFlow.Mean + s.ValveFlow.Mean }

// CoupledEnergy is where the energy of a beat comes from and where it goes,
// mmHg mL.
type CoupledEnergy struct {
	Filling, Ventricle, Pump                float64 // sources
	Mitral, Aortic, Cannula, Zc, R, Outflow float64 // sinks
}

// Balance is (sources - sinks)/sinks; NaN without sinks.
func (e CoupledEnergy) Balance() float64 {
	sinks := e.Mitral + e.Aortic + e.Cannula + e.Zc + e.R + e.Outflow
	if sinks == 0 {
		return math.NaN()
	}
	return (e.Filling + e.Ventricle + e.Pump - sinks) / sinks
}

// stateOf reads a state from the books of its beat.
func (k *Coupled) stateOf(o orbit, speed float64, b *books) CoupledState {
	surplus := b.surplus()
	s := CoupledState{
		Speed: speed, Beats: o.beats, Settled: o.settled,
		Arterial: b.of(sigPao), PumpFlow: b.of(sigPump), ValveFlow: b.of(sigValve), RootFlow: b.of(sigRoot),
		ValveOpen: b.open, ValveOpened: b.opened,
		Volume: b.of(sigVolume), Ventricular: b.of(sigPlv), Filling: o.start[out],
		StrokeWork: b.power[powVentricle],
		EEP:        b.of(sigPao).Mean + surplus, SHE: unit.DynPerMmHg * surplus,
		Energy: CoupledEnergy{
			Filling: b.power[powFilling], Ventricle: b.power[powVentricle], Pump: b.power[powHead],
			Mitral: b.power[powMitral], Aortic: b.power[powAortic], Cannula: b.power[powCannula],
			Zc: b.power[powZc], R: b.power[powR], Outflow: b.power[powOutflow],
		},
	}
	s.Suction = k.suction(&s)
	s.Warnings = k.warnings(&s)
	return s
}
