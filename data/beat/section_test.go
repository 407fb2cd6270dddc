package beat

import (
	"math"
	"strings"
	"testing"

	"afterbeat/data"
	"afterbeat/data/unit"
)

var channelName = data.Clean("abp_mmHg")

func TestSection(t *testing.T) {
	r := read(t, "testdata/icu_premature_30s.csv")
	p := Find(r.channel(t, "abp_mmHg"), r.grid.Rate, unit.Pressure)
	s := p.Section(channelName, "mmHg")
	if !strings.Contains(s.Title, "abp_mmHg") {
		t.Errorf("title %q", s.Title)
	}
	want := map[string]struct {
		value float64
		unit  string
	}{"heart rate": {p.HeartRate(), "1/min"}, "systolic": {p.Systolic, "mmHg"}, "diastolic": {p.Diastolic, "mmHg"}, "mean": {p.Mean, "mmHg"}}
	words := ""
	for _, row := range s.Rows {
		if row.Number == nil {
			words += row.Label + ": " + row.Words.String() + "; "
			continue
		}
		w, ok := want[row.Label]
		delete(want, row.Label)
		n := row.Number
		if !ok || n.Value != w.value || n.Unit != w.unit || !n.Total.Contains(n.Value) || !(n.Total.Width() > 0) || n.Origin != data.Measured {
			t.Errorf("%s: %+v", row.Label, n)
		}
		t.Logf("%s %.4g (%.4g to %.4g) %s", row.Label, n.Value, n.Total.Low, n.Total.High, n.Unit)
	}
	if len(want) > 0 {
		t.Errorf("rows missing: %v", want)
	}
	if !strings.Contains(words, "44 of 49") || !strings.Contains(words, "2 too long") {
		t.Errorf("words %q", words)
	}
}

func TestSectionWithoutPulse(t *testing.T) {
	p := Find(autoregressive(1, 125, 30, 0), 125, unit.Pressure)
	s := p.Section(channelName, "mmHg")
	if len(s.Rows) != 1 || !strings.Contains(s.Rows[0].Words.String(), "no periodic component") {
		t.Errorf("%+v", s.Rows)
	}
	if len(p.Warnings(channelName)) > 0 {
		t.Error("warnings about beats that are not there")
	}
}

func TestWarnings(t *testing.T) {
	pulse := func(n, rejected int, cv float64) Pulse {
		p := Pulse{Found: true, Rate: 100, PeriodCV: cv}
		for i := range n {
			b := Beat{From: 100 * i, To: 100 * (i + 1)}
			if i < rejected {
				b.Rejected = Shape
			}
			p.Beats = append(p.Beats, b)
		}
		return p
	}
	for _, c := range []struct {
		p    Pulse
		want string
	}{
		{pulse(8, 0, 0.05), ""},
		{pulse(7, 0, 0.05), "few-beats"},
		{pulse(30, 10, 0.05), ""},
		{pulse(30, 11, 0.05), "many-rejected"},
		{pulse(30, 0, 0.11), "irregular-rhythm"},
		{pulse(12, 6, 0.2), "few-beats many-rejected irregular-rhythm"},
	} {
		if got := strings.Join(warningsOf(c.p), " "); got != c.want {
			t.Errorf("%d of %d used, CV %g: %q, want %q", c.p.Used(), len(c.p.Beats), c.p.PeriodCV, got, c.want)
		}
		for _, w := range c.p.Warnings(channelName) {
			if w.Channel != channelName || w.Text == "" || w.Cure == "" {
				t.Errorf("%+v", w)
			}
		}
	}
	// With one used beat its own scatter does not exist, that of all beats does.
	one := pulse(4, 3, math.NaN())
	for i := range one.Beats {
		one.Beats[i].Interval = 0.5 + 0.5*float64(i%2)
	}
	if got := one.Warnings(channelName); !strings.HasPrefix(got[2].Text, "the intervals vary by 38 % in all (") {
		t.Errorf("one used beat: %+v", got)
	}
	if got := Tally(pulse(30, 11, 0).Beats); got != "11 shape" {
		t.Errorf("tally %q", got)
	}
}
