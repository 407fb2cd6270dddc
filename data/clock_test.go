package data

import (
	"math"
	"os"
	"testing"

	"pgregory.net/rapid"
)

// evenly makes n times at a rate, from start.
func evenly(start, rate float64, n int) []float64 {
	times := make([]float64, n)
	for i := range times {
		times[i] = start + float64(i)/rate
	}
	return times
}

// rounded cuts (or, with half 0.5, rounds) times to multiples of step.
func rounded(times []float64, step, half float64) []float64 {
	out := make([]float64, len(times))
	for i, t := range times {
		out[i] = math.Floor(t/step+half) * step
	}
	return out
}

// cutOut leaves out the rows from..to-1.
func cutOut(x []float64, from, to int) []float64 {
	return append(append([]float64{}, x[:from]...), x[to:]...)
}

func TestClock(t *testing.T) {
	packets := evenly(0, 250, 2500)
	for i := range packets { // ten rows arrive together, 0.1 ms apart
		packets[i] = float64(i/10)*0.04 + float64(i%10)*1e-4
	}
	for _, c := range []struct {
		name       string
		times      []float64
		rate       float64
		relative   float64
		holes      int
		repeated   int
		wantUneven bool
	}{
		{name: "1000 Hz", times: evenly(900.0005, 1000, 5000), rate: 1000},
		{name: "two rows", times: []float64{3, 3.5}, rate: 2},
		{name: "124.945 Hz, printed to 10 us", times: rounded(evenly(0, 124.945, 28800), 1e-5, 0.5), rate: 124.945, relative: 1e-7},
		{name: "240 Hz, printed to 1 ms", times: rounded(evenly(0, 240, 2400), 1e-3, 0.5), rate: 240, relative: 1e-4},
		{name: "2000 Hz, cut to 1 ms", times: rounded(evenly(0, 2000, 4000), 1e-3, 1e-6), rate: 2000, repeated: 2000},
		{name: "125 Hz, cut to 1 s", times: rounded(evenly(0, 125, 12500), 1, 1e-9), rate: 125, repeated: 12400},
		{name: "125 Hz, cut to 1 s, 2 s missing", times: cutOut(rounded(evenly(0, 125, 12500), 1, 1e-9), 2500, 2750), rate: 125, holes: 1, repeated: 12152},
		{name: "hole of 10 s", times: cutOut(evenly(0, 100, 5000), 1000, 2000), rate: 100, holes: 1},
		{name: "hole of hours", times: append(evenly(0, 100, 1000), evenly(36000, 100, 1000)...), rate: 100, holes: 1},
		{name: "lost rows are no holes", times: cutOut(evenly(0, 1000, 3000), 1500, 1510), rate: 1000, relative: 0.004, wantUneven: true},
		{name: "packets", times: packets, rate: 250, relative: 1e-3, wantUneven: true},
		{name: "one step like 0 beside a long one", times: []float64{0, 5e-324, 100}, rate: 0.02, relative: 1, wantUneven: true},
	} {
		rec := &Recording{Time: c.times}
		got := rec.Clock()
		if math.Abs(got.Rate/c.rate-1) > c.relative || got.Repeated != c.repeated || got.Rows != len(c.times) {
			t.Errorf("%s: %+v, want %v Hz and %d repeated", c.name, got, c.rate, c.repeated)
		}
		if holes := rec.Holes(); len(holes) != c.holes {
			t.Errorf("%s: holes %v, want %d", c.name, holes, c.holes)
		}
		uneven := false
		for _, w := range rec.clockWarnings(paceOf(c.times), got) {
			uneven = uneven || w.Code == CodeUnevenClock
		}
		if uneven != c.wantUneven {
			t.Errorf("%s: uneven %v, want %v", c.name, uneven, c.wantUneven)
		}
	}
	if c := (&Recording{}).Clock(); c != (Clock{}) {
		t.Errorf("an empty recording has the clock %+v", c)
	}
}

