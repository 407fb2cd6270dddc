package support_test

import (
	"fmt"
	"math"
	"strings"
	"testing"

	"afterbeat/data"
	"afterbeat/data/casenote"
	"afterbeat/tree/pump"
	"afterbeat/tree/study"
	posing "afterbeat/tree/support"
	"afterbeat/tui"
	"afterbeat/tui/screentest"
	"afterbeat/tui/support"
)

// refused is a study without a forecast, for a reason.
func refused(s study.Study, reason string) study.Study {
	s.Forecast = &study.Forecast{Comparison: *s.Comparison, Reason: reason}
	return s
}

// forecast is a study with a forecast that is invented: a pulse that shrinks
// evenly with speed, and a valve that stays shut from 10 on.
func forecast(t testing.TB) study.Study {
	t.Helper()
	s := computed(t)
	set, ok := pump.ByName("generic A")
	if !ok {
		t.Fatal("no set generic A")
	}
	f := study.Forecast{
		Comparison: *s.Comparison, Pump: study.ForecastPump{Set: set}, Native: inventedState(0), Middle: 2, Draws: 80,
		ValveLimit: spread(10, 0.08),
		Ventricle: []study.VentricleParameter{
			{Symbol: "Emax", Meaning: "end-systolic elastance", Unit: "mmHg/mL", Estimate: spread(1.21, 0.3), Origin: data.Estimated},
			{Symbol: "EDV", Meaning: "end-diastolic volume, native", Unit: "mL", Estimate: data.Estimate{
				Value: 205, Total: data.Interval{Low: 110, High: 300}, Random: data.NoInterval(), Why: "arterial traces do not fix it; drawn evenly from this range",
			}, Origin: data.Assumed},
		},
		Sensitivity: []study.ForecastSensitivity{
			{Assumption: "filling slope", Change: "0, constant filling", RetainedPulse: 0.612, Difference: 0.112, PulsePressure: 24.5},
			{Assumption: "outflow-pressure", Change: "+10 mmHg", RetainedPulse: 0.448, Difference: -0.052, PulsePressure: 17.9},
		},
		Mismatch: []study.Mismatch{{Quantity: "pulse pressure", Unit: "mmHg", Measured: 40, Modelled: 42}},
		Held: []study.ForecastHeld{
			{Quantity: "contractility, Emax", Unit: "mmHg/mL", Estimate: spread(1.21, 0.3), Origin: data.Estimated},
			{Quantity: "wall, EDV", Unit: "mL", Estimate: data.Estimate{
				Value: 205, Total: data.Interval{Low: 110, High: 300}, Random: data.NoInterval(), Why: "arterial traces do not fix it; drawn evenly from this range",
			}, Origin: data.Assumed},
		},
		Published: []study.PublishedCheck{{Name: "change of pulse pressure", Unit: "mmHg", At: "output +1.29 L/min, at 8.1", Value: -50, Low: -45, High: -5, Source: "8 patients"}, {Name: "pulse pressure", Unit: "mmHg", Value: math.NaN(), Low: 3, High: 31, Source: "13 patients", Reason: "the native output is higher"}},
		Disproof:  "Measure the pulse pressure of the arterial line with the pump at 9000/min and nothing else changed: outside 17 to 23 mmHg the forecast is wrong.",
		Warnings:  []data.Warning{{Code: data.CodePublished, Text: "change of pulse pressure is outside the published -45 to -5", Cure: "nothing by itself: patients differ"}},
	}
	for _, speed := range []float64{6, 7.5, 9, 10.5, 12} {
		f.Speeds = append(f.Speeds, inventedState(speed))
	}
	s.Forecast = &f
	return s
}

// spread is a value with a total interval of a relative half-width.
func spread(v, half float64) data.Estimate {
	d := half * math.Abs(v)
	return data.Estimate{Value: v, Total: data.Interval{Low: v - d, High: v + d}, Random: data.Interval{Low: v - d/2, High: v + d/2}, Identified: true}
}

// Of an invented state: mean pressure, mmHg, and pulse pressure natively.
const (
	inventedPulse  = 40.0
	inventedPeriod = 0.72
)

