package study

import (
	"bytes"
	"fmt"
	"math"
	"slices"
	"strings"

	"github.com/pelletier/go-toml/v2"

	"afterbeat/data"
	"afterbeat/tree"
)

// TreeSpec is the file of `solve tree`: a table of segments, one period of flow
// into the root, and what is asked for.
type TreeSpec struct {
	Table           string   `toml:"table"`
	Inflow          string   `toml:"inflow"`
	Harmonics       *int     `toml:"harmonics"` // default and most: (N - 1)/2
	Density         *float64 `toml:"density_g_mL"`
	Viscosity       *float64 `toml:"viscosity_poise"`
	OutflowPressure float64  `toml:"outflow_pressure_mmHg"`
	WallTau         float64  `toml:"wall_tau_s"`
	Line            string   `toml:"line"` // womersley or poiseuille
	Steady          bool     `toml:"steady"`
	Response        bool     `toml:"response"`

	file  string
	lines []string
}

var treeKeys = []string{
	"table", "inflow", "harmonics", "density_g_mL", "viscosity_poise",
	"outflow_pressure_mmHg", "wall_tau_s", "line", "steady", "response",
}

// ReadTreeSpec parses the file. Errors are of type [data.FileError].
func ReadTreeSpec(name string, content []byte) (TreeSpec, error) {
	spec := TreeSpec{file: name, lines: strings.Split(string(content), "\n")}
	d := toml.NewDecoder(bytes.NewReader(content)).DisallowUnknownFields()
	if err := d.Decode(&spec); err != nil {
		return spec, tomlError(name, err, treeKeys...)
	}
	return spec, nil
}

// refuse is an error about a key.
func (s TreeSpec) refuse(key, hint, format string, args ...any) error {
	line := 1 + slices.IndexFunc(s.lines, func(line string) bool {
		name, _, found := strings.Cut(line, "=")
		return found && strings.TrimSpace(name) == key
	})
	return &data.FileError{File: s.file, Line: line, What: fmt.Sprintf(format, args...), Hint: hint}
}

// network reads the table and puts what the spec says about blood and walls to it.
func (s TreeSpec) network(read func(string) ([]byte, error)) (tree.Network, error) {
	if s.Table == "" {
		return tree.Network{}, s.refuse("table", "name a table of segments: table = \"tree.csv\"", "table is missing")
	}
	blood := tree.StandardBlood()
	for _, v := range []struct {
		key   string
		given *float64
		into  *float64
		least float64 // below it the value makes no sense
	}{
		{"density_g_mL", s.Density, &blood.Density, math.SmallestNonzeroFloat64},
		{"viscosity_poise", s.Viscosity, &blood.Viscosity, 0},
		{"wall_tau_s", &s.WallTau, new(float64), 0},
		{"outflow_pressure_mmHg", &s.OutflowPressure, new(float64), math.Inf(-1)},
	} {
		if v.given == nil {
			continue
		}
		if !(*v.given >= v.least) || math.IsInf(*v.given, 0) {
			return tree.Network{}, s.refuse(v.key, "", "%s = %g is not a number that it can have", v.key, *v.given)
		}
		*v.into = *v.given
	}
	line := tree.Line(s.Line)
	if line != "" && line != tree.Womersley && line != tree.Poiseuille {
		return tree.Network{}, s.refuse("line", "", "line %q is none of womersley, poiseuille", data.Clean(s.Line))
	}
	content, err := read(s.Table)
	if err != nil {
		return tree.Network{}, err
	}
	n, err := tree.Read(s.Table, bytes.NewReader(content))
	if err != nil {
		return n, err
	}
	n.Blood, n.OutflowPressure, n.WallTau, n.Line = blood, s.OutflowPressure, s.WallTau, line
	return n, nil
}

// harmonics is how many are asked for of n samples.
func (s TreeSpec) harmonics(n int) (int, error) {
	most := (n - 1) / 2
	if s.Harmonics == nil {
		return most, nil
	}
	if *s.Harmonics < 1 || *s.Harmonics > most {
		return 0, s.refuse("harmonics", "", "harmonics = %d: %d samples carry 1 to %d", *s.Harmonics, n, most)
	}
	return *s.Harmonics, nil
}
