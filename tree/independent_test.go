package tree

import (
	"math"
	"math/cmplx"
	"testing"

	"pgregory.net/rapid"

	"afterbeat/data/unit"
	"afterbeat/data/womersley"
)

// lineOf are the line constants per length in cgs, from their definitions and with
// F10 itself.
func lineOf(n Network, s Segment, r, w float64) (series, parallel complex128) {
	area, speed := math.Pi*r*r, s.Speed(r, n.Blood.Density)
	inertia := complex(0, w*n.Blood.Density/area)
	switch {
	case n.Blood.Viscosity == 0:
		series = inertia
	case n.Line == Poiseuille:
		series = complex(8*n.Blood.Viscosity/(math.Pi*math.Pow(r, 4)), 0) + inertia
	default:
		series = inertia / womersley.OneMinusF10(r*math.Sqrt(w*n.Blood.Density/n.Blood.Viscosity))
	}
	return series, complex(0, w*area/(n.Blood.Density*speed*speed)) / complex(1, w*n.WallTau)
}

// abcd answers for one harmonic by transmission matrices, recursively:
// [Pin, Qin] = [cosh, Z0 sinh; sinh/Z0, cosh] [Pout, Qout]. It returns the states at
// unit pressure at the outlet scaled to unit pressure at the inlet.
func abcd(n Network, i int, w float64, at map[string]ends) (yin complex128) {
	s := n.Segments[i]
	yl := complex(0, 0)
	daughters := []map[string]ends{}
	for d, other := range n.Segments {
		if other.Parent == s.ID {
			below := map[string]ends{}
			yl += abcd(n, d, w, below)
			daughters = append(daughters, below)
		}
	}
	if t := s.Terminal; t != nil {
		r1 := complex(t.R1, 0)
		if t.Matched {
			r1 = complex(n.Blood.Density*s.Speed(s.Outlet(), n.Blood.Density)/(math.Pi*s.Outlet()*s.Outlet()*unit.DynPerMmHg), 0)
		}
		yl = 1 / (r1 + 1/complex(1/t.R2, w*t.C))
		if math.IsInf(t.R1, 1) {
			yl = 0
		}
	}
	series, parallel := lineOf(n, s, s.Radius, w)
	gamma := cmplx.Sqrt(series * parallel)
	z0 := series / gamma / unit.DynPerMmHg
	cosh, sinh := cmplx.Cosh(gamma*complex(s.Length, 0)), cmplx.Sinh(gamma*complex(s.Length, 0))
	p, q := cosh+z0*sinh*yl, sinh/z0+cosh*yl // at the inlet, for unit pressure at the outlet
	at[s.ID] = ends{1, q / p, 1 / p, yl / p}
	for _, below := range daughters {
		for id, e := range below {
			at[id] = ends{e.pin / p, e.qin / p, e.pout / p, e.qout / p}
		}
	}
	return q / p
}

// anyTree is an invented tree of uniform segments.
func anyTree(t *rapid.T) Network {
	n := Network{
		Blood: Blood{Density: 1.06, Viscosity: rapid.SampledFrom([]float64{0.035, 0.04, 1}).Draw(t, "viscosity")}, OutflowPressure: rapid.Float64Range(0, 20).Draw(t, "Pv"),
		WallTau: rapid.SampledFrom([]float64{0, 0.005}).Draw(t, "tau"), Line: rapid.SampledFrom([]Line{"", Womersley, Poiseuille}).Draw(t, "line"),
	}
	count := rapid.IntRange(1, 12).Draw(t, "count")
	for i := range count {
		s := Segment{
			ID: string(rune('a' + i)), Length: rapid.Float64Range(0.5, 40).Draw(t, "length"), Radius: rapid.Float64Range(0.08, 1.5).Draw(t, "radius"),
			Eh: rapid.Float64Range(1e5, 1e6).Draw(t, "eh"), Poisson: rapid.Float64Range(0, 0.5).Draw(t, "poisson"),
		}
		if i > 0 {
			s.Parent = n.Segments[rapid.IntRange(0, i-1).Draw(t, "parent")].ID
			n.Segments[n.Find(s.Parent)].Terminal = nil
		}
		s.Terminal = &Terminal{R1: rapid.Float64Range(0, 5).Draw(t, "r1"), R2: rapid.Float64Range(0.1, 50).Draw(t, "r2"), C: rapid.Float64Range(0, 1).Draw(t, "c")}
		switch rapid.IntRange(0, 5).Draw(t, "kind") {
		case 0:
			s.Terminal.Matched = true
		case 1:
			if i > 0 {
				s.Terminal.R1 = math.Inf(1)
			}
		}
		n.Segments = append(n.Segments, s)
	}
	for i := range n.Segments { // a parent drawn later has lost its terminal
		for _, s := range n.Segments {
			if s.Parent == n.Segments[i].ID {
				n.Segments[i].Terminal = nil
			}
		}
	}
	return n
}

