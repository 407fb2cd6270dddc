package study

import (
	"math"

	"afterbeat/data/beat"
	"afterbeat/fitting"
)

// stretches are the runs of successive used beats, each with the sample at which
// its last beat ends. The flow is read where the pressure, late by delay samples,
// has it: delay samples earlier, linearly between samples.
func stretches(used []beat.Beat, pressure, flow []float64, delay float64) []fitting.Run {
	var out []fitting.Run
	for i := 0; i < len(used); {
		from := used[i].From
		onsets := []int{0}
		for ; i < len(used) && used[i].From == from+onsets[len(onsets)-1]; i++ {
			onsets = append(onsets, used[i].To-from)
		}
		last := from + onsets[len(onsets)-1]
		one := fitting.Run{Pressure: pressure[from : last+1], Onsets: onsets, Flow: make([]float64, last+1-from)}
		for j := range one.Flow {
			one.Flow[j] = readAt(flow, float64(from+j)-delay)
		}
		out = append(out, one)
	}
	return out
}

// readAt is a value between samples; at lies within them.
func readAt(values []float64, at float64) float64 {
	whole := math.Floor(at)
	j := int(whole)
	if part := at - whole; part > 0 {
		return (1-part)*values[j] + part*values[j+1]
	}
	return values[j]
}
