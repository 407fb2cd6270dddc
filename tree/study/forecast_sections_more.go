package study

import (
	"fmt"
	"strings"

	"afterbeat/data"
	"afterbeat/data/casenote"
)

// publishedSection sets the forecast beside published ranges.
func (f Forecast) publishedSection() casenote.Section {
	t := casenote.Table{Header: []string{"number, unit", "forecast, in it", "published", ""}}
	var sources []string
	number := map[string]int{}
	for _, p := range f.Published {
		if number[p.Source] == 0 {
			sources = append(sources, fmt.Sprintf("[%d] %s", len(sources)+1, p.Source))
			number[p.Source] = len(sources)
		}
		inside := "inside"
		switch {
		case p.Reason != "":
			inside = p.Reason
		case !p.Inside():
			inside = "OUTSIDE"
		}
		name := p.Name
		if p.Unit != "" {
			name += ", " + p.Unit
		}
		t.Rows = append(t.Rows, []casenote.Cell{
			{Words: data.Clean(name + "; " + p.At)},
			plain(p.Value),
			{Words: data.Clean(fmt.Sprintf("%g to %g [%d]", p.Low, p.High, number[p.Source]))},
			{Words: data.Clean(inside)},
		})
	}
	text := "Ranges of patients with durable pumps, mean +- 2 SD or the interquartile range widened by half. They say what is plausible, not what is right. Speeds in 1000/min. "
	if f.match.what != MatchNone {
		text += "Nothing is matched here, as in the studies. "
	}
	return casenote.Section{Title: "Forecast: beside published ranges", Words: words(text + strings.Join(sources, "; ") + "."), Tables: []casenote.Table{t}}
}

// heldSection says what is the same at every speed and share, and what is not
// modelled.
func (f Forecast) heldSection() casenote.Section {
	notModelled := "Not modelled: reflexes and autoregulation (resistance may change by 20 % either way: see what the forecast depends on), the right heart, the site of the graft"
	if f.own.rar == 0 {
		notModelled += ", aortic regurgitation"
	}
	s := casenote.Section{Title: "What is held, natively and on support", Chief: true, Words: words(
		"The forecast: "+f.match.words(),
		"The yardsticks: only the shape of the flow changes; mean flow is matched, and mean pressure, which follows from what is held, is the same.",
		notModelled+". Real implants change everything at once: in 8 patients measured before and after, mean pressure rose by 16 mmHg, pulse pressure fell by 25 mmHg and output rose by 1.3 L/min (Eur J Heart Fail 2021;23:1955). The doubt of what is held stands with the fit.",
	)}
	for _, h := range f.Held {
		s.Rows = append(s.Rows, casenote.Quantity(h.Quantity, h.Estimate, h.Unit, h.Origin))
	}
	for _, h := range f.Comparison.Answers[0].Held() {
		if h.Quantity == "mean flow" {
			s.Rows = append(s.Rows, casenote.Quantity("mean flow, yardsticks", data.Estimate{
				Value: h.Value, Total: data.NoInterval(), Random: data.NoInterval(), Identified: true, Why: "held",
			}, h.Unit, h.Origin))
		}
	}
	return s
}

// modulatedSection sets the modulated speed beside its mean speed held constant.
func (f Forecast) modulatedSection() casenote.Section {
	m := f.Modulated
	t := casenote.Table{
		Header: []string{"quantity, unit", "constant, in it", "modulated, in it"},
		Foot:   "Retained is against the native state of the model.",
	}
	row := func(name string, of func(*ForecastState) data.Estimate) {
		t.Rows = append(t.Rows, []casenote.Cell{{Words: data.Clean(name)}, forecastCell(of(&m.Steady)), forecastCell(of(&m.State))})
	}
	row("pulse pressure, mmHg", func(s *ForecastState) data.Estimate { return s.PulsePressure })
	beats := []casenote.Cell{{Words: data.Clean("same, mean of the beats, mmHg")}, forecastCell(m.Steady.PulsePressure), forecastCell(m.BeatPulse)}
	t.Rows = append(t.Rows, beats)
	row("retained pulse", func(s *ForecastState) data.Estimate { return s.RetainedPulse })
	row("mean pressure, mmHg", func(s *ForecastState) data.Estimate { return s.MeanPressure })
	row("output, L/min", func(s *ForecastState) data.Estimate { return times(s.Output, litresPerMinute) })
	row("filling pressure, mmHg", func(s *ForecastState) data.Estimate { return s.FillingPress })
	row("valve open, ms a beat", func(s *ForecastState) data.Estimate { return times(s.ValveOpenTime, 1000) })
	row("swing of pump flow, mL/s", func(s *ForecastState) data.Estimate { return s.PumpSwing })
	row("EEP, mmHg", func(s *ForecastState) data.Estimate { return s.EEPressure })
	row("SHE, erg/cm3", func(s *ForecastState) data.Estimate { return s.SurplusEnergy })
	words := words(fmt.Sprintf("Posing modulated: %s. Measures are over a window of %.4g s, beside them those of the mean speed, %.4g (1000/min), held constant.", m.Words, m.Window, m.State.Speed))
	if m.Locked == 0 {
		words = append(words, data.Clean("The window was doubled until the measures changed by less than 1 %. A free modulation is not drawn: it has no intervals."))
	}
	return casenote.Section{Title: "Forecast: modulated speed", Chief: true, Words: words, Tables: []casenote.Table{t}}
}
