package casefile

import (
	"errors"
	"fmt"
	"math"
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"
	"github.com/google/go-cmp/cmp/cmpopts"
	"pgregory.net/rapid"

	"afterbeat/data"
	"afterbeat/data/casenote"
)

func ptr[T any](v T) *T { return &v }

// diff compares what was chosen; lines, and the difference between an empty
// list and none, do not count.
func diff(want, got Case) string {
	return cmp.Diff(want, got, cmpopts.IgnoreUnexported(Case{}), cmpopts.EquateEmpty())
}

const full = `# a case with every key
recording = "../a b.csv"
label = 'pilot-07'
time = "t"
pressure = "abp"
flow = "q"
velocity = "v"
invert = ["q",
  "v"]
rate = 125
from = -1.5
to = 0
exclude = "artefacts.csv"
diameter_cm = 2.1
angle_deg = 20
profile = 1
outflow_pressure = 0
delay = 0.0125
beats = "support"
one_beat = true
model = "wk3"
replicates = 2000
seed = -7
share = [0, 0.25, 1.0]
edv_ml = 210
ef = 0.25
pump = "generic A"
speed = [8, 9.5]
quote = 8
match = "flow"
hold_resistance = 0.9
drop = [3.5]
keep = [7, 8.25]
height_cm = 172
weight_kg = 80
age = 63
sex = "female"
pwv_m_s = 8.5
tree = "arteries.csv"
brain_flow_ml_min = 660
hold_out = "radial"
brief = true
remark = "worth a second look"
basis = "span"
error.flow = "10 %"
error.cardiac-output = 0.5
ventricle = { Pfill = 20, activation = "hill" }
cardiac_output = 4.2
output_by = "fick"
cuff = "118/74"

[site]
abp = "root"
"q.1" = "lvot"

[unit]
"na=me" = "mL/s"
[scale]
abp = 1.05
[offset]
abp = -3
[modulation]
shape = "square"
low = 7.5
locked = 2
[calibrate]
abp = "mean:93/80"
[sensor_height_cm]
abp = 12.5
[velocity_range]
v = 128
[vessel_cm]
carotid = 0.65
`

func fullCase() Case {
	return Case{
		Recording: "../a b.csv", Label: "pilot-07",
		Time: "t", Pressure: "abp", Flow: "q", Velocity: "v",
		Site:      map[string]string{"abp": "root", "q.1": "lvot"},
		Unit:      map[string]string{"na=me": "mL/s"},
		Scale:     map[string]float64{"abp": 1.05},
		Offset:    map[string]float64{"abp": -3},
		Calibrate: map[string]string{"abp": "mean:93/80"}, SensorHeightCM: map[string]float64{"abp": 12.5},
		VelocityRange: map[string]float64{"v": 128}, VesselCM: map[string]float64{"carotid": 0.65},
		Invert: []string{"q", "v"},
		Rate:   ptr(125.0), From: ptr(-1.5), To: ptr(0.0), Exclude: "artefacts.csv",
		DiameterCM: ptr(2.1), AngleDeg: ptr(20.0), Profile: "1",
		OutflowPressure: ptr(0.0), Delay: "0.0125",
		CardiacOutput: ptr(4.2), OutputBy: "fick", Cuff: "118/74",
		Error: map[string]string{"flow": "10%", "cardiac-output": "0.5"},
		Beats: "support", OneBeat: true, Model: "wk3", Basis: "span", Replicates: ptr(2000), Seed: ptr(-7), Share: []float64{0, 0.25, 1},
		EDVML: ptr(210.0), EF: ptr(0.25), Pump: map[string]string{"set": "generic A"}, Speed: []float64{8, 9.5},
		Quote: ptr(8.0), Match: "flow", HoldResistance: ptr(0.9), Ventricle: map[string]string{"Pfill": "20", "activation": "hill"},
		Modulation: map[string]string{"shape": "square", "low": "7.5", "locked": "2"},
		Drop:       []float64{3.5}, Keep: []float64{7, 8.25},
		HeightCM: ptr(172.0), WeightKG: ptr(80.0), Age: ptr(63.0), Sex: "female", PWV: ptr(8.5),
		Tree: "arteries.csv", BrainFlow: ptr(660.0), HoldOut: "radial", Brief: true, Remark: "worth a second look",
	}
}

