package unit

import "strings"

// Parse reads a unit in the spellings that recordings have: mmHg, "mm Hg",
// mm[Hg], kPa, hPa, mbar, Pa, cmH2O, dyn/cm2, psi; mL/s, "ml s-1", mL·s⁻¹,
// mL_s, "ml per sec", cm3/s, L/min, lpm; cm/s, m/s; mL, L, cm3; rpm, krpm,
// 1000/min; V, mV, uV; adu, NU, a.u.; bpm, %; s, ms, us, min, h. Case does not
// matter.
//
// Volts and other raw units come back without a quantity (Other) and not
// calibrated: only the name of the channel tells what they stand for, see
// [Guess]. ok is false for a text that is no unit known here.
func Parse(s string) (u Unit, ok bool) {
	if len(s) > longest {
		return Unit{}, false
	}
	parts := strings.Fields(strings.ToLower(signs.Replace(s)))
	if last := len(parts) - 1; last > 0 {
		power := strings.TrimSuffix(parts[last], "-1")
		power = strings.Replace(power, "-2", "2", 1)
		if u, ok = units[strings.Join(parts[:last], "")+"/"+power]; ok {
			return u, true
		}
	}
	u, ok = units[strings.Join(parts, "")]
	return u, ok
}

// longest is how many bytes a unit may take; it bounds the search in a header.
const longest = 40

// signs unifies the spellings: "per" is a stroke, products and underscores are
// spaces, powers are plain digits, the brackets of UCUM go, both micro signs
// are u.
var signs = strings.NewReplacer(
	" per ", "/", "_per_", "/",
	"·", " ", "⋅", " ", "*", " ", "_", " ", "^", "", "[", "", "]", "",
	"⁻¹", "-1", "⁻²", "-2", "−", "-", "²", "2", "³", "3", "₂", "2", "µ", "u", "μ", "u",
)
