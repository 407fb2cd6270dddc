package fit

import (
	"fmt"
	"math"
	"math/cmplx"

	"afterbeat/data"
	"afterbeat/data/casenote"
	"afterbeat/fitting/harmonic"
	"afterbeat/tui/chart"
	"afterbeat/tui/explain"
	"afterbeat/tui/layout"
)

// impedances draws modulus and phase of the beats, harmonic by harmonic with
// their scatter, and those of a way's load over them: one picture a way.
func (d drawing) impedances() []string {
	shown := harmonic.Shown(d.fit.Impedance)
	if len(shown) == 0 {
		return nil
	}
	var out []string
	for i := range d.items {
		out = append(out, d.impedance(i, shown))
	}
	return out
}

// impedance draws the impedance of the beats, and of way i.
func (d drawing) impedance(i int, shown []harmonic.Harmonic) string {
	x := chart.Axis{Low: 0, High: shown[len(shown)-1].Frequency, Name: "frequency", Unit: "Hz"}
	one := d.items[i]
	modulus := spectrum{
		title: d.impedanceTitle(one, shown),
		unit:  unitOf(d.fit, "R"), of: harmonic.Harmonic.Modulus, scatter: func(h harmonic.Harmonic) float64 { return h.ModulusSD },
		load: cmplx.Abs,
	}
	phase := spectrum{
		title: "phase, degrees; negative: pressure lags flow", unit: "deg", of: degrees(harmonic.Harmonic.Phase),
		scatter: degrees(func(h harmonic.Harmonic) float64 { return h.PhaseSD }),
		load:    func(z complex128) float64 { return cmplx.Phase(z) * 180 / math.Pi },
	}
	s := chart.Stack{Main: modulus.plot(shown, x), Lower: phase.plot(shown, x)}
	columns, above, below := s.Area(d.plan.width, d.plan.plot)
	if columns == 0 { // no room for both
		p := modulus.plot(shown, x)
		if columns, above = p.Area(d.plan.width, d.plan.plot); columns == 0 {
			return ""
		}
		p.Series = modulus.series(shown, p, columns, above, d.load(one), "model")
		return p.Draw(d.plan.width, d.plan.plot, d.theme)
	}
	s.Main.Series = modulus.series(shown, s.Main, columns, above, d.load(one), "model")
	s.Lower.Series = phase.series(shown, s.Lower, columns, below, d.load(one), "")
	for k := range s.Lower.Series {
		s.Lower.Series[k].Name = ""
	}
	return s.Draw(d.plan.width, d.plan.plot, d.theme)
}

// impedanceTitle says what is drawn. It names the way only where no list beside
// the numbers does: on a slow line every byte that stays is one less to send.
func (d drawing) impedanceTitle(one item, shown []harmonic.Harmonic) string {
	title := fmt.Sprintf("|Z| at %d of %d harmonics", len(shown), len(d.fit.Impedance))
	if d.plan.beside {
		return title
	}
	return one.title() + ": " + title
}

// load is the impedance of a way at a frequency, rad/s; nil where it has none.
func (d drawing) load(one item) func(w float64) complex128 {
	if one.fitted() {
		return d.fit.Results[one.result].Load().Impedance
	}
	if load, ok := d.fit.LoadOf(one.estimate); ok {
		return load.Impedance
	}
	return nil
}

func degrees(of func(harmonic.Harmonic) float64) func(harmonic.Harmonic) float64 {
	return func(h harmonic.Harmonic) float64 { return of(h) * 180 / math.Pi }
}

// spectrum is modulus or phase.
type spectrum struct {
	title, unit string
	of, scatter func(harmonic.Harmonic) float64
	load        func(z complex128) float64
}

// plot is the frame, with bounds that hold the harmonics and their scatter.
func (s spectrum) plot(shown []harmonic.Harmonic, x chart.Axis) chart.Plot {
	var ends []float64
	for _, h := range shown {
		ends = append(ends, s.low(h), s.high(h))
	}
	return chart.Plot{Title: s.title, X: x, Y: chart.Covering(s.unit, ends), LabelWidth: labelWidth}
}

