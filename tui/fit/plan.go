package fit

// plan is where things stand, in lines and cells.
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
	wideWidth   = 140 // from here the what-if has a column of its own
	headHeight  = 14  // from here the numbers have a head, and there is advice
	stackHeight = 9   // of the plot, from which the residual has its own
	tallHeight  = 34  // from here there is the table of what-ifs
	leastPlot   = 6
)

// plan divides the area. It does not depend on the item shown, on the cursor,
// nor on what is moved.
func (m Model) plan() plan {
	p := plan{width: m.area.Width, beside: m.area.Width >= besideWidth, status: 1}
	rows, most := 0, 0
	size := map[string]int{}
	for _, one := range m.items {
		if one.fitted() {
			size[one.group]++
			most = max(most, size[one.group])
		}
		rows = max(rows, len(one.rows))
	}
	if m.area.Height >= headHeight {
		p.head, p.advice = 1, 2
	}
	p.numbers = p.head + rows
	compare := 0
	if len(m.items) > 1 {
		compare = p.head + max(most, 1)
	}
	rest := m.area.Height - p.status - p.advice
	switch {
	case p.beside:
		p.numbers = max(p.numbers, compare)
	case rest-p.numbers-compare >= leastPlot:
		p.compare = compare
	}
	if m.fits() > 0 && m.area.Height >= tallHeight {
		p.assumptions = 2 + m.moves()
	}
	p.plot = max(rest-p.numbers-p.compare-p.assumptions, 0)
	p.stacked = p.plot >= stackHeight && m.fits() > 0
	return p
}
