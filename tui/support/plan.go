package support

// plan is where things stand, in lines and cells.
type plan struct {
	width, height int
	head          int
	plot          int // of the waves
	figures       int // lines of the table below
	picture       int // lines of a picture over the share, with its title
	beside        bool
	status        int
}

// The sizes that decide.
const (
	figureRows   = 5  // with their head
	leastPlot    = 8  // lines of the waves, before there are figures
	besideWidth  = 80 // from here the table of a sweep stands beside its picture
	leastPicture = 9  // lines of a sweep with its title, above the figures of power
	noticeHeight = 16 // of the area, from which there is room for a third line of the head

	shareCells    = 7 // of the columns of the table of a sweep
	identityCells = 7
	ratioCells    = 25
	powerCells    = 20
)

// plan divides the area. It does not depend on share, speed, posing, or view.
func (m Model) plan() plan {
	p := plan{width: m.area.Width, height: m.area.Height, head: 2 + len(m.notice()), status: 1}
	rest := m.area.Height - p.head - p.status
	if rest-figureRows >= leastPlot {
		p.figures = figureRows
	}
	p.plot = max(rest-p.figures, 0)
	p.beside = p.width >= besideWidth
	p.picture = max(rest, 0)
	return p
}

// sweep is the cells of a picture over the share.
func (p plan) sweep(q quantity) int {
	if !p.beside {
		return p.width
	}
	return p.width - q.tableCells() - 2
}

// tableCells is the width of the table of a quantity over the share.
func (q quantity) tableCells() int {
	if q == pulsatilePower {
		return shareCells + 2*(2+powerCells)
	}
	return shareCells + 2 + identityCells + 2 + ratioCells
}