func inventedState(speed float64) study.ForecastState {
	left := 1 - speed/18
	mean, pulse := 75+1.5*speed, inventedPulse*left
	wave := func(mean, swing float64) data.Period {
		p := data.Period{Samples: make([]float64, 144), Rate: 144 / inventedPeriod}
		for i := range p.Samples {
			p.Samples[i] = mean + swing/2*math.Sin(2*math.Pi*(float64(i)/144-0.1))
		}
		return p
	}
	opens := speed < 10
	s := study.ForecastState{
		CoupledState: posing.CoupledState{
			Speed: speed, Settled: true, ValveOpened: opens,
			Arterial:    posing.Range{Mean: mean, Min: mean - pulse/2, Max: mean + pulse/2},
			Ventricular: posing.Range{Mean: 40, Min: 4, Max: 110},
			PumpFlow:    posing.Range{Mean: 8 * speed, Min: 6 * speed, Max: 10 * speed},
			ValveFlow:   posing.Range{Mean: 66 - 5*speed},
			Energy:      posing.CoupledEnergy{Filling: 700, Ventricle: 4000, Pump: 300 * speed, Mitral: 50, Aortic: 60, Cannula: 20 * speed, Zc: 500, R: inventedPeriod*(mean*(66+3*speed)+800*left) - 800, Outflow: 300},
		},
		Waves:        posing.Waves{Pressure: wave(mean, pulse), RootFlow: wave(66+3*speed, 200*left), PumpFlow: wave(8*speed, 4*speed)},
		MeanPressure: spread(mean, 0.04), Output: spread(66+3*speed, 0.1), PulsePressure: spread(pulse, 0.15), RetainedPulse: spread(left, 0.12),
		EEPressure: spread(mean+5*left, 0.04), SurplusEnergy: spread(9000*left, 0.2), FillingPress: spread(18-speed/2, 0.3),
		ValveOpenTime: spread(0.25*left, 0.2), PumpSwing: spread(4*speed, 0.2),
		PressureChange: spread(1.5*speed, 0.3), OutputChange: spread(3*speed, 0.3), ValveOpenDraws: left,
	}
	if speed == 0 {
		s.RetainedPulse, s.PumpFlow = data.Exact(1), posing.Range{}
	}
	return s
}

func TestForecastGolden(t *testing.T) {
	s := forecast(t)
	views := func(s study.Study, keys ...string) func(tui.Area, tui.Theme) string {
		return func(a tui.Area, theme tui.Theme) string {
			return screentest.New(support.New(), s, a, theme).Press(keys...).View()
		}
	}
	screentest.Golden(t, "forecast", views(s))
	screentest.Golden(t, "forecast-sweep", views(s, "w"))
	screentest.Golden(t, "forecast-sweep-table", views(s, "w", "t"), small, tui.Area{Width: 60, Height: 11})
	screentest.Golden(t, "forecast-energy", views(s, "e"))
	screentest.Golden(t, "forecast-figures", views(s, "m", "f"))
	screentest.Golden(t, "forecast-depends", views(s, "d"))
	screentest.Golden(t, "forecast-ventricle", views(s, "p"))
	screentest.Golden(t, "forecast-held", views(s, "h"), small)
	screentest.Golden(t, "forecast-opened", views(s, "enter"))
	screentest.Golden(t, "forecast-yardstick", views(s, "left"), small)
	screentest.Golden(t, "forecast-refused", views(refused(computed(t), "no ventricle ejects as asked: stroke volume 12 mL in 0.05 s from 205 mL, which leaves nothing that could be coupled")), small)
}

// The forecast is what the screen begins with, at its middle speed, and up and
// down move through its speeds.
func TestSpeedMoves(t *testing.T) {
	s := forecast(t)
	b := open(s)
	i := s.Forecast.Middle
	for _, step := range []struct {
		key string
		by  int
	}{{"", 0}, {"up", 1}, {"+", 1}, {"k", 0}, {"down", -1}, {"-", -1}, {"j", -1}} {
		if step.key != "" {
			b.Press(step.key)
		}
		i += step.by
		state := s.Forecast.Speeds[i]
		e, valve := state.RetainedPulse, "valve shut"
		if state.ValveOpened {
			valve = "valve opens"
		}
		says(t, b.View(),
			fmt.Sprintf("coupled speed %.4g (1000/min), generic A, invented", state.Speed),
			"retained pulse "+casenote.Format(e.Value, e.Total)+" ("+casenote.FormatRange(e.Value, e.Total)+"); "+valve,
			fmt.Sprintf("pump flow %.2f L/min", 0.06*state.PumpFlow.Mean))
		silent(t, strings.ToLower(b.View()), "yardstick")
	}
}

// What is set off against the ventricle and the cannulas is the head of the pump.
func TestHead(t *testing.T) {
	s := forecast(t)
	state := s.Forecast.Speeds[2]
	want := state.Arterial.Mean - state.Ventricular.Mean + s.Forecast.Pump.Resistance*state.PumpFlow.Mean
	says(t, open(s).View(), fmt.Sprintf("head %.1f mmHg", want))
}

