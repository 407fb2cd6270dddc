package fitting

import (
	"fmt"
	"math"
	"strings"
	"testing"

	"afterbeat/data"
)

// Every model gets back what its own periodic response was made of, whatever
// the number of samples.
func TestFitRecoversItsOwnResponse(t *testing.T) {
	for _, m := range Models() {
		for _, n := range []int{16, 17, 31, 32, 97, 160, 171, 200, 211, 500, 857, 1000} {
			if m.Shapes() == 2 && n > 200 {
				continue
			}
			flow := sample(exampleFlow, n, 0.3)
			x, shape := m.Pack(example)
			want := m.Unpack(x, shape)
			r := fit(t, m, only(flow, Respond(Lumped{m, want}, flow, 0)), Settings{})
			near(t, fmt.Sprintf("%s at %d samples", m.Name, n), r.Values, want, 1e-8)
			if r.RMSE > 1e-7 || !r.Converged || !r.Identified() {
				t.Errorf("%s at %d samples: rmse %v, converged %v, identified %v", m.Name, n, r.RMSE, r.Converged, r.Identified())
			}
		}
	}
}

// The worked example from its closed form: off by the difference between the
// half-sine and its trigonometric interpolation, R by 1.5e-4 at 200 samples and
// 2.3e-6 at 1600, as 1/n².
func TestFitOfClosedForm(t *testing.T) {
	for _, name := range []string{"wk2", "wk3"} {
		m := model(t, name)
		x, shape := m.Pack(example)
		want := m.Unpack(x, shape)
		off := map[int]float64{}
		for _, n := range []int{200, 800, 1000, 1600} {
			r := fit(t, m, only(sample(exampleFlow, n, 0), sample(examplePressure[name], n, 0)), Settings{})
			off[n] = math.Abs(r.Values.R/want.R - 1)
			if n == 1000 {
				near(t, name, r.Values, want, 2e-5)
			}
		}
		if off[200] > 1.6e-4 || off[1600] > 2.4e-6 {
			t.Errorf("%s: R off by %v at 200 samples, by %v at 1600", name, off[200], off[1600])
		}
		if ratio := off[200] / off[800]; name == "wk3" && (ratio < 15 || ratio > 17) {
			t.Errorf("%s: error falls by %v from 200 to 800 samples, want 16", name, ratio)
		}
	}
}

// A model fitted to the data of another, at t = (k + 1/2) 5 ms: least squares by
// an independent program on the continuous half-sine. Taken as a trigonometric
// interpolation of 160 samples R moves by up to 1.2e-4 and C by 2.2e-3.
func TestCrossFit(t *testing.T) {
	for _, c := range []struct {
		from, to string
		want     Values
		rms      float64
	}{
		{"wk3", "wk2", Values{R: 1.049335, C: 1.357074}, 6.582753},
		{"wk4p", "wk2", Values{R: 0.999854, C: 2.088122}, 3.851807},
		{"wk4p", "wk3", Values{R: 0.972302, C: 2.210210, Zc: 0.0277220}, 1.198493},
		{"wk4p", "wk4s", Values{R: 0.972792, C: 2.023932, Zc: 0.0272365, L: 0.000500655}, 1.051892},
	} {
		r := fit(t, model(t, c.to), only(sample(exampleFlow, 160, 0.5), sample(examplePressure[c.from], 160, 0.5)), Settings{})
		what := c.from + " fitted by " + c.to
		for _, p := range []struct {
			name      string
			tolerance float64
		}{{"R", 2e-4}, {"C", 2.5e-3}, {"Zc", 6e-4}, {"L", 0.03}} {
			if got, want := r.Values.Of(p.name), c.want.Of(p.name); math.Abs(got-want) > p.tolerance*want {
				t.Errorf("%s: %s = %v, want %v", what, p.name, got, want)
			}
		}
		if math.Abs(r.RMSE/c.rms-1) > 5e-3 { // dQ/dt of the interpolation is another one at the two kinks
			t.Errorf("%s: rmse %v, want %v", what, r.RMSE, c.rms)
		}
	}
}

// The three-element model is the four-element one with L parallel to Zc at R' =
// R + Zc, C' = R C/(R + Zc), L = Zc R C: an exact degeneracy, and a hard test of
// a search over two shapes. Both time constants are R C there, so that the two
// shapes have the same effect and the bottom is flat to fourth order.
func TestDegenerateFourElement(t *testing.T) {
	flow := sample(exampleFlow, 200, 0)
	p := Respond(Lumped{model(t, "wk3"), example}, flow, 0)
	r := fit(t, model(t, "wk4p"), only(flow, p), Settings{})
	if r.RMSE > 1e-6 {
		t.Errorf("rmse %v", r.RMSE)
	}
	near(t, "wk4p on wk3", r.Values, Values{R: 1.05, C: 1.5 / 1.05, Zc: 0.05, L: 0.075}, 3e-4)
	if l, _ := r.Parameter("L"); l.Identified || !strings.Contains(l.Why, "wk3 in disguise") {
		t.Errorf("L of a wk3 in disguise: %+v", l)
	}
	own := fit(t, model(t, "wk4p"), only(flow, Respond(Lumped{model(t, "wk4p"), example}, flow, 0)), Settings{})
	if l, _ := own.Parameter("L"); !l.Identified {
		t.Errorf("L of a wk4p: %+v", l)
	}
}

