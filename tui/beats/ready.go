package beats

import (
	"fmt"
	"math"
	"strconv"
	"strings"

	tea "github.com/charmbracelet/bubbletea"

	"afterbeat/data"
	"afterbeat/data/beat"
	"afterbeat/data/unit"
	"afterbeat/tree/study"
	"afterbeat/tui/chart"
	"afterbeat/tui/trace"
)

// ready is the beats made ready to be shown.
type ready struct {
	number int
	reason string // why there is no average beat

	ambiguous bool // since a person has to choose a channel
	leads     bool // a channel leads
	signals   []signal
	beats     []beat.Beat // of the leading channel
	grid      data.Grid
	tally     []count
	warnings  []data.Warning
}

// count is how many beats have a fate.
type count struct {
	fate string
	n    int
}

// signal is a channel that can be looked at.
type signal struct {
	name, role, unit string // unit of the average beat
	site             data.Site
	source           trace.Source
	beats            []beat.Beat // from its first sample shown to its last, in its own values
	ensemble         int         // its index there; -1 where it has no average
	cloud            [][]float64 // the beats averaged
	average          beat.Average
	gain             float64       // the average's unit for each of the channel's
	diameter         string        // cm, of a velocity made into a flow
	quantity         unit.Quantity // of the average beat
	rows             []row
	quality          []string // of its pulse: rhythm, second rhythm, noise, breathing
}

// readyMsg brings what request number asked for.
type readyMsg struct{ ready ready }

// prepare makes beats ready, in a command.
func prepare(number int, b study.Beats) tea.Cmd {
	return func() tea.Msg { return readyMsg{makeReady(number, b)} }
}

func makeReady(number int, b study.Beats) ready {
	r := ready{
		number: number, reason: b.Reason, leads: b.Lead >= 0, beats: b.Beats, grid: b.Intake.Grid,
		tally: tally(b), warnings: b.AllWarnings()[len(b.Intake.Warnings):],
	}
	if a := b.Intake.Ambiguous; a != nil && b.NoPulse() == "" {
		r.ambiguous, r.reason = true, ambiguous(a)
	}
	for _, s := range signals(b) {
		s.source.ID = fmt.Sprintf("beats %d %s", number, s.role)
		r.signals = append(r.signals, s)
	}
	return r
}

// ambiguous says what a person has to choose between.
func ambiguous(e *data.AmbiguousError) string {
	var names []string
	for _, n := range e.Names {
		names = append(names, n.String())
	}
	return fmt.Sprintf("the %s could be %s", e.Role, strings.Join(names, " or "))
}

// signals are the chosen channels; where none leads, those with a pulse, else
// all that could have one.
func signals(b study.Beats) []signal {
	var out, silent []signal
	t := b.Intake
	if b.Lead >= 0 {
		if t.Selection.Pressure >= 0 {
			out = append(out, averaged(b, t.Selection.Pressure, 0, b.Pressure))
		}
		if b.FlowInfo.Channel >= 0 {
			out = append(out, averaged(b, b.FlowInfo.Channel, len(out), b.Flow))
		}
		return out
	}
	for i, p := range b.Pulses {
		s := channel(b, i, p.Beats, 0)
		s.role = fmt.Sprintf("channel %d", i+1)
		switch {
		case p.Found:
			out = append(out, s)
		case b.Intake.Channels[i].Quantity != unit.Other && len(b.Intake.Channels[i].Values) > 0:
			silent = append(silent, s)
		}
	}
	if len(out) == 0 {
		return silent
	}
	return out
}

