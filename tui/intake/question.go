package intake

import (
	"strings"

	"afterbeat/tui"
	"afterbeat/tui/field"
	"afterbeat/tui/layout"
)

// subject is what the text field is about.
type subject int

const (
	nothing subject = iota
	ofUnit
	ofCalibration
	ofBeside
)

// question is the one text field of the screen. judge answers the text at
// once: what it would do, or why it is wrong.
type question struct {
	subject subject
	prompt  string
	field   field.Model
	judge   func(text string) (answer string, ok bool)
}

func ask(s subject, prompt, text string, judge func(string) (string, bool)) question {
	return question{subject: s, prompt: prompt, field: field.New(text), judge: judge}
}

func (q question) open() bool { return q.subject != nothing }

// text is what was typed.
func (q question) text() string { return strings.TrimSpace(q.field.Value()) }

// lines shows the field, and below it the answer.
func (q question) lines(width int, t tui.Theme) []string {
	prompt := layout.Clean(q.prompt+":", t).Cut(width / 2)
	answer, ok := q.judge(q.text())
	if !ok {
		answer = "not taken: " + answer
	}
	return []string{
		prompt.String() + " " + q.field.View(width-prompt.Width()-1, t),
		layout.Clean(answer, t).String(),
	}
}
