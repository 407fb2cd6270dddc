package fitting

import (
	"math"
	"testing"

	"afterbeat/data"
)

// Against data.Period's own transforms.
func TestRespondIsTheSpectrumTimesZ(t *testing.T) {
	for _, n := range []int{1, 2, 7, 16, 200, 211, 857} {
		for _, m := range Models() {
			flow := sample(exampleFlow, n, 0.3)
			l := Lumped{Model: m, Values: example}
			got := Respond(l, flow, 4)
			x := flow.Spectrum()
			for k := range x {
				x[k] *= l.Impedance(flow.Omega(k))
			}
			x[0] += 4
			want := data.FromSpectrum(x, n, flow.Rate)
			for j := range want.Samples {
				if math.Abs(got.Samples[j]-want.Samples[j]) > 1e-9 {
					t.Fatalf("%s, n = %d, sample %d: %v, want %v", m.Name, n, j, got.Samples[j], want.Samples[j])
				}
			}
			if got.Rate != flow.Rate {
				t.Errorf("rate %v, want %v", got.Rate, flow.Rate)
			}
		}
	}
}

// Against the closed form of the half-sine, which the trigonometric
// interpolation approaches as 1/n².
func TestRespondApproachesClosedForm(t *testing.T) {
	for _, name := range []string{"wk2", "wk3"} {
		l := Lumped{Model: model(t, name), Values: example}
		worst := func(n int) float64 {
			got, want, worst := Respond(l, sample(exampleFlow, n, 0), 0), sample(examplePressure[name], n, 0), 0.0
			for j := range want.Samples {
				worst = max(worst, math.Abs(got.Samples[j]-want.Samples[j]))
			}
			return worst
		}
		coarse, fine := worst(200), worst(800)
		if fine > 2e-3 || coarse/fine < 14 || coarse/fine > 18 {
			t.Errorf("%s: off by %v at 200 samples, by %v at 800; want a 16th", name, coarse, fine)
		}
	}
}

func TestResponderAllocatesNothing(t *testing.T) {
	flow := sample(exampleFlow, 200, 0)
	r := NewResponder(200, flow.Rate)
	var l Load = Lumped{Model: model(t, "wk3"), Values: example}
	dst := make([]float64, 200)
	if got := testing.AllocsPerRun(10, func() { r.Respond(dst, l, flow.Samples, 3) }); got != 0 {
		t.Errorf("%v allocations", got)
	}
}
