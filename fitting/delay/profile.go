package delay

import (
	"context"
	"fmt"
	"math"
	"math/cmplx"

	"gonum.org/v1/gonum/stat/distuv"

	"afterbeat/data"
	"afterbeat/fitting"
	"afterbeat/fitting/harmonic"
)

const (
	// Lowest and Highest bound the delays that are looked at, s.
	Lowest  = -0.020
	Highest = 0.080
	// step is that of the profile, s, and widest the interval from which on the
	// profile counts as flat.
	step   = 0.002
	widest = 0.040
	// aside is how far from the delay in use Zc and C are shown, s.
	aside = 0.010
	// unknowns are R, C, Zc and the delay.
	unknowns = 4
)

// Point is the load at one delay.
type Point struct {
	Delay        float64 // s
	SumOfSquares float64 // of the residual, mmHg²
	Values       fitting.Values
}

// Profile is what a beat says of the delay.
type Profile struct {
	Points []Point // every 2 ms from -20 to 80 ms
	// Delay is the estimate, s; its intervals are both that of the profile. NaN,
	// with the reason, where there is none.
	Delay data.Estimate
	// FootToFoot is the foot of the pressure less that of the flow, s; NaN where
	// either has none. It carries no model, and errs with the shape of the upstroke.
	FootToFoot float64
	// InUse is the load at the delay in use, Early and Late at 10 ms less and more.
	Early, InUse, Late Point
}

// Of profiles the beats, which are cut with a delay already in use, s: that one
// counts as part of every delay of the profile.
func Of(ctx context.Context, b fitting.Beats, used float64) (Profile, error) {
	f, err := newFit(b, used)
	if err != nil {
		return Profile{}, err
	}
	p := Profile{FootToFoot: f.feet() + used}
	for i := range int(math.Round((Highest-Lowest)/step)) + 1 {
		one, err := f.at(ctx, Lowest+float64(i)*step)
		if err != nil {
			return p, err
		}
		p.Points = append(p.Points, one)
	}
	for _, one := range []struct {
		to   *Point
		side float64
	}{{&p.Early, -aside}, {&p.InUse, 0}, {&p.Late, aside}} {
		if *one.to, err = f.at(ctx, used+one.side); err != nil {
			return p, err
		}
	}
	p.Delay, err = f.estimate(ctx, p.Points, len(harmonic.Shown(harmonic.Impedance(b.Pressure, b.Flow, b.Rate))))
	return p, err
}

// fit fits wk3 to an average beat at one delay after the other.
type fit struct {
	beats    fitting.Beats // the average beat alone
	model    fitting.Model
	used     float64
	fourier  *fitting.Fourier
	pressure []complex128
	flow     []complex128
	moved    []complex128
	spare    []float64
}

func newFit(b fitting.Beats, used float64) (*fit, error) {
	m, ok := fitting.ByName("wk3")
	if !ok || len(b.Pressure) == 0 || len(b.Flow) != len(b.Pressure) || len(b.Pressure[0]) == 0 {
		return nil, fmt.Errorf("delay: no beats of pressure and flow, or no model wk3")
	}
	pressure, flow := b.Average()
	n := len(pressure.Samples)
	f := &fit{
		beats: b, model: m, used: used, fourier: fitting.NewFourier(n),
		pressure: make([]complex128, n/2+1), flow: make([]complex128, n/2+1), moved: make([]complex128, n/2+1), spare: make([]float64, n),
	}
	f.fourier.Pair(f.pressure, f.flow, pressure.Samples, flow.Samples)
	f.beats.Pressure, f.beats.Flow = [][]float64{make([]float64, n)}, [][]float64{flow.Samples}
	return f, nil
}

// at is the load with the pressure taken to be late by a delay in all.
func (f *fit) at(ctx context.Context, delay float64) (Point, error) {
	n := float64(len(f.spare))
	for k, v := range f.pressure {
		w := 2 * math.Pi * float64(k) * f.beats.Rate / n
		f.moved[k] = v * cmplx.Exp(complex(0, w*(delay-f.used)))
	}
	f.fourier.InversePair(f.beats.Pressure[0], f.spare, f.moved, f.flow)
	r, err := fitting.FitBeat(ctx, f.model, f.beats, fitting.Settings{})
	return Point{Delay: delay, SumOfSquares: r.SumOfSquares, Values: r.Values}, err
}

// feet is the foot of the pressure less that of the flow as cut, s, in -half a
// period to half a period.
func (f *fit) feet() float64 {
	f.fourier.InversePair(f.beats.Pressure[0], f.spare, f.pressure, f.flow)
	p := data.Period{Samples: f.beats.Pressure[0], Rate: f.beats.Rate}
	q := data.Period{Samples: f.beats.Flow[0], Rate: f.beats.Rate}
	return math.Remainder(harmonic.Foot(p)-harmonic.Foot(q), p.Duration())
}

