package womersley

import (
	"math"
	"math/cmplx"
	"testing"
)

// Modulus and phase computed with 40 digits from the definition.
func TestCentreRatio(t *testing.T) {
	for _, row := range []struct{ alpha, modulus, degrees float64 }{
		{1, 0.5003253, 1.193},
		{2, 0.5051638, 4.705},
		{3, 0.5252629, 9.990},
		{5, 0.6511296, 18.500},
		{8, 0.8488731, 12.279},
		{10, 0.8737505, 8.549},
		{15, 0.9099469, 5.671},
		{20, 0.9317669, 4.196},
	} {
		v := CentreRatio(row.alpha)
		if math.Abs(cmplx.Abs(v)-row.modulus) > 6e-8 || math.Abs(cmplx.Phase(v)/degree-row.degrees) > 6e-4 {
			t.Errorf("alpha %g: %.7f, %.4f degrees, want %.7f, %.3f", row.alpha, cmplx.Abs(v), cmplx.Phase(v)/degree, row.modulus, row.degrees)
		}
	}
	if CentreRatio(0) != 0.5 {
		t.Error("steady flow: ", CentreRatio(0))
	}
}

// A profile has mean 1 over the cross-section, int_0^1 2 y u dy, and none at the
// wall (identities of its definition).
func TestProfileHasMeanOne(t *testing.T) {
	for _, alpha := range []float64{0, 1e-6, 0.3, 2, 6, 11, 15.9, 21.9, 22.1, 60} {
		const n = 4000
		mean := complex(0, 0)
		for j := range n { // midpoints
			y := (float64(j) + 0.5) / n
			mean += complex(2*y/n, 0) * Profile(alpha, y)
		}
		if cmplx.Abs(mean-1) > 1e-5 {
			t.Errorf("alpha %g: mean %v", alpha, mean)
		}
		if wall := cmplx.Abs(Profile(alpha, 1)); wall > 1e-12 {
			t.Errorf("alpha %g: %g at the wall", alpha, wall)
		}
	}
}

// Series and expansion agree where one takes over from the other.
func TestProfileIsContinuous(t *testing.T) {
	for y := 0.0; y < 1; y += 0.1 {
		below, above := Profile(seriesEnd, y), Profile(math.Nextafter(seriesEnd, 30), y)
		if e := cmplx.Abs(below - above); e > 1e-11 {
			t.Errorf("y %g: a step of %g", y, e)
		}
	}
}
