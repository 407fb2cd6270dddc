package support

import (
	"math"
	"strings"
	"testing"

	"afterbeat/data"
	"afterbeat/data/unit"
	"afterbeat/fitting"
	"afterbeat/tree/energy"

	"pgregory.net/rapid"
)

// example is the three-element load of the worked example (values.md 1.4, Ex. 2).
func example(t testing.TB) fitting.Lumped { return lumped(t, "wk3", 1, 1.5, 0.05) }

func lumped(t testing.TB, model string, r, c, zc float64) fitting.Lumped {
	t.Helper()
	m, ok := fitting.ByName(model)
	if !ok {
		t.Fatalf("no model %s", model)
	}
	return fitting.Lumped{Model: m, Values: fitting.Values{R: r, C: c, Zc: zc}}
}

// Values.md 5.1 and 9, from the closed form of the half-sine's pressure. A flow
// of N samples is off by order 1/N².
func TestNativeStateOfTheWorkedExample(t *testing.T) {
	s := Native(example(t), halfSine(16000), 0)
	for _, c := range []struct {
		what                 string
		got, want, tolerance float64
	}{
		{"mean pressure", s.MeanPressure.Value, 91.875, 1e-5},
		{"highest pressure", s.MaxPressure.Value, 113.636082132, 1e-5},
		{"lowest pressure", s.MinPressure.Value, 73.265898894, 1e-5},
		{"pulse pressure", s.PulsePressure.Value, 40.3701832, 1e-5},
		{"EEP", s.EEP.Value, 102.9592, 5e-5},
		{"SHE", s.SHE.Value, 14777.78, 5e-3},
		{"percent pulsatility", s.PercentPulsatility.Value, 12.0645, 5e-5},
		{"Gosling PI of flow", s.FlowPI.Value, 4.18879, 5e-6},
		{"input, W", s.Power.Input * unit.MilliwattPerMmHgMLPerS / 1000, 1.201093, 5e-7},
		{"steady, W", s.Power.Steady * unit.MilliwattPerMmHgMLPerS / 1000, 1.071787, 5e-7},
		{"pulsatile, W", s.Power.Pulsatile * unit.MilliwattPerMmHgMLPerS / 1000, 0.129306, 5e-7},
		{"flow past the valve", s.ValveFlow, 87.5, 1e-5},
		{"flow of the pump", s.PumpFlow, 0, 0},
	} {
		near(t, c.what, c.got, c.want, c.tolerance)
	}
	if len(s.Warnings) != 0 || s.Posing != NativePosing {
		t.Errorf("posing %s, warnings %v", s.Posing, s.Warnings)
	}
}

// What "Zc" books is Zc mean Q² = Zc Qm²/2 Ts/T of the half-sine, and its steady
// part Zc (mean Q)². The outflow takes Pv mean Q.
func TestLedgerOfTheWorkedExample(t *testing.T) {
	const pv, height = 6.0, math.Pi * 70 / 0.6
	s := Native(example(t), halfSine(800), pv)
	zc, _ := s.Ledger.Term("Zc")
	near(t, "Zc", zc.Total(), 0.05*height*height/2*0.3/0.8, 1e-3)
	near(t, "Zc, steady", zc.Steady, 0.05*87.5*87.5, 1e-2)
	r, _ := s.Ledger.Term("R")
	near(t, "R, steady", r.Steady, 87.5*87.5, 0.2)
	outflow, _ := s.Ledger.Term("outflow")
	near(t, "outflow", outflow.Total(), pv*87.5, 1e-2)
	near(t, "balance", s.Ledger.Balance(), 0, 1e-9)
	near(t, "pulsatile terms", zc.Pulsatile+r.Pulsatile, s.Power.Pulsatile, 1e-9*s.Power.Input)
}

