package casenote

import (
	"flag"
	"math"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"
	"github.com/mattn/go-runewidth"
	"pgregory.net/rapid"

	"afterbeat/data"
)

var update = flag.Bool("update", false, "rewrite the golden files")

// estimate is an identified value with a total and a random interval.
func estimate(v, low, high, randomLow, randomHigh float64) data.Estimate {
	return data.Estimate{
		Value: v, Identified: true,
		Total: data.Interval{Low: low, High: high}, Random: data.Interval{Low: randomLow, High: randomHigh},
	}
}

// bareValue is a value without interval.
func bareValue(v float64, why string) data.Estimate {
	return data.Estimate{Value: v, Total: none, Random: none, Identified: true, Why: why}
}

func undefined(why string) data.Estimate { return bareValue(math.NaN(), why) }

func unidentified(low, high float64, why string) data.Estimate {
	return data.Estimate{Value: (low + high) / 2, Total: data.Interval{Low: low, High: high}, Random: none, Why: why}
}

func number(e data.Estimate, unit string, o data.Origin) Cell {
	return Cell{Number: &Number{Estimate: e, Unit: unit, Origin: o}}
}

func words(s string) Cell { return Cell{Words: data.Clean(s)} }

// fullNote has one of everything. Its numbers are invented.
func fullNote() Note {
	return Note{
		Program: "afterbeat", Version: "0.1.0",
		Title: data.Clean("Note on Größe_µ 7.csv"),
		Sections: []Section{
			{
				Title: "Recording",
				Rows: []Row{
					Words("file", "Größe_µ 7.csv"),
					Words("sha256", strings.Repeat("0123456789abcdef", 4)),
					Quantity("rows", data.Exact(168000), "", data.Measured),
					Quantity("sampling", bareValue(124.98, ""), "Hz", data.Measured),
					Quantity("outflow pressure", data.Exact(0), "mmHg", data.Assumed),
				},
			},
			{
				Title: "Fit wk3",
				Words: []data.Text{
					data.Clean("The model was fitted to 24 beats. What is left over is larger than the noise between beats, so that the intervals hold for the model, not for the patient."),
					data.Clean("Recommended: wk3, because a fourth parameter lowers the criterion by less than 2."),
				},
				Rows: []Row{
					Quantity("total resistance", estimate(0.9512, 0.91, 0.993, 0.945, 0.9562), "mmHg s/mL", data.Estimated),
					Quantity("compliance C", estimate(1.1, 0.97, 1.25, 0.97, 1.25), "mL/mmHg", data.Estimated),
					Quantity("inertance L", unidentified(0, 0.0123, "it trades against Zc: wk4p is wk3 in disguise here"), "mmHg s²/mL", data.Estimated),
					Quantity("augmentation index of the average beat, pressure", undefined("no inflection found"), "", data.Estimated),
					Quantity("time constant", bareValue(1.0463, "a single beat gives no residual to judge by"), "s", data.Estimated),
				},
			},
			{
				Title: "Comparison",
				Tables: []Table{
					{
						Header: []string{"bed", "retained pulse, pressure", "mean flow (mL/s)", "valve"},
						Rows: [][]Cell{
							{words("brain"), number(estimate(0.41, 0.36, 0.47, 0.4, 0.42), "", data.Estimated), number(estimate(11.8, 9.1, 14.2, 11, 12), "mL/s", data.Estimated), words("opens")},
							{words("kidneys"), number(unidentified(0.1, 1.4, "no distal trace"), "", data.Estimated), number(undefined("the path is closed"), "mL/s", data.Estimated), words("opens in every second beat only, and for less than 40 ms; the root pressure then barely shows it")},
						},
						Foot: "Held: resistance, compliance, outflow pressure, heart rate.",
					},
					{
						Header: []string{"channel", "systolic (mmHg)", "mean (mmHg)"},
						Rows: [][]Cell{
							{words("abp_mmHg"), number(bareValue(129.04, "median of beats"), "mmHg", data.Measured), number(bareValue(79.53, "median of beats"), "mmHg", data.Measured)},
						},
					},
					{
						Header: []string{"state", "root pressure, mean (mmHg)", "root pressure, least (mmHg)", "root pressure, greatest (mmHg)", "pump speed (1000/min)"},
						Rows: [][]Cell{
							{words("native"), number(estimate(86.8, 84.6, 89, 86, 87), "mmHg", data.Measured), number(estimate(62.3, 60.1, 64.5, 62, 63), "mmHg", data.Measured), number(estimate(121.4, 117, 126, 120, 122), "mmHg", data.Measured), words("absent")},
							{words("supported"), number(estimate(95.1, 88.2, 103.6, 95, 96), "mmHg", data.Estimated), number(estimate(83.3, 74.1, 93.9, 83, 84), "mmHg", data.Estimated), number(estimate(108.4, 99, 119, 108, 109), "mmHg", data.Estimated), number(data.Exact(9.2), "1000/min", data.Assumed)},
						},
					},
				},
			},
		},
		Warnings: []data.Warning{
			{Code: data.CodeStandIn, Channel: data.Clean("abp_mmHg"), Text: "pressure of an unnamed artery stands in for the root's; its pulse is up to 40 % larger than at the root", Cure: "say where it was measured with --site abp_mmHg=SITE"},
			{Code: data.CodeOutflow, Text: "the outflow pressure is taken as 0 mmHg", Cure: "measure it, or give --outflow-pressure"},
		},
		Reproduce: []string{"afterbeat", "study", "Größe_µ 7.csv", "--pressure", "abp_mmHg", "--flow", "Q\x1b[31m", "--site", "abp_mmHg=radial", "--site", "Q\x1b[31m=root", "--outflow-pressure", "-2.5", "--one-beat", "--label", "pilot-07"},
		Remark:    data.Clean("Recorded under sedation."),
	}
}

