package intake

import (
	"errors"
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"

	"afterbeat/data/casefile"
	"afterbeat/tree/study"
)

// calibration is what a person types: "scale 1.02 offset -3", "cuff 120/80", "cuff
// mean:93/80" or "height 10".
type calibration struct {
	scale, offset, height          float64
	hasScale, hasOffset, hasHeight bool
	cuff                           string
}

// parseCalibration reads it; the empty text is no calibration.
func parseCalibration(text string) (calibration, error) {
	c := calibration{scale: 1}
	words := strings.Fields(strings.ReplaceAll(text, "=", " "))
	for k := 0; k < len(words); k += 2 {
		word := strings.ToLower(words[k])
		if !slices.Contains([]string{"scale", "offset", "cuff", "height"}, word) {
			return c, errors.New("write scale FACTOR, offset VALUE, cuff SYS/DIA (or mean:M/DIA), height CM")
		}
		if k+1 == len(words) {
			return c, fmt.Errorf("%s needs a number", word)
		}
		if word == "cuff" {
			if err := study.ParseCuff(words[k+1]); err != nil {
				return c, err
			}
			c.cuff = words[k+1]
			continue
		}
		v, err := strconv.ParseFloat(words[k+1], 64)
		if err != nil || math.IsNaN(v) || math.IsInf(v, 0) {
			return c, fmt.Errorf("%s needs a number, not %q", word, words[k+1])
		}
		switch {
		case word == "height":
			c.height, c.hasHeight = v, true
		case word == "offset":
			c.offset, c.hasOffset = v, true
		case v == 0:
			return c, errors.New("scale 0 would leave nothing of the trace")
		default:
			c.scale, c.hasScale = v, true
		}
	}
	return c, nil
}

// String is the calibration as it is typed.
func (c calibration) String() string {
	var words []string
	if c.hasScale {
		words = append(words, fmt.Sprintf("scale %g", c.scale))
	}
	if c.hasOffset {
		words = append(words, fmt.Sprintf("offset %g", c.offset))
	}
	if c.cuff != "" {
		words = append(words, "cuff "+c.cuff)
	}
	if c.hasHeight {
		words = append(words, fmt.Sprintf("height %g", c.height))
	}
	return strings.Join(words, " ")
}

// answer says what becomes of a value in a unit.
func (c calibration) answer(unit string) string {
	if c.String() == "" {
		return `as in the file; for instance "scale 1.02 offset -3", "cuff 120/80", "height 10"`
	}
	said := fmt.Sprintf("becomes %g x value", c.scale)
	if c.hasOffset {
		said += fmt.Sprintf(" %+g %s", c.offset, unit)
	}
	if c.hasHeight {
		said += fmt.Sprintf(", for a sensor %g cm above the heart", c.height)
	}
	if c.cuff != "" {
		said += ", then as a cuff of " + c.cuff + " mmHg has it"
	}
	return said
}

// calibrated is the calibration that the case has for channel i.
func (n names) calibrated(c casefile.Case, i int) calibration {
	out := calibration{scale: 1}
	if v, ok := entry(n, c.Scale, i); ok {
		out.scale, out.hasScale = v, true
	}
	if v, ok := entry(n, c.Offset, i); ok {
		out.offset, out.hasOffset = v, true
	}
	if v, ok := entry(n, c.SensorHeightCM, i); ok {
		out.height, out.hasHeight = v, true
	}
	out.cuff, _ = entry(n, c.Calibrate, i)
	return out
}

// calibrate puts a calibration into the case.
func (n names) calibrate(c casefile.Case, i int, k calibration) casefile.Case {
	c.Scale, c.Offset = cleared(n, c.Scale, i), cleared(n, c.Offset, i)
	c.Calibrate, c.SensorHeightCM = cleared(n, c.Calibrate, i), cleared(n, c.SensorHeightCM, i)
	if k.cuff != "" {
		c.Calibrate[n[i].Name.String()] = k.cuff
	}
	if k.hasHeight {
		c.SensorHeightCM[n[i].Name.String()] = k.height
	}
	if k.hasScale {
		c.Scale[n[i].Name.String()] = k.scale
	}
	if k.hasOffset {
		c.Offset[n[i].Name.String()] = k.offset
	}
	return c
}