// Parseval: what the search minimised is the sum of squares over samples.
func TestSumOfSquaresOverBinsAndSamples(t *testing.T) {
	for _, n := range []int{16, 31, 200} {
		for _, m := range Models() {
			b := noisy(n, 1, 7)
			f := newBeatFit(m, b)
			r := f.result()
			if want := float64(n) * f.search.sum; math.Abs(r.SumOfSquares/want-1) > 1e-9 {
				t.Errorf("%s, n = %d: %v over samples, %v over bins", m.Name, n, r.SumOfSquares, want)
			}
			sum := 0.0
			for j, p := range b.Pressure[0] {
				d := p - r.Modelled.Samples[j]
				sum += d * d
			}
			if math.Abs(sum-r.SumOfSquares) > 1e-9*sum {
				t.Errorf("%s, n = %d: stated %v, is %v", m.Name, n, r.SumOfSquares, sum)
			}
		}
	}
}

// Laws of scale: flow 20 % low gives R +25 %, C -20 %, Zc +25 %; a pressure
// scale a gives R a, C/a, Zc a; time alone scales C.
func TestScaleLaws(t *testing.T) {
	for _, m := range Models() {
		b := noisy(171, 1, 8)
		base := fit(t, m, b, Settings{}).Values
		low := b
		low.Flow = scaled(b.Flow, 0.8)
		near(t, m.Name+", flow x 0.8", fit(t, m, low, Settings{}).Values, Values{R: base.R * 1.25, C: base.C * 0.8, Zc: base.Zc * 1.25, L: base.L * 1.25}, 1e-10)
		high := b
		high.Pressure = scaled(b.Pressure, 1.1)
		near(t, m.Name+", pressure x 1.1", fit(t, m, high, Settings{}).Values, Values{R: base.R * 1.1, C: base.C / 1.1, Zc: base.Zc * 1.1, L: base.L * 1.1}, 1e-10)
		fast := b
		fast.Rate *= 2
		near(t, m.Name+", twice as fast", fit(t, m, fast, Settings{}).Values, Values{R: base.R, C: base.C / 2, Zc: base.Zc, L: base.L / 2}, 1e-10)
		above := b
		above.OutflowPressure = 10
		above.Pressure = moveAll(b.Pressure, 10)
		near(t, m.Name+", all 10 mmHg higher", fit(t, m, above, Settings{}).Values, base, 1e-9)
	}
}

func scaled(beats [][]float64, by float64) [][]float64 {
	return mapped(beats, func(v float64) float64 { return v * by })
}

func moveAll(beats [][]float64, by float64) [][]float64 {
	return mapped(beats, func(v float64) float64 { return v + by })
}

func mapped(beats [][]float64, f func(float64) float64) [][]float64 {
	out := make([][]float64, len(beats))
	for i, beat := range beats {
		for _, v := range beat {
			out[i] = append(out[i], f(v))
		}
	}
	return out
}

func TestRefusedBeats(t *testing.T) {
	flow := sample(exampleFlow, 20, 0)
	good := only(flow, flow)
	for name, spoil := range map[string]func(*Beats){
		"no beats":        func(b *Beats) { b.Flow, b.Pressure = nil, nil },
		"unequal counts":  func(b *Beats) { b.Flow = append(b.Flow, b.Flow[0]) },
		"unequal lengths": func(b *Beats) { b.Flow = [][]float64{flow.Samples[1:]} },
		"too short":       func(b *Beats) { b.Flow, b.Pressure = [][]float64{{1, 2}}, [][]float64{{1, 2}} },
		"no number":       func(b *Beats) { b.Flow = mapped(b.Flow, func(float64) float64 { return math.NaN() }) },
		"no rate":         func(b *Beats) { b.Rate = 0 },
		"negative error":  func(b *Beats) { b.Systematic.Flow = -1 },
	} {
		b := good
		spoil(&b)
		if _, err := FitBeat(t.Context(), model(t, "wk2"), b, Settings{}); err == nil {
			t.Errorf("%s: no error", name)
		}
	}
	if _, err := FitBeat(t.Context(), model(t, "wk2"), good, Settings{}); err != nil {
		t.Errorf("good beats: %v", err)
	}
}

func TestSiteAndUnitsOfAResult(t *testing.T) {
	b := noisy(50, 1, 9)
	b.Site, b.PerArea = data.SiteMCA, true
	r := fit(t, model(t, "wk3"), b, Settings{})
	if r.Site != data.SiteMCA || r.Basis != BasisBeat || r.Parameters[0].Unit != "mmHg s/cm" || r.Parameters[1].Unit != "cm/mmHg" {
		t.Errorf("site %q, basis %q, parameters %+v", r.Site, r.Basis, r.Parameters)
	}
}
