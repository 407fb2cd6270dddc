package heart

import (
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

func failing() Ventricle {
	return Ventricle{Period: 0.8, Activation: Hill, Emax: 0.62, Emin: 0.1, V0: 10, Rmv: 0.01, Rav: 0.005}
}

// The curve of Stergiopulos 1996, computed from its formula with other tools
// (values.md 7).
func TestHill(t *testing.T) {
	v := failing()
	for _, c := range []struct{ x, want float64 }{
		{0.1, 0.314307}, {0.2, 0.612432}, {0.3, 0.830591}, {0.4, 0.982418}, {0.5, 0.646308}, {0.6, 0.030273},
	} {
		if got := v.Activity(c.x * v.Period); math.Abs(got-c.want) > 5e-7 {
			t.Errorf("e(%v T) = %v, want %v", c.x, got, c.want)
		}
	}
	if got := hillScale; math.Abs(got-1.67217922) > 5e-9 { // values.md 7
		t.Errorf("1/max is %v", got)
	}
	if got := v.Activity(0.42839 * v.Period); math.Abs(got-1) > 1e-9 { // place of the peak: values.md 7
		t.Errorf("e at the peak is %v", got)
	}
}

// The maximum is 1: no point of a fine grid exceeds it, and one reaches it.
func TestActivationsReachOne(t *testing.T) {
	for _, v := range []Ventricle{
		failing(),
		{Period: 0.8, Activation: Cosine, Tes: 0.3, Tr: 0.15},
	} {
		highest := 0.0
		for i := range 1_000_001 {
			highest = max(highest, v.Activity(v.Period*float64(i)/1e6))
		}
		if math.Abs(highest-1) > 1e-11 {
			t.Errorf("%s: the maximum is 1%+.3g", v.Activation, highest-1)
		}
	}
	if got := hill(hillPeak); math.Abs(got-1) > 1e-14 {
		t.Errorf("hill at its peak is 1%+.3g", got-1)
	}
}

// The cosine by hand: half way up at Tes/2, whole at Tes, half way down at
// Tes + Tr/2, nothing after.
func TestCosine(t *testing.T) {
	v := Ventricle{Period: 1, Activation: Cosine, Tes: 0.3, Tr: 0.2, Emax: 2, Emin: 0.5, V0: 10}
	for _, c := range []struct{ t, e float64 }{{0, 0}, {0.15, 0.5}, {0.1, 0.25}, {0.3, 1}, {0.4, 0.5}, {0.5, 0}, {0.9, 0}, {1, 0}} {
		if got := v.Activity(c.t); math.Abs(got-c.e) > 1e-12 {
			t.Errorf("e(%v) = %v, want %v", c.t, got, c.e)
		}
		if got, want := v.Pressure(c.t, 110), 100*(0.5+1.5*c.e); math.Abs(got-want) > 1e-10 {
			t.Errorf("Plv(%v) = %v, want %v", c.t, got, want)
		}
	}
}

// E(t) is smooth between the corners and bent at them: the second difference
// jumps there and nowhere else.
func TestCorners(t *testing.T) {
	v := Ventricle{Period: 1, Activation: Cosine, Tes: 0.3, Tr: 0.2, Emax: 2}
	const h = 1e-3
	bend := func(t float64) float64 { return (v.Activity(t+h) - 2*v.Activity(t) + v.Activity(t-h)) / (h * h) }
	corners := v.Corners()
	if len(corners) != 3 || corners[2] != v.Period {
		t.Fatalf("corners %v", corners)
	}
	for i := 5; i < 990; i++ {
		at := float64(i) * h
		jump := math.Abs(bend(at+2*h) - bend(at-2*h))
		near := math.Abs(at-corners[0]) < 4*h || math.Abs(at-corners[1]) < 4*h
		if !near && jump > 10 {
			t.Errorf("a corner at %v", at)
		}
	}
	for _, at := range corners[:2] {
		if jump := math.Abs(bend(at+2*h) - bend(at-2*h)); jump < 50 {
			t.Errorf("no corner at %v: %v", at, jump)
		}
	}
}

func TestValvesAreDiodes(t *testing.T) {
	v := failing()
	for _, c := range []struct{ got, want float64 }{
		{v.MitralFlow(12, 10), 200}, {v.MitralFlow(10, 12), 0}, {v.AorticFlow(101, 100), 200}, {v.AorticFlow(100, 101), 0},
	} {
		if math.Abs(c.got-c.want) > 1e-9 {
			t.Errorf("flow %v, want %v", c.got, c.want)
		}
	}
}

// The slope is 1.23 mmHg over 0.16 L/min, 0.46 mmHg s/mL; the line passes
// through its state, and stops at 0.
func TestFillingLine(t *testing.T) {
	f := Filling{Pressure: 20, Flow: 55, Slope: RampSlope}
	for _, c := range []struct{ got, want, tolerance float64 }{
		{RampSlope, 0.46, 0.005},
		{f.At(55), 20, 0},
		{f.At(55) - f.At(55+0.16*1000/60), 1.23, 1e-12},
		{f.At(1000), 0, 0},
		{f.Highest(), 20 + RampSlope*55, 1e-12},
		{Filling{Pressure: 20, Flow: 55}.At(1000), 20, 0},
	} {
		if math.Abs(c.got-c.want) > c.tolerance {
			t.Errorf("%v, want %v", c.got, c.want)
		}
	}
}

func TestWhatIsNoVentricle(t *testing.T) {
	for _, c := range []struct {
		change func(*Ventricle)
		says   string
	}{
		{func(v *Ventricle) { v.Period = 0 }, "period_s"},
		{func(v *Ventricle) { v.Emin = math.NaN() }, "Emin"},
		{func(v *Ventricle) { v.Emax = 0.05 }, "at least Emin"},
		{func(v *Ventricle) { v.Rav = 0 }, "Rav"},
		{func(v *Ventricle) { v.Rmv = math.Inf(1) }, "Rmv"},
		{func(v *Ventricle) { v.Tes = 0.3 }, "hill"},
		{func(v *Ventricle) { v.Activation = Cosine }, "needs Tes"},
		{func(v *Ventricle) { v.Activation, v.Tes, v.Tr = Cosine, 0.6, 0.3 }, "longer than the period"},
		{func(v *Ventricle) { v.Activation = "sine" }, "none of"},
	} {
		v := failing()
		if err := v.Check(); err != nil {
			t.Fatal(err)
		}
		c.change(&v)
		if err := v.Check(); err == nil || !strings.Contains(err.Error(), c.says) {
			t.Errorf("error %v, want one that says %q", err, c.says)
		}
	}
	if err := (Filling{Pressure: -1}).Check(); err == nil {
		t.Error("a negative filling pressure passed")
	}
}

func TestActivityStaysBetweenNothingAndOne(t *testing.T) {
	rapid.Check(t, func(r *rapid.T) {
		v := Ventricle{Period: rapid.Float64Range(0.3, 2).Draw(r, "T"), Activation: rapid.SampledFrom(Activations()).Draw(r, "activation")}
		if v.Activation == Cosine {
			v.Tes = rapid.Float64Range(0.05, 0.6).Draw(r, "Tes") * v.Period
			v.Tr = rapid.Float64Range(0.05, 0.4).Draw(r, "Tr") * v.Period
		}
		if e := v.Activity(rapid.Float64Range(0, 1).Draw(r, "t") * v.Period); !(e >= 0 && e <= 1+1e-12) {
			r.Fatalf("e = %v", e)
		}
	})
}

// The table is the function, up to the end of the beat and a little past it.
func TestHillTable(t *testing.T) {
	table := hillTable()
	checked := 0
	for i := range 1_000_000 {
		x := float64(i) / 999_000
		if x > 1 {
			break
		}
		checked++
		if got, want := fastHill(table, x), hill(x); math.Abs(got-want) > 1e-13 {
			t.Fatalf("e(%v T) = %v, from the table %v", x, want, got)
		}
	}
	if checked < 900_000 {
		t.Errorf("checked only %d", checked)
	}
}

// The derivatives against differences.
func TestHillSlopes(t *testing.T) {
	const h = 1e-4
	for _, x := range []float64{0.05, 0.2, 0.4, 0.5, 0.7} {
		e, first, second := hillSlopes(x)
		if want := (hill(x+h) - hill(x-h)) / (2 * h); math.Abs(first-want) > 1e-4 {
			t.Errorf("e'(%v) = %v, by differences %v", x, first, want)
		}
		if want := (hill(x+h) - 2*e + hill(x-h)) / (h * h); math.Abs(second-want) > 1e-2 {
			t.Errorf("e\"(%v) = %v, by differences %v", x, second, want)
		}
	}
}

func BenchmarkElastance(b *testing.B) {
	v := failing()
	sum := 0.0
	for i := range b.N {
		sum += v.Elastance(v.Period * float64(i&1023) / 1024)
	}
	_ = sum
}
