package data

import "slices"

// shortestHole is the shortest step, in s, that can be a hole: a straight line
// over 20 ms loses nothing of a pulse (its content lies below 25 Hz, common
// practice).
const shortestHole = 0.02

// pace is how the times of a recording go on where nothing is missing.
type pace struct {
	row  float64 // the time of one row, s
	hole float64 // a step longer than this is a hole, s
	// coarse tells that the clock ticks more slowly than rows come: at least
	// three rows share two stamps on average.
	coarse bool
}

// paceOf finds the pace from windows of up to 32 different stamps, of which it
// takes medians: of the time a row takes, and of the longest step. A step is a
// hole if it is longer than 20 ms, than five rows take, and than 1.75 times
// that longest step. So stamps of whole seconds that many rows share, or rows
// that arrive in packets, are no holes; a missing packet or second is one.
func paceOf(time []float64) pace {
	stamps := 0
	eachRun(time, func(int, int) { stamps++ })
	if stamps < 2 {
		return pace{}
	}
	window := min(max((stamps-1)/8, 1), 32)
	var rows, longest []float64
	first, steps, most := 0, 0, 0.0
	eachRun(time, func(i, j int) {
		if j == len(time) {
			return
		}
		steps++
		if most = max(most, time[j]-time[i]); steps == window {
			rows = append(rows, (time[j]-time[first])/float64(j-first))
			longest = append(longest, most)
			first, steps, most = j, 0, 0
		}
	})
	p := pace{row: median(rows), coarse: 2*len(time) >= 3*stamps}
	p.hole = max(shortestHole, 5*p.row, 1.75*median(longest))
	return p
}

// eachRun calls f for every run of rows i..j-1 that share a time.
func eachRun(time []float64, f func(i, j int)) {
	for i := 0; i < len(time); {
		j := i + 1
		for j < len(time) && time[j] == time[i] {
			j++
		}
		f(i, j)
		i = j
	}
}

// median returns the upper median of x, which it reorders.
func median(x []float64) float64 {
	slices.Sort(x)
	return x[len(x)/2]
}
