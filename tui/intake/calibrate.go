package intake

import (
	"errors"
	"fmt"
	"math"
	"strconv"
	"strings"

	"afterbeat/data/casefile"
)

// calibration is what a person types: "scale 1.02 offset -3".
type calibration struct {
	scale, offset       float64
	hasScale, hasOffset bool
}

// parseCalibration reads it; the empty text is no calibration.
func parseCalibration(text string) (calibration, error) {
	c := calibration{scale: 1}
	words := strings.Fields(strings.ReplaceAll(text, "=", " "))
	for k := 0; k < len(words); k += 2 {
		word := strings.ToLower(words[k])
		if word != "scale" && word != "offset" {
			return c, errors.New("write scale FACTOR, offset VALUE, or both")
		}
		if k+1 == len(words) {
			return c, fmt.Errorf("%s needs a number", word)
		}
		v, err := strconv.ParseFloat(words[k+1], 64)
		if err != nil || math.IsNaN(v) || math.IsInf(v, 0) {
			return c, fmt.Errorf("%s needs a number, not %q", word, words[k+1])
		}
		switch {
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
	return strings.Join(words, " ")
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
	return out
}

// calibrate puts a calibration into the case.
func (n names) calibrate(c casefile.Case, i int, k calibration) casefile.Case {
	c.Scale, c.Offset = cleared(n, c.Scale, i), cleared(n, c.Offset, i)
	if k.hasScale {
		c.Scale[n[i].Name.String()] = k.scale
	}
	if k.hasOffset {
		c.Offset[n[i].Name.String()] = k.offset
	}
	return c
}
