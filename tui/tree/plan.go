package tree

// plan is where things stand, in lines and cells.
type plan struct {
	width, height int
	list          int // cells of the list
	rows          int // lines of the list, below its head
	plots         int // pictures shown: 0, 1 or 2
	plotWidth     int
	plotHeight    int
	right         bool // pictures right of the list, one below the other
}

// The sizes that decide.
const (
	rightWidth  = 120 // of the area, from which pictures stand right of the list
	listWidth   = 80
	plotsHeight = 16 // of the area, from which pictures stand below the list
	pairWidth   = 70 // from which two pictures stand beside one another
	leastRows   = 4
	gapCells    = 2
)

// plan divides the area: a head, the list under its own head, pictures, and the
// line of warnings.
func (m Model) plan() plan {
	p := plan{width: m.area.Width, height: m.area.Height, list: m.area.Width}
	body := max(p.height-2, 0) // without head and status
	switch {
	case m.waves:
		p.plots, p.plotWidth, p.plotHeight = 2, p.width, body/2
		if body < plotsHeight {
			p.plotWidth, p.plotHeight = (p.width-gapCells)/2, body
		} else {
			p.right = true // one below the other
		}
	case p.width >= rightWidth && body >= plotsHeight:
		p.right, p.list, p.rows = true, listWidth, body-1
		p.plots, p.plotWidth, p.plotHeight = 2, p.width-listWidth-gapCells, body/2
	case p.height >= plotsHeight:
		p.rows = max(body*2/5-1, leastRows)
		p.plotHeight = body - 1 - p.rows
		p.plots, p.plotWidth = 2, (p.width-gapCells)/2
		if p.width < pairWidth {
			p.plots, p.plotWidth = 1, p.width
		}
	default:
		p.rows = max(body-1, 0)
	}
	return p
}

// pair is the size of one of the two pictures of a view that has no list.
func (p plan) pair() (width, height int, below bool) {
	body := max(p.height-3, 0)
	if p.width >= pairWidth && body < 2*plotsHeight {
		return (p.width - gapCells) / 2, body, false
	}
	return p.width, body / 2, true
}
