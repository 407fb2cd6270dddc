package anatomy

import (
	"fmt"
	"math"

	"afterbeat/tree"
)

// mmHg is 1 mmHg in dyn/cm².
const mmHg = 1333.22387415

// RefusedError says why no tree can be made for a patient.
type RefusedError struct{ What, Cure string }

func (e *RefusedError) Error() string { return e.What }

// poiseuille is the steady resistance of a segment of one radius, mmHg s/mL:
// 8 mu l/(pi r⁴).
func poiseuille(s tree.Segment, viscosity float64) float64 {
	return 8 * viscosity * s.Length / (math.Pi * math.Pow(s.Radius, 4)) / mmHg
}

// leastTerminal is the least that a terminal keeps of the total resistance over
// its share: below, the arteries on the way would take nearly all of it.
const leastTerminal = 0.05

// share gives every terminal the resistance by which its flow is its part of
// the whole, and the whole has the total resistance. It returns what stands
// between root and outflow at each terminal, by index of segment.
func share(n *tree.Network, total float64, parts map[string]float64) error {
	order, parent, err := n.Order()
	if err != nil {
		return err
	}
	through := make([]float64, len(n.Segments)) // part of the flow
	for k := len(order) - 1; k >= 0; k-- {
		i := order[k]
		if n.Segments[i].Terminal != nil {
			through[i] = parts[n.Segments[i].ID]
		}
		if p := parent[i]; p >= 0 {
			through[p] += through[i]
		}
	}
	drop := make([]float64, len(n.Segments)) // of pressure, over that across the whole
	for _, i := range order {
		if p := parent[i]; p >= 0 {
			drop[i] = drop[p]
		}
		drop[i] += poiseuille(n.Segments[i], n.Blood.Viscosity) * through[i] / total
		t := n.Segments[i].Terminal
		if t == nil {
			continue
		}
		if !(1-drop[i] >= leastTerminal) {
			return &RefusedError{
				What: fmt.Sprintf("the arteries to %s alone take %.0f %% of the fitted resistance of %.3g mmHg s/mL", n.Segments[i].Name, 100*drop[i], total),
				Cure: "a resistance so low, or arteries so narrow, need a look: the unit of the flow, the height, --tree",
			}
		}
		setResistance(n, i, total*(1-drop[i])/through[i])
	}
	return nil
}

// setResistance divides a terminal's resistance: R1 = min(rho c/A, 0.9 R).
func setResistance(n *tree.Network, i int, r float64) {
	s := &n.Segments[i]
	s.Terminal.R1 = min(Characteristic(*s, n.Blood.Density), largestTerminal*r)
	s.Terminal.R2 = r - s.Terminal.R1
}

// Characteristic is rho c/A at the outlet, mmHg s/mL.
func Characteristic(s tree.Segment, density float64) float64 {
	r := s.Outlet()
	return density * s.Speed(r, density) / (math.Pi * r * r) / mmHg
}

// ComplianceOfWalls is that of all walls of a tree, sum of A l/(rho c²), mL/mmHg.
func ComplianceOfWalls(n tree.Network) float64 {
	sum := 0.0
	for _, s := range n.Segments {
		sum += wallCompliance(s, n.Blood.Density)
	}
	return sum
}

// wallPieces is how many pieces the compliance of a tapering segment is summed
// over.
const wallPieces = 64

func wallCompliance(s tree.Segment, density float64) float64 {
	piece := func(r float64) float64 {
		c := s.Speed(r, density)
		return math.Pi * r * r / (density * c * c) * mmHg
	}
	if s.Outlet() == s.Radius {
		return piece(s.Radius) * s.Length
	}
	sum := 0.0
	for k := range wallPieces {
		sum += piece(s.Radius + (s.Outlet()-s.Radius)*(float64(k)+0.5)/wallPieces)
	}
	return sum / wallPieces * s.Length
}

// ComplianceOfTerminals is that of all terminals, mL/mmHg.
func ComplianceOfTerminals(n tree.Network) float64 {
	sum := 0.0
	for _, s := range n.Segments {
		if s.Terminal != nil {
			sum += s.Terminal.C
		}
	}
	return sum
}

// brainPart is the part of a terminal's share of compliance that the brain's
// have: within the skull arteries hardly widen. An assumption, by which the
// pulsatility index of the carotid's flow comes to the published one near 1
// (values.md 5.2); with a full share it would be above 2.
const brainPart = 0.1

// shareCompliance gives the terminals c mL/mmHg in all, by 1/R, less to those of
// the brain.
func shareCompliance(n *tree.Network, c float64) {
	weight := func(s tree.Segment) float64 {
		w := 1 / (s.Terminal.R1 + s.Terminal.R2)
		if s.Bed == "brain" {
			w *= brainPart
		}
		return w
	}
	sum := 0.0
	for _, s := range n.Segments {
		if s.Terminal != nil {
			sum += weight(s)
		}
	}
	for _, s := range n.Segments {
		if s.Terminal != nil {
			s.Terminal.C = c * weight(s) / sum
		}
	}
}
