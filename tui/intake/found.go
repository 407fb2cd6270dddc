package intake

import (
	"fmt"
	"math"
	"slices"
	"strconv"

	"afterbeat/data"
	"afterbeat/tree/study"
	"afterbeat/tui/warnlist"
)

// found is what the beats tell about the channels, once they are computed.
type found struct {
	warnings []data.Warning // that name a channel, and that a key here cures
	pressure float64        // its mean, mmHg; NaN while it is not known
}

func foundIn(s study.Study) found {
	f := found{pressure: math.NaN()}
	if s.Beats == nil {
		return f
	}
	if s.Beats.Pressure.Count > 0 {
		f.pressure = s.Beats.Pressure.Period.Mean()
	}
	here := warnlist.Intake()
	for _, w := range s.Beats.AllWarnings() {
		if here[w.Code] != "" && w.Channel.Width() > 0 {
			f.warnings = append(f.warnings, w)
		}
	}
	return f
}

// warned counts the warnings of each channel, and lists all: those of the
// intake, those of the beats that are cured here, and channels upside down.
func (m Model) warned() Model {
	all := slices.Clone(m.ready.warnings)
	for _, w := range append(m.ready.upsideDown(), m.found.warnings...) {
		if !slices.Contains(all, w) {
			all = append(all, w)
		}
	}
	m.ready.channels = slices.Clone(m.ready.channels)
	for i, ch := range m.ready.channels {
		n := 0
		for _, w := range all {
			if w.Channel == ch.Name {
				n++
			}
		}
		m.ready.channels[i].warnings = ""
		if n > 0 {
			m.ready.channels[i].warnings = strconv.Itoa(n)
		}
	}
	m.list = m.list.Hold(all)
	return m
}

// upsideDown warns of a pressure in use whose mean is below 0.
func (r ready) upsideDown() []data.Warning {
	var out []data.Warning
	for _, ch := range r.channels {
		if ch.upsideDown {
			out = append(out, data.Warning{
				Code: data.CodeUnlikely, Channel: ch.Name,
				Text: fmt.Sprintf("the mean of %s is %.4g %s, below 0", ch.Name, mean(ch.Values), ch.unit),
				Cure: fmt.Sprintf("upside down? i turns it back (--invert %s)", ch.Name),
			})
		}
	}
	return out
}
