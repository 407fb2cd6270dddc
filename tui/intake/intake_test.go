package intake

import (
	"io/fs"
	"math"
	"os"
	"slices"
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"
	"github.com/google/go-cmp/cmp/cmpopts"
	"pgregory.net/rapid"

	"afterbeat/data"
	"afterbeat/data/casefile"
	"afterbeat/data/unit"
	"afterbeat/tree/study"
	"afterbeat/tui"
	"afterbeat/tui/screentest"
	"afterbeat/tui/warnlist"
)

var area = tui.Area{Width: 80, Height: 20}

// odd is a recording that needs a person: two arterial pressures of equal
// right, a hole, a missing stretch, a name with an escape and a bidirectional
// mark.
const oddHeader = "time_s,abp_a_mmHg,abp_b_mmHg,\x1b[31mflow\u202e_mL_s,note_V\n"

func oddFile() []byte {
	var b strings.Builder
	b.WriteString(oddHeader)
	for i := range 2000 {
		t := float64(i) / 100
		p := data.Clean(seconds(90 + 20*math.Sin(2*math.Pi*t)))
		if i >= 800 && i < 900 {
			p = data.Clean("NaN")
		}
		b.WriteString(seconds(t) + "," + p.String() + "," + seconds(85+20*math.Sin(2*math.Pi*t)) + "," +
			seconds(100*math.Sin(2*math.Pi*t)) + "," + seconds(math.Cos(t)) + "\n")
	}
	return []byte(b.String())
}

// odd is the study of that recording, as far as it comes.
func odd(t testing.TB, change func(*casefile.Case)) study.Study {
	t.Helper()
	c := casefile.Case{Recording: "odd.csv"}
	if change != nil {
		change(&c)
	}
	in, err := study.Read(c, func(string) ([]byte, error) { return oddFile(), nil })
	if err != nil {
		t.Fatal(err)
	}
	return study.Study{Inputs: in}
}

func demoed(t testing.TB) *screentest.Bench {
	t.Helper()
	return screentest.New(New(), screentest.Demo(t, nil), area, tui.Theme{})
}

// changed is the case of the last change that was told.
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

func TestGolden(t *testing.T) {
	demo := screentest.Demo(t, nil)
	spanned := screentest.Demo(t, func(c *casefile.Case) {
		from, to := 4.0, 16.5
		c.From, c.To = &from, &to
		c.Scale, c.Invert = map[string]float64{"aortic_pressure_mmHg": 1.02}, []string{"lvot_velocity_cm_s"}
	})
	for _, c := range []struct {
		name  string
		study study.Study
		keys  []string
	}{
		{"demo", demo, nil},
		{"span", spanned, []string{"+", "H", "H"}},
		{"table", demo, []string{"t"}},
		{"unit", demo, []string{"e", "f", "u", "r"}},
		{"beside", demo, []string{"m"}},
		{"unsettled", odd(t, nil), nil},
		{"warnings", odd(t, nil), []string{"v"}},
		{"nothing", study.Study{}, nil},
	} {
		t.Run(c.name, func(t *testing.T) {
			screentest.Golden(t, c.name, func(a tui.Area, theme tui.Theme) string {
				return screentest.New(New(), c.study, a, theme).Press(c.keys...).View()
			})
		})
	}
}

