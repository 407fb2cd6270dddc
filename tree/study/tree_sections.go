package study

import (
	"fmt"
	"math"
	"strings"

	"afterbeat/data"
	"afterbeat/data/casenote"
	"afterbeat/tree/anatomy"
)

// sections describe the tree for a note.
func (t Tree) sections() []casenote.Section {
	if t.Reason != "" {
		return []casenote.Section{{
			Title: "Arterial tree",
			Words: words(fmt.Sprintf("There is no tree: %s.", t.Reason)),
		}}
	}
	all := []casenote.Section{t.bedSection(), t.madeSection()}
	if len(t.Distal) > 0 {
		all = append(all, t.distalSection())
	}
	return all
}

// bedSection is the pulse by bed.
func (t Tree) bedSection() casenote.Section {
	s := casenote.Section{
		Title:  "Arterial tree: by bed",
		Words:  words("The measured flow of the root in the patient's tree of arteries: what of it arrives where. These are values of a model whose table of arteries is not the patient's; only the measured pressure, and the traces named below, hold it."),
		Tables: []casenote.Table{t.bedTable()},
	}
	if t.Response == nil {
		s.Words = append(s.Words, words("How fast the beds follow a step at the root was not computed when this note was made.")...)
		return s
	}
	s.Words = append(s.Words, words("t50 and t90: the time in which the outflow of a bed makes half and nine tenths of its change after a step at the root, from rest. They are of the tree alone, without heart or pump.")...)
	s.Tables = append(s.Tables, t.responseTable())
	return s
}

func (t Tree) bedTable() casenote.Table {
	out := casenote.Table{Header: []string{"bed", "mean flow, mL/s", "of the output, %", "pulse pressure, mmHg", "Gosling PI, flow"}}
	row := func(name string, b Bed) {
		out.Rows = append(out.Rows, []casenote.Cell{
			{Words: data.Clean(name)}, plain(b.Measures.Mean), plain(100 * b.Share), plain(b.PulsePressure), plain(b.Measures.GoslingPI),
		})
	}
	for _, b := range t.Beds {
		row(b.Name, b)
		if b.Name == "brain" && t.BrainByFlow != nil {
			row("brain, its flow defended", *t.BrainByFlow)
		}
		if len(out.Rows) == mostBeds {
			out.Foot = fmt.Sprintf("%d beds more are in the JSON. ", len(t.Beds)-mostBeds)
			break
		}
	}
	out.Foot += "Pulse pressure at the terminals of a bed, weighted by their flows; flow into them together."
	if t.BrainByFlow != nil {
		out.Foot += fmt.Sprintf(" Output is below %g L/min, where the brain's flow is defended: the second line gives it %.3g mL/s (12 %% of 5.5 L/min).", anatomy.LowOutput*litresPerMinute, anatomy.BrainFlow)
	}
	return out
}

// mostBeds is how many beds a note lists, of a table with many.
const mostBeds = 24

func (t Tree) responseTable() casenote.Table {
	out := casenote.Table{Header: []string{"bed", "t50, step of flow, s", "t90, s", "t50, step of pressure, s", "t90 of it, s"}}
	for i := range t.Response.Flow {
		if i == mostBeds {
			break
		}
		f, p := t.Response.Flow[i], t.Response.Pressure[i]
		out.Rows = append(out.Rows, []casenote.Cell{{Words: data.Clean(f.Bed)}, plain(f.T50), plain(f.T90), plain(p.T50), plain(p.T90)})
	}
	return out
}

// madeSection says how the tree came about.
func (t Tree) madeSection() casenote.Section {
	s := casenote.Section{
		Title: "Arterial tree: how it was made",
		Words: words("Source: " + t.Tree.Source + ". " + t.madeWords()),
		Rows: []casenote.Row{
			casenote.Quantity("C of the tree, walls and terminals", t.Compliance, "mL/mmHg", data.Estimated),
			casenote.Quantity("C of the lumped fit", t.Lumped, "mL/mmHg", data.Estimated),
			casenote.Quantity("total resistance of the tree", t.Resistance, "mmHg s/mL", data.Estimated),
			casenote.Quantity("misses the measured pressure by, RMS", bare(t.Pressure.RMSE), "mmHg", data.Estimated),
		},
	}
	for _, x := range t.Tree.Scales {
		s.Rows = append(s.Rows, casenote.Words(x.Name+" of the table", fmt.Sprintf("times %.3g: %s", x.Factor, x.Why)))
	}
	factors := casenote.Table{
		Header: []string{"factor of the refinement", "value, times", "before the recording"},
		Foot:   fmt.Sprintf("Factors by which flow at the root makes the pressure measured: %s. Before: assumed, 95 %%. Outside %g to %g a factor is warned of.", t.factorWords(), 0.5, 2.0),
	}
	for _, f := range t.Factors {
		factors.Rows = append(factors.Rows, []casenote.Cell{
			{Words: data.Clean(f.Name)},
			{Number: &casenote.Number{Estimate: f.Estimate, Origin: data.Estimated}},
			{Words: data.Clean(fmt.Sprintf("%.2g to %.2g", f.Before.Low, f.Before.High))},
		})
	}
	s.Tables = append(s.Tables, factors)
	return s
}

