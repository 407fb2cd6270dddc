package study

import (
	"encoding/json"
	"errors"
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"afterbeat/data"
	"afterbeat/data/casefile"
	"afterbeat/data/casenote"
)

// oddTrace draws a trace such as a broken cable, a wrong scale or a wrong
// column makes.
func oddTrace(t *rapid.T, label string) func(float64) float64 {
	scale := math.Pow(10, rapid.Float64Range(-6, 6).Draw(t, label+" scale"))
	shift := rapid.SampledFrom([]float64{0, 0, 1, -50, 1e5}).Draw(t, label+" shift")
	beat := rapid.SampledFrom([]func(float64) float64{
		halfFlow, halfPressure, steady(1), noisy(steady(0), 1), noisy(halfPressure, 5), wandering(),
		func(at float64) float64 { return math.Sin(2 * math.Pi * 1.2 * at) },
		func(at float64) float64 { return math.Round(halfPressure(at) / 40) },
		func(at float64) float64 { return math.Mod(at, 0.9) },
		func(at float64) float64 { return at },
		func(at float64) float64 { return math.Exp(-20 * math.Mod(at, 1)) },
	}).Draw(t, label)
	return scaled(beat, scale*rapid.SampledFrom([]float64{1, -1}).Draw(t, label+" sign"), shift)
}

// Whatever stands in a file and whatever is chosen about it, a study ends in an
// error that says what to do or in a note and reports without NaN; it never
// panics.
func TestNoRecordingBreaksAStudy(t *testing.T) {
	headers := []string{"ao_mmHg", "ao_flow_mL_s", "lvot_velocity_cm_s", "abp", "carotid_flow_L_min", "p_V", "pleth", "ecg_mV"}
	answers := 0
	rapid.Check(t, func(t *rapid.T) {
		var columns []column
		for _, header := range rapid.SliceOfNDistinct(rapid.SampledFrom(headers), 1, 3, rapid.ID).Draw(t, "headers") {
			columns = append(columns, column{header, oddTrace(t, header)})
		}
		n := rapid.SampledFrom([]int{2, 3, 5, 60, 400, 1500}).Draw(t, "samples")
		content := table(rapid.SampledFrom([]float64{0.5, 10, 50, 125, 1000}).Draw(t, "rate"), n, columns...)
		if at := rapid.IntRange(0, n).Draw(t, "hole"); at < n {
			content = emptied(content, at, min(n, at+rapid.IntRange(1, 40).Draw(t, "length")))
		}
		c := casefile.Case{
			Recording: "a.csv", Replicates: ptr(3), Share: []float64{0.5, 1}, OneBeat: rapid.Bool().Draw(t, "one beat"),
			Delay: rapid.SampledFrom([]string{"", "0.02", "-1"}).Draw(t, "delay"), OutflowPressure: rapid.Ptr(rapid.SampledFrom([]float64{-1e3, 0, 60, 1e6}), true).Draw(t, "outflow"),
			DiameterCM: rapid.Ptr(rapid.Float64Range(0.01, 100), true).Draw(t, "diameter"), Model: rapid.SampledFrom([]string{"", "wk2", "wk3"}).Draw(t, "model"),
		}
		s, err := try(c, folder{"a.csv": content}, StageSupport)
		if err != nil {
			wantUseful(t, err)
			return
		}
		answers++
		text, err := json.Marshal(s.Report(defaults))
		if err != nil {
			t.Fatal(err)
		}
		note := s.Note().Render(casenote.Options{ASCII: true})
		for _, word := range []string{"NaN", "Inf "} {
			if strings.Contains(string(text), word) || strings.Contains(note, word) {
				t.Fatalf("%s in\n%s", word, note)
			}
		}
	})
	if answers == 0 {
		t.Error("every study ended in an error: nothing was checked")
	}
}

// wantUseful wants an error that a person can do something about.
func wantUseful(t *rapid.T, err error) {
	var file *data.FileError
	var choice *ChoiceError
	var several *data.AmbiguousError
	if !errors.As(err, &file) && !errors.As(err, &choice) && !errors.As(err, &several) {
		t.Fatalf("%T: %v", err, err)
	}
}
