package harmonic

import "afterbeat/data"

// Names of what is read off the waves.
const (
	ReflectionMagnitude = "reflection"
	ReturnTime          = "return time"
)

// Account is what stands behind a number read off the waves.
func Account(name string) data.Account {
	a := data.Account{Source: "Westerhof 1972, Cardiovasc Res 6:648 (formula from memory)"}
	a.Equation = []string{"P+ = (P + Zc Q)/2, P- = (P - Zc Q)/2"}
	switch name {
	case ReflectionMagnitude:
		a.Meaning = "swing of the backward wave over that of the forward one"
		a.Equation = append(a.Equation, "(max P- - min P-)/(max P+ - min P+)")
	case ReturnTime:
		a.Meaning = "from the foot of the forward wave to that of the backward one"
		a.Equation = append(a.Equation, "foot: where the tangent of the steepest rise meets the minimum before it")
	default:
		panic("harmonic: no number " + name)
	}
	return a
}
