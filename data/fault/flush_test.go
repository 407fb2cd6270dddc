package fault

import (
	"fmt"
	"math"
	"math/rand/v2"
	"path/filepath"
	"strings"
	"testing"

	"afterbeat/data"
	"afterbeat/data/unit"
)

// throughLine passes a trace of an artery, with flushes put in, through a line: the
// differential equation of [Response], integrated in 16 steps of the fourth-order
// Runge-Kutta method a sample. Independent of what is tested, which uses its solution.
func throughLine(pressure func(t float64) float64, rate, seconds float64, line Response) []float64 {
	w := 2 * math.Pi * line.Natural
	x, v := pressure(0), 0.0
	rates := func(t, x, v float64) (float64, float64) {
		return v, w*w*(pressure(t)-x) - 2*line.Damping*w*v
	}
	const steps = 16
	h := 1 / rate / steps
	var out []float64
	for i := range int(rate * seconds) {
		out = append(out, x)
		for k := range steps {
			t := float64(i)/rate + float64(k)*h
			x1, v1 := rates(t, x, v)
			x2, v2 := rates(t+h/2, x+h/2*x1, v+h/2*v1)
			x3, v3 := rates(t+h/2, x+h/2*x2, v+h/2*v2)
			x4, v4 := rates(t+h, x+h*x3, v+h*v3)
			x += h / 6 * (x1 + 2*x2 + 2*x3 + x4)
			v += h / 6 * (v1 + 2*v2 + 2*v3 + v4)
		}
	}
	return out
}

// artery is a pulse with an upstroke, a notch and breathing, 1.2 beats a second.
func artery(t float64) float64 {
	beat := math.Mod(1.2*t+0.02*math.Sin(2*math.Pi*0.25*t), 1)
	p := 75 + 3*math.Sin(2*math.Pi*0.25*t)
	p += 42 * math.Exp(-math.Pow((beat-0.2)/0.09, 2))
	p += 18 * math.Exp(-math.Pow((beat-0.45)/0.12, 2))
	return p
}

func TestFastFlush(t *testing.T) {
	rng := rand.New(rand.NewPCG(5, 6))
	for _, c := range []struct {
		line  Response
		rates []float64
	}{
		{Response{5, 0.2}, []float64{125, 250, 1000}},
		{Response{8, 0.1}, []float64{125, 1000}},
		{Response{8, 0.6}, []float64{200, 1000}},
		{Response{12, 0.3}, []float64{125, 250, 1000}},
		{Response{15, 0.15}, []float64{125, 500}},
		{Response{20, 0.45}, []float64{250, 1000}},
		{Response{25, 0.25}, []float64{125, 500}},
		{Response{35, 0.3}, []float64{250, 1000}},
		{Response{6, 0.9}, []float64{250, 1000}},
	} {
		for _, rate := range c.rates {
			for noise, at := range map[float64]float64{0: 10, 1: 10.35} { // two places within a beat
				flushed := func(t float64) float64 {
					if t > at && t < at+1.3 {
						return 300
					}
					return artery(t)
				}
				trace := Trace{Rate: rate, Quantity: unit.Pressure, Unit: "mmHg", Values: throughLine(flushed, rate, 25, c.line)}
				for i := range trace.Values {
					trace.Values[i] = math.Round(10*(trace.Values[i]+noise*rng.NormFloat64())) / 10
				}
				name := fmt.Sprintf("%g Hz, %g, at %g Hz, noise %g, %g s", c.line.Natural, c.line.Damping, rate, noise, at)
				runs := trace.flushes(measure(trace.Values, rate))
				if len(runs) != 1 {
					t.Errorf("%s: %d flushes", name, len(runs))
					continue
				}
				got, ok := trace.response(runs[0], runs)
				if !ok || math.Abs(got.Natural/c.line.Natural-1) > 0.05 || math.Abs(got.Damping-c.line.Damping) > 0.05 {
					t.Errorf("%s: %v %+v", name, ok, got)
				}
			}
		}
	}
}

// A line of 8 Hz and 0.2 rings; one of 25 Hz and 0.25 is good; a line of a gain within
// 10 % up to f has |1/(1 - u² + 2 i zeta u)| = 1.1 there.
func TestWordsOfALine(t *testing.T) {
	ringing, _ := Response{8, 0.2}.words(1)
	good, _ := Response{30, 0.3}.words(2)
	damped, _ := Response{5, 1.1}.words(1)
	for words, want := range map[string]string{ringing: "it rings", good: "enough for a pulse", damped: "it is damped"} {
		if !strings.Contains(words, want) {
			t.Errorf("%q lacks %q", words, want)
		}
	}
	u := Response{8, 0.2}.Flat() / 8
	if g := 1 / math.Hypot(1-u*u, 0.4*u); math.Abs(g-1.1) > 0.001 {
		t.Errorf("gain %v at the end of the flat part", g)
	}
}

func TestFlushIsLeftOutAndSpokenOf(t *testing.T) {
	flushed := func(t float64) float64 {
		if t > 10 && t < 11.3 {
			return 300
		}
		return artery(t)
	}
	trace := Trace{Rate: 250, Quantity: unit.Pressure, Unit: "mmHg", Values: throughLine(flushed, 250, 25, Response{9, 0.2})}
	for i, v := range trace.Values {
		trace.Values[i] = math.Round(10*v) / 10
	}
	f := only(t, "flush", Find(trace), data.CodeLine)
	if len(f.Runs) != 1 || !f.Unusable || f.Runs[0].From > 2500 || f.Runs[0].To < 2900 {
		t.Errorf("%+v", f)
	}
}

func TestNoFlushInRecordings(t *testing.T) {
	for _, file := range []string{"icu_low_30s.csv", "icu_premature_30s.csv", "icu_pap_16s.csv", "pig_20s.csv", "tcd_6s.csv"} {
		_, all := channels(t, filepath.Join(excerpts, file))
		for _, trace := range all {
			if runs := trace.flushes(measure(trace.Values, trace.Rate)); len(runs) > 0 {
				t.Errorf("%s, %s: %+v", file, trace.Name, runs)
			}
		}
	}
}
