package study

import (
	"errors"
	"math"
	"strings"
	"testing"

	"afterbeat/data"
	"afterbeat/data/casefile"
	"afterbeat/tree"
)

// withTree is the demo as far as its tree, as change makes its case; files lie
// beside it.
func withTree(t testing.TB, change func(*casefile.Case), files ...string) (Study, error) {
	t.Helper()
	c, f := demoCase(t), demoFolder(t)
	c.Replicates = ptr(fewest)
	change(&c)
	for i := 0; i+1 < len(files); i += 2 {
		f[files[i]] = files[i+1]
	}
	return try(c, f, StageTree)
}

func demoTree(t testing.TB, change func(*casefile.Case), files ...string) Tree {
	t.Helper()
	s, err := withTree(t, change, files...)
	if err != nil {
		t.Fatal(err)
	}
	if s.Tree == nil || s.Tree.Reason != "" {
		t.Fatalf("no tree: %+v", s.Tree)
	}
	return *s.Tree
}

func unchanged(*casefile.Case) {}

// The tree of the demo takes the whole output, meets the measured pressure, and
// its numbers are in the report.
func TestTreeOfTheDemo(t *testing.T) {
	s, err := withTree(t, unchanged)
	if err != nil {
		t.Fatal(err)
	}
	if s.Tree.Response != nil || !strings.Contains(strings.Join(strings.Fields(s.Note().Render(defaults)), " "), "was not computed when this note was made") {
		t.Error("a response that takes long is there already")
	}
	if s.Tree, err = pointer(s.Tree.WithResponse(t.Context())); err != nil {
		t.Fatal(err)
	}
	grown := *s.Tree
	output, sum := s.Beats.Flow.Period.Mean(), 0.0
	for _, b := range grown.Beds {
		sum += b.Measures.Mean
	}
	if len(grown.Segments) != 55 || len(grown.Beds) != 6 || !near(sum, output, 1e-9) {
		t.Errorf("%d segments, %d beds, that take %g of %g mL/s", len(grown.Segments), len(grown.Beds), sum, output)
	}
	r := s.Fit.Results[s.Fit.Chosen]
	if !near(grown.Resistance.Value, r.TotalResistance.Value, 0.01) || grown.Pressure.RMSE > 2 {
		t.Errorf("R %g, of the fit %g; misses by %g mmHg", grown.Resistance.Value, r.TotalResistance.Value, grown.Pressure.RMSE)
	}
	if root := grown.Segments[0].Waves.Inlet; !near(root.Pressure.Mean(), s.Beats.Pressure.Period.Mean(), 0.01) || !near(root.Flow.Mean(), output, 1e-9) {
		t.Errorf("at the root %g mmHg, %g mL/s", root.Pressure.Mean(), root.Flow.Mean())
	}
	for i, b := range grown.Response.Flow {
		p := grown.Response.Pressure[i]
		if !(b.T50 > 0 && b.T90 > b.T50 && p.T50 > 0 && p.T90 > p.T50 && p.T90 < b.T50) {
			t.Errorf("%s: %+v, of pressure %+v", b.Bed, b, p)
		}
	}
	report := parsed(t, s.Report(defaults))
	keys := map[string]bool{}
	keysOf(report, "", keys)
	for _, key := range strings.Fields(`tree.segments.id tree.segments.inlet.pressure.mean tree.segments.outlet.flow.max tree.multipliers.name tree.multipliers.low
		tree.total_compliance.value tree.total_resistance.high tree.beds.bed tree.beds.flow.mean response.flow_step.bed response.flow_step.t50_s response.pressure_step.t90_s tree_reason`) {
		if _, ok := keys[key]; !ok {
			t.Errorf("the report lacks %s", key)
		}
	}
}

// Below 4.5 L/min the brain is shown by its flow, too; a flow that is given rules.
func TestBrainByFlow(t *testing.T) {
	low := demoTree(t, unchanged)
	if b := low.BrainByFlow; b == nil || !near(b.Measures.Mean, 11, 1e-3) {
		t.Errorf("the brain by its flow: %+v", b)
	}
	given := demoTree(t, func(c *casefile.Case) { c.BrainFlow = ptr(480.0) })
	if b, ok := given.Bed("brain"); !ok || !near(b.Measures.Mean, 8, 2e-3) || given.BrainByFlow != nil {
		t.Errorf("given 8 mL/s: %+v, beside it %+v", b.Measures.Mean, given.BrainByFlow)
	}
}

// Height, weight and velocity scale the table, and say so; the velocity given is
// the tree's, within what the recording moves it.
func TestScalesAreSaid(t *testing.T) {
	grown := demoTree(t, func(c *casefile.Case) { c.HeightCM, c.WeightKG, c.PWV = ptr(160.0), ptr(60.0), ptr(7.0) })
	said := ""
	for _, x := range grown.Tree.Scales {
		said += x.Why + "\n"
	}
	for _, want := range []string{"height 160 cm", "body surface area", "velocity 7 m/s (measured)"} {
		if !strings.Contains(said, want) {
			t.Errorf("%q is not said:\n%s", want, said)
		}
	}
	if l := grown.Segments[0].Length; !near(l, 4*160.0/175, 1e-9) {
		t.Errorf("the ascending aorta is %g cm long", l)
	}
}