func (s spectrum) low(h harmonic.Harmonic) float64  { return s.end(h, -1) }
func (s spectrum) high(h harmonic.Harmonic) float64 { return s.end(h, 1) }

func (s spectrum) end(h harmonic.Harmonic, side float64) float64 {
	if sd := s.scatter(h); !math.IsNaN(sd) {
		return s.of(h) + side*sd
	}
	return s.of(h)
}

// series are the load's curve, the scatter of each harmonic as a column of dots,
// and the harmonics as points over both.
func (s spectrum) series(shown []harmonic.Harmonic, p chart.Plot, columns, lines int, load func(float64) complex128, name string) []chart.Series {
	none := func() []float64 { return chart.Columns(nil, 0, 0, columns, 0) }
	curve, points := none(), none()
	var scatter []chart.Series
	at := func(f float64) int { return int(math.Round(f / p.X.High * float64(columns-1))) }
	if load != nil {
		for c := at(shown[0].Frequency); c < columns; c++ {
			curve[c] = s.load(load(2 * math.Pi * p.X.High * float64(c) / float64(columns-1)))
		}
	}
	step := (p.Y.High - p.Y.Low) / float64(max(lines-1, 1))
	for _, h := range shown {
		c := at(h.Frequency)
		points[c] = s.of(h)
		for k, v := 0, s.low(h); v <= s.high(h) && step > 0; k, v = k+1, v+step {
			if k == len(scatter) {
				scatter = append(scatter, chart.Series{Values: none(), Glyph: chart.Dots})
			}
			scatter[k].Values[c] = v
		}
	}
	if len(scatter) > 0 {
		scatter[0].Name = "scatter"
	}
	all := append(scatter, chart.Series{Name: name, Values: curve, Glyph: chart.Stars})
	return append(all, chart.Series{Name: "beats", Values: points, Glyph: chart.Points})
}

// waves draws the forward and the backward wave of the average beat.
func (d drawing) waves() string {
	w := d.fit.Waves
	if len(w.Forward.Samples) == 0 {
		return ""
	}
	words := fmt.Sprintf("Reflection %s, back after %s s", inBrackets(w.Magnitude), inBrackets(w.ReturnTime))
	d.plan.plot--
	return layout.Pad(data.Clean(words), d.plan.width) + "\n" + d.alone(chart.Plot{
		Title: fmt.Sprintf("waves, told apart with Zc %s", bare(w.Zc)),
		X:     timeAxis(w.Forward), Y: chart.Covering("mmHg", w.Forward.Samples, w.Backward.Samples), LabelWidth: labelWidth,
		Series: []chart.Series{{Name: "P+", Values: w.Forward.Samples}, {Name: "P-", Values: w.Backward.Samples}},
	})
}

// inBrackets is a value with its interval of random error behind it.
func inBrackets(e data.Estimate) string {
	if !e.Random.Defined() {
		return casenote.Format(e.Value, data.NoInterval())
	}
	return casenote.Format(e.Value, e.Random) + " (" + casenote.FormatRange(e.Value, e.Random) + ")"
}

// readOffWaves are the numbers read off the waves, as enter opens them.
func (m Model) readOffWaves() []explain.Number {
	if m.fit == nil || len(m.fit.Waves.Forward.Samples) == 0 {
		return nil
	}
	w := m.fit.Waves
	number := func(name, unit string, e data.Estimate) explain.Number {
		e.Total = e.Random
		return explain.Number{
			Name: name, Of: "the average beat", RandomOnly: true, Account: harmonic.Account(name),
			Value:  casenote.Number{Estimate: e, Unit: unit, Origin: data.Estimated},
			Method: "from blocks of beats left out in turn; calibration, delay and Zc are not in it",
			Notes:  []string{fmt.Sprintf("told apart with Zc %s %s (%s)", bare(w.Zc), unitOf(*m.fit, "R"), w.ZcFrom)},
		}
	}
	return []explain.Number{
		number(harmonic.ReflectionMagnitude, "of P+", w.Magnitude),
		number(harmonic.ReturnTime, "s", w.ReturnTime),
	}
}
