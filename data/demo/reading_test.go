package demo

import (
	"strings"
	"testing"

	"afterbeat/data"
	"afterbeat/data/unit"
)

// The recording says everything itself: it is read without options, and gives
// no cause for a warning.
func TestRecordingIsRead(t *testing.T) {
	rec, err := data.ReadCSV(RecordingName, strings.NewReader(content(t, RecordingName)), data.ReadOptions{})
	if err != nil {
		t.Fatal(err)
	}
	if len(rec.Channels) != 2 || len(rec.Warnings) != 0 || rec.TimeName.String() != "time_s" {
		t.Fatalf("%d channels, time %q, warnings %v", len(rec.Channels), rec.TimeName, rec.Warnings)
	}
	raw := columns(t)
	for i, want := range []struct {
		name     string
		quantity unit.Quantity
	}{{"aortic_pressure_mmHg", unit.Pressure}, {"lvot_velocity_cm_s", unit.Velocity}} {
		c := rec.Channels[i]
		if c.Name.String() != want.name || c.Quantity != want.quantity || !c.Unit.Calibrated || c.Missing() != 0 {
			t.Errorf("channel %d: %q of %s in %+v, %d missing", i, c.Name, c.Quantity, c.Unit, c.Missing())
		}
		for j, v := range c.Values {
			if v != raw[i+1][j] {
				t.Fatalf("%s, row %d: %v, the file has %v", c.Name, j, v, raw[i+1][j])
			}
		}
	}
}
