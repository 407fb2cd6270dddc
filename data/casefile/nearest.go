package casefile

import "strings"

// Nearest finds the known word that a mistyped one stands for: the one with the
// least optimal string alignment distance (Damerau 1964: a letter put in, left
// out, replaced, or two neighbours swapped), if that is at most a third of the
// letters, but one at least. Case is passed over, and - and _ are the same. Of
// words that are equally near the first counts.
func Nearest(word string, known []string) (string, bool) {
	a := plain(word)
	best, least := "", max(1, len(a)/3)+1
	for _, k := range known {
		b := plain(k)
		if len(a)-len(b) >= least || len(b)-len(a) >= least {
			continue
		}
		if d := distance(a, b); d < least {
			best, least = k, d
		}
	}
	return best, best != ""
}

// plain is word as [Nearest] compares it.
func plain(word string) []rune {
	return []rune(strings.ReplaceAll(strings.ToLower(word), "_", "-"))
}

// distance is the optimal string alignment distance of a and b.
func distance(a, b []rune) int {
	before, last, row := make([]int, len(b)+1), make([]int, len(b)+1), make([]int, len(b)+1)
	for j := range last {
		last[j] = j
	}
	for i := range a {
		row[0] = i + 1
		for j := range b {
			replace := last[j]
			if a[i] != b[j] {
				replace++
			}
			row[j+1] = min(replace, last[j+1]+1, row[j]+1)
			if i > 0 && j > 0 && a[i] == b[j-1] && a[i-1] == b[j] {
				row[j+1] = min(row[j+1], before[j-1]+1)
			}
		}
		before, last, row = last, row, before
	}
	return last[len(b)]
}
