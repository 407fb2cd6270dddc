package fit

import (
	"cmp"
	"context"
	"fmt"
	"math"
	"slices"
	"strings"

	tea "github.com/charmbracelet/bubbletea"

	"afterbeat/fitting"
	"afterbeat/tree/study"
	"afterbeat/tui"
	"afterbeat/tui/explain"
)

// weighed is a fit with each assumption moved, and what each systematic error
// does to it.
type weighed struct {
	whatIfs  []study.WhatIf
	doubts   []study.WhatIf
	pictures []string // one a what-if
	failed   string
}

// weighedMsg brings what was asked for of an item.
type weighedMsg struct {
	request, item int
	weighed       weighed
}

// weigh asks for the what-ifs of the fit shown, unless they are there.
func (m Model) weigh() (tui.Screen, tea.Cmd) {
	if _, there := m.weighed[m.shown]; there || !m.item().fitted() {
		return m, nil
	}
	if m.stop != nil {
		m.stop()
	}
	ctx, stop := context.WithCancel(context.Background())
	m.stop = stop
	request, shown, result, d := m.request, m.shown, m.item().result, m.drawing()
	return m, func() tea.Msg {
		w, err := d.weighed(ctx, result)
		if ctx.Err() != nil {
			return nil
		}
		if err != nil {
			w.failed = err.Error()
		}
		return weighedMsg{request, shown, w}
	}
}

// weighed fits a result anew under every assumption moved, and draws it.
func (d drawing) weighed(ctx context.Context, result int) (w weighed, err error) {
	if w.whatIfs, err = d.fit.WhatIfs(ctx, result); err != nil {
		return w, err
	}
	if w.doubts, err = d.fit.Doubts(ctx, result); err != nil {
		return w, err
	}
	for i := range w.whatIfs {
		w.pictures = append(w.pictures, d.whatIf(result, w.whatIfs, i))
	}
	return w, nil
}

// whatIf is the assumption moved; false where none is, or it is not there yet.
func (m Model) whatIf() (study.WhatIf, bool) {
	w := m.weighed[m.shown]
	if m.moved == 0 || m.moved > len(w.whatIfs) {
		return study.WhatIf{}, false
	}
	return w.whatIfs[m.moved-1], true
}

// moves is how many assumptions can be moved.
func (m Model) moves() int {
	switch {
	case m.fit == nil:
		return 0
	case m.fit.Beats.FlowInfo.Conversion != nil:
		return mostMoves
	}
	return mostMoves - 2 // no diameter
}

const mostMoves = 8

// assumption names an assumption moved in words.
func assumption(s study.Sensitivity) string {
	return strings.ReplaceAll(s.Assumption, "-", " ") + " " + s.Change
}

// explained are the numbers shown, each with what its doubt comes from.
func (m Model) explained() []explain.Number {
	var out []explain.Number
	for _, r := range m.item().rows {
		n := r.number
		if m.item().fitted() && !r.broken() {
			n.Leads = leads(r, m.weighed[m.shown].doubts)
		}
		out = append(out, n)
	}
	return append(out, m.readOffWaves()...)
}

// leads are the errors that a number's doubt comes from, the largest first: each
// systematic one at the end of its 95 % interval, and the random one.
func leads(r row, doubts []study.WhatIf) []string {
	type part struct {
		words string
		size  float64
	}
	value := r.number.Value
	var parts []part
	for _, d := range doubts {
		if change := 100 * (r.of(d.Values)/value.Value - 1); math.Abs(change) >= 0.05 {
			parts = append(parts, part{fmt.Sprintf("%s: %s", assumption(d.Sensitivity), percent(change)), math.Abs(change)})
		}
	}
	if len(parts) == 0 {
		return nil
	}
	if half := 50 * value.Random.Width() / math.Abs(value.Value); half > 0 {
		parts = append(parts, part{fmt.Sprintf("random error: +-%.1f %%", half), half})
	}
	slices.SortStableFunc(parts, func(a, b part) int { return cmp.Compare(b.size, a.size) })
	var out []string
	for _, p := range parts {
		out = append(out, p.words)
	}
	return out
}

// movedTo is a number under the assumption moved, with its change; empty where
// none is.
func (m Model) movedTo(r row) string {
	w, ok := m.whatIf()
	if !ok || r.of == nil || r.broken() {
		return ""
	}
	return movedWords(r.of(w.Values), r)
}

// effect is what an assumption moved does to each number of a model, in percent.
func effect(w study.WhatIf, was fitting.Result, of func(fitting.Values) float64) string {
	if of(was.Values) == 0 {
		return "-"
	}
	return percent(100 * (of(w.Values)/of(was.Values) - 1))
}
