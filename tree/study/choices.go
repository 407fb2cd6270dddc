package study

import (
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"

	"afterbeat/data"
	"afterbeat/data/beat"
	"afterbeat/data/casefile"
	"afterbeat/data/unit"
	"afterbeat/fitting"
)

// ChoiceError is a choice that makes no sense. Key is the key of the case file
// ("site.abp_mmHg"), from which the flag follows.
type ChoiceError struct {
	Key  string
	What string
	Hint string
}

// Flag is the command-line flag of the key.
func (e *ChoiceError) Flag() string {
	key, _, _ := strings.Cut(e.Key, ".")
	return "--" + strings.ReplaceAll(key, "_", "-")
}

// Error names the flag and what is wrong with its value.
func (e *ChoiceError) Error() string {
	_, name, table := strings.Cut(e.Key, ".")
	if table {
		return fmt.Sprintf("%s %s: %s", e.Flag(), data.Clean(name), e.What)
	}
	return fmt.Sprintf("%s: %s", e.Flag(), e.What)
}

// Default 95 % half-widths of systematic errors (models.md 1: common practice
// for a flow probe, assumptions for the rest).
const (
	defaultFlowError     = 0.10 // relative
	defaultScaleError    = 0.03 // relative
	defaultOffsetError   = 2.0  // mmHg
	defaultDiameterError = 0.05 // relative
	defaultAngleError    = 5.0  // degrees
	defaultDelayError    = 0.010
	defaultOutflowError  = 10.0 // mmHg
	defaultSlopeError    = 0.60 // relative, of the filling slope
	defaultCuffError     = 10.0 // mmHg, of each of the two pressures of a cuff (an assumption; ISO 81060-2 allows a mean error of 5 and a standard deviation of 8, from memory)
)

// errorKind says how the half-width of one systematic error is written.
type errorKind struct {
	name     string
	relative bool
	unit     string
	standard float64
}

// example is how a half-width of this error may be written.
func (k errorKind) example() string {
	if k.relative {
		return fmt.Sprintf("--error %s=%g%%", k.name, 100*k.standard)
	}
	return fmt.Sprintf("--error %s=%g (%s)", k.name, k.standard, k.unit)
}

// errorKinds lists the systematic errors that this stage of the work uses.
func errorKinds() []errorKind {
	return []errorKind{
		{"cardiac-output", true, "%", unknownOutputError},
		{"flow", true, "%", defaultFlowError},
		{"pressure-scale", true, "%", defaultScaleError},
		{"pressure-offset", false, "mmHg", defaultOffsetError},
		{"diameter", true, "%", defaultDiameterError},
		{"angle", false, "degrees", defaultAngleError},
		{"delay", false, "s", defaultDelayError},
		{"outflow-pressure", false, "mmHg", defaultOutflowError},
		{"filling-slope", true, "%", defaultSlopeError},
		{"cuff", false, "mmHg", defaultCuffError},
	}
}

// halfWidths returns the 95 % half-width of every systematic error, those of
// the case in place of the defaults. Relative ones are fractions.
func halfWidths(c casefile.Case) (map[string]float64, error) {
	widths := map[string]float64{}
	known := []string{}
	for _, k := range errorKinds() {
		widths[k.name] = k.standard
		known = append(known, k.name)
	}
	widths["cardiac-output"] = outputError(c)
	for _, name := range sorted(c.Error) {
		written := c.Error[name]
		i := slices.Index(known, name)
		key := "error." + name
		if i < 0 {
			return nil, &ChoiceError{Key: key, What: "no systematic error of this name is used yet", Hint: "those in use: " + strings.Join(known, ", ")}
		}
		w, err := parseHalfWidth(written, errorKinds()[i])
		if err != nil {
			return nil, &ChoiceError{Key: key, What: err.Error(), Hint: "a 95 % half-width, for instance " + errorKinds()[i].example()}
		}
		widths[name] = w
	}
	return widths, nil
}

// parseHalfWidth reads "10%", "10 %" or "0.01".
func parseHalfWidth(s string, k errorKind) (float64, error) {
	number, percent := strings.CutSuffix(strings.TrimSpace(s), "%")
	v, err := strconv.ParseFloat(strings.TrimSpace(number), 64)
	if err != nil || math.IsNaN(v) || math.IsInf(v, 0) || v < 0 {
		return 0, fmt.Errorf("not a half-width of 0 or more: %q", s)
	}
	switch {
	case percent && !k.relative:
		return 0, fmt.Errorf("%q is in percent, but this error is in %s", s, k.unit)
	case percent:
		return v / 100, nil
	case k.relative && v >= 1:
		return 0, fmt.Errorf("%q without %% is %g %%: write %g%% or %g", s, 100*v, v, v/100)
	}
	return v, nil
}