// Made says how the tree came about, a line each: for a screen.
func (t Tree) Made() []string {
	out := []string{"Source: " + t.Tree.Source + ".", t.madeWords(), ""}
	for _, x := range t.Tree.Scales {
		out = append(out, fmt.Sprintf("%s of the table times %.3g: %s", x.Name, x.Factor, x.Why))
	}
	out = append(out, "", "Factors of the refinement, with the 95 % interval, and what was thought of them before the recording:")
	for _, f := range t.Factors {
		doubt := ""
		if !f.Identified {
			doubt = "; not identified: " + f.Why
		}
		out = append(out, fmt.Sprintf("  %s: %s (%s); before: %.2g to %.2g%s", f.Name,
			casenote.Format(f.Value, f.Total), casenote.FormatRange(f.Value, f.Total), f.Before.Low, f.Before.High, doubt))
	}
	return append(out, "", fmt.Sprintf("Walls have %s of the tree's %s mL/mmHg.", casenote.Format(t.Walls, data.NoInterval()), casenote.Format(t.Compliance.Value, t.Compliance.Total)))
}

// factorWords say what each kind of factor does.
func (t Tree) factorWords() string {
	var all []string
	seen := map[anatomy.Kind]bool{}
	for _, f := range t.Factors {
		if !seen[f.Kind] {
			seen[f.Kind] = true
			all = append(all, string(f.Kind)+" "+f.Meaning)
		}
	}
	return strings.Join(all, ", ")
}

// madeWords say what was assumed and held.
func (t Tree) madeWords() string {
	held := "Held: blood of density 1.06 g/mL and viscosity 0.035 poise, elastic walls, the outflow pressure behind every terminal."
	if t.Tree.Own {
		return "Its lengths, radii, wave speeds and terminals are as written, under the factors below. " + held
	}
	return fmt.Sprintf("Flow is shared by the organ table of an adult at rest, of which the heart's %g %% are left out (the tree has no coronary arteries) and the rest is normalised. The internal carotid arteries have the radii of another table, since those of this one are too thin for the brain's flow. The table's step from the upper to the lower thoracic aorta reflects more than arteries do. ", anatomy.Heart) + held
}

// distalSection sets the traces beyond the root beside the tree's.
func (t Tree) distalSection() casenote.Section {
	table := casenote.Table{Header: []string{"trace", "place", "used", "swing measured", "swing of the tree", "differs by, RMS"}}
	for _, d := range t.Distal {
		used := "refined to"
		if d.HeldOut {
			used = "held out: a test"
		}
		scale, unit := 1.0, " mmHg"
		if !d.IsPressure() {
			scale, unit = math.Abs(d.Beat.Mean()), " of its mean"
		}
		low, high := d.Beat.Extremes()
		least, most := d.Predicted.Extremes()
		table.Rows = append(table.Rows, []casenote.Cell{
			{Words: d.Name},
			{Words: data.Clean(d.Place)},
			{Words: data.Clean(used)},
			{Words: data.Clean(casenote.Format((high-low)/scale, data.NoInterval()) + unit)},
			{Words: data.Clean(casenote.Format((most-least)/scale, data.NoInterval()) + unit)},
			{Words: data.Clean(casenote.Format(d.RMSE, data.NoInterval()) + unit)},
		})
	}
	return casenote.Section{
		Title:  "Arterial tree: beside the distal traces",
		Words:  words("Their level is not compared; a velocity is compared over its mean. A trace held out played no part in the tree, and tests it."),
		Tables: []casenote.Table{table},
	}
}

// bare is an estimate without an interval.
func bare(v float64) data.Estimate {
	return data.Estimate{Value: v, Total: data.NoInterval(), Random: data.NoInterval(), Identified: true}
}
