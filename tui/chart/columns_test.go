package chart

import (
	"encoding/csv"
	"math"
	"math/rand/v2"
	"os"
	"path/filepath"
	"strconv"
	"testing"

	"pgregory.net/rapid"
)

// column by the definition in the package comment, in exact integers.
func columnOf(i, n, width int) int {
	if n == 1 || width == 1 {
		return 0
	}
	return (2*i*(width-1) + (n - 1)) / (2 * (n - 1))
}

func lowHigh(values []float64) (low, high float64, n int) {
	low, high = math.Inf(1), math.Inf(-1)
	for _, v := range values {
		if math.Abs(v) <= 1e300 {
			low, high, n = min(low, v), max(high, v), n+1
		}
	}
	return low, high, n
}

// aSample is mostly an ordinary number, sometimes missing, infinite or huge.
func aSample(t *rapid.T) float64 {
	switch rapid.IntRange(0, 11).Draw(t, "kind") {
	case 0, 1:
		return math.NaN()
	case 2:
		return rapid.SampledFrom([]float64{math.Inf(1), math.Inf(-1), math.MaxFloat64, 1e300, -1e300, 5e-324, 0}).Draw(t, "odd")
	case 3:
		return rapid.Float64().Draw(t, "any")
	default:
		return rapid.Float64Range(-20, 140).Draw(t, "plain")
	}
}

// Extremes of the columns are the extremes of the window; the length is the
// width; a column that has a sample has a value; no value is invented outside
// the range of the window.
func TestColumnsProperties(t *testing.T) {
	windows := 0
	rapid.Check(t, func(t *rapid.T) {
		trace := rapid.SliceOfN(rapid.Custom(aSample), 0, 300).Draw(t, "trace")
		from := rapid.IntRange(-20, len(trace)+5).Draw(t, "from")
		to := rapid.IntRange(from-1, len(trace)+20).Draw(t, "to")
		width := rapid.IntRange(2, 120).Draw(t, "width")
		gap := rapid.IntRange(-1, 30).Draw(t, "gap")
		got := Columns(trace, from, to, width, gap)
		if len(got) != width {
			t.Fatalf("%d columns, want %d", len(got), width)
		}
		first, end := min(max(from, 0), len(trace)), min(max(to, 0), len(trace))
		var window []float64
		if first < end {
			window = trace[first:end]
		}
		wantLow, wantHigh, n := lowHigh(window)
		low, high, m := lowHigh(got)
		if (n == 0) != (m == 0) || n > 0 && (low != wantLow || high != wantHigh) {
			t.Fatalf("columns span %g to %g (%d), window %g to %g (%d)", low, high, m, wantLow, wantHigh, n)
		}
		for i := first; i < end; i++ {
			if c := columnOf(i-from, to-from, width); math.Abs(trace[i]) <= 1e300 && math.IsNaN(got[c]) {
				t.Fatalf("column %d is NaN but holds sample %d = %g", c, i, trace[i])
			}
		}
		if n > 0 {
			windows++
		}
	})
	if windows == 0 {
		t.Error("no window with data was drawn: nothing was checked")
	}
}

// Whatever the width and the window, columns are where the map says: edges and
// columns are each other's inverse.
func TestBinsAgreeWithTheMap(t *testing.T) {
	for n := 1; n <= 60; n++ {
		for width := 1; width <= 60; width++ {
			b := bins{from: 7, n: n, width: width}
			seen := 0
			for c := range width {
				first, end := b.samples(c, 1000)
				for i := first; i < end; i++ {
					seen++
					if want := columnOf(i-7, n, width); want != c || b.column(i) != c {
						t.Fatalf("n=%d width=%d: sample %d in bin %d, column() %d, map %d", n, width, i-7, c, b.column(i), want)
					}
				}
			}
			if seen != n {
				t.Fatalf("n=%d width=%d: %d samples in bins", n, width, seen)
			}
		}
	}
}

