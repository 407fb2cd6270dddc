package app

import (
	"errors"
	"fmt"
	"io/fs"
	"path/filepath"
	"strings"

	"github.com/charmbracelet/bubbles/key"
	tea "github.com/charmbracelet/bubbletea"

	"afterbeat/data"
	"afterbeat/data/casefile"
	"afterbeat/data/casenote"
	"afterbeat/tree/study"
	"afterbeat/tui"
	"afterbeat/tui/field"
)

// savedMsg is the end of saving a note of a case.
type savedMsg struct {
	name   string
	folder string
	of     casefile.Case
	err    error
}

// askName asks for the name of the note, unless there is nothing to save yet.
func (m Model) askName() (Model, tea.Cmd) {
	switch {
	case m.study.Comparison != nil:
		m.naming, m.refused, m.name = true, data.Text{}, field.New(m.options.SaveAs)
	default:
		m = m.saying(tui.Note, "no note yet: ")
	}
	return m, nil
}

// nameKey takes a key while the name is asked for.
func (m Model) nameKey(msg tea.KeyMsg) (Model, tea.Cmd) {
	switch {
	case m.writing:
	case !msg.Paste && key.Matches(msg, keys.confirm):
		return m.write()
	case !msg.Paste && key.Matches(msg, keys.back):
		m.naming, m.leaving = false, stays
	default:
		m.name, m.refused = m.name.Update(msg), data.Text{}
	}
	return m, nil
}

// write saves the note under the name in the field.
func (m Model) write() (Model, tea.Cmd) {
	name := m.name.Value()
	if strings.TrimSpace(name) == "" {
		m.refused = data.Clean("a name is needed")
		return m, nil
	}
	m.writing = true
	s, save, options := m.study, m.options.Save, casenote.Options{ASCII: m.theme.ASCII}
	return m, func() tea.Msg {
		folder := ""
		if whole, err := filepath.Abs(name); err == nil {
			folder = filepath.Dir(whole)
		}
		return savedMsg{name, folder, s.Inputs.Case, save(name, []byte(study.Text(s.Note(), options)))}
	}
}

// wrote takes over how the saving ended. A name that was not taken is asked for
// again.
func (m Model) wrote(msg savedMsg) (Model, tea.Cmd) {
	m.writing = false
	if msg.err != nil {
		m.refused = refusal(msg.err)
	} else {
		m.naming, m.saved, m.outcome.Saved, m.outcome.Folder = false, msg.of, msg.name, msg.folder
		m.said = data.Clean("note saved to " + msg.name)
		m.options.SaveAs = following(msg.name)
	}
	switch {
	case m.leaving == interrupts:
		return m.interrupt()
	case m.leaving == savesFirst && msg.err == nil:
		return m.quit()
	}
	return m.keepSoon()
}

// refusal is why a name was not taken, in few words.
func refusal(err error) data.Text {
	if errors.Is(err, fs.ErrExist) {
		return data.Clean("that file exists, and was not touched; another name")
	}
	var file *data.FileError
	if errors.As(err, &file) {
		err = errors.New(file.What)
		if file.Err != nil {
			err = fmt.Errorf("%s: %w", file.What, file.Err)
		}
	}
	return data.Clean(err.Error())
}

// following is the name proposed after name was used: a-2.note.txt after
// a.note.txt.
func following(name string) string {
	base, found := strings.CutSuffix(name, noteSuffix)
	if !found {
		return name
	}
	stem, n := base, 1
	if i := strings.LastIndexByte(base, '-'); i >= 0 {
		var last int
		if _, err := fmt.Sscanf(base[i+1:], "%d", &last); err == nil && last > 1 && fmt.Sprint(last) == base[i+1:] {
			stem, n = base[:i], last
		}
	}
	return fmt.Sprintf("%s-%d%s", stem, n+1, noteSuffix)
}

const noteSuffix = ".note.txt"
