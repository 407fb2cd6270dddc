package study

import (
	"bytes"
	"fmt"
	"math"
	"slices"

	"github.com/pelletier/go-toml/v2"

	"afterbeat/data"
	"afterbeat/data/unit"
	"afterbeat/fitting"
	"afterbeat/tree/support"
)

// LoadSpec is the file of `solve load`: a lumped load, the flow into it, and
// where asked for, the shares of a pump.
type LoadSpec struct {
	Model  string    `toml:"model"`
	R      *float64  `toml:"R"`  // mmHg s/mL
	C      *float64  `toml:"C"`  // mL/mmHg
	Zc     *float64  `toml:"Zc"` // mmHg s/mL
	L      *float64  `toml:"L"`  // mmHg s²/mL
	Pv     float64   `toml:"Pv"` // mmHg
	Inflow string    `toml:"inflow"`
	Posing string    `toml:"posing"`
	Shares []float64 `toml:"shares"`
}

// ReadLoadSpec parses the file. Errors are of type [data.FileError].
func ReadLoadSpec(name string, content []byte) (LoadSpec, error) {
	var spec LoadSpec
	d := toml.NewDecoder(bytes.NewReader(content)).DisallowUnknownFields()
	if err := d.Decode(&spec); err != nil {
		return spec, tomlError(name, err, "model", "R", "C", "Zc", "L", "Pv", "inflow", "posing", "shares")
	}
	return spec, nil
}

// Load is the load that the spec describes. file names it in errors.
func (s LoadSpec) Load(file string) (fitting.Lumped, error) {
	refuse := func(format string, args ...any) (fitting.Lumped, error) {
		return fitting.Lumped{}, &data.FileError{File: file, What: fmt.Sprintf(format, args...)}
	}
	m, ok := fitting.ByName(s.Model)
	if !ok {
		var names []string
		for _, m := range fitting.Models() {
			names = append(names, m.Name)
		}
		return refuse("model %q is none of %s", data.Clean(s.Model), list(names))
	}
	given := map[string]*float64{"R": s.R, "C": s.C, "Zc": s.Zc, "L": s.L}
	var values fitting.Values
	into := map[string]*float64{"R": &values.R, "C": &values.C, "Zc": &values.Zc, "L": &values.L}
	for _, p := range m.Parameters() {
		v := given[p.Name]
		if v == nil {
			return refuse("%s is missing: %s needs it", p.Name, m.Name)
		}
		if !(*v >= 0) || math.IsInf(*v, 0) {
			return refuse("%s = %v is not a number of 0 or more", p.Name, *v)
		}
		*into[p.Name] = *v
		delete(given, p.Name)
	}
	for _, name := range sorted(given) {
		if given[name] != nil {
			return refuse("%s was given, but %s has none", name, m.Name)
		}
	}
	if math.IsNaN(s.Pv) || math.IsInf(s.Pv, 0) {
		return refuse("Pv = %v is not a number", s.Pv)
	}
	return fitting.Lumped{Model: m, Values: values}, nil
}

// ReadPeriod reads a flow of exactly one period: columns time_s and flow_mL_s,
// N even steps, period N times the step.
func ReadPeriod(name string, content []byte) (data.Period, error) {
	rec, err := data.ReadCSV(name, bytes.NewReader(content), data.ReadOptions{})
	if err != nil {
		return data.Period{}, err
	}
	i := slices.IndexFunc(rec.Channels, func(c data.Channel) bool { return c.Quantity == unit.Flow })
	if i < 0 {
		return data.Period{}, &data.FileError{File: name, Line: 1, What: "no flow column", Hint: "name it flow_mL_s"}
	}
	if rec.Channels[i].Missing() > 0 {
		return data.Period{}, &data.FileError{File: name, What: "the flow has missing samples; one period needs them all"}
	}
	clock := rec.Clock()
	if clock.Repeated > 0 || clock.LongestStep > 1.01/clock.Rate {
		return data.Period{}, &data.FileError{File: name, What: "the steps of time_s are not even"}
	}
	return data.Period{Samples: rec.Channels[i].Values, Rate: clock.Rate}, nil
}

// LoadPower is the power into a load, mmHg mL/s.
type LoadPower struct {
	Input     Number `json:"input"`
	Steady    Number `json:"steady"`
	Pulsatile Number `json:"pulsatile"`
}

// LoadState is the pressure of a load under one inflow.
type LoadState struct {
	Pressure      []Number  `json:"pressure"`
	Mean          Number    `json:"mean"`
	Min           Number    `json:"min"`
	Max           Number    `json:"max"`
	PulsePressure Number    `json:"pulse_pressure"`
	EEP           Number    `json:"eep"`
	SHE           Number    `json:"she"`
	Energy        LoadPower `json:"energy"`
}

// LoadShare is the state at one share of a pump.
type LoadShare struct {
	Share          Number `json:"share"`
	ByConstruction bool   `json:"by_construction"`
	LoadState
	RetainedPulse struct {
		Pressure Number `json:"pressure"`
		Flow     Number `json:"flow"`
	} `json:"retained_pulse"`
}

// LoadReport is what `solve load --json` prints.
type LoadReport struct {
	Head
	LoadState
	Posing   *support.Posing `json:"posing,omitempty"`
	States   []LoadShare     `json:"states,omitempty"`
	Warnings []WarningReport `json:"warnings"`
}
