package support

import (
	"errors"
	"math"
	"testing"

	"pgregory.net/rapid"

	"afterbeat/fitting"
	"afterbeat/tree/heart"
)

// setUpCase is a load and what is not solved for of a ventricle, all invented.
func setUpCase(kind LoadKind) (Coupling, Ejection) {
	return Coupling{
		Ventricle: heart.Ventricle{Period: 0.8, V0: 15, Rmv: 0.015, Rav: 0.008},
		Filling:   heart.Filling{Pressure: 18, Slope: heart.RampSlope},
		Load:      Windkessel{Kind: kind, Values: fitting.Values{R: 1, C: 1.3, Zc: 0.06, L: 0.008}, OutflowPressure: 6},
	}, Ejection{StrokeVolume: 55, Time: 0.28, EndDiastolic: 200}
}

// What is set up ejects as asked, on every load, and its filling line goes
// through that state. Mean pressure follows: Pv + Z(0) mean Q.
func TestSetUpEjectsAsAsked(t *testing.T) {
	for _, kind := range LoadKinds() {
		c, e := setUpCase(kind)
		got, err := SetUp(c, e)
		if err != nil {
			t.Errorf("%s: %v", kind, err)
			continue
		}
		k := coupled(t, got)
		s := at(t, k, 0)
		total := c.Load.R
		if kind == WK3 || kind == WK4S {
			total += c.Load.Zc
		}
		for _, one := range []struct {
			what      string
			got, want float64
		}{
			{"stroke volume", s.Flow() * c.Ventricle.Period, e.StrokeVolume},
			{"ejection time", s.ValveOpen, e.Time},
			{"end-diastolic volume", s.Volume.Max, e.EndDiastolic},
			{"filling pressure", s.Filling, c.Filling.Pressure},
			{"mean pressure", s.Arterial.Mean, 6 + total*e.StrokeVolume/c.Ventricle.Period},
			{"flow of the filling line", k.Filling.Flow, e.StrokeVolume / c.Ventricle.Period},
		} {
			if !(math.Abs(one.got/one.want-1) < 1e-5) {
				t.Errorf("%s: %s %v, want %v", kind, one.what, one.got, one.want)
			}
		}
	}
}

// A ventricle that ejects is found again from what it does, and from no more.
func TestSetUpFindsTheVentricleAgain(t *testing.T) {
	rapid.Check(t, func(r *rapid.T) {
		draw := func(what string, low, high float64) float64 { return rapid.Float64Range(low, high).Draw(r, what) }
		tes := draw("Tes", 0.28, 0.4)
		c := Coupling{
			Ventricle: heart.Ventricle{
				Period: 0.8, Activation: heart.Cosine, Tes: tes, Tr: tes / 2, Emax: draw("Emax", 0.5, 2.5), Emin: draw("Emin", 0.05, 0.12),
				V0: draw("V0", 0, 30), Rmv: draw("Rmv", 0.005, 0.03), Rav: draw("Rav", 0.002, 0.02),
			},
			Filling:   heart.Filling{Pressure: draw("Pfill", 10, 25)},
			Load:      Windkessel{Kind: WK3, Values: fitting.Values{R: draw("R", 0.7, 1.6), C: draw("C", 0.8, 2), Zc: 0.06}, OutflowPressure: 5},
			Tolerance: 1e-8,
		}
		k, err := NewCoupled(c)
		if err != nil {
			r.Fatal(err)
		}
		s, err := k.At(0)
		if err != nil || !s.Settled || s.Suction || !s.ValveOpened {
			r.Skip("no state to start from")
		}
		blank := c
		blank.Ventricle.Emax, blank.Ventricle.Emin, blank.Ventricle.Tes, blank.Ventricle.Tr = 0, 0, 0, 0
		got, err := SetUp(blank, Ejection{StrokeVolume: s.Flow() * 0.8, Time: s.ValveOpen, EndDiastolic: s.Volume.Max})
		if err != nil {
			r.Skip(err) // it may give up; what it finds must be right
		}
		for _, p := range [][2]float64{
			{got.Ventricle.Emax, c.Ventricle.Emax}, {got.Ventricle.Emin, c.Ventricle.Emin}, {got.Ventricle.Tes, c.Ventricle.Tes},
		} {
			if math.Abs(p[0]/p[1]-1) > 2e-3 {
				r.Fatalf("%v, want %v", got.Ventricle, c.Ventricle)
			}
		}
	})
}

