package anatomy

import (
	_ "embed"
	"encoding/csv"
	"fmt"
	"math"
	"strconv"
	"strings"
)

//go:embed systemic55.csv
var systemic string

// Source is where the embedded table comes from.
const Source = "55 systemic arteries (Stergiopulos, Young, Rogge 1992, after Westerhof 1969; values from memory)"

// vessel is a row of the published table.
type vessel struct {
	id, parent, name, bed string
	length                float64 // cm
	proximal, distal      float64 // radii, cm
	wall                  float64 // thickness, cm
	young                 float64 // MPa
	terminal              float64 // resistance, mmHg s/mL; NaN inside the tree
}

// The table's constants.
const (
	tablePoisson    = 0.5
	tableDensity    = 1.05  // g/mL, of its wave speeds
	dynPerMPa       = 1e7   // dyn/cm²
	tableWall       = 0.640 // mL/mmHg, compliance of its walls
	tableTerminals  = 0.56  // mL/mmHg, given to its terminals
	largestTerminal = 0.9   // of a terminal's resistance that R1 may take
)

// radius is the mean of both ends, which is what the published checks of the
// table use.
func (v vessel) radius() float64 { return (v.proximal + v.distal) / 2 }

// speed is the inviscid wave speed, cm/s:  c² = E h/(2 rho r (1 - sigma²)).
func (v vessel) speed() float64 {
	c2 := v.young * dynPerMPa * v.wall / (2 * tableDensity * v.radius() * (1 - tablePoisson*tablePoisson))
	return math.Sqrt(c2)
}

// published are the rows of the embedded table, parents before daughters. Where
// replaced is wanted, the two arteries that are too thin for the brain's flow
// have the radii of the table beside it.
func published(replaced bool) []vessel {
	r := csv.NewReader(strings.NewReader(systemic))
	r.Comment = '#'
	rows, err := r.ReadAll()
	if err != nil {
		panic("anatomy: embedded table: " + err.Error())
	}
	column := map[string]int{}
	for i, name := range rows[0] {
		column[name] = i
	}
	var out []vessel
	for _, row := range rows[1:] {
		text := func(name string) string { return row[column[name]] }
		number := func(name string) float64 {
			if text(name) == "" {
				return math.NaN()
			}
			v, err := strconv.ParseFloat(text(name), 64)
			if err != nil {
				panic(fmt.Sprintf("anatomy: embedded table, row %s: %v", row[0], err))
			}
			return v
		}
		v := vessel{
			id: text("id"), parent: text("parent"), name: text("name"), bed: text("bed"),
			length: number("length_cm"), proximal: number("radius_prox_cm"), distal: number("radius_dist_cm"),
			wall: number("wall_thickness_cm"), young: number("youngs_modulus_MPa"),
			terminal: number("terminal_resistance_mmHg_s_per_mL"),
		}
		if p := number("replaced_prox_cm"); replaced && !math.IsNaN(p) {
			v.proximal, v.distal = p, number("replaced_dist_cm")
		}
		out = append(out, v)
	}
	return out
}