func TestKeysChangeTheCase(t *testing.T) {
	// In 80 cells the trace has 73 columns, of 22.14 s/72 = 0.3075 s each; the
	// cursor begins in the middle, at 11.07 s.
	const p, v = "aortic_pressure_mmHg", "lvot_velocity_cm_s"
	start := screentest.DemoCase(t)
	for name, c := range map[string]struct {
		keys []string
		want func(*casefile.Case)
	}{
		"next site":     {[]string{"o"}, func(c *casefile.Case) { c.Site[p] = "lvot" }},
		"two sites on":  {[]string{"o", "o"}, func(c *casefile.Case) { c.Site[p] = "graft" }},
		"site before":   {[]string{"O"}, func(c *casefile.Case) { c.Site[p] = "other" }},
		"of the second": {[]string{"j", "O"}, func(c *casefile.Case) { c.Site[v] = "root" }},
		"and back":      {[]string{"j", "j", "k", "o"}, func(c *casefile.Case) { c.Site[p] = "lvot" }},
		"invert":        {[]string{"i"}, func(c *casefile.Case) { c.Invert = []string{p} }},
		"invert twice":  {[]string{"i", "i"}, func(*casefile.Case) {}},
		"span":          {[]string{"H", "H", "[", "L", "L", "L", "]"}, func(c *casefile.Case) { c.From, c.To = ptr(4.92), ptr(14.145) }},
		"whole span":    {[]string{"[", "w"}, func(*casefile.Case) {}},
		"span to begin": {[]string{"[", "g", "["}, func(*casefile.Case) {}},
		"span to end":   {[]string{"]", "G", "]"}, func(*casefile.Case) {}},
		"unit":          {[]string{"e", "kPa", "enter"}, func(c *casefile.Case) { c.Unit = map[string]string{p: "kPa"} }},
		"unit and quantity": {[]string{"e", "mL/s", "enter"}, func(c *casefile.Case) {
			c.Unit, c.Pressure = map[string]string{p: "mL/s"}, ""
		}},
		"unit of the file": {[]string{"e", "kPa", "enter", "e", "ctrl+u", "enter"}, func(*casefile.Case) {}},
		"calibration": {[]string{"c", "scale 1.02 offset -3", "enter"}, func(c *casefile.Case) {
			c.Scale, c.Offset = map[string]float64{p: 1.02}, map[string]float64{p: -3}
		}},
		"beside": {[]string{"m", "ctrl+u", "diameter 2.1 angle 0 outflow 8", "enter"}, func(c *casefile.Case) {
			c.DiameterCM, c.AngleDeg, c.OutflowPressure = ptr(2.1), ptr(0), ptr(8)
		}},
		"beside, one cleared": {[]string{"m", "ctrl+u", "delay none, Diameter=2", "enter"}, func(c *casefile.Case) {
			c.Delay, c.DiameterCM = "", ptr(2)
		}},
		"calibration undone": {[]string{"c", "scale 2", "enter", "c", "ctrl+u", "enter"}, func(*casefile.Case) {}},
	} {
		t.Run(name, func(t *testing.T) {
			b := demoed(t).Press(c.keys...)
			want := screentest.DemoCase(t)
			c.want(&want)
			if d := cmp.Diff(want, changed(t, b), cmpopts.EquateEmpty(), cmpopts.IgnoreUnexported(casefile.Case{})); d != "" {
				t.Error(d)
			}
		})
	}
	if d := cmp.Diff(start, screentest.DemoCase(t), cmpopts.IgnoreUnexported(casefile.Case{})); d != "" {
		t.Errorf("the case that was shown has changed:\n%s", d)
	}
}

func ptr(v float64) *float64 { return &v }

func TestChangesLeaveTheShownCaseAlone(t *testing.T) {
	s := screentest.Demo(t, func(c *casefile.Case) { c.Invert = []string{"lvot_velocity_cm_s"} })
	b := screentest.New(New(), s, area, tui.Theme{})
	b.Press("o", "i", "j", "o", "i", "[", "e", "m/s", "enter", "c", "scale 2", "enter")
	c := s.Inputs.Case
	if c.Site["aortic_pressure_mmHg"] != "root" || len(c.Invert) != 1 || c.Unit != nil || c.Scale != nil || c.From != nil {
		t.Errorf("a change reached into the case shown: %+v", c)
	}
}

