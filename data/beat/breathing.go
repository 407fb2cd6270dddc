package beat

import "math"

// Breathing is the swing of the pulse with the breath.
type Breathing struct {
	// Period of the breath, s; NaN where none was found.
	Period float64
	// Variation is the pulse-pressure variation: largest less smallest amplitude
	// over a breath, over their mean (Michard et al. 2000, Am J Respir Crit Care
	// Med 162:134, from memory), taken from the sine that fits the amplitudes of
	// the used beats, since noise would lift a difference of extremes. A fraction.
	Variation float64
}

// Settings of the search for a breath (assumptions).
const (
	slowestBreath = 0.1  // Hz, 6 a minute
	fastestBreath = 0.5  // Hz, 30 a minute
	breathShare   = 0.3  // of the variance of the amplitudes or of the minima
	breathBeats   = 12   // used ones, at least
	breathWindow  = 60.0 // s
	beatsABreath  = 2.2  // fewer do not resolve it
)

// breathing measures the breath from the amplitudes of the used beats, and where
// they do not show it, from their minima.
func (p *Pulse) breathing() Breathing {
	none := Breathing{math.NaN(), math.NaN()}
	good := used(p.Beats)
	if len(good) < breathBeats {
		return none
	}
	middle := float64(good[len(good)/2].From)
	var t, amplitudes, minima []float64
	for _, b := range good {
		if math.Abs(float64(b.From)-middle) <= breathWindow/2*p.Rate {
			t = append(t, float64(b.From)/p.Rate)
			amplitudes = append(amplitudes, b.Amplitude())
			minima = append(minima, b.Min)
		}
	}
	if len(t) < breathBeats {
		return none
	}
	mean, _ := meanSD(amplitudes)
	high := min(fastestBreath, 1/(beatsABreath*p.Period))
	x := straightened(amplitudes)
	l := strongest(t, x, slowestBreath, high)
	if !(l.share >= breathShare) {
		l = strongest(t, straightened(minima), slowestBreath, high)
	}
	if !(l.share >= breathShare) || l.frequency*(t[len(t)-1]-t[0]) < 2 {
		return none
	}
	return Breathing{Period: 1 / l.frequency, Variation: 2 * sineAt(t, x, l.frequency).amplitude / mean}
}
