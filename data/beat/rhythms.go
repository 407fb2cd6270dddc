package beat

import (
	"fmt"
	"math"
	"slices"
)

// Settings of the search for a second rhythm (assumptions, tried on recordings
// that have none).
const (
	rhythmRate     = 25.0 // Hz, at which it is searched
	rhythmWindow   = 60.0 // s, the longest stretch searched and fitted at a time
	lowestRhythm   = 0.4  // Hz; slower waves are taken for breathing
	highestRhythm  = 3.0  // Hz
	leastCycles    = 8
	leastShare     = 0.5  // of the variance beside the beats, in either half
	leastSwing     = 0.08 // of the pulse
	sideband       = 0.35 // of the wave: its mirror about the heart rate is so strong in a modulated pulse
	besideHarmonic = 0.06 // of the heart rate: too near to one of its harmonics
	mostHarmonics  = 4
	backfits       = 5
	templatePhases = 48
)

// stretch is the samples of the used beats in a window, on a coarse clock.
type stretch struct {
	t, x  []float64
	phase []float64 // within the beat, 0 to 1
}

// stretchOf takes the used beats from one time to another, s.
func (p *Pulse) stretchOf(values []float64, from, to float64) stretch {
	step := max(1, int(p.Rate/rhythmRate))
	var s stretch
	for _, b := range used(p.Beats) {
		if float64(b.From) < from*p.Rate || float64(b.To) > to*p.Rate {
			continue
		}
		for i := b.From; i+step <= b.To; i += step {
			sum := 0.0
			for _, v := range values[i : i+step] {
				sum += v
			}
			at := float64(i) + float64(step-1)/2
			s.t = append(s.t, at/p.Rate)
			s.x = append(s.x, sum/float64(step))
			s.phase = append(s.phase, (at-float64(b.From))/float64(b.Samples()))
		}
	}
	return s
}

// beats is the average beat of x at every sample, by phase.
func (s stretch) beats(x []float64) []float64 {
	var sums, counts [templatePhases]float64
	for i, v := range x {
		k := min(templatePhases-1, int(s.phase[i]*templatePhases))
		sums[k] += v
		counts[k]++
	}
	mean := make([]float64, 0, templatePhases)
	places := make([]float64, 0, templatePhases)
	for k := range sums {
		if counts[k] > 0 {
			mean = append(mean, sums[k]/counts[k])
			places = append(places, (float64(k)+0.5)/templatePhases)
		}
	}
	out := make([]float64, len(x))
	for i, u := range s.phase {
		k, _ := slices.BinarySearch(places, u)
		k = max(1, min(k, len(places)-1))
		out[i] = mean[k-1] + (u-places[k-1])/(places[k]-places[k-1])*(mean[k]-mean[k-1])
	}
	return out
}

func minus(a, b []float64) []float64 {
	out := make([]float64, len(a))
	for i := range a {
		out[i] = a[i] - b[i]
	}
	return out
}

// second looks for a strictly periodic wave beside the beats, as a pump that
// changes its speed in a cycle makes. It returns the wave as a rhythm, and the
// values freed of it. A wave at a multiple or a simple part of the heart rate
// cannot be told from the heart's own: overlap then says so.
func (p *Pulse) second(values []float64) (found Rhythm, cleaned []float64, overlap string) {
	length := float64(len(values)) / p.Rate
	from := max(0, (length-rhythmWindow)/2)
	s := p.stretchOf(values, from, from+rhythmWindow)
	if len(s.t) < templatePhases {
		return found, nil, ""
	}
	own := 1 / p.Period
	rest := levelled(minus(s.x, s.beats(s.x)))
	l := strongest(s.t, rest, lowestRhythm, highestRhythm)
	if !(l.frequency*(s.t[len(s.t)-1]-s.t[0]) >= leastCycles) || 2*l.amplitude < leastSwing*p.Amplitude || !s.steady(rest, l) {
		return found, nil, ""
	}
	for _, part := range []float64{1.0 / 3, 0.5, 2.0 / 3, 1, 1.5, 2, 3} {
		if math.Abs(l.frequency/own-part) < besideHarmonic*max(part, 0.5) {
			return found, nil, fmt.Sprintf("a steady wave of %.2g at %.3g Hz, %.2g times the heart rate, cannot be told from the heart's own pulse", 2*l.amplitude, l.frequency, part)
		}
	}
	if mirror := sineAt(s.t, rest, math.Abs(2*own-l.frequency)); mirror.amplitude > sideband*l.amplitude {
		return found, nil, ""
	}
	return p.separate(values, l.frequency)
}

// steady tells whether a wave has the same amplitude and phase in both halves.
func (s stretch) steady(rest []float64, l line) bool {
	half := len(rest) / 2
	a, b := sineAt(s.t[:half], rest[:half], l.frequency), sineAt(s.t[half:], rest[half:], l.frequency)
	return min(a.share, b.share) >= leastShare && min(a.amplitude, b.amplitude) >= 0.7*max(a.amplitude, b.amplitude)
}

// separate fits, window by window, the average beat and the wave in turns, each
// to what the other leaves (backfitting), and takes the wave off.
func (p *Pulse) separate(values []float64, frequency float64) (Rhythm, []float64, string) {
	cleaned := slices.Clone(values)
	own := 1 / p.Period
	var harmonics []int
	for h := 1; h <= mostHarmonics && float64(h)*frequency < rhythmRate/3; h++ {
		if ratio := float64(h) * frequency / own; h == 1 || math.Abs(ratio-math.Round(ratio)) > besideHarmonic {
			harmonics = append(harmonics, h)
		}
	}
	length := float64(len(values)) / p.Rate
	windows := max(1, math.Round(length/rhythmWindow))
	var swings, frequencies []float64
	for k := range int(windows) {
		from, to := float64(k)*length/windows, float64(k+1)*length/windows
		w, ok := p.stretchOf(values, from, to).backfit(frequency, harmonics)
		if !ok {
			continue
		}
		swings, frequencies = append(swings, w.swing()), append(frequencies, w.frequency)
		for i := int(from * p.Rate); i < min(len(values), int(to*p.Rate)); i++ {
			cleaned[i] -= w.at(float64(i) / p.Rate)
		}
	}
	if len(swings) == 0 {
		return Rhythm{}, nil, ""
	}
	return Rhythm{Frequency: median(frequencies), PulseAmplitude: median(swings)}, cleaned, ""
}

func (s stretch) backfit(frequency float64, harmonics []int) (w sines, ok bool) {
	if len(s.t) < templatePhases {
		return w, false
	}
	span := s.t[len(s.t)-1] - s.t[0]
	of := make([]float64, len(s.t))
	for range backfits {
		rest := levelled(minus(s.x, s.beats(minus(s.x, of))))
		frequency = strongest(s.t, rest, frequency-0.3/span, frequency+0.3/span).frequency
		if w, ok = comb(s.t, rest, frequency, harmonics); !ok {
			return w, false
		}
		for i, at := range s.t {
			of[i] = w.at(at)
		}
	}
	return w, true
}
