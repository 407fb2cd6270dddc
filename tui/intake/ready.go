package intake

import (
	"fmt"
	"math"
	"reflect"
	"slices"
	"strings"

	tea "github.com/charmbracelet/bubbletea"

	"afterbeat/data"
	"afterbeat/data/casefile"
	"afterbeat/data/casenote"
	"afterbeat/data/fault"
	"afterbeat/data/unit"
	"afterbeat/tree/study"
	"afterbeat/tui/chart"
	"afterbeat/tui/trace"
)

// ready is a recording made ready to be shown.
type ready struct {
	file      data.Text
	clock     string    // in words
	span      data.Span // as far as the case has one, else infinite
	selection data.Selection
	names     names
	channels  []channel
	warnings  []data.Warning
	unsettled string // what a person has to settle first; empty where nothing
}

// channel is a channel, calibrated, over the whole recording.
type channel struct {
	data.Channel
	unit       string // of the values, which may differ from that of the file
	missing    string // the part of the rows without a value
	low, high  string
	used       string // the role it is used in
	warnings   string // how many speak of it
	upsideDown bool   // by its mean
	source     trace.Source
}

// readyMsg brings what request number asked for.
type readyMsg struct {
	number int
	ready  ready
}

// prepare makes the inputs ready, in a command.
func prepare(number int, in study.Inputs) tea.Cmd {
	return func() tea.Msg { return readyMsg{number, makeReady(number, in)} }
}

func makeReady(number int, in study.Inputs) ready {
	r := ready{
		file: in.Recording.Name, names: in.Recording.Channels, clock: inWords(in.Recording.Clock()), span: spanOf(in.Case),
		selection: data.Selection{Pressure: -1, Flow: -1, Velocity: -1}, warnings: in.Recording.Warnings,
	}
	taken, err := takeWhole(in)
	channels, grid := taken.Channels, taken.Grid
	switch {
	case err != nil:
		r.unsettled = err.Error() + "; u takes the last change back"
		channels, grid = asRead(in.Recording)
	case taken.Ambiguous != nil:
		r.unsettled = ambiguous(taken.Ambiguous)
		r.warnings = taken.Warnings
	default:
		r.selection, r.warnings = taken.Selection, taken.Warnings
	}
	for i, ch := range channels {
		var faults []fault.Finding
		if i < len(taken.Faults) {
			faults = taken.Faults[i]
		}
		r.channels = append(r.channels, r.channel(ch, in, i, number, grid, faults))
	}
	return r
}

// ambiguous says what a person has to choose between, and how.
func ambiguous(e *data.AmbiguousError) string {
	var names []string
	for _, n := range e.Names {
		names = append(names, n.String())
	}
	return fmt.Sprintf("the %s could be %s; enter on the right one chooses it", e.Role, strings.Join(names, " or "))
}

// takeWhole takes in all of the recording, or, where its holes do not allow that,
// the span of the case.
func takeWhole(in study.Inputs) (study.Intake, error) {
	whole := in
	whole.Case.From, whole.Case.To, whole.Excluded = nil, nil, nil
	if t, err := study.TakeIn(whole); err == nil {
		return t, nil
	}
	return study.TakeIn(in)
}

// asRead are the channels on an even clock without the choices of the case;
// without values where the recording has no such clock.
func asRead(rec *data.Recording) ([]data.Channel, data.Grid) {
	channels := slices.Clone(rec.Channels)
	grid, values, err := rec.Uniform()
	for i := range channels {
		channels[i].Values = nil
		if err == nil {
			channels[i].Values = values[i]
		}
	}
	return channels, grid
}

func (r ready) channel(ch data.Channel, in study.Inputs, i, number int, grid data.Grid, faults []fault.Finding) channel {
	c := channel{Channel: ch, unit: ch.Unit.Name, used: r.role(i)}
	if ch.Unit.Calibrated {
		c.unit = unit.Internal(ch.Quantity).Name
	}
	c.missing = share(in.Recording.Channels[i].Missing(), len(in.Recording.Time))
	c.low, c.high = extremes(ch.Values)
	c.upsideDown = ch.Quantity == unit.Pressure && c.used != "" && mean(ch.Values) < 0
	c.source = trace.Source{
		ID: fmt.Sprintf("intake %d %d", number, i), Name: ch.Name.String(), Unit: c.unit,
		Grid: grid, Values: ch.Values, Marks: r.marks(ch.Values, grid, in, faults),
	}
	return c
}

// role is what channel i is used as; empty where it is not used.
func (r ready) role(i int) string {
	switch i {
	case r.selection.Pressure:
		return "pressure"
	case r.selection.Flow:
		return "flow"
	case r.selection.Velocity:
		return "velocity"
	}
	return ""
}

