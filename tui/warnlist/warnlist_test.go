package warnlist

import (
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"

	"afterbeat/data"
	"afterbeat/tui"
	"afterbeat/tui/screentest"
)

func warnings() []data.Warning {
	return []data.Warning{
		{Code: data.CodeSiteUnknown, Channel: data.Clean("q"), Text: "where the flow \x1b[31mq\u202e was measured is not known", Cure: "--site q=SITE"},
		{Code: data.CodeHole, Text: "the clock jumps", Cure: "choose a stretch"},
	}
}

func TestCount(t *testing.T) {
	m := New("Warnings", nil)
	for n, want := range []string{"no warnings", "1 warning: v to read", "2 warnings: v to read"} {
		if got := m.Hold(warnings()[:n]).Count(); got != want {
			t.Errorf("%d warnings: %q", n, got)
		}
	}
}

func TestEveryWarningHasItsCure(t *testing.T) {
	m := New("Warnings", map[data.Code]string{data.CodeSiteUnknown: "o sets the site"})
	m = m.Hold(warnings()).Resize(tui.Area{Width: 40, Height: 20}, tui.Theme{ASCII: true}).Update(screentest.Key("v"))
	want := []string{
		"Warnings: 2   lines 1-8 of 8",
		`1. site-unknown: where the flow`,
		`   \x1b[31mq\u{202e} was measured is not`,
		"   known",
		"   here: o sets the site",
		"   cure: --site q=SITE",
		"2. hole: the clock jumps",
		"   cure: choose a stretch",
	}
	got := strings.Split(m.View(), "\n")
	if d := cmp.Diff(want[1:], got[1:]); d != "" {
		t.Error(d)
	}
}

func TestScrollsAndCloses(t *testing.T) {
	m := New("Warnings", nil).Hold(warnings()).Resize(tui.Area{Width: 40, Height: 3}, tui.Theme{})
	m = m.Update(screentest.Key("j"))
	if m.Open() {
		t.Fatal("j opened the list")
	}
	m = m.Update(screentest.Key("v"))
	first := m.View()
	if !m.Open() || !strings.Contains(first, "1. site-unknown") {
		t.Fatalf("v does not open the list:\n%s", first)
	}
	if last := m.Update(screentest.Key("G")).View(); !strings.Contains(last, "cure: choose a stretch") {
		t.Errorf("G does not show the end:\n%s", last)
	}
	for _, k := range []string{"v", "enter", "esc"} {
		if m.Update(screentest.Key(k)).Open() {
			t.Errorf("%s does not close the list", k)
		}
	}
}
