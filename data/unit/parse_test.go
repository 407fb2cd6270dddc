package unit

import (
	"math"
	"testing"

	"pgregory.net/rapid"
)

// Factors are those of NIST SP 811, appendix B, and of the litre (1000 cm³).
func TestParseSpellings(t *testing.T) {
	const kPa = 7.50061575846 // mmHg; 1/0.133322387415
	for _, c := range []struct {
		spellings []string
		quantity  Quantity
		factor    float64
	}{
		{[]string{"mmHg", "mm Hg", "mm_Hg", "MMHG", "mm[Hg]", " mmhg "}, Pressure, 1},
		{[]string{"kPa", "KPA", "kpa"}, Pressure, kPa},
		{[]string{"Pa", "pa"}, Pressure, kPa / 1000},
		{[]string{"hPa", "mbar"}, Pressure, kPa / 10},
		{[]string{"cmH2O", "cm H2O", "cm_H2O", "cmH₂O", "cm[H2O]"}, Pressure, 0.735559},
		{[]string{"dyn/cm2", "dyn/cm^2", "dyn/cm²", "dyn cm-2", "dyn·cm⁻²", "dyne_cm2"}, Pressure, 1 / 1333.22387415},
		{[]string{"psi"}, Pressure, 51.7149},
		{[]string{"torr"}, Pressure, 0.99999986},
		{[]string{"mL/s", "ml/s", "ml/S", "mL s-1", "mL·s⁻¹", "mL s^-1", "mL_s", "ml/sec", "mL per s", "mL / s", "cm3/s", "cm³/s", "cc/s", "cm3 s-1"}, Flow, 1},
		{[]string{"L/min", "l/min", "L_min", "lpm", "LPM", "L min-1", "l per minute", "liters/min"}, Flow, 1000. / 60},
		{[]string{"mL/min", "ml_min", "cc/min"}, Flow, 1. / 60},
		{[]string{"L/s"}, Flow, 1000},
		{[]string{"m3/s", "m³/s", "m^3/s"}, Flow, 1e6},
		{[]string{"L/h"}, Flow, 1000. / 3600},
		{[]string{"cm/s", "cm_s", "cm s-1", "cm/sec", "cm·s⁻¹"}, Velocity, 1},
		{[]string{"m/s", "m_s", "m s-1"}, Velocity, 100},
		{[]string{"mm/s"}, Velocity, 0.1},
		{[]string{"mL", "cc", "cm3", "cm^3"}, Volume, 1},
		{[]string{"L", "litre"}, Volume, 1000},
		{[]string{"rpm", "RPM", "1/min"}, Speed, 1e-3},
		{[]string{"1000/min", "krpm", "1000 per min", "1000_per_min"}, Speed, 1},
		{[]string{"V", "v", "volts", "mV", "MV", "uV", "µV", "μV", "adu", "NU", "a.u.", "AU", "bpm", "%"}, Other, 1},
		{[]string{"s", "sec", "seconds"}, Time, 1},
		{[]string{"ms", "msec"}, Time, 1e-3},
		{[]string{"us", "µs"}, Time, 1e-6},
		{[]string{"min"}, Time, 60},
		{[]string{"h", "hours"}, Time, 3600},
	} {
		for _, s := range c.spellings {
			u, ok := Parse(s)
			if !ok || u.Quantity != c.quantity || math.Abs(u.Factor-c.factor) > 2e-6*c.factor {
				t.Errorf("Parse(%q) = %+v, %v; want %s with factor %v", s, u, ok, c.quantity, c.factor)
			}
			if u.Calibrated == (c.quantity == Other) {
				t.Errorf("Parse(%q): calibrated %v", s, u.Calibrated)
			}
		}
	}
}

func TestParseRefuses(t *testing.T) {
	for _, s := range []string{"", " ", "_", "/", "left", "mm", "mmHg/s", "mL s s", "mmHgg", "-1", "m", "L min s"} {
		if u, ok := Parse(s); ok {
			t.Errorf("Parse(%q) = %+v", s, u)
		}
	}
}

// What is printed as the name of a unit reads back as the same unit.
func TestNamesReadBack(t *testing.T) {
	if len(units) < 100 {
		t.Fatalf("only %d spellings", len(units))
	}
	for spelling, u := range units {
		if got, ok := Parse(u.Name); !ok || got != u {
			t.Errorf("%q is named %q, which reads as %+v", spelling, u.Name, got)
		}
		if got, ok := Parse(spelling); !ok || got != u {
			t.Errorf("%q reads as %+v, want %+v", spelling, got, u)
		}
		if (u.PerSecond() != 0) != (u.Quantity == Time) {
			t.Errorf("%q: %v per second", spelling, u.PerSecond())
		}
	}
}

func TestConversionInverts(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		name := rapid.SampledFrom([]string{"kPa", "L/min", "m/s", "rpm", "V", "mmHg", "psi"}).Draw(t, "unit")
		u, _ := Parse(name)
		x := rapid.Float64Range(-1e6, 1e6).Draw(t, "x")
		if back := u.FromInternal(u.ToInternal(x)); math.Abs(back-x) > 1e-12*math.Abs(x) {
			t.Fatalf("%v %s comes back as %v", x, name, back)
		}
	})
}

func TestPrint(t *testing.T) {
	kPa, _ := Parse("kPa")
	lpm, _ := Parse("L/min")
	for _, c := range []struct {
		u      Unit
		x      float64
		digits int
		want   string
	}{
		{Internal(Pressure), 93.44, 3, "93.4 mmHg"},
		{kPa, 100, 3, "13.3 kPa"}, // 100 x 0.133322387415
		{lpm, 83.333, 3, "5.00 L/min"},
		{Internal(Other), 0.01234, 2, "0.012"},
		{Internal(Flow), 0, 2, "0.0 mL/s"},
		{Internal(Flow), -12345, 2, "-12345 mL/s"},
		{Internal(Flow), math.NaN(), 2, "undefined"},
	} {
		if got := c.u.Print(c.x, c.digits); got != c.want {
			t.Errorf("Print(%v, %d) = %q, want %q", c.x, c.digits, got, c.want)
		}
	}
}
