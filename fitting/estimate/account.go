package estimate

import "afterbeat/data"

// Account is what stands behind what an estimate gives: R, C, tau, Zc, index or
// Pinf.
func (e Estimate) Account(name string) data.Account {
	a := e.formula()
	a.Meaning = map[string]string{
		"R": "total resistance", "C": "compliance", "tau": "time constant of diastole", "Zc": "characteristic impedance",
		"index": "stroke volume over pulse pressure: no compliance", "Pinf": "pressure that diastole falls to",
	}[name]
	if name == "R" && e.Name != TwoArea {
		a.Equation = append([]string{"R = (mean P - Pv)/mean Q"}, a.Equation...)
	}
	return a
}

func (e Estimate) formula() data.Account {
	of := func(source string, equation ...string) data.Account {
		return data.Account{Equation: equation, Source: source + " (formula from memory)"}
	}
	switch e.Name {
	case Decay:
		return of("Frank 1899; Simon 1979", "ln(P - Pv) = a - t/tau over late diastole", "C = tau/R")
	case DecayAsymptote:
		return of("Simon 1979", "P = Pinf + (P0 - Pinf) exp(-t/tau) over late diastole", "C = tau/R")
	case Area:
		return of("Liu, Brin and Yin 1986, Am J Physiol 251:H588", "C = int (P - Pv) dt / (R (P1 - P2)) over diastole")
	case TwoArea:
		return of("Self et al. 1994", "int Q dt = C (Pb - Pa) + (1/R) int (P - Pv) dt,", "over systole and over diastole: two equations for C and R")
	case PulsePressure:
		return of("Stergiopulos, Meister and Westerhof 1994, Ann Biomed Eng 22:392", "the C with which wk2, driven by Q, has the measured pulse pressure")
	case SVOverPP:
		return of("Chemla et al. 1998, Am J Physiol 274:H500", "SV/PP; 16 to 74 % above C on a worked example")
	case ZcModulus:
		return of("Murgo 1980, Circulation 62:105", "Zc = mean of |Z_k| over the harmonics 4 to 10")
	}
	panic("estimate: no method " + e.Name)
}
