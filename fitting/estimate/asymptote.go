package estimate

import (
	"fmt"
	"math"
)

// ByDecayAsymptote fits
//
//	P = Pinf + A exp(-t/tau)
//
// by least squares to diastole, from where the flow stops (late diastole where
// there is no flow), with the asymptote Pinf as a third unknown (Simon 1979, from
// memory). tau is sought between a tenth and ten times the length of the stretch;
// where the best lies at an end the curve is too straight, or too sharply bent, to
// tell an asymptote, and the method does not apply; nor where Pinf comes out
// below -50 mmHg or above the lowest pressure. C = tau/R with the R of the common
// Pv.
func ByDecayAsymptote(b Beat) Estimate {
	e := newEstimate(DecayAsymptote)
	s, why := b.diastole()
	if why != "" {
		return e.without("%s", why)
	}
	if n := s.samples(); n < 2*leastDiastole {
		return e.without("%d samples of diastole are too few for three unknowns", n)
	}
	length := float64(s.samples()-1) / b.Pressure.Rate
	misfit := func(logTau float64) float64 { _, _, sum := b.exponential(s, math.Exp(logTau)); return sum }
	low, high := math.Log(length/10), math.Log(length*10)
	best := lowest(misfit, low, high)
	e.Tau = math.Exp(best)
	e.Asymptote, _, _ = b.exponential(s, e.Tau)
	least, _ := b.Pressure.Extremes()
	switch {
	case best > high-0.01 || best < low+0.01:
		return e.without("diastole is too straight, or too sharply bent, to tell an asymptote")
	case e.Asymptote > least || e.Asymptote < leastAsymptote:
		return e.without("the asymptote comes out at %.3g mmHg, which is none", e.Asymptote)
	}
	e = e.withResistance(b)
	if e.Remark == "" {
		e.Remark = fmt.Sprintf("asymptote %.3g mmHg; R is that of the common outflow pressure", e.Asymptote)
	}
	return e
}

// leastAsymptote is below what an outflow pressure can be, mmHg, with room for
// scatter (an assumption).
const leastAsymptote = -50

// exponential is the best asymptote and factor for a time constant, and the sum
// of squares that is left.
func (b Beat) exponential(s stretch, tau float64) (asymptote, factor, sum float64) {
	n := float64(s.samples())
	step := math.Exp(-1 / (b.Pressure.Rate * tau))
	var su, suu, sy, suy float64
	for j, u := s.from, 1.0; j <= s.to; j, u = j+1, u*step {
		y := at(b.Pressure.Samples, j)
		su, sy = su+u, sy+y
	}
	mu, my := su/n, sy/n
	for j, u := s.from, 1.0; j <= s.to; j, u = j+1, u*step {
		suu, suy = suu+(u-mu)*(u-mu), suy+(u-mu)*(at(b.Pressure.Samples, j)-my)
	}
	factor = suy / suu
	asymptote = my - factor*mu
	for j, u := s.from, 1.0; j <= s.to; j, u = j+1, u*step {
		d := at(b.Pressure.Samples, j) - asymptote - factor*u
		sum += d * d
	}
	return asymptote, factor, sum
}

// lowest is where f is lowest between low and high: a scan, then a golden-section
// search in the best pair of steps.
func lowest(f func(float64) float64, low, high float64) float64 {
	const steps = 40
	at, least := low, math.Inf(1)
	step := (high - low) / steps
	for i := range steps + 1 {
		if v := f(low + float64(i)*step); v < least {
			at, least = low+float64(i)*step, v
		}
	}
	a, b := max(low, at-step), min(high, at+step)
	const golden = 0.6180339887498949
	x, y := b-golden*(b-a), a+golden*(b-a)
	fx, fy := f(x), f(y)
	for b-a > 1e-7 {
		if fx < fy {
			b, y, fy = y, x, fx
			x = b - golden*(b-a)
			fx = f(x)
		} else {
			a, x, fx = x, y, fy
			y = a + golden*(b-a)
			fy = f(y)
		}
	}
	return (a + b) / 2
}
