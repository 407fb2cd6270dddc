package womersley

import (
	"math"
	"math/big"
	"math/cmplx"
	"testing"
)

func near(t *testing.T, what string, got, want, relative float64) {
	t.Helper()
	if !(math.Abs(got-want) <= relative*math.Abs(want)) {
		t.Errorf("%s = %.15g, want %.15g within %g", what, got, want, relative)
	}
}

const degree = math.Pi / 180

// Computed with 40 digits (mpmath) from the definition by J0 and J1: M'10,
// eps'10; resistance and inertance of a length over Poiseuille's and over
// rho/(pi r²); wave speed over the inviscid one; and the amplitude left after one
// wavelength. The functions are Womersley's (1955, 1957).
func TestTable(t *testing.T) {
	rows := []struct{ alpha, m, eps, r, l, speed, left float64 }{
		{0.5, 0.0312212183257, 87.6142111046, 1.000054249, 1.333318867, 0.2448407108, 0.002413073481},
		{1, 0.123195891687, 80.5473360459, 1.000867002, 1.333102167, 0.4600374759, 0.004875336518},
		{2, 0.412467904198, 56.7384265637, 1.013624791, 1.329708659, 0.7298939799, 0.03360959396},
		{3, 0.616898636304, 35.6973766036, 1.064100312, 1.31644033, 0.8251437132, 0.1322314645},
		{4, 0.706197700404, 24.4317335915, 1.171368169, 1.289234899, 0.8598244148, 0.2565852827},
		{5, 0.755609668107, 18.6471524354, 1.322355953, 1.253961717, 0.8808955046, 0.3564483307},
		{6, 0.790863815458, 15.1755314903, 1.489506348, 1.220347116, 0.8971610019, 0.4330117439},
		{7, 0.817623848268, 12.7984720771, 1.659473696, 1.192669788, 0.9098947369, 0.4942630951},
		{8, 0.838376684614, 11.0594549385, 1.830466092, 1.17062971, 0.9199100724, 0.5442795396},
		{9, 0.854891366536, 9.73493505287, 2.002640325, 1.152895667, 0.9279498821, 0.5856310094},
		{10, 0.868350674848, 8.69336790733, 2.175768437, 1.138378097, 0.9345413661, 0.620280301},
		{15, 0.910101028111, 5.66163023933, 3.048700821, 1.093419113, 0.9551577127, 0.732943649},
		{20, 0.931764031077, 4.19679156831, 3.927086003, 1.070355308, 0.9659269822, 0.7943605816},
	}
	for _, row := range rows {
		v := OneMinusF10(row.alpha)
		near(t, "M'10", cmplx.Abs(v), row.m, 5e-12) // the last digit printed
		near(t, "eps'10", cmplx.Phase(v)/degree, row.eps, 5e-12)
		// Z'/(i w rho/A) = 1/(1 - F10); Poiseuille's resistance is 8 w rho/(A alpha²).
		line := 1 / v
		near(t, "resistance", -imag(line)*row.alpha*row.alpha/8, row.r, 1e-9)
		near(t, "inertance", real(line), row.l, 1e-9)
		x := 1 / cmplx.Sqrt(v) // X - iY
		near(t, "wave speed", 1/real(x), row.speed, 1e-9)
		near(t, "amplitude left", math.Exp(2*math.Pi*imag(x)/real(x)), row.left, 1e-9)
	}
}

// The four harmonics of the dog's femoral artery that Womersley worked in 1955:
// M'10/alpha² and eps'10, with ten digits computed.
func TestHarmonicsOf1955(t *testing.T) {
	for _, row := range []struct{ alpha, m, printed, eps float64 }{
		{3.34, 0.05874747806, 0.0587, 30.9451263972},
		{4.72, 0.03338069033, 0.0333, 19.9455258212},
		{5.78, 0.02346546564, 0.0234, 15.8208506634},
		{6.67, 0.01819694649, 0.0182, 13.4972349249},
	} {
		v := OneMinusF10(row.alpha)
		m := cmplx.Abs(v) / (row.alpha * row.alpha)
		near(t, "M'10/alpha²", m, row.m, 1e-9)
		near(t, "eps'10", cmplx.Phase(v)/degree, row.eps, 1e-11)
		if math.Abs(m-row.printed) > 1e-4 {
			t.Errorf("alpha %g: M'10/alpha² %g, Womersley %g", row.alpha, m, row.printed)
		}
	}
}

// bigQuotients are F10 and 1 - F10 by the power series of J0 and J1 in 300 bits
// and more, an independent method: I0 = sum u^k/k!², 2 I1/lambda = sum u^k/(k! (k+1)!).
func bigQuotients(alpha float64) (f, oneMinus complex128) {
	precision := uint(400 + 4*alpha)
	newF := func(x float64) *big.Float { return new(big.Float).SetPrec(precision).SetFloat64(x) }
	u := newF(alpha)
	u.Mul(u, newF(alpha)).Quo(u, newF(4))
	// u^k has phase i^k: four real sums
	var i0, i1 [2]*big.Float
	for j := range i0 {
		i0[j], i1[j] = newF(0), newF(0)
	}
	term := newF(1) // u^k/k!²
	for k := 0; k < 200+int(3*alpha); k++ {
		part, sign := k%2, 1.0
		if k%4 >= 2 {
			sign = -1
		}
		signed := newF(sign)
		signed.Mul(signed, term)
		i0[part].Add(i0[part], signed)
		signed.Quo(signed, newF(float64(k+1)))
		i1[part].Add(i1[part], signed)
		term.Mul(term, u).Quo(term, newF(float64((k+1)*(k+1))))
	}
	divide := func(a [2]*big.Float) complex128 { // by i0
		mul := func(x, y *big.Float) *big.Float { return newF(0).Mul(x, y) }
		norm := newF(0).Add(mul(i0[0], i0[0]), mul(i0[1], i0[1]))
		re := newF(0).Add(mul(a[0], i0[0]), mul(a[1], i0[1]))
		im := newF(0).Sub(mul(a[1], i0[0]), mul(a[0], i0[1]))
		x, _ := re.Quo(re, norm).Float64()
		y, _ := im.Quo(im, norm).Float64()
		return complex(x, y)
	}
	difference := [2]*big.Float{newF(0).Sub(i0[0], i1[0]), newF(0).Sub(i0[1], i1[1])}
	return divide(i1), divide(difference)
}

