package heart

import (
	"math"
	"sync"
)

// The double Hill function takes a logarithm and two exponentials, and a solver
// asks for it a hundred thousand times. It is the same function of t/T for every
// ventricle, and is tabulated once: between nodes it is the polynomial of degree
// 5 that has its value and its first two derivatives at both ends (quintic
// Hermite interpolation), good to 1e-13. Below hillDirect, where t^1.32 bends
// without bound, it is computed.
const (
	hillNodes  = 2048
	hillDirect = 1.0 / 64
)

// piece holds the coefficients of a polynomial in 0..1.
type piece [6]float64

var hillTable = sync.OnceValue(func() *[hillNodes]piece {
	var table [hillNodes]piece
	const h = 1.0 / hillNodes
	for k := int(hillDirect * hillNodes); k < hillNodes; k++ {
		a0, a1, a2 := hillSlopes(h * float64(k))
		b0, b1, b2 := hillSlopes(h * float64(k+1))
		a1, a2, b1, b2 = a1*h, a2*h*h, b1*h, b2*h*h
		rise := b0 - a0 - a1 - a2/2
		turn := b1 - a1 - a2
		bend := b2 - a2
		table[k] = piece{a0, a1, a2 / 2, 10*rise - 4*turn + bend/2, -15*rise + 7*turn - bend, 6*rise - 3*turn + bend/2}
	}
	return &table
})

// hillSlopes is e at x = t/T and its first two derivatives: with e = a r/((1+r)(1+f)),
// r = (x/0.303)^1.32 and f = (x/0.508)^21.9, e'/e = (n1/(1+r) - n2 f/(1+f))/x.
func hillSlopes(x float64) (e, first, second float64) {
	const n1, n2 = hillRisePower, hillFallPower
	r, f := math.Pow(x/hillRise, n1), math.Pow(x/hillFall, n2)
	g := (n1/(1+r) - n2*f/(1+f)) / x
	slope := -g/x - (n1*n1*r/square(1+r)+n2*n2*f/square(1+f))/(x*x)
	e = hill(x)
	return e, e * g, e * (g*g + slope)
}

func square(x float64) float64 { return x * x }

// fastHill is [hill] from the table.
func fastHill(table *[hillNodes]piece, x float64) float64 {
	if !(x >= hillDirect) {
		return hill(x)
	}
	at := x * hillNodes
	k := min(int(at), hillNodes-1)
	p, s := &table[k], at-float64(k)
	return p[0] + s*(p[1]+s*(p[2]+s*(p[3]+s*(p[4]+s*p[5]))))
}
