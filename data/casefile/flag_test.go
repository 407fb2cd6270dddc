package casefile

import (
	"slices"
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"
)

func TestArguments(t *testing.T) {
	want := strings.Split("afterbeat study ./-a.csv --label pilot-07 --time t --pressure abp --flow q --velocity v "+
		"--site abp=root --site q.1=lvot --unit na=me=mL/s --scale abp=1.05 --offset abp=-3 --calibrate abp=mean:93/80 --sensor-height-cm abp=12.5 --velocity-range v=128 --invert q --invert v "+
		"--rate 125 --from -1.5 --to 0 --exclude artefacts.csv --diameter-cm 2.1 --angle-deg 20 --profile 1 "+
		"--outflow-pressure 0 --delay 0.0125 --cardiac-output 4.2 --output-by fick --cuff 118/74 --error cardiac-output=0.5 --error flow=10% --drop 3.5 --keep 7 --keep 8.25 --beats support --one-beat --model wk3 --basis span "+
		"--replicates 2000 --seed -7 --share 0 --share 0.25 --share 1 --edv-ml 210 --ef 0.25", " ")
	want = append(want, "--pump", "generic A", "--ventricle", "Pfill=20", "--ventricle", "activation=hill", "--speed", "8", "--speed", "9.5", "--quote", "8", "--match", "flow",
		"--hold-resistance", "0.9", "--modulation", "locked=2", "--modulation", "low=7.5", "--modulation", "shape=square",
		"--height-cm", "172", "--weight-kg", "80", "--age", "63", "--sex", "female", "--pwv-m-s", "8.5", "--vessel-cm", "carotid=0.65", "--tree", "arteries.csv", "--brain-flow-ml-min", "660", "--hold-out", "radial", "--brief", "--remark", "worth a second look")
	if d := cmp.Diff(want, fullCase().Command("study", "-a.csv")); d != "" {
		t.Errorf("(-want +got)\n%s", d)
	}
	if got := (Case{Recording: "a.csv"}).Arguments(); len(got) != 0 {
		t.Errorf("a case without choices has the arguments %q", got)
	}
	if got, want := (Case{}).Command("check", "-"), []string{"afterbeat", "check", "-"}; !slices.Equal(got, want) {
		t.Errorf("standard input: %q, want %q", got, want)
	}
}

func TestSetErrors(t *testing.T) {
	for _, c := range []struct{ flag, text, want string }{
		{"presure", "x", `unknown flag "presure"; did you mean "pressure"?`},
		{"rate", "fast\x1b", `want a number, not "fast\\x1b"`},
		{"rate", "inf", `want a finite number, not +Inf`},
		{"seed", "1.5", `want a whole number, not "1.5"`},
		{"one-beat", "maybe", `want true or false, not "maybe"`},
		{"site", "root", `want NAME=SITE`},
		{"scale", "abp=", `want a number, not ""`},
		{"error", "angel=5", `unknown systematic error "angel"; did you mean "angle"?`},
		{"share", "2", `want a number from 0 to 1, not 2`},
		{"label", "Mary", errLabel.Error()},
		{"pump", "aa=1", `unknown entry of [pump] "aa"; did you mean "a"?`},
		{"pump", "a=much", `a: want a number, not "much"`},
		{"ventricle", "hill", `want WHAT=VALUE`},
	} {
		var into Case
		err := into.Set(c.flag, c.text)
		if err == nil || err.Error() != c.want {
			t.Errorf("--%s %q: error %v, want %s", c.flag, c.text, err, c.want)
		}
	}
}

// A copy of a case does not follow what is set afterwards.
func TestSetLeavesCopiesAlone(t *testing.T) {
	c := fullCase()
	before := c
	for flag, text := range map[string]string{"site": "abp=radial", "share": "0.5", "invert": "x", "rate": "7"} {
		if err := c.Set(flag, text); err != nil {
			t.Fatal(err)
		}
	}
	if d := diff(fullCase(), before); d != "" {
		t.Errorf("(-before +after)\n%s", d)
	}
	if c.Site["abp"] != "radial" || len(c.Share) != 4 || len(c.Invert) != 3 || *c.Rate != 7 {
		t.Errorf("not set: %+v", c)
	}
}

func TestOver(t *testing.T) {
	base, err := Read("a", []byte(full))
	if err != nil {
		t.Fatal(err)
	}
	c := Case{
		Pressure: "art", Site: map[string]string{"abp": "radial", "art": "finger"},
		Share: []float64{0.5}, To: ptr(9.0),
	}
	want := fullCase()
	want.Pressure = "art"
	want.Site = map[string]string{"abp": "radial", "art": "finger", "q.1": "lvot"}
	want.Share = []float64{0.5}
	want.To = ptr(9.0)
	got := c.Over(base)
	if d := diff(want, got); d != "" {
		t.Errorf("(-want +got)\n%s", d)
	}
	for key, line := range map[string]int{"pressure": 0, "site.abp": 0, "share": 0, "flow": 6, "site.q.1": 54} {
		if got.Line(key) != line {
			t.Errorf("line of %q is %d, want %d", key, got.Line(key), line)
		}
	}
	if d := diff(fullCase(), base); d != "" || base.Line("site.abp") != 53 {
		t.Errorf("the case below has changed (-want +got)\n%s", d)
	}
}

// A set named over one's own values replaces them whole; a value goes over a set.
func TestOverAWholeTable(t *testing.T) {
	base, err := Read("a", []byte("recording = \"a.csv\"\n[pump]\na = 1\nLc = 0.03\n"))
	if err != nil {
		t.Fatal(err)
	}
	named := Case{Pump: map[string]string{"set": "generic B"}}.Over(base)
	if d := diff(Case{Recording: "a.csv", Pump: map[string]string{"set": "generic B"}}, named); d != "" || named.Line("pump.a") != 0 {
		t.Errorf("line %d (-want +got)\n%s", named.Line("pump.a"), d)
	}
	one := Case{Pump: map[string]string{"a": "2"}}.Over(base)
	if d := diff(Case{Recording: "a.csv", Pump: map[string]string{"a": "2", "Lc": "0.03"}}, one); d != "" || one.Line("pump.a") != 0 || one.Line("pump.Lc") != 4 {
		t.Errorf("(-want +got)\n%s", d)
	}
}

func TestKeysAreFlagsWithUnderscores(t *testing.T) {
	keys := Keys()
	if keys[0].Name != "recording" {
		t.Errorf("the first key is %q", keys[0].Name)
	}
	for _, k := range keys {
		if k.Help == "" || strings.ReplaceAll(k.Flag, "-", "_") != k.Name || (k.Value == "") != slices.Contains([]string{"one_beat", "brief"}, k.Name) {
			t.Errorf("%+v", k)
		}
	}
}
