package intake

import (
	"errors"
	"fmt"
	"math"
	"strconv"
	"strings"

	"afterbeat/data/casefile"
)

// beside is what was measured beside the recording, and is no channel of it. Of
// each, nil is not stated.
type beside struct {
	diameter, angle, delay, outflow *float64 // cm, degrees, s, mmHg
}

// besideOf is what the case states. A delay that is no number is left to the
// study, which says what is wrong with it.
func besideOf(c casefile.Case) beside {
	b := beside{diameter: c.DiameterCM, angle: c.AngleDeg, outflow: c.OutflowPressure}
	if v, err := strconv.ParseFloat(c.Delay, 64); err == nil {
		b.delay = &v
	}
	return b
}

// into is the case with what was measured.
func (b beside) into(c casefile.Case) casefile.Case {
	was := besideOf(c).delay
	switch {
	case b.delay == nil:
		c.Delay = ""
	case was == nil || *was != *b.delay: // else it stays as it was written
		c.Delay = written(*b.delay)
	}
	c.DiameterCM, c.AngleDeg, c.OutflowPressure = b.diameter, b.angle, b.outflow
	return c
}

// part is one of what was measured, by the word that a person types.
type part struct {
	word, unit string
	value      **float64
	wrong      func(float64) string // why a value cannot be; empty where it can
}

func (b *beside) parts() []part {
	return []part{
		{"diameter", "cm", &b.diameter, func(v float64) string {
			return unless(v > 0, "the diameter is above 0 cm")
		}},
		{"angle", "deg", &b.angle, func(v float64) string {
			return unless(v >= 0 && v < 90, "the angle is at least 0 and below 90 degrees")
		}},
		{"delay", "s", &b.delay, func(v float64) string {
			return unless(math.Abs(v) <= 1, "the delay is in seconds, at most 1 either way")
		}},
		{"outflow", "mmHg", &b.outflow, func(float64) string { return "" }},
	}
}

func unless(holds bool, words string) string {
	if holds {
		return ""
	}
	return words
}

// changed is b with what the text states: "diameter 2.1 angle 0 delay 0.025
// outflow 8", any of them; none takes one back, and what is not named stays.
func (b beside) changed(text string) (beside, error) {
	words := strings.Fields(strings.NewReplacer("=", " ", ",", " ").Replace(text))
	for k := 0; k < len(words); k += 2 {
		p, ok := b.part(strings.ToLower(words[k]))
		if !ok {
			return b, fmt.Errorf("%q is none of diameter, angle, delay, outflow", words[k])
		}
		if k+1 == len(words) {
			return b, fmt.Errorf("%s needs a number in %s, or none", p.word, p.unit)
		}
		if strings.EqualFold(words[k+1], "none") {
			*p.value = nil
			continue
		}
		v, err := strconv.ParseFloat(words[k+1], 64)
		if err != nil || math.IsNaN(v) || math.IsInf(v, 0) {
			return b, fmt.Errorf("%s needs a number in %s, or none, not %q", p.word, p.unit, words[k+1])
		}
		if why := p.wrong(v); why != "" {
			return b, errors.New(why)
		}
		*p.value = &v
	}
	return b, nil
}

func (b *beside) part(word string) (part, bool) {
	for _, p := range b.parts() {
		if p.word == word {
			return p, true
		}
	}
	return part{}, false
}

// refused says why the values make no sense together, or with the recording: a
// velocity with an angle needs a diameter, and the outflow pressure lies below
// the mean pressure, mmHg, which is NaN before it is known, and below 0 where the
// channel is upside down.
func (b beside) refused(velocity bool, mean float64) string {
	switch {
	case velocity && b.diameter == nil && b.angle != nil && *b.angle != 0:
		return "an angle needs the diameter too"
	case b.outflow != nil && mean > 0 && *b.outflow >= mean:
		return fmt.Sprintf("the outflow pressure must lie below the mean pressure of %.4g mmHg", mean)
	}
	return ""
}

// typed is what is stated, as it is typed.
func (b beside) typed() string {
	var words []string
	for _, p := range b.parts() {
		if *p.value != nil {
			words = append(words, p.word+" "+written(**p.value))
		}
	}
	return strings.Join(words, " ")
}

// String is all of it with its units.
func (b beside) String() string {
	var words []string
	for _, p := range b.parts() {
		if *p.value == nil {
			words = append(words, p.word+" none")
		} else {
			words = append(words, p.word+" "+written(**p.value)+" "+p.unit)
		}
	}
	return strings.Join(words, ", ")
}

func written(v float64) string { return strconv.FormatFloat(v, 'g', -1, 64) }