func TestPosingsGoRound(t *testing.T) {
	b := open(forecast(t), "up")
	says(t, b.View(), "coupled speed 10.5")
	says(t, b.Press("right").View(), "scaled share 0.5", identity, "The forecast is the posing coupled")
	says(t, b.Press("right").View(), "late-valve share 0.5", "a yardstick, no forecast")
	says(t, b.Press("right").View(), "coupled speed 10.5")
	says(t, b.Press("left").View(), "late-valve share 0.5")
}

// While it is computed the yardsticks stand, and it takes their place unless one of
// them was chosen.
func TestForecastComes(t *testing.T) {
	for _, c := range []struct {
		keys, want string
	}{{"", "coupled speed 9"}, {"left", "scaled share 0.5"}} {
		b := open(computed(t))
		says(t, b.View(), "late-valve share 0.5", "The forecast is not computed yet")
		silent(t, b.View(), "coupled")
		b.Press(strings.Fields(c.keys)...)
		b.Show(forecast(t))
		says(t, b.View(), c.want)
	}
	b := open(forecast(t), "up", "w")
	b.Show(computed(t))
	says(t, b.View(), "The forecast is not computed yet", "against the pump's share")
	b.Show(forecast(t))
	says(t, b.View(), "coupled speed 10.5", "valve limit")
}

// A view that only the forecast has comes back with it.
func TestForecastViewComesBack(t *testing.T) {
	b := open(forecast(t), "d")
	says(t, b.View(), "What would prove the forecast wrong")
	b.Show(computed(t))
	says(t, b.View(), "late-valve share 0.5", "The forecast is not computed yet")
	b.Press("d", "p")
	says(t, b.View(), "late-valve share 0.5")
	b.Show(forecast(t))
	says(t, b.View(), "What would prove the forecast wrong")
}

func TestWithoutAForecastTheReason(t *testing.T) {
	b := open(refused(computed(t), "no ventricle ejects as \x1b[31masked"))
	says(t, b.View(), "late-valve share 0.5", "No forecast: no ventricle ejects as", "a yardstick, no forecast")
	silent(t, b.View(), "\x1b")
	silent(t, b.Press("right", "right").View(), "coupled")
}

// Bounds and pictures of a step stay: a step changes neither the y axis nor what
// is drawn natively.
func TestBoundsStayOverSpeeds(t *testing.T) {
	labels := func(view string) (out []string) {
		for line := range strings.SplitSeq(view, "\n") {
			if label, _, ok := strings.Cut(line, "┤"); ok {
				out = append(out, label)
			}
		}
		return out
	}
	for _, keys := range []string{"", "f", "w", "w f"} {
		b := open(forecast(t), strings.Fields(keys)...)
		want := fmt.Sprint(labels(b.View()))
		for range 4 {
			if got := fmt.Sprint(labels(b.Press("up").View())); got != want {
				t.Errorf("%q: y labels %s after %s", keys, got, want)
			}
		}
	}
}

func TestSweepOverSpeeds(t *testing.T) {
	s := forecast(t)
	b := open(s, "w")
	says(t, b.View(), "valve limit, the lowest speed with it shut: 10.00 (9.20 to 10.80), 1000/min", "valve shut =", "mean pressure ─", "pulse pressure *")
	b.Press("t")
	for _, state := range append([]study.ForecastState{s.Forecast.Native}, s.Forecast.Speeds...) {
		says(t, b.View(), casenote.Format(state.PulsePressure.Value, state.PulsePressure.Total), casenote.Format(state.MeanPressure.Value, state.MeanPressure.Total))
	}
	says(t, b.View(), "> 9 20.0 (17.0 to 23.0)")
	says(t, b.Press("up").View(), "> 10.5 16.7")

	f := *s.Forecast
	f.ValveLimit = data.Estimate{Value: math.NaN(), Total: data.NoInterval(), Random: data.NoInterval(), Why: "the valve opens up to 24"}
	s.Forecast = &f
	b.Show(s)
	says(t, b.View(), "no valve limit: the valve opens up to 24")
}

func TestEnergyOfTheForecast(t *testing.T) {
	s := forecast(t)
	const milliwatt = 0.133322368 / inventedPeriod // of 1 mmHg mL a beat
	b := open(s, "e")
	says(t, b.View(),
		fmt.Sprintf("ventricle %.1f %.1f", 4000*milliwatt, 4000*milliwatt),
		fmt.Sprintf("pump, to the blood 0.0 %.1f", 2700*milliwatt),
		fmt.Sprintf("of it pulsatile %.1f %.1f", milliwatt*inventedPeriod*800, milliwatt*inventedPeriod*400),
		"its motor draws more", "EEP, mmHg")
}

