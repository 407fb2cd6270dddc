package trace

import (
	"math"
	"strings"
	"testing"

	tea "github.com/charmbracelet/bubbletea"
	"pgregory.net/rapid"

	"afterbeat/data"
	"afterbeat/tui"
	"afterbeat/tui/chart"
	"afterbeat/tui/screentest"
)

// source is n samples at 100 Hz from 5 s on, rising, with one peak.
func source(id string, n int) Source {
	s := Source{ID: id, Name: "abp", Unit: "mmHg", Grid: data.Grid{Start: 5, Rate: 100, N: n}}
	for i := range n {
		s.Values = append(s.Values, 80+10*math.Sin(float64(i)/20))
	}
	if n > 0 {
		s.Values[n/3] = 300
	}
	return s
}

// run takes the message of a command, and gives the model that it made.
func run(t *testing.T, m Model, cmd tea.Cmd) Model {
	t.Helper()
	if cmd != nil {
		m, cmd = m.Update(cmd())
		if cmd != nil {
			t.Fatal("a picture ordered another one")
		}
	}
	return m
}

func shown(t *testing.T, s Source) Model {
	t.Helper()
	m, cmd := New().Look(s)
	m = run(t, m, cmd)
	m, cmd = m.Resize(tui.Area{Width: 60, Height: 10}, tui.Theme{ASCII: true})
	return run(t, m, cmd)
}

func press(t *testing.T, m Model, keys ...string) Model {
	t.Helper()
	for _, k := range keys {
		next, cmd := m.Update(screentest.Key(k))
		m = run(t, next, cmd)
	}
	return m
}

func TestWholeToBeginWith(t *testing.T) {
	m := shown(t, source("a", 3000))
	if from, to := m.Window(); from != 0 || to != 3000 {
		t.Errorf("the window is %d to %d", from, to)
	}
	if m.Cursor() != 1500 || !m.Ready() {
		t.Errorf("cursor %d, ready %v", m.Cursor(), m.Ready())
	}
	if got := strings.Count(m.View(), "\n") + 1; got != 10 {
		t.Errorf("%d lines", got)
	}
	if !strings.Contains(m.View(), "300") {
		t.Errorf("the single peak is lost:\n%s", m.View())
	}
}

func TestCursorMovesByColumns(t *testing.T) {
	m := shown(t, source("a", 3000))
	perColumn := 2999 / float64(m.shown.columns-1)
	for k, want := range map[string]float64{"l": 1, "h": -1, "L": 10, "H": -10, "right": 1, "left": -1} {
		got := float64(press(t, m, k).Cursor() - 1500)
		if math.Abs(got-want*perColumn) > perColumn {
			t.Errorf("%s moves by %v samples, a column has %v", k, got, perColumn)
		}
	}
	if got := press(t, m, "g").Cursor(); got != 0 {
		t.Errorf("g goes to %d", got)
	}
	if got := press(t, m, "G").Cursor(); got != 2999 {
		t.Errorf("G goes to %d", got)
	}
}

func TestZoomKeepsCursorInside(t *testing.T) {
	m := press(t, shown(t, source("a", 3000)), "+", "+")
	from, to := m.Window()
	if to-from != 750 || from > 1500 || to <= 1500 {
		t.Errorf("window %d to %d about 1500", from, to)
	}
	m = press(t, m, "L", "L", "L", "L", "L", "L")
	from, to = m.Window()
	if c := m.Cursor(); to-from != 750 || c < from || c >= to || c <= 1875 {
		t.Errorf("window %d to %d with the cursor on %d", from, to, c)
	}
	m = press(t, m, "-")
	if from, to = m.Window(); to-from != 1500 {
		t.Errorf("zooming out gives %d samples", to-from)
	}
	m = press(t, m, "0")
	if from, to = m.Window(); from != 0 || to != 3000 {
		t.Errorf("0 shows %d to %d", from, to)
	}
}

func TestEverySampleCanBeReached(t *testing.T) {
	m := press(t, shown(t, source("a", 3000)), "+", "+", "+", "+", "+", "+", "+")
	for range 20 {
		before := m.Cursor()
		if m = press(t, m, "l"); m.Cursor() != before+1 {
			t.Fatalf("from %d to %d", before, m.Cursor())
		}
	}
}

func TestLatePictureIsNotShown(t *testing.T) {
	m := shown(t, source("a", 3000))
	zoomed, late := m.Update(screentest.Key("+"))
	back, _ := zoomed.Update(screentest.Key("0"))
	before := back.View()
	after, _ := back.Update(late())
	if after.View() != before {
		t.Error("a picture that is no longer wanted is shown")
	}
	if again, cmd := after.Update(screentest.Key("+")); cmd != nil || !again.Ready() {
		t.Error("a picture that was made is made again")
	}
	other, _ := after.Look(source("b", 3000))
	foreign, _ := other.Update(late())
	if foreign.Ready() {
		t.Error("a picture of another source is taken for this one's")
	}
}

