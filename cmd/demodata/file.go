package main

import (
	"bytes"
	"fmt"
	"math"
	"strconv"

	"afterbeat/data/casenote"
	"afterbeat/data/demo"
)

// The columns of the recording.
const (
	pressureColumn = "aortic_pressure_mmHg"
	velocityColumn = "lvot_velocity_cm_s"
)

// recordingFile is the recording as CSV: time to 1 ms, pressure to 0.1 mmHg,
// velocity to 0.1 cm/s.
func recordingFile(p demo.Patient) []byte {
	var b bytes.Buffer
	fmt.Fprintf(&b, "# invented data: no patient, made by cmd/demodata, seed %d; truth: R %g mmHg s/mL, C %g mL/mmHg, Zc %g mmHg s/mL,\n", p.Seed, p.R, p.C, p.Zc)
	fmt.Fprintf(&b, "# outflow pressure %g mmHg, outflow tract %g cm, pressure late by %g s; %d beats, beat %d premature\n", p.OutflowPressure, p.Diameter, p.Delay, p.Beats, p.Ectopic+1)
	fmt.Fprintf(&b, "time_s,%s,%s\n", pressureColumn, velocityColumn)
	tr := clean(p).spoil(p)
	for i, t := range tr.time {
		fmt.Fprintf(&b, "%.3f,%s,%s\n", t, tenth(tr.pressure[i]), tenth(tr.velocity[i]))
	}
	return b.Bytes()
}

// tenth prints x to 0.1, and 0.0 rather than -0.0.
func tenth(x float64) string {
	return strconv.FormatFloat(math.Round(10*x)/10+0, 'f', 1, 64)
}

// caseFile is the case file: the choices that go with the recording.
func caseFile(p demo.Patient) []byte {
	return fmt.Appendf(nil, `# %s
# The data are invented: no patient, made by cmd/demodata, seed %d.
recording = %q
label = "invented-demo-1"

pressure = %q
velocity = %q

# Stated by who made the data.
diameter_cm = %g
delay = %g             # s, pressure is late
outflow_pressure = %g      # mmHg

[site]
%s = "root"
%s = "lvot"
`, casenote.Caution, p.Seed, demo.RecordingName, pressureColumn, velocityColumn,
		p.Diameter, p.Delay, p.OutflowPressure, pressureColumn, velocityColumn)
}
