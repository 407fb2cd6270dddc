package study

import (
	"context"
	"fmt"
	"math"
	"slices"

	"afterbeat/data"
	"afterbeat/data/beat"
	"afterbeat/data/doppler"
	"afterbeat/data/unit"
	"afterbeat/fitting"
)

// Beats is the recording cut into beats, and the average beat.
type Beats struct {
	Intake Intake
	// Pulses has one entry a channel of the recording; the zero Pulse, with a
	// Reason, for channels that are no pressure, flow or velocity.
	Pulses []beat.Pulse
	// Lead is the channel whose onsets cut the beats; -1 where no chosen
	// channel has a pulse.
	Lead int
	// Beats are those of the leading channel, with the reasons for rejection
	// of both chosen channels.
	Beats    []beat.Beat
	Ensemble beat.Ensemble
	// Pressure and Flow are the average beats; Flow has no samples without a
	// flow, Pressure none without a pressure.
	Pressure, Flow beat.Average
	FlowInfo       FlowInfo
	Delay          Delay
	// Runs are the samples of the used beats, as the fit to the whole span takes
	// them; empty without a pressure and a flow, and where one beat is all there is.
	Runs     []fitting.Run
	Reason   string // why there is no average beat; empty where there is one
	Warnings []data.Warning
}

// FlowInfo says where the flow of the average beat comes from.
type FlowInfo struct {
	Channel          int // index of the flow or velocity channel; -1 where there is none
	PerArea          bool
	Site             data.Site
	Error            float64             // relative 95 % half-width of its systematic error
	Conversion       *doppler.Conversion // of a velocity with a diameter; else nil
	ConversionErrors doppler.Errors
}

// FindBeats finds the pulse of every channel, and cuts the chosen ones into
// beats by the onsets of the leading one: the pressure, or else the flow.
func FindBeats(ctx context.Context, t Intake) (Beats, error) {
	b := Beats{Intake: t, Lead: -1}
	seconds, stated, auto, err := delayOf(t.Case)
	if err != nil {
		return b, err
	}
	widths, err := halfWidths(t.Case)
	if err != nil {
		return b, err
	}
	b.Delay = Delay{Value: seconds, Stated: stated, Auto: auto, Error: widths["delay"]}
	by, err := criteria(t.Case)
	if err != nil {
		return b, err
	}
	pressure, flow, err := b.signals(widths)
	if err != nil {
		return b, err
	}
	for _, ch := range t.Channels {
		if err := ctx.Err(); err != nil {
			return b, err
		}
		b.Pulses = append(b.Pulses, pulse(ch, t.Grid.Rate, by, t.Case.OneBeat))
	}
	said := b.Warnings
	b.Warnings = nil
	b.cut(pressure, flow)
	if err := b.align(ctx, pressure, flow); err != nil {
		return b, err
	}
	b.Warnings = slices.Concat(said, b.Warnings, implausible(b))
	if b.Reason == "" {
		b.Warnings = slices.Concat(b.Warnings, b.lineWarnings(), b.filtered())
	}
	return b, nil
}

// pulse finds the beats of a channel that can have some.
func pulse(ch data.Channel, rate float64, by beat.Criteria, oneBeat bool) beat.Pulse {
	switch {
	case !pulsatile(ch.Quantity):
		return beat.Pulse{Amplitude: math.NaN(), Breathing: beat.Breathing{Period: math.NaN(), Variation: math.NaN()}, Reason: "not a pressure, flow or velocity"}
	case oneBeat:
		return onePulse(ch, rate)
	}
	p := beat.FindBy(by, ch.Values, rate, ch.Quantity)
	if !p.Found {
		p.Reason = withOrigin(p.Reason, ch)
	}
	return p
}

// leastSamples is how few samples of a period a fit takes.
const leastSamples = 4

// onePulse takes all of a channel as one beat.
func onePulse(ch data.Channel, rate float64) beat.Pulse {
	if n := len(ch.Values); n < leastSamples {
		return beat.Pulse{Amplitude: math.NaN(), Breathing: beat.Breathing{Period: math.NaN(), Variation: math.NaN()}, Reason: fmt.Sprintf("one period of %d samples, and at least %d are needed", n, leastSamples)}
	}
	if slices.ContainsFunc(ch.Values, math.IsNaN) {
		return beat.Pulse{Amplitude: math.NaN(), Breathing: beat.Breathing{Period: math.NaN(), Variation: math.NaN()}, Reason: "one period needs every sample, and some are missing"}
	}
	whole := data.Period{Samples: ch.Values, Rate: rate}
	low, high := whole.Extremes()
	return beat.Pulse{
		Found: true, Quantity: ch.Quantity, Rate: rate,
		Beats:  []beat.Beat{{From: 0, To: len(ch.Values), Max: high, Min: low, Mean: whole.Mean()}},
		Period: whole.Duration(), PeriodCV: math.NaN(), Amplitude: math.NaN(), Noise: math.NaN(), Breathing: beat.Breathing{Period: math.NaN(), Variation: math.NaN()},
		Systolic: high, Diastolic: low, Mean: whole.Mean(),
		Rhythms: []beat.Rhythm{{Frequency: 1 / whole.Duration(), PulseAmplitude: high - low}},
	}
}

