package chart

import (
	"flag"
	"fmt"
	"math"
	"math/rand/v2"
	"os"
	"path/filepath"
	"regexp"
	"strings"
	"testing"

	"afterbeat/data"

	"github.com/mattn/go-runewidth"
	"pgregory.net/rapid"
)

var update = flag.Bool("update", false, "write the golden files anew")

var colours = regexp.MustCompile(`\x1b\[[0-9;]*m`)

// pulses are two invented beats of 0.8 s at 250 Hz: a systolic wave with a
// smaller one behind it, and a flattened one with a hole from 0.48 s to 0.56 s.
func pulses() (native, supported []float64) {
	for i := range 201 {
		u := float64(i) / 200
		bump := func(at, width float64) float64 { return math.Exp(-math.Pow((u-at)/width, 2)) }
		native = append(native, 85+35*bump(0.2, 0.08)+10*bump(0.46, 0.06)-10*u)
		supported = append(supported, 90+4*math.Sin(2*math.Pi*(u-0.1)))
		if i > 120 && i < 140 {
			supported[i] = math.NaN()
		}
	}
	return native, supported
}

func pressures() Plot {
	native, supported := pulses()
	return Plot{
		Title:  "radial artery",
		Series: []Series{{Name: "native", Values: native}, {Name: "supported", Values: supported}},
		X:      Axis{Low: 0, High: 0.8, Name: "time", Unit: "s"},
		Y:      Covering("mmHg", native, supported),
	}
}

func marked() Plot {
	p := pressures()
	p.Marks = []Mark{
		{Name: "unusable", Char: 'x', Spans: []data.Span{{From: 0.484, To: 0.556}, {From: 0.79, To: 9}}},
		{Name: "onset", Char: '^', At: []float64{0.1, 0.7}},
	}
	p.Cursors = []float64{0.3}
	return p
}

func overlaid() Plot {
	native, _ := pulses()
	p := Plot{Title: "beats", X: Axis{High: 0.8, Unit: "s"}, Y: Axis{Low: 60, High: 140, Unit: "mmHg"}}
	for k := range 5 {
		beat := make([]float64, len(native))
		for i, v := range native {
			beat[i] = 100 + (v-100)*(0.8+0.1*float64(k))
		}
		p.Series = append(p.Series, Series{Values: beat, Glyph: Dots})
	}
	p.Series = append(p.Series, Series{Name: "average", Values: native, Glyph: Line})
	return p
}

func clipped() Plot {
	p := pressures()
	p.Y.Low, p.Y.High = 84, 100
	return p
}

func fitted() Stack {
	p := pressures()
	native, residual := p.Series[0].Values, make([]float64, 201)
	model := make([]float64, 201)
	for i, v := range native {
		residual[i] = 1.2 * math.Sin(float64(i)/9)
		model[i] = v - residual[i]
	}
	p.Series = []Series{{Name: "measured", Values: native}, {Name: "fitted", Values: model}}
	return Stack{p, Plot{
		Title: "measured less fitted", Series: []Series{{Values: residual}},
		Y: Axis{Low: -1.5, High: 1.5, Unit: "mmHg"},
	}}
}

func nothing() Plot {
	p := marked()
	p.Series = []Series{{Name: "native", Values: []float64{math.NaN(), math.Inf(1)}}}
	return p
}

func TestGolden(t *testing.T) {
	unicode, ascii := Theme{}, Theme{ASCII: true}
	for name, got := range map[string]string{
		"two curves 70x14":       pressures().Draw(70, 14, unicode),
		"two curves 70x14 ascii": pressures().Draw(70, 14, ascii),
		"two curves 40x9":        pressures().Draw(40, 9, unicode),
		"two curves 24x6 ascii":  pressures().Draw(24, 6, ascii),
		"two curves 150x40":      pressures().Draw(150, 40, unicode),
		"marks 76x15":            marked().Draw(76, 15, unicode),
		"marks 76x15 ascii":      marked().Draw(76, 15, ascii),
		"overlaid 60x14":         overlaid().Draw(60, 14, unicode),
		"clipped 60x10":          clipped().Draw(60, 10, unicode),
		"no data 60x10":          nothing().Draw(60, 10, unicode),
		"residual 80x20":         fitted().Draw(80, 20, unicode),
		"residual 80x20 ascii":   fitted().Draw(80, 20, ascii),
		"table 70x14":            marked().Table(70, 14, unicode),
		"too small 20x4":         pressures().Draw(20, 4, unicode),
	} {
		t.Run(name, func(t *testing.T) {
			file := filepath.Join("testdata", strings.ReplaceAll(name, " ", "-")+".txt")
			if *update {
				if err := os.WriteFile(file, []byte(got+"\n"), 0o644); err != nil {
					t.Fatal(err)
				}
			}
			want, err := os.ReadFile(file)
			if err != nil {
				t.Fatal(err)
			}
			if got+"\n" != string(want) {
				t.Errorf("got\n%s\nwant\n%s", got, want)
			}
		})
	}
}