// The balance closes for every model and any flow with a positive mean, few
// samples included. A model that no ledger is known for fails here.
func TestBalanceClosesForEveryModel(t *testing.T) {
	if len(fitting.Models()) == 0 {
		t.Fatal("no model to check")
	}
	rapid.Check(t, func(r *rapid.T) {
		q := flows().Draw(r, "q")
		pv := rapid.Float64Range(0, 30).Draw(r, "pv")
		draw := func(what string, low, high float64) float64 { return rapid.Float64Range(low, high).Draw(r, what) }
		values := fitting.Values{R: draw("R", 0.1, 5), C: draw("C", 0, 5), Zc: draw("Zc", 0, 0.5), L: draw("L", 0, 0.05)}
		for _, m := range fitting.Models() {
			v := values
			if m.Name == "wk2" {
				v.Zc = 0
			}
			for _, share := range []float64{0, 0.4, 1} {
				s, err := Supported(fitting.Lumped{Model: m, Values: v}, q, pv, LateValvePosing, share)
				if err != nil {
					r.Fatal(err)
				}
				if b := s.Ledger.Balance(); !(math.Abs(b) <= energy.Tolerance) || len(s.Warnings) != 0 {
					r.Fatalf("%s: balance %v, warnings %v", m.Name, b, s.Warnings)
				}
				if d := s.Power.Input - s.Power.Steady - s.Power.Pulsatile; math.Abs(d) > 1e-9*s.Power.Input {
					r.Fatalf("%s: input is %v more than its parts", m.Name, d)
				}
			}
		}
	})
}

// The pressure of another resistance does not close. (That of another compliance
// would: whatever C is, it gives back what it takes.)
func TestBalanceNoticesAWrongPressure(t *testing.T) {
	l, q := example(t), halfSine(200)
	wrong := lumped(t, "wk3", 1.001, 1.5, 0.05)
	p := fitting.Respond(wrong, q, 0)
	books := ledger(l, p, q, 0, energy.PowerOf(p, q).Input)
	if b := math.Abs(books.Balance()); b < 1e-6 {
		t.Errorf("balance %v with the pressure of another resistance", b)
	}
	if len(books.Warnings()) != 1 {
		t.Errorf("warnings %v", books.Warnings())
	}
}

func TestSteadyFlowMeetsSteadyPressure(t *testing.T) {
	for _, posing := range Posings() {
		s, err := Supported(example(t), halfSine(172), 5, posing, 1)
		if err != nil {
			t.Fatal(err)
		}
		for what, v := range map[string]float64{
			"pulse pressure": s.PulsePressure.Value, "swing of flow": s.FlowSwing.Value,
			"SHE": s.SHE.Value, "pulsatile power": s.Power.Pulsatile,
		} {
			near(t, string(posing)+": "+what, v, 0, 0)
		}
		near(t, "mean pressure", s.MeanPressure.Value, 5+1.05*s.PumpFlow, 1e-10)
	}
}

func TestReversedFlowIsWarnedOfAndNotPosed(t *testing.T) {
	q := halfSine(80)
	for j := range q.Samples {
		q.Samples[j] *= -1
	}
	s := Native(example(t), q, 0)
	if len(s.Warnings) != 1 || s.Warnings[0].Code != data.CodeNegativeFlow || s.Warnings[0].Cure == "" {
		t.Errorf("warnings %v", s.Warnings)
	}
	if !math.IsNaN(s.EEP.Value) || s.EEP.Identified || s.EEP.Why == "" {
		t.Errorf("EEP of reversed flow %+v", s.EEP)
	}
	if _, err := Supported(example(t), q, 0, LateValvePosing, 0.5); err == nil || !strings.Contains(err.Error(), "not positive") {
		t.Errorf("error %v", err)
	}
}

func TestWhatCannotBePosed(t *testing.T) {
	good := halfSine(80)
	missing := data.Period{Samples: append([]float64{math.NaN()}, good.Samples...), Rate: 100}
	for _, c := range []struct {
		flow   data.Period
		posing Posing
		share  float64
		says   string
	}{
		{good, ScaledPosing, 1.01, "between 0 and 1"},
		{good, LateValvePosing, -0.01, "between 0 and 1"},
		{good, LateValvePosing, math.NaN(), "between 0 and 1"},
		{good, NativePosing, 0.5, "no posing"},
		{good, "sideways", 0.5, "no posing"},
		{missing, ScaledPosing, 0.5, "without a value"},
		{data.Period{Rate: 100}, ScaledPosing, 0.5, "no samples"},
	} {
		if _, err := Pose(example(t), c.flow, 0, c.posing, []float64{0.5, c.share}); err == nil || !strings.Contains(err.Error(), c.says) {
			t.Errorf("%s at %v: error %v, want one that says %q", c.posing, c.share, err, c.says)
		}
	}
}
