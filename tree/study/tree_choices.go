package study

import (
	"fmt"
	"math"
	"slices"

	"afterbeat/data"
	"afterbeat/data/casefile"
	"afterbeat/tree/anatomy"
)

// bodyOf is what the case says of the patient's build, with the diameter where
// the root itself was measured.
func bodyOf(b Beats) (anatomy.Body, error) {
	c := b.Intake.Case
	body := anatomy.Unknown()
	for _, one := range []struct {
		key       string
		given     *float64
		into      *float64
		low, high float64
		unit      string
		hint      string
	}{
		{"height_cm", c.HeightCM, &body.Height, 40, 250, "cm", "in cm, for instance --height-cm 172"},
		{"weight_kg", c.WeightKG, &body.Weight, 2, 400, "kg", "in kg, for instance --weight-kg 80"},
		{"age", c.Age, &body.Age, 0, 120, "years", "in years, for instance --age 63"},
		{"pwv_m_s", c.PWV, &body.PulseWave, 2, 25, "m/s", "carotid to femoral, in m/s, for instance --pwv-m-s 8.5"},
	} {
		if one.given == nil {
			continue
		}
		if *one.into = *one.given; !(*one.into >= one.low && *one.into <= one.high) {
			return body, &ChoiceError{Key: one.key, What: fmt.Sprintf("%v is not between %g and %g %s", *one.given, one.low, one.high, one.unit), Hint: one.hint}
		}
	}
	if c.Sex != "" && c.Sex != "female" && c.Sex != "male" {
		return body, &ChoiceError{Key: "sex", What: fmt.Sprintf("%q is neither", data.Clean(c.Sex)), Hint: "--sex female or --sex male"}
	}
	if err := vesselsOf(c, &body); err != nil {
		return body, err
	}
	if v := b.FlowInfo.Conversion; v != nil && b.FlowInfo.Site == data.SiteRoot && c.DiameterCM != nil {
		body.RootDiameter = *c.DiameterCM
	}
	return body, nil
}

// vesselsOf reads the diameters that were measured beside the recording.
func vesselsOf(c casefile.Case, body *anatomy.Body) error {
	if c.Tree != "" && len(c.VesselCM) > 0 {
		return &ChoiceError{Key: "vessel_cm", What: "the table of --tree has radii of its own", Hint: "write the radius into the table, or leave --tree out"}
	}
	for _, name := range sorted(c.VesselCM) {
		refused := func(what string) error {
			return &ChoiceError{Key: "vessel_cm", What: what, Hint: "an inner diameter in cm, for instance --vessel-cm carotid=0.65"}
		}
		site := data.Site(name)
		if !slices.Contains(data.Sites(), site) {
			return refused(fmt.Sprintf("%q is no site", data.Clean(name)))
		}
		v := c.VesselCM[name]
		if !(v >= 0.05 && v <= 6) {
			return refused(fmt.Sprintf("%v is not between 0.05 and 6 cm", v))
		}
		if site == data.SiteRoot {
			body.RootDiameter = v
			continue
		}
		if body.Diameters == nil {
			body.Diameters = map[data.Site]float64{}
		}
		body.Diameters[site] = v
	}
	return nil
}

// brainFlow is the flow that the case gives the brain, mL/s; 0 where its share
// of the output rules.
func brainFlow(c casefile.Case) (float64, error) {
	if c.BrainFlow == nil {
		return 0, nil
	}
	if v := *c.BrainFlow; !(v >= 50 && v <= 3000) {
		return math.NaN(), &ChoiceError{Key: "brain_flow_ml_min", What: fmt.Sprintf("%v is not between 50 and 3000 mL/min", v), Hint: "for instance --brain-flow-ml-min 660"}
	}
	return *c.BrainFlow / 60, nil
}
