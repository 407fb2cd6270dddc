package doppler

import (
	"fmt"

	"afterbeat/data"
)

func (s Settings) warnings() []data.Warning {
	var all []data.Warning
	add := func(code data.Code, text, cure string) {
		all = append(all, data.Warning{Code: code, Text: text, Cure: cure})
	}
	switch {
	case s.blunt() && s.Factor != 0 && s.Factor != 1:
		add(data.CodeProfile,
			fmt.Sprintf("a profile factor of %.3g was given, where the profile is blunt (factor 1): flow is %.3g times what 1 gives", s.Factor, s.Factor),
			"leave the factor out, or note what it was measured with")
	case !s.blunt() && s.Factor == 0:
		add(data.CodeProfile,
			fmt.Sprintf("the velocity at site %q is taken as the mean over the section (factor 1); if it is the envelope of a parabolic profile, flow is 1/2 of this, R and Zc double and C halves", s.siteName()),
			"give the factor (profile), or export the spatial mean velocity")
	}
	if s.Angle > steepAngle {
		add(data.CodeSteepAngle,
			fmt.Sprintf("the angle is %.3g degrees: an error of 5 degrees changes the flow by %.0f %%", s.Angle, 100*AngleError(s.Angle, 5)),
			"measure again with the beam within 60 degrees of the flow")
	}
	if s.Diameter < smallDiameter || s.Diameter > largeDiameter {
		add(data.CodeUnlikely,
			fmt.Sprintf("the diameter is %.3g cm, outside %g to %g cm", s.Diameter, smallDiameter, largeDiameter),
			"give the diameter in cm, not in mm or m")
	}
	return all
}

func (s Settings) siteName() data.Site {
	if s.Site == "" {
		return data.SiteOther
	}
	return s.Site
}
