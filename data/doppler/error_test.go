package doppler

import (
	"math"
	"testing"

	"afterbeat/data"
)

// Arithmetic, V = c fd/(2 f0 cos theta): what an angle 5 degrees too large adds.
func TestAngleErrorIsTheRatioOfCosines(t *testing.T) {
	for _, row := range []struct{ angle, percent float64 }{{0, 0.4}, {30, 5.7}, {45, 10.0}, {60, 18.3}, {70, 32.1}} {
		near(t, "AngleError", 100*AngleError(row.angle, 5), row.percent, 0.05)
		right, wrong := convert(t, Settings{Diameter: 2, Angle: row.angle}), convert(t, Settings{Diameter: 2, Angle: row.angle + 5})
		near(t, "ratio of gains", 100*(wrong.Gain/right.Gain-1), row.percent, 0.05)
	}
	if got := AngleError(86, 5); !math.IsInf(got, 1) {
		t.Errorf("beyond 90 degrees: %v", got)
	}
}

// tan(theta) dtheta by hand, for 5 degrees = 0.087266 rad: tan 30 = 0.57735,
// tan 45 = 1, tan 60 = 1.73205, tan 70 = 2.74748. The exact error exceeds it by
// (1/2 + tan^2) dtheta^2 + (5/6 tan + tan^3) dtheta^3 + ..., its Taylor series.
func TestRelativeErrorOfAngle(t *testing.T) {
	for _, row := range []struct{ angle, percent float64 }{{0, 0}, {30, 5.04}, {45, 8.73}, {60, 15.11}, {70, 23.98}} {
		c := convert(t, Settings{Diameter: 2, Angle: row.angle})
		first := c.RelativeError(Errors{Angle: 5})
		near(t, "first order", 100*first, row.percent, 0.005)
		tan, d := math.Tan(radians(row.angle)), radians(5)
		near(t, "exact, to third order", AngleError(row.angle, 5)/(first+(0.5+tan*tan)*d*d+(5*tan/6+tan*tan*tan)*d*d*d), 1, 0.02)
	}
}

// 2.0 cm +- 0.1 cm is 10 % of the flow; in quadrature with 24 % of velocity,
// 26 % (the triple 5, 12, 13).
func TestRelativeErrorInQuadrature(t *testing.T) {
	c := convert(t, Settings{Diameter: 2, Site: data.SiteLVOT})
	near(t, "diameter", c.RelativeError(Errors{Diameter: 0.05}), 0.10, 1e-15)
	near(t, "diameter and velocity", c.RelativeError(Errors{Diameter: 0.05, Velocity: 0.24}), 0.26, 1e-15)
	near(t, "default", c.RelativeError(DefaultErrors()), 0.10, 1e-15)

	c = convert(t, Settings{Diameter: 2, Angle: 45, Site: data.SiteLVOT})
	near(t, "default at 45 degrees", c.RelativeError(DefaultErrors()), math.Sqrt(0.01+0.087266*0.087266), 1e-6)
}

// The exact interval of the stroke volume, 56.71 to 69.27 mL of 62.83, differs
// from the first order's by (dd/d)^2 = 0.25 % at both ends.
func TestFirstOrderOfDiameter(t *testing.T) {
	c := convert(t, Settings{Diameter: 2, Site: data.SiteLVOT})
	half := c.RelativeError(Errors{Diameter: 0.05})
	near(t, "low", 62.83*(1-half+0.0025), 56.71, 0.01)
	near(t, "high", 62.83*(1+half+0.0025), 69.27, 0.01)
}

func TestNegativeErrorPanics(t *testing.T) {
	defer func() {
		if recover() == nil {
			t.Error("no panic")
		}
	}()
	convert(t, Settings{Diameter: 2}).RelativeError(Errors{Diameter: -0.05})
}
