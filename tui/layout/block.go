package layout

import (
	"strings"

	"github.com/charmbracelet/x/ansi"

	"afterbeat/tui"
)

// Fit joins lines to a view of at most the area: surplus lines are left out
// from below, surplus cells from the right. Spaces at the end of a line go.
func Fit(lines []string, a tui.Area) string {
	lines = lines[:min(len(lines), max(a.Height, 0))]
	var b strings.Builder
	for i, line := range lines {
		if i > 0 {
			b.WriteByte('\n')
		}
		b.WriteString(strings.TrimRight(Clip(line, a.Width), " "))
	}
	return b.String()
}

// Clip cuts a line, which may have colours, to width cells.
func Clip(line string, width int) string {
	if len(line) > width && ansi.StringWidth(line) > width {
		return ansi.Truncate(line, max(width, 0), "")
	}
	return line
}

// Lines are the lines of a block of exactly height lines.
func Lines(block string, height int) []string {
	lines := strings.Split(block, "\n")
	for len(lines) < height {
		lines = append(lines, "")
	}
	return lines[:max(height, 0)]
}

// Beside sets right beside left, which gets width cells.
func Beside(left, right []string, width int) []string {
	out := make([]string, max(len(left), len(right)))
	for i := range out {
		line := ""
		if i < len(left) {
			line = left[i]
		}
		if i < len(right) && right[i] != "" {
			line += blanks(width-ansi.StringWidth(line)) + right[i]
		}
		out[i] = line
	}
	return out
}
