package pump

// Set is a pump by name, with what is known of its coefficients.
type Set struct {
	Name   string
	Origin string // where the coefficients come from
	Pump
	// Low and High bound the speeds, 1000/min, at which the set makes sense.
	Low, High float64
	// Centrifugal tells a flat curve at a third of the speeds of an axial one:
	// by it steps of speed are compared with published ones.
	Centrifugal bool
}

// Sets lists the sets of coefficients.
func Sets() []Set { return []Set{literatureAxial(), genericA(), genericB()} }

// ByName finds a set.
func ByName(name string) (Set, bool) {
	for _, s := range Sets() {
		if s.Name == name {
			return s, true
		}
	}
	return Set{}, false
}

// literatureAxial is the axial pump of Simaan, Ferreira, Chen, Antaki and Galati
// 2009, IEEE Trans Control Syst Technol 17:15, from memory:
//
//	H = b2 w² - b0 Q - b1 dQ/dt,  b0 = 0.1707, b1 = 0.02177, b2 = 9.9025e-7 (w in 1/min)
//
// with two cannulas of 0.0677 mmHg s/mL and 0.0127 mmHg s²/mL each. The terms b0
// and b1 do not depend on the speed: they stand in Rc and Lc, which is the same
// equation.
func literatureAxial() Set {
	return Set{
		Name:   "literature axial",
		Origin: "Simaan 2009, IEEE Trans Control Syst Technol 17:15; from memory",
		Pump:   Pump{Curve{A: 0.99025}, 0.1707 + 2*0.0677, 0.02177 + 2*0.0127},
		Low:    6, High: 12,
	}
}

// genericA is like an axial pump: its head falls evenly with flow.
func genericA() Set {
	return Set{
		Name:   "generic A",
		Origin: "invented, axial-like: for the demo",
		Pump:   Pump{Curve{A: 1.05, B: 0.013, C: 0.0006}, 0.12, 0.035},
		Low:    6, High: 12,
	}
}

// genericB is like a centrifugal pump: its curve is flat at low flow.
func genericB() Set {
	return Set{
		Name:   "generic B",
		Origin: "invented, flat curve: for the demo",
		Pump:   Pump{Curve{A: 13.2, C: 0.0042}, 0.1, 0.025},
		Low:    2, High: 4,
		Centrifugal: true,
	}
}
