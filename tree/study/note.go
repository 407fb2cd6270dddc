package study

import (
	"fmt"
	"maps"
	"path/filepath"
	"slices"

	"afterbeat/data"
	"afterbeat/data/casenote"
)

// Note is the text for the case notes, of everything that has been computed.
// The same study gives the same note, byte for byte.
func (s Study) Note() casenote.Note {
	n := s.emptyNote("Note of a study")
	if short := s.shortSection(); len(short.Rows) > 0 {
		n.Sections = append(n.Sections, short)
	}
	if s.Intake != nil {
		n.Sections = append(n.Sections, recordingSection(*s.Intake))
	}
	if s.Beats != nil {
		n.Sections = append(n.Sections, s.Beats.sections()...)
	}
	if s.Fit != nil {
		n.Sections = append(n.Sections, s.Fit.sections()...)
	}
	if s.Tree != nil {
		n.Sections = append(n.Sections, s.Tree.sections()...)
	}
	if s.Forecast != nil {
		n.Sections = append(n.Sections, s.Forecast.sections()...)
	} else if s.Comparison != nil {
		n.Sections = append(n.Sections, casenote.Section{Title: "Forecast", Chief: true, Words: []data.Text{data.Clean("Not computed when this note was made.")}})
	}
	if s.Comparison != nil {
		n.Sections = append(n.Sections, s.Comparison.sections(s.Forecast)...)
	}
	n.Reproduce = s.reproduce("study")
	if s.Inputs.Case.Brief {
		n.Sections = chief(n.Sections)
	}
	return n
}

// chief are the sections of a brief note, and how many it lacks.
func chief(all []casenote.Section) []casenote.Section {
	kept := slices.DeleteFunc(slices.Clone(all), func(s casenote.Section) bool { return !s.Chief })
	left := len(all) - len(kept)
	return append(kept, casenote.Section{Title: "Left out", Words: words(fmt.Sprintf(
		"A brief note: %d sections of the beats, the fits, the tree and the forecast are left out; without --brief they stand here.", left))})
}

// CheckNote is what `check` prints for a person to read.
func (s Study) CheckNote() casenote.Note {
	n := s.emptyNote("Check of a recording")
	n.Sections = append([]casenote.Section{recordingSection(*s.Intake)}, s.Beats.checkSections()...)
	n.Reproduce = s.reproduce("check")
	return n
}

// FitNote is what `fit` prints for a person to read.
func (s Study) FitNote() casenote.Note {
	n := s.emptyNote("Fit of the arterial load")
	n.Sections = append(n.Sections, recordingSection(*s.Intake))
	n.Sections = append(n.Sections, s.Beats.sections()...)
	n.Sections = append(n.Sections, s.Fit.sections()...)
	n.Reproduce = s.reproduce("fit")
	return n
}

func (s Study) emptyNote(title string) casenote.Note {
	title += ": " + s.Inputs.Recording.Name.String()
	if label := s.Inputs.Case.Label; label != "" {
		title += ", " + label
	}
	return casenote.Note{
		Program: "afterbeat", Version: Version,
		Title:    data.Clean(title),
		Warnings: s.Warnings(),
		Remark:   data.Clean(s.Inputs.Case.Remark),
	}
}

// reproduce is the command that gives the output again in the folder of the
// recording: every choice as a flag, so that no case file is needed.
func (s Study) reproduce(command string) []string {
	c := s.Inputs.Case
	if c.Exclude != "" {
		c.Exclude = beside(c.Recording, c.Exclude)
	}
	if file := c.Modulation["file"]; file != "" {
		c.Modulation = maps.Clone(c.Modulation)
		c.Modulation["file"] = beside(c.Recording, file)
	}
	if c.Tree != "" {
		c.Tree = beside(c.Recording, c.Tree)
	}
	return c.Command(command, baseName(c.Recording))
}

