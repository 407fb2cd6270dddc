package main

import (
	"bytes"
	"encoding/json"
	"fmt"
	"math"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"afterbeat/data/casenote"
)

// result is what one command line gave.
type result struct {
	code        int
	out, errout string
}

func afterbeat(t *testing.T, stdin string, args ...string) result {
	t.Helper()
	var out, errout bytes.Buffer
	code := run(args, strings.NewReader(stdin), &out, &errout)
	return result{code, out.String(), errout.String()}
}

// pulsing is a CSV of the named columns, each a pulse of 72/min for 20 s.
func pulsing(columns ...string) string {
	var b strings.Builder
	b.WriteString("time_s," + strings.Join(columns, ",") + "\n")
	for i := range 2000 {
		at := float64(i) / 100
		phase := math.Mod(1.2*at, 1)
		fmt.Fprintf(&b, "%.2f", at)
		for range columns {
			fmt.Fprintf(&b, ",%.2f", 80+40*math.Exp(-3*phase)*(1-math.Exp(-20*phase)))
		}
		b.WriteString("\n")
	}
	return b.String()
}

func TestTwoEqualChannelsAreAPersonsChoice(t *testing.T) {
	file := filepath.Join(t.TempDir(), "two.csv")
	if err := os.WriteFile(file, []byte(pulsing("left_carotid_mmHg", "right_carotid_mmHg")), 0o600); err != nil {
		t.Fatal(err)
	}
	got := afterbeat(t, "", "fit", file)
	if got.code != exitUsage || got.out != "" || !strings.Contains(got.errout, "--pressure") ||
		!strings.Contains(got.errout, "left_carotid_mmHg or right_carotid_mmHg") {
		t.Errorf("fit of two equal channels: %+v", got)
	}
	// Check needs no choice, and describes both.
	got = afterbeat(t, "", "check", file, "--json")
	if got.code != exitDone || strings.Count(got.out, `"found": true`) != 2 {
		t.Errorf("check of two equal channels: %+v", got)
	}
	// Named, the pressure alone gives a time constant, and no fit.
	got = afterbeat(t, "", "fit", file, "--pressure", "left_carotid", "--json")
	var report struct {
		Fits       []any `json:"fits"`
		Estimators []struct {
			Name string   `json:"name"`
			Tau  *float64 `json:"tau_s"`
		} `json:"estimators"`
	}
	if err := json.Unmarshal([]byte(got.out), &report); err != nil {
		t.Fatal(err)
	}
	if got.code != exitDone || len(report.Fits) != 0 || len(report.Estimators) != 7 || report.Estimators[0].Tau == nil {
		t.Errorf("fit of a pressure alone: code %d, %+v", got.code, report)
	}
}

func TestStandardInput(t *testing.T) {
	got := afterbeat(t, pulsing("abp_mmHg"), "check", "-")
	if got.code != exitDone || !strings.HasPrefix(got.out, casenote.Caution) || !strings.Contains(got.out, "afterbeat check -") {
		t.Errorf("check of standard input: %+v", got)
	}
}

// An escape in a header reaches neither standard output nor standard error raw.
func TestHeadersAreShownCleaned(t *testing.T) {
	for _, args := range [][]string{{"check", "-"}, {"check", "-", "--json"}, {"fit", "-", "--pressure", "\x1b[2J"}} {
		got := afterbeat(t, pulsing("abp\x1b]0;gotcha\a_mmHg"), args...)
		if strings.ContainsAny(got.out+got.errout, "\x1b\a") {
			t.Errorf("%q lets an escape through: %+v", args, got)
		}
	}
}

// The keys of study --json are a contract.
func TestStudyKeys(t *testing.T) {
	got := afterbeat(t, "", "--json")
	if got.code != exitDone {
		t.Fatalf("%+v", got)
	}
	var report any
	if err := json.Unmarshal([]byte(got.out), &report); err != nil {
		t.Fatal(err)
	}
	keys := map[string]bool{}
	paths(report, "", keys)
	golden(t, filepath.Join("testdata", "study.keys"), strings.Join(sortedKeys(keys), "\n")+"\n")
}