func TestOldPictureStaysUntilTheNewOne(t *testing.T) {
	m := shown(t, source("a", 3000))
	next, cmd := m.Look(source("b", 3000))
	if cmd == nil || next.View() != m.View() {
		t.Error("the picture is gone before the next one is there")
	}
	if empty, _ := m.Look(Source{ID: "c"}); empty.View() != "" || empty.Cursor() != -1 {
		t.Error("nothing to look at, and still something is shown")
	}
}

func TestRevealTurnsThePage(t *testing.T) {
	m := press(t, shown(t, source("a", 3000)), "+", "+", "+", "+")
	width := 187
	for at := 0; at+60 <= 3000; at += 60 {
		next, cmd := m.Reveal(at+30, at, at+60)
		m = run(t, next, cmd)
		from, to := m.Window()
		if from > at || to < at+60 || to-from != width {
			t.Fatalf("samples %d to %d are not all in %d to %d", at, at+60, from, to)
		}
	}
}

func TestMarksAreOneAColumn(t *testing.T) {
	s := source("a", 3000)
	var at []float64
	var spans []data.Span
	for i := range 3000 {
		at = append(at, s.Grid.At(i))
		if i%2 == 0 {
			spans = append(spans, data.Span{From: s.Grid.At(i), To: s.Grid.At(i)})
		}
	}
	s.Marks = []chart.Mark{{Name: "onset", Char: '^', At: at}, {Char: '?', Spans: spans}}
	m := shown(t, s)
	if got := m.shown.plot.Marks; len(got[1].At) > m.shown.columns || len(got[2].Spans) != 1 {
		t.Errorf("%d places and %d stretches in %d columns", len(got[1].At), len(got[2].Spans), m.shown.columns)
	}
	direct := m.shown.plot
	direct.Marks = s.Marks
	if got, want := m.View(), direct.Draw(60, 10, chart.Theme{ASCII: true}); got != want {
		t.Errorf("drawn\n%s\nwant\n%s", got, want)
	}
}

// TestEnvelope holds the envelope against the samples: a peak and a dip of one
// sample each, in one column, are both there.
func TestEnvelope(t *testing.T) {
	s := source("a", 6000) // 60 s in 53 columns
	s.Values[3000], s.Values[3001] = 250, -40
	m := shown(t, s)
	series := m.shown.plot.Series
	if len(series) != 2 {
		t.Fatalf("%d series", len(series))
	}
	at := int(math.Round(3000 * float64(m.shown.columns-1) / 5999))
	if low, high := series[0].Values[at], series[1].Values[at]; low != -40 || high != 250 {
		t.Errorf("column %d goes from %v to %v", at, low, high)
	}
	for c := range series[0].Values {
		if !(series[0].Values[c] <= series[1].Values[c]) {
			t.Errorf("column %d: lowest %v, highest %v", c, series[0].Values[c], series[1].Values[c])
		}
	}
	if m = press(t, m, "+", "+"); len(m.shown.plot.Series) != 1 {
		t.Error("beats that can be told apart are still an envelope")
	}
}

func TestTable(t *testing.T) {
	m := press(t, shown(t, source("a", 3000)), "t")
	if v := m.View(); !m.Table() || !strings.Contains(v, "time (s)") || !strings.Contains(v, "highest 300.0 mmHg") {
		t.Errorf("no table:\n%s", v)
	}
}

func TestAnyKeysAndSizes(t *testing.T) {
	keys := []string{"h", "l", "H", "L", "g", "G", "+", "-", "0", "t", "left", "x"}
	rapid.Check(t, func(t *rapid.T) {
		m := New()
		var cmd tea.Cmd
		for range rapid.IntRange(1, 30).Draw(t, "steps") {
			switch rapid.IntRange(0, 6).Draw(t, "step") {
			case 0:
				m, cmd = m.Look(source(rapid.StringMatching("[ab]").Draw(t, "id"), rapid.SampledFrom([]int{0, 1, 2, 17, 500}).Draw(t, "n")))
			case 1:
				a := tui.Area{Width: rapid.IntRange(0, 250).Draw(t, "width"), Height: rapid.IntRange(0, 80).Draw(t, "height")}
				m, cmd = m.Resize(a, tui.Theme{ASCII: true})
			case 2:
				i := rapid.IntRange(-5, 600).Draw(t, "i")
				m, cmd = m.Reveal(i, i-3, i+9)
			default:
				m, cmd = m.Update(screentest.Key(rapid.SampledFrom(keys).Draw(t, "key")))
			}
			if cmd != nil && rapid.Bool().Draw(t, "in time") {
				m, _ = m.Update(cmd())
			}
			if n := len(m.source.Values); m.Cursor() >= n || n > 0 && m.Cursor() < 0 {
				t.Fatalf("cursor %d of %d samples", m.Cursor(), n)
			}
			m.View(chart.Mark{Char: '^', At: []float64{5}})
		}
	})
}

func BenchmarkView(b *testing.B) {
	m, _ := New().Look(source("a", 600_000))
	m, cmd := m.Resize(tui.Area{Width: 200, Height: 40}, tui.Theme{Colours: 256})
	m, _ = m.Update(cmd())
	b.ReportAllocs()
	for b.Loop() {
		m.View(chart.Mark{Char: '^', At: []float64{5}})
	}
}