// fits says what is wrong with the size or the bytes of a drawing, or nothing.
func fits(drawing string, width, height int, th Theme) error {
	lines := strings.Split(drawing, "\n")
	if len(lines) != height {
		return fmt.Errorf("%d lines, want %d", len(lines), height)
	}
	if th.Colours < 16 && strings.Contains(drawing, "\x1b") {
		return fmt.Errorf("an escape without colours: %q", drawing)
	}
	for k, line := range lines {
		shown := colours.ReplaceAllString(line, "")
		if w := runewidth.StringWidth(shown); w > width {
			return fmt.Errorf("line %d has %d cells, want at most %d: %q", k, w, width, line)
		}
		if strings.TrimRight(shown, " ") != shown {
			return fmt.Errorf("line %d ends in spaces: %q", k, line)
		}
		for _, r := range shown {
			if th.ASCII && r >= 0x80 {
				return fmt.Errorf("line %d is not ASCII: %q", k, line)
			}
			if r < ' ' || r >= 0x7f && r < 0xa0 || r == '\u202e' {
				return fmt.Errorf("line %d carries %q", k, r)
			}
		}
		if at := strings.LastIndex(line, "\x1b"); at >= 0 && !strings.HasPrefix(line[at:], reset) {
			return fmt.Errorf("line %d leaves a colour on: %q", k, line)
		}
	}
	return nil
}

func aText(t *rapid.T) string {
	return rapid.SampledFrom([]string{
		"", "native", "pression artérielle", "橈骨動脈", "a\x1b[31mred", "two\nlines\r\t", "\u202eabc", "e\u0301\u0301\u0301",
		"\xff\u009b", strings.Repeat("long ", 60), "mmHg s²/mL",
	}).Draw(t, "text")
}

func anAxis(t *rapid.T) Axis {
	a := Axis{Unit: aText(t), Name: aText(t)}
	if rapid.Bool().Draw(t, "bounds") {
		a.Low, a.High = aSample(t), aSample(t)
	}
	return a
}

func aPlot(t *rapid.T) Plot {
	p := Plot{Title: aText(t), X: anAxis(t), Y: anAxis(t), LabelWidth: rapid.IntRange(-2, 20).Draw(t, "label")}
	for range rapid.IntRange(0, 6).Draw(t, "series") {
		p.Series = append(p.Series, Series{
			aText(t), rapid.SliceOfN(rapid.Custom(aSample), 0, 90).Draw(t, "values"),
			Glyph(rapid.IntRange(int(ByOrder), int(Dots)).Draw(t, "glyph")),
		})
	}
	for range rapid.IntRange(0, 3).Draw(t, "marks") {
		m := Mark{aText(t), rapid.SampledFrom([]rune("x^▲\x1b橈\u0301\x00")).Draw(t, "char"), nil, nil}
		for range rapid.IntRange(0, 3).Draw(t, "places") {
			m.At = append(m.At, aSample(t))
			m.Spans = append(m.Spans, data.Span{From: aSample(t), To: aSample(t)})
		}
		p.Marks = append(p.Marks, m)
	}
	if rapid.Bool().Draw(t, "cursor") {
		p.Cursors = []float64{aSample(t)}
	}
	return p
}

// Whatever is drawn: no panic, exactly the height, at most the width, no control
// byte but colours, and no byte above 0x7f in ASCII.
func TestDrawProperties(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p, q := aPlot(t), aPlot(t)
		width, height := rapid.IntRange(0, 250).Draw(t, "width"), rapid.IntRange(1, 60).Draw(t, "height")
		th := Theme{rapid.Bool().Draw(t, "ascii"), rapid.SampledFrom([]int{0, 8, 16, 256}).Draw(t, "colours")}
		for name, drawing := range map[string]string{
			"plot":  p.Draw(width, height, th),
			"stack": Stack{p, q}.Draw(width, height, th),
			"table": p.Table(width, height, th),
			"alike": Alike(height, p, q)[1].Draw(width, height, th),
		} {
			if err := fits(drawing, width, height, th); err != nil {
				t.Fatalf("%s %dx%d: %v\n%s", name, width, height, err, drawing)
			}
		}
	})
}

