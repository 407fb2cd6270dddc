package support

import (
	"fmt"
	"math"

	tea "github.com/charmbracelet/bubbletea"

	"afterbeat/data"
	"afterbeat/data/casenote"
	"afterbeat/tree/study"
	"afterbeat/tree/support"
	"afterbeat/tui"
	"afterbeat/tui/chart"
	"afterbeat/tui/layout"
)

// moved is a what-if of the forecast: an assumption moved, for the screen alone.
type moved struct {
	at     int // 0: none; else what-if at-1 of the forecast
	answer study.ForecastWhatIf
	of     int // what the answer belongs to; 0: none is there yet
}

// whatIfMsg brings a what-if that was asked for.
type whatIfMsg struct {
	forecast *study.Forecast
	at       int
	answer   study.ForecastWhatIf
	err      error
}

// moveBy goes to another what-if, and round through none; the answer comes as a
// command.
func (m Model) moveBy(n int) (Model, tea.Cmd) {
	count := m.forecast.WhatIfs() + 1
	m.moved = moved{at: ((m.moved.at+n)%count + count) % count}
	if m.moved.at == 0 {
		return m, nil
	}
	f, at, samples := m.forecast, m.moved.at, len(m.forecast.Native.Waves.Pressure.Samples)
	return m, func() tea.Msg {
		answer, err := f.WhatIf(at-1, max(samples, 1))
		return whatIfMsg{f, at, answer, err}
	}
}

// takeWhatIf takes an answer over, unless another one is wanted by now.
func (m Model) takeWhatIf(msg whatIfMsg) (Model, tea.Cmd) {
	if msg.forecast != m.forecast || msg.at != m.moved.at {
		return m, nil
	}
	if msg.err != nil {
		m.moved = moved{}
		return m, tui.Say("no what-if: " + msg.err.Error())
	}
	m.moved.answer, m.moved.of = msg.answer, msg.at
	return m, nil
}

// movedState is the what-if at the speed shown; nil where there is none, or it is
// not computed yet.
func (m Model) movedState() *study.ForecastState {
	if m.moved.of == 0 || m.moved.answer.Reason != "" || m.at >= len(m.moved.answer.Speeds) {
		return nil
	}
	return &m.moved.answer.Speeds[m.at]
}

// movedWords mark what is shown as a what-if.
func (m Model) movedWords() string {
	a := m.moved.answer
	switch {
	case m.moved.of == 0:
		return "WHAT IF: computing"
	case a.Reason != "":
		return fmt.Sprintf("WHAT IF %s %s: %s", a.Assumption, a.Change, a.Reason)
	}
	return fmt.Sprintf("WHAT IF %s %s; never in the note", a.Assumption, a.Change)
}

// movedHead is the head of the forecast with a what-if: what is shown, that it is
// one, and what becomes of the retained pulse.
func (m Model) movedHead(p plan) []string {
	say := func(words string) string { return layout.Clean(words, m.theme).String() }
	out := m.coupledHead(p)
	out[min(1, len(out)-1)] = say(m.movedWords())
	if s := m.movedState(); s != nil && len(out) > 2 {
		valve := "valve shut"
		if s.ValveOpened {
			valve = "valve opens"
		}
		out[2] = say(fmt.Sprintf("retained pulse %s, what if %s (%s); %s", plain(m.now().RetainedPulse.Value), plain(s.RetainedPulse.Value), plus(s.RetainedPulse.Value-m.now().RetainedPulse.Value), valve))
	}
	if s := m.movedState(); s != nil && len(out) == 2 {
		out[0] = say(fmt.Sprintf("speed %s (1000/min): retained pulse %s (%s)", share(m.now().Speed), plain(s.RetainedPulse.Value), plus(s.RetainedPulse.Value-m.now().RetainedPulse.Value)))
	}
	return out
}

// movedFigures are the headlines, each with the what-if and the change beside.
func (m Model) movedFigures(most int) []string {
	out := []string{m.across("", "supported (95 %)", "what if  change", "")}
	if m.narrow() {
		out[0] = m.briefly("", "supported", "what if (change)")
	}
	s := m.movedState()
	if s == nil {
		return out
	}
	now := m.now()
	for _, f := range []struct {
		label    string
		was, now data.Estimate
	}{
		{"retained pulse", now.RetainedPulse, s.RetainedPulse},
		{"pulse pressure, mmHg", now.PulsePressure, s.PulsePressure},
		{"mean pressure, mmHg", now.MeanPressure, s.MeanPressure},
		{"output, L/min", scaledBy(now.Output, litresPerMinute), scaledBy(s.Output, litresPerMinute)},
		{"filling press., mmHg", now.FillingPress, s.FillingPress},
		{"valve open a beat, s", now.ValveOpenTime, s.ValveOpenTime},
	}[:min(most, 6)] {
		change := changed(f.now.Value - f.was.Value)
		if m.narrow() {
			out = append(out, m.briefly(f.label, plain(f.was.Value), plain(f.now.Value)+" ("+change+")"))
			continue
		}
		out = append(out, m.across(f.label, estimate(f.was), plain(f.now.Value)+"  "+change, ""))
	}
	return out
}

// changed is a change in print, with its sign.
func changed(v float64) string {
	if math.IsNaN(v) {
		return casenote.Format(v, data.NoInterval())
	}
	return fmt.Sprintf("%+.3g", v)
}

// withMoved adds the wave of the what-if to a plot of the waves.
func (m Model) withMoved(plot chart.Plot, p plan, unit string, of func(support.Waves) data.Period) chart.Plot {
	s := m.movedState()
	if s == nil || len(of(s.Waves).Samples) == 0 {
		return plot
	}
	samples := of(s.Waves).Samples
	plot.Y = chart.Covering(unit, []float64{plot.Y.Low, plot.Y.High}, samples)
	columns, _ := plot.Area(p.width, p.plot)
	for i := range plot.Series {
		plot.Series[i].Values = columnsOf([][]float64{of(m.forecast.Native.Waves).Samples, of(m.now().Waves).Samples}[i], columns)
	}
	plot.Series = append(plot.Series, chart.Series{Name: "what if", Values: columnsOf(samples, columns)})
	return plot
}

// quote asks for the speed shown to be the one that the note quotes.
func (m Model) quote() tea.Cmd {
	c := m.study.Inputs.Case
	speed := m.now().Speed
	c.Quote = &speed
	return tui.Change(fmt.Sprintf("the note quotes speed %s", share(speed)), c)
}

// quotes tells that the note quotes the speed shown.
func (m Model) quotes() bool { return m.at == m.forecast.Middle }
