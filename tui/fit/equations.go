package fit

// published are ranges of numbers of the whole body's load, to compare with.
var published = map[string]string{
	"R":  "0.6 to 1.8 mmHg s/mL in people, healthy and ill (Segers 2002, AJP 282:H1041)",
	"C":  "0.5 to 2.0 mL/mmHg in people, healthy and ill (Segers 2002, AJP 282:H1041)",
	"Zc": "0.040 at age 32, 0.071 at 48 with coronary disease, 0.152 with hypertension as well, mmHg s/mL, means (Nichols 1977, Circ Res 40:451)",
	"L":  "about 0.005, from 0.003 to 0.01 mmHg s²/mL, of wk4p in people (Stergiopulos 1999, AJP 276:H81; from memory)",
}
