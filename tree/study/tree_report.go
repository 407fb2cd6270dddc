package study

import (
	"math"
	"math/cmplx"

	"afterbeat/data"
	"afterbeat/tree/anatomy"
)

// TreeReport is the patient's tree in `study --json`.
type TreeReport struct {
	Source      string             `json:"source"`
	Scales      []ScaleReport      `json:"scales"`
	Multipliers []MultiplierReport `json:"multipliers"`
	Compliance  EstimateReport     `json:"total_compliance"`
	Walls       Number             `json:"wall_compliance"`
	Lumped      EstimateReport     `json:"lumped_compliance"`
	Resistance  EstimateReport     `json:"total_resistance"`
	RMSE        Number             `json:"rmse_mmHg"`
	Converged   bool               `json:"converged"`
	// Impedance is that at the root by harmonic, [re, im], 0 first.
	Impedance [][2]Number    `json:"root_input_impedance"`
	Segments  []ArteryReport `json:"segments"`
	Beds      []BedReport    `json:"beds"`
	// BrainByFlow is the brain with its flow defended; null where output is not
	// low, or the flow was given.
	BrainByFlow *BedReport     `json:"brain_by_flow"`
	Distal      []DistalReport `json:"distal"`
}

// ScaleReport is a factor on the table.
type ScaleReport struct {
	Name   string `json:"name"`
	Factor Number `json:"factor"`
	Why    string `json:"why"`
}

// MultiplierReport is a factor of the refinement.
type MultiplierReport struct {
	Name string `json:"name"`
	EstimateReport
	BeforeLow  Number `json:"before_low"`
	BeforeHigh Number `json:"before_high"`
}

// ArteryEndReport is pressure and flow at one end of a segment.
type ArteryEndReport struct {
	Pressure RangeReport `json:"pressure"`
	Flow     RangeReport `json:"flow"`
}

// ArteryReport is a segment of the refined tree; r1, c and r2 are null inside it.
type ArteryReport struct {
	ID           string          `json:"id"`
	Parent       *string         `json:"parent"`
	Name         string          `json:"name"`
	Bed          *string         `json:"bed"`
	Length       Number          `json:"length_cm"`
	Radius       Number          `json:"radius_cm"`
	RadiusDistal Number          `json:"radius_distal_cm"`
	WaveSpeed    Number          `json:"wave_speed_m_s"`
	R1           Number          `json:"r1"`
	C            Number          `json:"c"`
	R2           Number          `json:"r2"`
	Inlet        ArteryEndReport `json:"inlet"`
	Outlet       ArteryEndReport `json:"outlet"`
	GoslingPI    Number          `json:"gosling_pi_flow"`
}

// BedReport is a bed.
type BedReport struct {
	Bed           string      `json:"bed"`
	Terminals     []string    `json:"terminals"`
	Flow          RangeReport `json:"flow"`
	Share         Number      `json:"share"`
	MeanPressure  Number      `json:"mean_pressure"`
	PulsePressure Number      `json:"pulse_pressure"`
	GoslingPI     Number      `json:"gosling_pi_flow"`
}

// DistalReport is a distal trace beside what the tree makes there. Of a velocity
// the numbers are over its mean.
type DistalReport struct {
	Channel   data.Text `json:"channel"`
	Site      data.Site `json:"site"`
	Place     string    `json:"place"`
	HeldOut   bool      `json:"held_out"`
	OverMean  bool      `json:"over_mean"`
	Measured  Number    `json:"swing_measured"`
	Predicted Number    `json:"swing_predicted"`
	RMSE      Number    `json:"rmse"`
}

// ResponseReport is how fast the beds follow a step at the root.
type ResponseReport struct {
	Flow     []BedResponseReport `json:"flow_step"`
	Pressure []BedResponseReport `json:"pressure_step"`
}

// BedResponseReport is that of one bed.
type BedResponseReport struct {
	Bed string `json:"bed"`
	T50 Number `json:"t50_s"`
	T90 Number `json:"t90_s"`
}

