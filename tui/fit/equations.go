package fit

// equations are those of the models, as package fitting documents them.
var equations = map[string][]string{
	"wk2": {"P = Pv + Pd,  C dPd/dt = Q - Pd/R", "Z(w) = R/(1 + i w R C),  Z(0) = R"},
	"wk3": {"P = Pv + Pd + Zc Q,  C dPd/dt = Q - Pd/R", "Z(w) = Zc + R/(1 + i w R C),  Z(0) = R + Zc"},
}

// published are ranges of numbers of the whole body's load, to compare with.
var published = map[string]string{
	"R":  "0.6 to 1.8 mmHg s/mL in people, healthy and ill (Segers 2002, AJP 282:H1041)",
	"C":  "0.5 to 2.0 mL/mmHg in people, healthy and ill (Segers 2002, AJP 282:H1041)",
	"Zc": "0.040 at age 32, 0.071 at 48 with coronary disease, 0.152 with hypertension as well, mmHg s/mL, means (Nichols 1977, Circ Res 40:451)",
}
