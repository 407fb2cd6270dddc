package anatomy

import (
	"encoding/csv"
	"math"
	"math/rand/v2"
	"os"
	"path/filepath"
	"strconv"
	"strings"
	"testing"

	"afterbeat/data"
	"afterbeat/data/unit"
	"afterbeat/tree"
)

func period(rate float64, samples ...float64) data.Period {
	return data.Period{Samples: samples, Rate: rate}
}

// ejection is a half sine of 70 mL in 0.3 s, period 0.8 s (values.md 1.4, Ex. 2).
func ejection() data.Period {
	q := data.Period{Samples: make([]float64, 160), Rate: 200}
	for i := range q.Samples {
		if at := float64(i) / q.Rate; at < 0.3 {
			q.Samples[i] = math.Pi * 70 / (2 * 0.3) * math.Sin(math.Pi*at/0.3)
		}
	}
	return q
}

// made is a measurement in a tree under known factors, by the order of
// Tree.factors.
func made(t testing.TB, base Tree, factors []float64, noise float64, distal ...data.Site) Measurement {
	t.Helper()
	n := base.Network.Clone()
	theta := make([]float64, len(factors))
	for i, f := range factors {
		theta[i] = math.Log(f)
	}
	base.apply(&n, base.factors(), theta)
	waves, _, err := Spread(n, ejection())
	if err != nil {
		t.Fatal(err)
	}
	random := rand.New(rand.NewPCG(7, 7))
	noisy := func(p data.Period) data.Period {
		for i := range p.Samples {
			p.Samples[i] += noise * random.NormFloat64()
		}
		return p
	}
	root, _ := Find(n, data.SiteRoot)
	m := Measurement{Flow: ejection(), Pressure: Trace{Site: data.SiteRoot, Quantity: unit.Pressure, Beat: noisy(waves[root.Segment].Inlet.Pressure)}}
	for _, site := range distal {
		at, ok := Find(n, site)
		if !ok {
			t.Fatalf("no %s", site)
		}
		end := waves[at.Segment].Inlet
		if at.Outlet {
			end = waves[at.Segment].Outlet
		}
		d := Trace{Site: site, Quantity: unit.Pressure, Beat: noisy(end.Pressure)}
		if site == data.SiteMCA {
			d.Quantity, d.Beat = unit.Velocity, end.Flow
			for i := range d.Beat.Samples {
				d.Beat.Samples[i] *= 12 // a velocity of unknown diameter
			}
		}
		m.Distal = append(m.Distal, d)
	}
	return m
}

// standard is the table for a load of 1.05 mmHg s/mL and 1.3 mL/mmHg.
func standard(t testing.TB) Tree {
	t.Helper()
	base, err := Systemic(Unknown(), Load{Resistance: 1.05, Compliance: 1.3, MeanFlow: 87.5, OutflowPressure: 5}, 0)
	if err != nil {
		t.Fatal(err)
	}
	return base
}

// Pressure that a known tree made gives its factors back, inside their intervals,
// and its totals.
func TestFactorsComeBack(t *testing.T) {
	base := standard(t)
	for _, c := range []struct {
		factors []float64 // stiffness, resistance, terminal compliance, calibre
		noise   float64   // mmHg
	}{
		{[]float64{1, 1, 1, 1}, 0},
		{[]float64{1.5, 0.9, 0.8, 1.1}, 0},
		{[]float64{0.7, 1.2, 1.4, 0.9}, 0},
		{[]float64{1.8, 1, 0.6, 1.15}, 0.5},
		{[]float64{0.8, 0.8, 1.6, 0.95}, 0.5},
	} {
		m := made(t, base, c.factors, c.noise)
		r, err := Refine(t.Context(), base, m)
		if err != nil {
			t.Fatal(err)
		}
		if !r.Converged || r.Pressure.RMSE > 0.5+c.noise {
			t.Errorf("%v: converged %v, misses by %g mmHg", c.factors, r.Converged, r.Pressure.RMSE)
		}
		for k, f := range r.Factors {
			if !f.Random.Contains(c.factors[k]) || !f.Total.Contains(f.Value) {
				t.Errorf("%v: %s %.3f (%.3f to %.3f)", c.factors, f.Name, f.Value, f.Random.Low, f.Random.High)
			}
		}
		truth := base.Network.Clone()
		theta := make([]float64, 4)
		for i, f := range c.factors {
			theta[i] = math.Log(f)
		}
		base.apply(&truth, base.factors(), theta)
		load, err := tree.NewLoad(truth)
		if err != nil {
			t.Fatal(err)
		}
		if !r.Resistance.Random.Contains(load.Resistance()) || !r.Compliance.Random.Contains(load.Compliance()) {
			t.Errorf("%v: R %+v of %g, C %+v of %g", c.factors, r.Resistance, load.Resistance(), r.Compliance, load.Compliance())
		}
	}
}

