package tree

import (
	"errors"
	"math"
)

// Course is how one quantity of a bed follows a step at the root: the first
// times at which it passes 10, 50 and 90 % of its final change, s.
type Course struct {
	Final         float64 // mL/s or mmHg, at last
	T10, T50, T90 float64
	// Front tells that one of the three lies on a wave front, where it is
	// known to 1 ms; elsewhere it is known to 0.1 ms (outflow of a flow step) or
	// 0.5 ms.
	Front bool
}

// BedResponse is the response of the bed behind one terminal. All of a closed
// terminal is NaN.
type BedResponse struct {
	Segment  int    // index in Network.Segments
	Outflow  Course // through R2
	Inflow   Course // into the terminal
	Pressure Course // at the terminal
}

// Response is how the beds of a tree, from rest and with Pv taken as 0, follow a
// step at the root: of 1 mL/s of flow, and of 1 mmHg of pressure. It is a property
// of the tree alone, whatever drives it. The beds stand in the order of the
// network.
type Response struct{ FlowStep, PressureStep []BedResponse }

// batch bounds how many terminals are answered at once, for the sake of memory.
const batch = 256

// errUnsettled is that of a response that takes longer than a day.
var errUnsettled = errors.New("a bed does not settle: its time constant is beyond a day")

// Respond computes the responses of all beds. The Laplace transform of the tree,
//
//	lambda = r sqrt(s rho/mu),  F = 2 I1(lambda)/(lambda I0(lambda)),
//
// is inverted by a damped Fourier series (Dubner and Abate 1968, J ACM 15:115;
// from memory) on a few spans of time, each by fast transforms.
func Respond(n Network) (Response, error) {
	c, err := compile(n)
	if err != nil {
		return Response{}, err
	}
	var beds []int // positions of terminals, in the order of the network
	for i := range n.Segments {
		if c.leaf[i] {
			beds = append(beds, i)
		}
	}
	var out Response
	for len(beds) > 0 {
		some := beds[:min(batch, len(beds))]
		beds = beds[len(some):]
		flow, pressure, err := c.respond(some)
		if err != nil {
			return Response{}, err
		}
		out.FlowStep = append(out.FlowStep, flow...)
		out.PressureStep = append(out.PressureStep, pressure...)
	}
	return out, nil
}

// The quantities of a bed that are followed, in this order.
const (
	outflow = iota
	inflow
	pressure
	quantities
)

// course is a quantity under one of the steps, on its way to its times.
type course struct {
	final float64
	times [3]float64 // NaN: not passed yet
	front bool
}

var fractions = [3]float64{0.1, 0.5, 0.9}

func (c *course) done() bool { return !math.IsNaN(c.times[2]) || !(c.final > 0) }

// respond follows some beds, named by their index in the network. Courses lie
// as [step][bed][quantity].
func (c *compiled) respond(beds []int) (flow, pressureStep []BedResponse, err error) {
	courses := make([]course, 2*len(beds)*quantities)
	for i := range courses {
		nan := math.NaN()
		courses[i].times = [3]float64{nan, nan, nan}
	}
	c.finals(beds, courses)
	span := c.firstSpan()
	for from := 0.0; ; {
		if span > 1e6 {
			return nil, nil, errUnsettled
		}
		s := newSeries(span)
		s.fill(c, beds)
		if s.search(courses, from) {
			break
		}
		from = usable * span
		span *= spanGrowth
	}
	make1 := func(step int) []BedResponse {
		out := make([]BedResponse, len(beds))
		for i, bed := range beds {
			at := courses[(step*len(beds)+i)*quantities:]
			out[i] = BedResponse{bed, at[outflow].course(), at[inflow].course(), at[pressure].course()}
		}
		return out
	}
	return make1(0), make1(1), nil
}

func (c *course) course() Course {
	if !(c.final > 0) {
		nan := math.NaN()
		return Course{Final: nan, T10: nan, T50: nan, T90: nan}
	}
	return Course{Final: c.final, T10: c.times[0], T50: c.times[1], T90: c.times[2], Front: c.front}
}

// finals fills what the courses come to at last: the steady state of unit flow
// at the root, and of unit pressure. Of a closed terminal it stays 0.
func (c *compiled) finals(beds []int, courses []course) {
	for i, bed := range beds {
		position := int(c.place[bed])
		t := c.at(position)
		if t.closed() {
			continue
		}
		q := c.shares[c.lastPiece[position]]
		for step, scale := range []float64{1, 1 / c.resistance} {
			at := courses[(step*len(beds)+i)*quantities:]
			if math.IsInf(scale, 0) {
				continue
			}
			at[outflow].final, at[inflow].final, at[pressure].final = q*scale, q*scale, q*scale*(t.R1+t.R2)
		}
	}
}

// firstSpan is long enough for a wave to go to the farthest bed and back, s.
func (c *compiled) firstSpan() float64 {
	arrival := make([]float64, len(c.pieces))
	farthest := 0.0
	for i := range c.pieces {
		p := &c.pieces[i]
		arrival[i] = p.transit
		if p.parent >= 0 {
			arrival[i] += arrival[p.parent]
		}
		farthest = max(farthest, arrival[i])
	}
	return max(0.05, 3*farthest)
}
