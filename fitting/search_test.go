package fitting

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/optimize"

	"afterbeat/data"
)

// oneBeat is a beat with random spectra, in no way like a pulse; every other one
// has an impedance that a passive load could have.
func oneBeat(rng *rand.Rand, passive bool) Beats {
	n := 8 + rng.IntN(60)
	q, p := make([]complex128, n/2+1), make([]complex128, n/2+1)
	a, b := 3*rng.Float64(), 3*rng.Float64()
	for k := range q {
		q[k] = complex(math.Pow(float64(k)+0.5, -a), 0) * complex(rng.NormFloat64(), rng.NormFloat64())
		p[k] = complex(math.Pow(float64(k)+0.5, -b), 0) * complex(rng.NormFloat64(), rng.NormFloat64())
		if passive {
			p[k] = q[k] * complex(math.Abs(real(p[k])), -math.Abs(imag(p[k])))
		}
	}
	q[0], p[0] = complex(math.Abs(real(q[0])), 0), complex(math.Abs(real(p[0])), 0)
	return only(data.FromSpectrum(q, n, 50), data.FromSpectrum(p, n, 50))
}

// Against a dense grid over the whole range: no valley is missed, also where
// there are two.
func TestSearchIsGlobal(t *testing.T) {
	rng := rand.New(rand.NewPCG(9, 9))
	const steps = 1000
	several := 0
	for trial := range 1500 {
		f := newBeatFit(Models()[trial%2], oneBeat(rng, trial%4 < 2))
		s, found := f.search, f.search.sum
		sums := make([]float64, steps+1)
		for i := range sums {
			sums[i] = s.at(0, s.low[0]+(s.high[0]-s.low[0])*float64(i)/steps).sum
			if sums[i] < found-1e-6*s.equations.total {
				t.Fatalf("trial %d: found %v, the grid has %v at shape %v", trial, found, sums[i], s.shape[0])
			}
		}
		valleys := 0
		for i := 1; i < steps; i++ {
			if margin := 1e-12 * s.equations.total; sums[i] < sums[i-1]-margin && sums[i] < sums[i+1]-margin {
				valleys++
			}
		}
		if valleys > 1 {
			several++
		}
	}
	if several == 0 {
		t.Error("no trial had more than one valley")
	}
}

// A wholly different way to the same minimum: the differential equation stepped
// by Runge and Kutta's method over the continuous half-sine, a grid over all
// three parameters, and a simplex. The data are those of a four-element model
// with noise, so that the residual is not small. The two take flow between
// samples differently, which moves parameters by 1/n² (2e-5 at 1000 samples).
func TestAgainstBruteForce(t *testing.T) {
	const n = 1000
	rng := rand.New(rand.NewPCG(10, 1))
	pressure := sample(examplePressure["wk4p"], n, 0)
	for j := range pressure.Samples {
		pressure.Samples[j] += 4 + rng.NormFloat64()
	}
	b := only(sample(exampleFlow, n, 0), pressure)
	b.OutflowPressure = 4
	got := fit(t, model(t, "wk3"), b, Settings{})

	squares := func(x []float64) float64 {
		r, c, zc := math.Exp(x[0]), math.Exp(x[1]), math.Exp(x[2])
		sum, pd := 0.0, stepped(r, c, n)
		for j, p := range pressure.Samples {
			d := 4 + pd[j] + zc*exampleFlow(float64(j)*exampleT/n) - p
			sum += d * d
		}
		return sum
	}
	best, at := math.Inf(1), []float64{0, 0, 0}
	for r := 0.5; r < 2; r *= 1.3 {
		for c := 0.3; c < 6; c *= 1.4 {
			for zc := 0.005; zc < 0.3; zc *= 1.7 {
				if x := []float64{math.Log(r), math.Log(c), math.Log(zc)}; squares(x) < best {
					best, at = squares(x), x
				}
			}
		}
	}
	result, err := optimize.Minimize(optimize.Problem{Func: squares}, at,
		&optimize.Settings{Converger: &optimize.FunctionConverge{Relative: 1e-13, Iterations: 200}}, &optimize.NelderMead{})
	if err != nil {
		t.Fatal(err)
	}
	want := Values{R: math.Exp(result.X[0]), C: math.Exp(result.X[1]), Zc: math.Exp(result.X[2])}
	near(t, "simplex", got.Values, want, 1e-4)
	if math.Abs(got.SumOfSquares/result.F-1) > 1e-4 {
		t.Errorf("sum of squares %v, by the simplex %v", got.SumOfSquares, result.F)
	}
}

// stepped is the periodic Pd of C dPd/dt = Q - Pd/R at n samples: one period from
// rest, and the decaying start that closes it.
func stepped(r, c float64, n int) []float64 {
	h, p := exampleT/float64(n), 0.0
	rate := func(t, p float64) float64 { return (exampleFlow(t) - p/r) / c }
	out := make([]float64, n)
	for j := range out {
		out[j] = p
		t := float64(j) * h
		k1 := rate(t, p)
		k2 := rate(t+h/2, p+h/2*k1)
		k3 := rate(t+h/2, p+h/2*k2)
		k4 := rate(t+h, p+h*k3)
		p += h / 6 * (k1 + 2*k2 + 2*k3 + k4)
	}
	start := p / (1 - math.Exp(-exampleT/(r*c)))
	for j := range out {
		out[j] += start * math.Exp(-float64(j)*h/(r*c))
	}
	return out
}