// averaged is a chosen channel with its place in the ensemble.
func averaged(b study.Beats, i, ensemble int, average beat.Average) signal {
	shift, role := 0, "pressure"
	if i != b.Lead {
		shift = -int(math.Round(b.Delay.Value * b.Intake.Grid.Rate))
	}
	if i == b.FlowInfo.Channel {
		role = "flow"
	}
	s := channel(b, i, b.Beats, shift)
	s.role = role
	s.quantity = b.Intake.Channels[i].Quantity
	if i == b.FlowInfo.Channel && b.FlowInfo.Conversion != nil {
		s.unit, s.gain, s.quantity = unit.Internal(unit.Flow).Name, b.FlowInfo.Conversion.Gain, unit.Flow
		s.diameter = strconv.FormatFloat(*b.Intake.Case.DiameterCM, 'g', -1, 64)
	}
	if average.Count > 0 {
		s.ensemble, s.average, s.cloud = ensemble, average, b.Ensemble.Beats[ensemble]
	}
	s.rows = rows(b, i, s)
	return s
}

// channel is channel i with beats moved by shift samples.
func channel(b study.Beats, i int, beats []beat.Beat, shift int) signal {
	ch, grid := b.Intake.Channels[i], b.Intake.Grid
	s := signal{name: ch.Name.String(), site: ch.Site, unit: ch.Unit.Name, ensemble: -1, gain: 1}
	if ch.Unit.Calibrated {
		s.unit = unit.Internal(ch.Quantity).Name
	}
	for _, x := range beats {
		s.beats = append(s.beats, moved(x, shift, ch.Values))
	}
	s.source = trace.Source{Name: s.name, Unit: s.unit, Grid: grid, Values: ch.Values, Marks: marks(s.beats, grid)}
	s.quality = quality(b.Pulses[i])
	return s
}

// moved is a beat moved by shift samples, with the extremes and the mean that
// values have there; within the recording.
func moved(b beat.Beat, shift int, values []float64) beat.Beat {
	n := len(values)
	b.From, b.To = max(0, min(b.From+shift, n-1)), max(1, min(b.To+shift, n))
	b.Max, b.Min = math.NaN(), math.NaN()
	sum, count := 0.0, 0
	for _, v := range values[b.From:b.To] {
		if math.IsNaN(v) {
			continue
		}
		if count == 0 {
			b.Max, b.Min = v, v
		}
		b.Max, b.Min = max(b.Max, v), min(b.Min, v)
		sum, count = sum+v, count+1
	}
	b.Mean = sum / float64(count)
	return b
}

// marks are the onsets, and the beats that are not used: x at the onset, a line
// to the end.
func marks(beats []beat.Beat, grid data.Grid) []chart.Mark {
	onsets, unused, rest := chart.Mark{Char: '^'}, chart.Mark{Char: 'x'}, chart.Mark{Char: '-'}
	for _, b := range beats {
		at := grid.At(b.From)
		if b.Rejected == "" {
			onsets.At, onsets.Name = append(onsets.At, at), "used"
			continue
		}
		unused.At, unused.Name = append(unused.At, at), "not used"
		rest.Spans = append(rest.Spans, data.Span{From: at, To: grid.At(max(b.From, b.To-1))})
	}
	return []chart.Mark{rest, onsets, unused}
}

// tally counts the beats by their fate, those used first.
func tally(b study.Beats) []count {
	of := map[beat.Reason]int{}
	var order []beat.Reason
	for _, x := range b.Beats {
		if of[x.Rejected] == 0 {
			order = append(order, x.Rejected)
		}
		of[x.Rejected]++
	}
	out := []count{{"used", of[""] - b.Ensemble.Dropped}}
	for _, r := range inOrder(order) {
		out = append(out, count{string(r), of[r]})
	}
	if b.Ensemble.Dropped > 0 {
		out = append(out, count{"at an end or a gap", b.Ensemble.Dropped})
	}
	return out
}

// inOrder puts reasons into the order of [beat.Reasons]; others come last.
func inOrder(found []beat.Reason) []beat.Reason {
	rest := map[beat.Reason]bool{}
	for _, r := range found {
		rest[r] = r != ""
	}
	var out []beat.Reason
	for _, r := range append(beat.Reasons(), found...) {
		if rest[r] {
			out = append(out, r)
			delete(rest, r)
		}
	}
	return out
}
