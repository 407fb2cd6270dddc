package study

import (
	"bytes"
	"fmt"
	"math"
	"strings"

	"github.com/pelletier/go-toml/v2"

	"afterbeat/data"
	"afterbeat/tree/heart"
	"afterbeat/tree/pump"
	"afterbeat/tree/support"
)

// VentricleSpec is the table [ventricle].
type VentricleSpec struct {
	Period       *float64 `toml:"period_s"`   // s
	Activation   string   `toml:"activation"` // hill or cosine
	Tes          *float64 `toml:"Tes"`        // s
	Tr           *float64 `toml:"Tr"`         // s
	Emax         *float64 `toml:"Emax"`       // mmHg/mL
	Emin         *float64 `toml:"Emin"`
	V0           float64  `toml:"V0"`    // mL
	Pfill        *float64 `toml:"Pfill"` // mmHg
	Rmv          *float64 `toml:"Rmv"`   // mmHg s/mL
	Rav          *float64 `toml:"Rav"`
	Rar          float64  `toml:"Rar"`           // to flow back; 0: it does not leak
	FillingSlope float64  `toml:"filling_slope"` // mmHg s/mL
	FillingFlow  *float64 `toml:"filling_flow"`  // mL/s
	FillingLag   *float64 `toml:"filling_lag_s"`
}

// CoupledLoadSpec is the table [load].
type CoupledLoadSpec struct {
	Model string   `toml:"model"`
	R     *float64 `toml:"R"`  // mmHg s/mL
	C     *float64 `toml:"C"`  // mL/mmHg
	Zc    *float64 `toml:"Zc"` // mmHg s/mL
	L     *float64 `toml:"L"`  // mmHg s²/mL
	Pv    float64  `toml:"Pv"` // mmHg
}

// PumpSpec is the table [pump].
type PumpSpec struct {
	A  *float64 `toml:"a"` // mmHg per (1000/min)²
	B  float64  `toml:"b"`
	C  float64  `toml:"c"`
	Rc float64  `toml:"Rc"` // mmHg s/mL
	Lc *float64 `toml:"Lc"` // mmHg s²/mL
	// Inlet is where the pump draws from: ventricle or atrium.
	Inlet string `toml:"inlet"`
}

// StepSpec is a change of speed.
type StepSpec struct {
	From  *float64 `toml:"from"` // 1000/min
	To    *float64 `toml:"to"`
	Beats *int     `toml:"beats"`
}

// SupportSpec is the file of `solve support`: a ventricle, a load and a pump,
// and the speeds that are asked for.
type SupportSpec struct {
	Ventricle  *VentricleSpec   `toml:"ventricle"`
	Load       *CoupledLoadSpec `toml:"load"`
	Pump       *PumpSpec        `toml:"pump"`
	Speeds     []float64        `toml:"speeds"` // 1000/min
	Step       *StepSpec        `toml:"step"`
	Modulation string           `toml:"modulation"`
	Locked     *int             `toml:"locked"`
	FillingLag *float64         `toml:"filling_lag_s"`

	Tree            string   `toml:"tree"`
	Density         *float64 `toml:"density_g_mL"`
	Viscosity       *float64 `toml:"viscosity_poise"`
	OutflowPressure *float64 `toml:"outflow_pressure_mmHg"`

	file  string
	lines []string
}

// ReadSupportSpec parses the file. Errors are of type [data.FileError].
func ReadSupportSpec(name string, content []byte) (SupportSpec, error) {
	spec := SupportSpec{file: name, lines: strings.Split(string(content), "\n")}
	d := toml.NewDecoder(bytes.NewReader(content)).DisallowUnknownFields()
	if err := d.Decode(&spec); err != nil {
		return spec, tomlError(name, err)
	}
	return spec, nil
}

// refuse is an error about a key of a table, "" being the top of the file.
func (s SupportSpec) refuse(table, key, format string, args ...any) error {
	return &data.FileError{File: s.file, Line: s.line(table, key), What: fmt.Sprintf(format, args...)}
}

// refuseAll is [SupportSpec.refuse] of an error that names its key somewhere.
func (s SupportSpec) refuseAll(table string, err error) error {
	for _, word := range strings.Fields(err.Error()) {
		if line := s.line(table, word); line > 0 {
			return &data.FileError{File: s.file, Line: line, What: err.Error()}
		}
	}
	return &data.FileError{File: s.file, Line: s.line(table, ""), What: err.Error()}
}

// line is the line of a key in a table, or of the table's header for no key; 0
// where it is not found.
func (s SupportSpec) line(table, key string) int {
	in := ""
	for i, line := range s.lines {
		line = strings.TrimSpace(line)
		if strings.HasPrefix(line, "[") {
			in = strings.TrimSpace(strings.Trim(strings.SplitN(line, "#", 2)[0], "[] \t"))
			if key == "" && in == table {
				return i + 1
			}
			continue
		}
		name, _, found := strings.Cut(line, "=")
		if found && in == table && strings.TrimSpace(name) == key {
			return i + 1
		}
	}
	return 0
}

// given collects the values that must be there, and names the first that is not.
type given struct{ missing string }

func (g *given) of(name string, v *float64) float64 {
	if v != nil {
		return *v
	}
	if g.missing == "" {
		g.missing = name
	}
	return 0
}

// Coupling is what the spec describes.
func (s SupportSpec) Coupling() (support.Coupling, error) {
	var c support.Coupling
	for key, v := range map[string]*float64{"density_g_mL": s.Density, "viscosity_poise": s.Viscosity, "outflow_pressure_mmHg": s.OutflowPressure} {
		if v != nil {
			return c, s.refuse("", key, "%s goes with a tree, and there is none", key)
		}
	}
	if err := s.ventricle(&c); err != nil {
		return c, err
	}
	if err := s.load(&c); err != nil {
		return c, err
	}
	if err := s.pump(&c); err != nil {
		return c, err
	}
	return c, s.lag(&c)
}

