package doppler

import (
	"math"
	"strings"
	"testing"

	"afterbeat/data"
	"afterbeat/data/unit"
	"pgregory.net/rapid"
)

func near(t *testing.T, what string, got, want, tolerance float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tolerance) {
		t.Errorf("%s: %v, want %v within %v", what, got, want, tolerance)
	}
}

func convert(t *testing.T, s Settings) Conversion {
	t.Helper()
	c, err := NewConversion(s)
	if err != nil {
		t.Fatal(err)
	}
	return c
}

// Arithmetic: an outflow tract of 2.0 cm with a velocity-time integral of 20 cm
// ejects pi 2^2/4 20 = 62.83 mL; 1.9 and 2.1 cm give 56.71 and 69.27 mL.
func TestStrokeVolumeOfOutflowTract(t *testing.T) {
	for _, row := range []struct{ diameter, volume float64 }{{1.9, 56.71}, {2.0, 62.83}, {2.1, 69.27}} {
		c := convert(t, Settings{Diameter: row.diameter, Site: data.SiteLVOT})
		near(t, "stroke volume", c.Flow([]float64{20})[0], row.volume, 0.005)
		if len(c.Warnings) != 0 {
			t.Errorf("warnings at the outflow tract: %v", c.Warnings)
		}
	}
}

// An echocardiography text's example: 2.0 cm and 19 cm are "about 60 mL".
func TestStrokeVolumeOfPublishedExample(t *testing.T) {
	c := convert(t, Settings{Diameter: 2, Site: data.SiteLVOT})
	near(t, "stroke volume", c.Flow([]float64{19})[0], 60, 0.5)
}

func TestAngleDividesByCosine(t *testing.T) {
	c := convert(t, Settings{Diameter: 2, Angle: 60, Site: data.SiteRoot})
	near(t, "gain at 60 degrees", c.Gain, 2*math.Pi, 1e-12) // cos 60 = 1/2, area pi
}

func TestFactorBySite(t *testing.T) {
	for _, site := range append(data.Sites(), "") {
		c := convert(t, Settings{Diameter: 0.6, Site: site})
		near(t, "factor", c.K, 1, 0)
		blunt := site == data.SiteRoot || site == data.SiteLVOT || site == data.SiteGraft
		if got := len(c.Warnings) == 0; got != blunt {
			t.Errorf("site %q: warnings %v", site, c.Warnings)
		}
		for _, w := range c.Warnings {
			if w.Code != data.CodeProfile || !strings.Contains(w.Text, "1/2") || w.Cure == "" {
				t.Errorf("site %q: %+v", site, w)
			}
		}
	}
}

func TestGivenFactor(t *testing.T) {
	c := convert(t, Settings{Diameter: 0.3, Factor: 0.5, Site: data.SiteMCA})
	near(t, "gain", c.Gain, math.Pi*0.3*0.3/8, 1e-15)
	if len(c.Warnings) != 0 {
		t.Errorf("a given factor is warned of: %v", c.Warnings)
	}
	c = convert(t, Settings{Diameter: 2, Factor: 0.5, Site: data.SiteLVOT})
	if len(c.Warnings) != 1 || c.Warnings[0].Code != data.CodeProfile {
		t.Errorf("half the output of the heart goes unwarned: %v", c.Warnings)
	}
}

func TestWarningsOfAngleAndDiameter(t *testing.T) {
	for _, row := range []struct {
		settings Settings
		want     data.Code
	}{
		{Settings{Diameter: 2, Angle: 60}, ""},
		{Settings{Diameter: 2, Angle: 60.1}, data.CodeSteepAngle},
		{Settings{Diameter: 2, Angle: 89}, data.CodeSteepAngle},
		{Settings{Diameter: 22}, data.CodeUnlikely},
		{Settings{Diameter: 0.02}, data.CodeUnlikely},
	} {
		row.settings.Site = data.SiteRoot
		c := convert(t, row.settings)
		switch {
		case row.want == "" && len(c.Warnings) == 0:
		case len(c.Warnings) == 1 && c.Warnings[0].Code == row.want && c.Warnings[0].Cure != "":
		default:
			t.Errorf("%+v: %v, want %q", row.settings, c.Warnings, row.want)
		}
	}
}

func TestSettingsThatGiveNoFlow(t *testing.T) {
	nan, inf := math.NaN(), math.Inf(1)
	for _, row := range []struct {
		settings Settings
		names    string
	}{
		{Settings{}, "diameter"},
		{Settings{Diameter: -2}, "diameter"},
		{Settings{Diameter: nan}, "diameter"},
		{Settings{Diameter: inf}, "diameter"},
		{Settings{Diameter: 2, Angle: -1}, "angle"},
		{Settings{Diameter: 2, Angle: 90}, "angle"},
		{Settings{Diameter: 2, Angle: nan}, "angle"},
		{Settings{Diameter: 2, Factor: -0.5}, "factor"},
		{Settings{Diameter: 2, Factor: 1.2}, "factor"},
		{Settings{Diameter: 2, Factor: nan}, "factor"},
	} {
		if _, err := NewConversion(row.settings); err == nil || !strings.Contains(err.Error(), row.names) {
			t.Errorf("%+v: error %v, want one that names the %s", row.settings, err, row.names)
		}
	}
}