// signals are the pressure and the flow on the grid; nil where there is none.
func (b *Beats) signals(widths map[string]float64) (pressure, flow []float64, err error) {
	t := b.Intake
	if ch, ok := t.Chosen(t.Selection.Pressure); ok {
		pressure = ch.Values
	}
	b.FlowInfo = FlowInfo{Channel: -1}
	settings, err := dopplerSettings(t.Case)
	if err != nil {
		return nil, nil, err
	}
	ch, ok := t.flowChannel()
	if !ok {
		return pressure, nil, nil
	}
	b.FlowInfo = FlowInfo{Channel: t.Selection.Flow, Site: ch.Site, Error: widths["flow"]}
	if ch.Quantity != unit.Velocity {
		return pressure, ch.Values, nil
	}
	b.FlowInfo.Channel = t.Selection.Velocity
	flow, err = b.fromVelocity(ch, settings, widths)
	return pressure, flow, err
}

// chosen are the indices of the channels in use: the pressure first.
func (b Beats) chosen() []int {
	return slices.DeleteFunc([]int{b.Intake.Selection.Pressure, b.FlowInfo.Channel}, func(i int) bool { return i < 0 })
}

// cut makes the ensemble of beats and its averages.
func (b *Beats) cut(pressure, flow []float64) {
	t := b.Intake
	chosen := b.chosen()
	if t.Ambiguous != nil {
		b.Reason = t.Ambiguous.Error()
		if why := b.NoPulse(); why != "" {
			b.Reason = why
		}
		return
	}
	if len(chosen) == 0 {
		b.Reason = "no channel is a pressure, a flow or a velocity of an artery"
		return
	}
	for _, i := range chosen {
		if p := b.Pulses[i]; !p.Found {
			b.Reason = "no pulse in " + t.Channels[i].Name.String() + ": " + p.Reason
			return
		}
	}
	b.Lead = chosen[0]
	b.Beats = b.Pulses[b.Lead].Beats
	signals := [][]float64{pressure, flow}
	switch {
	case pressure == nil:
		signals = signals[1:]
	case flow == nil:
		signals = signals[:1]
	default:
		b.Beats = beat.Match(b.Pulses[b.Lead], b.Pulses[b.FlowInfo.Channel])
	}
	b.Beats = t.byHand(b.Beats)
	if t.Case.OneBeat {
		if len(signals) > 1 {
			signals[1] = later(flow, b.Delay.Value*t.Grid.Rate)
		}
		b.Ensemble = beat.OneBeat(signals[0], t.Grid.Rate, signals[1:]...)
	} else {
		b.Ensemble = beat.Cut(b.Beats, t.Grid.Rate, delayed(signals, b.Delay.Value)...)
		if len(signals) > 1 {
			b.Runs = stretches(b.Ensemble.Used, pressure, flow, b.Delay.Value*t.Grid.Rate)
		}
	}
	b.average(pressure != nil, flow != nil)
}

// byHand drops and keeps the beats that the case says to.
func (t Intake) byHand(beats []beat.Beat) []beat.Beat {
	out := slices.Clone(beats)
	for i, b := range out {
		within := func(at float64) bool { return t.Grid.At(b.From) <= at && at < t.Grid.At(b.To) }
		switch {
		case slices.ContainsFunc(t.Case.Drop, within):
			out[i].Rejected = beat.ByHand
		case slices.ContainsFunc(t.Case.Keep, within) && b.Rejected != beat.Gap:
			out[i].Rejected = ""
		}
	}
	return out
}

// delayed makes signals of a leading channel and, where there is a second, of
// the flow that the lead is late behind.
func delayed(signals [][]float64, delay float64) []beat.Signal {
	out := []beat.Signal{{Values: signals[0]}}
	if len(signals) > 1 {
		out = append(out, beat.Signal{Values: signals[1], Delay: -delay})
	}
	return out
}

// average averages the beats of the ensemble.
func (b *Beats) average(hasPressure, hasFlow bool) {
	if len(b.Ensemble.Used) == 0 {
		b.Reason = "no usable beat: " + beat.Tally(b.Beats)
		return
	}
	next := 0
	if hasPressure {
		lead := b.Intake.Channels[b.Lead]
		b.Pressure = b.Ensemble.Average(next)
		b.Warnings = append(b.Warnings, b.Pressure.Closed(lead.Name, lead.Unit.Calibrated)...)
		next++
	}
	if hasFlow {
		b.Flow = b.Ensemble.Average(next)
		b.Warnings = append(b.Warnings, reversed(*b)...)
	}
}

// meanOfValid is the mean of the samples that have a value; NaN if none has.
func meanOfValid(values []float64) float64 {
	sum, n := 0.0, 0
	for _, v := range values {
		if !math.IsNaN(v) {
			sum += v
			n++
		}
	}
	return sum / float64(n)
}
