package tree

import (
	"math"
	"math/cmplx"
	"testing"

	"afterbeat/data"
	"afterbeat/data/unit"
)

// tube is one segment with a terminal.
func tube(length, radius, speed float64, t Terminal, b Blood) Network {
	return Network{Blood: b, Segments: []Segment{{ID: "tube", Length: length, Radius: radius, WaveSpeed: speed, Terminal: &t}}}
}

var (
	ideal = Blood{Density: 1.05}
	thick = Blood{Density: 1.05, Viscosity: 0.04}
	inf   = math.Inf(1)
)

func close(t *testing.T, what string, got, want complex128, relative float64) {
	t.Helper()
	if !(cmplx.Abs(got-want) <= relative*cmplx.Abs(want)) {
		t.Errorf("%s = %v, want %v within %g relative", what, got, want, relative)
	}
}

// Without viscosity: a matched tube is its own rho c/A at every frequency, a
// closed one -i Zc cot(w l/c), an open one i Zc tan(w l/c) (closed forms).
func TestTubesWithoutLoss(t *testing.T) {
	const length, radius, speed = 40, 0.8, 550
	zc := complex(1.05*speed/(math.Pi*radius*radius)/unit.DynPerMmHg, 0)
	matched := mustLoad(t, tube(length, radius, speed, Terminal{Matched: true}, ideal))
	shut := mustLoad(t, tube(length, radius, speed, Terminal{R1: inf, R2: 1}, ideal))
	shutBehind := mustLoad(t, tube(length, radius, speed, Terminal{R2: inf}, ideal))
	open := mustLoad(t, tube(length, radius, speed, Terminal{}, ideal))
	for _, f := range []float64{0.01, 0.7, 1.25, 3, 9.9, 50, 1000} {
		w := 2 * math.Pi * f
		turn := w * length / speed
		close(t, "matched", matched.Impedance(w), zc, 1e-13)
		close(t, "closed", shut.Impedance(w), -1i*zc/complex(math.Tan(turn), 0), 1e-10)
		close(t, "closed behind R1", shutBehind.Impedance(w), shut.Impedance(w), 1e-14)
		close(t, "open", open.Impedance(w), 1i*zc*complex(math.Tan(turn), 0), 1e-10)
	}
	if r := shut.Resistance(); r != inf {
		t.Error("a closed tube lets mean flow through: ", r)
	}
	near(t, "compliance of a closed tube", shut.Compliance(), math.Pi*radius*radius*length*unit.DynPerMmHg/(1.05*speed*speed), 1e-13)
	if r := open.Resistance(); r != 0 {
		t.Error("an open tube without viscosity resists: ", r)
	}
}

// One segment with a terminal, computed with 40 digits from the definitions.
func TestOneSegment(t *testing.T) {
	s := Segment{ID: "carotid", Length: 20.8, Radius: 0.37, Eh: 4e6 * 0.063, Poisson: 0.5, Terminal: &Terminal{R1: 1.2, R2: 10, C: 0.03}}
	n := Network{Blood: thick, Segments: []Segment{s}}
	near(t, "wave speed", s.Speed(0.37, 1.05), 657.5959492, 1e-9)
	for _, row := range []struct {
		f              float64
		zin, transfer  complex128
		gain, in, lost float64
	}{
		{1.25, 0.9276428565 - 2.120519748i, 0.5307350594 - 0.1788113576i, 1.091986848, 0.4638214282, 0.03625996752},
		{5, 0.7101394354 - 0.003418680378i, 0.5025084853 - 0.4170023657i, 1.544263076, 0.3550697177, 0.07549128714},
		{10, 1.561442842 + 0.2325556089i, -0.213963497 - 0.9741748978i, 0.8448171237, 0.7807214212, 0.1698832757},
	} {
		// 1 mL/s amplitude at the first harmonic of a period 1/f
		flow := data.Period{Samples: make([]float64, 9), Rate: 9 * row.f}
		for j := range flow.Samples {
			flow.Samples[j] = math.Cos(2 * math.Pi * float64(j) / 9)
		}
		state := mustSolve(t, n, flow)
		pin, qin := state.Coefficients(0, Inlet, 1)
		pout, qout := state.Coefficients(0, Outlet, 1)
		close(t, "Zin", pin/qin, row.zin, 2e-9)
		close(t, "Qout/Qin", qout/qin, row.transfer, 2e-9)
		near(t, "|Pout/Pin|", cmplx.Abs(pout/pin), row.gain, 2e-9)
		ledger := state.Ledger()
		near(t, "power in", ledger.Input, row.in, 2e-9)
		near(t, "power lost", state.Loss(0).Total(), row.lost, 1e-8)
	}
}