// canvas is the area of a drawing as runes, line 0 uppermost.
func canvas(t rapid.TB, p Plot, width, height int, th Theme) [][]rune {
	t.Helper()
	columns, lines := p.Area(width, height)
	drawing := strings.Split(colours.ReplaceAllString(p.Draw(width, height, th), ""), "\n")
	out := make([][]rune, lines)
	for k := range out {
		line := []rune(drawing[k+1])
		line = append(line, []rune(strings.Repeat(" ", width-len(line)))...)
		out[k] = line[width-columns:]
	}
	return out
}

// Every value is drawn in its own column on the line that the map of the
// package comment gives, and a gap of even one column stays empty.
func TestDrawPutsValuesInTheirCells(t *testing.T) {
	drawn, gaps := 0, 0
	rapid.Check(t, func(t *rapid.T) {
		values := rapid.SliceOfN(rapid.OneOf(rapid.Float64Range(-3, 7), rapid.Just(math.NaN())), 65, 65).Draw(t, "values")
		glyph := rapid.SampledFrom([]Glyph{Line, Stars, Circles, Dots}).Draw(t, "glyph")
		p := Plot{Series: []Series{{Values: values, Glyph: glyph}}, Y: Axis{Low: -3, High: 7}}
		columns, lines := p.Area(69, 14)
		if columns != 65 {
			t.Fatalf("%d columns", columns)
		}
		if _, _, n := lowHigh(values); n == 0 {
			t.Skip("no value")
		}
		area := canvas(t, p, 69, 14, Theme{ASCII: true})
		for c, v := range values {
			if math.IsNaN(v) {
				gaps++
				for k := range area {
					if area[k][c] != ' ' {
						t.Fatalf("gap column %d holds %q", c, area[k][c])
					}
				}
				continue
			}
			drawn++
			k := lines - 1 - int(math.Round((v+3)/10*float64(lines-1)))
			if area[k][c] == ' ' {
				t.Fatalf("column %d, value %g: nothing on line %d", c, v, k)
			}
		}
	})
	if drawn == 0 || gaps == 0 {
		t.Errorf("%d values and %d gaps checked", drawn, gaps)
	}
}

// A gap of one column in the Unicode line is the space between two half cells.
func TestDrawUnicodeGap(t *testing.T) {
	p := Plot{Series: []Series{{Values: []float64{1, 1, 1, math.NaN(), 1, 1, 1, 1, 1, 1}}}, Y: Axis{Low: 0, High: 2}}
	columns, _ := p.Area(13, 8)
	if columns != 10 {
		t.Fatalf("%d columns, want 10", columns)
	}
	if got := string(canvas(t, p, 13, 8, Theme{})[2]); got != "──╴╶──────" {
		t.Errorf("%q", got)
	}
}

// 2,000 recordings with one peak of one sample each: the drawing shows it on the
// top line, in its column.
func TestDrawNeverLosesAPeak(t *testing.T) {
	rng := rand.New(rand.NewPCG(5, 6))
	trace := make([]float64, 3000)
	for i := range trace {
		trace[i] = 80 + 10*math.Sin(float64(i)/90)
	}
	trace[1500] = 69 // the one minimum
	p := Plot{X: Axis{Low: 0, High: 3}, Y: Axis{Low: 60, High: 120}}
	columns, _ := p.Area(70, 14)
	seen := 0
	for range 2000 {
		at := rng.IntN(1400)
		was := trace[at]
		trace[at] = 120
		p.Series = []Series{{Values: Columns(trace, 0, len(trace), columns, 0)}}
		if canvas(t, p, 70, 14, Theme{})[0][columnOf(at, len(trace), columns)] != ' ' {
			seen++
		}
		trace[at] = was
	}
	if seen != 2000 {
		t.Errorf("%d of 2000 peaks drawn", seen)
	}
}

// Where two curves are one, both are seen, in turns, and cost little more than two.
func TestDrawCurvesThatCoincide(t *testing.T) {
	level := make([]float64, 64)
	p := Plot{Series: []Series{{Values: level}, {Values: level}}, Y: Axis{Low: -1, High: 1}}
	line := string(canvas(t, p, 68, 8, Theme{})[2])
	if strings.Count(line, "*") != 32 || strings.Count(line, "─") != 32 {
		t.Errorf("%q", line)
	}
	plain, coloured := p.Draw(68, 8, Theme{}), p.Draw(68, 8, Theme{Colours: 256})
	if extra := len(coloured) - len(plain); extra > 250 {
		t.Errorf("colours of two curves that coincide cost %d bytes", extra)
	}
}