func TestReadEveryKey(t *testing.T) {
	c, err := Read("full.afterbeat.toml", []byte(full))
	if err != nil {
		t.Fatal(err)
	}
	if d := diff(fullCase(), c); d != "" {
		t.Errorf("(-want +got)\n%s", d)
	}
	for _, f := range fields() {
		if !chosen(f.in(&c)) {
			t.Errorf("the text of this test leaves out %q", f.Name)
		}
		if c.Line(f.Name) == 0 && !f.table() {
			t.Errorf("no line for %q", f.Name)
		}
	}
	for key, line := range map[string]int{
		"recording": 2, "invert": 8, "rate": 10, "share": 24, "error.flow": 45, "error.cardiac-output": 46, "ventricle.Pfill": 47, "pump": 27,
		"site": 52, "site.abp": 53, "site.q.1": 54, "unit.na=me": 57, "offset.abp": 61, "modulation.low": 64, "site.other": 0, "": 0,
	} {
		if got := c.Line(key); got != line {
			t.Errorf("line of %q is %d, want %d", key, got, line)
		}
	}
}

// An inline table, a byte order mark, carriage returns and a string of several
// lines count lines as an editor does.
func TestLinesAsAnEditorCounts(t *testing.T) {
	text := "\ufefflabel = \"\"\"\\\r\n  a-1\"\"\"\r\nrecording = \"a\"\r\nsite = { x = \"root\", \"y z\" = \"lvot\" }\r\n"
	c, err := Read("a", []byte(text))
	if err != nil {
		t.Fatal(err)
	}
	if d := diff(Case{Recording: "a", Label: "a-1", Site: map[string]string{"x": "root", "y z": "lvot"}}, c); d != "" {
		t.Errorf("(-want +got)\n%s", d)
	}
	for key, line := range map[string]int{"label": 1, "recording": 3, "site": 4, "site.x": 4, "site.y z": 4} {
		if got := c.Line(key); got != line {
			t.Errorf("line of %q is %d, want %d", key, got, line)
		}
	}
}

