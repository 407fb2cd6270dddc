package study

import (
	"regexp"
	"runtime"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"afterbeat/data/casefile"
	"afterbeat/data/casenote"
)

// again reads the command that a note ends with, as the command line does, and
// computes it in the folder f.
func again(t interface{ Fatal(...any) }, n casenote.Note, f folder) casenote.Note {
	if len(n.Reproduce) < 3 || n.Reproduce[0] != "afterbeat" || n.Reproduce[1] != "study" {
		t.Fatal("the command is", n.Reproduce)
	}
	c := casefile.Case{Recording: n.Reproduce[2]}
	switches := map[string]bool{}
	for _, k := range casefile.Keys() {
		switches[k.Flag] = k.Value == ""
	}
	for args := n.Reproduce[3:]; len(args) > 0; args = args[1:] {
		flag, text := strings.TrimPrefix(args[0], "--"), "true"
		if !switches[flag] {
			text, args = args[1], args[1:]
		}
		if err := c.Set(flag, text); err != nil {
			t.Fatal(err)
		}
	}
	s, err := try(c, f, StageDone)
	if err != nil {
		t.Fatal(err)
	}
	return s.Note()
}

// The command at the end of a note gives the same note again, byte for byte,
// whatever the choices.
func TestNoteCanBeHadAgain(t *testing.T) {
	f := folder{
		"demo.csv": table(100, 1000, aortic("aortic_pressure_mmHg"), column{"lvot_velocity_cm_s", noisy(scaled(halfFlow, 0.25, 0), 0.2)}),
		"ex.csv":   "start_s,end_s\n4,5\n",
	}
	rapid.Check(t, func(t *rapid.T) {
		c := casefile.Case{Recording: "demo.csv", Replicates: ptr(6), Share: []float64{0.5}}
		for _, one := range rapid.SliceOfDistinct(rapid.SampledFrom([]string{
			"--label=pilot-07", "--remark=worth a 'second' look \u00e4", "--exclude=ex.csv", "--pressure=aortic_pressure", "--site=aortic_pressure_mmHg=radial",
			"--scale=aortic_pressure=1.05", "--offset=aortic_pressure=-2.5", "--from=0.125", "--to=9", "--diameter-cm=2.1", "--delay=0.025", "--outflow-pressure=8",
			"--error=flow=20%", "--error=delay=0.002", "--drop=3", "--drop=8", "--keep=6", "--model=wk2", "--seed=4", "--share=0.75", "--unit=aortic_pressure_mmHg=mmHg",
			"--profile=0.9", "--angle-deg=12.5",
		}), func(s string) string { return s }).Draw(t, "choices") {
			flag, text, _ := strings.Cut(strings.TrimPrefix(one, "--"), "=")
			if err := c.Set(flag, text); err != nil {
				t.Fatal(err)
			}
		}
		if c.DiameterCM == nil {
			c.Profile, c.AngleDeg = "", nil
		}
		s, err := try(c, f, StageDone)
		if err != nil {
			t.Fatal(err)
		}
		want := s.Note()
		if got := again(t, want, f); got.Render(defaults) != want.Render(defaults) {
			t.Fatalf("again:\n%s\nbefore:\n%s", got.Render(defaults), want.Render(defaults))
		}
	})
}

// A file whose name a shell would misread is called so that it does not.
func TestNoteOfAnOddlyNamedFile(t *testing.T) {
	content := invented(aortic("ao_mmHg"))["a.csv"]
	for name, called := range map[string]string{
		"two words.csv": "'two words.csv'", "-dash.csv": "./-dash.csv", "it's $5.csv": `'it'\''s $5.csv'`, `back\slash.csv`: `'back\slash.csv'`,
		"n\u00e4he.csv": "'n\u00e4he.csv'", "tab\t.csv": `$'tab\011.csv'`,
	} {
		c := inventedCase()
		c.Recording = "some/folder/" + name
		n := whole(t, c, folder{c.Recording: content}).Note()
		text := n.Render(defaults)
		if !strings.Contains(text, "\n  afterbeat study "+called+" ") {
			t.Errorf("%q is called %q", name, text[strings.Index(text, "To reproduce"):])
		}
		if strings.Contains(text, "folder/") {
			t.Errorf("%q: the note holds the folder", name)
		}
		if got := again(t, n, folder{name: content, "./" + name: content}).Render(defaults); got != text {
			t.Errorf("%q: again\n%s", name, got)
		}
	}
}

