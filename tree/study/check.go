package study

import (
	"cmp"
	"math"

	"afterbeat/data"
	"afterbeat/data/beat"
	"afterbeat/data/unit"
)

// RecordingReport describes the whole file.
type RecordingReport struct {
	File          data.Text `json:"file"`
	SHA256        string    `json:"sha256"`
	Rows          int       `json:"rows"`
	Duration      Number    `json:"duration_s"`
	Rate          Number    `json:"sampling_hz"`
	LongestStep   Number    `json:"longest_step_s"`
	RepeatedTimes int       `json:"repeated_times"`
}

// RhythmReport is one rhythm of a pulse.
type RhythmReport struct {
	Frequency Number `json:"frequency_hz"`
	Amplitude Number `json:"pulse_amplitude"`
}

// PulseReport is what was found of a pulse in a channel.
type PulseReport struct {
	Found         bool           `json:"found"`
	Reason        *string        `json:"reason"`
	HeartRate     Number         `json:"heart_rate_bpm"`
	Period        Number         `json:"period_s"`
	PeriodCV      Number         `json:"period_cv"`
	BeatsUsed     int            `json:"beats_used"`
	BeatsRejected int            `json:"beats_rejected"`
	Rhythms       []RhythmReport `json:"rhythms"`
	// PulseToNoise is the amplitude of the average beat over the standard
	// deviation of single beats about it.
	PulseToNoise Number `json:"pulse_to_noise"`
	// BreathPeriod and PulseVariation are null where no breath was found.
	BreathPeriod   Number `json:"breath_period_s"`
	PulseVariation Number `json:"pulse_pressure_variation"`
}

// ChannelReport describes a channel. Systolic and diastolic are medians over
// the used beats of each beat's maximum and minimum; mean is the time average
// over those beats, or over all valid samples where there are none. An
// uncalibrated channel is in its own unit, the others in the internal one.
type ChannelReport struct {
	Name        data.Text     `json:"name"`
	Quantity    unit.Quantity `json:"quantity"`
	Unit        string        `json:"unit"`
	Calibrated  bool          `json:"calibrated"`
	Site        data.Site     `json:"site"`
	Missing     int           `json:"missing"`
	Unusable    int           `json:"unusable"` // samples that a fault makes unusable
	Role        *string       `json:"role"`     // what it is used as; null where it is not
	Pulse       PulseReport   `json:"pulse"`
	Systolic    Number        `json:"systolic"`
	Diastolic   Number        `json:"diastolic"`
	Mean        Number        `json:"mean"`
	Amplitude   Number        `json:"pulse_amplitude"`
	GoslingPI   Number        `json:"gosling_pi"`
	PourcelotRI Number        `json:"pourcelot_ri"`
}

// CheckReport is what `check --json` prints.
type CheckReport struct {
	Head
	Recording RecordingReport `json:"recording"`
	Channels  []ChannelReport `json:"channels"`
	Reason    *string         `json:"reason"`
	Warnings  []WarningReport `json:"warnings"`
}

// Check reports what is in the recording. Its Reason is set where no pressure,
// flow or velocity has a pulse.
func (b Beats) Check(warnings []data.Warning) CheckReport {
	return CheckReport{
		Head:      head(),
		Recording: recordingReport(b.Intake),
		Channels:  channelReports(b),
		Reason:    reason(b.NoPulse()),
		Warnings:  warningReports(warnings),
	}
}

// NoPulse says why no channel has a pulse; empty where one has.
func (b Beats) NoPulse() string {
	why := ""
	for i, p := range b.Pulses {
		if p.Found {
			return ""
		}
		ch := b.Intake.Channels[i]
		if pulsatile(ch.Quantity) {
			why = cmp.Or(why, "no pulse in "+ch.Name.String()+": "+p.Reason)
		}
	}
	return cmp.Or(why, "no channel is a pressure, a flow or a velocity")
}

// pulsatile tells whether a quantity can have a pulse that matters here.
func pulsatile(q unit.Quantity) bool {
	return q == unit.Pressure || q == unit.Flow || q == unit.Velocity
}

func recordingReport(t Intake) RecordingReport {
	return RecordingReport{
		File: t.Recording.Name, SHA256: t.Recording.SHA256, Rows: t.Clock.Rows,
		Duration: Number(t.Clock.Duration), Rate: Number(t.Clock.Rate),
		LongestStep: Number(t.Clock.LongestStep), RepeatedTimes: t.Clock.Repeated,
	}
}

func channelReports(b Beats) []ChannelReport {
	out := []ChannelReport{}
	for i, ch := range b.Intake.Channels {
		p := b.Pulses[i]
		r := ChannelReport{
			Name: ch.Name, Quantity: ch.Quantity, Unit: ch.Unit.Name, Calibrated: ch.Unit.Calibrated,
			Site: ch.Site, Missing: b.Intake.Recording.Channels[i].Missing(), Unusable: b.Intake.Unusable(i), Role: reason(b.Intake.Role(i)), Pulse: pulseReport(p),
			Systolic: nan, Diastolic: nan, Amplitude: nan, GoslingPI: nan, PourcelotRI: nan,
			Mean: Number(meanOfValid(ch.Values)),
		}
		if p.Found {
			r.Systolic, r.Diastolic, r.Mean = Number(p.Systolic), Number(p.Diastolic), Number(p.Mean)
			r.Amplitude = Number(p.Systolic - p.Diastolic)
			r.GoslingPI, r.PourcelotRI = overPositive(p.Systolic-p.Diastolic, p.Mean), overPositive(p.Systolic-p.Diastolic, p.Systolic)
		}
		out = append(out, r)
	}
	return out
}

// overPositive is a/b, undefined unless b is positive.
func overPositive(a, b float64) Number {
	if !(b > 0) {
		return nan
	}
	return Number(a / b)
}

var nan = Number(math.NaN())

func pulseReport(p beat.Pulse) PulseReport {
	r := PulseReport{
		Found: p.Found, Reason: reason(p.Reason), HeartRate: nan, Period: nan, PeriodCV: nan, PulseToNoise: Number(p.PulseToNoise()),
		BreathPeriod: Number(p.Breathing.Period), PulseVariation: Number(p.Breathing.Variation),
		BeatsUsed: p.Used(), BeatsRejected: p.Rejected(), Rhythms: []RhythmReport{},
	}
	if !p.Found {
		return r
	}
	r.HeartRate, r.Period, r.PeriodCV = Number(p.HeartRate()), Number(p.Period), Number(p.PeriodCV)
	for _, rhythm := range p.Rhythms {
		r.Rhythms = append(r.Rhythms, RhythmReport{Number(rhythm.Frequency), Number(rhythm.PulseAmplitude)})
	}
	return r
}

// AllWarnings are the warnings of the work so far, each once.
func (b Beats) AllWarnings() []data.Warning {
	var out []data.Warning
	out = append(out, b.Intake.Warnings...)
	for i, p := range b.Pulses {
		out = append(out, p.Warnings(b.Intake.Channels[i].Name)...)
	}
	return append(out, b.Warnings...)
}