func TestReadErrors(t *testing.T) {
	const head = "recording = \"a.csv\"\n"
	for _, c := range []struct{ text, want string }{
		{"", `c.toml: the key "recording" is missing`},
		{`recording = ""`, `c.toml: the key "recording" is missing`},
		{head + `presure = "abp"`, `c.toml:2: unknown key "presure"; did you mean "pressure"?`},
		{head + `one-beat = true`, `c.toml:2: unknown key "one-beat"; did you mean "one_beat"?`},
		{head + `patient = "x"`, `c.toml:2: unknown key "patient"`},
		{head + `"a\u001b" = 1`, `c.toml:2: unknown key "a\x1b"`},
		{head + "[sites]\nabp = 1", `c.toml:2: unknown key "sites"; did you mean "site"?`},
		{head + "[error]\nflow = 1\nangel = 1", `c.toml:4: unknown systematic error "angel"; did you mean "angle"?`},
		{head + "\nrate = \"fast\"", `c.toml:3: rate: want a number, not text`},
		{head + "rate = nan", `c.toml:2: rate: want a finite number, not NaN`},
		{head + "rate = [1]", `c.toml:2: rate: want a number, not a list`},
		{head + "rate.x = 1", `c.toml:2: rate.x: want a number, not a table (a name that holds a dot stands in quotes)`},
		{head + "pressure = 3", `c.toml:2: pressure: want text in quotes, not the number 3`},
		{head + "delay = true", `c.toml:2: delay: want text in quotes, not true`},
		{head + "delay = inf", `c.toml:2: delay: want a finite number, not +Inf`},
		{head + "seed = 1.5", `c.toml:2: seed: want a whole number, not the number 1.5`},
		{head + "one_beat = 1", `c.toml:2: one_beat: want true or false, not the number 1`},
		{head + "exclude = 2020-01-02", `c.toml:2: exclude: want text in quotes, not a date or a time`},
		{head + "share = 0.5", `c.toml:2: share: want a list in [ ], not the number 0.5`},
		{head + "share = [0.5, 50]", `c.toml:2: share: want a number from 0 to 1, not 50`},
		{head + "invert = [1]", `c.toml:2: invert: want text in quotes, not the number 1`},
		{head + "site = \"root\"", `c.toml:2: site: want a table, [site], not text`},
		{head + "[[site]]\nx = \"root\"", `c.toml:2: site: want a table, [site], not a list`},
		{head + "[site]\n\nabp.x = \"root\"", `c.toml:4: site.abp: want text in quotes, not a table (a name that holds a dot stands in quotes)`},
		{head + "[scale]\nabp = \"2\"", `c.toml:3: scale.abp: want a number, not text`},
		{head + "[site]\nabp = \"a=b\"", `c.toml:3: site.abp: the value holds a =, which ends a name on the command line`},
		{head + "[pump]\na = 1\nRC = 0.1", `c.toml:4: unknown entry of [pump] "RC"; did you mean "Rc"?`},
		{head + "[pump]\na = \"1\"", `c.toml:3: pump.a: want a number, not text`},
		{head + "[pump]\na = inf", `c.toml:3: pump.a: want a finite number, not +Inf`},
		{head + "pump = 3", `c.toml:2: pump: want text in quotes, not the number 3`},
		{head + "pump.name = 3", `c.toml:2: pump.name: want text in quotes, not the number 3`},
		{head + "ventricle = \"hill\"", `c.toml:2: ventricle: want a table, [ventricle], not text`},
		{head + "[ventricle]\nEmx = 1", `c.toml:3: unknown entry of [ventricle] "Emx"; did you mean "Emax"?`},
		{head + "[modulation]\nshape = 1", `c.toml:3: modulation.shape: want text in quotes, not the number 1`},
		{head + `pressure = "a\u0000"`, `c.toml:2: pressure: holds a NUL character, which no name has`},
		{head + "label = \"Mary Smith\"", `c.toml:2: label: does not look like a research label, such as pilot-07: want letters, digits and - _ . only, 32 at most, a letter and one to five digits among them; never a name or a date of birth`},
		{head + "rate = 1\nrate = 2", `c.toml:3: `},
		{head + "rate 1", `c.toml:2: `},
		{head + "flow = \"\xff\"", `c.toml:2: `},
		{strings.Repeat("#", largest+1), `c.toml: is too large for a case file`},
	} {
		_, err := Read("c.toml", []byte(c.text))
		var fe *data.FileError
		if !errors.As(err, &fe) {
			t.Errorf("%.60q: error %v", c.text, err)
			continue
		}
		got := err.Error()
		if strings.HasSuffix(c.want, ": ") { // the library's own words follow
			if !strings.HasPrefix(got, c.want) || len(got) == len(c.want) {
				t.Errorf("%q\n got %s\nwant %s...", c.text, got, c.want)
			}
		} else if got != c.want {
			t.Errorf("%.60q\n got %s\nwant %s", c.text, got, c.want)
		}
	}
}