// The colours of the design: 32 and 166 of 256, 12 and 9 of 16, none else.
func TestDrawColours(t *testing.T) {
	for n, want := range map[int][]string{
		0: nil, 8: nil,
		16:  {"\x1b[94m", "\x1b[91m", reset}, // 90+4 and 90+1 are bright colours 12 and 9
		256: {"\x1b[38;5;32m", "\x1b[38;5;166m", reset},
	} {
		found := map[string]bool{}
		for _, e := range colours.FindAllString(pressures().Draw(70, 14, Theme{Colours: n}), -1) {
			found[e] = true
		}
		if len(found) != len(want) {
			t.Errorf("%d colours: escapes %v, want %q", n, found, want)
		}
		for _, e := range want {
			if !found[e] {
				t.Errorf("%d colours: no %q", n, e)
			}
		}
		if plain := colours.ReplaceAllString(pressures().Draw(70, 14, Theme{Colours: n}), ""); plain != pressures().Draw(70, 14, Theme{}) {
			t.Errorf("%d colours change the drawing", n)
		}
	}
}

// Guards: what the plotting library panics on or draws as nonsense.
func TestDrawGuards(t *testing.T) {
	nan, inf := math.NaN(), math.Inf(1)
	for name, values := range map[string][]float64{
		"nil": nil, "empty": {}, "all NaN": {nan, nan, nan}, "infinite": {inf, -inf}, "huge": {math.MaxFloat64, -math.MaxFloat64},
	} {
		got := Plot{Series: []Series{{Values: values}}}.Draw(60, 10, Theme{})
		if err := fits(got, 60, 10, Theme{}); err != nil || !strings.Contains(got, "no data in this window") {
			t.Errorf("%s: %v\n%s", name, err, got)
		}
	}
	for name, values := range map[string][]float64{
		"one sample": {7}, "constant": {100, 100, 100}, "zeros": {0, 0}, "one infinite": {1, inf, 2},
		"large": {1e300, -1e300}, "tiny": {5e-324, 0}, "large and close": {1e15, 1e15 + 1},
	} {
		p := Plot{Series: []Series{{Values: values, Glyph: Stars}}}
		got := p.Draw(60, 10, Theme{})
		if err := fits(got, 60, 10, Theme{}); err != nil || !strings.Contains(got, "*") {
			t.Errorf("%s: %v\n%s", name, err, got)
		}
	}
	for _, size := range [][2]int{{0, 1}, {1, 1}, {9, 10}, {70, 4}, {-5, 1}} {
		got := pressures().Draw(size[0], size[1], Theme{})
		if err := fits(got, max(size[0], 0), size[1], Theme{}); err != nil {
			t.Errorf("%v: %v", size, err)
		}
	}
}

// Plots to be compared: one label width and one range of y, whatever each holds.
func TestAlike(t *testing.T) {
	small := Plot{Series: []Series{{Values: []float64{1, 2}}}, Y: Axis{Unit: "mmHg"}}
	large := Plot{Series: []Series{{Values: []float64{-1000, 3}}}, LabelWidth: 7}
	got := Alike(14, small, large)
	if got[0].Y.Low != got[1].Y.Low || got[0].Y.High != got[1].Y.High || got[0].Y.Low > -1000 || got[0].Y.High < 3 {
		t.Errorf("bounds %+v and %+v", got[0].Y, got[1].Y)
	}
	if got[0].Y.Unit != "mmHg" || got[0].LabelWidth != 7 || got[1].LabelWidth != 7 {
		t.Errorf("unit %q, label widths %d and %d", got[0].Y.Unit, got[0].LabelWidth, got[1].LabelWidth)
	}
	one, _ := got[0].Area(70, 14)
	two, _ := got[1].Area(70, 14)
	if one != two {
		t.Errorf("%d and %d columns", one, two)
	}
	if none := Alike(14, Plot{}, Plot{}); none[0].Y.valid() {
		t.Errorf("bounds out of nothing: %+v", none[0].Y)
	}
}

