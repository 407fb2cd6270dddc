package beats

import (
	"context"
	"fmt"
	"io/fs"
	"math"
	"os"
	"slices"
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"
	"pgregory.net/rapid"

	"afterbeat/data"
	"afterbeat/data/beat"
	"afterbeat/data/casefile"
	"afterbeat/data/casenote"
	demofiles "afterbeat/data/demo"
	"afterbeat/data/unit"
	"afterbeat/tree/study"
	"afterbeat/tui"
	"afterbeat/tui/chart"
	"afterbeat/tui/screentest"
)

var area = tui.Area{Width: 80, Height: 20}

// found is the study of a recording in text, up to its beats.
func found(t testing.TB, c casefile.Case, content string) study.Study {
	t.Helper()
	c.Recording = "odd.csv"
	in, err := study.Read(c, func(string) ([]byte, error) { return []byte(content), nil })
	if err != nil {
		t.Fatal(err)
	}
	s, err := study.Run(context.Background(), in, study.StageBeats)
	if err != nil {
		t.Fatal(err)
	}
	return s
}

// file has columns of a header, each a function of time, for 20 s at 100 Hz.
func file(header string, columns ...func(t float64) string) string {
	var b strings.Builder
	b.WriteString("time_s," + header + "\n")
	for i := range 2000 {
		at := float64(i) / 100
		fmt.Fprintf(&b, "%.2f", at)
		for _, c := range columns {
			b.WriteString("," + c(at))
		}
		b.WriteString("\n")
	}
	return b.String()
}

func pulse(level float64) func(float64) string {
	return func(t float64) string {
		_, u := math.Modf(t / 0.8)
		return fmt.Sprintf("%.2f", level+40*math.Exp(-math.Pow((u-0.25)/0.12, 2))-10*u)
	}
}

func flat(float64) string { return "80" }

// gapped has a missing stretch from 8 to 8.5 s.
func gapped(t float64) string {
	if t >= 8 && t < 8.5 {
		return "NaN"
	}
	return pulse(80)(t)
}

func demoed(t testing.TB) *screentest.Bench {
	t.Helper()
	return screentest.New(New(), demo(t, nil), area, tui.Theme{})
}

// demo is the demo's study up to its beats.
func demo(t testing.TB, change func(*casefile.Case)) study.Study {
	t.Helper()
	c := screentest.DemoCase(t)
	if change != nil {
		change(&c)
	}
	in, err := study.Read(c, func(name string) ([]byte, error) { return fs.ReadFile(demofiles.Files(), name) })
	if err != nil {
		t.Fatal(err)
	}
	return computed(t, study.Study{Inputs: in})
}

// computed is a study up to its beats.
func computed(t testing.TB, s study.Study) study.Study {
	t.Helper()
	for s.Beats == nil {
		var err error
		if s, err = s.Next(context.Background()); err != nil {
			t.Fatal(err)
		}
	}
	return s
}

func changed(t *testing.T, b *screentest.Bench) casefile.Case {
	t.Helper()
	for _, msg := range slices.Backward(b.Told) {
		if m, ok := msg.(tui.ChangeMsg); ok {
			return m.Case
		}
	}
	t.Fatalf("no change among %v", b.Told)
	return casefile.Case{}
}

func said(b *screentest.Bench) string {
	var all []string
	for _, msg := range b.Told {
		if m, ok := msg.(tui.SayMsg); ok {
			all = append(all, m.Text.String())
		}
	}
	return strings.Join(all, "; ")
}

// studies are those of the golden files and of the property.
func studies(t testing.TB) map[string]study.Study {
	return map[string]study.Study{
		"demo":    demo(t, nil),
		"hand":    demo(t, func(c *casefile.Case) { c.Drop, c.Keep = []float64{0.5}, []float64{10.5} }),
		"flat":    found(t, casefile.Case{}, file("abp_mmHg", flat)),
		"unused":  found(t, casefile.Case{}, file("\x1b[31mcvp\u202e_mmHg,temp_C", pulse(8), flat)),
		"none":    found(t, casefile.Case{}, file("temp_C", flat)),
		"gap":     found(t, casefile.Case{}, file("abp_mmHg", gapped)),
		"unclear": found(t, casefile.Case{}, file("abp_a_mmHg,abp_b_mmHg", pulse(80), pulse(70))),
		"nothing": {},
	}
}