// A ventricle that relaxes otherwise than is assumed is told by its pulse
// pressure; one that no relaxation explains gets the end that comes nearest.
func TestRelaxTo(t *testing.T) {
	c, e := setUpCase(WK3)
	pulse := func(relaxation float64) float64 {
		e := e
		e.Relaxation = relaxation
		set, err := SetUp(c, e)
		if err != nil {
			t.Fatal(err)
		}
		if got := set.Ventricle.Tr / set.Ventricle.Tes; math.Abs(got-relaxation) > 1e-9 {
			t.Errorf("Tr/Tes is %v, want %v", got, relaxation)
		}
		return at(t, coupled(t, set), 0).PulsePressure()
	}
	for _, want := range []float64{0.3, 0.5, 0.8} {
		got, err := RelaxTo(c, e, pulse(want))
		if err != nil || math.Abs(pulse(got)-pulse(want)) > 2*relaxedWithin || math.Abs(got-want) > 0.05 {
			t.Errorf("%v, %v; want %v", got, err, want)
		}
	}
	for beyond, want := range map[float64]float64{10: QuickestRelaxation, 200: SlowestRelaxation} {
		if got, err := RelaxTo(c, e, beyond); err != nil || got != want {
			t.Errorf("%v mmHg: %v, %v; want %v", beyond, got, err, want)
		}
	}
	e.StrokeVolume = 0
	if _, err := RelaxTo(c, e, 40); !errors.Is(err, ErrNotMet) {
		t.Errorf("nothing ejected: %v", err)
	}
}

func TestWhatCannotBeSetUp(t *testing.T) {
	for name, change := range map[string]func(*Coupling, *Ejection){
		"nothing ejected":            func(_ *Coupling, e *Ejection) { e.StrokeVolume = 0 },
		"more ejected than is there": func(_ *Coupling, e *Ejection) { e.EndDiastolic = 60 },
		"longer than the beat":       func(_ *Coupling, e *Ejection) { e.Time = 0.9 },
		"no number":                  func(_ *Coupling, e *Ejection) { e.Time = math.NaN() },
		"no filling":                 func(c *Coupling, _ *Ejection) { c.Filling.Pressure = 0 },
		"no way in":                  func(c *Coupling, _ *Ejection) { c.Ventricle.Rmv = 1 },
	} {
		c, e := setUpCase(WK3)
		change(&c, &e)
		if _, err := SetUp(c, e); !errors.Is(err, ErrNotMet) {
			t.Errorf("%s: %v", name, err)
		}
	}
}

// The waves are the signals of the state: the same mean, within the same
// extremes, and what goes into the ventricle comes out.
func TestWavesAreThoseOfTheState(t *testing.T) {
	for name, c := range couplings(t) {
		k := coupled(t, c)
		for _, speed := range []float64{0, 9} {
			s := at(t, k, speed)
			const n = 4000
			w, err := k.Waves(speed, n)
			if err != nil {
				t.Fatal(err)
			}
			for _, one := range []struct {
				what    string
				samples []float64
				of      Range
			}{
				{"pressure", w.Pressure.Samples, s.Arterial},
				{"root flow", w.RootFlow.Samples, s.RootFlow},
				{"pump flow", w.PumpFlow.Samples, s.PumpFlow},
				{"volume", w.Volume.Samples, s.Volume},
				{"ventricular", w.Ventricular.Samples, s.Ventricular},
			} {
				mean, low, high := 0.0, math.Inf(1), math.Inf(-1)
				for _, x := range one.samples {
					mean += x / n
					low, high = math.Min(low, x), math.Max(high, x)
				}
				near := 2e-3 * (1 + one.of.Swing())
				if math.Abs(mean-one.of.Mean) > near || low < one.of.Min-1e-3 || high > one.of.Max+1e-3 || low > one.of.Min+20*near || high < one.of.Max-20*near {
					t.Errorf("%s, speed %v, %s: %v %v %v, want %v", name, speed, one.what, mean, low, high, one.of)
				}
			}
			if got, want := w.Pressure.Duration(), c.Ventricle.Period; math.Abs(got-want) > 1e-12 {
				t.Errorf("%s: the wave takes %v s, want %v", name, got, want)
			}
		}
	}
}

// Just below the limit the valve opens, just above it does not.
func TestValveLimitIsWhereTheValveStaysShut(t *testing.T) {
	k := coupled(t, failingCase(t))
	limit, err := k.ValveLimit(6, 12)
	if err != nil || !(limit > 6 && limit < 12) {
		t.Fatal(limit, err)
	}
	if !at(t, k, 0.999*limit).ValveOpened || at(t, k, 1.001*limit).ValveOpened {
		t.Errorf("%v is no limit", limit)
	}
	if none, err := k.ValveLimit(limit+1, 12); err != nil || !math.IsNaN(none) {
		t.Errorf("between two speeds at which it is shut: %v, %v", none, err)
	}
}

func BenchmarkSetUp(b *testing.B) {
	c, e := setUpCase(WK3)
	c.Tolerance = 1e-7
	b.ReportAllocs()
	for b.Loop() {
		if _, err := SetUp(c, e); err != nil {
			b.Fatal(err)
		}
	}
}