// The caution comes first and last, no line is wider than 80 cells, and in ASCII
// every byte is.
func TestNoteIsFitToPrint(t *testing.T) {
	c := inventedCase()
	c.Recording, c.Remark = "n\u00e4he.csv", "g\u00fcnstig, 5 \u00b5V"
	n := whole(t, c, folder{c.Recording: invented(aortic("ao\u00e4 mmHg"), outflowTo("ao_flow_mL_s"))["a.csv"]}).Note()
	for _, ascii := range []bool{false, true} {
		note := n.Render(casenote.Options{ASCII: ascii})
		if !strings.HasPrefix(note, casenote.Caution+"\n") || !strings.HasSuffix(note, "\n"+casenote.Caution+"\n") {
			t.Error("the caution is not first and last")
		}
		for _, line := range strings.Split(note, "\n") {
			if len([]rune(line)) > 80 {
				t.Errorf("%d cells: %s", len([]rune(line)), line)
			}
		}
		if i := strings.IndexFunc(note, func(r rune) bool { return r >= 0x80 }); ascii != (i < 0) {
			t.Errorf("ASCII %v: the first other letter at %d", ascii, i)
		}
	}
}

// What a person remarks and how a study is called stand in the note.
func TestRemarkAndLabel(t *testing.T) {
	note := demoFitted(t, func(c *casefile.Case) { c.Remark, c.Label = "breathing is deep after 12 s", "pilot-07" }).Note().Render(defaults)
	for _, want := range []string{"\nRemark\n------\nbreathing is deep after 12 s\n", "demo.csv, pilot-07"} {
		if !strings.Contains(note, want) {
			t.Errorf("the note lacks %q", want)
		}
	}
}

// Every number of the note has a unit, in its row or in the header of its column,
// or counts something, or is a ratio.
func TestNumbersHaveUnits(t *testing.T) {
	n := sharedDemo(t).Note()
	bare := regexp.MustCompile(`^(rows|beats averaged|samples|factor k|cut by an end or a gap)$`)
	ratio := regexp.MustCompile(`, |^(missing|AICc|BIC|share of pump|retained .*)$`)
	rows, cells := 0, 0
	for _, section := range n.Sections {
		for _, row := range section.Rows {
			if row.Number == nil {
				continue
			}
			rows++
			if row.Number.Unit == "" && !bare.MatchString(row.Label) {
				t.Errorf("%s: %s has no unit", section.Title, row.Label)
			}
		}
		for _, table := range section.Tables {
			for _, row := range table.Rows {
				for i, cell := range row {
					if cell.Number == nil {
						continue
					}
					if cells++; !ratio.MatchString(table.Header[i]) {
						t.Errorf("%s: column %q has no unit", section.Title, table.Header[i])
					}
				}
			}
		}
	}
	if rows < 20 || cells < 50 {
		t.Errorf("%d rows, %d cells: too few to have checked anything", rows, cells)
	}
}

// The note is the same on one core and on four; so is its forecast
// ([TestForecastIsTheSameEachTime]).
func TestNoteDoesNotDependOnCores(t *testing.T) {
	var notes []string
	for _, cores := range []int{1, 4} {
		before := runtime.GOMAXPROCS(cores)
		notes = append(notes, demoFitted(t, func(c *casefile.Case) { c.Replicates = ptr(200) }).Note().Render(defaults))
		runtime.GOMAXPROCS(before)
	}
	if notes[0] != notes[1] {
		t.Error("the note of one core is not that of four")
	}
}

// A study that has only begun has a note of what there is.
func TestNoteOfAnUnfinishedStudy(t *testing.T) {
	c, f := demoCase(t), demoFolder(t)
	for _, last := range []Stage{StageIntake, StageBeats, StageFit} {
		s, err := try(c, f, last)
		if err != nil {
			t.Fatal(err)
		}
		if note := s.Note().Render(defaults); !strings.Contains(note, "\nRecording\n") || strings.Contains(note, "Native and supported") {
			t.Errorf("up to %q:\n%s", last, note)
		}
	}
}

// A brief note has the chief sections, all warnings and the way to have it again,
// and says that it lacks the rest.
func TestBriefNote(t *testing.T) {
	s := sharedDemo(t)
	whole := Text(s.Note(), casenote.Options{})
	s.Inputs.Case.Brief = true
	brief := Text(s.With(s.Inputs.Case).Note(), casenote.Options{})
	if lines := strings.Count(brief, "\n"); lines > 250 || lines < 100 {
		t.Errorf("%d lines", lines)
	}
	for _, want := range []string{
		"\nIn short\n", "\nRecording\n", "\nGiven and assumed\n", "\nForecast: native and supported, coupled\n", "\nWhat is held, natively and on support\n",
		"\nWarnings (", "--brief", "\nLeft out\n--------\nA brief note: ",
	} {
		if !strings.Contains(brief, want) {
			t.Errorf("the brief note lacks %q", want)
		}
	}
	for _, not := range []string{"\nFit of wk3", "\nInput impedance", "\nForecast: power\n"} {
		if strings.Contains(brief, not) || !strings.Contains(whole, not) {
			t.Errorf("%q stands in the brief note, or not in the whole one", not)
		}
	}
	if strings.Contains(whole, "--brief") {
		t.Error("the whole note asks for a brief one")
	}
}
