package support

import "afterbeat/data"

// Figure names a number of a state on support.
type Figure string

// The figures, as the tables name them.
const (
	RetainedPulse   Figure = "retained pulse"
	RetainedSwing   Figure = "retained swing of flow"
	PulsePressure   Figure = "pulse pressure"
	MeanPressure    Figure = "mean pressure"
	PressureChange  Figure = "change of mean pressure"
	Output          Figure = "output"
	OutputChange    Figure = "change of output"
	FillingPressure Figure = "filling pressure"
	ValveOpen       Figure = "valve open"
	PumpFlowSwing   Figure = "swing of pump flow"
	EnergyPressure  Figure = "EEP"
	SurplusEnergy   Figure = "surplus energy"
	PulsatileIn     Figure = "pulsatile power"
	GreatestOf      Figure = "greatest pressure"
	LeastOf         Figure = "least pressure"
	FlowSwing       Figure = "swing of flow"
)

// Account is what stands behind a figure: its formula, and what is published of
// people on support, and of people without.
func (f Figure) Account() data.Account {
	a := f.formula()
	a.Published = f.published()
	return a
}

func (f Figure) formula() data.Account {
	of := func(meaning, source string, equation ...string) data.Account {
		return data.Account{Meaning: meaning, Source: source, Equation: equation}
	}
	const solved = "the periodic state of ventricle, pump and fitted load"
	switch f {
	case RetainedPulse:
		return of("what is left of the pulse of pressure", "a ratio of two states of one model", "(max P - min P) supported / (max P - min P) native")
	case RetainedSwing:
		return of("what is left of the swing of root flow", "a ratio of two states of one model", "(max Q - min Q) supported / (max Q - min Q) native")
	case PulsePressure:
		return of("of the pressure at the root", solved, "max P - min P over the beat")
	case MeanPressure, PressureChange:
		return of("over the beat, at the root", solved, "mean P = Pv + Z(0) mean Q", "change: supported - native, of the model")
	case Output, OutputChange:
		return of("mean flow into the arteries, valve and pump together", solved, "mean of Qav + Qp over the beat", "change: supported - native, of the model")
	case FillingPressure:
		return of("of the left ventricle", "ramp of 35 patients: JACC Heart Fail 2016;4:208 (seen)", "Pfill = max(0, P0 - slope (Qm - Q0))")
	case ValveOpen:
		return of("time a beat that the aortic valve is open", solved, "Qav = max(0, (Plv - Pao)/Rav) > 0")
	case PumpFlowSwing:
		return of("of the flow through the pump", solved, "max Qp - min Qp;  Lc dQp/dt = Plv - Pao + H(n, Qp) - Rc Qp")
	case EnergyPressure:
		return of("energy-equivalent pressure", "Shepard 1966, Arch Surg 93:730 (from memory)", "EEP = int P Q dt / int Q dt")
	case SurplusEnergy:
		return of("surplus haemodynamic energy", "Undar 2005, ASAIO J 51:56 (named there; formula from memory)", "SHE = 1333.22 (EEP - mean P), erg/cm3")
	case PulsatileIn:
		return of("pulsatile part of the power into the arteries", "Parseval: a sum over harmonics", "sum over k of 1/2 Re(P_k Q_k*)")
	case GreatestOf:
		return of("over the beat, at the root", solved, "max P")
	case LeastOf:
		return of("over the beat, at the root", solved, "min P")
	case FlowSwing:
		return of("of the flow at the root", "the posing", "max Q - min Q")
	}
	panic("support: no figure " + string(f))
}

func (f Figure) published() []data.Published {
	var (
		paired  = "before and after, finger cuff, mixed pumps: Eur J Heart Fail 2021;23:1955"
		cowger  = "Cowger 2020, J Heart Lung Transplant 39:441"
		ramp    = "ramp of speed: JACC Heart Fail 2016;4:208"
		axial   = "axial pumps, beat by beat (abstract)"
		partial = "5527 beats, centrifugal pumps (abstract)"
	)
	seen := func(group, words, source string) data.Published {
		return data.Published{Group: group, Words: words, Source: source, Seen: true}
	}
	switch f {
	case RetainedPulse:
		return []data.Published{
			seen(data.OnSupport, "pulse pressure -25.3 +- 9.8 mmHg (SD), n 8", paired),
			seen(data.OnSupport, "pulse pressure -24 % from 8900 to 9800/min, n 21", "Physiol Res, doi 10.33549/physiolres.934738"),
		}
	case PulsePressure:
		return []data.Published{
			seen(data.Healthy, "30 to 40 mmHg", "Stöhr 2017, Artery Res 20:57"),
			seen(data.OnSupport, "26 +- 12 mmHg at 8500/min, 17 +- 7 at 10480/min (SD), n 13", axial),
			seen(data.OnSupport, "median 22 mmHg, n 220", "outpatients, axial pumps (abstract)"),
		}
	case MeanPressure:
		return []data.Published{seen(data.OnSupport, "84 mmHg, quartiles 77 to 90, n 16155", cowger)}
	case GreatestOf:
		return []data.Published{seen(data.OnSupport, "99 mmHg, quartiles 90 to 107, n 16155", cowger)}
	case PressureChange:
		return []data.Published{seen(data.OnSupport, "+16.2 +- 7.9 mmHg (SD), n 8", paired)}
	case Output:
		return []data.Published{seen(data.Healthy, "3.5 to 8.2 L/min in men, 3.3 to 7.3 in women (limits), n 3090", "echocardiography (abstract)")}
	case OutputChange:
		return []data.Published{
			seen(data.OnSupport, "+1.29 +- 0.88 L/min (SD), n 8", paired),
			seen(data.OnSupport, "+0.16 +- 0.19 L/min a step of 400/min axial, 100/min centrifugal, n 35", ramp),
		}
	case FillingPressure:
		return []data.Published{seen(data.OnSupport, "-1.23 +- 0.85 mmHg a step, -9.9 +- 6.5 over the ramp, n 35", ramp)}
	case ValveOpen:
		return []data.Published{seen(data.OnSupport, "0.124 s (0 to 0.279) where it opens, in 21.5 % of beats (0 to 100), n 18", partial)}
	case PumpFlowSwing:
		return []data.Published{seen(data.OnSupport, "about the mean flow, at 4.5 L/min", "a bench that took it for clinical (PMC4591189)")}
	case EnergyPressure:
		return []data.Published{
			seen(data.Healthy, "about 10 mmHg above the mean", "harmonic analysis, Artif Organs 2021"),
			seen(data.OnSupport, "at or below the mean without a heart, sheep", "Artif Organs 2006;30:638"),
		}
	case SurplusEnergy:
		return []data.Published{
			seen(data.Healthy, "about 13300 erg/cm3", "harmonic analysis, Artif Organs 2021"),
			seen(data.OnSupport, "below baseline at full support, calves, n 8", "ASAIO J 2010;56(5), doi 10.1097/MAT.0b013e3181e7bf3c"),
		}
	}
	return nil
}

// AllFigures lists every figure.
func AllFigures() []Figure {
	return []Figure{
		RetainedPulse, RetainedSwing, PulsePressure, MeanPressure, PressureChange, Output, OutputChange,
		FillingPressure, ValveOpen, PumpFlowSwing, EnergyPressure, SurplusEnergy, PulsatileIn,
		GreatestOf, LeastOf, FlowSwing,
	}
}
