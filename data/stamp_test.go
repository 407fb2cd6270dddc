package data

import (
	"math"
	"testing"
)

func TestStampsCountFromMidnight(t *testing.T) {
	for _, c := range []struct {
		name   string
		stamps []string
		want   []float64
	}{
		{"clock", []string{"00:00:01", "0:01:00", "13:00:00.25"}, []float64{1, 60, 46800.25}},
		{"no seconds", []string{"12:00", "12:01"}, []float64{43200, 43260}},
		{"decimal comma", []string{"00:00:00,5", "00:00:01,125"}, []float64{0.5, 1.125}},
		{"midnight", []string{"23:59:59.5", "00:00:00.5", "23:59:59.5", "00:00:00"}, []float64{86399.5, 86400.5, 172799.5, 172800}},
		{"dates", []string{"2024-02-28T23:59:59", "2024-02-29T00:00:00", "2024-03-01T00:00:00"}, []float64{86399, 86400, 172800}},
		{"no leap year", []string{"2023-02-28 00:00:00", "2023-03-01 00:00:00"}, []float64{0, 86400}},
		{"strokes", []string{"2024/1/2 01:00", "2024/1/2 02:00"}, []float64{3600, 7200}},
		{"zones", []string{"2024-03-01T12:00:00+01:00", "2024-03-01T11:00:01Z", "2024-03-01T06:00:02-0500"}, []float64{43200, 43201, 43202}},
	} {
		var s stamps
		for i, text := range c.stamps {
			if got, ok := s.seconds(text); !ok || math.Abs(got-c.want[i]) > 1e-9 {
				t.Errorf("%s: %q is %v, %v; want %v", c.name, text, got, ok, c.want[i])
			}
		}
	}
}

func TestWhatIsNoStamp(t *testing.T) {
	for _, s := range []string{
		"", ":", "12", "12:", "1:2", "24:00:00", "12:60:00", "12:00:61", "12:00:00.5.5", "12:00:1e1", "12:00:-1", "-1:00:00",
		"2024-02-30 00:00", "2023-02-29T00:00", "01/02/2024 12:00", "2024-01-01", "2024-13-01 00:00", "2024-01-01T12:00+1", "note 12:00", "12:00 PM", "T",
	} {
		if isStamp(s) {
			t.Errorf("%q is taken for a time", s)
		}
	}
	var s stamps
	s.seconds("12:00:00")
	if _, ok := s.seconds("2024-01-01 12:00:01"); ok {
		t.Error("a date is taken in a column without dates")
	}
}