// Loss of a resistor is R (Q0² + A²/2): 9600 mmHg mL/s at R = 1, Q0 = A = 80, a
// third of it pulsatile.
func TestLossOfAResistor(t *testing.T) {
	flow := data.Period{Samples: make([]float64, 20), Rate: 25}
	for j := range flow.Samples {
		flow.Samples[j] = 80 + 80*math.Sin(2*math.Pi*float64(j)/20)
	}
	n := tube(1e-9, 1, 500, Terminal{R1: 1}, ideal)
	n.OutflowPressure = 4
	ledger := mustSolve(t, n, flow).Ledger()
	for _, term := range ledger.Terms {
		switch term.Name {
		case "terminal R1":
			near(t, "steady", term.Steady, 6400, 1e-12)
			near(t, "pulsatile", term.Pulsatile, 3200, 1e-9)
		case "outflow":
			near(t, "outflow", term.Total(), 320, 1e-12)
		default:
			if math.Abs(term.Total()) > 1e-6 {
				t.Errorf("%s loses %g", term.Name, term.Total())
			}
		}
	}
	near(t, "input", ledger.Input, 9920, 1e-9)
}

// On a line so long that no wave returns, the pulsatile loss is all of the pulsatile input,
// whatever the length and the end, and nothing overflows.
func TestLossOfALongLine(t *testing.T) {
	flow := beat(33)
	first := 0.0
	for _, length := range []float64{3e4, 3e5, 1e9} {
		for _, end := range []Terminal{{R2: 1}, {R1: inf, R2: 1}, {}} {
			state := mustSolve(t, tube(length, 0.5, 500, end, thick), flow)
			got := state.Loss(0).Pulsatile
			if first == 0 {
				first = got
			}
			near(t, "pulsatile loss", got, first, 1e-9)
		}
	}
	if !(first > 0) {
		t.Error("no loss: ", first)
	}
}

// At small alpha a line is 8 mu/(pi r⁴) + (4/3) i w rho/A; at large alpha it is the
// ideal one.
func TestLimitsOfAlpha(t *testing.T) {
	const w = 2 * math.Pi
	syrup := mustLoad(t, tube(1, 0.1, 1e6, Terminal{R2: 1e-9}, Blood{Density: 1.05, Viscosity: 10}))
	area := math.Pi * 0.01
	close(t, "small alpha", syrup.Impedance(w), complex(8*10*math.Pi/(area*area), w*4/3*1.05/area)/unit.DynPerMmHg, 1e-6)
	thin := mustLoad(t, tube(40, 1, 500, Terminal{R1: 0.3}, Blood{Density: 1.05, Viscosity: 1e-12}))
	none := mustLoad(t, tube(40, 1, 500, Terminal{R1: 0.3}, ideal))
	close(t, "large alpha", thin.Impedance(w), none.Impedance(w), 1e-5)
}