func TestGolden(t *testing.T) {
	all := studies(t)
	for _, c := range []struct {
		name, study string
		keys        []string
	}{
		{"demo", "demo", nil},
		{"overlay", "demo", []string{"o"}},
		{"beat-over-average", "demo", []string{"N", "o", "b"}},
		{"unused", "demo", []string{"N"}},
		{"flow", "demo", []string{"c", "o", "N"}},
		{"list", "demo", []string{"N", "t"}},
		{"indices", "demo", []string{"i"}},
		{"whole", "demo", []string{"0"}},
		{"opened", "demo", []string{"c", "enter", "j", "j"}},
		{"hand", "hand", []string{"N"}},
		{"flat", "flat", nil},
		{"none", "none", nil},
		{"gap", "gap", []string{"N"}},
		{"unclear", "unclear", nil},
		{"nothing", "nothing", nil},
	} {
		t.Run(c.name, func(t *testing.T) {
			screentest.Golden(t, c.name, func(a tui.Area, theme tui.Theme) string {
				return screentest.New(New(), all[c.study], a, theme).Press(c.keys...).View()
			})
		})
	}
}

// at is the number of the beat under the cursor, counted from 1.
func at(b *screentest.Bench) int { return b.Screen.(Model).at + 1 }

func TestKeysMoveThroughTheBeats(t *testing.T) {
	for _, c := range []struct {
		keys []string
		want int
	}{
		{nil, 1},
		{[]string{"n"}, 2},
		{[]string{"n", "n", "p"}, 2},
		{[]string{"right", "l", "j", "down", "left", "h", "k", "up"}, 1},
		{[]string{"G"}, 30},
		{[]string{"G", "n"}, 30},
		{[]string{"G", "g"}, 1},
		{[]string{"p"}, 1},
		{[]string{"N"}, 15},
		{[]string{"N", "N", "N"}, 17},
		{[]string{"G", "P"}, 17},
	} {
		if got := at(demoed(t).Press(c.keys...)); got != c.want {
			t.Errorf("%v goes to beat %d, not %d", c.keys, got, c.want)
		}
	}
	if b := demoed(t).Press("N", "N", "N", "N"); !strings.Contains(said(b), "every beat after this one is used") {
		t.Errorf("told %v", b.Told)
	}
}

// The premature beat of the demo is its 16th.
func TestTheReasonIsUnderTheCursor(t *testing.T) {
	b := demoed(t).Press("N", "n")
	if v := b.View(); !strings.Contains(v, "beat 16 of 30: not used, early;") {
		t.Errorf("view:\n%s", v)
	}
	b.Resize(tui.Area{Width: 160, Height: 46}, tui.Theme{})
	if v := b.View(); !strings.Contains(v, "its onset came too early") {
		t.Errorf("view:\n%s", v)
	}
}

func TestEveryReasonIsExplained(t *testing.T) {
	for _, r := range beat.Reasons() {
		if explained(r) == "" && r != beat.ByHand {
			t.Errorf("%q is not explained", r)
		}
	}
}

func TestTheBeatUnderTheCursorIsInView(t *testing.T) {
	b := demoed(t)
	for range 31 {
		m := b.Screen.(Model)
		from, to := m.trace.Window()
		if x := m.beatsShown()[m.at]; x.From < from || x.To > to {
			t.Fatalf("beat %d, samples %d to %d, is outside %d to %d", m.at, x.From, x.To, from, to)
		}
		b.Press("n")
	}
}