// Systematic errors widen the total interval: an output 10 % off moves R by 10 %.
func TestSystematicErrorsWiden(t *testing.T) {
	base := standard(t)
	m := made(t, base, []float64{1, 1, 1, 1}, 0)
	m.Errors = Errors{Flow: 0.1, PressureScale: 0.03, PressureOffset: 2, Delay: 0.01, OutflowPressure: 10}
	r, err := Refine(t.Context(), base, m)
	if err != nil {
		t.Fatal(err)
	}
	// In quadrature: 10 % of flow, 3 % and 2 mmHg of the mean pressure, 10 mmHg of
	// Pv, over a pressure difference of 1.05 87.5 = 92 mmHg.
	mean := m.Pressure.Beat.Mean()
	want := math.Sqrt(0.1*0.1 + math.Pow(0.03*mean/(mean-5), 2) + math.Pow(2/(mean-5), 2) + math.Pow(10/(mean-5), 2))
	if got := math.Log(r.Resistance.Total.High / r.Resistance.Value); math.Abs(got/want-1) > 0.05 {
		t.Errorf("half-width of the resistance %.3f, want about %.3f", got, want)
	}
	if r.Compliance.Total.Width() < 1.2*r.Compliance.Random.Width() {
		t.Errorf("compliance %+v", r.Compliance)
	}
}

// A distal trace that a stiffer arm made gives that region's factor back; one
// held out tests the tree and moves nothing.
func TestDistalTraces(t *testing.T) {
	base := standard(t)
	m := made(t, base, []float64{1.2, 1, 0.9, 1}, 0, data.SiteRadial, data.SiteFemoral, data.SiteMCA)
	r, err := Refine(t.Context(), base, m)
	if err != nil {
		t.Fatal(err)
	}
	names := map[string]bool{}
	for _, f := range r.Factors {
		names[f.Name] = true
		want := 1.0
		switch f.Name {
		case "wall stiffness":
			want = 1.2
		case "terminal compliance":
			want = 0.9
		}
		if !f.Random.Contains(want) {
			t.Errorf("%s: %+v, want %g", f.Name, f.Estimate, want)
		}
	}
	for _, name := range []string{"wall stiffness, arms", "wall stiffness, legs", "terminal compliance, brain"} {
		if !names[name] {
			t.Errorf("no factor %q among %v", name, names)
		}
	}
	for _, d := range r.Distal {
		if d.RMSE > 1 {
			t.Errorf("%s misses by %g", d.Site, d.RMSE)
		}
	}

	for i := range m.Distal {
		m.Distal[i].HeldOut = true
	}
	held, err := Refine(t.Context(), base, m)
	if err != nil {
		t.Fatal(err)
	}
	m.Distal = nil
	alone, err := Refine(t.Context(), base, m)
	if err != nil {
		t.Fatal(err)
	}
	if len(held.Factors) != 4 || len(held.Distal) != 3 {
		t.Fatalf("%d factors, %d traces", len(held.Factors), len(held.Distal))
	}
	for k := range held.Factors {
		if held.Factors[k].Value != alone.Factors[k].Value {
			t.Errorf("%s moved from %g to %g", held.Factors[k].Name, alone.Factors[k].Value, held.Factors[k].Value)
		}
	}
}

// A pressure at a limb is met there, not at the root.
func TestPressureOfALimb(t *testing.T) {
	base := standard(t)
	m := made(t, base, []float64{1, 1, 1, 1}, 0, data.SiteRadial)
	m.Pressure, m.Distal = m.Distal[0], nil
	r, err := Refine(t.Context(), base, m)
	if err != nil {
		t.Fatal(err)
	}
	for _, f := range r.Factors {
		if !f.Random.Contains(1) {
			t.Errorf("%s: %+v", f.Name, f.Estimate)
		}
	}
	if !strings.Contains(r.Pressure.Place, "radial") || r.Pressure.RMSE > 0.5 {
		t.Errorf("at %s, misses by %g", r.Pressure.Place, r.Pressure.RMSE)
	}
}

