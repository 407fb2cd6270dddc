package page

import (
	"strconv"
	"testing"

	tea "github.com/charmbracelet/bubbletea"
	"pgregory.net/rapid"
)

func numbered(n int) (lines []string) {
	for i := range n {
		lines = append(lines, strconv.Itoa(i))
	}
	return lines
}

func TestScrolling(t *testing.T) {
	k := NewKeys()
	s := Scroll{}.Resize(10).Hold(numbered(95))
	for _, step := range []struct {
		key  tea.KeyType
		top  int
		says string
	}{
		{tea.KeyDown, 1, "lines 2-11 of 95"},
		{tea.KeyPgDown, 10, "lines 11-20 of 95"},
		{tea.KeyUp, 9, "lines 10-19 of 95"},
		{tea.KeyEnd, 85, "lines 86-95 of 95"},
		{tea.KeyDown, 85, "lines 86-95 of 95"},
		{tea.KeyPgUp, 76, "lines 77-86 of 95"},
		{tea.KeyHome, 0, "lines 1-10 of 95"},
		{tea.KeyUp, 0, "lines 1-10 of 95"},
		{tea.KeyTab, 0, "lines 1-10 of 95"},
	} {
		s = s.Update(tea.KeyMsg{Type: step.key}, k)
		if s.Top() != step.top || s.Position() != step.says || s.Window()[0] != strconv.Itoa(step.top) {
			t.Errorf("after %v at %d, %q", step.key, s.Top(), s.Position())
		}
	}
	if got := s.Reveal(50); got.Top() != 48 || got.Reveal(50).Top() != 48 || got.Reveal(1).Top() != 0 {
		t.Errorf("revealed at %d", got.Top())
	}
	if got := s.Reveal(94).Resize(200).Position(); got != "lines 1-95 of 95" {
		t.Error(got)
	}
	if got := (Scroll{}).Position(); got != "0 lines" {
		t.Error(got)
	}
}

func TestWindowStaysInTheText(t *testing.T) {
	keys := []tea.KeyType{tea.KeyUp, tea.KeyDown, tea.KeyPgUp, tea.KeyPgDown, tea.KeyHome, tea.KeyEnd}
	rapid.Check(t, func(t *rapid.T) {
		var s Scroll
		for range rapid.IntRange(1, 20).Draw(t, "steps") {
			rows, n := rapid.IntRange(-1, 30).Draw(t, "rows"), rapid.IntRange(0, 60).Draw(t, "lines")
			s = s.Resize(rows).Hold(numbered(n))
			s = s.Update(tea.KeyMsg{Type: rapid.SampledFrom(keys).Draw(t, "key")}, NewKeys())
			if got := len(s.Window()); got != max(min(rows, n), 0) {
				t.Fatalf("%d lines of %d in %d rows", got, n, rows)
			}
		}
	})
}