// Rows of an even sampler come back to their places, whether their stamps were
// cut to whole seconds, or came late in packets.
func TestRowTimesUndoTheStamping(t *testing.T) {
	truth := evenly(10, 125, 5000)
	late := append([]float64{}, truth...)
	for i := range late {
		late[i] = truth[min(i/8*8+7, len(truth)-1)] + float64(i%8-7)*1e-4
	}
	for _, c := range []struct {
		name   string
		stamps []float64
		shift  float64
	}{
		{"cut to whole seconds", rounded(truth, 1, 1e-9), 0},
		{"in packets of eight", late, 0},
		{"even", truth, 0},
	} {
		p := paceOf(c.stamps)
		got, lost := rowTimes(c.stamps, p, 125)
		if len(lost) > 0 {
			t.Errorf("%s: %d rows lost", c.name, len(lost))
		}
		for i := range got {
			if math.Abs(got[i]-truth[i]) > 1e-9 {
				t.Errorf("%s: row %d at %v s, was taken at %v", c.name, i, got[i], truth[i])
				break
			}
		}
	}
}

func TestEvenValuesPassUntouched(t *testing.T) {
	for _, times := range [][]float64{
		evenly(900.0005, 1000, 500),
		rounded(evenly(0, 124.945, 500), 1e-5, 0.5),
		rounded(evenly(0, 2000, 500), 1e-3, 1e-6),
		rounded(evenly(0, 125, 500), 1, 1e-9),
	} {
		values := evenly(60, 3, len(times))
		values[7] = nan
		rec := &Recording{Time: times, Channels: []Channel{{Values: values}}}
		g, out, err := rec.Uniform()
		if err != nil || g.N != len(times) || !sameValues(out[0], values) {
			t.Errorf("%v Hz: %d of %d values, error %v", g.Rate, g.N, len(times), err)
		}
		if last := g.At(g.N - 1); math.Abs(last-times[len(times)-1]) > 1.1 && g.Start != times[0] {
			t.Errorf("grid %+v ends at %v", g, last)
		}
	}
}

// A straight line comes back exactly from linear interpolation.
func TestUniformKeepsAStraightLine(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		steps := rapid.SliceOfN(rapid.Float64Range(0.006, 0.01), 40, 200).Draw(t, "steps")
		times, values := []float64{2}, []float64{80}
		for _, s := range steps {
			times = append(times, times[len(times)-1]+s)
			values = append(values, 80+3*(times[len(times)-1]-2))
		}
		rec := &Recording{Time: times, Channels: []Channel{{Values: values}}}
		g, out, err := rec.Uniform()
		if err != nil {
			t.Fatal(err)
		}
		for k, v := range out[0] {
			// 1 ms and a hundredth of a step are not told apart
			if want := 80 + 3*(g.At(k)-2); math.Abs(v-want) > 3*1.1e-3 {
				t.Fatalf("at %v s: %v, want %v", g.At(k), v, want)
			}
		}
	})
}

func TestUniformLeavesHolesAndMissingEmpty(t *testing.T) {
	times := cutOut(evenly(0, 100, 1000), 400, 601) // no rows from 4.00 to 6.00 s
	values := make([]float64, len(times))
	copy(values, times)
	values[100] = nan // 1 s
	rec := &Recording{Time: times, Channels: []Channel{{Values: values}}}
	g, out, err := rec.Uniform()
	if err != nil || g.Rate != 100 || g.N != 1000 {
		t.Fatalf("grid %+v, error %v", g, err)
	}
	for k, v := range out[0] {
		if empty := k == 100 || k >= 400 && k <= 600; empty != math.IsNaN(v) {
			t.Fatalf("at %v s: %v", g.At(k), v)
		} else if !empty && math.Abs(v-g.At(k)) > 1e-9 {
			t.Fatalf("at %v s: %v", g.At(k), v)
		}
	}
}

// The pig's logger stalls for 1.9 s and then writes what had queued up with
// nearly one stamp: neither the hole nor the burst gives values.
func TestPigHole(t *testing.T) {
	rec := readRecording(t, "testdata/pig_carotid_excerpt.csv", ReadOptions{})
	holes := rec.Holes()
	if len(holes) != 1 || holes[0] != (Span{399.782, 401.704}) {
		t.Errorf("holes %v", holes)
	}
	g, out, err := rec.Uniform()
	if err != nil {
		t.Fatal(err)
	}
	if math.Abs(g.Rate/62.5-1) > 0.01 {
		t.Errorf("rate %v", g.Rate)
	}
	for k, v := range out[0] {
		at := g.At(k)
		if math.IsNaN(v) != (at > 399.783 && at < 401.937) && math.Abs(at-399.782) > 0.02 && math.Abs(at-401.938) > 0.02 {
			t.Fatalf("at %v s: %v", at, v)
		}
	}
}

