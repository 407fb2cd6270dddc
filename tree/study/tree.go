package study

import (
	"context"
	"errors"
	"fmt"
	"slices"

	"afterbeat/data"
	"afterbeat/data/beat"
	"afterbeat/data/unit"
	"afterbeat/tree"
	"afterbeat/tree/anatomy"
)

// Tree is the patient's arterial tree: the table scaled to the patient and the
// lumped fit, refined until the flow at the root makes the pressure measured.
type Tree struct {
	Fit Fit
	anatomy.Refined
	// Lumped is the compliance of the lumped fit, the start of the tree's.
	Lumped data.Estimate
	// Segments are those of the network in the order of an outline: each before
	// its daughters, and these in the order of the table.
	Segments []TreeSegment
	// Beds are the groups of terminals, in the order of the outline.
	Beds []Bed
	// BrainByFlow is the bed of the brain where its flow is given as such, shown
	// beside its share where output is low; nil where it is not.
	BrainByFlow *Bed
	// Root is the impedance at the root by harmonic of the beat, 0 first.
	Root []complex128
	// Response is computed last, since it takes longer than all the rest; nil
	// before.
	Response *Response
	Reason   string // why there is no tree; empty where there is one
	Warnings []data.Warning
}

// TreeSegment is a segment with its waves of the measured flow.
type TreeSegment struct {
	tree.Segment
	Index    int // in the network
	Depth    int // 0 at the root
	Parent   int // index in Tree.Segments; -1 of the root
	Terminal bool
	anatomy.Waves
	// Pressure and Flow measure the waves at the outlet.
	PressureMeasures, FlowMeasures beat.Measures
	// Reflection is the reflection coefficient at the outlet at the first
	// harmonic, PathTime the time of a wave from the root to the outlet, s.
	Reflection complex128
	PathTime   float64
}

// Bed is a group of terminals.
type Bed struct {
	Name      string
	Terminals []int // indices in Tree.Segments
	// Flow is the sum of the flows into them, mL/s; Share its mean over the
	// output.
	Flow     data.Period
	Measures beat.Measures // of Flow
	Share    float64
	// PulsePressure and MeanPressure are those at the terminals' inlets,
	// weighted by their mean flows, mmHg.
	PulsePressure, MeanPressure float64
}

// GrowTree builds and refines the tree of a fit.
func GrowTree(ctx context.Context, f Fit) (Tree, error) {
	t := Tree{Fit: f}
	c := f.Beats.Intake.Case
	body, err := bodyOf(f.Beats)
	if err != nil {
		return t, err
	}
	brain, err := brainFlow(c)
	if err != nil {
		return t, err
	}
	if t.Reason = noTree(f); t.Reason != "" {
		return t, nil
	}
	traces, err := distal(f.Beats)
	if err != nil {
		return t, err
	}
	t.Lumped = lumpedCompliance(f)
	if err := t.grow(ctx, body, brain, traces); err != nil {
		if ctx.Err() != nil {
			return t, ctx.Err()
		}
		t.Reason = err.Error()
	}
	return t, nil
}

// noTree says why a fit has no tree; empty where it has one.
func noTree(f Fit) string {
	if why := notComparable(f); why != "" {
		return why
	}
	if len(f.Beats.Pressure.Period.Samples) < leastSamples {
		return "the average beat has too few samples"
	}
	return ""
}

func lumpedCompliance(f Fit) data.Estimate {
	p, _ := f.Results[f.Chosen].Parameter("C")
	return p.Estimate
}

// grow does the work of GrowTree.
func (t *Tree) grow(ctx context.Context, body anatomy.Body, brain float64, traces []anatomy.Trace) error {
	f := t.Fit
	r := f.Results[f.Chosen]
	load := anatomy.Load{
		Resistance: r.TotalResistance.Value, Compliance: r.Values.C,
		MeanFlow: f.Beats.Flow.Period.Mean(), OutflowPressure: r.OutflowPressure,
	}
	built, err := t.built(body, load, brain)
	if err != nil {
		return err
	}
	t.Refined, err = anatomy.Refine(ctx, built, t.measurement(traces))
	if err != nil {
		return err
	}
	t.Warnings = append(t.Warnings, t.Refined.Warnings...)
	if err := t.spread(); err != nil {
		return err
	}
	if brain == 0 && t.Fit.Beats.Intake.Case.Tree == "" && load.MeanFlow < anatomy.LowOutput {
		return t.brainByFlow(body, load)
	}
	return nil
}

// built is the tree before its refinement.
func (t *Tree) built(body anatomy.Body, l anatomy.Load, brain float64) (anatomy.Tree, error) {
	c := t.Fit.Beats.Intake.Case
	if own := t.Fit.Beats.Intake.Arteries; own != nil {
		return anatomy.Given(baseName(c.Tree), *own, l), nil
	}
	built, err := anatomy.Systemic(body, l, brain)
	var refused *anatomy.RefusedError
	if errors.As(err, &refused) {
		t.Warnings = append(t.Warnings, data.Warning{Code: data.CodeNoTree, Text: "no tree: " + refused.What, Cure: refused.Cure})
	}
	return built, err
}

// measurement is what the tree is refined to.
func (t *Tree) measurement(traces []anatomy.Trace) anatomy.Measurement {
	b := t.Fit.Beats
	widths, _ := halfWidths(b.Intake.Case) // checked when the beats were cut
	lead := b.Intake.Channels[b.Lead]
	return anatomy.Measurement{
		Flow:     b.Flow.Period,
		Pressure: anatomy.Trace{Name: lead.Name, Site: lead.Site, Quantity: unit.Pressure, Beat: b.Pressure.Period},
		Distal:   traces,
		Left:     withoutBlocks(b.Ensemble),
		Errors: anatomy.Errors{
			Flow: b.FlowInfo.Error, PressureScale: widths["pressure-scale"], PressureOffset: widths["pressure-offset"],
			Delay: widths["delay"], OutflowPressure: widths["outflow-pressure"],
		},
	}
}

// brainByFlow grows the tree once more with the brain's flow defended, under the
// same factors.
func (t *Tree) brainByFlow(body anatomy.Body, l anatomy.Load) error {
	built, err := anatomy.Systemic(body, l, anatomy.BrainFlow)
	if err != nil {
		return nil // it is shown beside, or not
	}
	other := *t
	if other.Network, err = t.Refined.Onto(built); err != nil {
		return err
	}
	if err := other.spread(); err != nil {
		return err
	}
	if i := slices.IndexFunc(other.Beds, func(b Bed) bool { return b.Name == "brain" }); i >= 0 {
		t.BrainByFlow = &other.Beds[i]
	}
	return nil
}

// Bed finds a bed by name.
func (t Tree) Bed(name string) (Bed, bool) {
	i := slices.IndexFunc(t.Beds, func(b Bed) bool { return b.Name == name })
	if i < 0 {
		return Bed{}, false
	}
	return t.Beds[i], true
}

// Called is the name of a segment, or its id where it has none.
func (s TreeSegment) Called() string {
	if s.Name == "" {
		return fmt.Sprintf("segment %s", s.ID)
	}
	return s.Name
}
