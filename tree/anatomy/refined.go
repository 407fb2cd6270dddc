package anatomy

import (
	"context"
	"errors"
	"fmt"
	"math"

	"afterbeat/data"
	"afterbeat/tree"
)

// Factor is a factor of the refinement.
type Factor struct {
	Kind    Kind
	Region  Region // empty: the whole tree
	Name    string
	Meaning string
	data.Estimate
	// Before is the 95 % interval of the factor before the recording was looked
	// at: an assumption.
	Before data.Interval
}

// Compared is a trace beside what the refined tree makes there.
type Compared struct {
	Trace
	Segment   string // id of the segment
	Place     string // in words
	Predicted data.Period
	RMSE      float64 // mmHg; of a flow over its mean: of the mean
}

// Refined is a tree held against a measurement.
type Refined struct {
	Tree    Tree
	Network tree.Network // with the factors
	Factors []Factor
	// Resistance is Z(0), mmHg s/mL; Compliance that of walls and terminals,
	// mL/mmHg.
	Resistance, Compliance data.Estimate
	Walls                  float64 // mL/mmHg, of Compliance
	// Pressure is the pressure that the tree was refined to, Distal the traces
	// beyond.
	Pressure    Compared
	Distal      []Compared
	Accuracy    float64 // s of the pressure, mmHg
	Evaluations int
	Converged   bool
	Warnings    []data.Warning

	factors []factor
	theta   []float64
}

// Limits of a factor beyond which the table is hardly the patient's.
const (
	leastFactor = 0.5
	mostFactor  = 2
)

// Refine searches the factors under which flow at the root makes the pressure
// measured.
func Refine(ctx context.Context, t Tree, m Measurement) (Refined, error) {
	if err := ctx.Err(); err != nil {
		return Refined{}, err
	}
	r, err := newRefinement(t, m)
	if err != nil {
		return Refined{}, err
	}
	s, err := r.search()
	if err != nil {
		return Refined{}, err
	}
	if squares(s.residual) != squares(s.residual) {
		return Refined{}, errors.New("the tree gives no number for this flow")
	}
	out := Refined{Tree: t, Accuracy: r.aims[0].s, Evaluations: s.evaluations, Converged: s.converged, factors: r.factors, theta: s.theta}
	out.Network = t.Network.Clone()
	t.apply(&out.Network, r.factors, s.theta)
	r.compare(&out, m)
	c := r.changesOf(s, m)
	r.estimate(&out, s, c)
	out.Warnings = append(append([]data.Warning(nil), t.Warnings...), out.warnings()...)
	return out, nil
}

// estimate gives factors and totals their intervals.
func (r *refinement) estimate(out *Refined, s solution, c changes) {
	for k, f := range r.factors {
		g := make([]float64, len(r.factors))
		g[k] = 1
		random, total := c.halfWidths(g)
		e := Factor{
			Kind: f.kind, Region: f.region, Name: f.name(), Meaning: f.meaning(), Estimate: estimate(math.Exp(s.theta[k]), random, total),
			Before: data.Interval{Low: math.Exp(-normal95 * f.doubt), High: math.Exp(normal95 * f.doubt)},
		}
		if random > mostlyBefore*normal95*f.doubt {
			e.Identified, e.Why = false, "the recording says little of it: the interval is nearly that of before"
		}
		out.Factors = append(out.Factors, e)
	}
	totals := func(n tree.Network) [2]float64 {
		load, err := tree.NewLoad(n)
		if err != nil {
			return [2]float64{math.NaN(), math.NaN()}
		}
		return [2]float64{load.Resistance(), load.Compliance()}
	}
	now := totals(out.Network)
	var slopes [2][]float64
	theta := append([]float64(nil), s.theta...)
	for k := range theta {
		theta[k] += differenceStep
		r.tree.apply(&r.work, r.factors, theta)
		theta[k] = s.theta[k]
		for i, v := range totals(r.work) {
			slopes[i] = append(slopes[i], math.Log(v/now[i])/differenceStep)
		}
	}
	for i, into := range []*data.Estimate{&out.Resistance, &out.Compliance} {
		random, total := c.halfWidths(slopes[i])
		*into = estimate(now[i], random, total)
	}
	out.Walls = ComplianceOfWalls(out.Network)
}