// beside is a file as seen from the folder of the recording. Of one that lies
// elsewhere only its name is left: a note carries no path.
func beside(recording, file string) string {
	rel, err := filepath.Rel(filepath.Dir(recording), file)
	if err != nil || !filepath.IsLocal(rel) {
		return baseName(file)
	}
	return filepath.ToSlash(rel)
}

// Text renders an output of a study. Where o asks for ASCII, so does the command
// that reproduces it.
func Text(n casenote.Note, o casenote.Options) string {
	if o.ASCII && len(n.Reproduce) > 0 {
		n.Reproduce = append(slices.Clone(n.Reproduce), "--ascii")
	}
	return n.Render(o)
}

// recordingSection describes the file and its channels.
func recordingSection(t Intake) casenote.Section {
	whole := func(label string, v float64, unit string) casenote.Row {
		return casenote.Quantity(label, data.Exact(v), unit, data.Measured)
	}
	rows := []casenote.Row{
		casenote.Words("file", t.Recording.Name.String()),
		casenote.Words("sha256", t.Recording.SHA256),
		whole("rows", float64(t.Clock.Rows), ""),
		whole("duration", t.Clock.Duration, "s"),
		whole("sampling", t.Clock.Rate, "Hz"),
		casenote.Words("span used", spanWords(t)),
	}
	for _, f := range excludedWords(t) {
		rows = append(rows, casenote.Words("left out", f))
	}
	for _, f := range t.faultWords() {
		rows = append(rows, casenote.Words("unusable", f))
	}
	for i, n := range t.Filled {
		if n > 0 {
			rows = append(rows, casenote.Words("filled", fmt.Sprintf("%d samples of %s, in holes of up to 20 ms, by straight lines", n, t.Channels[i].Name)))
		}
	}
	return casenote.Section{Title: "Recording", Chief: true, Rows: rows, Tables: []casenote.Table{channelTable(t)}}
}

func spanWords(t Intake) string {
	if t.Case.From == nil && t.Case.To == nil {
		return "all of it"
	}
	to := t.Recording.Time[len(t.Recording.Time)-1]
	if t.Case.To != nil {
		to = *t.Case.To
	}
	return fmt.Sprintf("%g to %g s of the file's clock", t.Span.From, to)
}

func excludedWords(t Intake) []string {
	if len(t.Excluded) == 0 {
		return nil
	}
	sum := 0.0
	for _, s := range t.Excluded {
		sum += s.To - s.From
	}
	return []string{fmt.Sprintf("%d stretches of %.1f s in all, by %s", len(t.Excluded), sum, data.Clean(baseName(t.Case.Exclude)))}
}

func channelTable(t Intake) casenote.Table {
	table := casenote.Table{Header: []string{"channel", "quantity", "unit", "site", "missing", "used as"}}
	for i, ch := range t.Channels {
		missing := data.Exact(float64(t.Recording.Channels[i].Missing()))
		table.Rows = append(table.Rows, []casenote.Cell{
			{Words: ch.Name},
			{Words: data.Clean(string(ch.Quantity))},
			{Words: data.Clean(ch.Unit.Name)},
			{Words: data.Clean(string(ch.Site))},
			{Number: &casenote.Number{Estimate: missing, Origin: data.Measured}},
			{Words: data.Clean(t.roleWords(i))},
		})
	}
	return table
}

// Role is what channel i is used as: "pressure", "flow" or "velocity"; empty
// where it is not used.
func (t Intake) Role(i int) string {
	switch i {
	case t.Selection.Pressure:
		return "pressure"
	case t.Selection.Flow:
		return "flow"
	case t.Selection.Velocity:
		if t.Selection.Flow < 0 {
			return "velocity"
		}
	}
	return ""
}

// roleWords says what a channel is used as, and whether that was guessed.
func (t Intake) roleWords(i int) string {
	role := t.Role(i)
	stated := map[string]string{"pressure": t.Case.Pressure, "flow": t.Case.Flow, "velocity": t.Case.Velocity}[role]
	switch {
	case role == "":
		return "-"
	case stated == "":
		return role + " (guessed)"
	}
	return role
}
