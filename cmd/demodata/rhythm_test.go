package main

import (
	"testing"

	"afterbeat/data/demo"
)

func TestRhythmHasOnePrematureBeat(t *testing.T) {
	p := demo.Truth()
	all := beats(p)[runIn:]
	if len(all) != p.Beats+1 {
		t.Fatalf("%d onsets, want %d beats and the onset that ends them", len(all), p.Beats)
	}
	interval := func(k int) float64 { return all[k+1].onset - all[k].onset }
	for k := range p.Beats {
		switch k {
		case p.Ectopic - 1:
			if interval(k) > 0.7*p.Period {
				t.Errorf("the premature beat comes after %.3f s", interval(k))
			}
		case p.Ectopic:
			near(t, "the two intervals around a compensated premature beat", interval(k-1)+interval(k), 2*p.Period, 1e-12)
			if all[k].volume > 0.5*p.StrokeVolume {
				t.Errorf("the premature beat ejects %.1f mL", all[k].volume)
			}
		case p.Ectopic + 1:
			if all[k].volume < 1.2*p.StrokeVolume {
				t.Errorf("the beat after the pause ejects %.1f mL", all[k].volume)
			}
		default:
			near(t, "interval", interval(k), p.Period, breathPeriod*p.Period)
			near(t, "stroke volume", all[k].volume, p.StrokeVolume, breathVolume*p.StrokeVolume)
		}
	}
}

// One stroke begins where the one before has ended.
func TestStrokesDoNotOverlap(t *testing.T) {
	all := strokes(beats(demo.Truth()))
	for i := 1; i < len(all); i++ {
		if s := all[i-1]; s.volume != 0 && s.from+s.duration > all[i].from+1e-12 {
			t.Errorf("stroke %d ends at %v, the next begins at %v", i-1, s.from+s.duration, all[i].from)
		}
		if all[i].from <= all[i-1].from {
			t.Errorf("stroke %d begins at %v, the one before at %v", i, all[i].from, all[i-1].from)
		}
	}
}
