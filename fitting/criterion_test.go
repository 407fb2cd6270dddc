package fitting

import (
	"math"
	"strings"
	"testing"

	"afterbeat/data"
)

// Beats whose flow has five harmonics, of which the last scatters by half its
// size: four count, n = 9, and the formulas of Hurvich and Tsai and of Schwarz
// follow by hand.
func TestCriteria(t *testing.T) {
	const n, beats = 64, 10
	b := Beats{Rate: 80}
	for i := range beats {
		q, p := data.Period{Samples: make([]float64, n)}, make([]float64, n)
		for j := range n {
			a := 2 * math.Pi * float64(j) / n
			for k := 1.0; k <= 5; k++ {
				amplitude := 10.0
				if k == 5 {
					amplitude = 2 * (1 + 0.5*float64(1-i%2*2))
				}
				q.Samples[j] += amplitude * math.Cos(k*a)
			}
			q.Samples[j] += 80
			p[j] = 90 + 5*math.Cos(a-1) + math.Sin(7*a)
		}
		b.Flow, b.Pressure = append(b.Flow, q.Samples), append(b.Pressure, p)
	}
	for _, m := range Models() {
		r := fit(t, m, b, Settings{Replicates: 20})
		k := float64(len(r.Parameters) + 1)
		aicc := 9*math.Log(r.SumOfSquares/n) + 2*k + 2*k*(k+1)/(9-k-1)
		bic := 9*math.Log(r.SumOfSquares/n) + k*math.Log(9)
		if math.Abs(r.AICc-aicc) > 1e-9 || math.Abs(r.BIC-bic) > 1e-9 || r.CriterionReason != "" {
			t.Errorf("%s: AICc %v, BIC %v, want %v, %v (%s)", m.Name, r.AICc, r.BIC, aicc, bic, r.CriterionReason)
		}
	}
}

// Two harmonics, n = 5, do not carry the four unknowns of wk3 and its variance.
func TestCriteriaWithTooFewHarmonics(t *testing.T) {
	b := Beats{Rate: 40}
	for i := range 3 {
		q, p := make([]float64, 32), make([]float64, 32)
		for j := range q {
			a := 2 * math.Pi * float64(j) / 32
			q[j], p[j] = 80+30*math.Cos(a)+10*math.Cos(2*a), 90+5*math.Cos(a-1)+0.1*float64(i)
		}
		b.Flow, b.Pressure = append(b.Flow, q), append(b.Pressure, p)
	}
	r := fit(t, model(t, "wk3"), b, Settings{Replicates: 20})
	if !math.IsNaN(r.AICc) || !math.IsNaN(r.BIC) || !strings.Contains(r.CriterionReason, "2 harmonics") {
		t.Errorf("AICc %v, reason %q", r.AICc, r.CriterionReason)
	}
	if r := fit(t, model(t, "wk2"), b, Settings{Replicates: 20}); math.IsNaN(r.AICc) {
		t.Errorf("wk2: %s", r.CriterionReason)
	}
}
