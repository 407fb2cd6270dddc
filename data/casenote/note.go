package casenote

import (
	"cmp"
	"fmt"
	"strings"

	"afterbeat/data"
)

// Note is the text that goes into the case notes.
type Note struct {
	Program, Version string // who wrote it; the line is left out without Program
	Title            data.Text
	Sections         []Section
	Warnings         []data.Warning
	// Reproduce is the command that gives this note again, as arguments: the
	// program first, quoted on rendering. The block is left out where empty.
	Reproduce []string
	// Beside is the file in whose folder the command works; "" is the recording.
	Beside string
	// Remark is what the person has to say; may be empty.
	Remark data.Text
}

// Options of rendering.
type Options struct {
	// ASCII spells out signs and writes other letters as \u{e4}, so that every
	// byte is below 0x80.
	ASCII bool
}

// Render writes the note as plain text: lines of at most 80 cells without
// blanks at their end, the last one ended too, the [Caution] first and last. Only an
// argument of the command to reproduce may be longer than a line.
func (n Note) Render(o Options) string {
	r := renderer{Options: o}
	r.line(Caution)
	r.title(n)
	for _, s := range n.Sections {
		r.section(s)
	}
	r.warnings(n.Warnings)
	if n.Remark != (data.Text{}) {
		r.heading("Remark")
		r.paragraph(n.Remark.String())
	}
	r.reproduce(n.Reproduce, cmp.Or(n.Beside, "recording"))
	r.line("")
	r.line(Caution)
	return r.String()
}

// Render writes one section as it stands in a note, its title first.
func (s Section) Render(o Options) string {
	r := renderer{Options: o}
	r.section(s)
	return strings.TrimPrefix(r.String(), "\n")
}

// renderer gathers the lines of a text.
type renderer struct {
	Options
	lines []string
}

// String joins the lines.
func (r *renderer) String() string { return strings.Join(r.lines, "\n") + "\n" }

// text makes s fit to print: clean, and in ASCII where asked for.
func (r *renderer) text(s string) string {
	s = data.Clean(s).String()
	if r.ASCII {
		return ascii(s)
	}
	return s
}

func (r *renderer) line(s string) { r.lines = append(r.lines, strings.TrimRight(s, " ")) }

func (r *renderer) put(lines []string) {
	for _, s := range lines {
		r.line(s)
	}
}

func (r *renderer) paragraph(s string) { r.put(wrap(r.text(s), columns)) }

func (r *renderer) heading(s string) { r.underlined(s, "-") }

// underlined writes a title after an empty line and rules it off.
func (r *renderer) underlined(s, rule string) {
	lines := wrap(r.text(s), columns)
	r.line("")
	r.put(lines)
	r.line(strings.Repeat(rule, widest(lines)))
}

func (r *renderer) title(n Note) {
	if n.Title != (data.Text{}) {
		r.underlined(n.Title.String(), "=")
	}
	if n.Program != "" {
		r.paragraph("Written by " + n.Program + spaced(n.Version) + ".")
	}
}

func (r *renderer) section(s Section) {
	r.heading(s.Title)
	for i, words := range s.Words {
		if i > 0 {
			r.line("")
		}
		r.paragraph(words.String())
	}
	if len(s.Rows) > 0 {
		if len(s.Words) > 0 {
			r.line("")
		}
		r.rows(s.Rows)
	}
	for i, t := range s.Tables {
		if i > 0 || len(s.Words)+len(s.Rows) > 0 {
			r.line("")
		}
		r.table(t)
	}
}

func (r *renderer) warnings(list []data.Warning) {
	r.heading(fmt.Sprintf("Warnings (%d)", len(list)))
	if len(list) == 0 {
		r.line("None.")
	}
	for i, w := range list {
		number := fmt.Sprintf("%d. ", i+1)
		said := string(w.Code)
		if w.Channel != (data.Text{}) {
			said += ", " + w.Channel.String()
		}
		at := len(number)
		body := wrap(r.text(said+": "+w.Text), columns-at)
		body = append(body, hang(r.text("cure: "+w.Cure), columns-at)...)
		r.put(beside([]string{number}, body, at))
	}
}

func (r *renderer) reproduce(args []string, beside string) {
	if len(args) == 0 {
		return
	}
	r.line("")
	r.line("To reproduce, in the folder of the " + beside + ":")
	r.line("")
	for _, s := range command(args, columns-2, r.ASCII) {
		r.line("  " + s)
	}
}
