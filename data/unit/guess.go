package unit

import (
	"slices"
	"strings"
)

// Guess gives the unit of a channel called name its quantity. u is the unit of
// the header; the zero Unit says that it names none.
//
//   - A gas (names with co2, o2, n2o) and a pulse oximeter are Other, whatever
//     the unit: kPa of carbon dioxide is no pressure of blood.
//   - A unit that belongs to a quantity decides, whatever the name says.
//   - V, mV, adu and the like stand for what the name says; only an ecg is
//     calibrated in them.
//   - Without a unit the name decides, and the unit is the internal one of the
//     quantity (see [Internal]): an assumption, to be warned of.
func Guess(name string, u Unit) Unit {
	words := Words(name)
	switch {
	case isGas(name) || speaksOfNothingUsed(words):
		return as(u, Other)
	case u.Quantity == Time:
		return as(u, Other)
	case u.Quantity == Speed && slices.ContainsFunc(words, isRate):
		return as(u, Other)
	case u.Calibrated:
		return u
	case u.Name == "":
		return Internal(byName(words))
	case !slices.Contains(rawUnits, u.Name):
		return as(u, Other)
	}
	q := byName(words)
	if millivolts, ok := inMillivolts[u.Name]; ok && q == ECG {
		return Unit{Name: u.Name, Quantity: ECG, Factor: millivolts, Calibrated: true}
	}
	return as(u, q)
}

// as is u as the unit of a channel that it does not calibrate.
func as(u Unit, q Quantity) Unit { return Unit{Name: u.Name, Quantity: q, Factor: 1} }

// rawUnits are those of a converter, which any channel may come in.
var rawUnits = []string{"V", "mV", "uV", "adu", "NU", "a.u."}

var inMillivolts = map[string]float64{"V": 1000, "mV": 1, "uV": 1e-3}

func isGas(name string) bool {
	name = strings.ToLower(name)
	return strings.Contains(name, "o2") || strings.Contains(name, "n2o")
}

// isRate finds words of a heart or breathing rate, which monitors give in rpm
// and 1/min too.
func isRate(word string) bool {
	return slices.Contains([]string{"hr", "heart", "pulse", "rr", "resp", "respiration", "breath", "breathing", "bpm"}, word)
}

func speaksOfNothingUsed(words []string) bool {
	return slices.ContainsFunc(words, func(w string) bool {
		return slices.Contains([]string{"pleth", "ppg", "plethysmogram", "trigger", "sync", "temp", "temperature"}, w)
	})
}

// byName is the quantity that the words of a name speak of. Pressure comes
// first ("outflow pressure"), velocity before flow ("flow velocity"), flow
// before volume ("volume flow").
func byName(words []string) Quantity {
	for _, q := range []Quantity{ECG, Pressure, Velocity, Flow, Volume, Speed} {
		if speaksOf(q, words) {
			return q
		}
	}
	return Other
}

// speaksOf tells whether one of the words is a word of q, or contains a stem of it.
func speaksOf(q Quantity, words []string) bool {
	v := vocabulary[q]
	return slices.ContainsFunc(words, func(w string) bool {
		return slices.Contains(v.words, w) ||
			slices.ContainsFunc(v.stems, func(stem string) bool { return strings.Contains(w, stem) })
	})
}

// IsTime tells whether name, or one of its words, speaks of time.
func IsTime(name string) bool { return speaksOf(Time, Words(name)) }

type lexicon struct{ stems, words []string }

var vocabulary = map[Quantity]lexicon{
	ECG: {[]string{"ecg", "ekg"}, nil},
	Pressure: {[]string{"press"}, []string{
		"p", "bp", "abp", "ibp", "nibp", "art", "arterial", "ap", "map", "sbp", "dbp", "aop", "pao",
		"icp", "cvp", "pap", "pcwp", "pawp", "lvp", "plv", "rvp", "prv", "lap", "rap", "paw",
	}},
	Velocity: {[]string{"veloc"}, []string{"vel", "mcav", "mca", "tcd", "cbfv", "bfv", "envelope"}},
	Flow:     {[]string{"flow"}, []string{"q", "qao", "aof", "output"}},
	Volume:   {[]string{"volume"}, []string{"vol", "lvv", "vlv", "edv", "esv"}},
	Speed:    {[]string{"speed"}, []string{"rpm"}},
	Time: {[]string{"time"}, []string{
		"t", "elapsed", "clock", "duration", "period", "interval", "delay", "lag", "onset", "start", "end", "from", "to",
	}},
}
