package womersley

import "testing"

// The fit against the function itself, in every cell, at its ends and beyond.
func TestFit(t *testing.T) {
	f := Fitted()
	worst, at := 0.0, 0.0
	for alpha := 1e-6; alpha < 1e7; {
		root := f.Root(alpha)
		if e := relative(root*root, OneMinusF10(alpha)); e > worst {
			worst, at = e, alpha
		}
		if real(root) < imag(root) || imag(root) < 0 {
			t.Fatalf("alpha %g: %v is the wrong root", alpha, root)
		}
		if alpha < 0.05 || alpha > 30 {
			alpha *= 1.13
		} else {
			alpha += 0.0017
		}
	}
	t.Logf("largest error of 1-F10 %.2g relative, at alpha %g", worst, at)
	if worst > 1e-12 {
		t.Errorf("1-F10 is off by %g at alpha %g", worst, at)
	}
}
