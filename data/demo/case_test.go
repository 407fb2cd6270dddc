package demo

import (
	"strconv"
	"testing"

	"afterbeat/data"
	"afterbeat/data/casefile"
)

// The case file is read as any other, and its choices are the truth.
func TestCaseIsRead(t *testing.T) {
	c, err := casefile.Read(CaseName, []byte(content(t, CaseName)))
	if err != nil {
		t.Fatal(err)
	}
	p := Truth()
	delay, err := strconv.ParseFloat(c.Delay, 64)
	if err != nil {
		t.Fatal(err)
	}
	if c.Recording != RecordingName || c.Label != "invented-demo-1" || delay != p.Delay {
		t.Errorf("recording %q, label %q, delay %v", c.Recording, c.Label, delay)
	}
	if c.DiameterCM == nil || *c.DiameterCM != p.Diameter || c.OutflowPressure == nil || *c.OutflowPressure != p.OutflowPressure {
		t.Errorf("diameter %v, outflow pressure %v", c.DiameterCM, c.OutflowPressure)
	}
	if c.Site[c.Pressure] != string(data.SiteRoot) || c.Site[c.Velocity] != string(data.SiteLVOT) {
		t.Errorf("sites %v of %q and %q", c.Site, c.Pressure, c.Velocity)
	}
}
