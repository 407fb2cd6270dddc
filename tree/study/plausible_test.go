package study

import (
	"strings"
	"testing"

	"afterbeat/data"
)

// unlikely are the warnings of a channel whose values make no sense.
func unlikely(s Study) (texts string) {
	for _, w := range s.Warnings() {
		if w.Code == data.CodeUnlikely {
			texts += w.Channel.String() + ": " + w.Text + "; " + w.Cure + "\n"
		}
	}
	return texts
}

// A channel whose unit was taken for another is warned of, with the unit that
// would fit; one that makes sense, in whatever unit, is not.
func TestUnitsThatAreUnlikely(t *testing.T) {
	for name, c := range map[string]struct {
		pressure, flow column
		want           []string
	}{
		"all is well":            {aortic("ao_mmHg"), outflowTo("ao_flow_mL_s"), nil},
		"in other units":         {column{"ao_kPa", scaled(halfPressure, 0.1333, 0)}, column{"ao_flow_L_min", scaled(halfFlow, 0.06, 0)}, nil},
		"kPa as mmHg":            {column{"ao_mmHg", scaled(halfPressure, 0.1333, 0)}, outflowTo("ao_flow_mL_s"), []string{"ao_mmHg: mean pressure is 12.", "--unit ao_mmHg=kPa"}},
		"L/min as mL/s":          {aortic("ao_mmHg"), column{"ao_flow_mL_s", scaled(halfFlow, 0.06, 0)}, []string{"ao_flow_mL_s: mean flow is 5.2", "--unit ao_flow_mL_s=L/min"}},
		"no unit fits":           {column{"ao_mmHg", scaled(halfPressure, 4000, 0)}, outflowTo("ao_flow_mL_s"), []string{"ao_mmHg: mean pressure", "check unit, scale and zero"}},
		"root flow of 5 in mL/s": {aortic("ao_mmHg"), column{"root_flow_mL_s", scaled(halfFlow, 0.06, 0)}, []string{"--unit root_flow_mL_s=L/min"}},
		"mean of 11 in mmHg":     {column{"ao_mmHg", scaled(halfPressure, 0.12, 0)}, outflowTo("ao_flow_mL_s"), []string{"--unit ao_mmHg=kPa"}},
		"a bed in mL/min":        {aortic("ao_mmHg"), column{"renal_flow_mL_s", scaled(halfFlow, 6, 0)}, []string{"outside 2 to 30 at site renal", "--unit renal_flow_mL_s=mL/min"}},
		"a brain in L/min":       {aortic("ao_mmHg"), column{"mca_flow_mL_s", scaled(halfFlow, 0.0021, 0)}, []string{"outside 0.8 to 10 at site mca", "--unit mca_flow_mL_s=L/min"}},
		"mca in m/s":             {aortic("ao_mmHg"), column{"mca_velocity_cm_s", scaled(halfFlow, 0.0065, 0)}, []string{"outside 12 to 180 at site mca", "--unit mca_velocity_cm_s=m/s"}},
		"the flow of a bed":      {aortic("ao_mmHg"), column{"renal_flow_mL_s", scaled(halfFlow, 0.05, 0)}, nil},
	} {
		got := unlikely(fitted(t, inventedCase(), invented(c.pressure, c.flow)))
		if (got == "") != (c.want == nil) {
			t.Errorf("%s: %q", name, got)
		}
		for _, want := range c.want {
			if !strings.Contains(got, want) {
				t.Errorf("%s: %q lacks %q", name, got, want)
			}
		}
	}
}

// Where the decay of diastole and the fit are far apart, as with channels that do
// not belong together in time, it is said.
func TestWaysToComplianceThatDisagree(t *testing.T) {
	if w, ok := warned(sharedDemo(t), data.CodeDisagree); ok {
		t.Errorf("the demo: %v", w)
	}
	c := inventedCase()
	c.Delay, c.Model = "0.05", "wk3"
	s := fitted(t, c, invented(aortic("ao_mmHg"), outflowTo("ao_flow_mL_s")))
	w, ok := warned(s, data.CodeDisagree)
	if !ok || !strings.Contains(w.Text, "decay gives C 1.4") || !strings.Contains(w.Cure, "delay") {
		_, cc, _ := chosen(t, s)
		t.Errorf("pressure said to be 50 ms late: %v, C %v", w, cc)
	}
}
