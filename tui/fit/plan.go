package fit

import "afterbeat/fitting"

// plan is where things stand, in lines.
type plan struct {
	width, plot int
	stacked     bool // the residual has a plot of its own
	beside      bool // the comparison stands beside the numbers
	head        int  // of the numbers
	numbers     int  // with their head and, where it stands beside, the comparison
	compare     int  // below the numbers
	assumptions int  // the table of what-ifs
	advice      int
	status      int
}

// The sizes that decide.
const (
	besideWidth = 80
	headHeight  = 14 // from here the numbers have a head, and there is advice
	stackHeight = 11 // of the plot, from which the residual has its own
	tallHeight  = 34 // from here there is the table of what-ifs
	leastPlot   = 6
)

// bases is on how many bases models were fitted.
func bases(results []fitting.Result) int {
	seen := map[string]bool{}
	for _, r := range results {
		seen[r.Basis] = true
	}
	return len(seen)
}

// plan divides the area. It does not depend on the model shown, on the cursor,
// nor on what is moved.
func (m Model) plan() plan {
	p := plan{width: m.area.Width, beside: m.area.Width >= besideWidth, status: 1}
	rows, models := 0, m.count()
	for _, s := range m.sheets {
		rows = max(rows, len(s.rows))
	}
	if m.area.Height >= headHeight {
		p.head, p.advice = 1, 2
	}
	p.numbers = p.head + rows
	compare := 0
	if models > 0 {
		compare = 2 + models/bases(m.fit.Results)
	}
	rest := m.area.Height - p.status - p.advice
	switch {
	case p.beside:
		p.numbers = max(p.numbers, p.head+compare-1)
	case rest-p.numbers-compare >= leastPlot:
		p.compare = compare
	}
	if models > 0 && m.fit.Chosen >= 0 && m.area.Height >= tallHeight {
		p.assumptions = 2 + len(m.fit.Sensitivity) + len(m.decays())
	}
	p.plot = max(rest-p.numbers-p.compare-p.assumptions, 0)
	p.stacked = p.plot >= stackHeight && models > 0
	return p
}
