package tree

import (
	"math"
	"math/cmplx"
	"math/rand/v2"
	"strconv"
	"testing"

	"afterbeat/data/unit"
	"afterbeat/data/womersley"
)

// grown is an invented tree of count segments in which most forks have two
// branches, of the sizes of small arteries.
func grown(count int) Network {
	r := rand.New(rand.NewPCG(1, 2))
	n := Network{Blood: StandardBlood(), OutflowPressure: 5, Segments: make([]Segment, count)}
	fork := make([]int, count)
	for i := range n.Segments {
		s := &n.Segments[i]
		*s = Segment{ID: strconv.Itoa(i), Length: 1 + 4*r.Float64(), Radius: 0.1 + 0.3*r.Float64(), WaveSpeed: 500 + 900*r.Float64()}
		if i > 0 {
			p := (i - 1) / 2
			s.Parent = strconv.Itoa(p)
			fork[p]++
		}
	}
	for i := range n.Segments {
		if fork[i] == 0 {
			n.Segments[i].Terminal = &Terminal{Matched: true, R2: float64(count) * (0.5 + r.Float64()), C: 1 / float64(count)}
		}
	}
	return n
}

func solving(b *testing.B, n Network, harmonics int) {
	s, err := NewSolver(n, 2*harmonics+1, harmonics)
	if err != nil {
		b.Fatal(err)
	}
	flow := beat(2*harmonics + 1)
	b.ReportAllocs()
	b.ResetTimer()
	for range b.N {
		if _, err := s.Solve(flow); err != nil {
			b.Fatal(err)
		}
	}
	b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N*harmonics*len(n.Segments)), "ns/segment/harmonic")
}

func BenchmarkTree55x64(b *testing.B)     { solving(b, tree55(b, false), 64) }
func BenchmarkTree1000x64(b *testing.B)   { solving(b, grown(1000), 64) }
func BenchmarkTree100000x64(b *testing.B) { solving(b, grown(100_000), 64) }

// BenchmarkPlain55x64 is the yardstick: the formulas as a textbook writes them,
// in complex arithmetic of the library, with the same fit of F10.
func BenchmarkPlain55x64(b *testing.B) {
	n := tree55(b, false)
	order, parent, err := n.Order()
	if err != nil {
		b.Fatal(err)
	}
	s, _ := NewSolver(n, 129, 64)
	flow := beat(129)
	spectrum := flow.Spectrum()
	b.ReportAllocs()
	b.ResetTimer()
	for range b.N {
		for k := 1; k <= 64; k++ {
			plain(n, order, parent, s.tree, flow.Omega(k), spectrum[k])
		}
	}
	b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N*64*55), "ns/segment/harmonic")
}

// plain is one harmonic by the formulas of the package documentation.
func plain(n Network, order, parent []int, c *compiled, w float64, flow complex128) []ends {
	count := len(n.Segments)
	zin, gamma, z0 := make([]complex128, count), make([]complex128, count), make([]complex128, count)
	load, y := make([]complex128, count), make([]complex128, count)
	out := make([]ends, count)
	for at := count - 1; at >= 0; at-- {
		i := order[at]
		s := n.Segments[i]
		speed, area := s.Speed(s.Radius, n.Blood.Density), math.Pi*s.Radius*s.Radius
		m := womersley.Fitted().Root(s.Radius * math.Sqrt(w*n.Blood.Density/n.Blood.Viscosity))
		line := complex(0, w*n.Blood.Density/area) / (m * m)
		wall := complex(0, w*area/(n.Blood.Density*speed*speed))
		gamma[i] = cmplx.Sqrt(line * wall)
		z0[i] = line / gamma[i] / unit.DynPerMmHg
		if s.Terminal != nil {
			t := c.terminals[c.pieces[c.lastPiece[c.place[i]]].terminal]
			load[i] = complex(t.R1, 0) + complex(t.R2, 0)/complex(1, w*t.R2*t.C)
		} else {
			load[i] = 1 / y[i]
		}
		g := (load[i] - z0[i]) / (load[i] + z0[i]) * cmplx.Exp(-2*gamma[i]*complex(s.Length, 0))
		zin[i] = z0[i] * (1 + g) / (1 - g)
		if parent[i] >= 0 {
			y[parent[i]] += 1 / zin[i]
		}
	}
	for _, i := range order {
		s, e := n.Segments[i], &out[i]
		if parent[i] < 0 {
			e.qin, e.pin = flow, flow*zin[i]
		} else {
			e.pin = out[parent[i]].pout
			e.qin = e.pin / zin[i]
		}
		g := (load[i] - z0[i]) / (load[i] + z0[i])
		x := cmplx.Exp(-gamma[i] * complex(s.Length, 0))
		e.qout = e.qin * x * (1 - g) / (1 - g*x*x)
		e.pout = e.qout * load[i]
	}
	return out
}

func BenchmarkResponse55(b *testing.B) {
	n := tree55(b, false)
	b.ReportAllocs()
	for range b.N {
		if _, err := Respond(n); err != nil {
			b.Fatal(err)
		}
	}
}