// The user's own table is read beside the recording, keeps its lengths, and its
// terminals without a bed are beds of their own.
func TestOwnTableOfArteries(t *testing.T) {
	const table = "id,parent,name,length_cm,radius_cm,wave_speed_m_s,r1,c,r2,bed\n" +
		"a,,aorta,30,1.2,5,,,,\nb,a,upper,20,0.4,7,,0.4,2.4,\nc,a,lower,30,0.5,8,,0.5,1.7,legs\n"
	s, err := withTree(t, func(c *casefile.Case) { c.Tree = "own.csv" }, "own.csv", table)
	if err != nil {
		t.Fatal(err)
	}
	grown := *s.Tree
	if len(grown.Segments) != 3 || grown.Segments[0].Length != 30 || !grown.Tree.Own || grown.Tree.Source != "own.csv" {
		t.Fatalf("%+v", grown.Segments)
	}
	if len(grown.Beds) != 2 || grown.Beds[0].Name != "legs" || grown.Beds[1].Name != "upper" {
		t.Errorf("beds %+v", grown.Beds)
	}
	if !strings.Contains(strings.Join(s.Note().Reproduce, " "), "--tree own.csv") {
		t.Error("the reproducing command lacks the table")
	}
	_, err = withTree(t, func(c *casefile.Case) { c.Tree = "own.csv" }, "own.csv", strings.Replace(table, "c,a,lower", "c,x,lower", 1))
	var file *data.FileError
	if !errors.As(err, &file) || file.File != "own.csv" || file.Line != 4 {
		t.Errorf("a parent that is not there: %v", err)
	}
}

func TestTreeChoicesThatMakeNoSense(t *testing.T) {
	for key, change := range map[string]func(*casefile.Case){
		"height_cm":         func(c *casefile.Case) { c.HeightCM = ptr(1.72) },
		"weight_kg":         func(c *casefile.Case) { c.WeightKG = ptr(-1.0) },
		"age":               func(c *casefile.Case) { c.Age = ptr(200.0) },
		"sex":               func(c *casefile.Case) { c.Sex = "x" },
		"pwv_m_s":           func(c *casefile.Case) { c.PWV = ptr(850.0) },
		"brain_flow_ml_min": func(c *casefile.Case) { c.BrainFlow = ptr(11.0) },
		"hold_out":          func(c *casefile.Case) { c.HoldOut = "radial" },
		"vessel_cm":         func(c *casefile.Case) { c.VesselCM = map[string]float64{"carotid": 7} },
		"vessel_cm, site":   func(c *casefile.Case) { c.VesselCM = map[string]float64{"neck": 0.7} },
	} {
		_, err := withTree(t, change)
		var choice *ChoiceError
		if key, _, _ = strings.Cut(key, ","); !errors.As(err, &choice) || choice.Key != key || choice.Hint == "" {
			t.Errorf("%s: %v", key, err)
		}
	}
}

// A radial trace beside the root's is refined to, or held out as a test.
func TestDistalTraceOfARecording(t *testing.T) {
	const rate = 100
	f := folder{"a.csv": table(rate, 1000, aortic("ao_mmHg"), column{"radial_mmHg", aortic("x").at}, column{"ao_flow_mL_s", halfFlow})}
	c := casefile.Case{Recording: "a.csv", Replicates: ptr(fewest), Site: map[string]string{"ao_mmHg": "root", "radial_mmHg": "radial"}, Pressure: "ao_mmHg"}
	for _, held := range []string{"", "radial_mmHg"} {
		c.HoldOut = held
		s, err := try(c, f, StageTree)
		if err != nil {
			t.Fatal(err)
		}
		if s.Tree.Reason != "" || len(s.Tree.Distal) != 1 {
			t.Fatalf("reason %q, traces %+v", s.Tree.Reason, s.Tree.Distal)
		}
		if d := s.Tree.Distal[0]; d.HeldOut != (held != "") || d.Site != data.SiteRadial || !(d.RMSE > 0) {
			t.Errorf("%+v", d)
		}
		if factors := len(s.Tree.Factors); factors != 5 && held == "" || factors != 4 && held != "" {
			t.Errorf("held out %q: %d factors", held, factors)
		}
	}
}

// Without a flow at the root there is no tree, and the study goes on.
func TestNoTreeWithoutTheRootsFlow(t *testing.T) {
	const name = "tcd_6s.csv"
	s := fitted(t, casefile.Case{Recording: name, Replicates: ptr(fewest)}, folder{name: recordingIn(t, excerpts, name)})
	if s.Tree == nil || s.Tree.Reason == "" || len(s.Tree.Segments) > 0 {
		t.Errorf("%+v", s.Tree)
	}
	if s.Comparison == nil {
		t.Error("the study stopped")
	}
}

// The waves of the study's tree are the solver's, whose impedance at the root
// makes them of the measured flow.
func TestRootPressureIsImpedanceTimesFlow(t *testing.T) {
	grown := demoTree(t, unchanged)
	load, err := tree.NewLoad(grown.Network)
	if err != nil {
		t.Fatal(err)
	}
	flow := grown.Fit.Beats.Flow.Period
	q, p := flow.Spectrum(), grown.Segments[0].Waves.Inlet.Pressure.Spectrum()
	for k := 1; k <= 10; k++ {
		want := load.Impedance(flow.Omega(k)) * q[k]
		if d := p[k] - want; math.Hypot(real(d), imag(d)) > 1e-9*math.Hypot(real(want), imag(want)) {
			t.Errorf("harmonic %d: %v, want %v", k, p[k], want)
		}
	}
}