func TestDropAndRestore(t *testing.T) {
	s := demo(t, nil)
	b := screentest.New(New(), s, area, tui.Theme{}).Press("n", "d")
	c := changed(t, b)
	beats := s.Beats.Beats
	if len(c.Drop) != 1 || len(c.Keep) != 0 {
		t.Fatalf("drop %v, keep %v", c.Drop, c.Keep)
	}
	grid := s.Intake.Grid
	if d := c.Drop[0]; d <= grid.At(beats[1].From) || d >= grid.At(beats[1].To) {
		t.Errorf("%v s is not inside beat 2", d)
	}
	if v := b.View(); !strings.Contains(v, "beat 2 of 30: dropped by hand") || !strings.Contains(v, "(working)") {
		t.Errorf("not shown at once:\n%s", v)
	}
	b.Show(s.With(c))
	b.Show(computed(t, s.With(c)))
	v := b.View()
	if !strings.Contains(v, "26 of 30 beats used") || strings.Contains(v, "(working)") || at(b) != 2 {
		t.Errorf("after computing, on beat %d:\n%s", at(b), v)
	}
	b.Press("d")
	if c := changed(t, b); len(c.Drop) != 0 || len(c.Keep) != 0 {
		t.Errorf("restoring leaves drop %v, keep %v", c.Drop, c.Keep)
	}
}

func TestRestoreAgainstTheRule(t *testing.T) {
	s := demo(t, nil)
	b := screentest.New(New(), s, area, tui.Theme{}).Press("N", "d")
	c := changed(t, b)
	if len(c.Keep) != 1 || len(c.Drop) != 0 {
		t.Fatalf("drop %v, keep %v", c.Drop, c.Keep)
	}
	b.Show(computed(t, s.With(c)))
	if v := b.View(); !strings.Contains(v, "28 of 30 beats used") || !strings.Contains(v, "beat 15 of 30: restored by hand") {
		t.Errorf("after computing:\n%s", v)
	}
	if c := changed(t, b.Press("d")); len(c.Keep) != 0 || len(c.Drop) != 0 {
		t.Errorf("back to the rule leaves drop %v, keep %v", c.Drop, c.Keep)
	}
}

func TestAGapCannotBeRestored(t *testing.T) {
	b := screentest.New(New(), studies(t)["gap"], area, tui.Theme{}).Press("N", "d")
	if !strings.Contains(said(b), "cannot be restored") || len(b.Told) != 1 {
		t.Errorf("told %v", b.Told)
	}
}

func TestDropLeavesTheShownCaseAlone(t *testing.T) {
	drop := make([]float64, 1, 8)
	drop[0] = 0.5
	s := demo(t, func(c *casefile.Case) { c.Drop = drop })
	screentest.New(New(), s, area, tui.Theme{}).Press("G", "d", "g", "d")
	if got := drop[:2]; got[0] != 0.5 || got[1] != 0 {
		t.Errorf("the case shown has become %v", got)
	}
}

func TestNothingToDropWhereNothingLeads(t *testing.T) {
	b := screentest.New(New(), studies(t)["unclear"], area, tui.Theme{}).Press("d")
	if !strings.Contains(said(b), "first settle") {
		t.Errorf("told %v", b.Told)
	}
}

func TestFlowIsShownWhereItIsSampled(t *testing.T) {
	s := demo(t, nil)
	r := makeReady(1, *s.Beats)
	delay := int(math.Round(s.Beats.Delay.Value * s.Intake.Grid.Rate))
	if delay != 5 { // 0.025 s at 200 Hz
		t.Fatalf("the demo's delay is %d samples", delay)
	}
	for i, b := range s.Beats.Beats {
		if got := r.signals[1].beats[i].From; got != max(0, b.From-delay) {
			t.Fatalf("beat %d of the flow begins at %d, that of the pressure at %d", i, got, b.From)
		}
	}
}

func TestTheOverlayOfAUsedBeatIsTheBeat(t *testing.T) {
	s := demo(t, nil)
	r := makeReady(1, *s.Beats)
	for _, signal := range r.signals {
		o := makeOverlay(order{number: 1, area: tui.Area{Width: 80, Height: 20}}, signal)
		p := o.with(signal, 3, "beat 4")
		got := p.Series[len(p.Series)-2].Values
		want := chart.Columns(signal.cloud[3], 0, len(signal.cloud[3]), o.columns, 0)
		low, high := s.Beats.Flow.Period.Extremes()
		for c := range want {
			if math.Abs(got[c]-want[c]) > 0.15*(high-low) {
				t.Errorf("%s, column %d: %v, in the ensemble %v", signal.role, c, got[c], want[c])
			}
		}
	}
}

