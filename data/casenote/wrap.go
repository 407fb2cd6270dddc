package casenote

import (
	"strings"

	"afterbeat/data"
)

// columns is the widest that a line of a note may be, in terminal cells.
const columns = 80

// width is the number of cells that s takes: words that are clean, between any
// number of blanks.
func width(s string) int {
	w := strings.Count(s, " ")
	for word := range strings.SplitSeq(s, " ") {
		w += data.Clean(word).Width()
	}
	return w
}

// widest is the width of the widest of some texts.
func widest(texts []string) int {
	w := 0
	for _, s := range texts {
		w = max(w, width(s))
	}
	return w
}

// pad fills s up to n cells with blanks.
func pad(s string, n int) string { return s + blanks(n-width(s)) }

// flush pushes s to the right end of n cells.
func flush(s string, n int) string { return blanks(n-width(s)) + s }

func blanks(n int) string { return strings.Repeat(" ", max(n, 0)) }

// wrap breaks clean text into lines of at most n cells, between words; a word
// that is longer than a line is broken where the line ends.
func wrap(text string, n int) []string {
	var lines []string
	line, used := "", 0
	for word := range strings.SplitSeq(text, " ") {
		w := width(word)
		switch {
		case line != "" && used+1+w <= n:
			line += " " + word
			used += 1 + w
			continue
		case line != "":
			lines = append(lines, line)
		}
		for w > n {
			piece := head(word, n)
			lines = append(lines, piece)
			word = word[len(piece):]
			w = width(word)
		}
		line, used = word, w
	}
	if line != "" || len(lines) == 0 {
		lines = append(lines, line)
	}
	return lines
}

// head is the longest beginning of word that takes at most n cells, but one
// rune at least.
func head(word string, n int) string {
	end := 0
	for i, r := range word {
		next := i + len(string(r))
		if end > 0 && width(word[:next]) > n {
			break
		}
		end = next
	}
	return word[:end]
}

// beside sets the lines of text next to those of a label, beginning in column at.
func beside(label, text []string, at int) []string {
	lines := make([]string, max(len(label), len(text)))
	for i := range lines {
		if i < len(label) {
			lines[i] = label[i]
		}
		if i < len(text) {
			lines[i] = pad(lines[i], at) + text[i]
		}
	}
	return lines
}

// hang wraps text to n cells and indents every line but the first by two.
func hang(text string, n int) []string {
	lines := wrap(text, n)
	if len(lines) == 1 {
		return lines
	}
	rest := wrap(strings.TrimPrefix(strings.TrimPrefix(text, lines[0]), " "), n-2)
	for i := range rest {
		rest[i] = "  " + rest[i]
	}
	return append(lines[:1], rest...)
}
