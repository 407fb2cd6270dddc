package main

import (
	"context"
	"crypto/sha256"
	"errors"
	"fmt"
	"os"
	"path/filepath"
	"strings"

	"github.com/spf13/cobra"
	"golang.org/x/term"

	"afterbeat/data"
	"afterbeat/data/casefile"
	"afterbeat/data/casenote"
	"afterbeat/data/demo"
	"afterbeat/data/save"
	"afterbeat/tree/study"
	"afterbeat/tui"
	"afterbeat/tui/app"
	"afterbeat/tui/beats"
	"afterbeat/tui/fit"
	"afterbeat/tui/intake"
	"afterbeat/tui/note"
	"afterbeat/tui/state"
	"afterbeat/tui/support"
	"afterbeat/tui/tree"
)

// screenFlags are the flags that only the screens have.
type screenFlags struct{ noState, noColour bool }

// addScreen adds the flags of the screens.
func addScreen(c *cobra.Command) *screenFlags {
	f := &screenFlags{}
	c.Flags().BoolVar(&f.noState, "no-state", false, "keep no choices for a restart after an interruption")
	c.Flags().BoolVar(&f.noColour, "no-color", false, "draw the screens without colours")
	return f
}

// runRoot is `afterbeat [PATH]`: the screens on a terminal, else the note.
func runRoot(ctx context.Context, s stream, o *options, f *screenFlags, args []string) error {
	keys, out, ok := openTerminal(s)
	if !ok || o.json || o.saveAs != "" || o.replace {
		return runScreenless(ctx, s, o, args)
	}
	private()
	path := ""
	if len(args) > 0 {
		path = args[0]
	}
	with, locate, err := screenOptions(ctx, path, s, o, f)
	if err != nil {
		return err
	}
	end, err := app.Run(ctx, with, keys, out)
	switch {
	case err != nil:
		return locate(err)
	case end.Interrupted:
		return interruption{end.String()}
	}
	fmt.Fprintln(s.err, "afterbeat: "+end.String())
	return nil
}

// interruption is how an interrupted session of the screens ended.
type interruption struct{ line string }

func (e interruption) Error() string        { return e.line }
func (e interruption) Is(target error) bool { return target == context.Canceled }

// interrupted says what was saved when an interruption came.
func interrupted(err error) string {
	var of interruption
	if errors.As(err, &of) {
		return of.line
	}
	return "interrupted; nothing was saved"
}

// openTerminal is where keys come from and frames go to; ok is false where no
// screen can be opened.
func openTerminal(s stream) (keys, out *os.File, ok bool) {
	if t := os.Getenv("TERM"); t == "" || t == "dumb" {
		return nil, nil, false
	}
	if out, ok = s.out.(*os.File); !ok || !term.IsTerminal(int(out.Fd())) {
		return nil, nil, false
	}
	if keys, ok = s.in.(*os.File); ok && term.IsTerminal(int(keys.Fd())) {
		return keys, out, true
	}
	keys, err := os.OpenFile("/dev/tty", os.O_RDWR, 0)
	return keys, out, err == nil
}

// screenOptions opens what path names; locate tells where in its files an error
// of a choice stands.
func screenOptions(ctx context.Context, path string, s stream, o *options, f *screenFlags) (with app.Options, locate func(error) error, err error) {
	from, err := openPath(path, interruptible{ctx, s.in})
	if err != nil {
		return with, nil, err
	}
	c, err := o.over(from.base)
	if err != nil {
		return with, nil, err
	}
	key, err := from.hold(path)
	if err != nil {
		return with, nil, err
	}
	name := baseName(path)
	with = app.Options{
		Case: c, Title: data.Clean(name), SaveAs: stem(name) + ".note.txt",
		Load:       func(_ context.Context, c casefile.Case) (study.Inputs, error) { return study.Read(c, from.read) },
		Save:       func(name string, content []byte) error { return save.File(name, content, false) },
		Theme:      tui.ThemeOf(os.Getenv, o.ascii, f.noColour),
		Screens:    screens(),
		Screenless: data.Clean(strings.Join(screenless(path), " ")),
	}
	if folder, err := state.Folder(os.Getenv); err == nil && !f.noState {
		with.State = state.New(folder, key)
	}
	return with, func(err error) error { return from.located(err, o) }, nil
}

// screens are those of the stages that exist.
func screens() map[tui.Stage]tui.Screen {
	return map[tui.Stage]tui.Screen{
		tui.Intake: intake.New(), tui.Beats: beats.New(), tui.Fit: fit.New(), tui.Tree: tree.New(), tui.Support: support.New(), tui.Note: note.New(),
	}
}

// hold sees to it that what path names is there, and that standard input can be
// read again. key stands for it between runs.
func (s *source) hold(path string) (key string, err error) {
	switch path {
	case "":
		return demo.CaseName, nil
	case "-":
		content, err := s.read(path)
		rest := s.read
		s.read = func(name string) ([]byte, error) {
			if name == path {
				return content, nil
			}
			return rest(name)
		}
		return fmt.Sprintf("%x", sha256.Sum256(content)), err
	}
	if _, err := os.Stat(path); err != nil {
		_, err = s.read(path)
		return "", err
	}
	return filepath.Abs(path)
}

// baseName is what the file is called on the screen.
func baseName(path string) string {
	switch path {
	case "":
		return demo.RecordingName
	case "-":
		return "standard input"
	}
	return filepath.Base(path)
}

// stem is the name of a file without what tells its kind.
func stem(name string) string {
	name = strings.ReplaceAll(name, " ", "-")
	for _, end := range []string{caseSuffix, ".afterbeat", ".csv"} {
		name = strings.TrimSuffix(name, end)
	}
	return name
}

// screenless is the command that prints the note without a screen.
func screenless(path string) []string {
	if path == "" {
		return []string{"afterbeat | cat"}
	}
	return []string{casenote.Quote([]string{"afterbeat", "study", path}, true)}
}
