package study

import (
	"math"
	"testing"

	"afterbeat/data"
	"afterbeat/data/casefile"
)

// A velocity that a scale of 100 cm/s has folded is the velocity again, exactly where
// the range is stated, and closely where it is told from the jumps.
func TestFoldedVelocityIsUnfolded(t *testing.T) {
	velocity := func(at float64) float64 { return 30 + 1.6*(halfPressure(at)-70) }
	folded := func(at float64) float64 {
		v := velocity(at)
		return v - 100*math.Floor((v+30)/100) // the scale ends at 70
	}
	systolic := func(c casefile.Case, f func(float64) float64) (float64, Study) {
		c.Recording = "a.csv"
		s, err := try(c, invented(column{"mca_velocity_cm_s", f}), StageBeats)
		if err != nil {
			t.Fatal(err)
		}
		return s.Beats.Pulses[0].Systolic, s
	}
	want, _ := systolic(casefile.Case{}, velocity)
	if want < 75 {
		t.Fatalf("%v is not beyond the scale", want)
	}
	got, s := systolic(casefile.Case{VelocityRange: map[string]float64{"mca_velocity_cm_s": 100}}, folded)
	if _, ok := warned(s, data.CodeAliased); ok || math.Abs(got-want) > 1e-9 {
		t.Errorf("with the range stated: %v, want %v; warned %v", got, want, ok)
	}
	got, s = systolic(casefile.Case{}, folded)
	if _, ok := warned(s, data.CodeAliased); !ok || math.Abs(got-want) > 2 {
		t.Errorf("with the range from the jumps: %v, want %v; warned %v", got, want, ok)
	}
}
