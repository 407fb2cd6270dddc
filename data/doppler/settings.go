package doppler

import (
	"fmt"
	"math"
	"strconv"

	"afterbeat/data"
)

// Settings say how velocity becomes flow. Only the diameter must be given.
type Settings struct {
	Diameter float64   // of the vessel where the velocity was measured, cm; above 0
	Angle    float64   // left between beam and flow, degrees; 0 <= Angle < 90, default 0
	Factor   float64   // mean over measured velocity, above 0 and at most 1; 0: by site
	Site     data.Site // decides the factor where none is given; "" is [data.SiteOther]
}

// steepAngle is where a warning begins, degrees: 5 degrees of error in the
// angle are 18.3 % of the flow at 60 degrees and 32.1 % at 70.
const steepAngle = 60

// Diameters outside these, cm, are likelier to be a slip of the unit than a
// vessel of an adult (common practice).
const (
	smallDiameter = 0.1
	largeDiameter = 6.0
)

// ParseProfile reads what a user says about the profile: a factor (mean over
// measured velocity, above 0 and at most 1), or "" for the factor of the site,
// which comes back as 0.
func ParseProfile(s string) (factor float64, err error) {
	switch s {
	case "":
		return 0, nil
	case "womersley":
		return 0, fmt.Errorf("profile %q is not available: give a factor from 0.5 (parabola) to 1 (blunt)", s)
	}
	factor, err = strconv.ParseFloat(s, 64)
	if err != nil {
		return 0, fmt.Errorf("profile is not a number: %q", data.Clean(s))
	}
	return factor, checkFactor(factor)
}

func checkFactor(k float64) error {
	if !(k > 0 && k <= 1) {
		return fmt.Errorf("profile factor must be above 0 and at most 1 (mean over largest velocity), is %g", k)
	}
	return nil
}

// check refuses what gives no flow.
func (s Settings) check() error {
	if !(s.Diameter > 0) || math.IsInf(s.Diameter, 1) {
		return fmt.Errorf("diameter must be above 0 cm, is %g", s.Diameter)
	}
	if !(s.Angle >= 0 && s.Angle < 90) {
		return fmt.Errorf("angle must be at least 0 and below 90 degrees, is %g", s.Angle)
	}
	if s.Factor == 0 {
		return nil
	}
	return checkFactor(s.Factor)
}

// factor is the one given, else the site's: 1 in any case, since nothing
// better is known where the profile is not blunt.
func (s Settings) factor() float64 {
	if s.Factor != 0 {
		return s.Factor
	}
	return 1
}

// blunt tells whether the profile of the site is flat: those that all of the
// heart's output passes lie within the entrance length.
func (s Settings) blunt() bool { return s.Site.Systemic() }
