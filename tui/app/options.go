package app

import (
	"context"
	"fmt"

	"afterbeat/data"
	"afterbeat/data/casefile"
	"afterbeat/tree/study"
	"afterbeat/tui"
	"afterbeat/tui/state"
)

// Options is what the screens start from.
type Options struct {
	Case  casefile.Case
	Title data.Text // the file, shown where the case has no label
	// Load reads the files of a case.
	Load func(ctx context.Context, c casefile.Case) (study.Inputs, error)
	// Save writes a file, and fails where there is one of that name.
	Save func(name string, content []byte) error
	// SaveAs is the name proposed for the note.
	SaveAs string
	// State keeps the choices for a restart; nil keeps nothing.
	State *state.Store
	Theme tui.Theme
	// Screens are those of the stages; a stage without one says that it comes
	// later.
	Screens map[tui.Stage]tui.Screen
	// Screenless is the command that gives the result without a screen.
	Screenless data.Text
}

// Outcome is how the screens ended.
type Outcome struct {
	Folder      string // of the note; empty where it is not known
	Saved       string // the note saved last; empty where none was
	Unsaved     bool   // choices were made that no saved note has
	Interrupted bool   // by a signal, ctrl+c, or the loss of the terminal
	Kept        string // the recovery file; empty where there is none
	Waiting     bool   // choices of an interrupted run were not answered for
}

// String is the line for the normal screen: what was saved and where.
func (o Outcome) String() string {
	s := "nothing was saved"
	if o.Saved != "" {
		s = fmt.Sprintf("note saved to %s", data.Clean(o.Saved))
		if o.Folder != "" {
			s += fmt.Sprintf(" in %s", data.Clean(o.Folder))
		}
	}
	if o.Interrupted {
		s = "interrupted; " + s
	}
	switch {
	case o.Kept != "":
		s += "; the choices made since are offered at the next start"
	case o.Unsaved:
		s += "; the choices made since are discarded"
	case o.Waiting:
		s += "; the choices of the interrupted run stay on offer"
	}
	return s
}
