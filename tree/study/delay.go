package study

import (
	"context"
	"fmt"
	"math"

	"afterbeat/data"
	"afterbeat/data/casenote"
	"afterbeat/fitting/delay"
)

// Delay is by how much pressure is taken to be later than flow, s.
type Delay struct {
	Value  float64
	Stated bool    // by a person, as a number
	Auto   bool    // to be estimated; Value is 0 where it could not be
	Error  float64 // 95 % half-width, s
	// Profile is what Value was estimated from; nil where it was not.
	Profile *delay.Profile
}

// estimated tells that the delay in use was estimated.
func (d Delay) estimated() bool { return d.Auto && d.Profile != nil && d.Profile.Delay.Identified }

// leastProfile is the shortest beat, in samples, that a delay is looked for in.
const leastProfile = 8

// profiled is the profile of the delay; nil where the beats carry none.
func profiled(ctx context.Context, b Beats) (*delay.Profile, error) {
	if b.Reason != "" || b.Pressure.Count == 0 || b.Flow.Count == 0 || len(b.Flow.Period.Samples) < leastProfile || notFittable(b) != "" {
		return nil, nil
	}
	d, err := fitData(b)
	if err != nil {
		return nil, err
	}
	p, err := delay.Of(ctx, d, b.Delay.Value)
	return &p, err
}

// align estimates the delay where the case asks for that, and cuts the beats anew
// with it.
func (b *Beats) align(ctx context.Context, pressure, flow []float64) error {
	if !b.Delay.Auto {
		return nil
	}
	p, err := profiled(ctx, *b)
	if p == nil || err != nil {
		return err
	}
	b.Delay.Profile = p
	if !p.Delay.Identified {
		return nil
	}
	b.Delay.Value = p.Delay.Value
	if _, given := b.Intake.Case.Error["delay"]; !given {
		b.Delay.Error = max(p.Delay.Total.High-p.Delay.Value, p.Delay.Value-p.Delay.Total.Low)
	}
	b.Warnings = nil // those of the first cut are said again
	b.cut(pressure, flow)
	return nil
}

// Limits of a delay that is not corrected, s: where it is warned of, and from
// where a Zc is refused (computed: 20 ms put Zc 32 % off, 55 ms 94 %).
const (
	delayWarned  = 0.005
	delayRefused = 0.020
)

// apart is by how far the profile puts the delay beyond the one in use, s; 0 where
// it does not tell them apart.
func (f Fit) apart() float64 {
	if p := f.Delay; p != nil && p.Delay.Identified && !p.Delay.Total.Contains(f.Beats.Delay.Value) {
		return p.Delay.Value - f.Beats.Delay.Value
	}
	return 0
}

// refuseZc takes a Zc for not identified where the channels are far from aligned.
func (f Fit) refuseZc() {
	apart := f.apart()
	if math.Abs(apart) <= delayRefused {
		return
	}
	for _, r := range f.Results {
		for i := range r.Parameters {
			if p := &r.Parameters[i]; p.Name == "Zc" && p.Identified {
				p.Identified = false
				p.Why = fmt.Sprintf("the pressure lies %.0f ms from where the flow says, which is not corrected", 1000*apart)
			}
		}
	}
}

// delayWarnings warns of a delay that was not measured, and of one that the data
// contradict, with what 10 ms of it do.
func (f Fit) delayWarnings() []data.Warning {
	d := f.Beats.Delay
	measure := "measure it on the recording system and state it: --delay S, positive where pressure is late"
	switch apart := f.apart(); {
	case d.estimated():
		return nil
	case math.Abs(apart) > delayWarned:
		return []data.Warning{{
			Code: data.CodeDelay,
			Text: fmt.Sprintf("pressure and flow are not aligned: the data put the pressure %.0f ms behind the flow (%.0f to %.0f ms), and %.0f ms are used", 1000*f.Delay.Delay.Value, 1000*f.Delay.Delay.Total.Low, 1000*f.Delay.Delay.Total.High, 1000*d.Value) + f.besideWords(),
			Cure: measure + "; or let it be estimated: --delay auto",
		}}
	case d.Stated || f.Beats.Intake.Case.OneBeat && !d.Auto:
		return nil
	case d.Auto:
		why := "there is nothing to estimate it from"
		if d.Profile != nil {
			why = d.Profile.Delay.Why
		}
		return []data.Warning{{Code: data.CodeDelay, Text: "the delay of pressure behind flow is not identified, and taken as 0: " + why + f.besideWords(), Cure: measure}}
	}
	return []data.Warning{{
		Code: data.CodeDelay, Text: "the delay of pressure behind flow was not measured and is taken as 0" + f.besideWords(),
		Cure: measure,
	}}
}