func TestUseByQuantity(t *testing.T) {
	s := odd(t, nil)
	b := screentest.New(New(), s, area, tui.Theme{})
	for i, want := range []casefile.Case{{Pressure: "abp_a_mmHg"}, {Pressure: "abp_b_mmHg"}, {Flow: data.Clean("\x1b[31mflow\u202e_mL_s").String()}} {
		b := screentest.New(New(), s, area, tui.Theme{})
		got := changed(t, b.Press("k", "k", "k").Press(strings.Split(strings.Repeat("j", i), "")...).Press("enter"))
		if got.Pressure != want.Pressure || got.Flow != want.Flow {
			t.Errorf("channel %d: pressure %q, flow %q", i, got.Pressure, got.Flow)
		}
	}
	b.Press("j", "j", "j", "enter")
	if !strings.Contains(said(b), "state its unit with e") {
		t.Errorf("a channel in volts is used as something: %v", b.Told)
	}
	if b := demoed(t).Press("enter"); !strings.Contains(said(b), "already the pressure") {
		t.Errorf("told %v", b.Told)
	}
}

func TestVelocityTakesThePlaceOfFlow(t *testing.T) {
	n := names{{Name: data.Clean("q"), Quantity: unit.Flow}, {Name: data.Clean("v"), Quantity: unit.Velocity}}
	c, _, _ := n.use(casefile.Case{Flow: "q"}, 1)
	if c.Flow != "" || c.Velocity != "v" {
		t.Errorf("flow %q, velocity %q", c.Flow, c.Velocity)
	}
	c, _, _ = n.use(c, 0)
	if c.Flow != "q" || c.Velocity != "" {
		t.Errorf("flow %q, velocity %q", c.Flow, c.Velocity)
	}
}

func TestNamesOfTheCaseAreTakenOver(t *testing.T) {
	s := screentest.Demo(t, func(c *casefile.Case) {
		c.Site = map[string]string{"aortic_pressure": "radial"} // the part before the unit
		c.Invert = []string{"LVOT_velocity"}
	})
	b := screentest.New(New(), s, area, tui.Theme{}).Press("o", "j", "i")
	got := changed(t, b)
	if d := cmp.Diff(map[string]string{"aortic_pressure_mmHg": "finger"}, got.Site); d != "" {
		t.Error(d)
	}
	if len(got.Invert) != 0 {
		t.Errorf("still inverted: %q", got.Invert)
	}
}

func TestSpanIsNeverEmpty(t *testing.T) {
	b := demoed(t).Press("[", "H", "]")
	if changed(t, b).To != nil || !strings.Contains(said(b), "the span starts at 11.07 s") {
		t.Errorf("told %v", b.Told)
	}
}

func TestWrongTextIsAnsweredAtOnce(t *testing.T) {
	b := demoed(t).Press("e", "furlong")
	if v := b.View(); !b.Screen.Typing() || !strings.Contains(v, "not taken: no unit known here") {
		t.Fatalf("no answer:\n%s", v)
	}
	b.Press("enter")
	if !b.Screen.Typing() || len(b.Told) != 0 {
		t.Errorf("a wrong unit is taken: %v", b.Told)
	}
	b.Press("esc")
	if b.Screen.Typing() {
		t.Error("esc does not leave the field")
	}
	for text, want := range map[string]string{
		"scale":     "scale needs a number",
		"scale x":   `not "x"`,
		"scale 0":   "would leave nothing",
		"gain 2":    "write scale FACTOR",
		"offset -3": "becomes 1 x value -3 mmHg",
	} {
		b := demoed(t).Press("c", text)
		if v := b.View(); !strings.Contains(v, want) {
			t.Errorf("%q is not answered with %q:\n%s", text, want, v)
		}
	}
}