// anyCase draws a case such as [Read] gives.
var anyCase = rapid.Custom(func(t *rapid.T) Case {
	word := rapid.Map(rapid.OneOf(rapid.String(), rapid.StringMatching(`[a-z= .\-"'\\\x{202e}\x{1}\x{1f600}]{0,12}`)), func(s string) string {
		return strings.ToValidUTF8(strings.ReplaceAll(s, "\x00", ""), "?")
	})
	value := rapid.Map(word, func(s string) string { return strings.ReplaceAll(s, "=", "") })
	amount := rapid.Map(value, func(s string) string { return strings.Join(strings.Fields(s), "") })
	num := rapid.OneOf(
		rapid.Float64Range(-1e3, 1e3), rapid.Float64Range(-math.MaxFloat64, math.MaxFloat64),
		rapid.Map(rapid.IntRange(-1000, 1000), func(i int) float64 { return float64(i) }),
	)
	digits := rapid.Map(num, decimal)
	owned := func(label, plain string, numbers ...string) map[string]string {
		m := rapid.MapOfN(rapid.SampledFrom(numbers), digits, 0, 3).Draw(t, label)
		if s := value.Draw(t, label+" by name"); plain != "" && s != "" {
			m[plain] = s
		}
		return m
	}
	optional := func(label string) *float64 { return rapid.Ptr(num, true).Draw(t, label) }
	return Case{
		Recording: word.Filter(func(s string) bool { return s != "" }).Draw(t, "recording"),
		Label:     rapid.SampledFrom([]string{"", "pilot-07", "a.1_B"}).Draw(t, "label"),
		Time:      word.Draw(t, "time"), Pressure: word.Draw(t, "pressure"), Flow: word.Draw(t, "flow"), Velocity: word.Draw(t, "velocity"),
		Site: rapid.MapOfN(word, value, 0, 3).Draw(t, "site"), Unit: rapid.MapOfN(word, value, 0, 3).Draw(t, "unit"),
		Scale: rapid.MapOfN(word, num, 0, 3).Draw(t, "scale"), Offset: rapid.MapOfN(word, num, 0, 3).Draw(t, "offset"),
		Calibrate: rapid.MapOfN(word, value, 0, 2).Draw(t, "calibrate"), SensorHeightCM: rapid.MapOfN(word, num, 0, 2).Draw(t, "height"), VelocityRange: rapid.MapOfN(word, num, 0, 2).Draw(t, "range"), VesselCM: rapid.MapOfN(word, num, 0, 2).Draw(t, "vessels"),
		Invert: rapid.SliceOfN(word, 0, 3).Draw(t, "invert"),
		Rate:   optional("rate"), From: optional("from"), To: optional("to"), Exclude: word.Draw(t, "exclude"),
		DiameterCM: optional("diameter"), AngleDeg: optional("angle"), Profile: amount.Draw(t, "profile"),
		OutflowPressure: optional("outflow"), Delay: amount.Draw(t, "delay"),
		Error: rapid.MapOfN(rapid.SampledFrom(Errors()), amount, 0, 3).Draw(t, "error"),
		Beats: word.Draw(t, "beats"), OneBeat: rapid.Bool().Draw(t, "one beat"), Brief: rapid.Bool().Draw(t, "brief"), Model: word.Draw(t, "model"), Basis: word.Draw(t, "basis"),
		Replicates: rapid.Ptr(rapid.Int(), true).Draw(t, "replicates"), Seed: rapid.Ptr(rapid.Int(), true).Draw(t, "seed"),
		Share: rapid.SliceOfN(rapid.Float64Range(0, 1), 0, 4).Draw(t, "share"),
		EDVML: optional("volume"), EF: optional("fraction"), Pump: owned("pump", "set", "a", "b", "Rc", "lowest"), Speed: rapid.SliceOfN(num, 0, 3).Draw(t, "speed"),
		Ventricle: owned("ventricle", "activation", "Emax", "V0"), Modulation: owned("modulation", "file", "low", "locked"),
		Quote: optional("quote"), Match: word.Draw(t, "match"), HoldResistance: optional("hold"),
	}
})

// set reads arguments back into a case, as a command line does.
func set(args []string) (Case, error) {
	var c Case
	switches := map[string]bool{}
	for _, k := range Keys() {
		switches[k.Flag] = k.Value == ""
	}
	for len(args) > 0 {
		flag, text := strings.TrimPrefix(args[0], "--"), "true"
		args = args[1:]
		if !switches[flag] {
			text, args = args[0], args[1:]
		}
		if err := c.Set(flag, text); err != nil {
			return c, err
		}
	}
	return c, nil
}

