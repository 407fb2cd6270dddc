package study

import (
	"math"
	"os"
	"strings"
	"testing"

	"afterbeat/data"
	"afterbeat/data/casefile"
)

// firstOrder is the half-sine flow after a first-order filter with a corner at fc, Hz;
// it has to be asked at rising times.
func firstOrder(fc float64) func(float64) float64 {
	y, last := halfFlow(0), 0.0
	return func(at float64) float64 {
		const steps = 20
		h := (at - last) / steps
		for i := range steps {
			y += (halfFlow(last+h*float64(i)) - y) * (1 - math.Exp(-2*math.Pi*fc*h))
		}
		last = at
		return y
	}
}

// A flow behind a filter that delays is told from one without; a delay comes out as
// one. By 7 Hz a first-order filter of 5 Hz delays by atan(7/5)/(2 pi 7) = 21 ms.
func TestFilteredFlow(t *testing.T) {
	for _, c := range []struct {
		name string
		flow func(float64) float64
		want bool
	}{
		{"as it is", halfFlow, false},
		{"10 Hz", firstOrder(10), true},
		{"5 Hz", firstOrder(5), true},
		{"40 Hz", firstOrder(40), false},
		{"20 ms late", func(at float64) float64 { return halfFlow(at - 0.02 + halfT) }, true},
	} {
		s, err := try(inventedCase(), invented(aortic("ao_mmHg"), column{"ao_flow_mL_s", noisy(c.flow, 1)}), StageBeats)
		if err != nil {
			t.Fatal(err)
		}
		w, ok := warned(s, data.CodeFiltered)
		if ok != c.want || ok && !strings.Contains(w.Text, "Zc 23 %") {
			t.Errorf("%s: %v %+v", c.name, ok, w)
		}
	}
	if w, ok := warned(demoWith(t, func(*casefile.Case) {}), data.CodeFiltered); ok {
		t.Errorf("the demo: %+v", w)
	}
}

// The publishers of the bench filtered its flow at 10 Hz and its pressure at 55 Hz.
func TestFlowOfTheBenchWasFiltered(t *testing.T) {
	in, err := Read(casefile.Case{Recording: "testdata/bench_10s.csv"}, os.ReadFile)
	if err != nil {
		t.Fatal(err)
	}
	s, err := Run(t.Context(), in, StageBeats)
	if err != nil {
		t.Fatal(err)
	}
	if w, ok := warned(s, data.CodeFiltered); !ok || !strings.Contains(w.Text, "falls off faster than the pressure") {
		t.Errorf("%v %+v", ok, w)
	}
	if w, ok := warned(s, data.CodeLine); !ok || !strings.Contains(w.Text, "unknown") {
		t.Errorf("the line: %v %+v", ok, w)
	}
}

// A pressure with a flush in it has its line; the samples of the flush are in no beat.
func TestLineFromAFlush(t *testing.T) {
	flushed := func(at float64) float64 {
		const from, to, natural, z = 5.0, 6.5, 9.0, 0.25
		w := 2 * math.Pi * natural
		d := w * math.Sqrt(1-z*z)
		switch {
		case at > from && at <= to:
			return 300
		case at > to:
			s := math.Exp(-z*w*(at-to)) * (math.Cos(d*(at-to)) + z*w/d*math.Sin(d*(at-to)))
			return halfPressure(at) + (300-halfPressure(to))*s
		}
		return halfPressure(at)
	}
	s, err := try(inventedCase(), invented(column{"ao_mmHg", noisy(flushed, 0.3)}, outflowTo("ao_flow_mL_s")), StageBeats)
	if err != nil {
		t.Fatal(err)
	}
	w, ok := warned(s, data.CodeLine)
	if !ok || !strings.Contains(w.Text, "natural frequency of 9") || !strings.Contains(w.Text, "damping of 0.2") {
		t.Errorf("%v %+v", ok, w)
	}
	if n := s.Intake.Unusable(0); n < 1.9*200 {
		t.Errorf("%d samples are unusable", n)
	}
	if sys := s.Beats.Pulses[0].Systolic; sys > 130 {
		t.Errorf("systolic %v", sys)
	}
}
