package unit

import (
	"strings"
	"testing"
	"unicode/utf8"
)

func TestHeader(t *testing.T) {
	for _, c := range []struct{ header, name, unit string }{
		{"abp_mmHg", "abp", "mmHg"},
		{"aortic_flow_mL_s", "aortic_flow", "mL/s"},
		{"mcav_cm_s", "mcav", "cm/s"},
		{"P [kPa]", "P", "kPa"},
		{"Q (L/min)", "Q", "L/min"},
		{"ABP mmHg", "ABP", "mmHg"},
		{"Vel, cm/s", "Vel", "cm/s"},
		{"art: mmHg", "art", "mmHg"},
		{"pressure/mmHg", "pressure", "mmHg"},
		{"time_ms", "time", "ms"},
		{"Time [s]", "Time", "s"},
		{" Time (s) ", "Time", "s"},
		{"time_s", "time", "s"},
		{"start_s", "start", "s"},
		{"flow mL/s", "flow", "mL/s"},
		{"flow/mL/s", "flow", "mL/s"},
		{"flow mL s-1", "flow", "mL/s"},
		{"flow_mL·s⁻¹", "flow", "mL/s"},
		{"Q [mL·s⁻¹]", "Q", "mL/s"},
		{"vel_m_s", "vel", "m/s"},
		{"speed_1000_per_min", "speed", "1000/min"},
		{"P (aortic) [mm[Hg]]", "P (aortic)", "mmHg"},
		{"P (kPa) (left)", "P (left)", "kPa"},
		{"abp_mmHg_raw", "abp_raw", "mmHg"},
		{"abp_mmHg_min", "abp_min", "mmHg"},
		{"mmHg", "", "mmHg"},
		{"hr_bpm", "hr", "bpm"},
		{"pleth_NU", "pleth", "NU"},
		{"pleth_adu", "pleth", "adu"},
		{"trigger_V", "trigger", "V"},
		{"ecg_mcl1_mV", "ecg_mcl1", "mV"},
		{"lv_volume_L", "lv_volume", "L"},
		{"p_Pa", "p", "Pa"},
		{"pressure cm H2O", "pressure", "cmH2O"},
	} {
		name, u, ok := Header(c.header)
		if !ok || name != c.name || u.Name != c.unit {
			t.Errorf("Header(%q) = %q, %q, %v; want %q, %q", c.header, name, u.Name, ok, c.name, c.unit)
		}
	}
}

// A mark after the name is no unit: systolic, minimum, left, venous, pulmonary artery.
func TestHeaderWithoutUnit(t *testing.T) {
	for _, h := range []string{
		"", "pressure", "flow", "P", "Q", "ABP", "time", "t", "hr", "abp_s", "abp_min", "mcav_L", "P_v", "P_PA",
		"mmHgabp", "dpdt_mmHg_s", "P [left]", "beat_count", "sample", "_", "[", "[]", "(mmHg",
	} {
		if name, u, ok := Header(h); ok || name != h {
			t.Errorf("Header(%q) = %q, %q, %v; want no unit", h, name, u.Name, ok)
		}
	}
}

func TestGuess(t *testing.T) {
	for _, c := range []struct {
		header     string
		quantity   Quantity
		unit       string
		calibrated bool
	}{
		{"abp_mmHg", Pressure, "mmHg", true},
		{"pap_mmHg", Pressure, "mmHg", true},
		{"icp", Pressure, "mmHg", true},
		{"cvp_mmHg", Pressure, "mmHg", true},
		{"aortic_flow_mL_s", Flow, "mL/s", true},
		{"mcav_left_cm_s", Velocity, "cm/s", true},
		{"carotid_pressure_V", Pressure, "V", false},
		{"flow_adu", Flow, "adu", false},
		{"trigger_V", Other, "V", false},
		{"pleth_adu", Other, "adu", false},
		{"pleth_NU", Other, "NU", false},
		{"hr_bpm", Other, "bpm", false},
		{"hr_rpm", Other, "rpm", false},
		{"ecg_mcl1_mV", ECG, "mV", true},
		{"ECG [V]", ECG, "V", true},
		{"ecg_adu", ECG, "adu", false},
		{"etco2_kPa", Other, "kPa", false},
		{"PaO2 (mmHg)", Other, "mmHg", false},
		{"N2O_kPa", Other, "kPa", false},
		{"pump_speed_rpm", Speed, "rpm", true},
		{"lv_volume_mL", Volume, "mL", true},
		{"pressure", Pressure, "mmHg", true},
		{"aorticPressure", Pressure, "mmHg", true},
		{"P", Pressure, "mmHg", true},
		{"ABP", Pressure, "mmHg", true},
		{"flow", Flow, "mL/s", true},
		{"Q", Flow, "mL/s", true},
		{"Q1", Flow, "mL/s", true},
		{"cardiac output", Flow, "mL/s", true},
		{"MCAv", Velocity, "cm/s", true},
		{"flow velocity", Velocity, "cm/s", true},
		{"outflow pressure", Pressure, "mmHg", true},
		{"pressure_mL_s", Flow, "mL/s", true}, // the unit is believed
		{"rr_ms", Other, "ms", false},
		{"pressure_pct_%", Other, "%", false},
		{"note", Other, "", false},
		{"", Other, "", false},
	} {
		name, u, _ := Header(c.header)
		got := Guess(name, u)
		if got.Quantity != c.quantity || got.Name != c.unit || got.Calibrated != c.calibrated {
			t.Errorf("%q is guessed to be %+v, want %s in %q, calibrated %v", c.header, got, c.quantity, c.unit, c.calibrated)
		}
	}
	if u := Guess("ecg", Unit{Name: "V", Factor: 1}); u.Factor != 1000 {
		t.Errorf("1 V of an ecg is %v mV", u.Factor)
	}
}

func TestWords(t *testing.T) {
	for _, c := range []struct{ name, want string }{
		{"AoPressure_2", "ao pressure 2"},
		{"MCAv", "mcav"},
		{"ABP1 (left)", "abp 1 left"},
		{"aortic-flow.mL", "aortic flow m l"},
		{"Größe µ", "größe µ"},
		{" _", ""},
	} {
		if got := strings.Join(Words(c.name), " "); got != c.want {
			t.Errorf("Words(%q) = %q, want %q", c.name, got, c.want)
		}
	}
}

func FuzzHeader(f *testing.F) {
	for _, s := range []string{
		"abp_mmHg", "P [kPa]", "a(((mmHg", "P (a) [mm[Hg]]", "Vel, cm/s", "x_mL·s⁻¹_raw_1", "\x1b[31mred_mmHg", "\xff_V", "_", "ms",
	} {
		f.Add(s)
	}
	f.Fuzz(func(t *testing.T, h string) {
		name, u, ok := Header(h)
		if !ok && (name != strings.TrimSpace(h) || u != (Unit{})) {
			t.Fatalf("Header(%q) has no unit but gives %q, %+v", h, name, u)
		}
		if ok {
			if again, known := Parse(u.Name); !known || again != u {
				t.Fatalf("Header(%q) gives %+v, which is no unit", h, u)
			}
			if len(name) >= len(h) && h != "" {
				t.Fatalf("Header(%q) leaves the name %q", h, name)
			}
		}
		if g := Guess(name, u); !(g.Factor > 0) || g.Quantity == Time || g.Quantity == "" {
			t.Fatalf("Guess(%q, %+v) = %+v", name, u, g)
		}
		if utf8.ValidString(h) && !utf8.ValidString(name) {
			t.Fatalf("Header(%q) cuts a rune: %q", h, name)
		}
	})
}
