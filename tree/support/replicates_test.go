package support

import (
	"context"
	"fmt"
	"math"
	"math/rand/v2"
	"runtime"
	"slices"
	"testing"

	"afterbeat/data"
)

// scattered draws the worked example again and again.
func scattered(t testing.TB, count, samples int) []draw {
	random := rand.New(rand.NewPCG(1, 2))
	set := make([]draw, count)
	for i := range set {
		near1 := func() float64 { return 1 + 0.05*random.NormFloat64() }
		q := halfSine(samples)
		for j := range q.Samples {
			q.Samples[j] = q.Samples[j]*near1() + random.NormFloat64()
		}
		set[i] = draw{load: lumped(t, "wk3", near1(), 1.5*near1(), 0.05*near1()), flow: q, pv: 5 * near1()}
	}
	return set
}

func from(set []draw) func(int) draw { return func(i int) draw { return set[i] } }

var elevenShares = []float64{0, 0.1, 0.2, 0.3, 0.4, 0.5, 0.6, 0.7, 0.8, 0.9, 1}

// The fast way through a replicate agrees with the states that are shown.
func TestReplicatesAreStates(t *testing.T) {
	for _, posing := range Posings() {
		set := scattered(t, 6, 127)
		rows, err := push(context.Background(), len(set), from(set), posing, elevenShares)
		if err != nil {
			t.Fatal(err)
		}
		for i, d := range set {
			a := answer(t, d.load, d.flow, d.pv, posing, elevenShares...)
			for k, s := range append([]State{a.Native}, a.Supported...) {
				for f, want := range s.numbers() {
					if got := rows[i][k][f]; !(math.Abs(got-want) <= 1e-10*max(1, math.Abs(want))) {
						t.Errorf("%s, replicate %d, state %d: figure %d is %v, want %v", posing, i, k, f, got, want)
					}
				}
			}
		}
	}
}

// A steady flow meets a steady pressure, to the last digit, though another state
// travels through the transform with it.
func TestASteadyStateHasNoPulse(t *testing.T) {
	set := scattered(t, 30, 160)
	rows, err := push(context.Background(), len(set), from(set), LateValvePosing, []float64{0.5, 1})
	if err != nil {
		t.Fatal(err)
	}
	rows2, err := push(context.Background(), len(set), from(set), LateValvePosing, []float64{0.5, 0.7, 1})
	if err != nil {
		t.Fatal(err)
	}
	for i := range rows {
		for _, row := range []numbers{rows[i][2], rows2[i][3]} {
			if row[pulsePressure] != 0 || row[flowSwing] != 0 {
				t.Errorf("replicate %d: pulse pressure %v, swing %v", i, row[pulsePressure], row[flowSwing])
			}
		}
	}
}

func TestRowsDoNotDependOnCores(t *testing.T) {
	set := scattered(t, 40, 60)
	defer runtime.GOMAXPROCS(runtime.GOMAXPROCS(1))
	one, _ := push(context.Background(), len(set), from(set), LateValvePosing, elevenShares)
	runtime.GOMAXPROCS(16)
	many, _ := push(context.Background(), len(set), from(set), LateValvePosing, elevenShares)
	if len(one) != len(set) || !slices.EqualFunc(one, many, slices.Equal[[]numbers]) {
		t.Error("rows differ between 1 and 16 cores")
	}
}

func TestPushingAllocatesNothing(t *testing.T) {
	set := scattered(t, 2, 172)
	row := make([]numbers, 1+len(elevenShares))
	var w worker
	w.push(set[0], LateValvePosing, elevenShares, row)
	if n := testing.AllocsPerRun(20, func() { w.push(set[1], LateValvePosing, elevenShares, row) }); n != 0 {
		t.Errorf("%v allocations a replicate", n)
	}
}

func TestPushingStopsWhenCancelled(t *testing.T) {
	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	if _, err := push(ctx, 3, from(scattered(t, 3, 50)), LateValvePosing, elevenShares); err != context.Canceled {
		t.Errorf("error %v", err)
	}
}

// A replicate whose flow is drawn reversed has no figures, and no panic.
func TestReversedReplicateIsUndefined(t *testing.T) {
	set := []draw{{load: example(t), flow: data.Period{Samples: []float64{-5, -1, 0}, Rate: 3}}}
	rows, err := push(context.Background(), len(set), from(set), LateValvePosing, []float64{0.5})
	if err != nil || !math.IsNaN(rows[0][0][pulsePressure]) || !math.IsNaN(rows[0][1][she]) {
		t.Errorf("rows %v, error %v", rows, err)
	}
}

func BenchmarkSweep11(b *testing.B) {
	for _, n := range []int{172, 860} {
		b.Run(fmt.Sprint(n), func(b *testing.B) {
			l, q := example(b), halfSine(n)
			b.ReportAllocs()
			for b.Loop() {
				if _, err := Sweep(l, q, 0, LateValvePosing, elevenShares); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}

// 2 x 1000 replicates through the native state and eleven shares.
func BenchmarkReplicates(b *testing.B) {
	for _, n := range []int{172, 508, 860, 883, 900} {
		b.Run(fmt.Sprint(n), func(b *testing.B) {
			set := scattered(b, 2000, n)
			b.ReportAllocs()
			for b.Loop() {
				if _, err := push(context.Background(), len(set), from(set), LateValvePosing, elevenShares); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}
