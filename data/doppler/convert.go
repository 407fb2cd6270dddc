package doppler

import (
	"fmt"
	"math"

	"afterbeat/data"
	"afterbeat/data/unit"
)

// Conversion is the way from a velocity to a flow.
type Conversion struct {
	Settings         // as given
	Area     float64 // pi d^2/4, cm²
	K        float64 // the factor used
	Gain     float64 // k Area/cos(theta), cm²: mL/s for each cm/s
	Warnings []data.Warning
}

// NewConversion checks s and works out the gain. The error says which setting
// is missing or out of its range.
func NewConversion(s Settings) (Conversion, error) {
	if err := s.check(); err != nil {
		return Conversion{}, fmt.Errorf("velocity to flow: %w", err)
	}
	area := math.Pi * s.Diameter * s.Diameter / 4
	k := s.factor()
	return Conversion{
		Settings: s,
		Area:     area,
		K:        k,
		Gain:     k * area / math.Cos(radians(s.Angle)),
		Warnings: s.warnings(),
	}, nil
}

// ToFlow returns the flow, mL/s, that goes with a velocity, and how it was
// made. A site missing in s is the channel's. The flow keeps the channel's name
// and site; where the velocity is missing (NaN) so is the flow. It is an error
// if the channel holds no velocity in a known unit.
func ToFlow(velocity data.Channel, s Settings) (data.Channel, Conversion, error) {
	if velocity.Quantity != unit.Velocity {
		return data.Channel{}, Conversion{}, fmt.Errorf("velocity to flow: %q holds %s, not velocity", velocity.Name, velocity.Quantity)
	}
	if !velocity.Unit.Calibrated {
		return data.Channel{}, Conversion{}, fmt.Errorf("velocity to flow: the unit of %q is not one of velocity", velocity.Name)
	}
	if s.Site == "" {
		s.Site = velocity.Site
	}
	c, err := NewConversion(s)
	if err != nil {
		return data.Channel{}, Conversion{}, err
	}
	for i := range c.Warnings {
		c.Warnings[i].Channel = velocity.Name
	}
	flow := velocity
	flow.Quantity, flow.Unit = unit.Flow, unit.Internal(unit.Flow)
	flow.Values = c.Flow(velocity.Values)
	return flow, c, nil
}

// Flow returns Gain times the velocities (cm/s): mL/s. Applied to a
// velocity-time integral in cm it gives the volume in mL.
func (c Conversion) Flow(velocity []float64) []float64 {
	flow := make([]float64, len(velocity))
	for i, v := range velocity {
		flow[i] = c.Gain * v
	}
	return flow
}