// A hole is a gap where more samples are missing than allowed, and bridged by a
// straight line where not: worked by hand, one sample a column.
func TestColumnsHoles(t *testing.T) {
	nan := math.NaN()
	trace := []float64{1, nan, 3, nan, nan, 6, nan, nan, nan, 10, 11}
	for _, c := range []struct {
		gap  int
		want []float64
	}{
		{0, []float64{1, nan, 3, nan, nan, 6, nan, nan, nan, 10, 11}},
		{1, []float64{1, 2, 3, nan, nan, 6, nan, nan, nan, 10, 11}},
		{2, []float64{1, 2, 3, 4, 5, 6, nan, nan, nan, 10, 11}},
		{3, []float64{1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11}},
	} {
		got := Columns(trace, 0, len(trace), len(trace), c.gap)
		for k := range got {
			if math.IsNaN(got[k]) != math.IsNaN(c.want[k]) || math.Abs(got[k]-c.want[k]) > 1e-12 {
				t.Errorf("gap %d: column %d is %g, want %g", c.gap, k, got[k], c.want[k])
			}
		}
	}
}

// Many samples a column: a hole of 200 samples in bins of about 10 is seen,
// unless 200 may be missing, and then the line across it is straight.
func TestColumnsLongHole(t *testing.T) {
	trace := make([]float64, 700)
	for i := range trace {
		trace[i] = float64(i)
	}
	for i := 300; i < 500; i++ {
		trace[i] = math.NaN()
	}
	open, closed := Columns(trace, 0, 700, 70, 199), Columns(trace, 0, 700, 70, 200)
	empty := 0
	for c := range open {
		if math.IsNaN(open[c]) {
			empty++
			if want := float64(c) * 699 / 69; math.Abs(closed[c]-want) > 1e-9 {
				t.Errorf("column %d bridged with %g, want %g", c, closed[c], want)
			}
		}
	}
	if empty < 18 || empty > 19 { // 200/10.13 = 19.7, less the bins cut at both ends
		t.Errorf("%d empty columns for 200 missing samples in bins of 10.1", empty)
	}
}

// Fewer samples than columns: the samples stand where the map puts them, and
// between them lies the straight line.
func TestColumnsUpsample(t *testing.T) {
	got := Columns([]float64{0, 10, 0}, 0, 3, 21, -1)
	for c, v := range got {
		want := float64(c)
		if c > 10 {
			want = float64(20 - c)
		}
		if math.Abs(v-want) > 1e-12 {
			t.Errorf("column %d is %g, want %g", c, v, want)
		}
	}
	one := Columns([]float64{7}, 0, 1, 5, 0)
	if one[0] != 7 || !math.IsNaN(one[1]) || !math.IsNaN(one[4]) {
		t.Errorf("one sample in five columns: %v", one)
	}
}

// Of 2,000 peaks of one sample each in one window, none is lost or lowered when
// each has a column; where the window's minimum claims one of those columns, it
// alone stands there instead.
func TestColumnsNeverLoseAPeak(t *testing.T) {
	const peaks, every = 2000, 20
	rng := rand.New(rand.NewPCG(1, 2))
	trace := make([]float64, peaks*every)
	for i := range trace {
		trace[i] = 80 + 5*math.Sin(float64(i)/9)
	}
	height := map[float64]bool{}
	for k := range peaks {
		h := 200 + rng.Float64()
		trace[k*every] = h
		height[h] = true
	}
	trace = trace[:(peaks-1)*every+1]
	const lowest = 10
	trace[every/2] = lowest // halfway between two peaks
	for _, width := range []int{peaks, 2 * peaks} {
		kept, low := 0, 0
		for _, v := range Columns(trace, 0, len(trace), width, 0) {
			if height[v] {
				kept++
			}
			if v == lowest {
				low++
			}
		}
		if low != 1 || kept < peaks-1 || width > peaks && kept < peaks {
			t.Errorf("%d columns: %d of %d peaks kept, minimum %d times", width, kept, peaks, low)
		}
	}
}