// TestCloudDrawsWhatAllBeatsDraw holds the cloud against drawing every beat.
func TestCloudDrawsWhatAllBeatsDraw(t *testing.T) {
	s := demo(t, nil)
	signal := makeReady(1, *s.Beats).signals[0]
	o := makeOverlay(order{number: 1, area: tui.Area{Width: 70, Height: 18}}, signal)
	p := o.plot
	p.Series = p.Series[:len(p.Series)-1]
	direct := o.plot
	direct.Series = nil
	for i, b := range signal.cloud {
		series := chart.Series{Values: chart.Columns(b, 0, len(b), o.columns, 0), Glyph: chart.Dots}
		if i == 0 {
			series.Name = "beats"
		}
		direct.Series = append(direct.Series, series)
	}
	if got, want := p.Draw(70, 18, chart.Theme{}), direct.Draw(70, 18, chart.Theme{}); got != want {
		t.Errorf("drawn\n%s\nand every beat\n%s", got, want)
	}
}

// TestNumbersAreThoseOfTheAverage holds printed numbers against the study.
func TestNumbersAreThoseOfTheAverage(t *testing.T) {
	s := demo(t, nil)
	low, high := s.Beats.Pressure.Period.Extremes()
	m := beat.Measure(s.Beats.Pressure.Period)
	v := demoed(t).Press("i").View()
	for label, want := range map[string]float64{
		"maximum": high, "minimum": low, "mean": s.Beats.Pressure.Period.Mean(), "Gosling PI": (high - low) / s.Beats.Pressure.Period.Mean(),
		"time to peak": m.TimeToPeak,
	} {
		found := false
		for _, line := range strings.Split(v, "\n") {
			if rest, ok := strings.CutPrefix(line, label+"  "); ok {
				var got float64
				if _, err := fmt.Sscan(strings.Fields(rest)[0], &got); err != nil || math.Abs(got-want) > 0.02*math.Abs(want) {
					t.Errorf("%s: %q, the average beat has %v", label, line, want)
				}
				found = true
			}
		}
		if !found {
			t.Errorf("%s is not shown:\n%s", label, v)
		}
	}
}

func TestTally(t *testing.T) {
	s := demo(t, nil)
	got := makeReady(1, *s.Beats).tally
	want := []count{{"used", 27}, {"early", 1}, {"after an early beat", 1}, {"too short", 1}}
	if d := cmp.Diff(want, got, cmp.AllowUnexported(count{})); d != "" {
		t.Error(d)
	}
	if n := total(got); n != len(s.Beats.Beats) {
		t.Errorf("%d beats in all, %d were found", n, len(s.Beats.Beats))
	}
}

func TestOtherReasonsAreCounted(t *testing.T) {
	m := demoed(t).Screen.(Model)
	m.ready.tally = []count{{"used", 9}, {"gap", 1}, {"early", 2}, {"level", 3}, {"shape", 4}}
	got := strings.Join(m.reasons(4), "|")
	if !strings.Contains(got, "not used               10") || !strings.Contains(got, " other reasons          9") {
		t.Errorf("%q", got)
	}
}

func TestEmptyStatesSayWhyAndWhatCuresThem(t *testing.T) {
	all := studies(t)
	for name, want := range map[string][]string{
		"flat":    {"No average beat: no pulse in abp_mmHg: flat.", "What would cure it: on the intake (1)"},
		"none":    {"No average beat", "What would cure it: a recording of arterial pressure"},
		"unclear": {"No average beat: the pressure could be abp_a_mmHg or abp_b_mmHg", "What would cure it: "},
		"nothing": {"The beats have not been looked for yet."},
	} {
		v := screentest.New(New(), all[name], tui.Area{Width: 200, Height: 50}, tui.Theme{}).View()
		for _, w := range want {
			if !strings.Contains(v, w) {
				t.Errorf("%s: not said %q:\n%s", name, w, v)
			}
		}
	}
}

func TestLateBeatsAreDropped(t *testing.T) {
	first, late := New().Show(studies(t)["gap"])
	second, now := first.Show(demo(t, nil))
	second, _ = second.Resize(area, tui.Theme{})
	second, _ = second.Update(now())
	shown := second.View()
	if third, _ := second.Update(late()); third.View() != shown || !strings.Contains(shown, "30 beats") {
		t.Errorf("late beats are shown:\n%s", third.View())
	}
}