// The labels of x never run into each other: each word under the axis is a label
// of a tick, and the last is the unit.
func TestXLabelsStayApart(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		low := rapid.Float64Range(-1e3, 1e3).Draw(t, "low") * math.Pow10(rapid.IntRange(-9, 9).Draw(t, "scale"))
		p := Plot{X: Axis{Low: low, High: low + rapid.Float64Range(0.01, 1e3).Draw(t, "span"), Unit: "s"}}
		width := rapid.IntRange(30, 200).Draw(t, "width")
		columns, _ := p.Area(width, 8)
		want := map[string]bool{}
		for _, k := range columnTicks(p.X, columns) {
			want[k.label] = true
		}
		lines := strings.Split(p.Draw(width, 8, Theme{}), "\n")
		words := strings.Fields(lines[len(lines)-1])
		if len(want) == 0 {
			t.Skip("no room between the bounds")
		}
		if len(words) < 2 || words[len(words)-1] != "s" {
			t.Fatalf("no label or no unit: %q", words)
		}
		for _, w := range words[:len(words)-1] {
			if !want[w] {
				t.Fatalf("%q is none of %v", w, want)
			}
		}
	})
}

// Both plots of a stack have the same columns and the axis once.
func TestStackShares(t *testing.T) {
	s := fitted()
	columns, main, lower := s.Area(80, 20)
	if columns < 60 || main < 8 || lower < 2 {
		t.Errorf("area %d, %d, %d", columns, main, lower)
	}
	drawing := s.Draw(80, 20, Theme{})
	if strings.Count(drawing, "└") != 1 {
		t.Errorf("not one x axis:\n%s", drawing)
	}
	edge := map[int]bool{}
	for _, line := range strings.Split(drawing, "\n") {
		if at := strings.IndexAny(line, "┤│└"); at >= 0 && len([]rune(line[:at])) < 8 {
			edge[len([]rune(line[:at]))] = true
		}
	}
	if len(edge) != 1 {
		t.Errorf("the axis stands in columns %v:\n%s", edge, drawing)
	}
	if c, _, _ := s.Area(80, 7); c != 0 {
		t.Errorf("%d columns in 7 lines", c)
	}
}

// Unchanged frame: another curve within the same bounds changes the lines of the
// curve only, so that stepping sends little.
func TestStepKeepsTheFrame(t *testing.T) {
	p := marked()
	before := strings.Split(p.Draw(70, 15, Theme{}), "\n")
	p.Series = []Series{{Name: "native", Values: []float64{80, 90}}, {Name: "supported"}}
	after := strings.Split(p.Draw(70, 15, Theme{}), "\n")
	for _, k := range []int{0, 12, 13, 14} {
		if before[k] != after[k] {
			t.Errorf("line %d changed from %q to %q", k, before[k], after[k])
		}
	}
	for k := range before {
		if before[k][:6] != after[k][:6] {
			t.Errorf("label of line %d changed from %q to %q", k, before[k], after[k])
		}
	}
}

// The table tells samples as they are: first, last, and the true extremes,
// though the rows between miss them.
func TestTable(t *testing.T) {
	values := make([]float64, 101)
	values[37], values[63] = 121.25, -4.5
	p := Plot{
		Series: []Series{{Name: "pressure", Values: values}, {Values: []float64{1, math.NaN(), 3}}},
		X:      Axis{Low: 0, High: 1, Name: "time", Unit: "s"}, Y: Axis{Unit: "mmHg"},
	}
	got := p.Table(70, 9, Theme{})
	want := strings.Join([]string{
		"5 of 101 samples",
		"time (s)  pressure (mmHg)  series 2 (mmHg)",
		"   0.000              0.0              1.0",
		"   0.250              0.0             none",
		"   0.500              0.0             none",
		"   0.750              0.0              3.0",
		"   1.000              0.0              3.0",
		"pressure: lowest -4.5 mmHg at 0.630 s, highest 121.2 mmHg at 0.370 s",
		"series 2: lowest 1.0 mmHg at 0.0 s, highest 3.0 mmHg at 1.0 s",
	}, "\n")
	if got != want {
		t.Errorf("got\n%s\nwant\n%s", got, want)
	}
}

func BenchmarkPlot70x14(b *testing.B) {
	p := pressures()
	columns, _ := p.Area(70, 14)
	for k := range p.Series {
		v := p.Series[k].Values
		p.Series[k].Values = Columns(v, 0, len(v), columns, 0)
	}
	b.ReportAllocs()
	for b.Loop() {
		p.Draw(70, 14, Theme{Colours: 256})
	}
}