// The published benchmark of an aortic bifurcation (Boileau et al. 2015, Int J
// Numer Meth Biomed Eng 31:e02732, after Xiao, Alastruey, Figueroa 2014; geometry
// from memory, R1 = rho c/A to 5 figures): reflection at the junction +0.0972390.
func TestBenchmarkBifurcation(t *testing.T) {
	iliac := Segment{Parent: "aorta", Length: 8.5, Radius: 0.6, Eh: 7e6 * 0.072, Poisson: 0.5, Terminal: &Terminal{Matched: true}}
	left, right := iliac, iliac
	left.ID, right.ID = "left", "right"
	n := Network{Blood: Blood{Density: 1.06}, Segments: []Segment{left, {ID: "aorta", Length: 8.6, Radius: 0.86, Eh: 5e6 * 0.1032, Poisson: 0.5}, right}}
	near(t, "aortic speed", n.Segments[1].Speed(0.86, 1.06), 614.2951, 1e-6)
	near(t, "iliac speed", left.Speed(0.6, 1.06), 726.8438, 1e-6)
	state := mustSolve(t, n, beat(65))
	zc := complex(mustLoad(t, n).CharacteristicImpedance(), 0)
	for _, k := range []int{1, 7, 32} {
		p, q := state.Coefficients(1, Outlet, k)
		close(t, "reflection", (p/q-zc)/(p/q+zc), 0.0972390, 1e-6)
		close(t, "transmission", p/((p+zc*q)/2), 1.0972390, 1e-7)
	}
}

// R1 = rho c/A of three published cases, Pa s/m³ (same source), and in the units
// used here.
func TestMatchedTerminals(t *testing.T) {
	for _, c := range []struct{ radius, eh, pascal, r1 float64 }{
		{0.3, 7e6 * 0.03, 2.48750488e8, 1.86578},
		{1.2, 4e6 * 0.12, 1.17523559e7, 0.0881475},
		{0.6, 7e6 * 0.072, 6.81231266e7, 0.510966},
	} {
		s := Segment{ID: "a", Length: 1, Radius: 2, RadiusDistal: c.radius, Eh: c.eh, Poisson: 0.5, Terminal: &Terminal{R1: 77, Matched: true}}
		c1, err := compile(Network{Blood: Blood{Density: 1.06, Viscosity: 0.04}, Segments: []Segment{s}})
		if err != nil {
			t.Fatal(err)
		}
		near(t, "R1", c1.terminals[0].R1*1.33322387415e8, c.pascal, 2e-9)
		near(t, "R1", c1.terminals[0].R1, c.r1, 5e-5) // printed from a rounded value
	}
}

// The single pulse of the same benchmark, exp(-10⁴ (t - 0.05)²) mL/s into 10 m of
// tube: without viscosity it arrives whole after 10 m at 6.172134 m/s; with
// viscosity later and lower, the volume of the pulse kept.
func TestSinglePulse(t *testing.T) {
	s := Segment{ID: "tube", Length: 1000, Radius: 1, Eh: 4e6 * 0.15, Poisson: 0.5, Terminal: &Terminal{Matched: true}}
	near(t, "wave speed", s.Speed(1, 1.05), 617.2134, 1e-7)
	flow := data.Period{Samples: make([]float64, 4096), Rate: 1024}
	volume := 0.0
	for j := range flow.Samples {
		at := float64(j)/flow.Rate - 0.05
		flow.Samples[j] = math.Exp(-1e4 * at * at)
		volume += flow.Samples[j] / flow.Rate
	}
	near(t, "volume", volume, 0.0177245385, 1e-9)
	for _, blood := range []Blood{ideal, thick} {
		state := mustSolve(t, Network{Blood: blood, Segments: []Segment{s}}, flow)
		out := state.Flow(0, Outlet)
		_, peak := out.Extremes()
		worst, arrived := 0.0, 0.0
		for j, q := range out.Samples {
			at := float64(j)/flow.Rate - 0.05 - 1000/617.2134
			worst = max(worst, math.Abs(q-math.Exp(-1e4*at*at)))
			arrived += q / flow.Rate
		}
		near(t, "volume at the end", arrived, volume, 1e-9)
		if blood.Viscosity == 0 && worst > 2e-6 {
			t.Errorf("the pulse arrives changed by %g", worst)
		}
		if blood.Viscosity > 0 && !(peak < 0.95) {
			t.Errorf("viscosity leaves a peak of %g", peak)
		}
	}
}