func TestUniformRefusesWhatWouldFillTheMemory(t *testing.T) {
	times := append(evenly(0, 1000, 1000), evenly(1e7, 1000, 1000)...)
	rec := &Recording{Name: Clean("a.csv"), Time: times, Channels: []Channel{{Values: make([]float64, 2000)}}}
	_, _, err := rec.Uniform()
	if err == nil || err.Error() != "a.csv: its holes, the longest of 2778 h, would take 1e+10 samples at 1000 Hz; the file has 2000" {
		t.Errorf("got %v", err)
	}
	g, out, err := rec.Within(Span{0.5, 5e6}).Uniform()
	if err != nil || g.N != 500 || g.Start != 0.5 || len(out[0]) != 500 {
		t.Errorf("grid %+v, error %v", g, err)
	}
	if _, _, err := (&Recording{Time: []float64{1, 1, 1}}).Uniform(); err == nil {
		t.Error("a clock that stands still is no error")
	}
	if cut := rec.Within(Span{5, 4}); len(cut.Time) != 0 || len(cut.Channels[0].Values) != 0 {
		t.Errorf("a reversed span keeps %d rows", len(cut.Time))
	}
}

// Whatever the clock, row times never fall and Uniform keeps its promises.
func TestUniformOnAnyClock(t *testing.T) {
	step := rapid.SampledFrom([]float64{0, 0, 1e-4, 0.004, 0.004, 0.004, 0.008, 0.016, 0.5, 30})
	rapid.Check(t, func(t *rapid.T) {
		times := []float64{100}
		for _, s := range rapid.SliceOfN(step, 1, 150).Draw(t, "steps") {
			times = append(times, times[len(times)-1]+s)
		}
		times = append(times, times[len(times)-1]+0.004)
		values := rapid.SliceOfN(rapid.OneOf(rapid.Float64Range(0, 200), rapid.Just(nan)), len(times), len(times)).Draw(t, "values")
		rec := &Recording{Time: times, Channels: []Channel{{Values: values}}}
		p := paceOf(times)
		c := clockOf(times, p)
		out, _ := rowTimes(times, p, c.Rate)
		for i := range out {
			if i > 0 && out[i] < out[i-1] || math.IsNaN(out[i]) {
				t.Fatalf("row %d at %v after %v", i, out[i], out[i-1])
			}
		}
		g, even, err := rec.Uniform()
		if err != nil {
			return
		}
		for k, v := range even[0] {
			if v < 0 || v > 200 {
				t.Fatalf("at %v s: %v", g.At(k), v)
			}
		}
	})
}

func TestExcerpts(t *testing.T) {
	for file, want := range map[string]struct {
		rows, missing int
		rate          float64
	}{
		"tcd_abp_mcav_excerpt.csv":  {300, 0, 1000},
		"bench_pq_excerpt.csv":      {200, 0, 1000},
		"icu_art_pleth_excerpt.csv": {400, 192, 124.945},
		"pig_carotid_excerpt.csv":   {688, 0, 62.5},
	} {
		rec := readRecording(t, "testdata/"+file, ReadOptions{})
		c := rec.Clock()
		if c.Rows != want.rows || rec.Channels[0].Missing() != want.missing || math.Abs(c.Rate/want.rate-1) > 0.01 {
			t.Errorf("%s: %+v, %d missing", file, c, rec.Channels[0].Missing())
		}
	}
	f, err := os.Open("testdata/tcd_artefacts_excerpt.csv")
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	spans, err := ReadSpans("artefacts.csv", f)
	if err != nil || len(spans) != 8 || spans[0] != (Span{922.2, 924}) {
		t.Errorf("spans %v, error %v", spans, err)
	}
}