func TestShownBeforeItsSizeIsKnown(t *testing.T) {
	s := demo(t, nil)
	early := &screentest.Bench{Screen: New()}
	early.Show(s)
	early.Resize(area, tui.Theme{})
	if got, want := early.View(), demoed(t).View(); got != want {
		t.Errorf("shown\n%s\nnot\n%s", got, want)
	}
}

// TestAStepChangesFewLines: what changes is sent over a slow link.
func TestAStepChangesFewLines(t *testing.T) {
	b := demoed(t).Press("N")
	before := strings.Split(b.View(), "\n")
	changed := 0
	for i, line := range strings.Split(b.Press("n").View(), "\n") {
		if line != before[i] {
			changed++
		}
	}
	if changed != 2 {
		t.Errorf("a step changes %d lines; the row of marks and the line of the beat are 2", changed)
	}
}

func TestKeysAreListedOnceAndAreNotTheRoots(t *testing.T) {
	root := []string{"1", "2", "3", "4", "5", "6", "tab", "shift+tab", "?", "u", "ctrl+r", "s", "q", "ctrl+c", "ctrl+l", "ctrl+z", "esc", "A"}
	seen := map[string]string{}
	for _, k := range demoed(t).Screen.Keys() {
		if k.Help().Key == "" || k.Help().Desc == "" {
			t.Errorf("%v has no help", k.Keys())
		}
		for _, name := range k.Keys() {
			if was, twice := seen[name]; twice || slices.Contains(root, name) {
				t.Errorf("%q is bound to %q and %q", name, was, k.Help().Desc)
			}
			seen[name] = k.Help().Desc
		}
	}
	if len(seen) < 20 {
		t.Errorf("only %d keys", len(seen))
	}
}

func TestEveryKeyIsListedWithAllItsNames(t *testing.T) {
	for _, keys := range [][]string{nil, {"o"}, {"i"}, {"t"}, {"v"}} {
		screentest.NamesAll(t, demoed(t).Press(keys...).Screen)
	}
}

func TestKeysOfBeatsNeedBeats(t *testing.T) {
	b := screentest.New(New(), screentest.Pressure(t, "aortic_pressure", false), area, tui.Theme{})
	for _, k := range b.Screen.Keys() {
		for _, name := range []string{"n", "p", "N", "g", "G", "d"} {
			if slices.Contains(k.Keys(), name) {
				t.Errorf("%q %s is listed without a beat", name, k.Help().Desc)
			}
		}
	}
}

// The screen shows the indices as the note does, with the one computation: the
// time to the peak is read off to a sample, so that it is never exact.
func TestIntervalsAreThoseOfTheNote(t *testing.T) {
	s := demo(t, nil)
	indices := s.Beats.Indices(1)
	v := demoed(t).Press("c", "i").View()
	for _, e := range indices {
		if e.Index != beat.TimeToPeak {
			continue
		}
		want := casenote.FormatRange(e.Value, e.Total)
		if !(e.Total.Width() > 0) || !strings.Contains(v, want) || strings.Contains(v, "exact") {
			t.Errorf("time to peak is not %s:\n%s", want, v)
		}
	}
	if !strings.Contains(v, " cm2 = flow") {
		t.Errorf("the flow does not say where it comes from:\n%s", v)
	}
}

func TestATooShortBeatSaysItsLength(t *testing.T) {
	b := demoed(t).Press("c")
	for range 9 {
		b.Press("N")
		if v := b.View(); strings.Contains(v, "too short;") && strings.Contains(v, " s long") {
			return
		}
	}
	t.Errorf("no line of a beat too short has its length:\n%s", b.View())
}

func TestKeysThatAreNotListedDoNothing(t *testing.T) {
	for _, keys := range [][]string{nil, {"o"}, {"i"}} {
		b := demoed(t).Press(keys...)
		listed := map[string]bool{}
		for _, k := range b.Screen.Keys() {
			for _, name := range k.Keys() {
				listed[name] = true
			}
		}
		before := b.View()
		for r := '!'; r <= '~'; r++ {
			if !listed[string(r)] {
				if b.Press(string(r)); b.View() != before || len(b.Told) != 0 {
					t.Fatalf("after %v, %q does something and is not listed", keys, r)
				}
			}
		}
	}
}

