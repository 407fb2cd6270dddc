package tree

import "strconv"

// chain is a tree of count segments, one after the other, with a terminal at
// its end. All values are invented.
func chain(count int) []Segment {
	segments := make([]Segment, count)
	for i := range segments {
		segments[i] = Segment{ID: strconv.Itoa(i), Length: 2, Radius: 0.3, WaveSpeed: 600}
		if i > 0 {
			segments[i].Parent = strconv.Itoa(i - 1)
		}
	}
	segments[count-1].Terminal = &Terminal{R1: 1, R2: 10, C: 0.02}
	return segments
}
