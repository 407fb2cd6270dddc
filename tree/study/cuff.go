package study

import (
	"errors"
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"

	"afterbeat/data"
	"afterbeat/data/beat"
	"afterbeat/data/casefile"
	"afterbeat/data/unit"
)

// Cuff is a calibration of a pressure by two pressures of a cuff, U the upper
// (systolic or mean) and D the diastolic, against the same two of the trace, u and d
// (medians over its used beats):
//
//	P = D + g (p - d),  g = (U - D)/(u - d)
//
// With errors e of the cuff in U and D, independent and alike, the error of P is
//
//	(e_U + e_D)/2 + (e_U - e_D)/(U - D) (P - (U + D)/2),
//
// two parts that do not go together: an offset of e/sqrt(2), and a scale about the
// pivot (U + D)/2 of sqrt(2) e/(U - D).
type Cuff struct {
	Upper, Diastolic float64 // mmHg
	Mean             bool    // Upper is the mean pressure, else the systolic
	Scale, Shift     float64 // P = Scale p + Shift
}

// parseCuff reads "120/80" or "mean:93/80".
func parseCuff(text string) (Cuff, error) {
	rest, mean := strings.CutPrefix(strings.ToLower(strings.TrimSpace(text)), "mean:")
	upper, lower, ok := strings.Cut(rest, "/")
	u, errU := strconv.ParseFloat(strings.TrimSpace(upper), 64)
	d, errD := strconv.ParseFloat(strings.TrimSpace(lower), 64)
	if !ok || errU != nil || errD != nil || math.IsInf(u, 0) || !(d > 0) {
		return Cuff{}, fmt.Errorf("not two pressures of a cuff: %q", data.Clean(text))
	}
	if !(u > d) {
		return Cuff{}, errors.New("the upper pressure is not above the diastolic")
	}
	return Cuff{Upper: u, Diastolic: d, Mean: mean}, nil
}

// ParseCuff checks what a case says of a cuff.
func ParseCuff(text string) error {
	_, err := parseCuff(text)
	return err
}

// cuffs are the cuffs of a case, by channel.
func cuffs(channels []data.Channel, c casefile.Case) (map[int]Cuff, error) {
	out := map[int]Cuff{}
	for _, name := range sorted(c.Calibrate) {
		key := "calibrate." + name
		i, err := data.FindChannel(channels, name, "--calibrate")
		if err != nil {
			return nil, noColumn(key, err, channels)
		}
		if channels[i].Quantity != unit.Pressure {
			return nil, &ChoiceError{Key: key, What: "the column is no pressure", Hint: "a cuff calibrates pressures; --scale and --offset any column"}
		}
		cuff, err := parseCuff(c.Calibrate[name])
		if err != nil {
			return nil, &ChoiceError{Key: key, What: err.Error(), Hint: fmt.Sprintf("for instance --calibrate %s=120/80, or %s=mean:93/80, in mmHg", data.Clean(name), data.Clean(name))}
		}
		out[i] = cuff
	}
	return out, nil
}

// against sets the cuff against a trace.
func (c Cuff) against(values []float64, rate float64) (Cuff, error) {
	p := beat.Find(values, rate, unit.Pressure)
	upper := p.Systolic
	if c.Mean {
		upper = p.Mean
	}
	if !p.Found || !(upper > p.Diastolic) {
		why := p.Reason
		if p.Found {
			why = "no usable beat"
		}
		return c, &ChoiceError{Key: "calibrate", What: "there is no pulse to set the cuff against: " + why, Hint: "state --scale and --offset instead"}
	}
	c.Scale = (c.Upper - c.Diastolic) / (upper - p.Diastolic)
	c.Shift = c.Diastolic - c.Scale*p.Diastolic
	return c, nil
}

// pressureErrors are the systematic errors of the chosen pressure, 95 % half-widths.
type pressureErrors struct {
	Scale, Offset float64 // relative; mmHg
	Pivot         float64 // mmHg, see [Cuff]
	FromCuff      bool
}

func (c Cuff) errors(e float64) pressureErrors {
	return pressureErrors{
		Scale: math.Sqrt2 * e / (c.Upper - c.Diastolic), Offset: e / math.Sqrt2,
		Pivot: (c.Upper + c.Diastolic) / 2, FromCuff: true,
	}
}

// pressureErrors are those of a cuff where the pressure was calibrated by one, unless
// the case states a scale's or an offset's own.
func (t Intake) pressureErrors(widths map[string]float64) pressureErrors {
	e := pressureErrors{Scale: widths["pressure-scale"], Offset: widths["pressure-offset"]}
	cuff, ok := t.Cuffs[t.Selection.Pressure]
	if !ok || t.Case.Error["pressure-scale"] != "" || t.Case.Error["pressure-offset"] != "" {
		return e
	}
	return cuff.errors(widths["cuff"])
}

// cuffWarnings say what a calibration by a cuff is worth.
func (t Intake) cuffWarnings() []data.Warning {
	widths, err := halfWidths(t.Case)
	if err != nil {
		return nil // refused when the beats are cut
	}
	var out []data.Warning
	for i, ch := range t.Channels {
		cuff, ok := t.Cuffs[i]
		if !ok {
			continue
		}
		e := cuff.errors(widths["cuff"])
		out = append(out, data.Warning{
			Code: data.CodeCuff, Channel: ch.Name,
			Text: fmt.Sprintf("calibrated by a cuff of %s, each within %.3g mmHg: the pulse pressure is sure to %.0f %%, the level to %.2g mmHg", cuff, widths["cuff"], 100*e.Scale, e.Offset),
			Cure: "state what the cuff is worth with --error cuff=MMHG, or compare with a pressure measured inside an artery",
		})
	}
	return out
}

// String is the cuff in words.
func (c Cuff) String() string {
	if c.Mean {
		return fmt.Sprintf("mean %.4g and diastolic %.4g mmHg", c.Upper, c.Diastolic)
	}
	return fmt.Sprintf("%.4g/%.4g mmHg", c.Upper, c.Diastolic)
}

// readWarnings are those of the reading, without what a calibration has cured.
func (t Intake) readWarnings() []data.Warning {
	return slices.DeleteFunc(slices.Clone(t.Recording.Warnings), func(w data.Warning) bool {
		if w.Code != data.CodeUncalibrated {
			return false
		}
		for i := range t.Cuffs {
			if t.Channels[i].Name == w.Channel {
				return true
			}
		}
		return false
	})
}

// Densities, g/mL, and gravity, cm/s², of the column between sensor and heart: blood
// in a finger, the flushing fluid in a line (common practice).
const (
	densityOfBlood = 1.06
	densityOfFluid = 1.0
	gravity        = 980.665
)

// hydrostatic is what a cm of height above the heart takes off a pressure, mmHg.
func hydrostatic(s data.Site) float64 {
	if s == data.SiteFinger {
		return densityOfBlood * gravity / unit.DynPerMmHg
	}
	return densityOfFluid * gravity / unit.DynPerMmHg
}