func TestParseProfile(t *testing.T) {
	for s, want := range map[string]float64{"": 0, "1": 1, "0.5": 0.5} {
		if got, err := ParseProfile(s); err != nil || got != want {
			t.Errorf("%q: %v, %v", s, got, err)
		}
	}
	for s, names := range map[string]string{"womersley": "factor", "0": "above 0", "1.5": "at most 1", "flat": `"flat"`, "NaN": "above 0", "\x1b[2J": `\x1b`} {
		if _, err := ParseProfile(s); err == nil || !strings.Contains(err.Error(), names) {
			t.Errorf("%q: error %v, want one that says %s", s, err, names)
		}
	}
}

func TestToFlowKeepsNameSiteAndGaps(t *testing.T) {
	v := data.Channel{
		Name: data.Clean("lvot_velocity_m_s"), Quantity: unit.Velocity, Site: data.SiteLVOT,
		Unit:   unit.Unit{Name: "m/s", Quantity: unit.Velocity, Factor: 100, Calibrated: true},
		Values: []float64{0, 80, math.NaN(), -5}, // internal: cm/s
	}
	flow, c, err := ToFlow(v, Settings{Diameter: 2})
	if err != nil {
		t.Fatal(err)
	}
	if flow.Quantity != unit.Flow || flow.Unit.Name != "mL/s" || flow.Unit.Factor != 1 || !flow.Unit.Calibrated {
		t.Errorf("quantity %q, unit %+v", flow.Quantity, flow.Unit)
	}
	if flow.Name != v.Name || flow.Site != data.SiteLVOT || c.Site != data.SiteLVOT {
		t.Errorf("name %q, site %q, site of the conversion %q", flow.Name, flow.Site, c.Site)
	}
	near(t, "flow", flow.Values[1], 80*math.Pi, 1e-10)
	near(t, "reversed flow", flow.Values[3], -5*math.Pi, 1e-10)
	if flow.Missing() != 1 || v.Values[1] != 80 {
		t.Errorf("missing %d; the velocity is now %v", flow.Missing(), v.Values)
	}
	// The site stated in the settings rules over the channel's.
	_, c, err = ToFlow(v, Settings{Diameter: 2, Site: data.SiteOther})
	if err != nil || len(c.Warnings) != 1 || c.Warnings[0].Channel != v.Name {
		t.Errorf("warnings %+v, error %v", c.Warnings, err)
	}
}

func TestToFlowRefusesWhatIsNoVelocity(t *testing.T) {
	pressure := data.Channel{Name: data.Clean("p"), Quantity: unit.Pressure, Unit: unit.Internal(unit.Pressure)}
	volts := data.Channel{Name: data.Clean("v"), Quantity: unit.Velocity, Unit: unit.Unit{Name: "V", Quantity: unit.Velocity, Factor: 1}}
	for _, c := range []data.Channel{pressure, volts} {
		if _, _, err := ToFlow(c, Settings{Diameter: 2}); err == nil {
			t.Errorf("%q in %q was taken for a velocity", c.Name, c.Unit.Name)
		}
	}
	good := data.Channel{Name: data.Clean("v"), Quantity: unit.Velocity, Unit: unit.Internal(unit.Velocity)}
	if _, _, err := ToFlow(good, Settings{}); err == nil {
		t.Error("no diameter, no error")
	}
}

// Flow is proportional to d^2, to k, and to 1/cos(theta).
func TestGainScales(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := Settings{
			Diameter: rapid.Float64Range(0.2, 3).Draw(t, "d"),
			Angle:    rapid.Float64Range(0, 80).Draw(t, "angle"),
			Factor:   rapid.Float64Range(0.1, 0.5).Draw(t, "k"),
		}
		base, err := NewConversion(s)
		if err != nil {
			t.Fatal(err)
		}
		twice := s
		twice.Diameter, twice.Factor = 2*s.Diameter, 2*s.Factor
		got, err := NewConversion(twice)
		if err != nil {
			t.Fatal(err)
		}
		if math.Abs(got.Gain/base.Gain-8) > 1e-12 {
			t.Fatalf("twice the diameter and twice the factor: %v times the flow, want 8", got.Gain/base.Gain)
		}
		if v := base.Gain * math.Cos(s.Angle*math.Pi/180) / (s.Factor * base.Area); math.Abs(v-1) > 1e-12 {
			t.Fatalf("angle leaves a factor %v", v)
		}
	})
}
