package tree

import (
	"math"
	"testing"

	"afterbeat/data"
	"afterbeat/data/unit"
)

// ladder is a tree as an electrical network in time: each segment is cells of
// R and L in series and C to ground, halves of C at both ends, pressures at the
// nodes and flows between them half a step apart (leapfrog; resistance and
// terminals by the trapezoidal rule). All of second order in cell and step.
type ladder struct {
	n        Network
	cells    int
	step     float64
	flows    [][]float64 // between nodes, of each segment
	nodes    [][]float64 // pressures, the first one shared with the parent's last
	parent   []int
	stored   []float64 // pressure on the terminal's C
	inertia  []float64
	friction []float64
	store    []float64 // C of a whole cell
}

func newLadder(t *testing.T, n Network, cells int, step float64) *ladder {
	_, parent, err := n.Order()
	if err != nil {
		t.Fatal(err)
	}
	l := &ladder{n: n, cells: cells, step: step, parent: parent, stored: make([]float64, len(n.Segments))}
	for _, s := range n.Segments {
		area, dx, rho := math.Pi*s.Radius*s.Radius, s.Length/float64(cells), n.Blood.Density
		c := s.Speed(s.Radius, rho)
		l.flows, l.nodes = append(l.flows, make([]float64, cells)), append(l.nodes, make([]float64, cells+1))
		l.inertia = append(l.inertia, rho*dx/area/unit.DynPerMmHg)
		l.friction = append(l.friction, 8*n.Blood.Viscosity*dx*math.Pi/(area*area)/unit.DynPerMmHg)
		l.store = append(l.store, area*dx/(rho*c*c)*unit.DynPerMmHg)
	}
	return l
}

// advance moves pressures by a step, under a flow into the root in its middle, then
// the flows, which belong to the middle of the next step.
func (l *ladder) advance(inflow float64) {
	for i := range l.n.Segments {
		p, q := l.nodes[i], l.flows[i]
		for j := 1; j < l.cells; j++ {
			p[j] += l.step * (q[j-1] - q[j]) / l.store[i]
		}
	}
	for i, s := range l.n.Segments {
		end, in, store := l.cells, l.flows[i][l.cells-1], l.store[i]/2
		if s.Terminal != nil {
			// store dP = in - (P - Pc)/R1, C dPc = (P - Pc)/R1 - Pc/R2, both trapezoidal
			g1, g2, h := 1/s.Terminal.R1, 1/s.Terminal.R2, l.step/2
			p, c := l.nodes[i][end], l.stored[i]
			a, b := store/h+g1, s.Terminal.C/h+g1+g2
			rightP := store/h*p + 2*in - g1*(p-c)
			rightC := s.Terminal.C/h*c + g1*(p-c) - g2*c
			d := a*b - g1*g1
			l.nodes[i][end], l.stored[i] = (rightP*b+g1*rightC)/d, (rightC*a+g1*rightP)/d
			continue
		}
		out := 0.0
		for d, parent := range l.parent {
			if parent == i {
				out += l.flows[d][0]
				store += l.store[d] / 2
			}
		}
		l.nodes[i][end] += l.step * (in - out) / store
	}
	for i, parent := range l.parent {
		if parent >= 0 {
			l.nodes[i][0] = l.nodes[parent][l.cells]
		} else {
			l.nodes[i][0] += l.step * (inflow - l.flows[i][0]) / (l.store[i] / 2)
		}
		for j := range l.cells {
			x, r := l.inertia[i]/l.step, l.friction[i]/2
			l.flows[i][j] = ((x-r)*l.flows[i][j] + l.nodes[i][j] - l.nodes[i][j+1]) / (x + r)
		}
	}
}

// A ladder of the same constants as the Poiseuille line, run in time until it is
// periodic: an independent method. Its distance to the solution in frequency falls
// as the square of the length of a cell.
func TestLadderInTime(t *testing.T) {
	n := Network{Blood: Blood{Density: 1.06, Viscosity: 0.2}, Line: Poiseuille, Segments: []Segment{
		{ID: "trunk", Length: 24, Radius: 0.9, WaveSpeed: 500},
		{ID: "one", Parent: "trunk", Length: 20, Radius: 0.5, WaveSpeed: 620, Terminal: &Terminal{R1: 0.3, R2: 1.5, C: 0.1}},
		{ID: "two", Parent: "trunk", Length: 32, Radius: 0.4, WaveSpeed: 700, Terminal: &Terminal{R1: 0.6, R2: 2, C: 0.08}},
	}}
	const period, samples = 0.8, 64
	inflow := func(at float64) float64 {
		x := 2 * math.Pi * at / period
		return 70 + 60*math.Sin(x) + 30*math.Cos(2*x) - 20*math.Sin(3*x) + 8*math.Cos(5*x)
	}
	flow := data.Period{Samples: make([]float64, samples), Rate: samples / period}
	for j := range flow.Samples {
		flow.Samples[j] = inflow(float64(j) / flow.Rate)
	}
	state := mustSolve(t, n, flow)
	distance := func(cells int) float64 {
		steps := 40 * cells // of a period, a multiple of the samples
		l := newLadder(t, n, cells, period/float64(steps))
		const periods = 22
		worst := 0.0
		for k := range periods * steps {
			if k >= (periods-1)*steps && k%(steps/samples) == 0 {
				j := k % steps / (steps / samples)
				for i, e := range []End{Inlet, Outlet, Outlet} {
					place := []int{0, cells, cells}[i]
					worst = max(worst, math.Abs(l.nodes[i][place]-state.Pressure(i, e).Samples[j]))
				}
			}
			l.advance(inflow((float64(k) + 0.5) * l.step))
		}
		return worst
	}
	coarse, fine := distance(16), distance(32)
	finest := distance(64)
	t.Logf("distance of cells of L/16, L/32, L/64: %.3g, %.3g, %.3g mmHg", coarse, fine, finest)
	for _, order := range []float64{math.Log2(coarse / fine), math.Log2(fine / finest)} {
		if order < 1.8 || order > 2.3 {
			t.Errorf("the distance falls with order %.2f", order)
		}
	}
	if _, pulse := state.Ranges(0, Inlet); finest > 5e-3*pulse.Pulse {
		t.Errorf("off by %g mmHg", finest)
	}
}