// treeCoupling is what the spec describes of heart and pump, where the load is a
// tree.
func (s SupportSpec) treeCoupling() (support.Coupling, error) {
	var c support.Coupling
	switch {
	case s.Load != nil:
		return c, s.refuse("load", "", "a table [load] and a tree: one of them")
	case s.Modulation != "":
		return c, s.refuse("", "modulation", "a modulation on a tree cannot be solved yet: give a lumped load in a table [load]")
	}
	if err := s.ventricle(&c); err != nil {
		return c, err
	}
	if err := s.pump(&c); err != nil {
		return c, err
	}
	return c, s.lag(&c)
}

func (s SupportSpec) ventricle(c *support.Coupling) error {
	v := s.Ventricle
	if v == nil {
		return s.refuse("", "", "a table [ventricle] is missing")
	}
	var g given
	c.Ventricle = heart.Ventricle{
		Period: g.of("period_s", v.Period), Activation: heart.Activation(v.Activation),
		Emax: g.of("Emax", v.Emax), Emin: g.of("Emin", v.Emin), V0: v.V0,
		Rmv: g.of("Rmv", v.Rmv), Rav: g.of("Rav", v.Rav), Rar: v.Rar,
	}
	c.Filling = heart.Filling{Pressure: g.of("Pfill", v.Pfill), Flow: math.NaN(), Slope: v.FillingSlope}
	if g.missing != "" {
		return s.refuse("ventricle", "", "%s is missing from [ventricle]", g.missing)
	}
	if v.Activation == "" {
		return s.refuse("ventricle", "", "activation is missing from [ventricle]: hill or cosine")
	}
	if c.Ventricle.Activation == heart.Hill && (v.Tes != nil || v.Tr != nil) {
		return s.refuse("ventricle", "activation", "activation hill takes its times from the period: Tes and Tr do not go with it")
	}
	if v.Tes != nil {
		c.Ventricle.Tes = *v.Tes
	}
	if v.Tr != nil {
		c.Ventricle.Tr = *v.Tr
	}
	line := c.Filling
	line.Flow = 0
	if v.FillingFlow != nil {
		line.Flow, c.Filling.Flow = *v.FillingFlow, *v.FillingFlow
	}
	if err := c.Ventricle.Check(); err != nil {
		return s.refuseAll("ventricle", err)
	}
	if err := line.Check(); err != nil {
		return s.refuseAll("ventricle", err)
	}
	return nil
}

func (s SupportSpec) load(c *support.Coupling) error {
	l := s.Load
	if l == nil {
		return s.refuse("", "", "a table [load] is missing")
	}
	c.Load = support.Windkessel{Kind: support.LoadKind(l.Model), OutflowPressure: l.Pv}
	symbols := c.Load.Kind.Symbols()
	if symbols == nil {
		return s.refuse("load", "model", "model %q is none of %v", data.Clean(l.Model), support.LoadKinds())
	}
	values := map[string]*float64{"R": l.R, "C": l.C, "Zc": l.Zc, "L": l.L}
	into := map[string]*float64{"R": &c.Load.R, "C": &c.Load.C, "Zc": &c.Load.Zc, "L": &c.Load.L}
	for _, name := range symbols {
		if values[name] == nil {
			return s.refuse("load", "", "%s is missing from [load]: %s needs it", name, c.Load.Kind)
		}
		*into[name] = *values[name]
		delete(values, name)
	}
	for _, name := range []string{"Zc", "L"} {
		if values[name] != nil {
			return s.refuse("load", name, "%s was given, but %s has none", name, c.Load.Kind)
		}
	}
	if err := c.Load.Check(); err != nil {
		return s.refuseAll("load", err)
	}
	return nil
}

func (s SupportSpec) pump(c *support.Coupling) error {
	p := s.Pump
	if p == nil {
		for _, n := range s.Speeds {
			if n != 0 {
				return s.refuse("", "speeds", "a table [pump] is missing: the speed %v needs it", n)
			}
		}
		if s.Step != nil || s.Modulation != "" {
			return s.refuse("", "", "a table [pump] is missing")
		}
		return nil
	}
	var g given
	c.Pump = pump.Pump{Curve: pump.Curve{A: g.of("a", p.A), B: p.B, C: p.C}, Resistance: p.Rc, Inertance: g.of("Lc", p.Lc)}
	if g.missing != "" {
		return s.refuse("pump", "", "%s is missing from [pump]", g.missing)
	}
	if err := c.Pump.Check(); err != nil {
		return s.refuseAll("pump", err)
	}
	if c.Inlet = support.Inlet(p.Inlet); !c.Inlet.Known() {
		return s.refuse("pump", "inlet", "inlet %q is none of %s, %s", data.Clean(p.Inlet), support.InletVentricle, support.InletAtrium)
	}
	return nil
}

func (s SupportSpec) lag(c *support.Coupling) error {
	table, v := "", s.FillingLag
	if s.Ventricle.FillingLag != nil {
		if v != nil {
			return s.refuse("", "filling_lag_s", "filling_lag_s is given twice")
		}
		table, v = "ventricle", s.Ventricle.FillingLag
	}
	if v == nil {
		return nil
	}
	if !(*v > 0) || math.IsInf(*v, 0) {
		return s.refuse(table, "filling_lag_s", "filling_lag_s = %v is not a number above 0", *v)
	}
	c.FillingLag = *v
	return nil
}
