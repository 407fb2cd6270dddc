package fault

import (
	"fmt"
	"math"
	"math/cmplx"

	"gonum.org/v1/gonum/dsp/fourier"

	"afterbeat/data"
)

const (
	humWindow   = 4.0 // s
	humWindows  = 7
	humWithin   = 0.4 // Hz from the nominal frequency
	humAround   = 8.0 // Hz in which it must stand alone
	humOutside  = 1.0 // Hz next to it that are left out
	humTimes    = 4.0
	humOfPulse  = 0.005 // peak to peak
	leastOfHums = 2     // s, the shortest trace looked at
)

// hum finds the mains in a trace. The name of the frequencies is common practice.
func (t Trace) hum(s scale) []Finding {
	var out []Finding
	for _, mains := range []float64{50, 60} {
		if mains+humOutside > t.Rate/2 || t.seconds() < leastOfHums {
			continue
		}
		var lines, others []float64
		for _, r := range windows(len(t.Values), t.samples(humWindow), humWindows) {
			if a, other, ok := aroundLine(t.Values[r.From:r.To], t.Rate, mains); ok {
				lines, others = append(lines, a), append(others, other)
			}
		}
		a := median(lines)
		if !(a > humTimes*median(others)) || 2*a < humOfPulse*s.pulse {
			continue
		}
		out = append(out, Finding{
			Code: data.CodeHum, Number: 2 * a,
			Text: fmt.Sprintf("hum of %.2g %s from peak to peak at %g Hz, the mains: %.2g %% of the pulse", 2*a, t.Unit, mains, 200*a/s.pulse),
			Cure: "part signal from mains cables and earth them in one place; a mean over beats lessens it, the extremes of single beats hold it",
		})
	}
	return out
}

// aroundLine gives the largest amplitude near f, and the largest of the others
// around; not ok where a tenth of the samples is missing.
func aroundLine(x []float64, rate, f float64) (line, other float64, ok bool) {
	n := len(x)
	windowed := make([]float64, n)
	mean, have := 0.0, 0
	for _, v := range x {
		if !math.IsNaN(v) {
			mean += v
			have++
		}
	}
	if n < 8 || 10*have < 9*n {
		return 0, 0, false
	}
	mean /= float64(have)
	for i, v := range x {
		if !math.IsNaN(v) {
			windowed[i] = (v - mean) * (1 - math.Cos(2*math.Pi*float64(i)/float64(n))) // Hann, of mean 1
		}
	}
	for j, c := range fourier.NewFFT(n).Coefficients(nil, windowed) {
		away := math.Abs(float64(j)*rate/float64(n) - f)
		a := 2 * cmplx.Abs(c) / float64(n)
		switch {
		case away <= humWithin:
			line = max(line, a)
		case away > humOutside && away <= humAround:
			other = max(other, a)
		}
	}
	return line, other, true
}
