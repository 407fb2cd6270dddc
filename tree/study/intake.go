package study

import (
	"errors"
	"fmt"
	"maps"
	"math"
	"slices"
	"strings"

	"afterbeat/data"
	"afterbeat/data/casefile"
	"afterbeat/data/fault"
	"afterbeat/data/unit"
	"afterbeat/tree"
	"afterbeat/tree/support"
)

// Intake is the recording made ready: calibrated, on an even clock, with the
// channels chosen and everything outside the span marked unusable.
type Intake struct {
	Recording *data.Recording
	Case      casefile.Case
	Clock     data.Clock
	Grid      data.Grid
	// Channels are those of the recording with sites, calibration and clock of
	// the case applied: Values are on Grid, NaN where unusable.
	Channels []data.Channel
	// Filled counts, for each channel, the missing samples that were filled by a
	// straight line, because their hole is no longer than 20 ms.
	Filled []int
	// Faults are those of each channel, their runs on Grid; samples that are
	// unusable are NaN in Channels, save those of spikes, which are filled.
	Faults    [][]fault.Finding
	Selection data.Selection
	// Ambiguous is set, and nothing selected, where only a person can choose
	// between columns. The beats of every channel can be looked at all the same.
	Ambiguous *data.AmbiguousError
	// Span is what is used of the clock; Excluded are the stretches left out of it.
	Span data.Span
	// Cuffs are the calibrations by a cuff, by channel.
	Cuffs    map[int]Cuff
	Excluded []data.Span
	// Modulation is that of the inputs.
	Modulation *support.Modulation
	// Arteries is the case's own table of arteries; nil where it names none.
	Arteries *tree.Network
	Warnings []data.Warning
}

// TakeIn makes a recording ready. It never changes the recording.
func TakeIn(in Inputs) (Intake, error) {
	c := in.Case
	out := Intake{Recording: in.Recording, Case: c, Clock: in.Recording.Clock(), Excluded: in.Excluded, Modulation: in.Modulation, Arteries: in.Arteries}
	channels, err := corrected(in.Recording.Channels, c)
	if err != nil {
		return out, err
	}
	out.Selection, err = data.Choose(channels, data.Roles{Pressure: c.Pressure, Flow: c.Flow, Velocity: c.Velocity})
	if errors.As(err, &out.Ambiguous) {
		out.Selection = data.Selection{Pressure: -1, Flow: -1, Velocity: -1}
	} else if err != nil {
		return out, err
	}
	calibrations, err := calibrations(channels, c)
	if err != nil {
		return out, err
	}
	cuffs, err := cuffs(channels, c)
	if err != nil {
		return out, err
	}
	out.Cuffs = map[int]Cuff{}
	if out.Span, err = span(in.Recording, c); err != nil {
		return out, err
	}
	grid, values, err := in.Recording.Uniform()
	if err != nil {
		grid, values, err = in.Recording.Within(out.Span).Uniform()
	}
	if err != nil {
		return out, err
	}
	out.Grid = grid
	for i, cal := range calibrations {
		if cal.fold > 0 {
			values[i] = fault.Unwrap(values[i], cal.fold)
		}
		channels[i].Values = calibrated(values[i], cal.scale, cal.shift)
		ready := out.madeReady(channels[i])
		if cuff, ok := cuffs[i]; ok {
			if cuff, err = cuff.against(ready.values, grid.Rate); err != nil {
				return out, err
			}
			out.Cuffs[i] = cuff
			channels[i].Values = calibrated(channels[i].Values, cuff.Scale, cuff.Shift)
			channels[i].Unit = unit.Internal(unit.Pressure)
			ready = out.madeReady(channels[i])
		}
		channels[i].Values = ready.values
		out.Faults, out.Filled = append(out.Faults, ready.faults), append(out.Filled, ready.filled)
	}
	out.Channels = channels
	out.Warnings = slices.Concat(out.readWarnings(), guesses(out), out.faultWarnings(), out.cuffWarnings(), siteWarnings(out))
	return out, nil
}

// Chosen returns the channel of index i, or nothing where i is below 0.
func (t Intake) Chosen(i int) (data.Channel, bool) {
	if i < 0 {
		return data.Channel{}, false
	}
	return t.Channels[i], true
}

// corrected returns the channels with the sites of the case.
func corrected(channels []data.Channel, c casefile.Case) ([]data.Channel, error) {
	out := slices.Clone(channels)
	stated, err := sites(c)
	if err != nil {
		return nil, err
	}
	for _, name := range sorted(stated) {
		i, err := data.FindChannel(channels, name, "--site")
		if err != nil {
			return nil, noColumn("site."+name, err, channels)
		}
		out[i].Site = stated[name]
	}
	return out, nil
}

