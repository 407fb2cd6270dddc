package beat

import (
	"math"
	"slices"
)

// Settings of the matching of two channels.
const (
	mostDelay = 0.5 // of the leading channel's interval
	slack     = 0.2 // of a beat: an overlap of less does not count
)

// Match returns the beats of the leading channel with the rejections of the
// other channels carried over, in its own samples and with its own extremes. A
// beat that lead itself uses is rejected where, for any of the others,
//
//   - a rejected beat of that channel overlaps it by more than a fifth of its
//     length, once moved by the delay between the channels (at most half a beat);
//     it takes that beat's reason;
//   - the channel has an unusable sample in it, moved or not: [Gap].
//
// A channel without a pulse has no beats to judge by: only its unusable samples
// count. Channels of different rates panic. lead is not changed.
func Match(lead Pulse, others ...Pulse) []Beat {
	beats := slices.Clone(lead.Beats)
	for _, other := range others {
		if other.Rate != lead.Rate {
			panic("beat: Match: channels of different rates")
		}
		delay := 0
		if d := Delay(lead, other); !math.IsNaN(d) {
			delay = int(math.Round(d * lead.Rate))
		}
		for i, b := range beats {
			if b.Rejected != "" {
				continue
			}
			from, to := b.From+delay, b.To+delay
			if overlapsRun(other.Unusable, min(b.From, from), max(b.To, to)+1) {
				beats[i].Rejected = Gap
				continue
			}
			beats[i].Rejected = overlapping(other.Beats, from, to)
		}
	}
	return beats
}

// overlapping is the reason of the first rejected beat that shares more than
// the slack with from <= i < to.
func overlapping(beats []Beat, from, to int) Reason {
	first, _ := slices.BinarySearchFunc(beats, from, func(b Beat, at int) int { return b.To - at })
	allowed := int(slack * float64(to-from))
	for _, b := range beats[first:] {
		if b.From >= to {
			break
		}
		if b.Rejected != "" && min(to, b.To)-max(from, b.From) > allowed {
			return b.Rejected
		}
	}
	return ""
}

func overlapsRun(runs []Run, from, to int) bool {
	first, _ := slices.BinarySearchFunc(runs, from, func(r Run, at int) int { return r.To - at - 1 })
	return first < len(runs) && runs[first].From < to
}

// Delay is how much later the onsets of other come than those of lead, s: the
// median over the used beats of lead of the distance to the nearest onset of
// other, which lies within half an interval of lead. NaN where either has no
// used beat. It is a start for an estimate, no measurement of a wave's travel:
// it holds the delays of the devices, too.
func Delay(lead, other Pulse) float64 {
	onsets := make([]int, 0, len(other.Beats)+1)
	for _, b := range other.Beats {
		onsets = append(onsets, b.From)
	}
	if n := len(other.Beats); n > 0 {
		onsets = append(onsets, other.Beats[n-1].To)
	}
	var d []float64
	for _, b := range used(lead.Beats) {
		if at, ok := nearest(onsets, b.From); ok && math.Abs(float64(at-b.From)) <= mostDelay*float64(b.Samples()) {
			d = append(d, float64(at-b.From)/lead.Rate)
		}
	}
	return median(d)
}

// nearest of the sorted onsets to a sample; ok is false where there is none.
func nearest(onsets []int, at int) (onset int, ok bool) {
	if len(onsets) == 0 {
		return 0, false
	}
	k, _ := slices.BinarySearch(onsets, at)
	if k == len(onsets) || k > 0 && at-onsets[k-1] < onsets[k]-at {
		k--
	}
	return onsets[k], true
}