// besideWords say what 10 ms of delay do to wk3.
func (f Fit) besideWords() string {
	if f.Delay == nil {
		return ""
	}
	said := ""
	for _, p := range []delay.Point{f.Delay.Early, f.Delay.Late} {
		change := percent(p.Values, f.Delay.InUse.Values)
		said += fmt.Sprintf("; %+.0f ms would change C by %+.0f %%", 1000*(p.Delay-f.Delay.InUse.Delay), change.C)
		if !math.IsNaN(change.Zc) {
			said += fmt.Sprintf(" and Zc by %+.0f %%", change.Zc)
		}
	}
	return said + " (wk3)"
}

// delaySection shows the estimate of the delay, and wk3 beside the one in use.
func (f Fit) delaySection() casenote.Section {
	p := f.Delay
	foot := data.Estimate{Value: p.FootToFoot, Total: data.NoInterval(), Random: data.NoInterval(), Identified: true, Why: "carries no model"}
	t := casenote.Table{Header: []string{"delay, ms", "C, " + f.unitOf("C"), "Zc, " + f.unitOf("R"), "residual, rms, mmHg"}}
	for _, one := range []delay.Point{p.Early, p.InUse, p.Late} {
		rms := math.Sqrt(one.SumOfSquares / float64(len(f.Beats.Pressure.Period.Samples)))
		t.Rows = append(t.Rows, []casenote.Cell{plain(1000 * one.Delay), plain(one.Values.C), plain(one.Values.Zc), plain(rms)})
	}
	return casenote.Section{
		Title: "Delay of pressure behind flow",
		Words: words("Estimated jointly with wk3, by the sum of squares over delays of -20 to 80 ms; positive where pressure is late. The table has wk3 at the delay in use, and 10 ms to either side."),
		Rows: []casenote.Row{
			casenote.Words("in use", fmt.Sprintf("%.1f ms, %s", 1000*f.Beats.Delay.Value, f.Beats.Delay.from())),
			casenote.Quantity("estimate", p.Delay, "s", data.Estimated),
			casenote.Quantity("foot of pressure less that of flow", foot, "s", data.Estimated),
		},
		Tables: []casenote.Table{t},
	}
}

// from says where the delay in use comes from.
func (d Delay) from() string {
	switch {
	case d.Stated:
		return "stated"
	case d.estimated():
		return "estimated"
	}
	return "assumed"
}

func (d Delay) origin() data.Origin {
	switch {
	case d.Stated:
		return data.Measured
	case d.estimated():
		return data.Estimated
	}
	return data.Assumed
}

// DelayReport is by how much pressure is later than flow: the estimate, or the
// value stated; and what was used.
type DelayReport struct {
	Value      Number  `json:"value"`
	Low        Number  `json:"low"`
	High       Number  `json:"high"`
	Identified bool    `json:"identified"`
	Reason     *string `json:"reason"`
	Used       Number  `json:"used_s"`
	UsedFrom   string  `json:"used_from"` // stated, estimated or assumed
	FootToFoot Number  `json:"foot_to_foot_s"`
	// Beside has wk3 at the delay in use, and 10 ms to either side.
	Beside []DelayedReport `json:"beside"`
}

// DelayedReport is wk3 at one delay.
type DelayedReport struct {
	Delay Number `json:"delay_s"`
	C     Number `json:"C"`
	Zc    Number `json:"Zc"`
}

// delayReport reports the delay in use and the profile, where there is one.
func delayReport(d Delay, p *delay.Profile) DelayReport {
	r := DelayReport{
		Value: Number(d.Value), Low: nan, High: nan, Identified: d.Stated, Used: Number(d.Value), UsedFrom: d.from(),
		FootToFoot: nan, Beside: []DelayedReport{},
	}
	if d.Stated {
		r.Low, r.High = Number(d.Value-d.Error), Number(d.Value+d.Error)
	} else {
		r.Reason = reason("not stated, and taken as it is")
	}
	if p == nil {
		return r
	}
	r.FootToFoot = Number(p.FootToFoot)
	for _, one := range []delay.Point{p.Early, p.InUse, p.Late} {
		r.Beside = append(r.Beside, DelayedReport{Number(one.Delay), Number(one.Values.C), Number(one.Values.Zc)})
	}
	if !d.Stated {
		e := p.Delay
		r.Value, r.Low, r.High, r.Identified, r.Reason = Number(e.Value), Number(e.Total.Low), Number(e.Total.High), e.Identified, reason(e.Why)
	}
	return r
}
