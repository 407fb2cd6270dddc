package beat

import (
	"math"

	"afterbeat/data/unit"
)

// Pulse is what [Find] found in one channel.
type Pulse struct {
	Found    bool
	Reason   string // why no pulse was found; empty otherwise
	Criteria Criteria
	Quantity unit.Quantity
	Rate     float64 // Hz
	Beats    []Beat  // in order of time, each beginning where the one before ended
	Unusable []Run   // the stretches without a usable sample
	// Period is the median interval of the used beats, s; NaN without any. By the
	// criteria of Support it is the median of the mean intervals of up to eight
	// used beats in a row, since noise moves each onset.
	Period float64
	// PeriodCV is the standard deviation of the intervals of the used beats
	// over their mean; NaN with fewer than two.
	PeriodCV float64
	// Systolic and Diastolic are the medians over the used beats of the beat's
	// largest and smallest sample; Mean is the time average over the used
	// beats. In the unit of the channel; NaN without a used beat.
	Systolic, Diastolic, Mean float64
	// Amplitude is that of the average beat, which noise does not lift, and Noise
	// the standard deviation of single beats about it, both in the unit of the
	// channel; NaN with fewer than two used beats.
	Amplitude, Noise float64
	// Rhythms has one entry where a pulse was found, and a second one where a
	// strictly periodic wave runs beside it. The pulse of the first is then that
	// of the trace freed of the wave.
	Rhythms   []Rhythm
	Breathing Breathing
	// Alternation is by how much every other beat is larger (pulsus alternans), a
	// part of the amplitude; SecondPulse the size of a second pulse within the
	// beat, a part of the first, as a lasting bigeminy makes. 0 where there is none.
	Alternation, SecondPulse float64
	// Overlap says why a wave beside the heart's cannot be told from it; empty
	// where there is none.
	Overlap string
}

// Rhythm is one periodic component.
type Rhythm struct {
	Frequency float64 // Hz
	// PulseAmplitude is the median over the used beats of max - min, in the unit of
	// the channel; by the criteria of Support it is that of the average beat.
	PulseAmplitude float64
}

// Run is a stretch of samples, From <= i < To.
type Run struct{ From, To int }

// HeartRate is 60/Period, in 1/min; NaN without a used beat.
func (p Pulse) HeartRate() float64 { return 60 / p.Period }

// PulseToNoise is Amplitude over Noise; NaN with fewer than two used beats.
func (p Pulse) PulseToNoise() float64 { return p.Amplitude / p.Noise }

// takeSecond adds a second rhythm, where there is one.
func (p *Pulse) takeSecond(values []float64) {
	wave, cleaned, overlap := p.second(values)
	p.Overlap = overlap
	if cleaned == nil {
		return
	}
	heart := *p
	for range 2 { // onsets lie better without the wave, and so does the wave
		alone := find(p.Criteria, cleaned, p.Rate, p.Quantity)
		if alone.Used() <= p.Used()/2 {
			break
		}
		again, freed, _ := alone.separate(values, wave.Frequency)
		if freed == nil {
			break
		}
		heart, wave, cleaned = alone, again, freed
	}
	amplitude, _ := pulseAndNoise(heart.Beats, cleaned)
	p.Rhythms[0] = Rhythm{Frequency: 1 / heart.Period, PulseAmplitude: amplitude}
	p.Rhythms = append(p.Rhythms, wave)
}

// BeatsNeeded is how many beats bring the standard error of the mean amplitude
// to 2 %, by the scatter of the used beats: (CV/0.02)², rounded up; 0 with fewer
// than two used beats.
func (p Pulse) BeatsNeeded() int {
	cv := variation(each(used(p.Beats), Beat.Amplitude))
	if !(cv > 0) {
		return 0
	}
	return int(math.Ceil(cv * cv / (0.02 * 0.02)))
}

// none is p without a pulse, and why.
func (p Pulse) none(reason string) Pulse {
	p.Found, p.Reason, p.Beats = false, reason, nil
	return p
}

// Used counts the beats that can be used.
func (p Pulse) Used() int { return len(used(p.Beats)) }

// Rejected counts the beats that cannot.
func (p Pulse) Rejected() int { return len(p.Beats) - p.Used() }

// used returns the beats that can be used.
func used(beats []Beat) []Beat {
	var out []Beat
	for _, b := range beats {
		if b.Rejected == "" {
			out = append(out, b)
		}
	}
	return out
}

// summarise fills in what follows from the beats.
func (p *Pulse) summarise() {
	good := used(p.Beats)
	intervals := each(good, func(b Beat) float64 { return b.Interval })
	p.Period = median(intervals)
	if p.Criteria == Support {
		p.Period = periodOfRuns(p.Beats)
	}
	p.PeriodCV = variation(intervals)
	p.Systolic = median(each(good, func(b Beat) float64 { return b.Max }))
	p.Diastolic = median(each(good, func(b Beat) float64 { return b.Min }))
	p.Mean = timeAverage(good)
	if len(good) > 0 {
		amplitude := median(each(good, Beat.Amplitude))
		if p.Criteria == Support && p.Amplitude > 0 {
			amplitude = p.Amplitude
		}
		p.Rhythms = []Rhythm{{Frequency: 1 / p.Period, PulseAmplitude: amplitude}}
	}
}

// mostInARow is how many used beats in a row share an interval.
const mostInARow = 8

// periodOfRuns is the median over all stretches of up to mostInARow used beats
// in a row of their mean interval; stretches of fewer than half the most there
// are do not count.
func periodOfRuns(beats []Beat) float64 {
	longest, run := 0, 0
	for _, b := range beats {
		if run++; b.Rejected != "" {
			run = 0
		}
		longest = max(longest, run)
	}
	n := min(mostInARow, max(1, longest/2))
	var means []float64
	sum := 0.0
	run = 0
	for i, b := range beats {
		if b.Rejected != "" {
			run, sum = 0, 0
			continue
		}
		sum += b.Interval
		if run++; run > n {
			sum -= beats[i-n].Interval
		}
		if run >= n {
			means = append(means, sum/float64(n))
		}
	}
	return median(means)
}

// timeAverage weighs the mean of each beat by its length.
func timeAverage(beats []Beat) float64 {
	sum, samples := 0.0, 0
	for _, b := range beats {
		sum += b.Mean * float64(b.Samples())
		samples += b.Samples()
	}
	return sum / float64(samples)
}

// each applies f to every beat.
func each(beats []Beat, f func(Beat) float64) []float64 {
	out := make([]float64, len(beats))
	for i, b := range beats {
		out[i] = f(b)
	}
	return out
}

// variation is the coefficient of variation, SD/mean with n-1 in the SD.
func variation(x []float64) float64 {
	if len(x) < 2 {
		return math.NaN()
	}
	mean, sd := meanSD(x)
	return sd / mean
}
