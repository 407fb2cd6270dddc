// Package background settles the terminal's background colour before Bubble Tea
// can ask for it. Bubble Tea asks the terminal when it is imported, in every
// run of the program, and waits up to five seconds for an answer, eating typed
// keys. Import this package, for its effect, wherever Bubble Tea is imported.
//
// Go initialises packages that are ready in the order of their import paths,
// and afterbeat/... sorts before github.com/charmbracelet/bubbletea.
package background

import "github.com/charmbracelet/lipgloss"

func init() { lipgloss.SetHasDarkBackground(true) }
