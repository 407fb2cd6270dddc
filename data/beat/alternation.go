package beat

import (
	"math"
	"slices"
)

// Settings of the search for two kinds of beat in turns (assumptions).
const (
	leastAlternation = 0.05 // of the amplitude
	alternationT     = 4.0  // standard errors
	alternatingBeats = 12
	secondFall       = 0.4  // of the pulse, that lies before a second pulse within the beat
	secondRise       = 0.2  // of the pulse, of the second one
	longForTwo       = 0.85 // s
)

// alternation is by how much the amplitudes of every other beat differ from those
// of the rest, as a part of their mean (pulsus alternans); 0 where the difference
// is under leastAlternation or four standard errors. Only runs of used beats count.
func (p *Pulse) alternation() float64 {
	var steps []float64 // a beat less the mean of its neighbours, sign in turns
	sum, n := 0.0, 0
	for i := 1; i+1 < len(p.Beats); i++ {
		a, b, c := p.Beats[i-1], p.Beats[i], p.Beats[i+1]
		if a.Rejected != "" || b.Rejected != "" || c.Rejected != "" {
			continue
		}
		sign := float64(1 - 2*(i%2))
		steps = append(steps, sign*(b.Amplitude()-(a.Amplitude()+c.Amplitude())/2))
		sum += b.Amplitude()
		n++
	}
	if n < alternatingBeats {
		return 0
	}
	mean, sd := meanSD(steps)
	part := math.Abs(mean) / (sum / float64(n))
	if part < leastAlternation || math.Abs(mean) < alternationT*sd/math.Sqrt(float64(n)/3) { // neighbours share beats
		return 0
	}
	return part
}

// twoPulses is the size of a second pulse within the median beat, as a part of
// the first: the rise after a fall of secondFall from the peak. 0 where there is
// none of secondRise, and in beats too short for two.
func (p *Pulse) twoPulses(values []float64) float64 {
	if p.Period < longForTwo {
		return 0
	}
	var shapes [][]float64
	for _, b := range used(p.Beats) {
		shapes = append(shapes, shape(values, b))
		if len(shapes) == shapeBlock {
			break
		}
	}
	if len(shapes) == 0 {
		return 0
	}
	x := smooth(medianShape(shapes), 3)
	peak := 0
	for i, v := range x[:len(x)*2/3] {
		if v > x[peak] {
			peak = i
		}
	}
	high, low := x[peak], slices.Min(x)
	least, rise := high, 0.0
	for _, v := range x[peak:] {
		least = min(least, v)
		if high-least >= secondFall*(high-low) {
			rise = max(rise, v-least)
		}
	}
	if part := rise / (high - low); part >= secondRise {
		return part
	}
	return 0
}