func TestNoteGolden(t *testing.T) {
	for name, c := range map[string]struct {
		note    Note
		options Options
	}{
		"full":       {fullNote(), Options{}},
		"full-ascii": {fullNote(), Options{ASCII: true}},
		"empty":      {Note{}, Options{}},
	} {
		t.Run(name, func(t *testing.T) {
			got := c.note.Render(c.options)
			path := filepath.Join("testdata", name+".golden")
			if *update {
				if err := os.WriteFile(path, []byte(got), 0o644); err != nil {
					t.Fatal(err)
				}
			}
			want, err := os.ReadFile(path)
			if err != nil {
				t.Fatal(err)
			}
			if diff := cmp.Diff(string(want), got); diff != "" {
				t.Errorf("golden file differs (-want +got):\n%s", diff)
			}
			checkShape(t, c.note, c.options, got)
		})
	}
}

// A section alone is the section of the note.
func TestSectionAlone(t *testing.T) {
	n := fullNote()
	whole := n.Render(Options{})
	for _, s := range n.Sections {
		if got := s.Render(Options{}); !strings.Contains(whole, "\n\n"+got+"\n") {
			t.Errorf("section %q is not in the note:\n%s", s.Title, got)
		}
	}
}

// checkShape checks what holds for every note.
func checkShape(t interface {
	Helper()
	Errorf(string, ...any)
}, n Note, o Options, text string,
) {
	t.Helper()
	cells := &runewidth.Condition{StrictEmojiNeutral: true}
	lines := strings.Split(text, "\n")
	last := len(lines) - 1
	if last < 2 || lines[0] != Caution || lines[last-1] != Caution || lines[last] != "" {
		t.Errorf("the caution is not the first and the last line, or no line end follows:\n%s", text)
	}
	long := 0
	for _, a := range n.Reproduce {
		if cells.StringWidth(quote(a, o.ASCII))+2+4+2 > columns {
			long++
		}
	}
	for i, s := range lines {
		if cells.StringWidth(s) > columns {
			if long--; long < 0 {
				t.Errorf("line %d takes %d cells: %q", i+1, cells.StringWidth(s), s)
			}
		}
		if strings.TrimRight(s, " ") != s {
			t.Errorf("line %d ends in a blank: %q", i+1, s)
		}
		for _, r := range s {
			if o.ASCII && r >= 0x80 || data.Clean(string(r)).String() != string(r) && r != ' ' {
				t.Errorf("line %d holds %U: %q", i+1, r, s)
			}
		}
	}
}