// extremes are the smallest and the largest value.
func extremes(values []float64) (low, high string) {
	l, h := math.NaN(), math.NaN()
	for _, v := range values {
		if !(v >= l) && !math.IsNaN(v) {
			l = v
		}
		if !(v <= h) && !math.IsNaN(v) {
			h = v
		}
	}
	if math.IsNaN(l) {
		return "none", "none"
	}
	return casenote.Format(l, data.NoInterval()), casenote.Format(h, data.NoInterval())
}

// mean is that of the values there are; NaN where there are none.
func mean(values []float64) float64 {
	sum, n := 0.0, 0
	for _, v := range values {
		if !math.IsNaN(v) {
			sum, n = sum+v, n+1
		}
	}
	return sum / float64(n)
}

// share is part of whole in percent.
func share(part, whole int) string {
	if part == 0 {
		return "none"
	}
	return fmt.Sprintf("%.2g %%", 100*float64(part)/float64(whole))
}

func inWords(c data.Clock) string {
	return fmt.Sprintf("%d rows, %s s at %s Hz", c.Rows,
		casenote.Format(c.Duration, data.NoInterval()), casenote.Format(c.Rate, data.NoInterval()))
}

// marks tell what of a channel cannot be used, and where the span ends.
func (r ready) marks(values []float64, grid data.Grid, in study.Inputs, faults []fault.Finding) []chart.Mark {
	first, last := grid.At(0), grid.At(max(len(values)-1, 0))
	outside := chart.Mark{Char: '-'}
	ends := []chart.Mark{{Char: '['}, {Char: ']'}}
	if r.span.From > first {
		outside.Name = "outside the span"
		outside.Spans = append(outside.Spans, data.Span{From: first, To: r.span.From})
		ends[0].At = []float64{r.span.From}
	}
	if r.span.To <= last {
		outside.Name = "outside the span"
		outside.Spans = append(outside.Spans, data.Span{From: r.span.To, To: last})
		ends[1].At = []float64{r.span.To}
	}
	faulty := chart.Mark{Char: '!'}
	for _, f := range faults {
		if f.Unusable {
			for _, run := range f.Runs {
				faulty.Spans = append(faulty.Spans, data.Span{From: grid.At(run.From), To: grid.At(run.To - 1)})
			}
		}
	}
	if len(faulty.Spans) > 0 {
		faulty.Name = "unusable"
	}
	missing := chart.Mark{Char: '?', Spans: without(holes(values, grid), faulty.Spans)}
	if len(missing.Spans) > 0 {
		missing.Name = "missing"
	}
	excluded := chart.Mark{Char: 'x', Spans: in.Excluded}
	if len(in.Excluded) > 0 {
		excluded.Name = "left out"
	}
	return append([]chart.Mark{outside, excluded, missing, faulty}, ends...)
}

// without are the spans that overlap none of the others.
func without(spans, others []data.Span) []data.Span {
	return slices.DeleteFunc(spans, func(s data.Span) bool {
		return slices.ContainsFunc(others, func(o data.Span) bool { return s.From <= o.To && o.From <= s.To })
	})
}

// holes are the stretches of samples without a value.
func holes(values []float64, grid data.Grid) []data.Span {
	var out []data.Span
	for i := 0; i < len(values); i++ {
		from := i
		for i < len(values) && math.IsNaN(values[i]) {
			i++
		}
		if i > from {
			out = append(out, data.Span{From: grid.At(from), To: grid.At(i - 1)})
		}
	}
	return out
}

func spanOf(c casefile.Case) data.Span {
	s := data.Span{From: math.Inf(-1), To: math.Inf(1)}
	if c.From != nil {
		s.From = *c.From
	}
	if c.To != nil {
		s.To = *c.To
	}
	return s
}

// same tells whether two cases agree in all that this screen depends on.
func same(a, b casefile.Case) bool {
	of := func(c casefile.Case) casefile.Case {
		return casefile.Case{
			Pressure: c.Pressure, Flow: c.Flow, Velocity: c.Velocity, Site: c.Site, Unit: c.Unit,
			Scale: c.Scale, Offset: c.Offset, Invert: c.Invert, Calibrate: c.Calibrate, SensorHeightCM: c.SensorHeightCM, VelocityRange: c.VelocityRange, From: c.From, To: c.To,
			DiameterCM: c.DiameterCM, AngleDeg: c.AngleDeg, Delay: c.Delay, OutflowPressure: c.OutflowPressure,
		}
	}
	return reflect.DeepEqual(of(a), of(b))
}