func TestBesideIsAnsweredAtOnce(t *testing.T) {
	for text, want := range map[string]string{
		"diameter":               "not taken: diameter needs a number in cm",
		"diameter 0":             "not taken: the diameter is above 0 cm",
		"angle 90":               "not taken: the angle is at least 0 and below 90",
		"delay 25":               "not taken: the delay is in seconds, at most 1",
		"outflow 80":             "not taken: the outflow pressure must lie below the mean pressure of 76.8",
		"size 2":                 `not taken: "size" is none of diameter, angle, delay, outflow`,
		"delay 25ms":             `not taken: delay needs a number in s, or none, not "25ms"`,
		"diameter none":          "diameter none, angle none, delay 0.025 s, outflow 7 mmHg; none clears one",
		"angle 9 diameter nan":   "not taken: diameter needs a number",
		"diameter none angle 20": "not taken: an angle needs the diameter too",
	} {
		b := demoed(t).Press("m", "ctrl+u", text)
		if v := b.View(); !strings.Contains(v, want) {
			t.Errorf("%q is not answered with %q:\n%s", text, want, v)
		}
		if b.Press("enter"); strings.HasPrefix(want, "not taken") && (len(b.Told) != 0 || !b.Screen.Typing()) {
			t.Errorf("%q is taken: %v", text, b.Told)
		}
	}
	if v := demoed(t).Press("m").View(); !strings.Contains(v, "measured beside: diameter 2.2 delay 0.025 outflow 7|") {
		t.Errorf("the field does not begin with what there is:\n%s", v)
	}
}

func TestBesideIsShown(t *testing.T) {
	s := screentest.Demo(t, nil)
	b := screentest.New(New(), s, area, tui.Theme{})
	b.Show(s.With(changed(t, b.Press("m", "ctrl+u", "diameter 2.1 delay none", "enter"))))
	if v := b.View(); !strings.Contains(v, "measured beside: diameter 2.1 cm, angle none, delay none, outflow 7 mmHg") || strings.Contains(v, "(working)") {
		t.Errorf("view:\n%s", v)
	}
	c := besideOf(casefile.Case{Delay: "0.0250"}).into(casefile.Case{Delay: "0.0250"})
	if c.Delay != "0.0250" {
		t.Errorf("the delay that was not changed is %q", c.Delay)
	}
}

// Unlikely values show once the beats are computed, and a pressure upside down
// before.
func TestUnlikelyValuesAreWarnedOf(t *testing.T) {
	s := screentest.Demo(t, func(c *casefile.Case) { c.Unit = map[string]string{"aortic_pressure_mmHg": "kPa"} })
	unknown := s
	unknown.Beats, unknown.Fit, unknown.Comparison = nil, nil, nil
	b := screentest.New(New(), unknown, area, tui.Theme{})
	if v := b.View(); !strings.Contains(v, "no warnings") {
		t.Fatalf("warned before the beats:\n%s", v)
	}
	b.Show(s)
	row := ""
	for line := range strings.SplitSeq(b.View(), "\n") {
		if strings.HasPrefix(line, "> aortic") {
			row = line
		}
	}
	if !strings.HasSuffix(row, " 1") {
		t.Errorf("row %q", row)
	}
	if v := b.Press("v").View(); !strings.Contains(v, "unlikely-value: mean pressure is 576") || !strings.Contains(v, "here: e states the unit") {
		t.Errorf("list:\n%s", v)
	}
	b = demoed(t).Press("i")
	b.Show(screentest.Demo(t, nil).With(changed(t, b)))
	if v := b.View(); !strings.Contains(v, "upside down? i turns it back") {
		t.Errorf("view:\n%s", v)
	}
	if v := b.Press("v").View(); !strings.Contains(v, "below 0") {
		t.Errorf("list:\n%s", v)
	}
	b = screentest.New(New(), screentest.Demo(t, func(c *casefile.Case) { c.Invert = []string{"lvot_velocity_cm_s"} }), area, tui.Theme{})
	if v := b.Press("v").View(); !strings.Contains(v, "reversed-flow") || !strings.Contains(v, "here: i inverts") {
		t.Errorf("list:\n%s", v)
	}
}

func TestEveryKeyIsListedWithAllItsNames(t *testing.T) {
	for _, keys := range [][]string{nil, {"e"}, {"m"}, {"t"}, {"v"}} {
		screentest.NamesAll(t, demoed(t).Press(keys...).Screen)
	}
}