func TestWhatIsWrittenReadsBackTheSame(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		c := anyCase.Draw(t, "case")
		text := Write(c)
		if !strings.HasPrefix(string(text), "# "+casenote.Caution+"\n") {
			t.Fatalf("the caution does not come first:\n%s", text)
		}
		back, err := Read("c.toml", text)
		if err != nil {
			t.Fatalf("%v\n%s", err, text)
		}
		if d := diff(c, back); d != "" {
			t.Fatalf("(-written +read)\n%s\n%s", d, text)
		}
		if again := Write(back); string(again) != string(text) {
			t.Fatalf("written twice, and not the same:\n%s\n%s", text, again)
		}
		for _, r := range string(text) {
			if data.Clean(string(r)).String() != string(r) && r != ' ' && r != '\n' {
				t.Fatalf("%U stands bare in\n%s", r, text)
			}
		}
	})
}

func TestArgumentsReadBackTheSame(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		c := anyCase.Draw(t, "case")
		back, err := set(c.Arguments())
		if err != nil {
			t.Fatalf("%v: %q", err, c.Arguments())
		}
		back.Recording = c.Recording // which is no flag
		if d := diff(c, back); d != "" {
			t.Fatalf("(-written +read)\n%s", d)
		}
	})
}

func TestWriteOnlyWhatWasChosen(t *testing.T) {
	c := Case{
		Recording: "a.csv", OutflowPressure: ptr(0.0), Share: []float64{}, Seed: ptr(3),
		Site: map[string]string{"q": "lvot", "abp mean": "root"}, Unit: map[string]string{},
	}
	want := "# " + casenote.Caution + `

recording = "a.csv"
outflow_pressure = 0
seed = 3

[site]
"abp mean" = "root"
q = "lvot"
`
	if d := cmp.Diff(want, string(Write(c))); d != "" {
		t.Errorf("(-want +got)\n%s", d)
	}
	if got := string(Write(Case{Recording: "a\xff.csv"})); !strings.Contains(got, `recording = "a\\xff.csv"`) {
		t.Errorf("a byte that is no UTF-8 is written as\n%s", got)
	}
}

// The largest file that is looked into is read or refused, whatever it holds;
// BenchmarkReadLargest says how fast.
func TestLargeFilesAreRead(t *testing.T) {
	for name, text := range map[string]string{
		"many entries": manyEntries(),
		"deep list":    "share = " + strings.Repeat("[", largest-10),
		"deep tables":  strings.Repeat("a={", 9000) + "a=1" + strings.Repeat("}", 9000),
		"long key":     strings.Repeat("a.", largest/2-4) + "a=1",
		"many headers": "recording='a'\n" + strings.Repeat("[a]\n", largest/4-10),
	} {
		_, err := Read("c.toml", []byte(text))
		if (err == nil) != (name == "many entries") {
			t.Errorf("%s: error %v", name, err)
		}
	}
}

// manyEntries is the largest case that is read, one long table.
func manyEntries() string {
	entries := []byte("recording = 'a'\n[site]\n")
	for i := 0; len(entries) < largest-20; i++ {
		entries = fmt.Appendf(entries, "n%d='x'\n", i)
	}
	return string(entries)
}

func BenchmarkReadLargest(b *testing.B) {
	text := []byte(manyEntries())
	b.SetBytes(int64(len(text)))
	for b.Loop() {
		if _, err := Read("c.toml", text); err != nil {
			b.Fatal(err)
		}
	}
}

func FuzzRead(f *testing.F) {
	f.Add([]byte(full))
	f.Add([]byte("recording=\"a\"\nsite.a.b=1\n[error]\n[[unit]]"))
	f.Add([]byte("recording='a'\nsite={a='root',b={c=1}}\nshare=[[1]]"))
	f.Fuzz(func(t *testing.T, content []byte) {
		c, err := Read("c.toml", content)
		if err != nil {
			var fe *data.FileError
			if !errors.As(err, &fe) || fe.Line > 1+strings.Count(string(content), "\n") {
				t.Fatalf("error %v", err)
			}
			return
		}
		back, err := Read("c.toml", Write(c))
		if err != nil {
			t.Fatal(err)
		}
		if d := diff(c, back); d != "" {
			t.Fatal(d)
		}
		flags, err := set(c.Arguments())
		if err != nil {
			t.Fatal(err)
		}
		flags.Recording = c.Recording
		if d := diff(c, flags); d != "" {
			t.Fatal(d)
		}
	})
}
