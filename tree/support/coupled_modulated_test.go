package support

import (
	"math"
	"testing"
)

// wave is a modulation of n rows about a mean.
func wave(mean, amplitude, period float64, n int) Modulation {
	m := Modulation{Step: period / float64(n)}
	for i := range n {
		m.Speeds = append(m.Speeds, mean+amplitude*math.Sin(2*math.Pi*float64(i)/float64(n)))
	}
	return m
}

func TestModulationIsLinearBetweenRowsAndRound(t *testing.T) {
	m := Modulation{Speeds: []float64{8, 10, 9}, Step: 0.2}
	for _, c := range []struct{ t, speed float64 }{{0, 8}, {0.1, 9}, {0.2, 10}, {0.3, 9.5}, {0.5, 8.5}, {0.6, 8}, {6.1, 9}} {
		near(t, "speed", m.At(c.t), c.speed, 1e-9)
	}
	near(t, "period", m.Period(), 0.6, 1e-15)
	near(t, "mean", m.Mean(), 9, 1e-15)
	for _, c := range []struct{ t, next float64 }{{0, 0.2}, {0.19, 0.2}, {0.2, 0.4}, {0.61, 0.8}} {
		near(t, "next row", m.next(c.t), c.next, 1e-9)
		if m.next(c.t) <= c.t {
			t.Errorf("the next row after %v is at %v", c.t, m.next(c.t))
		}
	}
}

// A modulation that does not change the speed is none, locked or free.
func TestModulationOfNothing(t *testing.T) {
	k := coupled(t, failingCase(t))
	want := at(t, k, 8.5)
	for _, locked := range []int{0, 1, 3} {
		got, err := k.Modulate(wave(8.5, 0, 0.8*float64(max(1, locked)), 7), locked)
		if err != nil || !got.Settled {
			t.Fatal(locked, err, got)
		}
		near(t, "mean", got.Arterial.Mean, want.Arterial.Mean, 1e-4)
		near(t, "pulse pressure", got.PulsePressure, want.PulsePressure(), 1e-4)
		near(t, "pulse pressure, mean of beats", got.PulsePressureBeatMean, want.PulsePressure(), 1e-4)
		near(t, "pump flow min", got.PumpFlow.Min, want.PumpFlow.Min, 1e-4)
		near(t, "SHE", got.SHE, want.SHE, 0.1)
		near(t, "filling pressure", got.Filling, want.Filling, 1e-4)
	}
}

// Free, a modulation of two beats comes to the state that is found locked, at a
// given filling pressure: on a line it would follow every beat.
func TestFreeModulationComesToTheLockedOne(t *testing.T) {
	c := failingCase(t)
	c.Filling.Slope = 0
	k := coupled(t, c)
	m := wave(9, 1, 1.6, 40)
	locked, err := k.Modulate(m, 2)
	if err != nil || !locked.Settled {
		t.Fatal(err)
	}
	free, err := k.Modulate(m, 0)
	if err != nil || !free.Settled {
		t.Fatal(err)
	}
	near(t, "window", locked.Window, 1.6, 1e-9)
	near(t, "mean", free.Arterial.Mean, locked.Arterial.Mean, 1e-3)
	near(t, "pulse pressure", free.PulsePressure, locked.PulsePressure, 1e-3)
	near(t, "pulse pressure, mean of beats", free.PulsePressureBeatMean, locked.PulsePressureBeatMean, 1e-3)
	if locked.PulsePressure <= locked.PulsePressureBeatMean {
		t.Errorf("pulse pressure %v over the window, %v over its beats", locked.PulsePressure, locked.PulsePressureBeatMean)
	}
	if s := at(t, k, 9); locked.PulsePressure <= s.PulsePressure() {
		t.Errorf("modulated %v, steady %v", locked.PulsePressure, s.PulsePressure())
	}
}

// A modulation that is locked to nothing: its measures are those of a window
// that is long enough, and a file that comes a little short is stretched.
func TestFreeAndStretchedModulation(t *testing.T) {
	k := coupled(t, failingCase(t))
	free, err := k.Modulate(wave(9, 1, 1.13, 20), 0)
	if err != nil || !free.Settled || free.Window < 30*0.8 {
		t.Fatal(err, free)
	}
	stretched, err := k.Modulate(wave(9, 1, 1.598, 40), 2)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "window", stretched.Window, 1.6, 1e-9)
	for _, c := range []struct {
		m      Modulation
		locked int
	}{
		{wave(9, 1, 1.5, 40), 2},
		{wave(9, 1, 1.6, 40), -2},
		{Modulation{}, 1},
		{Modulation{Speeds: []float64{9, 9}}, 1},
		{wave(9, 10, 0.8, 8), 1},
		{Modulation{Speeds: []float64{9, 0}, Step: 0.4}, 1},
	} {
		if _, err := k.Modulate(c.m, c.locked); err == nil {
			t.Errorf("%v, locked %d, passed", c.m, c.locked)
		}
	}
}

// After a modulation the constant speeds are what they were.
func TestModulationLeavesNothingBehind(t *testing.T) {
	k := coupled(t, failingCase(t))
	want := at(t, k, 9)
	if _, err := k.Modulate(wave(9, 1, 1.6, 20), 2); err != nil {
		t.Fatal(err)
	}
	got := at(t, k, 9)
	near(t, "mean", got.Arterial.Mean, want.Arterial.Mean, 1e-6)
	near(t, "swing", got.PumpFlow.Swing(), want.PumpFlow.Swing(), 1e-5)
}
