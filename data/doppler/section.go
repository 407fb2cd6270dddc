package doppler

import (
	"fmt"

	"afterbeat/data"
	"afterbeat/data/casenote"
)

// Section describes the conversion for the note, with the errors e behind it.
func (c Conversion) Section(e Errors) casenote.Section {
	relative := c.RelativeError(e)
	return casenote.Section{
		Title: "Velocity to flow",
		Words: []data.Text{data.Clean("Q = k v (pi d^2/4) / cos(theta), with d the diameter, k the mean over the measured velocity, theta the angle left between beam and flow.")},
		Rows: []casenote.Row{
			casenote.Words("site", string(c.siteName())),
			casenote.Quantity("diameter d", within(c.Diameter, e.Diameter*c.Diameter), "cm", data.Measured),
			casenote.Quantity("angle theta", within(c.Angle, e.Angle), "degrees", given(c.Angle)),
			casenote.Quantity("factor k", data.Exact(c.K), "", data.Assumed),
			casenote.Words("why this factor", c.why()),
			casenote.Quantity("flow for 1 cm/s", within(c.Gain, relative*c.Gain), "mL/s", data.Estimated),
			casenote.Words("error of flow", fmt.Sprintf("%.1f %% (95 %%), from diameter, velocity and angle in quadrature; the factor's is not in it", 100*relative)),
		},
	}
}

// within is a value known to a half-width, all of it systematic.
func within(x, halfWidth float64) data.Estimate {
	return data.Estimate{
		Value:      x,
		Total:      data.Interval{Low: x - halfWidth, High: x + halfWidth},
		Random:     data.NoInterval(),
		Identified: true,
	}
}

// given is the origin of the angle, whose default is 0.
func given(angle float64) data.Origin {
	if angle == 0 {
		return data.Assumed
	}
	return data.Measured
}

func (c Conversion) why() string {
	switch {
	case c.Factor != 0:
		return "given"
	case c.blunt():
		return "the profile is blunt at this site"
	default:
		return "the profile is not known at this site"
	}
}
