package fitting

import (
	"math"
	"math/rand/v2"
	"testing"
)

// forward is the pressure above Pv of a model on a run, from its parameters and
// free values, by the recursion written out for each model.
func forward(m Model, v Values, pd, ql float64, flow []float64, rate float64) []float64 {
	h := 1 / rate
	out := make([]float64, len(flow))
	linear := func(y, tau, q0, q1 float64) float64 { // exact for linear flow
		a := math.Exp(-h / tau)
		slope := (q1 - q0) / h
		return a*y + (1-a)*(q0-slope*tau) + slope*h
	}
	for j, q := range flow {
		if j > 0 {
			pd = v.R * linear(pd/v.R, v.R*v.C, flow[j-1], q)
		}
		out[j] = pd
		switch m.Name {
		case "wk3":
			out[j] += v.Zc * q
		case "wk4s":
			before, after := max(0, j-1), min(len(flow)-1, j+1)
			out[j] += v.Zc*q + v.L*(flow[after]-flow[before])/(float64(after-before)*h)
		case "wk4p":
			if j > 0 {
				ql = linear(ql, v.L/v.Zc, flow[j-1], q)
			}
			out[j] += v.Zc * (q - ql)
		}
	}
	return out
}

// someSpan has runs of the worked example's beats with a stroke volume that
// varies, and free values that fit no periodic state; noise in mmHg.
func someSpan(m Model, v Values, n int, runs []int, noise float64, rng *rand.Rand) Span {
	s := Span{Beats: Beats{Rate: float64(n) / exampleT, OutflowMeasured: true}}
	one := sample(exampleFlow, n, 0.3)
	for i, beats := range runs {
		var r Run
		for k := range beats {
			r.Onsets = append(r.Onsets, k*n)
			amplitude := 1 + 0.04*rng.NormFloat64()
			for _, q := range one.Samples {
				r.Flow = append(r.Flow, amplitude*q)
			}
		}
		r.Onsets = append(r.Onsets, beats*n)
		r.Flow = append(r.Flow, one.Samples[0])
		r.Pressure = forward(m, v, 60+10*float64(i), 30-5*float64(i), r.Flow, s.Rate)
		for j := range r.Pressure {
			r.Pressure[j] += noise * rng.NormFloat64()
		}
		for k, from := range r.Onsets[:beats] {
			s.Flow = append(s.Flow, r.Flow[from:r.Onsets[k+1]])
			s.Pressure = append(s.Pressure, r.Pressure[from:r.Onsets[k+1]])
		}
		s.Runs = append(s.Runs, r)
	}
	return s
}

// The reduced sum of squares against plain least squares over all samples, and
// its slopes against differences.
func TestSpanNormalEquations(t *testing.T) {
	rng := rand.New(rand.NewPCG(21, 1))
	for _, m := range Models() {
		s := someSpan(m, example, 40, []int{3, 1, 20}, 2, rng)
		p := newSpanMoments(m, s)
		for _, tau := range []float64{0.03, 0.4, 1.5, 60} {
			shape := []float64{tau, 0.13 * tau}[:m.Shapes()]
			var e, up, down normal
			p.normal(shape, &e)
			if x, gain, ok := e.stationary(1<<e.n - 1); ok {
				want := plainSum(p, m, shape)
				if got := e.total - gain; math.Abs(got-want) > 1e-9*p.total {
					t.Errorf("%s at %v: sum %v, plainly %v (x = %v)", m.Name, shape, got, want, x)
				}
			}
			x, _ := e.solve()
			for i := range shape {
				const h = 1e-4
				p.normal(moved(shape, i, math.Exp(h)), &up)
				p.normal(moved(shape, i, math.Exp(-h)), &down)
				_, high := up.solve()
				_, low := down.solve()
				if d, got := (high-low)/(2*h), e.slope(i, x); math.Abs(d-got) > 1e-6*(math.Abs(d)+1e-3*p.total) {
					t.Errorf("%s, shape %v: slope %d is %v, difference %v", m.Name, shape, i, got, d)
				}
			}
		}
	}
}

