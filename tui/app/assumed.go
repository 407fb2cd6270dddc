package app

import (
	"strings"

	"afterbeat/data"
	"afterbeat/tree/study"
)

// assumptions are the warnings that speak of something assumed, in few words.
var assumptions = []struct {
	code  data.Code
	words string
}{
	{data.CodeGuessedRole, "channels chosen by name"},
	{data.CodeSiteUnknown, "site of the flow unknown"},
	{data.CodeStandIn, "pressure stands in for the root's"},
	{data.CodePerArea, "no diameter"},
	{data.CodeProfile, "blunt profile"},
	{data.CodeOutflow, "outflow pressure"},
	{data.CodeDelay, "no delay"},
}

// assumed says which channels are used, and what was assumed about them.
func assumed(s study.Study) data.Text {
	if s.Intake == nil {
		return data.Text{}
	}
	var used []string
	for _, i := range []int{s.Intake.Selection.Pressure, s.Intake.Selection.Flow, s.Intake.Selection.Velocity} {
		if ch, ok := s.Intake.Chosen(i); ok {
			used = append(used, ch.Name.String())
		}
	}
	there := map[data.Code]bool{}
	for _, w := range s.Warnings() {
		there[w.Code] = true
	}
	var what []string
	for _, a := range assumptions {
		if there[a.code] {
			what = append(what, a.words)
		}
	}
	words := "used: " + strings.Join(used, ", ")
	if len(what) > 0 {
		words += "; assumed: " + strings.Join(what, ", ")
	}
	return data.Clean(words)
}
