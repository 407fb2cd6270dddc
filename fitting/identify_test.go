package fitting

import (
	"math"
	"math/rand/v2"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"afterbeat/data"
)

// repeat is the same beat a number of times.
func repeat(b Beats, times int) Beats {
	for range times - 1 {
		b.Flow, b.Pressure = append(b.Flow, b.Flow[0]), append(b.Pressure, b.Pressure[0])
	}
	return b
}

// What the data cannot carry is said, by name, and never as a plain number.
func TestWhatIsNotIdentified(t *testing.T) {
	flat := func(v float64) data.Period { return sample(func(float64) float64 { return v }, 100, 0) }
	flow := sample(exampleFlow, 100, 0)
	two := Respond(Lumped{model(t, "wk2"), example}, flow, 0)
	inverted := data.Period{Samples: scaled([][]float64{flow.Samples}, -1)[0], Rate: flow.Rate}
	for _, c := range []struct {
		name           string
		flow, pressure data.Period
		pv             float64
		lost           string // parameters of wk3
		why            string // of the first of them
		warning        data.Code
	}{
		{"no flow", flat(0), two, 0, "R C Zc", "end of its range", data.CodeNegativeFlow},
		{"steady flow and pressure", flat(80), flat(90), 0, "C Zc", "no pulse", data.CodeNotIdentified},
		{"steady pressure under a pulse", flow, flat(90), 0, "C Zc", "end of the range", data.CodeNotIdentified},
		{"inverted flow", inverted, two, 0, "R C Zc", "end of its range", data.CodeNegativeFlow},
		{"outflow pressure above pressure", flow, two, 300, "R C Zc", "end of its range", data.CodeMisfit},
		{"pressure follows flow", flow, data.Period{Samples: scaled([][]float64{flow.Samples}, 0.4)[0], Rate: flow.Rate}, 0, "C", "", data.CodeNotIdentified},
	} {
		for _, times := range []int{1, 3, 12} {
			b := repeat(only(c.flow, c.pressure), times)
			b.OutflowPressure = c.pv
			r := fit(t, model(t, "wk3"), b, Settings{Replicates: 50})
			var lost []string
			var why string
			for _, p := range r.Parameters {
				if !p.Identified {
					lost = append(lost, p.Name)
					if len(lost) == 1 {
						why = p.Why
					}
				}
			}
			text := strings.Join(lost, " ")
			if !strings.Contains(text, c.lost) && text != c.lost || !strings.Contains(why, c.why) || !hasWarning(r, c.warning) {
				t.Errorf("%s, %d beats: not identified %q (%s), warnings %v; values %+v", c.name, times, text, why, r.Warnings, r.Values)
			}
		}
	}
}

// A load without Zc: its fit is on the bound or within its noise of it, says so,
// and the simpler model is recommended for that reason.
func TestZcOfATwoElementLoad(t *testing.T) {
	two, three := model(t, "wk2"), model(t, "wk3")
	for seed := range uint64(8) {
		b := generateFrom(Lumped{two, example}, 24, 160, 1, rand.New(rand.NewPCG(seed, 13)))
		r := fit(t, three, b, Settings{Replicates: 200})
		zc, _ := r.Parameter("Zc")
		if zc.Identified || zc.Why == "" || !hasWarning(r, data.CodeNotIdentified) {
			t.Errorf("seed %d: Zc %+v", seed, zc)
		}
		rec := Recommend([]Result{fit(t, two, b, Settings{Replicates: 200}), r})
		if rec.Model != "wk2" || !strings.Contains(rec.Why, "Zc of wk3 is not identified") {
			t.Errorf("seed %d: %+v", seed, rec)
		}
	}
}

// Whatever finite numbers come in: no panic, and nothing identified that is not
// a number.
func TestAnyFiniteInput(t *testing.T) {
	value := rapid.OneOf(
		rapid.Float64Range(-200, 400),
		rapid.SampledFrom([]float64{0, 1, -1, 1e-300, 1e300, -1e300, 1e154, math.MaxFloat64, math.SmallestNonzeroFloat64}),
	)
	rapid.Check(t, func(t *rapid.T) {
		n, beats := rapid.IntRange(shortest, 24).Draw(t, "samples"), rapid.SampledFrom([]int{1, 2, 3, 8, 9}).Draw(t, "beats")
		b := Beats{Rate: rapid.SampledFrom([]float64{1e-3, 20, 1000}).Draw(t, "rate"), OutflowPressure: value.Draw(t, "pv"), Systematic: someErrors}
		same := rapid.Bool().Draw(t, "same")
		for i := range beats {
			if i > 0 && same {
				b = repeat(b, 2)
				continue
			}
			b.Flow = append(b.Flow, rapid.SliceOfN(value, n, n).Draw(t, "flow"))
			b.Pressure = append(b.Pressure, rapid.SliceOfN(value, n, n).Draw(t, "pressure"))
		}
		for _, m := range Models() {
			r, err := FitBeat(t.Context(), m, b, Settings{Replicates: 20})
			if err != nil {
				t.Fatal(err)
			}
			for _, e := range append(r.Parameters, Parameter{Name: "Z(0)", Estimate: r.TotalResistance}) {
				if e.Identified && (!finite(e.Value) || e.Value < 0) {
					t.Fatalf("%s: %s = %v is called identified", m.Name, e.Name, e.Value)
				}
				if e.Identified && r.IntervalMethod != IntervalNone && !(e.Random.Defined() && e.Total.Defined()) {
					t.Fatalf("%s: %s = %v identified without an interval", m.Name, e.Name, e.Value)
				}
				if !e.Identified && e.Why == "" {
					t.Fatalf("%s: %s is not identified and nobody says why", m.Name, e.Name)
				}
			}
		}
	})
}
