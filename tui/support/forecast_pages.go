package support

import (
	"fmt"
	"math"
	"strings"

	"afterbeat/data"
	"afterbeat/tree/study"
	"afterbeat/tui"
	"afterbeat/tui/layout"
)

// writing puts a page together, line by line, cleaned and wrapped to its width.
type writing struct {
	width int
	theme tui.Theme
	lines []string
}

func (w *writing) words(s string) {
	w.lines = append(w.lines, layout.Wrap(layout.Clean(s, w.theme), w.width)...)
}

func (w *writing) gap() { w.lines = append(w.lines, "") }

// title heads a part of the page.
func (w *writing) title(s string) {
	if len(w.lines) > 0 {
		w.gap()
	}
	w.words(s)
	w.gap()
}

// row puts words into columns; the last has what is left.
func (w *writing) row(widths []int, cells ...string) {
	line, used := "", 0
	for i, n := range widths {
		line += layout.Pad(layout.Clean(cells[i], w.theme), n-1) + " "
		used += n
	}
	rest := layout.Wrap(layout.Clean(cells[len(widths)], w.theme), max(w.width-used, 1))
	w.lines = append(w.lines, line+rest[0])
	for _, r := range rest[1:] {
		w.lines = append(w.lines, strings.Repeat(" ", used)+r)
	}
}

// below is a remark to the row above it.
func (w *writing) below(s string) {
	const indent = 8
	for _, line := range layout.Wrap(layout.Clean(s, w.theme), max(w.width-indent, 1)) {
		w.lines = append(w.lines, strings.Repeat(" ", indent)+line)
	}
}

// heldPage is what is the same at every speed, and what is not.
func heldPage(f *study.Forecast, a tui.Area, t tui.Theme) []string {
	w := &writing{width: a.Width, theme: t}
	w.title("Held equal, natively and at every speed")
	for _, h := range f.Held {
		w.row([]int{heldLabel}, h.Quantity, heldValue(h)+" "+h.Unit+", "+string(h.Origin))
	}
	w.gap()
	w.words(f.MatchWords())
	w.gap()
	w.words("Not modelled: reflexes and autoregulation, the right heart, the site of the graft, and that arteries stiffen with pressure. What some of it would do stands with what the forecast depends on (d).")
	return w.lines
}

// heldValue is a held value, with its doubt where it is one of the ventricle: it
// may not be identified.
func heldValue(h study.ForecastHeld) string {
	if !h.Identified || h.Total.Defined() {
		return fullEstimate(h.Estimate)
	}
	return plain(h.Value)
}

// dependsPage is what would prove the forecast wrong, what moves it most, and how
// it stands beside published ranges.
func dependsPage(f *study.Forecast, a tui.Area, t tui.Theme) []string {
	w := &writing{width: a.Width, theme: t}
	w.title("What would prove the forecast wrong")
	w.words(f.Disproof)
	w.ranked(f)
	w.published(f)
	w.mismatch(f)
	return w.lines
}

// ranked lists the assumptions moved, the largest effect first.
func (w *writing) ranked(f *study.Forecast) {
	middle := f.Speeds[max(0, min(f.Middle, len(f.Speeds)-1))]
	w.title(fmt.Sprintf("What moves retained pulse at speed %s, one assumption at a time", share(middle.Speed)))
	if len(f.Sensitivity) == 0 {
		w.words("No assumption was moved.")
		return
	}
	w.words("As it stands: " + plain(middle.RetainedPulse.Value))
	wide := w.width >= besideWidth
	widths := []int{4, 24, 20, 10}
	if !wide {
		widths = []int{3, 20, 19, 9}
	}
	last := func(moved, pulse string) string {
		if wide {
			return fmt.Sprintf("%-9s %s", moved, pulse)
		}
		return moved
	}
	w.row(widths, "", "assumption", "moved", "retained", last("by", "pulse, mmHg"))
	for i, s := range f.Sensitivity {
		w.row(widths, fmt.Sprint(i+1), s.Assumption, s.Change, fmt.Sprintf("%.3f", s.RetainedPulse), last(plus(s.Difference), fmt.Sprintf("%.1f", s.PulsePressure)))
	}
}

// published sets numbers of the forecast beside those of patients.
func (w *writing) published(f *study.Forecast) {
	if len(f.Published) == 0 {
		return
	}
	w.title("Beside published ranges; a patient may well lie outside")
	for _, p := range f.Published {
		unit := strings.TrimRight(" "+p.Unit, " ")
		verdict := "outside"
		if p.Inside() {
			verdict = "inside"
		}
		value := plain(p.Value) + unit + ", " + verdict + " the published"
		if p.Reason != "" || math.IsNaN(p.Value) {
			value = strings.TrimRight("no value, "+p.Reason, ", ") + "; published"
		}
		w.words(fmt.Sprintf("%s: %s %s to %s%s", p.Name, value, plain(p.Low), plain(p.High), unit))
		w.below(strings.TrimLeft(p.At+"; "+p.Source, "; "))
	}
}

// mismatch sets the native state of the model beside what was measured.
func (w *writing) mismatch(f *study.Forecast) {
	if len(f.Mismatch) == 0 {
		return
	}
	w.title("The native state of the model beside what was measured")
	widths := []int{26, 12, 12}
	w.row(widths, "", "measured", "model", "differs by")
	for _, m := range f.Mismatch {
		w.row(widths, m.Quantity+", "+m.Unit, plain(m.Measured), plain(m.Modelled), fmt.Sprintf("%+.1f %%", m.Percent()))
	}
}

// ventriclePage is every parameter of ventricle and pump, with where it is from.
func ventriclePage(f *study.Forecast, a tui.Area, t tui.Theme) []string {
	w := &writing{width: a.Width, theme: t}
	w.title("Ventricle; 95 % in brackets")
	for _, p := range f.Ventricle {
		w.row([]int{7}, p.Symbol, p.Meaning+": "+fullEstimate(p.Estimate)+" "+p.Unit+", "+string(p.Origin))
		if p.Why != "" {
			w.below(p.Why)
		}
	}
	k := f.Pump
	w.title("Pump: " + k.Name)
	w.words(k.Origin)
	w.words(fmt.Sprintf("H = a n2 - b n Q - c Q|Q| with a %s, b %s, c %s (mmHg, 1000/min, mL/s); pump and cannulas Rc %s mmHg s/mL, Lc %s mmHg s2/mL. The coefficients make sense from %s to %s (1000/min).",
		plain(k.A), plain(k.B), plain(k.C), plain(k.Resistance), plain(k.Inertance), share(k.Low), share(k.High)))
	return w.lines
}

// fullEstimate is an estimate that says where it has no interval.
func fullEstimate(e data.Estimate) string {
	if e.Identified && !math.IsNaN(e.Value) && !e.Total.Defined() {
		return estimate(e) + " (no interval)"
	}
	return estimate(e)
}
