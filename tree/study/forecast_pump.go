package study

import (
	"fmt"
	"math"
	"strconv"
	"strings"

	"afterbeat/data"
	"afterbeat/data/casefile"
	"afterbeat/tree/pump"
	"afterbeat/tree/support"
)

// standardPump is the set of coefficients where the case names none. It is
// invented.
const standardPump = "generic A"

// ForecastPump is the pump of a forecast.
type ForecastPump struct {
	pump.Set
	Inlet support.Inlet
	// Given are the symbols of the coefficients that are the case's own.
	Given map[string]bool
}

// origin says of a coefficient where it comes from.
func (p ForecastPump) origin(symbol string) data.Origin { return origin(p.Given[symbol]) }

// numbersOf reads the entries of a table of the case that are numbers.
func numbersOf(key string, table map[string]string) (map[string]float64, error) {
	out := map[string]float64{}
	for _, name := range sorted(table) {
		v, err := strconv.ParseFloat(table[name], 64)
		switch {
		case err != nil: // text
		case math.IsNaN(v) || math.IsInf(v, 0):
			return nil, &ChoiceError{Key: key + "." + name, What: fmt.Sprintf("%v is not a finite number", v), Hint: "leave it out"}
		default:
			out[name] = v
		}
	}
	return out, nil
}

// pumpOf is the set that the case names, with the case's own coefficients over
// it; without a name they stand for themselves.
func pumpOf(c casefile.Case) (ForecastPump, error) {
	p := ForecastPump{Given: map[string]bool{}}
	own, err := numbersOf("pump", c.Pump)
	if err != nil {
		return p, err
	}
	coefficients := map[string]*float64{"a": &p.A, "b": &p.B, "c": &p.C, "Rc": &p.Resistance, "Lc": &p.Inertance}
	for symbol := range coefficients {
		_, p.Given[symbol] = own[symbol]
	}
	named, alone := c.Pump["set"], p.Given["a"] || p.Given["b"] || p.Given["c"] || p.Given["Rc"] || p.Given["Lc"]
	switch {
	case named == "" && alone:
		p.Set = pump.Set{Name: "own pump", Origin: "given in the case"}
		for _, symbol := range []string{"a", "Lc"} {
			if !p.Given[symbol] {
				return p, &ChoiceError{Key: "pump", What: fmt.Sprintf("its own coefficients lack %s", symbol), Hint: "a and Lc must be given, for instance --pump a=1.05 --pump Lc=0.035; b, c and Rc are 0 where they are not"}
			}
		}
		for symbol := range coefficients {
			p.Given[symbol] = true
		}
	default:
		if p.Set, err = setNamed(named); err != nil {
			return p, err
		}
		if alone {
			p.Origin += "; some coefficients given in the case"
		}
	}
	for symbol, into := range coefficients {
		if v, ok := own[symbol]; ok {
			*into = v
		}
	}
	if err := p.Check(); err != nil {
		return p, &ChoiceError{Key: "pump", What: err.Error(), Hint: "H = a n^2 - b n Q - c Q|Q|, n in 1000/min; heads in mmHg, flows in mL/s"}
	}
	if name := c.Pump["name"]; name != "" {
		p.Name = data.Clean(name).String()
	}
	return p, p.rest(c, own, named == "" && alone)
}

// setNamed finds a set of coefficients. Upper and lower case, and - for a blank,
// make no difference.
func setNamed(wanted string) (pump.Set, error) {
	if wanted == "" {
		wanted = standardPump
	}
	plain := func(s string) string { return strings.ReplaceAll(strings.ToLower(strings.TrimSpace(s)), "-", " ") }
	var names []string
	for _, s := range pump.Sets() {
		if plain(s.Name) == plain(wanted) {
			return s, nil
		}
		names = append(names, s.Name)
	}
	return pump.Set{}, &ChoiceError{Key: "pump", What: fmt.Sprintf("there is no set of coefficients %q", data.Clean(wanted)), Hint: "sets: " + list(names)}
}

// The head at no flow, mmHg, at the ends of the range of speeds of a pump that
// has none stated: about those of the sets there are (an assumption).
const leastShutOff, mostShutOff = 38, 150

// rest reads the range of speeds and the inlet. A flat curve is told by its a, of
// which an axial pump has a tenth.
func (p *ForecastPump) rest(c casefile.Case, own map[string]float64, alone bool) error {
	if alone {
		round := func(speed float64) float64 { return math.Round(10*speed) / 10 }
		p.Low, p.High = round(math.Sqrt(leastShutOff/p.A)), round(math.Sqrt(mostShutOff/p.A))
		p.Centrifugal = p.A > 4
	}
	if v, ok := own["lowest"]; ok {
		p.Low = v
	}
	if v, ok := own["highest"]; ok {
		p.High = v
	}
	if !(p.Low > 0 && p.High > p.Low) || math.IsInf(p.High, 0) {
		return &ChoiceError{Key: "pump", What: fmt.Sprintf("its range of speeds, %.3g to %.3g, is none", p.Low, p.High), Hint: "in 1000/min, for instance --pump lowest=6 --pump highest=12"}
	}
	if p.Inlet = support.Inlet(c.Pump["inlet"]); !p.Inlet.Known() {
		return &ChoiceError{Key: "pump.inlet", What: fmt.Sprintf("%q is no inlet", data.Clean(c.Pump["inlet"])), Hint: "inlets: ventricle, atrium"}
	}
	return nil
}
