package beat

import (
	"math"
	"slices"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"afterbeat/data"
)

// Closed form: a straight line a + b i is cut to a + b (From + j (To-From)/N +
// delay), and ends b (To - From) higher than it began.
func TestCutOfALine(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		a := rapid.Float64Range(-100, 100).Draw(t, "a")
		b := rapid.Float64Range(-1, 1).Draw(t, "b")
		delay := rapid.Float64Range(-0.2, 0.2).Draw(t, "delay")
		const rate = 100
		line := make([]float64, 2000)
		for i := range line {
			line[i] = a + b*float64(i)
		}
		var beats []Beat
		at := 50
		for _, n := range rapid.SliceOfN(rapid.IntRange(40, 120), 3, 12).Draw(t, "lengths") {
			beats = append(beats, Beat{From: at, To: at + n})
			at += n
		}
		e := Cut(beats, rate, Signal{Values: line}, Signal{Values: line, Delay: delay})
		if len(e.Used) != len(beats) || e.Dropped != 0 {
			t.Fatalf("%d beats cut, %d dropped, of %d", len(e.Used), e.Dropped, len(beats))
		}
		lengths := each(beats, func(b Beat) float64 { return float64(b.Samples()) })
		if e.N != int(math.Round(median(lengths))) {
			t.Fatalf("N %d, lengths %v", e.N, lengths)
		}
		mean := 0.0
		for i, beat := range beats {
			mean += b * float64(beat.Samples()) / float64(len(beats))
			for k, shift := range []float64{0, delay * rate} {
				for j, got := range e.Beats[k][i] {
					want := a + b*(float64(beat.From)+float64(j*beat.Samples())/float64(e.N)+shift)
					if math.Abs(got-want) > 1e-9 {
						t.Fatalf("signal %d, beat %d, sample %d: %v, want %v", k, i, j, got, want)
					}
				}
			}
		}
		for k, got := range e.EndMinusStart {
			if math.Abs(got-mean) > 1e-9 {
				t.Fatalf("signal %d ends %v higher, want %v", k, got, mean)
			}
		}
	})
}

func TestCutDropsWhatItCannotSample(t *testing.T) {
	values := make([]float64, 400)
	beats := []Beat{{From: 0, To: 100}, {From: 100, To: 200}, {From: 200, To: 300}, {From: 300, To: 399}}
	for _, c := range []struct {
		name  string
		delay float64
		hole  int
		from  []int
	}{
		{"whole", 0, -1, []int{0, 100, 200, 300}},
		{"later", 0.05, -1, []int{0, 100, 200}},
		{"earlier", -0.05, -1, []int{100, 200, 300}},
		{"hole", 0, 150, []int{0, 200, 300}},
		{"hole at an onset", 0, 200, []int{0, 300}}, // the end of one, the start of the next
		{"hole, later", 0.05, 203, []int{0, 200}},
	} {
		x := slices.Clone(values)
		if c.hole >= 0 {
			x[c.hole] = math.NaN()
		}
		e := Cut(beats, 100, Signal{Values: values}, Signal{Values: x, Delay: c.delay})
		var got []int
		for _, b := range e.Used {
			got = append(got, b.From)
		}
		if !slices.Equal(got, c.from) || e.Dropped != len(beats)-len(c.from) {
			t.Errorf("%s: %v kept, %d dropped; want %v", c.name, got, e.Dropped, c.from)
		}
	}
	e := Cut([]Beat{{From: 0, To: 100, Rejected: Shape}}, 100, Signal{Values: values})
	if a := e.Average(0); e.N != 0 || a.Count != 0 || len(a.Period.Samples) != 0 || !math.IsNaN(a.EndMinusStart) {
		t.Errorf("no used beat gives %+v", a)
	}
}

// A sine of exactly the beat's length comes back as one period of it, whatever
// the scatter of the beats' amplitudes; its standard error is SD/sqrt(n).
func TestAverage(t *testing.T) {
	const n, beats = 80, 25
	x := make([]float64, n*beats+1)
	var list []Beat
	for i := range x {
		gain := 1 + 0.1*float64(i/n%5-2) // 0.8 .. 1.2, five of each
		x[i] = gain * math.Sin(2*math.Pi*float64(i)/n)
	}
	for k := range beats {
		list = append(list, Beat{From: k * n, To: (k + 1) * n})
	}
	a := Cut(list, 100, Signal{Values: x}).Average(0)
	if a.Count != beats || a.Period.Rate != 100 || math.Abs(a.EndMinusStart) > 1e-12 {
		t.Errorf("%d beats at %g Hz, ends %g", a.Count, a.Period.Rate, a.EndMinusStart)
	}
	sd := math.Sqrt(5 * (2*0.04 + 2*0.01) / 24) // of the gains, with n-1
	for j, got := range a.Period.Samples {
		s := math.Sin(2 * math.Pi * float64(j) / n)
		if math.Abs(got-s) > 1e-12 {
			t.Fatalf("sample %d: %v, want %v", j, got, s)
		}
		if want := sd / 5 * math.Abs(s); math.Abs(a.StdErr[j]-want) > 1e-12 {
			t.Fatalf("sample %d: standard error %v, want %v", j, a.StdErr[j], want)
		}
	}
}

func TestOneBeat(t *testing.T) {
	p, q := []float64{80, 120, 100, 90}, []float64{0, 300, 20, 0}
	e := OneBeat(p, 5, q)
	for k, want := range [][]float64{p, q} {
		a := e.Average(k)
		if !slices.Equal(a.Period.Samples, want) || a.Count != 1 || a.EndMinusStart != 0 || a.Period.Duration() != 0.8 {
			t.Errorf("signal %d: %+v", k, a)
		}
		if !slices.ContainsFunc(a.StdErr, math.IsNaN) {
			t.Errorf("a single beat has a standard error: %v", a.StdErr)
		}
	}
	if b := e.Used[0]; b.Max != 120 || b.Min != 80 || b.Mean != 97.5 || b.Interval != 0.8 {
		t.Errorf("%+v", b)
	}
	for name, bad := range map[string]func(){
		"empty":   func() { OneBeat(nil, 5) },
		"lengths": func() { OneBeat(p, 5, q[:3]) },
		"missing": func() { OneBeat([]float64{1, math.NaN()}, 5) },
	} {
		func() {
			defer func() {
				if r := recover(); r == nil || !strings.HasPrefix(r.(string), "beat: ") {
					t.Errorf("%s: %v", name, r)
				}
			}()
			bad()
		}()
	}
}

func TestClosedWarns(t *testing.T) {
	average := func(gap, amplitude float64) Average {
		return Average{Period: data.Period{Samples: []float64{80, 80 + amplitude}, Rate: 2}, Count: 9, EndMinusStart: gap}
	}
	for _, c := range []struct {
		gap, amplitude float64
		calibrated     bool
		warns          bool
	}{
		{0.5, 40, true, false},
		{1.1, 400, true, true},  // above 1 mmHg
		{-0.9, 40, true, true},  // above 2 % of 40
		{-0.7, 40, true, false}, // below
		{1.1, 400, false, false},
		{0.03, 1, false, true},
	} {
		got := average(c.gap, c.amplitude).Closed(channelName, c.calibrated)
		if (len(got) == 1) != c.warns {
			t.Errorf("%+v: %v", c, got)
		}
		for _, w := range got {
			if w.Code != data.CodeOpenBeat || w.Text == "" || w.Cure == "" || w.Channel != channelName {
				t.Errorf("%+v", w)
			}
		}
	}
}
