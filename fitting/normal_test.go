package fitting

import (
	"math"
	"math/rand/v2"
	"testing"

	"afterbeat/data"
)

// someMoments are those of a random beat of n samples.
func someMoments(m Model, n int, rng *rand.Rand) *moments {
	flow, pressure := data.Period{Samples: make([]float64, n), Rate: 200}, data.Period{Samples: make([]float64, n), Rate: 200}
	for j := range n {
		flow.Samples[j], pressure.Samples[j] = 80+100*rng.NormFloat64(), 90+20*rng.NormFloat64()
	}
	f := newBeatFit(m, only(flow, pressure))
	return f.moments
}

// The fast normal equations against the columns, and the slopes against
// differences.
func TestNormalEquations(t *testing.T) {
	rng := rand.New(rand.NewPCG(3, 4))
	for _, m := range Models() {
		for _, n := range []int{5, 16, 31, 200} {
			mo := someMoments(m, n, rng)
			for _, tau := range []float64{0.003, 0.1, 1.5, 40} {
				shape := []float64{tau, 0.1 * tau}[:m.Shapes()]
				var fast, slow, up, down normal
				mo.normal(shape, &fast)
				mo.byColumns(shape, &slow)
				for i := range fast.n {
					for j := range fast.n {
						same(t, m.Name, "G", fast.g[i][j], slow.g[i][j], math.Sqrt(slow.g[i][i]*slow.g[j][j]))
						for s := range shape {
							same(t, m.Name, "dG", fast.dg[s][i][j], slow.dg[s][i][j], math.Sqrt(slow.g[i][i]*slow.g[j][j]))
						}
					}
					same(t, m.Name, "b", fast.b[i], slow.b[i], math.Sqrt(slow.g[i][i]*slow.total))
					for s := range shape {
						same(t, m.Name, "db", fast.db[s][i], slow.db[s][i], math.Sqrt(slow.g[i][i]*slow.total))
					}
				}
				for s := range shape {
					const h = 1e-5
					mo.normal(moved(shape, s, math.Exp(h)), &up)
					mo.normal(moved(shape, s, math.Exp(-h)), &down)
					_, high := up.solve()
					_, low := down.solve()
					x, _ := fast.solve()
					if d, got := (high-low)/(2*h), fast.slope(s, x); math.Abs(d-got) > 1e-6*fast.total {
						t.Errorf("%s, n = %d, shape %v: slope %v, difference %v", m.Name, n, shape, got, d)
					}
				}
			}
		}
	}
}

func same(t *testing.T, model, what string, got, want, scale float64) {
	t.Helper()
	if math.Abs(got-want) > 1e-13*scale {
		t.Errorf("%s: %s = %v, want %v", model, what, got, want)
	}
}

// The solution of a non-negative problem is known by its conditions (Karush,
// Kuhn and Tucker): x >= 0, gradient >= 0, and one of the two 0.
func TestSolveMeetsItsConditions(t *testing.T) {
	rng := rand.New(rand.NewPCG(5, 6))
	bound := 0
	for range 2000 {
		e := normal{n: 1 + rng.IntN(3), total: 100}
		var a [5][maxLinear]float64
		for i := range a {
			for j := range e.n {
				a[i][j] = rng.NormFloat64()
			}
		}
		for i := range e.n {
			for j := range e.n {
				for k := range a {
					e.g[i][j] += a[k][i] * a[k][j]
				}
			}
			e.b[i] = rng.NormFloat64()
		}
		x, sum := e.solve()
		value := e.total
		for i := range e.n {
			gradient := -e.b[i]
			for j := range e.n {
				gradient += e.g[i][j] * x[j]
			}
			value += x[i] * (gradient - e.b[i])
			if x[i] < 0 || gradient < -1e-9 || math.Abs(x[i]*gradient) > 1e-9 {
				t.Fatalf("x = %v, gradient %v at %d of %+v", x, gradient, i, e)
			}
			if x[i] == 0 {
				bound++
			}
		}
		if math.Abs(value-sum) > 1e-9 {
			t.Fatalf("sum %v, want %v", sum, value)
		}
	}
	if bound == 0 {
		t.Error("no case touched its bound")
	}
}
