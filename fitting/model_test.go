package fitting

import (
	"math"
	"math/cmplx"
	"testing"

	"github.com/google/go-cmp/cmp"
	"github.com/google/go-cmp/cmp/cmpopts"
)

// Impedance of the four models at R = 1, C = 1.5, Zc = 0.05, L = 0.005,
// computed independently from the formulas of Westerhof, Lankhaar and Westerhof
// 2009, Med Biol Eng Comput 47:131: frequency in Hz, then modulus and phase in
// degrees of wk2, wk3, wk4p, wk4s.
var impedanceTable = [][9]float64{
	{0, 1, 0, 1.05, 0, 1, 0, 1.05, 0},
	{1.25, 0.084578487, -85.148213, 0.10182766, -55.855845, 0.065471165, -66.382923, 0.072746282, -38.218651},
	{2.5, 0.042403146, -87.56975, 0.066916586, -39.279337, 0.042258261, -27.80828, 0.063179525, 34.929755},
	{5, 0.021215883, -88.784328, 0.054727736, -22.803699, 0.046345763, -8.3868834, 0.14493264, 69.629249},
	{10, 0.010609732, -89.392096, 0.051223267, -11.95337, 0.048960243, -3.3347346, 0.30765882, 80.625691},
	{12.5, 0.0084879579, -89.51367, 0.050786317, -9.6206896, 0.049324527, -2.5831452, 0.38746049, 82.574822},
}

func TestImpedanceTable(t *testing.T) {
	columns := map[string]int{"wk2": 1, "wk3": 3, "wk4p": 5, "wk4s": 7}
	for _, m := range Models() {
		for _, row := range impedanceTable {
			z := m.Impedance(example, 2*math.Pi*row[0])
			modulus, phase := row[columns[m.Name]], row[columns[m.Name]+1]
			if math.Abs(cmplx.Abs(z)/modulus-1) > 1e-7 || math.Abs(cmplx.Phase(z)*180/math.Pi-phase) > 1e-5 {
				t.Errorf("%s at %v Hz: %v, %v degrees, want %v, %v", m.Name, row[0], cmplx.Abs(z), cmplx.Phase(z)*180/math.Pi, modulus, phase)
			}
		}
		if got, want := m.Resistance(example), real(m.Impedance(example, 0)); got != want {
			t.Errorf("%s: resistance %v, Z(0) %v", m.Name, got, want)
		}
	}
}

func TestLumpedIsTheModel(t *testing.T) {
	l := Lumped{Model: model(t, "wk3"), Values: example}
	if l.Resistance() != 1.05 || l.Compliance() != 1.5 || l.CharacteristicImpedance() != 0.05 {
		t.Errorf("wk3: Z(0) %v, C %v, Zc %v", l.Resistance(), l.Compliance(), l.CharacteristicImpedance())
	}
	// High-frequency limit of the impedance, by the formula.
	if z := l.Impedance(1e9); cmplx.Abs(z-0.05) > 1e-8 {
		t.Errorf("wk3 at high frequency: %v", z)
	}
	two := Lumped{Model: model(t, "wk2"), Values: Values{R: 1, C: 1.5}}
	if two.Resistance() != 1 || two.CharacteristicImpedance() != 0 {
		t.Errorf("wk2: Z(0) %v, Zc %v", two.Resistance(), two.CharacteristicImpedance())
	}
}

// Z is the sum of the columns, in the form of the literature and in that of the
// fit; the slopes are those of the columns; Unpack undoes Pack.
func TestColumnsMakeTheImpedance(t *testing.T) {
	for _, m := range Models() {
		x, shape := m.Pack(example)
		if len(x) != m.Linear() || len(shape) != m.Shapes() || len(m.Parameters()) == 0 || m.Source() == "" {
			t.Fatalf("%s: %d factors, %d shapes", m.Name, len(x), len(shape))
		}
		want := example
		if m.Name == "wk2" {
			want.Zc = 0
		}
		if m.Name == "wk2" || m.Name == "wk3" {
			want.L = 0
		}
		if diff := cmp.Diff(want, m.Unpack(x, shape), cmpopts.EquateApprox(1e-15, 0)); diff != "" {
			t.Errorf("%s: Unpack(Pack): %s", m.Name, diff)
		}
		columns, up, down, slope := make([]complex128, len(x)), make([]complex128, len(x)), make([]complex128, len(x)), make([]complex128, len(x))
		for _, w := range []float64{0, 0.3, 7.8, 55, 900} {
			m.columns(w, shape, columns)
			var z complex128
			for j := range x {
				z += complex(x[j], 0) * columns[j]
			}
			if want := m.Impedance(example, w); cmplx.Abs(z-want) > 1e-14*(1+cmplx.Abs(want)) {
				t.Errorf("%s at %v: columns make %v, the formula %v", m.Name, w, z, want)
			}
			for s := range shape {
				m.slopes(w, shape, s, slope)
				const h = 1e-5
				m.columns(w, moved(shape, s, math.Exp(h)), up)
				m.columns(w, moved(shape, s, math.Exp(-h)), down)
				for j := range x {
					if d := (up[j] - down[j]) / (2 * h); cmplx.Abs(d-slope[j]) > 1e-9 {
						t.Errorf("%s at %v: slope of column %d is %v, difference %v", m.Name, w, j, slope[j], d)
					}
				}
			}
		}
	}
}

func moved(shape []float64, s int, by float64) []float64 {
	out := append([]float64(nil), shape...)
	out[s] *= by
	return out
}

func TestByName(t *testing.T) {
	for _, m := range Models() {
		if got, ok := ByName(m.Name); !ok || got != m {
			t.Errorf("ByName(%q) = %v, %v", m.Name, got, ok)
		}
	}
	if m, ok := ByName("wk9"); ok || m != (Model{}) {
		t.Errorf("ByName of an unknown name: %v, %v", m, ok)
	}
}

// The units of a fit to flow and of one per unit area differ by mL and cm.
func TestUnitsPerArea(t *testing.T) {
	for _, m := range Models() {
		for _, s := range m.Parameters() {
			want := map[string]string{"R": "mmHg s/cm", "C": "cm/mmHg", "Zc": "mmHg s/cm", "L": "mmHg s²/cm"}[s.Name]
			if s.PerArea != want {
				t.Errorf("%s: %s per area in %q, want %q", m.Name, s.Name, s.PerArea, want)
			}
		}
	}
}