// One peak of one sample among 3,000, drawn in 70 columns, 2,000 times over:
// always there at its full height, in its column or, when the minimum of the
// window shares that, in the next.
func TestColumnsKeepTheOnePeak(t *testing.T) {
	rng := rand.New(rand.NewPCG(3, 4))
	trace := make([]float64, 3000)
	for i := range trace {
		trace[i] = 80 + 40*math.Sin(float64(i)/9)
	}
	beside := 0
	for range 2000 {
		at, was := rng.IntN(len(trace)), 0.0
		was, trace[at] = trace[at], 121+rng.Float64()
		got, c := Columns(trace, 0, len(trace), 70, 0), columnOf(at, len(trace), 70)
		switch trace[at] {
		case got[c]:
		case got[max(c-1, 0)], got[min(c+1, 69)]:
			beside++
		default:
			t.Fatalf("peak %g at sample %d is not near column %d", trace[at], at, c)
		}
		trace[at] = was
	}
	if beside > 60 { // one column in 70 holds the minimum: 29 expected
		t.Errorf("%d of 2000 peaks stand beside their column", beside)
	}
}

// The two extremes of a window may fall into one column: both stay, side by side.
func TestColumnsExtremesInOneColumn(t *testing.T) {
	for _, at := range []int{0, 500, 998} { // first, middle and last column
		trace := make([]float64, 1000)
		trace[at], trace[at+1] = 9, -9
		got := Columns(trace, 0, 1000, 50, 0)
		low, high, _ := lowHigh(got)
		if low != -9 || high != 9 {
			t.Errorf("extremes at %d: columns span %g to %g", at, low, high)
		}
		for c := range got[:49] {
			if got[c] == -9 && got[c+1] == 9 {
				t.Errorf("extremes at %d changed their order", at)
			}
		}
	}
}

func TestColumnsOfNothing(t *testing.T) {
	if got := Columns([]float64{1}, 0, 1, 0, 0); len(got) != 0 {
		t.Errorf("width 0 gives %d columns", len(got))
	}
	for _, c := range [][2]int{{0, 0}, {5, 2}, {90, 99}, {-9, -2}} {
		for k, v := range Columns([]float64{1, 2, 3}, c[0], c[1], 4, 0) {
			if !math.IsNaN(v) {
				t.Errorf("window %v: column %d is %g", c, k, v)
			}
		}
	}
}

// The real pressure of ten minutes, in windows of every length: the extremes
// are the recording's own.
func TestColumnsOfRecording(t *testing.T) {
	trace := recorded(t, "icu_art_ecg_125hz_600s.csv", "abp_mmHg")
	checked := 0
	for n := 100; n < len(trace); n *= 3 {
		for from := 0; from+n <= len(trace); from += n {
			wantLow, wantHigh, m := lowHigh(trace[from : from+n])
			if m == 0 {
				continue
			}
			checked++
			low, high, _ := lowHigh(Columns(trace, from, from+n, 70, 3))
			if low != wantLow || high != wantHigh {
				t.Fatalf("window %d+%d: columns %g to %g, samples %g to %g", from, n, low, high, wantLow, wantHigh)
			}
		}
	}
	if checked < 100 {
		t.Errorf("only %d windows checked", checked)
	}
}

// recorded reads one column of a recording kept beside the repository.
func recorded(t testing.TB, file, column string) []float64 {
	t.Helper()
	f, err := os.Open(filepath.Join("..", "..", "..", "shared", "reference-data", file))
	if err != nil {
		t.Skip("the full recordings are not beside this clone: ", err)
	}
	defer f.Close()
	rows, err := csv.NewReader(f).ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	at := -1
	for k, name := range rows[0] {
		if name == column {
			at = k
		}
	}
	if at < 0 {
		t.Fatalf("%s has no column %s: %v", file, column, rows[0])
	}
	var values []float64
	for _, row := range rows[1:] {
		v, err := strconv.ParseFloat(row[at], 64)
		if err != nil {
			v = math.NaN()
		}
		values = append(values, v)
	}
	return values
}

func BenchmarkColumns600s125Hz(b *testing.B) {
	trace := make([]float64, 75000)
	for i := range trace {
		trace[i] = 80 + 40*math.Sin(float64(i)/20)
	}
	b.ReportAllocs()
	for b.Loop() {
		Columns(trace, 0, len(trace), 70, 3)
	}
}
