package study

import (
	"math"
	"strconv"
	"strings"
	"testing"

	"afterbeat/data"
	"afterbeat/data/casefile"
)

// A pressure in volts, calibrated by what a cuff would have read, is the pressure: the
// fit is that of mmHg, and its intervals carry the doubt of the cuff.
func TestVoltsBecomeMillimetresOfMercury(t *testing.T) {
	inMmHg := whole(t, inventedCase(), invented(aortic("ao_mmHg"), outflowTo("ao_flow_mL_s")))
	p := inMmHg.Beats.Pulses[0]
	volts := invented(column{"ao_pressure_V", scaled(noisy(halfPressure, 0.3), 0.01, -0.2)}, outflowTo("ao_flow_mL_s"))
	for _, cuff := range []string{
		decimal(p.Systolic) + "/" + decimal(p.Diastolic),
		"mean:" + decimal(p.Mean) + "/" + decimal(p.Diastolic),
	} {
		c := inventedCase()
		c.Calibrate = map[string]string{"ao_pressure_V": cuff}
		c.Error = map[string]string{"cuff": "3"}
		s := whole(t, c, volts)
		got := s.Beats.Pulses[0]
		if math.Abs(got.Systolic-p.Systolic) > 0.2 || math.Abs(got.Mean-p.Mean) > 0.2 {
			t.Errorf("%s: %v/%v mean %v, want %v/%v mean %v", cuff, got.Systolic, got.Diastolic, got.Mean, p.Systolic, p.Diastolic, p.Mean)
		}
		right := inMmHg.Fit.Results[inMmHg.Fit.Chosen].Values.C
		if s.Fit.Reason != "" {
			t.Fatalf("%s: %s", cuff, s.Fit.Reason)
		}
		cc := s.Fit.Results[s.Fit.Chosen].Values.C
		if !(math.Abs(cc/right-1) < 0.02) {
			t.Errorf("%s: C %v, want %v", cuff, cc, right)
		}
		if w, ok := warned(s, data.CodeUncalibrated); ok {
			t.Errorf("%s: still %s", cuff, w.Text)
		}
		if w, ok := warned(s, data.CodeCuff); !ok || !strings.Contains(w.Text, "pulse pressure is sure to") {
			t.Errorf("%s: %v", cuff, w)
		}
		want := inMmHg.Fit.Results[inMmHg.Fit.Chosen].Parameters[1].Total.Width()
		if w := s.Fit.Results[s.Fit.Chosen].Parameters[1].Total.Width(); !(w > 1.1*want) {
			t.Errorf("%s: the interval of C is %v wide, without a cuff %v", cuff, w, want)
		}
	}
}

func decimal(v float64) string { return strconv.FormatFloat(v, 'f', -1, 64) }

// The two parts of a cuff's error give back the error of each of its pressures.
func TestErrorOfACuff(t *testing.T) {
	cuff := Cuff{Upper: 130, Diastolic: 70}
	e := cuff.errors(8)
	for _, p := range []float64{130, 70} {
		if got := math.Hypot(e.Offset, e.Scale*(p-e.Pivot)); math.Abs(got-8) > 1e-12 {
			t.Errorf("at %v mmHg: %v, want 8", p, got)
		}
	}
	// The pulse pressure is the difference of two: sqrt(2) times 8.
	if got := e.Scale * 60; math.Abs(got-8*math.Sqrt2) > 1e-12 {
		t.Errorf("pulse pressure: %v", got)
	}
}

func TestCuffsThatAreNone(t *testing.T) {
	for text, want := range map[string]string{
		"120": "not two pressures", "80/120": "not above", "a/b": "not two", "mean:93": "not two", "120/80/93": "not two", "Inf/80": "not two", "120/-5": "not two",
	} {
		c := inventedCase()
		c.Calibrate = map[string]string{"ao_mmHg": text}
		_, err := try(c, invented(aortic("ao_mmHg")), StageIntake)
		if err == nil || !strings.Contains(err.Error(), want) || !strings.Contains(err.Error(), "--calibrate ao_mmHg") {
			t.Errorf("%s: %v", text, err)
		}
	}
	c := inventedCase()
	c.Calibrate = map[string]string{"ao_mmHg": "120/80"}
	if _, err := try(c, invented(column{"ao_mmHg", steady(90)}), StageIntake); err == nil || !strings.Contains(err.Error(), "no pulse") {
		t.Errorf("a trace without a pulse: %v", err)
	}
	c.Calibrate = map[string]string{"ao_flow_mL_s": "120/80"}
	if _, err := try(c, invented(outflowTo("ao_flow_mL_s")), StageIntake); err == nil || !strings.Contains(err.Error(), "no pressure") {
		t.Errorf("a flow: %v", err)
	}
}

// 10 cm above the heart: 7.36 mmHg of the fluid in a line, 7.80 of blood (density
// times 980.665 cm/s² over 1333.224).
func TestSensorHeight(t *testing.T) {
	for _, c := range []struct {
		site string
		want float64
	}{{"root", 7.3556}, {"finger", 7.7969}} {
		mean := func(height map[string]float64) float64 {
			k := casefile.Case{Recording: "a.csv", Site: map[string]string{"p_mmHg": c.site}, SensorHeightCM: height}
			s, err := try(k, invented(aortic("p_mmHg")), StageIntake)
			if err != nil {
				t.Fatal(err)
			}
			return meanOfValid(s.Intake.Channels[0].Values)
		}
		if got := mean(map[string]float64{"p_mmHg": 10}) - mean(nil); math.Abs(got-c.want) > 1e-3 {
			t.Errorf("%s: %v mmHg, want %v", c.site, got, c.want)
		}
	}
}
