package support

import (
	"fmt"
	"math"
	"testing"

	"afterbeat/fitting"
	"afterbeat/tree/heart"
	"afterbeat/tree/pump"
)

// plain is the coupled circuit integrated a second time, by the classical
// method of Runge and Kutta with tiny even steps, the valves as the functions
// max(0, ...) of the equations, and beat after beat until nothing changes. It
// shares no code with the solver but the parameters.
type plain struct {
	Coupling
	fill, speed float64
	r           float64 // in place of the load's where it is not 0
	gap, lag    float64 // of the filling pressure above fill, in transients
	open        bool    // the valve of wk4s
}

// root is what follows from the state v, pc, qp, qx at a time.
func (p *plain) root(t float64, y [4]float64) (plv, pao, qmv, qav, dqp, dqx float64) {
	v, l := p.Ventricle, p.Load
	e := (1 - math.Cos(math.Pi*t/v.Tes)) / 2
	if v.Activation == heart.Hill {
		x1, x2 := math.Pow(t/(0.303*v.Period), 1.32), math.Pow(t/(0.508*v.Period), 21.9)
		e = 1.67217921544404624 * x1 / (1 + x1) / (1 + x2)
	} else if t > v.Tes+v.Tr {
		e = 0
	} else if t > v.Tes {
		e = (1 + math.Cos(math.Pi*(t-v.Tes)/v.Tr)) / 2
	}
	plv = (v.Emin + (v.Emax-v.Emin)*e) * (y[0] - v.V0)
	fill := p.fill
	if p.lag > 0 {
		fill += p.gap * math.Exp(-t/p.lag)
	}
	qmv = math.Max(0, (fill-plv)/v.Rmv)
	n, q := p.speed, y[2]
	drive := p.Pump.A*n*n - p.Pump.B*n*q - p.Pump.C*q*math.Abs(q) - p.Pump.Resistance*q
	running := n > 0
	inlet := plv
	if p.Inlet == InletAtrium {
		inlet = fill
	}
	valve := func(over, zc float64) float64 {
		if over < 0 && v.Rar > 0 {
			return over / (v.Rar + zc)
		}
		return math.Max(0, over/(v.Rav+zc))
	}
	switch l.Kind {
	case WK4S:
		if p.open || v.Rar > 0 {
			qav = y[3]
			pao = plv - v.Rav*qav
			if qav < 0 {
				pao = plv - v.Rar*qav
			}
			if running {
				dqp = (inlet - pao + drive) / p.Pump.Inertance
			}
			dqx = (pao-y[1]-l.Zc*(qav+q))/l.L - dqp
			return plv, pao, qmv, qav, dqp, dqx
		}
		if running {
			dqp = (inlet - y[1] - l.Zc*q + drive) / (p.Pump.Inertance + l.L)
		}
		return plv, y[1] + l.Zc*q + l.L*dqp, qmv, 0, dqp, 0
	case WK4P:
		qav = valve(plv-y[1]-l.Zc*(q-y[3]), l.Zc)
		pao = y[1] + l.Zc*(qav+q-y[3])
		dqx = (pao - y[1]) / l.L
	default:
		qav = valve(plv-y[1]-l.Zc*q, l.Zc)
		pao = y[1] + l.Zc*(qav+q)
	}
	if running {
		dqp = (inlet - pao + drive) / p.Pump.Inertance
	}
	return plv, pao, qmv, qav, dqp, dqx
}

func (p *plain) slope(t float64, y [4]float64) [4]float64 {
	_, _, qmv, qav, dqp, dqx := p.root(t, y)
	drawn, r := y[2], p.Load.R
	if p.Inlet == InletAtrium {
		drawn = 0
	}
	if p.r > 0 {
		r = p.r
	}
	return [4]float64{
		qmv - qav - drawn, (qav + y[2] - (y[1]-p.Load.OutflowPressure)/r) / p.Load.C, dqp, dqx,
	}
}

