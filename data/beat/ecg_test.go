package beat

import (
	"math"
	"os"
	"path/filepath"
	"testing"

	"afterbeat/data/unit"
)

// Onsets of a pressure against the R peaks of the ECG beside it: each R peak has
// an onset within 0.12 s of the usual delay, and each onset an R peak.
// Sensitivity and positive predictive value are taken before rejection.
func TestOnsetsAgainstECG(t *testing.T) {
	for _, path := range []string{"testdata/icu_low_30s.csv", filepath.Join(referenceData, "icu_art_ecg_125hz_600s.csv")} {
		t.Run(filepath.Base(path), func(t *testing.T) {
			if _, err := os.Stat(path); err != nil {
				t.Skip("the full reference recordings are not beside this clone")
			}
			r := read(t, path)
			rPeaks := findRPeaks(r.channel(t, "ecg_mcl1_mV"), r.grid.Rate)
			onsets := onsetsOf(Find(r.channel(t, "abp_mmHg"), r.grid.Rate, unit.Pressure))
			delays := delaysAfter(rPeaks, onsets, r.grid.Rate)
			delay := median(delays)
			within := func(d float64) bool { return math.Abs(d-delay) <= 0.12 }
			seen := count(delays, within)
			before := delaysBefore(rPeaks, onsets, r.grid.Rate)
			sensitivity := float64(seen) / float64(len(delays))
			predictive := float64(count(before, within)) / float64(len(before))
			t.Logf("%d R peaks, %d onsets, delay %.3f s, sensitivity %.4f, positive predictive value %.4f",
				len(rPeaks), len(onsets), delay, sensitivity, predictive)
			if len(rPeaks) < 50 || sensitivity < 0.99 || predictive < 0.99 {
				t.Error("want both at least 0.99, over 50 beats or more")
			}
		})
	}
}

// findRPeaks is a plain detector for a clean lead: the largest samples of the
// squared first difference over 0.1 s, above 0.3 of the median of their maxima
// in blocks of 2 s, at least 0.25 s apart.
func findRPeaks(ecg []float64, rate float64) []int {
	d := make([]float64, len(ecg))
	for i := 1; i < len(ecg); i++ {
		d[i] = (ecg[i] - ecg[i-1]) * (ecg[i] - ecg[i-1])
	}
	energy := smooth(d, samplesIn(0.1, rate))
	reference := references(energy, samplesIn(2, rate))
	var out []int
	for _, p := range highest(energy, func(int) int { return samplesIn(0.25, rate) }) {
		if energy[p] > 0.3*reference[p] {
			out = append(out, p)
		}
	}
	return out
}

// delaysAfter is, for each R peak well within the trace, the time to the first
// onset after it, s.
func delaysAfter(rPeaks, onsets []int, rate float64) []float64 {
	var out []float64
	last := onsets[len(onsets)-1]
	for _, r := range rPeaks {
		if float64(last-r) < rate {
			break
		}
		d := math.Inf(1)
		for _, o := range onsets {
			if o > r {
				d = float64(o-r) / rate
				break
			}
		}
		if r > onsets[0] {
			out = append(out, d)
		}
	}
	return out
}

// delaysBefore is, for each onset after the first R peak, the time since the
// last R peak before it, s.
func delaysBefore(rPeaks, onsets []int, rate float64) []float64 {
	var out []float64
	for _, o := range onsets {
		if o <= rPeaks[0] {
			continue
		}
		var d float64
		for _, r := range rPeaks {
			if r >= o {
				break
			}
			d = float64(o-r) / rate
		}
		out = append(out, d)
	}
	return out
}

func count(x []float64, ok func(float64) bool) int {
	n := 0
	for _, v := range x {
		if ok(v) {
			n++
		}
	}
	return n
}

// onsetsOf lists every onset of a pulse.
func onsetsOf(p Pulse) []int {
	var out []int
	for _, b := range p.Beats {
		out = append(out, b.From)
	}
	if n := len(p.Beats); n > 0 {
		out = append(out, p.Beats[n-1].To)
	}
	return out
}
