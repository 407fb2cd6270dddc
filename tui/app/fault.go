package app

import (
	"fmt"
	"path"
	"runtime"
	"strings"

	tea "github.com/charmbracelet/bubbletea"

	"afterbeat/data"
)

// faultMsg says where a command broke down.
type faultMsg string

// caught, deferred, recovers from a fault of the program and tells where it
// was: function, file and line. The value of the panic, which may hold what
// was measured, is dropped.
func caught(tell func(at string)) {
	if recover() != nil {
		tell(whereabouts())
	}
}

// whereabouts is the innermost place of this program that panicked.
func whereabouts() string {
	callers := make([]uintptr, 64)
	frames := runtime.CallersFrames(callers[:runtime.Callers(2, callers)])
	panicking := false
	for {
		f, more := frames.Next()
		if panicking && strings.HasPrefix(f.Function, "afterbeat/") {
			return fmt.Sprintf("%s, %s:%d", path.Base(f.Function), path.Base(f.File), f.Line)
		}
		panicking = panicking || f.Function == "runtime.gopanic"
		if !more {
			return "an unknown place"
		}
	}
}

// guard is cmd with a recovery around it, and around each command that comes
// of it.
func guard(cmd tea.Cmd) tea.Cmd {
	if cmd == nil {
		return nil
	}
	return func() (msg tea.Msg) {
		defer caught(func(at string) { msg = faultMsg(at) })
		msg, _ = each(cmd(), guard)
		return msg
	}
}

// afterFault says what happened. The model is that from before the message, so
// that nothing is lost and work goes on; computing stops, since a step that
// broke down would do so again.
func (m Model) afterFault(at string) Model {
	m.writing = false
	return m.halt().complain(faultAt(at))
}

func faultAt(at string) notice {
	return notice{
		text: data.Clean("the program has a fault at " + at + "; nothing was changed"),
		hint: data.Clean("please report this line, which holds no data; your choices are kept, and the note can be saved"),
	}
}
