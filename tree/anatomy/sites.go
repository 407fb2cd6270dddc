package anatomy

import (
	"math"
	"slices"
	"strings"

	"afterbeat/data"
	"afterbeat/tree"
)

// Place is one end of a segment.
type Place struct {
	Segment int // index in the network
	Outlet  bool
}

// sites are the words of a name that tell where a site lies in a tree, the best
// first, and at which end of that segment it is.
var sites = map[data.Site]struct {
	words  []string
	outlet bool
	region Region
}{
	data.SiteCarotid:  {[]string{"common carotid", "carotid"}, true, Neck},
	data.SiteMCA:      {[]string{"middle cerebral", "internal carotid"}, true, Brain},
	data.SiteBrachial: {[]string{"brachial", "subclavian ii", "subclavian"}, true, Arm},
	data.SiteRadial:   {[]string{"radial"}, true, Arm},
	data.SiteFinger:   {[]string{"radial"}, true, Arm},
	data.SiteFemoral:  {[]string{"femoral"}, false, Leg},
	data.SiteRenal:    {[]string{"renal"}, false, Belly},
}

// Find is where a site lies in a tree: at its root for all of the output, else
// by the names of the segments, on the right where there are two.
func Find(n tree.Network, site data.Site) (Place, bool) {
	if site.Systemic() || site == data.SiteOther {
		i := slices.IndexFunc(n.Segments, func(s tree.Segment) bool { return s.Parent == "" })
		return Place{Segment: i}, i >= 0
	}
	of, ok := sites[site]
	if !ok {
		return Place{}, false
	}
	for _, word := range of.words {
		best := -1
		for i, s := range n.Segments {
			name := strings.ToLower(s.Name)
			if !strings.Contains(name, word) || strings.Contains(name, "deep") {
				continue
			}
			right := strings.HasPrefix(name, "r.") || strings.Contains(name, "right")
			if best < 0 || right && !isRight(n.Segments[best].Name) {
				best = i
			}
		}
		if best >= 0 {
			return Place{best, of.outlet}, true
		}
	}
	return Place{}, false
}

func isRight(name string) bool {
	name = strings.ToLower(name)
	return strings.HasPrefix(name, "r.") || strings.Contains(name, "right")
}

// path are the indices of the segments from the root to segment i, i included.
func path(n tree.Network, i int) []int {
	var out []int
	for i >= 0 && len(out) <= len(n.Segments) {
		out = append(out, i)
		i = n.Find(n.Segments[i].Parent)
	}
	slices.Reverse(out)
	return out
}

// PulseWaveVelocity is the carotid-femoral velocity of a tree, m/s: the
// difference of the ways from the root to the femoral and to the carotid artery,
// over that of the times at the inviscid wave speeds. NaN where the tree has
// neither by name.
func PulseWaveVelocity(n tree.Network) float64 {
	way := func(site data.Site) (length, time float64) {
		at, ok := Find(n, site)
		if !ok {
			return math.NaN(), math.NaN()
		}
		segments := path(n, at.Segment)
		if !at.Outlet {
			segments = segments[:len(segments)-1]
		}
		for _, i := range segments {
			s := n.Segments[i]
			length += s.Length
			time += s.Length / s.Speed((s.Radius+s.Outlet())/2, n.Blood.Density)
		}
		return length, time
	}
	far, late := way(data.SiteFemoral)
	near, early := way(data.SiteCarotid)
	return (far - near) / (late - early) / 100
}

// trunkRadius is the least radius of the trunk over that of the root, and
// forkRadius that of a second daughter over the widest at which the aorta ends.
const (
	trunkRadius = 0.5
	forkRadius  = 0.9
)

// trunk are the segments whose calibre is that of the root: the aorta as long as
// it has half of the root's radius. Their characteristic impedance is what a fit
// at the root sees.
func trunk(n tree.Network) []int {
	all := aorta(n)
	for k, i := range all {
		if n.Segments[i].Radius < trunkRadius*n.Segments[all[0]].Radius {
			return all[:k]
		}
	}
	return all
}

// aorta are the segments from the root along the widest daughter, to where two
// are as wide.
func aorta(n tree.Network) []int {
	root, _ := Find(n, data.SiteRoot)
	out := []int{root.Segment}
	for {
		last := n.Segments[out[len(out)-1]].ID
		best, second := -1, 0.0
		for i, s := range n.Segments {
			switch {
			case s.Parent != last:
			case best < 0 || s.Radius > n.Segments[best].Radius:
				if best >= 0 {
					second = n.Segments[best].Radius
				}
				best = i
			default:
				second = max(second, s.Radius)
			}
		}
		if best < 0 || second >= forkRadius*n.Segments[best].Radius {
			return out
		}
		out = append(out, best)
	}
}