// Every tree agrees with transmission matrices, conserves flow at its junctions,
// and its balance of power closes.
func TestAnyTreeAgainstMatrices(t *testing.T) {
	flow := beat(41)
	rapid.Check(t, func(t *rapid.T) {
		n := anyTree(t)
		solver, err := NewSolver(n, len(flow.Samples), 0)
		if err != nil {
			t.Fatal(err)
		}
		state, err := solver.Solve(flow)
		if err != nil {
			t.Fatal(err)
		}
		spectrum := flow.Spectrum()
		for k := 1; k <= 20; k++ {
			want := map[string]ends{}
			z := 1 / abcd(n, 0, flow.Omega(k), want)
			if got := state.RootImpedance(k); cmplx.Abs(got-z) > 1e-9*cmplx.Abs(z) {
				t.Fatalf("harmonic %d: impedance %v, by matrices %v", k, got, z)
			}
			for i, s := range n.Segments {
				e := want[s.ID]
				p := z * spectrum[k]
				pin, qin := state.Coefficients(i, Inlet, k)
				pout, qout := state.Coefficients(i, Outlet, k)
				for _, d := range []complex128{pin - e.pin*p, pout - e.pout*p, (qin - e.qin*p) * z, (qout - e.qout*p) * z} {
					if cmplx.Abs(d) > 1e-9*cmplx.Abs(p) {
						t.Fatalf("harmonic %d, segment %s: off by %g of %g mmHg", k, s.ID, cmplx.Abs(d), cmplx.Abs(p))
					}
				}
			}
		}
		if balance := state.Ledger().Balance(); math.IsNaN(state.means[0].pin) != math.IsNaN(balance) || math.Abs(balance) > 1e-11 {
			t.Fatalf("balance %g", balance)
		}
	})
}

// The loss of a segment by its net power is the quadrature of Re Z' |Q|²/2 along it
// (elastic wall), harmonic by harmonic, Q from the waves at the inlet.
func TestLossIsTheQuadrature(t *testing.T) {
	n := tree55(t, false)
	flow := beat(65)
	state := mustSolve(t, n, flow)
	for i, s := range n.Segments {
		want := 0.0
		for k := 1; k <= state.Harmonics(); k++ {
			series, parallel := lineOf(n, s, s.Radius, flow.Omega(k))
			gamma := cmplx.Sqrt(series * parallel)
			z0 := series / gamma / unit.DynPerMmHg
			p, q := state.Coefficients(i, Inlet, k)
			const steps = 400 // Simpson
			for j := 0; j <= steps; j++ {
				x := gamma * complex(s.Length*float64(j)/steps, 0)
				here := 2 * (q*cmplx.Cosh(x) - p/z0*cmplx.Sinh(x)) // amplitude
				weight := s.Length / steps / 3 * []float64{2, 4}[j%2]
				if j == 0 || j == steps {
					weight /= 2
				}
				want += weight * real(series) / unit.DynPerMmHg * square(here) / 2
			}
		}
		got := state.Loss(i).Pulsatile
		if math.Abs(got-want) > 1e-7*want+1e-9 {
			t.Errorf("%s: %.10g by net power, %.10g by quadrature", s.Name, got, want)
		}
		_, q := state.Coefficients(i, Inlet, 0)
		near(t, "steady loss", state.Loss(i).Steady, 8*0.04*s.Length/(math.Pi*math.Pow(s.Radius, 4))/unit.DynPerMmHg*real(q*q), 1e-7)
	}
}

// An evenly tapering tube against the equations of the line, P' = -Z' Q and
// Q' = -Y' P, integrated by Runge-Kutta from its end. Pieces of 2 % are off by the
// square of their length over the wavelength.
func TestTaperAgainstTheLine(t *testing.T) {
	s := Segment{ID: "a", Length: 42.2, Radius: 0.403, RadiusDistal: 0.236, Eh: 2.68e5, Poisson: 0.5, Terminal: &Terminal{R1: 2, R2: 20, C: 0.02}}
	n := Network{Blood: StandardBlood(), Segments: []Segment{s}}
	l := mustLoad(t, n)
	for f, tolerance := range map[float64]float64{1.25: 2e-4, 5: 1.5e-3, 12.5: 3e-3} {
		w := 2 * math.Pi * f
		p := complex(1, 0)
		q := 1 / ((2 + 20/complex(1, w*0.4)) * unit.DynPerMmHg)
		const steps = 2000
		h := complex(-s.Length/steps, 0)
		slope := func(x float64, p, q complex128) (complex128, complex128) {
			series, parallel := lineOf(n, s, s.Radius+(s.RadiusDistal-s.Radius)*x/s.Length, w)
			return -series * q, -parallel * p
		}
		for j := range steps {
			x, dx := s.Length*(1-float64(j)/steps), s.Length/steps
			p1, q1 := slope(x, p, q)
			p2, q2 := slope(x-dx/2, p+h/2*p1, q+h/2*q1)
			p3, q3 := slope(x-dx/2, p+h/2*p2, q+h/2*q2)
			p4, q4 := slope(x-dx, p+h*p3, q+h*q3)
			p += h / 6 * (p1 + 2*p2 + 2*p3 + p4)
			q += h / 6 * (q1 + 2*q2 + 2*q3 + q4)
		}
		want := p / q / unit.DynPerMmHg
		if e := cmplx.Abs(l.Impedance(w)-want) / cmplx.Abs(want); e > tolerance {
			t.Errorf("%g Hz: %v, by integration %v, off by %.1e", f, l.Impedance(w), want, e)
		}
	}
}