// plainSum is the smallest sum of squares over all samples with the columns and
// beginnings written out, by Householder's method.
func plainSum(p *spanMoments, m Model, shape []float64) float64 {
	var columns [][]float64
	var pressure []float64
	for range m.Linear() + len(p.runs)*p.shapes {
		columns = append(columns, make([]float64, p.samples))
	}
	at := 0
	for i, r := range p.runs {
		for j := range r.flow {
			for k, e := range m.Elements() {
				v := e.Direct * r.flow[j]
				if e.Rise != 0 {
					v += e.Rise * r.rise[j]
				}
				if e.Relaxed != 0 {
					v += e.Relaxed * relaxedPlainly(r.flow[:j+1], p.h, shape[e.Shape])
				}
				columns[k][at+j] = v
			}
			for a, tau := range shape {
				columns[m.Linear()+i*p.shapes+a][at+j] = math.Exp(-float64(j) * p.h / tau)
			}
		}
		pressure, at = append(pressure, r.pressure...), at+len(r.flow)
	}
	return leftOver(columns, pressure)
}

// relaxedPlainly is the response from rest at the last sample, term by term.
func relaxedPlainly(flow []float64, h, tau float64) float64 {
	y := 0.0
	a := math.Exp(-h / tau)
	for j := 1; j < len(flow); j++ {
		slope := (flow[j] - flow[j-1]) / h
		y = a*y + (1-a)*(flow[j-1]-slope*tau) + slope*h
	}
	return y
}

// leftOver is what the columns leave of b, squared: modified Gram and Schmidt,
// twice.
func leftOver(columns [][]float64, b []float64) float64 {
	b = append([]float64(nil), b...)
	var basis [][]float64
	for _, c := range append(columns, b) {
		v := append([]float64(nil), c...)
		before := norm2(v)
		for range 2 {
			for _, q := range basis {
				d := 0.0
				for j := range v {
					d += q[j] * v[j]
				}
				for j := range v {
					v[j] -= d * q[j]
				}
			}
		}
		if len(basis) == len(columns) {
			return norm2(v)
		}
		n := norm2(v)
		if n > 1e-24*before {
			for j := range v {
				v[j] /= math.Sqrt(n)
			}
		}
		basis = append(basis, v)
	}
	return 0
}

func norm2(v []float64) float64 {
	sum := 0.0
	for _, x := range v {
		sum += x * x
	}
	return sum
}

// The recursion's coefficients at both ends of its series, and their derivatives.
func TestStepping(t *testing.T) {
	for _, z := range []float64{1e-7, 1e-3, 0.29, 0.3, 0.31, 2, 40, 1000} {
		s, up, down := newStepping(z, 1), newStepping(z, math.Exp(1e-5)), newStepping(z, math.Exp(-1e-5))
		if sum := s.decay + s.here + s.next; math.Abs(sum-1) > 1e-15 {
			t.Errorf("z = %v: a steady flow is relaxed to %v of itself", z, sum)
		}
		for _, c := range [][4]float64{{s.dDecay, up.decay, down.decay, z}, {s.dHere, up.here, down.here, z}, {s.dNext, up.next, down.next, z}} {
			if d := (c[1] - c[2]) / 2e-5; math.Abs(d-c[0]) > 1e-8*math.Min(1, z)+1e-11 {
				t.Errorf("z = %v: derivative %v, difference %v", z, c[0], d)
			}
		}
	}
	here, next := smallStep(0.3)
	phi := -math.Expm1(-0.3) / 0.3
	if math.Abs(here-(phi-math.Exp(-0.3))) > 1e-15 || math.Abs(next-(1-phi)) > 1e-15 {
		t.Errorf("series %v, %v", here, next)
	}
}

// Every model gets back what its own span was made of, initial values free.
func TestSpanRecoversItsOwnRuns(t *testing.T) {
	rng := rand.New(rand.NewPCG(22, 1))
	for _, m := range Models() {
		s := someSpan(m, example, 100, []int{5, 1, 8}, 0, rng)
		x, shape := m.Pack(example)
		p := newSpanMoments(m, s)
		f := newSpanSearch(p, exampleT)
		f.run()
		near(t, m.Name, m.Unpack(f.x[:m.Linear()], f.shape[:m.Shapes()]), m.Unpack(x, shape), 1e-8)
		t.Log(m.Name, f.evaluations)
	}
}
