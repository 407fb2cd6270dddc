package support

import (
	"errors"
	"fmt"
	"math"

	"afterbeat/data/unit"
)

// Modulated is a state under a speed that changes over time, over a window of
// whole beats.
type Modulated struct {
	Window                float64 // s
	Arterial              Range   // Pao, mmHg
	PumpFlow              Range   // mL/s
	ValveFlow             Range   // mL/s
	RootFlow              Range   // Qav + Qp, mL/s
	PulsePressure         float64 // max - min over the window, mmHg
	PulsePressureBeatMean float64 // mean over the beats of their max - min, mmHg
	EEP, SHE              float64 // mmHg, erg/cm³
	Filling               float64 // mean of Pfill, mmHg
	Resistance            float64 // R, mmHg s/mL
	ValveOpened           bool    // in any beat of the window
	ValveOpen             float64 // mean over the beats, s
	Missed                bool    // what was to be matched is not
	// Settled tells that the state came back after the locked beats, or that the
	// measures of a free window were stable.
	Settled bool
}

// Modulate runs the pump at a changing speed, which starts with a beat. locked
// is the number of beats that one period of the modulation takes, and the state
// comes back after them: the period of m must be that long to 1 %, and is
// stretched to it. With locked = 0 nothing is locked, and the window is doubled
// until the measures change by less than 1 %.
func (k *Coupled) Modulate(m Modulation, locked int) (Modulated, error) {
	if err := k.checkModulation(m); err != nil {
		return Modulated{}, err
	}
	if locked == 0 {
		if !k.Match.None() {
			return Modulated{}, errTransient
		}
		return k.free(&m)
	}
	want := float64(locked) * k.Ventricle.Period
	if locked < 0 || math.Abs(m.Period()/want-1) > 0.01 {
		return Modulated{}, fmt.Errorf("the modulation takes %.4g s and %d beats take %.4g s: they cannot be locked", m.Period(), locked, want)
	}
	m.Step = want / float64(len(m.Speeds))
	return k.locked(&m, locked)
}

func (k *Coupled) checkModulation(m Modulation) error {
	if len(m.Speeds) == 0 || !(m.Step > 0) || math.IsInf(m.Step, 0) {
		return errors.New("a modulation needs rows in even steps of time")
	}
	for _, n := range m.Speeds {
		if err := k.checkSpeed(n); err != nil {
			return err
		}
		if n == 0 {
			return errors.New("a speed of 0 within a modulation: the branch of an absent pump is closed, that of a stopped one is not")
		}
	}
	return nil
}

// modulating finds the orbit at the mean speed, to start from, and sets the
// modulation.
func (k *Coupled) modulating(m *Modulation) (orbit, error) {
	o, err := k.orbitAt(m.Mean())
	k.haveLast = false // what follows is another map
	k.shooter.known = false
	k.shooter.modulation = m
	return o, err
}

// locked finds the state that comes back after a number of beats.
func (k *Coupled) locked(m *Modulation, beats int) (Modulated, error) {
	o, err := k.modulating(m)
	if err != nil {
		return Modulated{}, err
	}
	s := &k.shooter
	s.window = beats
	o = s.find(o.start, k.aim(m.Mean()))
	s.known = false
	var w window
	y := o.start
	s.impose(&o.start)
	for i := range beats {
		s.since = float64(i) * k.Ventricle.Period
		b := books{trace: k.trace}
		if !s.booked(&y, &b) {
			return w.measures(false), nil
		}
		w.add(&b)
	}
	r := w.measures(o.settled && s.cameBack(&y, &o.start))
	r.Missed, r.Resistance = o.missed, s.r
	return r, nil
}

// ModulateTraced is [Coupled.Modulate], locked, with the signals of the window in
// that many samples a beat. It panics on none.
func (k *Coupled) ModulateTraced(m Modulation, locked, samples int) (Modulated, Trace, error) {
	if samples < 1 || locked < 1 {
		panic("support: a trace needs samples, and a modulation that is locked")
	}
	k.trace = newTrace(samples, locked, k.Ventricle.Period)
	r, err := k.Modulate(m, locked)
	t := *k.trace
	k.trace = nil
	return r, t, err
}