func relative(got, want complex128) float64 { return cmplx.Abs(got-want) / cmplx.Abs(want) }

// Both functions against long arithmetic over five decades of alpha, on both
// sides of the switch and at it.
func TestAgainstLongArithmetic(t *testing.T) {
	alphas := []float64{0.001, 0.01, 0.0123, 0.1, 0.37, 0.99, 1.7, 2.404, 3.8, 5.135, 7.3, 9.9, 12.5, 15.9, 16, 16.1, 19, 21.7, 23, 23.999999, 24, 24.000001, 25, 27, 33.3, 47, 68, 95, 150, 240}
	worst := 0.0
	for _, alpha := range alphas {
		f, oneMinus := bigQuotients(alpha)
		for what, e := range map[string]float64{"F10": relative(F10(alpha), f), "1-F10": relative(OneMinusF10(alpha), oneMinus)} {
			worst = max(worst, e)
			if e > 1e-13 {
				t.Errorf("%s at alpha %g is off by %g", what, alpha, e)
			}
		}
	}
	t.Logf("largest error %.2g relative", worst)
}

// Limits: i alpha²/8 + alpha⁴/48 as alpha falls, 2/(alpha sqrt(i)) + i^{-1}/alpha² as it
// grows; nothing overflows at either end.
func TestLimits(t *testing.T) {
	near(t, "real part at 0.1", real(OneMinusF10(0.1)), 2.08332715e-6, 1e-8)
	near(t, "imaginary part at 0.1", imag(OneMinusF10(0.1)), 1.24999642e-3, 1e-8)
	near(t, "real part at 20", real(F10(20)), 0.0707344226, 1e-8)
	near(t, "imaginary part at 20", imag(F10(20)), -0.0681886812, 1e-8)
	for _, alpha := range []float64{1e-2, 1e-3, 1e-5, 1e-50} {
		a2 := alpha * alpha
		if e := relative(OneMinusF10(alpha), complex(a2*a2/48, a2/8)); e > a2*a2+1e-15 {
			t.Errorf("alpha %g: off its limit by %g", alpha, e)
		}
	}
	for _, alpha := range []float64{1e3, 1e4, 1e6} {
		x := cmplx.Rect(1/alpha, -math.Pi/4)
		if e := relative(F10(alpha), 2*x-x*x-x*x*x/4); e > 1/(alpha*alpha*alpha)+1e-15 {
			t.Errorf("alpha %g: off its limit by %g", alpha, e)
		}
	}
	for _, alpha := range []float64{0, 5e-324, 1e-200, 1e154, 1e200, math.MaxFloat64} {
		for _, v := range []complex128{F10(alpha), OneMinusF10(alpha), Fitted().Root(alpha), CentreRatio(alpha)} {
			if cmplx.IsNaN(v) || cmplx.IsInf(v) || cmplx.Abs(v) > 1.0001 {
				t.Errorf("alpha %g: %v", alpha, v)
			}
		}
	}
	if F10(0) != 1 || OneMinusF10(0) != 0 || Fitted().Root(0) != 0 {
		t.Error("at rest: ", F10(0), OneMinusF10(0), Fitted().Root(0))
	}
}

// F + (1 - F) = 1 for arguments of a Laplace transform, and both are real and
// right on the real axis: 2 I1(2)/(2 I0(2)) = 0.697774657964 (Abramowitz and Stegun
// 1964, tables 9.8: I0(2) = 2.279585302, I1(2) = 1.590636855; from memory).
func TestComplexArguments(t *testing.T) {
	near(t, "F on the real axis", real(F(4)), 1.590636855/2.279585302, 1e-9)
	for _, size := range []float64{1e-3, 0.5, 3, 40, 400, 575, 577, 3000, 1e6} {
		for angle := -85.0; angle <= 85; angle += 17 {
			q := cmplx.Rect(size, angle*degree)
			if e := cmplx.Abs(F(q) + OneMinusF(q) - 1); e > 1e-14 {
				t.Errorf("q %v: the sum is off by %g", q, e)
			}
			// The Riccati equation of rho = I1/I0, as a difference quotient.
			lambda, h := cmplx.Sqrt(q), complex(1e-4, 0)
			rho := func(l complex128) complex128 { return F(l*l) * l / 2 }
			slope := (rho(lambda+h*lambda) - rho(lambda-h*lambda)) / (2 * h * lambda)
			if want := 1 - rho(lambda)/lambda - rho(lambda)*rho(lambda); cmplx.Abs(slope-want) > 1e-7*max(1, cmplx.Abs(want)) {
				t.Errorf("q %v: slope %v, by the Riccati equation %v", q, slope, want)
			}
		}
	}
}

func BenchmarkOneMinusF10(b *testing.B) {
	b.ReportAllocs()
	for i := range b.N {
		sink += OneMinusF10(float64(i%200) / 10)
	}
}

func BenchmarkRoot(b *testing.B) {
	f := Fitted()
	b.ReportAllocs()
	for i := range b.N {
		sink += f.Root(float64(i%200) / 10)
	}
}

var sink complex128
