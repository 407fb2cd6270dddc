package study

import (
	"afterbeat/data"
	"afterbeat/data/casefile"
	"afterbeat/data/doppler"
)

// dopplerSettings are the choices about velocity, checked whether or not a
// velocity is used. The diameter is 0 where the case has none.
func dopplerSettings(c casefile.Case) (doppler.Settings, error) {
	k, err := doppler.ParseProfile(c.Profile)
	if err != nil {
		return doppler.Settings{}, &ChoiceError{Key: "profile", What: err.Error(), Hint: "a factor, the mean velocity over the measured one: 1 for a blunt profile, 0.5 for a parabola"}
	}
	s := doppler.Settings{Diameter: 1, Factor: k}
	if c.DiameterCM != nil {
		s.Diameter = *c.DiameterCM
	}
	if _, err := doppler.NewConversion(s); err != nil {
		return s, &ChoiceError{Key: "diameter_cm", What: err.Error(), Hint: "the inner diameter where the velocity was measured, in cm"}
	}
	if c.AngleDeg != nil {
		s.Angle = *c.AngleDeg
	}
	if _, err := doppler.NewConversion(s); err != nil {
		return s, &ChoiceError{Key: "angle_deg", What: err.Error(), Hint: "the angle that the velocity is not yet corrected for, from 0 to below 90 degrees"}
	}
	if c.DiameterCM == nil {
		s.Diameter = 0
	}
	return s, nil
}

// fromVelocity is the flow that a velocity makes with the diameter of the case,
// or the velocity itself, as flow per unit area, where it has none.
func (b *Beats) fromVelocity(ch data.Channel, settings doppler.Settings, widths map[string]float64) ([]float64, error) {
	if settings.Diameter == 0 {
		b.FlowInfo.PerArea = true
		if settings.Angle != 0 || settings.Factor != 0 {
			return nil, &ChoiceError{Key: "diameter_cm", What: "an angle or a profile was given without the diameter", Hint: "state the diameter, in cm"}
		}
		b.Warnings = append(b.Warnings, data.Warning{
			Code: data.CodePerArea, Channel: ch.Name,
			Text: "velocity without a diameter: R, C and Zc are per unit area of the vessel",
			Cure: "--diameter-cm D, where the velocity was measured",
		})
		return ch.Values, nil
	}
	if !ch.Unit.Calibrated {
		return ch.Values, nil // refused with its reason by the fit
	}
	flow, conversion, err := doppler.ToFlow(ch, settings)
	if err != nil {
		return nil, err
	}
	b.FlowInfo.Conversion = &conversion
	b.FlowInfo.ConversionErrors = doppler.Errors{Diameter: widths["diameter"], Angle: widths["angle"]}
	if _, given := b.Intake.Case.Error["flow"]; given { // all of it, as one
		b.FlowInfo.ConversionErrors = doppler.Errors{Velocity: widths["flow"]}
	}
	b.FlowInfo.Error = conversion.RelativeError(b.FlowInfo.ConversionErrors)
	b.Warnings = append(b.Warnings, conversion.Warnings...)
	return flow.Values, nil
}
