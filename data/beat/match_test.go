package beat

import (
	"math"
	"testing"

	"afterbeat/data/unit"
)

// laid is a pulse of ten beats of 100 samples at 100 Hz, the first onset at
// start, with the given reasons.
func laid(start int, reasons map[int]Reason, unusable ...Run) Pulse {
	p := Pulse{Found: true, Rate: 100, Unusable: unusable}
	for i := range 10 {
		p.Beats = append(p.Beats, Beat{From: start + 100*i, To: start + 100*(i+1), Interval: 1, Rejected: reasons[i]})
	}
	return p
}

func reasonsOf(beats []Beat) map[int]Reason {
	out := map[int]Reason{}
	for i, b := range beats {
		if b.Rejected != "" {
			out[i] = b.Rejected
		}
	}
	return out
}

func TestMatchCarriesRejections(t *testing.T) {
	for _, c := range []struct {
		name   string
		lead   Pulse
		others []Pulse
		want   map[int]Reason
	}{
		{"alone", laid(50, map[int]Reason{2: Shape}), nil, map[int]Reason{2: Shape}},
		{"same clock", laid(50, nil), []Pulse{laid(50, map[int]Reason{3: Early})}, map[int]Reason{3: Early}},
		{"later by 0.3 s", laid(50, nil), []Pulse{laid(80, map[int]Reason{3: Early})}, map[int]Reason{3: Early}},
		{"earlier by 0.4 s", laid(50, nil), []Pulse{laid(10, map[int]Reason{3: Early})}, map[int]Reason{3: Early}},
		{"own reason first", laid(50, map[int]Reason{3: Shape}), []Pulse{laid(50, map[int]Reason{3: Early})}, map[int]Reason{3: Shape}},
		{"two others", laid(50, nil), []Pulse{laid(60, map[int]Reason{1: Level}), laid(50, map[int]Reason{8: Gap})}, map[int]Reason{1: Level, 8: Gap}},
		// The other's missing sample at 215 lies in the lead's beat 1 (150 .. 250)
		// and, moved by 0.3 s, in what belongs to it (180 .. 280).
		{"missing sample", laid(50, nil), []Pulse{laid(80, nil, Run{215, 216})}, map[int]Reason{1: Gap}},
		{"no pulse but a hole", laid(50, nil), []Pulse{{Rate: 100, Unusable: []Run{{355, 360}}}}, map[int]Reason{3: Gap}},
	} {
		got := reasonsOf(Match(c.lead, c.others...))
		if len(got) != len(c.want) {
			t.Errorf("%s: %v, want %v", c.name, got, c.want)
		}
		for i, r := range c.want {
			if got[i] != r {
				t.Errorf("%s: beat %d %q, want %q", c.name, i, got[i], r)
			}
		}
	}
	lead := laid(50, nil)
	Match(lead, laid(50, map[int]Reason{3: Early}))
	if lead.Rejected() > 0 {
		t.Error("the leading pulse was changed")
	}
}

// A beat of the other that stretches over two of the lead takes both with it.
func TestMatchLongBeat(t *testing.T) {
	other := laid(50, nil)
	other.Beats = append(append([]Beat{}, other.Beats[:4]...), other.Beats[5:]...)
	other.Beats[3].To, other.Beats[3].Rejected = other.Beats[4].From, TooLong
	if got := reasonsOf(Match(laid(50, nil), other)); len(got) != 2 || got[3] != TooLong || got[4] != TooLong {
		t.Errorf("%v, want beats 3 and 4 too long", got)
	}
}

func TestDelay(t *testing.T) {
	for _, d := range []int{0, 7, 30, 49, -12, -45} {
		if got, want := Delay(laid(60, nil), laid(60+d, nil)), float64(d)/100; math.Abs(got-want) > 1e-12 {
			t.Errorf("delay %g s, want %g", got, want)
		}
	}
	if d := Delay(laid(60, nil), Pulse{Rate: 100}); !math.IsNaN(d) {
		t.Errorf("delay to a channel without beats: %g", d)
	}
}

// The same pulse twice, the second later by 60 ms: the onsets tell.
func TestDelayOfInventedPulses(t *testing.T) {
	v := invented{rate: 500, seconds: 60, heartRate: 75, scatter: 0.05, amplitude: 40, noise: 1}
	x, _ := v.make(1)
	later := append(append([]float64{}, x[:30]...), x[:len(x)-30]...)
	got := Delay(Find(x, v.rate, unit.Pressure), Find(later, v.rate, unit.Pressure))
	if math.Abs(got-0.060) > 0.002 {
		t.Errorf("delay %.4f s, want 0.060", got)
	}
}

// Real channels with artefacts: a beat that is used after matching holds no
// unusable sample of either.
func TestMatchOfExcerpt(t *testing.T) {
	r := read(t, "testdata/tcd_6s.csv")
	pressure, velocity := r.channel(t, "abp_mmHg"), r.channel(t, "mcav_cm_s")
	for i := 2000; i < 2300; i++ {
		pressure[i] = math.NaN()
	}
	lead, other := Find(velocity, r.grid.Rate, unit.Velocity), Find(pressure, r.grid.Rate, unit.Pressure)
	beats := Match(lead, other)
	// The recording's own pages say that pressure is later by about 55 ms.
	if d := Delay(lead, other); d < 0.03 || d > 0.08 {
		t.Errorf("delay %.3f s", d)
	}
	good := used(beats)
	if len(good) < 6 || len(good) >= lead.Used() {
		t.Errorf("%d beats used, %d before", len(good), lead.Used())
	}
	for _, b := range good {
		if b.From < 2300 && b.To > 2000 {
			t.Errorf("beat %d .. %d is used over the hole", b.From, b.To)
		}
	}
}
