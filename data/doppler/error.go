package doppler

import "math"

// Errors are 95 % half-widths of what goes into the conversion.
type Errors struct {
	Diameter float64 // relative to the diameter
	Velocity float64 // relative to the velocity: calibration, tracing of the envelope
	Angle    float64 // degrees
}

// DefaultErrors are 5 % of the diameter and 5 degrees (common practice), and
// nothing for the velocity: its scale has no default of its own.
func DefaultErrors() Errors { return Errors{Diameter: 0.05, Angle: 5} }

// RelativeError is the 95 % half-width of the flow relative to the flow, to
// first order:
//
//	sqrt((2 dd/d)^2 + (dv/v)^2 + (tan(theta) dtheta)^2)
//
// It panics on an error below 0.
func (c Conversion) RelativeError(e Errors) float64 {
	if e.Diameter < 0 || e.Velocity < 0 || e.Angle < 0 {
		panic("doppler: RelativeError: an error is below 0")
	}
	angle := math.Tan(radians(c.Angle)) * radians(e.Angle)
	return math.Hypot(math.Hypot(2*e.Diameter, e.Velocity), angle)
}

// AngleError is the exact relative error of the flow if the angle is too large
// by excess degrees: cos(angle)/cos(angle+excess) - 1. It is +Inf where the wrong
// angle reaches 90 degrees.
func AngleError(angle, excess float64) float64 {
	if angle+excess >= 90 {
		return math.Inf(1)
	}
	return math.Cos(radians(angle))/math.Cos(radians(angle+excess)) - 1
}

func radians(degrees float64) float64 { return degrees * math.Pi / 180 }