// mostlyBefore is the part of the width of before from which a factor is not
// identified.
const mostlyBefore = 0.8

// compare sets the traces beside what the tree makes.
func (r *refinement) compare(out *Refined, m Measurement) {
	for j, a := range append(append([]aim(nil), r.aims...), r.held...) {
		c := Compared{Trace: a.Trace, Segment: r.tree.Network.Segments[a.at.Segment].ID, Place: r.placeWords(a.at)}
		x := make([]complex128, len(a.Beat.Samples)/2+1)
		copy(x, r.predicted(j, a, r.flow))
		if !a.IsPressure() {
			for k := range x {
				x[k] *= complex(a.Beat.Mean(), 0)
			}
		} else if !a.level {
			x[0] = complex(a.Beat.Mean(), 0)
		}
		c.Predicted = data.FromSpectrum(x, len(a.Beat.Samples), a.Beat.Rate)
		for i, v := range c.Predicted.Samples {
			c.RMSE += (v - a.Beat.Samples[i]) * (v - a.Beat.Samples[i])
		}
		c.RMSE = math.Sqrt(c.RMSE / float64(len(c.Predicted.Samples)))
		if !a.IsPressure() {
			c.RMSE /= math.Abs(a.Beat.Mean())
		}
		if j == 0 {
			out.Pressure = c
		} else {
			out.Distal = append(out.Distal, c)
		}
	}
}

func (r *refinement) placeWords(at Place) string {
	s := r.tree.Network.Segments[at.Segment]
	name := s.Name
	if name == "" {
		name = s.ID
	}
	if at.Outlet {
		return "end of " + name
	}
	return "begin of " + name
}

// warnings of factors that went far, and of a misfit.
func (o Refined) warnings() []data.Warning {
	var all []data.Warning
	for _, f := range o.Factors {
		if f.Value >= leastFactor && f.Value <= mostFactor {
			continue
		}
		all = append(all, data.Warning{
			Code: data.CodeTreeStretched,
			Text: fmt.Sprintf("the refinement moved %s to %.2g times the table's: it is hardly this patient's", f.Name, f.Value),
			Cure: "height, weight and a measured pulse-wave velocity (--height-cm --weight-kg --pwv-m-s), or the patient's own table (--tree)",
		})
	}
	if !o.Converged {
		all = append(all, data.Warning{
			Code: data.CodeNotConverged,
			Text: "the refinement of the tree gave up", Cure: "look at the tree's pressure over the measured one, and at the traces it was given",
		})
	}
	low, high := o.Pressure.Beat.Extremes()
	if o.Pressure.RMSE > misfitPart*(high-low) {
		all = append(all, data.Warning{
			Code: data.CodeMisfit,
			Text: fmt.Sprintf("the refined tree misses the measured pressure by %.2g mmHg (RMS), %.0f %% of its pulse", o.Pressure.RMSE, 100*o.Pressure.RMSE/(high-low)),
			Cure: "the lumped model may be nearer; check delay, site and calibration of the pressure",
		})
	}
	return all
}

// misfitPart is the residual over the pulse pressure from which it is a misfit.
const misfitPart = 0.1

// Onto is another tree of the same segments under the factors of this one.
func (o Refined) Onto(t Tree) (tree.Network, error) {
	if len(t.Network.Segments) != len(o.Network.Segments) {
		return tree.Network{}, errors.New("a tree of other segments")
	}
	n := t.Network.Clone()
	t.apply(&n, o.factors, o.theta)
	return n, nil
}
