package study

import (
	"reflect"

	"afterbeat/data/casefile"
)

// firstTouched is the first stage that the change from a to b bears on;
// StageDone where it bears on none.
func firstTouched(a, b casefile.Case) Stage {
	a, b = withoutWords(a), withoutWords(b)
	if same(a, b) {
		return StageDone
	}
	if same(withoutForecast(a), withoutForecast(b)) {
		return StageForecast
	}
	a.Share, b.Share = nil, nil
	if same(withoutForecast(a), withoutForecast(b)) {
		return StageSupport
	}
	a, b = withoutTree(a), withoutTree(b)
	if same(withoutForecast(a), withoutForecast(b)) {
		return StageTree
	}
	if same(withoutFit(a), withoutFit(b)) {
		return StageFit
	}
	return StageIntake
}

// withoutWords is the case without what changes no number.
func withoutWords(c casefile.Case) casefile.Case {
	c.Label, c.Remark, c.Brief = "", "", false
	return c
}

// withoutFit is the case without the choices that bear on the fit and on what
// follows from it, but on nothing before.
func withoutFit(c casefile.Case) casefile.Case {
	c = withoutForecast(c)
	c.Basis = ""
	c.Model, c.OutflowPressure, c.Replicates, c.Seed = "", nil, nil, nil
	c.CardiacOutput, c.OutputBy, c.Cuff = nil, "", ""
	return c
}

// withoutForecast is the case without the choices that bear on the forecast
// alone.
func withoutForecast(c casefile.Case) casefile.Case {
	c.EDVML, c.EF, c.Pump, c.Ventricle, c.Speed, c.Quote, c.Match, c.HoldResistance = nil, nil, nil, nil, nil, nil, "", nil
	c.Modulation = only(c.Modulation, "file") // which is read with the recording
	return c
}

// only keeps one entry of a table.
func only(table map[string]string, name string) map[string]string {
	if v, ok := table[name]; ok {
		return map[string]string{name: v}
	}
	return nil
}

// withoutTree is the case without the choices that bear on the tree alone.
func withoutTree(c casefile.Case) casefile.Case {
	c.HeightCM, c.WeightKG, c.Age, c.Sex, c.PWV, c.VesselCM, c.BrainFlow, c.HoldOut = nil, nil, nil, "", nil, nil, nil, ""
	return c
}

func same(a, b casefile.Case) bool { return reflect.DeepEqual(a, b) }
