package tree

import (
	"math"
	"testing"
)

// euler inverts a transform at one time by Abate and Whitt's Euler summation (1995,
// ORSA J Comput 7:36; from memory): an independent method for smooth functions.
func euler(f func(s complex128) float64, t float64) float64 {
	const a, n, m = 22.0, 60, 14
	sum := f(complex(a/(2*t), 0)) / 2
	partial := make([]float64, m+1)
	for k := 1; k <= n+m; k++ {
		term := f(complex(a/(2*t), float64(k)*math.Pi/t))
		if k%2 == 1 {
			term = -term
		}
		sum += term
		if k >= n {
			partial[k-n] = sum
		}
	}
	mean, weight := 0.0, math.Pow(2, -m)
	for k, p := range partial {
		mean += weight * p
		weight *= float64(m-k) / float64(k+1)
	}
	return math.Exp(a/2) / t * mean
}

// Outflow of every bed of the 55-segment tree by the other method: at the times
// found, Euler's sum must give 10, 50, 90 % of the final value, within 0.1 ms for a
// step of flow and 0.5 ms for one of pressure; 1 ms on a front.
func TestResponseByEuler(t *testing.T) {
	n := tree55(t, false)
	r, err := Respond(n)
	if err != nil {
		t.Fatal(err)
	}
	c, err := compile(n)
	if err != nil {
		t.Fatal(err)
	}
	nodes, to, row := make([]node, len(c.pieces)), make([]ends, len(c.order)), make([]complex128, 2*quantities)
	worst := [2]float64{}
	compared := 0
	for step, beds := range [][]BedResponse{r.FlowStep, r.PressureStep} {
		for i, bed := range beds {
			if i%4 > 0 { // all of them agree as well, in ten seconds
				continue
			}
			outflowAt := func(at float64) float64 {
				return euler(func(s complex128) float64 {
					c.transforms(s, []int{bed.Segment}, nodes, to, row)
					return real(row[step*quantities+outflow])
				}, at) / bed.Outflow.Final
			}
			for j, at := range []float64{bed.Outflow.T10, bed.Outflow.T50, bed.Outflow.T90} {
				const h = 5e-5
				off := math.Abs((outflowAt(at) - fractions[j]) / (outflowAt(at+h) - outflowAt(at-h)) * 2 * h)
				limit := []float64{1e-4, 5e-4}[step]
				if bed.Outflow.Front {
					limit = 1e-3
				}
				if !(off <= limit) {
					t.Errorf("segment %d, step %d: %g s is off by %.1e s", bed.Segment, step, at, off)
				}
				worst[step] = max(worst[step], off)
				compared++
			}
		}
	}
	t.Logf("%d times compared, off by %.1e s at most under a step of flow, %.1e s under one of pressure", compared, worst[0], worst[1])
	if compared < 12 {
		t.Error("hardly anything was compared")
	}
}

// A short tube before R1, R2, C is the lumped load: under a step of flow Pc goes as
// 1 - exp(-t/RC), so that outflow passes half at RC ln 2 and inflow at once; under a step
// of pressure the time constant is C R1 R2/(R1 + R2). The same terminal with other values
// settles late: 90 % at 3.45388 s for 1.5 s (closed forms).
func TestResponseOfALumpedLoad(t *testing.T) {
	for _, z := range []Terminal{{R1: 0.05, R2: 1, C: 1.5}, {R1: 2, R2: 40, C: 3}, {R1: 1, R2: 9, C: 1e-2}} {
		r, err := Respond(tube(1e-3, 1, 1e4, z, ideal))
		if err != nil {
			t.Fatal(err)
		}
		tau, parallel := z.R2*z.C, z.C*z.R1*z.R2/(z.R1+z.R2)
		flow, step := r.FlowStep[0], r.PressureStep[0]
		for _, row := range []struct {
			what      string
			got, want float64
		}{
			{"flow step, t10", flow.Outflow.T10, -tau * math.Log(0.9)},
			{"flow step, t50", flow.Outflow.T50, tau * math.Ln2},
			{"flow step, t90", flow.Outflow.T90, tau * math.Log(10)},
			{"flow step, pressure t90", flow.Pressure.T90, tau * math.Log(10*z.R2/(z.R1+z.R2))},
			{"pressure step, t10", step.Outflow.T10, -parallel * math.Log(0.9)},
			{"pressure step, t50", step.Outflow.T50, parallel * math.Ln2},
			{"pressure step, t90", step.Outflow.T90, parallel * math.Log(10)},
			{"flow step, inflow t90", flow.Inflow.T90, 0},
		} {
			if !(math.Abs(row.got-row.want) <= 1e-4) {
				t.Errorf("%+v, %s: %.6f s, want %.6f", z, row.what, row.got, row.want)
			}
		}
		near(t, "final outflow", flow.Outflow.Final, 1, 1e-9)
		near(t, "final pressure", flow.Pressure.Final, z.R1+z.R2, 1e-9)
		near(t, "final outflow of a step of pressure", step.Outflow.Final, 1/(z.R1+z.R2), 1e-9)
	}
}

// A step of pressure arrives at the end of an ideal matched tube whole, after l/c;
// it is marked as a front. A closed bed has no times.
func TestResponseOnAFront(t *testing.T) {
	r, err := Respond(tube(123, 1, 617.2134, Terminal{Matched: true}, ideal))
	if err != nil {
		t.Fatal(err)
	}
	for _, course := range []Course{r.PressureStep[0].Outflow, r.FlowStep[0].Pressure} {
		for _, at := range []float64{course.T10, course.T50, course.T90} {
			if math.Abs(at-123/617.2134) > 1e-3 || !course.Front {
				t.Errorf("a front at %g s, want %g: %+v", at, 123/617.2134, course)
			}
		}
	}
	r, err = Respond(fork(Terminal{R1: inf, R2: 1}, Terminal{R2: 2, C: 1}, thick))
	if err != nil {
		t.Fatal(err)
	}
	if shut := r.FlowStep[0]; shut.Segment != 1 || !math.IsNaN(shut.Outflow.T50) || !math.IsNaN(shut.Pressure.Final) {
		t.Errorf("a closed bed responds: %+v", shut)
	}
	if open := r.FlowStep[1]; !(open.Outflow.T50 > 0) || math.IsNaN(open.Outflow.T90) {
		t.Errorf("the open bed does not: %+v", open)
	}
	r, err = Respond(fork(Terminal{R2: inf}, Terminal{R1: inf}, thick))
	if err != nil || !math.IsNaN(r.PressureStep[0].Inflow.T10) {
		t.Errorf("all closed: %+v, %v", r, err)
	}
}