func TestPasteGoesIntoTheFieldOnly(t *testing.T) {
	b := demoed(t)
	b.Paste("i")
	if len(b.Told) != 0 {
		t.Fatalf("a paste was taken for a key: %v", b.Told)
	}
	b.Press("e")
	b.Paste("k\x1bP\u202ea")
	screentest.Fits(t, b.View(), area, tui.Theme{})
	b.Press("ctrl+u")
	b.Paste("kPa")
	if b.Press("enter"); changed(t, b).Unit["aortic_pressure_mmHg"] != "kPa" {
		t.Errorf("told %v", b.Told)
	}
}

func TestAChangeComesBack(t *testing.T) {
	s := screentest.Demo(t, nil)
	b := screentest.New(New(), s, area, tui.Theme{}).Press("i", "o")
	if !strings.Contains(b.View(), "(working)") {
		t.Errorf("nothing says that the change is being computed:\n%s", b.View())
	}
	b.Show(s.With(changed(t, b)))
	v := b.View()
	if strings.Contains(v, "(working)") || !strings.Contains(v, "inverted") || !strings.Contains(v, "lvot ") {
		t.Errorf("the change is not shown:\n%s", v)
	}
	if !strings.Contains(v, "-86.") && !strings.Contains(v, "-68.5") {
		t.Errorf("the trace is not inverted:\n%s", v)
	}
	b.Show(s)
	if strings.Contains(b.View(), "inverted") {
		t.Errorf("after undo:\n%s", b.View())
	}
}

func TestLateRecordingIsDropped(t *testing.T) {
	first, late := New().Show(odd(t, nil))
	second, now := first.Show(screentest.Demo(t, nil))
	second, _ = second.Resize(area, tui.Theme{})
	second, _ = second.Update(now())
	shown := second.View()
	third, _ := second.Update(late())
	if third.View() != shown || !strings.Contains(shown, "aortic_pressure_mmHg") {
		t.Errorf("a late answer is shown:\n%s", third.View())
	}
}

func TestUnsettledCanBeSettledHere(t *testing.T) {
	s := odd(t, nil)
	b := screentest.New(New(), s, area, tui.Theme{})
	if v := b.View(); !strings.Contains(v, "To settle first: the pressure could be abp_a_mmHg or abp_b_mmHg") {
		t.Fatalf("not said what to settle:\n%s", v)
	}
	b.Show(s.With(changed(t, b.Press("enter"))))
	if v := b.View(); strings.Contains(v, "To settle") || !strings.Contains(v, "pressure") {
		t.Errorf("still unsettled:\n%s", v)
	}
}

func TestAWrongSiteStillShowsTheChannels(t *testing.T) {
	s := odd(t, func(c *casefile.Case) { c.Site = map[string]string{"nobody": "root"} })
	v := screentest.New(New(), s, area, tui.Theme{}).View()
	if !strings.Contains(v, "nobody") || !strings.Contains(v, "abp_b_mmHg") || !strings.Contains(v, "┤") {
		t.Errorf("view:\n%s", v)
	}
}

// TestAStepChangesFewLines: what changes is sent over a slow link.
func TestAStepChangesFewLines(t *testing.T) {
	b := demoed(t)
	before := strings.Split(b.View(), "\n")
	changed := 0
	for i, line := range strings.Split(b.Press("l").View(), "\n") {
		if line != before[i] {
			changed++
		}
	}
	if changed != 2 {
		t.Errorf("a step changes %d lines; the row of marks and the line of the cursor are 2", changed)
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

func TestKeysThatAreNotListedDoNothing(t *testing.T) {
	b := demoed(t)
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
				t.Fatalf("%q does something and is not listed", r)
			}
		}
	}
}