// The shortest and the longest window of a free modulation, in beats, and how
// near its measures must be to those of its first half, relative.
const (
	shortestWindow, longestWindow = 32, 4096
	stable                        = 0.01
)

// free follows a modulation that is locked to nothing: until the start is
// forgotten, and then over a window that is doubled until it is long enough.
func (k *Coupled) free(m *Modulation) (Modulated, error) {
	o, err := k.modulating(m)
	if err != nil {
		return Modulated{}, err
	}
	s := &k.shooter
	y, fill := o.start, o.start[out]
	s.fill = fill
	before := y
	s.beat(&before)
	flow := before[out] / k.Ventricle.Period
	beat := 0
	follow := func(beats int, w *window) bool {
		for range beats {
			s.since = math.Mod(float64(beat)*k.Ventricle.Period, m.Period())
			beat++
			b, ok := k.lagged(&y, &fill, &flow)
			if !ok {
				return false
			}
			w.add(b)
		}
		return true
	}
	var w window
	if !follow(k.forgotten(), &w) {
		return w.measures(false), nil
	}
	w = window{}
	beats := max(shortestWindow, int(math.Ceil(2*m.Period()/k.Ventricle.Period)))
	if !follow(beats, &w) {
		return w.measures(false), nil
	}
	for last := w.measures(true); w.beats < longestWindow; {
		if !follow(w.beats, &w) {
			break
		}
		now := w.measures(true)
		if now.near(&last) {
			return now, nil
		}
		last = now
	}
	return w.measures(false), nil
}

// forgotten is the number of beats after which little is left of how the state
// began: ten times the slowest time constant.
func (k *Coupled) forgotten() int {
	slow := k.Load.R * k.Load.C
	if k.Filling.Slope > 0 {
		slow = max(slow, k.FillingLag)
	}
	return min(longestWindow, int(math.Ceil(10*slow/k.Ventricle.Period)))
}

// window is the books of several beats.
type window struct {
	all   books
	beats int
	pulse float64 // sum of the pulse pressures of the beats, mmHg
	open  float64 // sum of the times that the aortic valve is open, s
}

func (w *window) add(b *books) {
	if w.beats == 0 {
		w.all.begin()
	}
	w.all.join(b)
	w.beats++
	w.pulse += b.of(sigPao).Swing()
	open, _ := b.opening()
	w.open += open
}

func (w *window) measures(settled bool) Modulated {
	if w.beats == 0 {
		none := math.NaN()
		nothing := Range{none, none, none}
		return Modulated{
			Window: none, Arterial: nothing, PumpFlow: nothing, ValveFlow: nothing, RootFlow: nothing, ValveOpen: none,
			PulsePressure: none, PulsePressureBeatMean: none, EEP: none, SHE: none, Filling: none,
		}
	}
	surplus := w.all.surplus()
	p := w.all.of(sigPao)
	return Modulated{
		Window: w.all.time, Arterial: p, PumpFlow: w.all.of(sigPump), ValveFlow: w.all.of(sigValve),
		PulsePressure: p.Swing(), PulsePressureBeatMean: w.pulse / float64(w.beats),
		EEP: p.Mean + surplus, SHE: unit.DynPerMmHg * surplus,
		RootFlow: w.all.of(sigRoot), ValveOpened: w.open > 0, ValveOpen: w.open / float64(w.beats),
		Filling: w.all.of(sigFill).Mean, Settled: settled,
	}
}

// near tells whether the measures are those of another window, to 1 %.
func (m *Modulated) near(o *Modulated) bool {
	for _, pair := range [][2]float64{
		{m.Arterial.Mean, o.Arterial.Mean},
		{m.PulsePressure, o.PulsePressure},
		{m.PulsePressureBeatMean, o.PulsePressureBeatMean},
		{m.PumpFlow.Mean, o.PumpFlow.Mean},
		{m.PumpFlow.Swing(), o.PumpFlow.Swing()},
		{m.SHE, o.SHE},
	} {
		if !(math.Abs(pair[0]-pair[1]) <= stable*math.Abs(pair[0])) {
			return false
		}
	}
	return true
}
