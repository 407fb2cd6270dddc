package tui

import (
	"strings"

	"afterbeat/tui/chart"
)

// Theme is how everything looks, decided once at the start and passed down.
// Without colours nothing is bold or reversed either, so states are words and a
// cursor is a ">".
type Theme struct {
	ASCII   bool
	Colours int // 0, 16 or 256
}

// ThemeOf decides the theme from the environment, by the rules of the terminal:
// Unicode only if the first set of LC_ALL, LC_CTYPE and LANG names UTF-8;
// no colour with NO_COLOR set to anything, CLICOLOR=0 or a dumb terminal.
func ThemeOf(env func(string) string, ascii, noColour bool) Theme {
	t := Theme{ASCII: ascii || !utf8Locale(env), Colours: 16}
	if strings.Contains(env("TERM"), "256") || env("COLORTERM") != "" {
		t.Colours = 256
	}
	if noColour || env("NO_COLOR") != "" || env("CLICOLOR") == "0" || env("TERM") == "dumb" || env("TERM") == "" {
		t.Colours = 0
	}
	return t
}

func utf8Locale(env func(string) string) bool {
	for _, name := range []string{"LC_ALL", "LC_CTYPE", "LANG"} {
		if v := strings.ToUpper(env(name)); v != "" {
			return strings.Contains(v, "UTF-8") || strings.Contains(v, "UTF8")
		}
	}
	return false
}

// Chart is the theme of the plots.
func (t Theme) Chart() chart.Theme {
	return chart.Theme{ASCII: t.ASCII, Colours: t.Colours}
}