func (p *plain) step(t, h float64, y [4]float64) [4]float64 {
	along := func(k [4]float64, share float64) (z [4]float64) {
		for i := range z {
			z[i] = y[i] + share*h*k[i]
		}
		return z
	}
	k1 := p.slope(t, y)
	k2 := p.slope(t+h/2, along(k1, 0.5))
	k3 := p.slope(t+h/2, along(k2, 0.5))
	k4 := p.slope(t+h, along(k3, 1))
	for i := range y {
		y[i] += h / 6 * (k1[i] + 2*k2[i] + 2*k3[i] + k4[i])
	}
	return y
}

// seen is what a beat shows.
type seen struct {
	pao, qp, vol    Range
	qav, qmax, work float64
	loop            float64
}

// beat carries a state over a beat of n steps.
func (p *plain) beat(y [4]float64, n int, s *seen) [4]float64 {
	h := p.Ventricle.Period / float64(n)
	wide := func(r *Range, x float64) { r.Min, r.Max = math.Min(r.Min, x), math.Max(r.Max, x) }
	empty := Range{Min: math.Inf(1), Max: math.Inf(-1)}
	*s = seen{pao: empty, qp: empty, vol: empty, qmax: math.Inf(-1)}
	look := func(t, span float64) { // half of the trapezium over a span
		weight := span / 2 / p.Ventricle.Period
		plv, pao, qmv, qav, _, _ := p.root(t, y)
		wide(&s.pao, pao)
		wide(&s.qp, y[2])
		wide(&s.vol, y[0])
		s.pao.Mean += weight * pao
		s.qp.Mean += weight * y[2]
		s.qav += weight * qav
		s.qmax = math.Max(s.qmax, qav)
		s.loop += weight * math.Max(0, -qav)
		out := qav + y[2]
		if p.Inlet == InletAtrium {
			out = qav
		}
		s.work += weight * plv * (out - qmv) * p.Ventricle.Period
	}
	for k := range n {
		t := float64(k) * h
		if p.Load.Kind == WK4S && !p.open && p.Ventricle.Rar == 0 {
			plv, pao, _, _, _, _ := p.root(t, y)
			p.open = plv > pao
		}
		after, rest := p.step(t, h, y), h
		if p.Load.Kind == WK4S && p.open && after[3] < 0 && p.Ventricle.Rar == 0 {
			// The valve shuts within the step: go there, look at both sides, go on.
			part := h * y[3] / (y[3] - after[3])
			for range 4 {
				at := p.step(t, part, y)
				_, _, _, _, _, slope := p.root(t+part, at)
				part -= at[3] / slope
			}
			look(t, part)
			y = p.step(t, part, y)
			look(t+part, part)
			p.open, y[3] = false, 0
			rest = h - part
			after = p.step(t+part, rest, y)
		}
		look(t+h-rest, rest)
		y = after
		look(t+h, rest)
	}
	return y
}

// settle runs beats until the state comes back, and looks at one more, finely.
func (p *plain) settle(t *testing.T) seen {
	y := [4]float64{150, 85, 60, 0}
	if p.speed == 0 {
		y[2] = 0
	}
	if p.Load.Kind == WK4P {
		y[3] = 60
	}
	var s seen
	for range 300 {
		before := y
		y = p.beat(y, 2000, &s)
		far := 0.0
		for i := range y {
			far = math.Max(far, math.Abs(y[i]-before[i]))
		}
		if far < 1e-7 {
			p.beat(p.beat(y, 10000, &s), 10000, &s)
			return s
		}
	}
	t.Fatalf("speed %v: the plain method found no periodic state", p.speed)
	return s
}