// calibrations is what the case does to each channel, in internal units.
func calibrations(channels []data.Channel, c casefile.Case) ([]calibration, error) {
	out := make([]calibration, len(channels))
	for i := range out {
		out[i].scale = 1
	}
	for _, name := range sorted(c.Scale) {
		i, err := data.FindChannel(channels, name, "--scale")
		if err != nil {
			return nil, noColumn("scale."+name, err, channels)
		}
		if c.Scale[name] == 0 {
			return nil, &ChoiceError{Key: "scale." + name, What: "a factor of 0 leaves nothing of a channel", Hint: "to change its sign, --invert"}
		}
		out[i].scale = c.Scale[name]
	}
	for _, name := range sorted(c.Offset) {
		i, err := data.FindChannel(channels, name, "--offset")
		if err != nil {
			return nil, noColumn("offset."+name, err, channels)
		}
		out[i].shift = c.Offset[name] * channels[i].Unit.Factor
	}
	for _, name := range sorted(c.SensorHeightCM) {
		i, err := data.FindChannel(channels, name, "--sensor-height-cm")
		if err != nil {
			return nil, noColumn("sensor_height_cm."+name, err, channels)
		}
		if channels[i].Quantity != unit.Pressure {
			return nil, &ChoiceError{Key: "sensor_height_cm." + name, What: "the column is no pressure", Hint: "height matters to pressures only"}
		}
		out[i].shift += hydrostatic(channels[i].Site) * c.SensorHeightCM[name]
	}
	for _, name := range sorted(c.VelocityRange) {
		key := "velocity_range." + name
		i, err := data.FindChannel(channels, name, "--velocity-range")
		switch {
		case err != nil:
			return nil, noColumn(key, err, channels)
		case channels[i].Quantity != unit.Velocity:
			return nil, &ChoiceError{Key: key, What: "the column is no velocity", Hint: "only a Doppler scale folds"}
		case !(c.VelocityRange[name] > 0):
			return nil, &ChoiceError{Key: key, What: "a range is above 0", Hint: "from the lower to the upper end of the scale"}
		}
		out[i].fold = c.VelocityRange[name] * channels[i].Unit.Factor
	}
	for _, name := range c.Invert {
		i, err := data.FindChannel(channels, name, "--invert")
		if err != nil {
			return nil, noColumn("invert", err, channels)
		}
		out[i].scale = -out[i].scale
	}
	return out, nil
}

// noColumn is the error of a choice about a column that is not there, or not
// the only one of its name.
func noColumn(key string, err error, channels []data.Channel) error {
	var names []string
	for _, ch := range channels {
		names = append(names, ch.Name.String())
	}
	return &ChoiceError{Key: key, What: err.Error(), Hint: "columns: " + list(names)}
}

// calibration unfolds a value, then makes it scale times itself plus shift.
type calibration struct {
	scale, shift float64
	fold         float64 // range of the scale that folded the values; 0 where none did
}

func sorted[V any](m map[string]V) []string { return slices.Sorted(maps.Keys(m)) }

func calibrated(values []float64, scale, shift float64) []float64 {
	out := make([]float64, len(values))
	for i, v := range values {
		out[i] = scale*v + shift
	}
	return out
}

// span is the part of the clock that the case uses.
func span(rec *data.Recording, c casefile.Case) (data.Span, error) {
	first, last := rec.Time[0], rec.Time[len(rec.Time)-1]
	s := data.Span{From: first, To: math.Inf(1)}
	if c.From != nil {
		s.From = *c.From
	}
	if c.To != nil {
		s.To = *c.To
	}
	hint := fmt.Sprintf("the clock of the recording runs from %g to %g s", first, last)
	switch {
	case s.From > last:
		return s, &ChoiceError{Key: "from", What: fmt.Sprintf("%g s lies after the end", s.From), Hint: hint}
	case s.To <= first:
		return s, &ChoiceError{Key: "to", What: fmt.Sprintf("%g s lies before the start", s.To), Hint: hint}
	case s.To <= s.From:
		return s, &ChoiceError{Key: "to", What: fmt.Sprintf("%g s is not after --from %g s", s.To, s.From), Hint: hint}
	}
	for i, at := range slices.Concat(c.Drop, c.Keep) {
		if first <= at && at <= last {
			continue
		}
		key := "drop"
		if i >= len(c.Drop) {
			key = "keep"
		}
		return s, &ChoiceError{Key: key, What: fmt.Sprintf("%g s lies outside the recording", at), Hint: hint}
	}
	return s, nil
}

// mask marks what lies outside the span, or inside an excluded stretch, unusable.
func (t Intake) mask(values []float64) {
	for i := range values {
		at := t.Grid.At(i)
		if at < t.Span.From || at >= t.Span.To {
			values[i] = math.NaN()
		}
	}
	for _, s := range t.Excluded {
		from := max(0, int(math.Ceil((s.From-t.Grid.Start)*t.Grid.Rate)))
		to := min(len(values)-1, int(math.Floor((s.To-t.Grid.Start)*t.Grid.Rate)))
		for i := from; i <= to; i++ {
			values[i] = math.NaN()
		}
	}
}

// flowChannel is the channel that gives the flow: a flow, or a velocity.
func (t Intake) flowChannel() (data.Channel, bool) {
	if ch, ok := t.Chosen(t.Selection.Flow); ok {
		return ch, true
	}
	return t.Chosen(t.Selection.Velocity)
}

// unitOfValues is the unit of a channel's values: the internal one, whatever
// the file has, or the channel's own where it is uncalibrated.
func unitOfValues(ch data.Channel) string {
	if ch.Unit.Calibrated {
		return unit.Internal(ch.Quantity).Name
	}
	return ch.Unit.Name
}

// list joins names for a sentence.
func list(names []string) string { return strings.Join(names, ", ") }
