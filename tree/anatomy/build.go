package anatomy

import (
	"fmt"
	"math"

	"afterbeat/data"
	"afterbeat/tree"
)

// Load is what the lumped fit says of the tree as a whole.
type Load struct {
	Resistance      float64 // total, Z(0), mmHg s/mL
	Compliance      float64 // mL/mmHg
	MeanFlow        float64 // mL/s
	OutflowPressure float64 // mmHg
}

// Tree is a patient's tree with how it came about.
type Tree struct {
	Network tree.Network
	Source  string
	Scales  []Scale // on the table, with their reasons
	// Calibre is the doubt about the calibre of the root, Stiffness that about
	// the stiffness of the walls, before a recording is looked at: one standard
	// deviation of the logarithm of the factor.
	Calibre, Stiffness float64
	// Own tells that the tree is the user's own table.
	Own      bool
	Warnings []data.Warning
}

// The doubts before the recording is looked at: assumptions. They are standard
// deviations of logarithms.
const (
	wideDoubt      = 0.69 // a factor of 2 either way
	calibreDoubt   = 0.25
	measuredRadius = 0.05 // the calibre of the root was measured
	measuredSpeed  = 0.15 // so was the wave speed: 7 % of it, twice that of its square
	agedSpeed      = 0.40 // the wave speed of an age
)

// mostWall is the most of the compliance that walls have.
const mostWall = 0.9

// Systemic is the embedded table scaled to a body and a load. brain is the
// brain's flow in mL/s; 0: by its share of the organ table.
func Systemic(b Body, l Load, brain float64) (Tree, error) {
	rows := published(true)
	t := Tree{Source: Source, Calibre: calibreDoubt, Stiffness: wideDoubt}
	length, radius := b.lengths(), b.radii()
	n := tree.Network{Blood: tree.StandardBlood(), OutflowPressure: l.OutflowPressure}
	for _, v := range rows {
		s := tree.Segment{
			ID: v.id, Parent: v.parent, Name: v.name, Bed: v.bed,
			Length: v.length * length.Factor, Radius: v.radius() * radius.Factor, WaveSpeed: v.speed(),
		}
		if !math.IsNaN(v.terminal) {
			s.Terminal = &tree.Terminal{}
		}
		n.Segments = append(n.Segments, s)
	}
	t.Scales = []Scale{length, radius}
	if calibre, measured := b.calibre(n.Segments[0].Radius); measured {
		for _, i := range trunk(n) {
			n.Segments[i].Radius *= calibre.Factor
		}
		t.Calibre, t.Scales = measuredRadius, append(t.Scales, calibre)
	}
	vessels, err := b.measured(n)
	if err != nil {
		return t, err
	}
	t.Scales = append(t.Scales, vessels...)
	speed, warnings := t.speeds(b, n, l.Compliance)
	for i := range n.Segments {
		n.Segments[i].WaveSpeed *= speed.Factor
	}
	t.Scales, t.Warnings = append(t.Scales, speed), warnings
	if err := share(&n, l.Resistance, shares(rows, brain/l.MeanFlow)); err != nil {
		return t, err
	}
	shareCompliance(&n, l.Compliance-ComplianceOfWalls(n))
	t.Network = n
	return t, nil
}

// speeds is the factor on the wave speeds of the table, and sets the doubt about
// stiffness.
func (t *Tree) speeds(b Body, n tree.Network, compliance float64) (Scale, []data.Warning) {
	wall := ComplianceOfWalls(n)
	byCompliance := math.Sqrt(wall / (compliance * tableWall / (tableWall + tableTerminals)))
	s := Scale{Name: "wave speeds", Factor: byCompliance, Why: "so that the walls have the table's part of the fitted C, 0.640 of 1.2"}
	wanted, from := b.PulseWave, "measured"
	switch {
	case !math.IsNaN(b.PulseWave):
		s.Given, t.Stiffness = true, measuredSpeed
	case !math.IsNaN(b.Age):
		wanted, from = VelocityOfAge(b.Age), fmt.Sprintf("the median of healthy people of %g years", b.Age)
		t.Stiffness = agedSpeed
	default:
		return s, nil
	}
	own := PulseWaveVelocity(n)
	s.Factor, s.Why = wanted/own, fmt.Sprintf("carotid-femoral velocity %.3g m/s (%s) over the table's %.3g m/s", wanted, from, own)
	least := math.Sqrt(wall / (mostWall * compliance))
	if s.Factor >= least {
		return s, nil
	}
	w := data.Warning{
		Code: data.CodeTreeStretched,
		Text: fmt.Sprintf("at a pulse-wave velocity of %.3g m/s the walls of the tree alone would have %.2g mL/mmHg, and the fit says %.2g in all", wanted, wall/(s.Factor*s.Factor), compliance),
		Cure: "a measured velocity (--pwv-m-s), height and weight; or look at the flow that the fit stands on",
	}
	s.Factor, s.Why = least, s.Why+"; raised until the walls have nine tenths of the fitted C"
	return s, []data.Warning{w}
}

// Given is the user's own tree, as it is written, against the outflow pressure
// of the load.
func Given(name string, n tree.Network, l Load) Tree {
	n = n.Clone()
	n.OutflowPressure = l.OutflowPressure
	return Tree{Network: n, Source: name, Own: true, Calibre: calibreDoubt, Stiffness: wideDoubt}
}