// estimate is the lowest point of the profile, with its interval.
func (f *fit) estimate(ctx context.Context, points []Point, harmonics int) (data.Estimate, error) {
	best := 0
	for i, p := range points {
		if p.SumOfSquares < points[best].SumOfSquares {
			best = i
		}
	}
	low, high := points[max(0, best-1)].Delay, points[min(best+1, len(points)-1)].Delay
	lowest, err := f.lowest(ctx, low, high)
	if err != nil {
		return data.Estimate{}, err
	}
	if points[best].SumOfSquares < lowest.SumOfSquares {
		lowest = points[best]
	}
	e := data.Estimate{Value: lowest.Delay, Total: data.NoInterval(), Random: data.NoInterval()}
	free := 2*harmonics + 1 - unknowns
	if free < 1 {
		e.Why = fmt.Sprintf("%d harmonics stand out of the scatter of the flow, too few for R, C, Zc and a delay", harmonics)
		return e, nil
	}
	limit := lowest.SumOfSquares * (1 + distuv.F{D1: 1, D2: float64(free)}.Quantile(0.95)/float64(free))
	i, open := crossings(points, lowest, limit)
	e.Total, e.Random = i, i
	switch {
	case open:
		e.Why = fmt.Sprintf("the profile is flat: %.0f to %.0f ms, to an end of what is looked at, fit about as well", 1000*i.Low, 1000*i.High)
	case i.Width() > widest:
		e.Why = fmt.Sprintf("the profile is flat: delays from %.0f to %.0f ms fit about as well", 1000*i.Low, 1000*i.High)
	case lowest.Values.Zc == 0:
		e.Why = "Zc vanishes at the best delay, so that the delay stands in for it"
	default:
		e.Identified = true
	}
	return e, nil
}

// lowest narrows the lowest point down between two delays, to a microsecond.
func (f *fit) lowest(ctx context.Context, a, b float64) (Point, error) {
	const golden = 0.6180339887498949
	var err error
	at := func(d float64) Point {
		p, e := f.at(ctx, d)
		if e != nil {
			err = e
		}
		return p
	}
	x, y := at(b-golden*(b-a)), at(a+golden*(b-a))
	for b-a > 1e-6 && err == nil {
		if x.SumOfSquares < y.SumOfSquares {
			b, y = y.Delay, x
			x = at(b - golden*(b-a))
		} else {
			a, x = x.Delay, y
			y = at(a + golden*(b-a))
		}
	}
	if y.SumOfSquares < x.SumOfSquares {
		return y, err
	}
	return x, err
}

// crossings is from the first to the last delay at which the profile lies below a
// limit, by straight lines between its points; open tells that an end of the
// profile lies below it.
func crossings(points []Point, lowest Point, limit float64) (i data.Interval, open bool) {
	i = data.Interval{Low: lowest.Delay, High: lowest.Delay}
	cross := func(out, in Point) float64 {
		return out.Delay + (in.Delay-out.Delay)*(out.SumOfSquares-limit)/(out.SumOfSquares-in.SumOfSquares)
	}
	below := func(p Point) bool { return p.SumOfSquares <= limit }
	for k, p := range points {
		if below(p) && p.Delay <= i.Low {
			i.Low = p.Delay
			if k > 0 && !below(points[k-1]) {
				i.Low = cross(points[k-1], p)
			}
		}
		if below(p) && p.Delay >= i.High {
			i.High = p.Delay
			if k+1 < len(points) && !below(points[k+1]) {
				i.High = cross(points[k+1], p)
			}
		}
	}
	// Where no point of the profile lies below, the limit is crossed beside the lowest.
	for k := 1; k < len(points); k++ {
		a, b := points[k-1], points[k]
		if a.Delay < lowest.Delay && lowest.Delay < b.Delay {
			if i.Low == lowest.Delay && !below(a) {
				i.Low = besideLowest(a, lowest, limit)
			}
			if i.High == lowest.Delay && !below(b) {
				i.High = besideLowest(b, lowest, limit)
			}
		}
	}
	return i, below(points[0]) || below(points[len(points)-1])
}

// besideLowest is where a parabola with its bottom at the lowest point, through
// another, crosses the limit.
func besideLowest(p, lowest Point, limit float64) float64 {
	rise := p.SumOfSquares - lowest.SumOfSquares
	return lowest.Delay + (p.Delay-lowest.Delay)*math.Sqrt(max(0, limit-lowest.SumOfSquares)/rise)
}