func TestWhatTheForecastDependsOn(t *testing.T) {
	b := open(forecast(t))
	b.Resize(large, tui.Theme{})
	b.Press("d")
	says(t, b.View(), "outside 17 to 23 mmHg the forecast is wrong.",
		"1 filling slope 0, constant filling 0.612 +0.112 24.5", "2 outflow-pressure +10 mmHg 0.448 -0.052 17.9",
		"change of pulse pressure: -50 mmHg, outside the published -45 to -5 mmHg", "output +1.29 L/min, at 8.1; 8 patients",
		"pulse pressure: no value, the native output is higher; published 3 to 31 mmHg", "pulse pressure, mmHg 40 42 +5.0 %")
	b.Press("p")
	says(t, b.View(), "Emax end-systolic elastance: 1.21 (0.85 to 1.57) mmHg/mL, estimated",
		"not identified (110 to 300) mL, assumed", "arterial traces do not fix it", "invented, axial-like")
	b.Press("h")
	says(t, b.View(), "contractility, Emax 1.21 (0.85 to 1.57) mmHg/mL, estimated", "wall, EDV not identified (110 to 300) mL, assumed", "Mean flow and mean pressure are not matched")
	says(t, b.Press("h").View(), "coupled speed 9")
}

func TestForecastSurvives(t *testing.T) {
	s := forecast(t)
	one := *s.Forecast
	one.Speeds, one.Middle = one.Speeds[4:], 4
	one.Speeds[0].Suction = true
	bare := study.Forecast{Comparison: *s.Comparison, Speeds: []study.ForecastState{{}, {}}, ValveLimit: data.Estimate{Value: math.NaN()}, Middle: 7, Disproof: "prüfe \x1b[31m"}
	odd := func(f study.Forecast) study.Study {
		c := s
		c.Forecast = &f
		return c
	}
	empty := study.Forecast{Comparison: *s.Comparison}
	studies := []study.Study{s, odd(one), odd(bare), odd(empty), computed(t), refused(computed(t), "it cannot be \u202e so"), {}}
	screentest.Survives(t, func() tui.Screen { return support.New() }, studies, "left", "right", "up", "down", "+", "-", "w", "e", "m", "h", "f", "t", "v", "d", "p", "]", "[", "n")
}

// The forecast of the demo as it is computed.
func TestForecastOfTheDemo(t *testing.T) {
	if testing.Short() {
		t.Skip("computes a forecast")
	}
	s, err := screentest.Demo(t, nil).Next(t.Context())
	if err != nil {
		t.Fatal(err)
	}
	f := s.Forecast
	if f == nil || f.Reason != "" {
		t.Fatalf("no forecast of the demo: %+v", f)
	}
	b := open(s)
	for i := f.Middle; i < len(f.Speeds); i++ {
		e, p := f.Speeds[i].RetainedPulse, f.Speeds[i].PulsePressure
		says(t, b.View(), "coupled speed", fmt.Sprintf("%.4g (1000/min), %s", f.Speeds[i].Speed, f.Pump.Name),
			"retained pulse "+casenote.Format(e.Value, e.Total)+" ("+casenote.FormatRange(e.Value, e.Total)+")",
			casenote.Format(p.Value, p.Total)+" ("+casenote.FormatRange(p.Value, p.Total)+")")
		b.Press("up")
	}
	b.Resize(tui.Area{Width: 100, Height: 200}, tui.Theme{})
	b.Press("d")
	for i, moved := range f.Sensitivity {
		says(t, b.View(), fmt.Sprintf("%d %s %s %.3f %+.3f %.1f", i+1, moved.Assumption, moved.Change, moved.RetainedPulse, moved.Difference, moved.PulsePressure))
	}
	for _, p := range f.Ventricle {
		says(t, b.Press("p").View(), p.Symbol+" "+p.Meaning)
		b.Press("p")
	}
}

func BenchmarkForecastView(b *testing.B) {
	s := forecast(b)
	for _, a := range []tui.Area{small, {Width: 200, Height: 56}} {
		for _, view := range []string{"", "w", "e", "m", "d", "p"} {
			b.Run(fmt.Sprintf("%dx%d%s", a.Width, a.Height, view), func(b *testing.B) {
				bench := screentest.New(support.New(), s, a, tui.Theme{Colours: 256})
				if view != "" {
					bench.Press(view)
				}
				b.ReportAllocs()
				for b.Loop() {
					bench.Screen.View()
				}
			})
		}
	}
}
