package study

import (
	"fmt"
	"math"
	"math/cmplx"
	"slices"

	"afterbeat/data"
	"afterbeat/data/fault"
)

// lineWarnings says that the response of the pressure line is not known, with the size
// of its effect, where a fit would use the pressure and no flush tells it. A finger
// cuff has no line. The effects are those of a half-sine beat on wk3, refitted.
func (b Beats) lineWarnings() []data.Warning {
	t := b.Intake
	p, ok := t.Chosen(t.Selection.Pressure)
	if !ok || b.FlowInfo.Channel < 0 || b.Reason != "" || p.Site == data.SiteFinger || !p.Unit.Calibrated || t.Case.OneBeat {
		return nil
	}
	if slices.ContainsFunc(t.Faults[t.Selection.Pressure], func(f fault.Finding) bool {
		return f.Code == data.CodeLine || f.Code == data.CodeRecalibrated
	}) {
		return nil
	}
	return []data.Warning{{
		Code: data.CodeLine, Channel: p.Name,
		Text: "the natural frequency and damping of the pressure line are unknown; one of 8 Hz and 0.2 puts pulse pressure 4 % too high and Zc 9 % too low, one of 8 Hz and 0.6 Zc 39 % and C 14 % too low",
		Cure: "record a fast flush of the line, let go at once; none is needed with a sensor at the tip of the catheter",
	}}
}

const (
	slowBand, slowEnd = 3.0, 7.0   // Hz, where a flow meter passes all
	fastBand, fastEnd = 12.0, 20.0 // Hz, where a filtered one does not
	mostRise          = 2.5        // of |P/Q| from the one to the other: 20 dB/decade and more
	lateBand, lateEnd = 4.0, 10.0  // Hz
	mostLate          = 20.0       // degrees, mean phase of P/Q there
	aboveNoise        = 3.0        // times the standard error
)

// filtered warns of a flow that falls off faster with frequency than the pressure does,
// or that comes later the higher the frequency, as after a filter that delays. At high
// frequencies P/Q of an artery is level, of the size Zc, and in phase.
func (b Beats) filtered() []data.Warning {
	if b.Pressure.Count < 2 || b.Flow.Count < 2 {
		return nil
	}
	flow := b.Intake.Channels[b.FlowInfo.Channel]
	if p := b.Intake.Channels[b.Intake.Selection.Pressure]; p.Site != flow.Site && (p.Site != data.SiteRoot || !flow.Site.Systemic()) {
		return nil // apart, P/Q is no impedance
	}
	ratio, degrees := b.impedanceRise()
	w := data.Warning{
		Code: data.CodeFiltered, Channel: flow.Name,
		Cure: "ask which filter the flow meter has, and pass the pressure through the same; or take a wider band",
	}
	const effect = "a first-order filter that delays puts Zc 23 % and C 12 % too high at 10 Hz, 12 % and 6 % at 20 Hz; one without delay under 1 %"
	switch {
	case ratio > mostRise:
		w.Text = fmt.Sprintf("the flow falls off faster than the pressure, by a factor of %.2g from %g-%g to %g-%g Hz: it was low-pass filtered; ", ratio, slowBand, slowEnd, fastBand, fastEnd) + effect
	case degrees > mostLate:
		w.Text = fmt.Sprintf("from %g to %g Hz the flow is behind the pressure by %.0f degrees, %.2g ms at %g Hz: it was delayed or filtered; ", lateBand, lateEnd, degrees, degrees/360/7*1000, 7.0) + effect
		w.Cure += "; where it is a delay, state --delay (below 0 where the flow is late)"
	default:
		return nil
	}
	return []data.Warning{w}
}

// impedanceRise is by how much |P/Q| grows from the slow to the fast band, and the mean
// phase of P/Q in the band between, degrees; NaN where the harmonics do not stand out
// of the noise.
func (b Beats) impedanceRise() (ratio, degrees float64) {
	p, q := b.Pressure.Period.Spectrum(), b.Flow.Period.Spectrum()
	leastP, leastQ := noiseOf(b.Pressure.StdErr), noiseOf(b.Flow.StdErr)
	var slow, fast, phases []float64
	for k := 1; k < min(len(p), len(q))-1; k++ {
		f := b.Flow.Period.Omega(k) / (2 * math.Pi)
		if cmplx.Abs(p[k]) < aboveNoise*leastP {
			continue
		}
		size := math.Log(cmplx.Abs(p[k]) / max(cmplx.Abs(q[k]), leastQ))
		clear := cmplx.Abs(q[k]) > aboveNoise*leastQ
		switch {
		case f >= slowBand && f <= slowEnd && clear:
			slow = append(slow, size)
		case f >= fastBand && f <= fastEnd:
			fast = append(fast, size)
		}
		if f >= lateBand && f <= lateEnd && clear {
			phases = append(phases, 180/math.Pi*cmplx.Phase(p[k]/q[k]))
		}
	}
	return math.Exp(meanOfValid(fast) - meanOfValid(slow)), meanOfValid(phases)
}

// noiseOf is the standard error of a Fourier coefficient, from those of the samples.
func noiseOf(standardErrors []float64) float64 {
	sum := 0.0
	for _, s := range standardErrors {
		sum += s * s
	}
	return math.Sqrt(sum) / float64(len(standardErrors))
}
