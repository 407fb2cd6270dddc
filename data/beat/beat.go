package beat

import "math"

// Beat is one beat, the samples From <= i < To from its onset to the next.
type Beat struct {
	From, To int
	// Interval is the time from foot to foot, s, which lie between samples.
	Interval       float64
	Max, Min, Mean float64 // over the usable samples, unit of the channel
	Rejected       Reason  // empty where the beat is used
}

// Samples is the length of the beat.
func (b Beat) Samples() int { return b.To - b.From }

// Amplitude is max - min.
func (b Beat) Amplitude() float64 { return b.Max - b.Min }

// Reason says why a beat is not used.
type Reason string

// The reasons. Running medians are over the 15 beats around the beat, or the
// beats there are.
const (
	// Gap: it holds an unusable sample.
	Gap Reason = "gap"
	// Early: its onset came too early, as that of a premature contraction does.
	// "Too early" is under 80 % of the running median interval (the 20 % rule
	// of heart rate variability; Malik et al. 1989, Eur Heart J 10:1060, from
	// memory); where intervals scatter anyway, 3 of their robust standard
	// deviations below it, but always under 50 %.
	Early Reason = "early"
	// AfterEarly: the beat after an early one, which ejects more than others.
	AfterEarly Reason = "after an early beat"
	// AfterPause: the beat after one that was too long. It starts from a lower
	// level and ejects more; an early contraction that ejected nothing does this.
	AfterPause Reason = "after a pause"
	// TooShort: it was cut short by an early beat.
	TooShort Reason = "too short"
	// TooLong: it lasted over 140 % of the running median interval (or 3 robust
	// standard deviations more, but at most 200 %): a dropped pulse, a pause, or
	// an onset that was missed. The 140 % are an assumption.
	TooLong Reason = "too long"
	// Amplitude: max - min differs from the running median by a factor of more
	// than 1.3, or 1 + 4 robust standard deviations of the amplitudes around
	// over their median, but at most 2 (an assumption; strong breathing moves
	// the amplitude by a quarter).
	Amplitude Reason = "amplitude"
	// Level: the minimum is off its running median by more than the running
	// median of the amplitude, and by more than 5 robust standard deviations.
	// It stands for the limits on beat-to-beat steps of Sun, Reisner and Mark
	// 2006 (20 mmHg, from memory).
	Level Reason = "level"
	// Shape: it correlates with the median beat by less than 0.9 (an
	// assumption), and its correlation stands out from those of other beats.
	Shape Reason = "shape"
	// ByHand: a person left it out.
	ByHand Reason = "by hand"
)

// Reasons lists every reason, in the order of tables.
func Reasons() []Reason {
	return []Reason{Gap, Early, AfterEarly, AfterPause, TooShort, TooLong, Amplitude, Level, Shape, ByHand}
}

// measure takes the extremes and the mean of the samples of each beat.
func measure(values []float64, onsets []float64, rate float64) []Beat {
	var beats []Beat
	for i := 1; i < len(onsets); i++ {
		b := measured(values, sample(onsets[i-1]), sample(onsets[i]))
		b.Interval = (onsets[i] - onsets[i-1]) / rate
		beats = append(beats, b)
	}
	return beats
}

// measured is the beat from one onset to the next, NaN where it has no usable
// sample.
func measured(values []float64, from, to int) Beat {
	b := Beat{From: from, To: to, Max: math.Inf(-1), Min: math.Inf(1)}
	sum, n := 0.0, 0
	for _, v := range values[from:to] {
		if !finite(v) {
			b.Rejected = Gap
			continue
		}
		b.Max, b.Min = max(b.Max, v), min(b.Min, v)
		sum += v
		n++
	}
	if n == 0 {
		b.Max, b.Min = math.NaN(), math.NaN()
	}
	b.Mean = sum / float64(n)
	return b
}

func finite(v float64) bool { return !math.IsNaN(v) && !math.IsInf(v, 0) }