func TestAnyKeysAndSizes(t *testing.T) {
	studies := []study.Study{screentest.Demo(t, nil), odd(t, nil), {}, odd(t, func(c *casefile.Case) { c.Pressure = "abp_a" })}
	keys := []string{
		"j", "k", "enter", "o", "O", "e", "c", "i", "[", "]", "w", "h", "l", "H", "L", "g", "G", "+", "-", "0", "t", "v",
		"esc", "backspace", "left", "x", "kPa", "scale 2", "心", "pgdown",
	}
	rapid.Check(t, func(rt *rapid.T) {
		theme := tui.Theme{ASCII: rapid.Bool().Draw(rt, "ascii"), Colours: rapid.SampledFrom([]int{0, 16, 256}).Draw(rt, "colours")}
		a := tui.Area{Width: rapid.IntRange(1, 250).Draw(rt, "width"), Height: rapid.IntRange(1, 80).Draw(rt, "height")}
		any := func() study.Study { return studies[rapid.IntRange(0, len(studies)-1).Draw(rt, "study")] }
		b := screentest.New(New(), any(), a, theme)
		for range rapid.IntRange(1, 12).Draw(rt, "steps") {
			switch rapid.IntRange(0, 9).Draw(rt, "step") {
			case 0:
				a = tui.Area{Width: rapid.IntRange(1, 250).Draw(rt, "width"), Height: rapid.IntRange(1, 80).Draw(rt, "height")}
				b.Resize(a, theme)
			case 1:
				b.Show(any())
			default:
				b.Press(rapid.SampledFrom(keys).Draw(rt, "key"))
			}
			screentest.Fits(t, b.View(), a, theme)
			b.Screen.Keys()
		}
	})
}

// long is a recording of 10 minutes at 1 kHz.
func long() study.Study {
	const n = 600_000
	rec := &data.Recording{Name: data.Clean("long.csv"), Time: make([]float64, n)}
	p := data.Channel{Name: data.Clean("abp_mmHg"), Quantity: unit.Pressure, Unit: unit.Internal(unit.Pressure), Site: data.SiteRoot, Values: make([]float64, n)}
	for i := range n {
		rec.Time[i] = float64(i) / 1000
		p.Values[i] = 90 + 20*math.Sin(2*math.Pi*rec.Time[i])
	}
	p.Values[300_000] = 250
	rec.Channels = []data.Channel{p}
	return study.Study{Inputs: study.Inputs{Recording: rec}}
}

func TestLongRecording(t *testing.T) {
	b := screentest.New(New(), long(), area, tui.Theme{})
	if v := b.View(); !strings.Contains(v, "600000 rows") || !strings.Contains(v, "250") {
		t.Errorf("view:\n%s", v)
	}
}

func TestReferenceRecordings(t *testing.T) {
	dir := os.DirFS("../../../shared/reference-data")
	for _, name := range []string{"icu_art_pap_125hz_16s.csv", "tcd_abp_mcav_1000hz_168s.csv", "bench_pq_normovolemic_1000hz_58s.csv"} {
		content, err := fs.ReadFile(dir, name)
		if err != nil {
			t.Skip("the reference recordings are not beside the repository")
		}
		in, err := study.Read(casefile.Case{Recording: name}, func(string) ([]byte, error) { return content, nil })
		if err != nil {
			t.Fatal(err)
		}
		b := screentest.New(New(), study.Study{Inputs: in}, area, tui.Theme{})
		screentest.Fits(t, b.View(), area, tui.Theme{})
		if !strings.Contains(b.View(), "> ") || !strings.Contains(b.View(), "┤") {
			t.Errorf("%s:\n%s", name, b.View())
		}
	}
}

func BenchmarkView(b *testing.B) {
	bench := screentest.New(New(), long(), tui.Area{Width: 200, Height: 52}, tui.Theme{Colours: 256})
	b.ReportAllocs()
	for b.Loop() {
		bench.View()
	}
}

// Every key that a cure names is one of this screen.
func TestCuresNameKeysThatWork(t *testing.T) {
	bound := map[string]bool{}
	for _, k := range demoed(t).Screen.Keys() {
		for _, name := range k.Keys() {
			bound[name] = true
		}
	}
	for code, cure := range warnlist.Intake() {
		named := 0
		for word := range strings.FieldsSeq(cure) {
			if len(word) == 1 || word == "enter" {
				named++
				if !bound[word] {
					t.Errorf("%s: %q is no key here", code, word)
				}
			}
		}
		if named == 0 {
			t.Errorf("%s: %q names no key", code, cure)
		}
	}
}