// Any other table is refined as the user's own: the in-vitro network of 37
// vessels (values.md 2.3).
func TestOwnTable(t *testing.T) {
	n := inVitro(t)
	load, err := tree.NewLoad(n)
	if err != nil {
		t.Fatal(err)
	}
	// Terminals in parallel 1.6865 mmHg s/mL, compliance 0.965 mL/mmHg.
	if c := ComplianceOfWalls(n); math.Abs(c/0.965-1) > 0.02 || math.Abs(load.Compliance()/c-1) > 0.02 {
		t.Errorf("compliance %g, of the load %g", c, load.Compliance())
	}
	if r := load.Resistance(); r < 1.6865 || r > 1.6865*1.1 {
		t.Errorf("resistance %g", r)
	}
	base := Given("tree37.csv", n, Load{OutflowPressure: 3})
	m := made(t, base, []float64{1.4, 0.8, 1, 1.1}, 0, data.SiteRadial)
	m.Distal = nil
	r, err := Refine(t.Context(), base, m)
	if err != nil {
		t.Fatal(err)
	}
	for k, want := range []float64{1.4, 0.8, 1, 1.1} {
		if f := r.Factors[k]; !f.Random.Contains(want) {
			t.Errorf("%s: %+v, want %g", f.Name, f.Estimate, want)
		}
	}
	if r.Factors[2].Identified {
		t.Error("compliance of terminals that have none is identified")
	}
}

// inVitro is the network of 37 silicone vessels: E 1.2 MPa, fluid of 1.05 g/mL and
// 2.5 mPa s, c² = 2 E h/(3 rho r).
func inVitro(t testing.TB) tree.Network {
	t.Helper()
	f, err := os.Open(filepath.Join("..", "testdata", "tree37.csv"))
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	rows, err := csv.NewReader(f).ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	n := tree.Network{Blood: tree.Blood{Density: 1.05, Viscosity: 0.025}, OutflowPressure: 3}
	for _, row := range rows[1:] {
		number := func(i int) float64 {
			v, err := strconv.ParseFloat(row[i], 64)
			if err != nil {
				t.Fatal(err)
			}
			return v
		}
		s := tree.Segment{
			ID: row[0], Parent: strings.TrimPrefix(row[1], "0"), Name: row[2], Length: number(3),
			Radius: number(4) / 10, RadiusDistal: number(5) / 10, Eh: number(7) * dynPerMPa * number(6) / 10, Poisson: 0.5,
		}
		if row[8] != "" {
			r1 := Characteristic(s, n.Blood.Density)
			s.Terminal = &tree.Terminal{R1: r1, R2: number(8)*7.500615758 - r1} // GPa s/m3
		}
		n.Segments = append(n.Segments, s)
	}
	return n
}

// A tree that had to be changed far is warned of.
func TestFarFactorsAreWarnedOf(t *testing.T) {
	base := standard(t)
	r, err := Refine(t.Context(), base, made(t, base, []float64{3, 1, 0.3, 1}, 0))
	if err != nil {
		t.Fatal(err)
	}
	found := 0
	for _, w := range r.Warnings {
		if w.Code == data.CodeTreeStretched && w.Cure != "" {
			found++
		}
	}
	if found != 2 {
		t.Errorf("%d warnings: %v", found, r.Warnings)
	}
}

// Native pulses grow on their way to the limbs: brachial over central pulse
// pressure 1.1 to 1.8 at rest (common practice; from memory), and the mean falls
// by a few mmHg (common practice; the table's limbs are narrow).
func TestPulseGrowsTowardsTheLimbs(t *testing.T) {
	base := standard(t)
	waves, _, err := Spread(base.Network, ejection())
	if err != nil {
		t.Fatal(err)
	}
	pulse := func(p data.Period) float64 { low, high := p.Extremes(); return high - low }
	root := waves[0].Inlet.Pressure
	for _, site := range []data.Site{data.SiteRadial, data.SiteBrachial, data.SiteFemoral} {
		at, _ := Find(base.Network, site)
		p := waves[at.Segment].Outlet.Pressure
		if grown := pulse(p) / pulse(root); grown < 1.05 || grown > 1.8 {
			t.Errorf("%s: %.2f times the pulse of the root", site, grown)
		}
		if fall := root.Mean() - p.Mean(); fall < 0 || fall > 8 {
			t.Errorf("%s: mean pressure falls by %.2g mmHg", site, fall)
		}
	}
	// Internal carotid: Gosling index 1.2 (C36), middle cerebral 0.4 to 1.3
	// (forecast.md 3.1).
	at, _ := Find(base.Network, data.SiteMCA)
	q := waves[at.Segment].Outlet.Flow
	if pi := pulse(q) / q.Mean(); pi < 0.4 || pi > 1.3 {
		t.Errorf("Gosling index of the carotid %.2f", pi)
	}
}

func BenchmarkRefine(b *testing.B) {
	base := standard(b)
	m := made(b, base, []float64{1.3, 0.9, 0.8, 1.1}, 0.5)
	b.ReportAllocs()
	for b.Loop() {
		if _, err := Refine(b.Context(), base, m); err != nil {
			b.Fatal(err)
		}
	}
}