func TestAnyKeysAndSizes(t *testing.T) {
	all := studies(t)
	var list []study.Study
	for _, s := range all {
		list = append(list, s)
	}
	keys := []string{
		"n", "p", "N", "P", "g", "G", "d", "c", "enter", "o", "b", "i", "t", "v", "+", "-", "0", "esc", "left", "x", "pgdown",
	}
	rapid.Check(t, func(rt *rapid.T) {
		theme := tui.Theme{ASCII: rapid.Bool().Draw(rt, "ascii"), Colours: rapid.SampledFrom([]int{0, 16, 256}).Draw(rt, "colours")}
		draw := func() tui.Area {
			return tui.Area{Width: rapid.IntRange(1, 250).Draw(rt, "width"), Height: rapid.IntRange(1, 80).Draw(rt, "height")}
		}
		one := func() study.Study { return list[rapid.IntRange(0, len(list)-1).Draw(rt, "study")] }
		a := draw()
		b := screentest.New(New(), one(), a, theme)
		for range rapid.IntRange(1, 12).Draw(rt, "steps") {
			switch rapid.IntRange(0, 9).Draw(rt, "step") {
			case 0:
				a = draw()
				b.Resize(a, theme)
			case 1:
				b.Show(one())
			default:
				b.Press(rapid.SampledFrom(keys).Draw(rt, "key"))
			}
			screentest.Fits(t, b.View(), a, theme)
			b.Screen.Keys()
		}
	})
}

// long is 10 minutes of a pressure at 1 kHz, 75 beats a minute.
func long(t testing.TB) study.Study {
	const n = 600_000
	rec := &data.Recording{Name: data.Clean("long.csv"), Time: make([]float64, n)}
	p := data.Channel{Name: data.Clean("abp_mmHg"), Quantity: unit.Pressure, Unit: unit.Internal(unit.Pressure), Site: data.SiteRoot, Values: make([]float64, n)}
	for i := range n {
		rec.Time[i] = float64(i) / 1000
		_, u := math.Modf(rec.Time[i] / 0.8)
		p.Values[i] = 80 + 40*math.Exp(-math.Pow((u-0.25)/0.12, 2)) - 10*u + 2*math.Sin(rec.Time[i])
	}
	rec.Channels = []data.Channel{p}
	return computed(t, study.Study{Inputs: study.Inputs{Recording: rec}})
}

func TestLongRecording(t *testing.T) {
	s := long(t)
	screentest.New(New(), s, area, tui.Theme{}).Press("o")
	if n := len(s.Beats.Beats); n < 700 {
		t.Errorf("only %d beats", n)
	}
}

func TestReferenceRecordings(t *testing.T) {
	dir := os.DirFS("../../../shared/reference-data")
	for _, name := range []string{"icu_art_ecg_125hz_600s.csv", "tcd_abp_mcav_1000hz_168s.csv", "tcd_abp_mcav_10hz_beataveraged_300s.csv"} {
		content, err := fs.ReadFile(dir, name)
		if err != nil {
			t.Skip("the reference recordings are not beside the repository")
		}
		b := screentest.New(New(), found(t, casefile.Case{}, string(content)), area, tui.Theme{})
		screentest.Fits(t, b.View(), area, tui.Theme{})
		averaged := strings.Contains(name, "beataveraged")
		if strings.Contains(b.View(), "No average beat") != averaged {
			t.Errorf("%s:\n%s", name, b.View())
		}
	}
}

func BenchmarkView(b *testing.B) {
	for name, keys := range map[string][]string{"trace and overlay": nil, "indices": {"i"}, "list": {"t"}} {
		b.Run(name, func(b *testing.B) {
			bench := screentest.New(New(), long(b), tui.Area{Width: 200, Height: 52}, tui.Theme{Colours: 256}).Press(keys...)
			b.ReportAllocs()
			for b.Loop() {
				bench.View()
			}
		})
	}
}