// cases are invented ventricles with invented loads and pumps.
func couplings(t testing.TB) map[string]Coupling {
	return map[string]Coupling{
		"failing, wk3, axial": failingCase(t),
		"stiff, wk2, flat": {
			Ventricle: heart.Ventricle{Period: 0.9, Activation: heart.Cosine, Tes: 0.32, Tr: 0.16, Emax: 1.4, Emin: 0.12, V0: 5, Rmv: 0.008, Rav: 0.01},
			Filling:   heart.Filling{Pressure: 16, Flow: 65, Slope: 0.2},
			Load:      Windkessel{Kind: WK2, Values: fitting.Values{R: 1.5, C: 0.8}, OutflowPressure: 8},
			Pump:      named(t, "generic B").scaled(9.0 / 3.2),
		},
		"dilated, wk4s, generic A": {
			Ventricle: heart.Ventricle{Period: 0.7, Activation: heart.Hill, Emax: 0.5, Emin: 0.09, V0: 20, Rmv: 0.012, Rav: 0.006},
			Filling:   heart.Filling{Pressure: 22, Flow: math.NaN(), Slope: heart.RampSlope},
			Load:      Windkessel{Kind: WK4S, Values: fitting.Values{R: 1.1, C: 2.2, Zc: 0.04, L: 0.005}},
			Pump:      named(t, "generic A").Pump,
		},
		"moderate, wk4p, generic A": {
			Ventricle: heart.Ventricle{Period: 1, Activation: heart.Cosine, Tes: 0.36, Tr: 0.2, Emax: 1, Emin: 0.07, V0: 10, Rmv: 0.02, Rav: 0.004},
			Filling:   heart.Filling{Pressure: 14, Flow: 70},
			Load:      Windkessel{Kind: WK4P, Values: fitting.Values{R: 1, C: 1.4, Zc: 0.06, L: 0.006}, OutflowPressure: 5},
			Pump:      named(t, "generic A").Pump,
		},
		"leaking valve, wk3": leaking(failingCase(t), 1.5),
		"leaking valve, wk4s": leaking(Coupling{
			Ventricle: heart.Ventricle{Period: 0.8, Activation: heart.Cosine, Tes: 0.3, Tr: 0.15, Emax: 1, Emin: 0.07, V0: 12, Rmv: 0.012, Rav: 0.008},
			Filling:   heart.Filling{Pressure: 20, Flow: 60, Slope: 0.3},
			Load:      Windkessel{Kind: WK4S, Values: fitting.Values{R: 1.1, C: 1.5, Zc: 0.05, L: 0.004}, OutflowPressure: 5},
			Pump:      named(t, "generic A").Pump,
		}, 2.5),
		"inlet from the atrium, wk3": fromAtrium(failingCase(t)),
		"from the atrium, leaking valve, wk2": fromAtrium(leaking(Coupling{
			Ventricle: heart.Ventricle{Period: 0.75, Activation: heart.Hill, Emax: 0.9, Emin: 0.08, V0: 10, Rmv: 0.01, Rav: 0.006},
			Filling:   heart.Filling{Pressure: 18, Flow: 70, Slope: 0.46},
			Load:      Windkessel{Kind: WK2, Values: fitting.Values{R: 1.2, C: 1.2}, OutflowPressure: 5},
			Pump:      named(t, "literature axial").Pump,
		}, 3)),
	}
}

func leaking(c Coupling, rar float64) Coupling {
	c.Ventricle.Rar = rar
	return c
}

func fromAtrium(c Coupling) Coupling {
	c.Inlet = InletAtrium
	return c
}

// set is a set of pump coefficients in a test.
type set struct{ pump.Set }

func named(t testing.TB, name string) set {
	t.Helper()
	s, ok := pump.ByName(name)
	if !ok {
		t.Fatalf("no pump %q", name)
	}
	return set{s}
}

// scaled is the pump whose speeds are larger by a factor.
func (s set) scaled(factor float64) pump.Pump {
	p := s.Pump
	p.A /= factor * factor
	p.B /= factor
	return p
}

