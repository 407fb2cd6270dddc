package support

import (
	"errors"
	"fmt"
	"math"

	"afterbeat/tree/heart"
	"afterbeat/tree/pump"
)

// Coupling is a ventricle, a load and a pump between them.
type Coupling struct {
	Ventricle heart.Ventricle
	// Filling is the line of the filling pressure. A Flow of NaN stands for the
	// mean flow of the same ventricle and load, pump absent, at its Pressure. It
	// is not looked at where the Slope is 0.
	Filling heart.Filling
	Load    Windkessel
	Pump    pump.Pump // not looked at where the speed is 0
	// Inlet is where the pump draws from: the ventricle where it is empty.
	Inlet Inlet
	// Match is what is made equal to a given value wherever the pump runs.
	Match Match
	// FillingLag is the time after which filling pressure has gone 63 % of the
	// way to the line, in transients, s; 0: [DefaultFillingLag].
	FillingLag float64
	// Tolerance is the relative error of a step of the integration; 0:
	// [DefaultTolerance].
	Tolerance float64
}

// Inlet is where the pump draws from.
type Inlet string

// The inlets: the ventricle, or the left atrium, which is at the filling pressure.
const (
	InletVentricle Inlet = "ventricle"
	InletAtrium    Inlet = "atrium"
)

// String names the inlet.
func (i Inlet) String() string {
	if i == "" {
		i = InletVentricle
	}
	return string(i)
}

// Known tells an inlet that there is; the empty one is the ventricle.
func (i Inlet) Known() bool { return i == "" || i == InletVentricle || i == InletAtrium }

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
	// lineKnown tells that the flow of the filling line is known.
	lineKnown bool
	trace     *Trace // of a modulation; nil: nobody asks
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
	if !c.Inlet.Known() {
		return nil, fmt.Errorf("inlet %q is none of %s, %s", c.Inlet, InletVentricle, InletAtrium)
	}
	if err := c.Match.check(); err != nil {
		return nil, err
	}
	k := &Coupled{Coupling: c}
	k.shooter = shooter{run: run{circuit: circuitOf(c), tolerance: c.Tolerance}, window: 1}
	k.lineKnown = true
	if math.IsNaN(c.Filling.Flow) {
		k.Filling.Flow = 0
		if c.Filling.Slope > 0 || c.Match.Pressure > 0 {
			k.Filling.Flow, k.lineKnown = k.nativeFlow()
		}
	}
	k.shooter.line = onLine{k.Filling, c.Load.R}
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

// instantly is a time constant of an L that is taken as none, s: what it would
// change is below 0.005 mmHg.
const instantly = 1e-5

// circuitOf brings a coupling into the form that is integrated.
func circuitOf(c Coupling) *circuit {
	w := c.Load
	k := &circuit{
		heart: c.Ventricle, corners: c.Ventricle.Corners(), pump: c.Pump, atrial: c.Inlet == InletAtrium,
		r: w.R, c: w.C, zc: w.Zc, pv: w.OutflowPressure,
	}
	switch {
	case w.Kind == WK2:
		k.zc = 0
	case w.Kind == WK4P && w.Zc > 0 && w.L > instantly*w.Zc:
		k.parallel, k.l = true, w.L
	case w.Kind == WK4P: // L or Zc shorts the other
		k.zc = 0
	case w.Kind == WK4S && w.L > instantly*(w.Zc+c.Ventricle.Rav):
		k.series, k.l = true, w.L
	}
	return k
}

// nativeFlow is the mean flow with the pump absent, at the filling pressure P0.
func (k *Coupled) nativeFlow() (flow float64, known bool) {
	s := &k.shooter
	s.line = onLine{heart.Filling{Pressure: k.Filling.Pressure}, k.Load.R}
	o := s.find(k.guess(), false)
	y := o.start
	s.impose(&o.start)
	held := s.beat(&y)
	return y[out] / k.Ventricle.Period, held && o.settled
}

// guess is a state to start from where nothing is known, after a few beats.
func (k *Coupled) guess() vector {
	s := &k.shooter
	v := k.Ventricle
	z := vector{vol: v.V0 + 120, pc: s.pv + 80, out: s.line.Guess()}
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
	s.window, s.books, s.lost = 1, nil, false
	s.drive = drive{running: speed > 0, speed: speed, fill: k.Filling.Pressure}
	onLine := k.aim(speed)
	start := k.last.start
	if !k.haveLast || was != s.running {
		start = k.guess()
	}
	if !s.running {
		start[qp] = 0
	}
	o := s.find(start, onLine)
	if !o.settled && !s.lost { // once more, from nothing
		s.known = false
		o = s.find(k.guess(), onLine)
	}
	o.settled = o.settled && k.lineKnown
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
	var b books
	if k.shooter.lost {
		b.void()
	} else {
		y := o.start
		k.shooter.impose(&o.start)
		held := k.shooter.booked(&y, &b)
		o.settled = o.settled && held && k.shooter.cameBack(&y, &o.start)
	}
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