// sites checks the sites that the case states, by channel name.
func sites(c casefile.Case) (map[string]data.Site, error) {
	out := map[string]data.Site{}
	for _, name := range sorted(c.Site) {
		s := c.Site[name]
		if !slices.Contains(data.Sites(), data.Site(s)) {
			return nil, &ChoiceError{Key: "site." + name, What: fmt.Sprintf("%q is no site", data.Clean(s)), Hint: "sites: " + joinSites()}
		}
		out[name] = data.Site(s)
	}
	return out, nil
}

func joinSites() string {
	var names []string
	for _, s := range data.Sites() {
		names = append(names, string(s))
	}
	return strings.Join(names, ", ")
}

// delayOf reads the delay of pressure behind flow, s; stated is false where the
// case has none, auto true where it is to be estimated.
func delayOf(c casefile.Case) (seconds float64, stated, auto bool, err error) {
	switch c.Delay {
	case "":
		return 0, false, false, nil
	case "auto":
		return 0, false, true, nil
	}
	d, err := strconv.ParseFloat(c.Delay, 64)
	if err != nil || math.Abs(d) > 1 || math.IsNaN(d) {
		return 0, false, false, &ChoiceError{Key: "delay", What: fmt.Sprintf("not a delay of at most 1 s: %q", data.Clean(c.Delay)), Hint: "auto, or in seconds; positive where pressure is late"}
	}
	return d, true, false, nil
}

// checkModel refuses a model, or a basis, that there is not.
func checkModel(c casefile.Case) error {
	names := []string{"all"}
	for _, m := range fitting.Models() {
		names = append(names, m.Name)
	}
	if c.Model == "" || slices.Contains(names, c.Model) {
		return checkBasis(c)
	}
	return &ChoiceError{Key: "model", What: fmt.Sprintf("%q is no model", data.Clean(c.Model)), Hint: "models: " + list(names)}
}

// criteria are those by which beats are looked for.
func criteria(c casefile.Case) (beat.Criteria, error) {
	switch by := beat.Criteria(c.Beats); by {
	case "":
		return beat.Measured, nil
	case beat.Measured, beat.Support:
		return by, nil
	}
	return "", &ChoiceError{Key: "beats", What: fmt.Sprintf("%q is no way to look for beats", data.Clean(c.Beats)), Hint: "measured, or support for a pulse of a few mmHg"}
}

// checkBasis refuses a basis that there is not.
func checkBasis(c casefile.Case) error {
	names := []string{fitting.BasisBeat, fitting.BasisSpan}
	if c.Basis == "" || slices.Contains(names, c.Basis) {
		return nil
	}
	return &ChoiceError{Key: "basis", What: fmt.Sprintf("%q is no basis of a fit", data.Clean(c.Basis)), Hint: "bases: " + list(names)}
}

// standardShares are the shares of a sweep where the case states none.
func standardShares() []float64 {
	return []float64{0, 0.1, 0.2, 0.3, 0.4, 0.5, 0.6, 0.7, 0.8, 0.9, 1}
}

// shares returns the pump's shares of the flow to compare, rising.
func shares(c casefile.Case) ([]float64, error) {
	if len(c.Share) == 0 {
		return standardShares(), nil
	}
	for _, s := range c.Share {
		if !(s >= 0 && s <= 1) {
			return nil, &ChoiceError{Key: "share", What: fmt.Sprintf("%v is not between 0 and 1", s), Hint: "the pump's part of the mean flow, for instance --share 0.5"}
		}
	}
	out := slices.Clone(c.Share)
	slices.Sort(out)
	return slices.Compact(out), nil
}

// unitOf checks a unit that the case states for a channel.
func unitOf(c casefile.Case) error {
	for _, name := range sorted(c.Unit) {
		if _, ok := unit.Parse(c.Unit[name]); !ok {
			return &ChoiceError{Key: "unit." + name, What: fmt.Sprintf("%q is no unit", data.Clean(c.Unit[name])), Hint: "for instance mmHg, kPa, mL/s, L/min, cm/s, m/s"}
		}
	}
	return nil
}
