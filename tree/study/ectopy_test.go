package study

import (
	"fmt"
	"math"
	"math/rand/v2"
	"strings"
	"testing"

	"afterbeat/data/casefile"
)

// train is two minutes of beats into a wk3 of R 1, C 1.3 and Zc 0.05, integrated
// in steps of 1 ms and written at 200 Hz with noise of 0.3 mmHg. A part of the
// beats comes early and ejects half, with a pause and a larger beat after it.
func train(ectopic float64) folder {
	const resistance, compliance, zc = 1.0, 1.3, 0.05
	rng := rand.New(rand.NewPCG(11, 12))
	type ejection struct{ at, size float64 }
	var beats []ejection
	early := 0.0
	for at := 0.0; at < 120; {
		size := 1 + 0.04*rng.NormFloat64()
		interval := 0.8 * (1 + 0.015*rng.NormFloat64())
		if early += ectopic; early >= 1 && at > 4 {
			early--
			beats = append(beats, ejection{at, size}, ejection{at + 0.45, 0.5 * size}, ejection{at + 1.6, 1.15 * size})
			at += 2.4
			continue
		}
		beats = append(beats, ejection{at, size})
		at += interval
	}
	var csv strings.Builder
	csv.WriteString("time_s,aortic_pressure_mmHg,aortic_flow_mL_s\n")
	pressure, next := 85.0, 0
	for i := range 120000 {
		t := float64(i) / 1000
		for next+1 < len(beats) && t >= beats[next+1].at {
			next++
		}
		flow := 0.0
		if u := t - beats[next].at; u >= 0 && u < 0.3 {
			flow = 400 * beats[next].size * math.Sin(math.Pi*u/0.3)
		}
		if i%5 == 0 {
			fmt.Fprintf(&csv, "%.3f,%.3f,%.3f\n", t, pressure+zc*flow+0.3*rng.NormFloat64(), flow)
		}
		pressure += 0.001 * (flow - pressure/resistance) / compliance
	}
	return folder{"train.csv": csv.String()}
}

// Five beats of a hundred that come too early move the compliance by less than
// 1 %, and are left out with the beats around them.
func TestEctopyHardlyMovesTheCompliance(t *testing.T) {
	compliance := func(ectopic float64) (float64, Study) {
		s := fitted(t, casefile.Case{Recording: "train.csv", Replicates: ptr(few), Model: "wk3", OutflowPressure: ptr(0.0), Share: []float64{0.5}}, train(ectopic))
		_, c, _ := chosen(t, s)
		return c, s
	}
	without, _ := compliance(0)
	with, s := compliance(0.065)
	t.Logf("C %.4f without, %.4f with; %d of %d beats used", without, with, s.Beats.Pressure.Count, len(s.Beats.Beats))
	if math.Abs(with/without-1) > 0.01 {
		t.Errorf("C moves by %.2f %%", 100*(with/without-1))
	}
	if n := len(s.Beats.Beats) - s.Beats.Pressure.Count; n < 14 {
		t.Errorf("%d beats left out", n)
	}
}