// report puts the tree into the report.
func (t *Tree) report(r *Report) {
	r.TreeReason = reason(t.Reason)
	if t.Reason != "" {
		return
	}
	out := &TreeReport{
		Source: t.Tree.Source, Compliance: estimateReport(t.Compliance), Walls: Number(t.Walls), Lumped: estimateReport(t.Lumped),
		Resistance: estimateReport(t.Resistance), RMSE: Number(t.Pressure.RMSE), Converged: t.Converged,
		Scales: []ScaleReport{}, Distal: []DistalReport{},
	}
	for _, s := range t.Tree.Scales {
		out.Scales = append(out.Scales, ScaleReport{s.Name, Number(s.Factor), s.Why})
	}
	for _, f := range t.Factors {
		out.Multipliers = append(out.Multipliers, MultiplierReport{f.Name, estimateReport(f.Estimate), Number(f.Before.Low), Number(f.Before.High)})
	}
	for _, z := range t.Root {
		out.Impedance = append(out.Impedance, [2]Number{Number(real(z)), Number(imag(z))})
	}
	for _, s := range t.Segments {
		out.Segments = append(out.Segments, t.arteryReport(s))
	}
	for _, b := range t.Beds {
		out.Beds = append(out.Beds, t.bedReport(b))
	}
	if t.BrainByFlow != nil {
		b := t.bedReport(*t.BrainByFlow)
		out.BrainByFlow = &b
	}
	for _, d := range t.Distal {
		out.Distal = append(out.Distal, distalReport(d))
	}
	r.Tree = out
	if t.Response == nil {
		return
	}
	r.Response = &ResponseReport{bedResponses(t.Response.Flow), bedResponses(t.Response.Pressure)}
}

func bedResponses(all []BedResponse) []BedResponseReport {
	out := []BedResponseReport{}
	for _, b := range all {
		out = append(out, BedResponseReport{b.Bed, Number(b.T50), Number(b.T90)})
	}
	return out
}

func spanReport(p data.Period) RangeReport {
	low, high := p.Extremes()
	return RangeReport{Number(p.Mean()), Number(low), Number(high)}
}

func (t *Tree) arteryReport(s TreeSegment) ArteryReport {
	end := func(p, q data.Period) ArteryEndReport { return ArteryEndReport{spanReport(p), spanReport(q)} }
	out := ArteryReport{
		ID: s.ID, Parent: reason(s.Segment.Parent), Name: s.Name, Bed: reason(s.Bed),
		Length: Number(s.Length), Radius: Number(s.Radius), RadiusDistal: Number(s.Segment.Outlet()),
		WaveSpeed: Number(s.Speed((s.Radius+s.Segment.Outlet())/2, t.Network.Blood.Density) / 100),
		R1:        nan, C: nan, R2: nan, GoslingPI: Number(s.FlowMeasures.GoslingPI),
		Inlet: end(s.Waves.Inlet.Pressure, s.Waves.Inlet.Flow), Outlet: end(s.Waves.Outlet.Pressure, s.Waves.Outlet.Flow),
	}
	if x := s.Segment.Terminal; x != nil {
		out.R1, out.C, out.R2 = Number(x.R1), Number(x.C), Number(x.R2)
	}
	return out
}

func (t *Tree) bedReport(b Bed) BedReport {
	out := BedReport{
		Bed: b.Name, Flow: spanReport(b.Flow), Share: Number(b.Share), MeanPressure: Number(b.MeanPressure),
		PulsePressure: Number(b.PulsePressure), GoslingPI: Number(b.Measures.GoslingPI),
	}
	for _, k := range b.Terminals {
		out.Terminals = append(out.Terminals, t.Segments[k].ID)
	}
	return out
}

// Impedance is modulus and phase in degrees of the impedance at the root at
// harmonic k.
func (t Tree) Impedance(k int) (modulus, degrees float64) {
	return cmplx.Abs(t.Root[k]), cmplx.Phase(t.Root[k]) * 180 / math.Pi
}

func distalReport(d anatomy.Compared) DistalReport {
	out := DistalReport{Channel: d.Name, Site: d.Site, Place: d.Place, HeldOut: d.HeldOut, OverMean: !d.IsPressure(), RMSE: Number(d.RMSE)}
	scale := 1.0
	if out.OverMean {
		scale = math.Abs(d.Beat.Mean())
	}
	low, high := d.Beat.Extremes()
	least, most := d.Predicted.Extremes()
	out.Measured, out.Predicted = Number((high-low)/scale), Number((most-least)/scale)
	return out
}
