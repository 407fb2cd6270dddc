package tui

import "afterbeat/tree/study"

// Stage is one of the six steps of the work, by the digit of its key.
type Stage int

// The stages.
const (
	Intake Stage = iota + 1
	Beats
	Fit
	Tree
	Support
	Note
)

// Stages lists them in their order.
func Stages() []Stage { return []Stage{Intake, Beats, Fit, Tree, Support, Note} }

// String is the name on the screen.
func (s Stage) String() string {
	return [...]string{"", "Intake", "Beats", "Fit", "Tree", "Support", "Note"}[s]
}

// Missing says why a stage cannot be shown yet for a study as far as it has
// come; empty where it can.
func (s Stage) Missing(st study.Study) string {
	switch {
	case s == Intake && st.Inputs.Recording == nil:
		return "the recording has not been read yet"
	case s == Beats && st.Beats == nil:
		return "the beats have not been looked for yet"
	case s == Fit && st.Fit == nil:
		return "the fit has not been computed yet"
	case s == Tree && st.Tree == nil:
		return "the tree has not been computed yet"
	case (s == Support || s == Note) && st.Comparison == nil:
		return "native and supported state have not been computed yet"
	}
	return ""
}