// anything draws text from outside: of any runes, of long words, of bytes that
// are no UTF-8, of wide letters.
var anything = rapid.OneOf(
	rapid.String(),
	rapid.StringMatching(`[a-z ]{0,200}`),
	rapid.StringMatching(`[A-Za-z0-9_]{60,200}`),
	rapid.StringMatching(`[\x{4e00}-\x{4eff}\x{1f600}-\x{1f64f}\x{300}-\x{30f}é ]{0,80}`),
	rapid.Map(rapid.SliceOf(rapid.Byte()), func(b []byte) string { return string(b) }),
)

var anyFloat = rapid.OneOf(rapid.Float64(), rapid.Float64Range(-1000, 1000), rapid.SampledFrom([]float64{0, math.NaN(), math.Inf(1), math.Inf(-1)}))

var anyNumber = rapid.Custom(func(t *rapid.T) *Number {
	interval := func(label string) data.Interval {
		a, b := anyFloat.Draw(t, label), anyFloat.Draw(t, label)
		return data.Interval{Low: min(a, b), High: max(a, b)}
	}
	return &Number{
		Estimate: data.Estimate{
			Value: anyFloat.Draw(t, "value"), Total: interval("total"), Random: interval("random"),
			Identified: rapid.Bool().Draw(t, "identified"), Why: anything.Draw(t, "why"),
		},
		Unit:   rapid.OneOf(rapid.Just("mmHg s²/mL"), anything).Draw(t, "unit"),
		Origin: rapid.SampledFrom([]data.Origin{data.Measured, data.Estimated, data.Assumed, ""}).Draw(t, "origin"),
	}
})

var anyTable = rapid.Custom(func(t *rapid.T) Table {
	heads := rapid.SliceOfN(anything, 0, 7).Draw(t, "header")
	cell := rapid.Custom(func(t *rapid.T) Cell {
		if rapid.Bool().Draw(t, "is a number") {
			return Cell{Number: anyNumber.Draw(t, "number")}
		}
		return words(anything.Draw(t, "words"))
	})
	return Table{
		Header: heads,
		Rows:   rapid.SliceOfN(rapid.SliceOfN(cell, len(heads), len(heads)), 0, 4).Draw(t, "rows"),
		Foot:   anything.Draw(t, "foot"),
	}
})

var anySection = rapid.Custom(func(t *rapid.T) Section {
	row := rapid.Custom(func(t *rapid.T) Row {
		if rapid.Bool().Draw(t, "is a number") {
			return Row{Label: anything.Draw(t, "label"), Number: anyNumber.Draw(t, "number")}
		}
		return Words(anything.Draw(t, "label"), anything.Draw(t, "words"))
	})
	return Section{
		Title:  anything.Draw(t, "title"),
		Words:  rapid.SliceOfN(rapid.Map(anything, data.Clean), 0, 2).Draw(t, "words"),
		Rows:   rapid.SliceOfN(row, 0, 5).Draw(t, "rows"),
		Tables: rapid.SliceOfN(anyTable, 0, 2).Draw(t, "tables"),
	}
})

func TestAnyNoteKeepsItsShape(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		warning := rapid.Custom(func(t *rapid.T) data.Warning {
			return data.Warning{
				Code: data.CodeHole, Channel: data.Clean(anything.Draw(t, "channel")),
				Text: anything.Draw(t, "text"), Cure: anything.Draw(t, "cure"),
			}
		})
		n := Note{
			Program: anything.Draw(t, "program"), Version: anything.Draw(t, "version"),
			Title:     data.Clean(anything.Draw(t, "title")),
			Sections:  rapid.SliceOfN(anySection, 0, 3).Draw(t, "sections"),
			Warnings:  rapid.SliceOfN(warning, 0, 3).Draw(t, "warnings"),
			Reproduce: rapid.SliceOfN(anything, 0, 5).Draw(t, "reproduce"),
			Remark:    data.Clean(anything.Draw(t, "remark")),
		}
		o := Options{ASCII: rapid.Bool().Draw(t, "ascii")}
		text := n.Render(o)
		checkShape(t, n, o, text)
		if n.Render(o) != text {
			t.Fatal("rendered twice, and not the same")
		}
	})
}