// The demo's note, of which the README shows a piece.
func TestDemoNote(t *testing.T) {
	got := afterbeat(t, "", "--ascii")
	if got.code != exitDone {
		t.Fatalf("%+v", got)
	}
	golden(t, filepath.Join("testdata", "demo.note.txt"), got.out)
	for i, line := range strings.Split(got.out, "\n") {
		if len(line) > 80 {
			t.Errorf("line %d has %d columns", i+1, len(line))
		}
	}
	for i := range len(got.out) {
		if got.out[i] >= 0x80 {
			t.Fatalf("byte %d of the ASCII note is %#x", i, got.out[i])
		}
	}
}

// The worked example of testdata: on a continuous half-sine the closed form gives
// mean 91.875 and pulse 40.370 mmHg; retained pulse from an independent
// computation. 160 samples of the flow are off by 1 part in 1000.
func TestWorkedExample(t *testing.T) {
	got := afterbeat(t, "", "solve", "load", filepath.Join("..", "..", "testdata", "load.toml"), "--json")
	var report struct {
		Mean   float64 `json:"mean"`
		Pulse  float64 `json:"pulse_pressure"`
		States []struct {
			Retained struct {
				Pressure float64 `json:"pressure"`
			} `json:"retained_pulse"`
		} `json:"states"`
	}
	if err := json.Unmarshal([]byte(got.out), &report); err != nil {
		t.Fatalf("%v: %+v", err, got)
	}
	want := []float64{0.586, 0.338, 0.164}
	if math.Abs(report.Mean-91.875) > 0.03 || math.Abs(report.Pulse-40.370) > 0.05 || len(report.States) != len(want) {
		t.Fatalf("%+v", report)
	}
	for i, s := range report.States {
		if math.Abs(s.Retained.Pressure-want[i]) > 1e-3 {
			t.Errorf("state %d: retained pulse %v, want %v", i, s.Retained.Pressure, want[i])
		}
	}
}

// The README shows a screen, and the beginning and the end of the demo's note; the
// commands it gives exist.
func TestReadme(t *testing.T) {
	file := filepath.Join("..", "..", "README.md")
	content, err := os.ReadFile(file)
	if err != nil {
		t.Fatal(err)
	}
	screen, err := os.ReadFile(filepath.Join("..", "..", "tui", "app", "testdata", "demo-support-80x24.golden"))
	if err != nil {
		t.Fatal(err)
	}
	note, err := os.ReadFile(filepath.Join("testdata", "demo.note.txt"))
	if err != nil {
		t.Fatal(err)
	}
	head, _, short := strings.Cut(string(note), "\nRecording\n---")
	_, tail, reproduced := strings.Cut(string(note), "\nTo reproduce,")
	if !short || !reproduced {
		t.Fatal("the note lacks its sections")
	}
	readme := shown(t, string(content), "screen: tui/app/testdata/demo-support-80x24.golden", strings.TrimRight(string(screen), "\n")+"\n")
	readme = shown(t, readme, "note: cut from cmd/afterbeat/testdata/demo.note.txt", head+"[...]\nTo reproduce,"+tail)
	golden(t, file, readme)
	for _, command := range []string{"    go run ./cmd/afterbeat\n", "    go test ./...\n"} {
		if !strings.Contains(string(content), command) {
			t.Errorf("README lacks %q", command)
		}
	}
}

// shown is a page with text in the place of the block after the comment that
// begins with mark.
func shown(t *testing.T, page, mark, text string) string {
	t.Helper()
	before, after, found := strings.Cut(page, "<!-- "+mark)
	comment, after, opened := strings.Cut(after, "```\n")
	_, after, closed := strings.Cut(after, "```\n")
	if !found || !opened || !closed {
		t.Fatalf("README has no block for %s", mark)
	}
	return before + "<!-- " + mark + comment + "```\n" + text + "```\n" + after
}
