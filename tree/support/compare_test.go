package support

import (
	"fmt"
	"math"
	"testing"

	"afterbeat/data"
	"afterbeat/fitting"

	"pgregory.net/rapid"
)

func answer(t testing.TB, l fitting.Load, q data.Period, pv float64, posing Posing, shares ...float64) Answer {
	t.Helper()
	a, err := Pose(l, q, pv, posing, shares)
	if err != nil {
		t.Fatal(err)
	}
	return a
}

// Identity of the scaled posing on a linear load: pulse 1-s, energy (1-s)².
func TestScaledIsAnIdentity(t *testing.T) {
	rapid.Check(t, func(r *rapid.T) {
		q := flows().Draw(r, "q")
		q.Samples = append(q.Samples, q.Mean()+50) // never steady
		l := lumped(t, "wk3", rapid.Float64Range(0.2, 3).Draw(r, "R"), rapid.Float64Range(0.2, 4).Draw(r, "C"), 0.05)
		share := rapid.Float64Range(0, 0.99).Draw(r, "share")
		a, err := Pose(l, q, 8, ScaledPosing, []float64{share})
		if err != nil {
			r.Fatal(err)
		}
		c, left := a.Comparisons[0], 1-share
		if math.IsNaN(a.Native.FlowPI.Value) {
			if a.Native.FlowPI.Why == "" || c.RetainedPI.Why == "" {
				r.Fatal("an index that does not exist, without a reason")
			}
			c.RetainedPI.Value = left // the mean is nearly nil beside the pulse
		}
		for what, e := range map[string]struct{ got, want float64 }{
			"pulse pressure":  {c.RetainedPressure.Value, left},
			"swing of flow":   {c.RetainedFlow.Value, left},
			"Gosling PI":      {c.RetainedPI.Value, left},
			"SHE":             {c.RetainedSHE.Value, left * left},
			"pulsatile power": {c.RetainedPower.Value, left * left},
			"flow amplitude":  {1 / c.FlowAmplitude.Value, left},
			"power":           {1 / c.PulsatilePower.Value, left * left},
		} {
			if !(math.Abs(e.got-e.want) <= 1e-12) {
				r.Fatalf("%s: retained %v, identity says %v", what, e.got, e.want)
			}
		}
		if !c.ByConstruction || c.RetainedPressure.Total.Defined() || c.RetainedPressure.Why != "by construction" {
			r.Fatalf("an identity passes for an estimate: %+v", c.RetainedPressure)
		}
	})
}

// Retained pulse pressure of the late valve on the worked example, computed
// apart from this program: threshold from sin b - b cos b = 1-s, then the load's
// differential equation stepped by Runge-Kutta until periodic.
func TestLateValveOnTheWorkedExample(t *testing.T) {
	a := answer(t, example(t), halfSine(8000), 0, LateValvePosing, 0.5, 0.75, 0.9)
	for i, want := range []float64{0.586, 0.338, 0.164} {
		c := a.Comparisons[i]
		near(t, fmt.Sprintf("retained pulse pressure at %v", c.Share), c.RetainedPressure.Value, want, 5e-4)
		near(t, "change of mean pressure", c.MeanPressureChange.Value, 0, 0)
		if c.ByConstruction {
			t.Error("late-valve is taken for an identity")
		}
	}
}

// At equal mean flow the Gosling index retains what the swing does.
func TestIndexFollowsSwingAtEqualMean(t *testing.T) {
	a := answer(t, example(t), halfSine(200), 0, LateValvePosing, 0.3, 0.6)
	for _, c := range a.Comparisons {
		near(t, "retained PI", c.RetainedPI.Value, c.RetainedFlow.Value, 1e-12)
		near(t, "flow amplitude", c.FlowAmplitude.Value*c.RetainedFlow.Value, 1, 1e-12)
	}
}

func TestShareZeroIsNative(t *testing.T) {
	for _, posing := range Posings() {
		a := answer(t, example(t), halfSine(200), 3, posing, 0)
		if got, want := a.Supported[0].numbers(), a.Native.numbers(); got != want {
			t.Errorf("%s: %v, native %v", posing, got, want)
		}
	}
}

func TestWhatDoesNotExistSaysWhy(t *testing.T) {
	steady := answer(t, example(t), halfSine(200), 0, LateValvePosing, 1).Comparisons[0]
	near(t, "retained pulse pressure", steady.RetainedPressure.Value, 0, 0)
	near(t, "retained SHE", steady.RetainedSHE.Value, 0, 0)
	for what, e := range map[string]data.Estimate{"flow amplitude": steady.FlowAmplitude, "power": steady.PulsatilePower} {
		if !math.IsNaN(e.Value) || e.Identified || e.Why == "" {
			t.Errorf("%s over nothing: %+v", what, e)
		}
	}
	flat := data.Period{Samples: []float64{80, 80, 80, 80}, Rate: 5}
	none := answer(t, example(t), flat, 0, ScaledPosing, 0.5).Comparisons[0]
	if e := none.RetainedPressure; !math.IsNaN(e.Value) || e.Why == "" {
		t.Errorf("retained of no pulse: %+v", e)
	}
}
