package anatomy

import (
	"fmt"
	"maps"
	"math"
	"slices"

	"afterbeat/data"
	"afterbeat/tree"
)

// Body is what is known of the patient's build. NaN is unknown.
type Body struct {
	Height       float64 // cm
	Weight       float64 // kg
	Age          float64 // years
	PulseWave    float64 // measured carotid-femoral velocity, m/s
	RootDiameter float64 // measured, cm
	// Diameters are inner diameters measured of other arteries, cm, by the site
	// that lies in them.
	Diameters map[data.Site]float64
}

// Unknown is a body of which nothing is known.
func Unknown() Body {
	n := math.NaN()
	return Body{n, n, n, n, n, nil}
}

// The body that the table is taken to be of: an assumption.
const (
	tableHeight = 175.0 // cm
	tableWeight = 70.0  // kg
)

// SurfaceArea is Du Bois' 0.007184 W^0.425 H^0.725, m², of kg and cm (1916, from
// memory).
func SurfaceArea(height, weight float64) float64 {
	return 0.007184 * math.Pow(weight, 0.425) * math.Pow(height, 0.725)
}

// Scale is a factor on the table with its reason.
type Scale struct {
	Name   string // "lengths"
	Factor float64
	Why    string
	// Given tells that a measurement of the patient stands behind it.
	Given bool
}

// lengths and radii as the body has them.
func (b Body) lengths() Scale {
	if math.IsNaN(b.Height) {
		return Scale{Name: "lengths", Factor: 1, Why: "as in the table: no height was given"}
	}
	return Scale{"lengths", b.Height / tableHeight, fmt.Sprintf("height %g cm over the table's %g cm (assumed)", b.Height, tableHeight), true}
}

func (b Body) radii() Scale {
	s := Scale{Name: "radii", Factor: 1, Why: "as in the table: no height and weight were given"}
	switch {
	case !math.IsNaN(b.Height + b.Weight):
		area := SurfaceArea(b.Height, b.Weight)
		s.Factor = math.Sqrt(area / SurfaceArea(tableHeight, tableWeight))
		s.Why, s.Given = fmt.Sprintf("root of body surface area %.3g m2 over the table's %.3g m2 (assumed)", area, SurfaceArea(tableHeight, tableWeight)), true
	case !math.IsNaN(b.Height):
		s.Factor, s.Given = b.Height/tableHeight, true
		s.Why = "as the lengths: no weight was given"
	}
	return s
}

// calibre is the factor on the radii of the trunk, beside that on all; false
// where the root was not measured. A diameter of the root says little of the
// small arteries, whose resistance goes with the fourth power.
func (b Body) calibre(root float64) (Scale, bool) {
	return Scale{"calibre of the root", b.RootDiameter / 2 / root, fmt.Sprintf("diameter %g cm measured at the root over %.3g cm", b.RootDiameter, 2*root), true}, !math.IsNaN(b.RootDiameter)
}

// measured gives the arteries of the sites their measured diameters, on both sides
// of the body.
func (b Body) measured(n tree.Network) ([]Scale, error) {
	var all []Scale
	for _, site := range slices.Sorted(maps.Keys(b.Diameters)) {
		at, ok := Find(n, site)
		if !ok || at.Segment == 0 {
			return nil, &RefusedError{
				What: fmt.Sprintf("a diameter was given of %s, which is no artery of the tree", site),
				Cure: "a site that is one: carotid, mca, brachial, radial, femoral, renal; or the root",
			}
		}
		s := n.Segments[at.Segment]
		factor := b.Diameters[site] / 2 / s.Radius
		name := bothSides(s.Name)
		for i := range n.Segments {
			if bothSides(n.Segments[i].Name) == name {
				n.Segments[i].Radius *= factor
			}
		}
		all = append(all, Scale{"calibre of the " + string(site) + " artery", factor, fmt.Sprintf("diameter %g cm measured over %.3g cm, on both sides", b.Diameters[site], 2*s.Radius), true})
	}
	return all, nil
}

// velocityOfAge are medians of the carotid-femoral velocity of healthy people,
// m/s, in the middle of their decades (Reference Values for Arterial Stiffness
// Collaboration 2010, Eur Heart J 31:2338; from memory).
var velocityOfAge = []struct{ age, velocity float64 }{
	{25, 6.1}, {35, 6.4}, {45, 6.9}, {55, 8.1}, {65, 9.7}, {75, 10.6},
}

// VelocityOfAge is the median carotid-femoral pulse-wave velocity of healthy
// people of an age in years, m/s, linear between the middles of the decades and
// constant beyond 25 and 75.
func VelocityOfAge(age float64) float64 {
	t := velocityOfAge
	if age <= t[0].age {
		return t[0].velocity
	}
	for i := 1; i < len(t); i++ {
		if age <= t[i].age {
			f := (age - t[i-1].age) / (t[i].age - t[i-1].age)
			return t[i-1].velocity + f*(t[i].velocity-t[i-1].velocity)
		}
	}
	return t[len(t)-1].velocity
}