// failingCase is an invented failing ventricle: native output at most 4 L/min at
// a filling pressure of at least 18 mmHg.
func failingCase(t testing.TB) Coupling {
	return Coupling{
		Ventricle: heart.Ventricle{Period: 0.8, Activation: heart.Hill, Emax: 0.62, Emin: 0.1, V0: 10, Rmv: 0.01, Rav: 0.005},
		Filling:   heart.Filling{Pressure: 20, Flow: math.NaN(), Slope: heart.RampSlope},
		Load:      Windkessel{Kind: WK3, Values: fitting.Values{R: 1.2, C: 1.3, Zc: 0.05}, OutflowPressure: 5},
		Pump:      named(t, "literature axial").Pump,
	}
}

func coupled(t testing.TB, c Coupling) *Coupled {
	t.Helper()
	k, err := NewCoupled(c)
	if err != nil {
		t.Fatal(err)
	}
	return k
}

func at(t testing.TB, k *Coupled, speed float64) CoupledState {
	t.Helper()
	s, err := k.At(speed)
	if err != nil {
		t.Fatal(err)
	}
	if !s.Settled {
		t.Fatalf("speed %v: not settled after %d beats", speed, s.Beats)
	}
	return s
}

// Two independent methods agree to 1e-5 relative, and to 0.01 mmHg on the extremes
// of pressure, on four ventricles and nine speeds each: without a pump, with
// back-flow, in support, and far beyond.
func TestCoupledAgainstAPlainMethod(t *testing.T) {
	speeds := []float64{0, 4, 7, 8, 9, 10, 11, 13, 18}
	if testing.Short() {
		speeds = []float64{0, 7, 9, 13}
	}
	for name, c := range couplings(t) {
		t.Run(name, func(t *testing.T) {
			t.Parallel()
			k := coupled(t, c)
			speeds, close := speeds, 1e-5
			if c.Inlet == InletAtrium || c.Ventricle.Rar > 0 { // the first has slow states, which the plain method nears slowly
				speeds, close = []float64{0, 8, 10, 13}, 2e-4
			}
			for _, speed := range speeds {
				s := at(t, k, speed)
				p := plain{Coupling: k.Coupling, fill: s.Filling, speed: speed}
				want := p.settle(t)
				compare := func(what string, got, want, tolerance float64) {
					if !(math.Abs(got-want) <= tolerance) {
						t.Errorf("speed %v: %s %v, by the plain method %v", speed, what, got, want)
					}
				}
				near := func(what string, got, want float64) {
					compare(what, got, want, close*(math.Abs(want)+1))
				}
				near("arterial mean", s.Arterial.Mean, want.pao.Mean)
				kink := 0.01
				if c.Ventricle.Rar > 0 { // pressure is bent where the flow turns
					kink = 0.02
				}
				compare("arterial min", s.Arterial.Min, want.pao.Min, kink)
				compare("arterial max", s.Arterial.Max, want.pao.Max, kink)
				near("pump flow mean", s.PumpFlow.Mean, want.qp.Mean)
				near("pump flow min", s.PumpFlow.Min, want.qp.Min)
				near("pump flow max", s.PumpFlow.Max, want.qp.Max)
				near("valve flow mean", s.ValveFlow.Mean, want.qav)
				near("valve flow max", s.ValveFlow.Max, want.qmax)
				if s.Volume.Swing() > 1 { // else any volume that moves no valve is one
					near("volume min", s.Volume.Min, want.vol.Min)
					near("volume max", s.Volume.Max, want.vol.Max)
				}
				near("stroke work", s.StrokeWork, want.work)
				near("what runs back through the valve", s.Loop, want.loop)
				if onLine := k.Filling.At(want.qp.Mean + want.qav); math.Abs(onLine-s.Filling) > 1e-3 {
					t.Errorf("speed %v: filling pressure %v, the line says %v", speed, s.Filling, onLine)
				}
			}
		})
	}
	if n := len(couplings(t)); n < 4 {
		t.Fatal(fmt.Sprint("only ", n, " cases"))
	}
}
