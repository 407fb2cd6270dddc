package casenote

import (
	"fmt"
	"strings"
	"unicode"
	"unicode/utf8"
)

// Quote writes arguments as a command line that a POSIX shell reads back as the
// same bytes. An argument of harmless letters stays bare; others stand in
// single quotes. One that holds a byte which must not be shown (control
// characters, bidirectional marks, bytes that are no UTF-8; with ascii,
// everything from 0x80 on) is written $'...' with octal escapes (POSIX.1-2024,
// Shell Command Language 2.2.4; bash, ksh, zsh and busybox have long read it).
func Quote(args []string, ascii bool) string {
	words := make([]string, len(args))
	for i, a := range args {
		words[i] = quote(a, ascii)
	}
	return strings.Join(words, " ")
}

func quote(arg string, ascii bool) string {
	escaped, hidden := escape(arg, ascii)
	switch {
	case hidden:
		return "$'" + escaped + "'"
	case bare(arg):
		return arg
	}
	return "'" + strings.ReplaceAll(arg, "'", `'\''`) + "'"
}

// bare tells whether no shell gives arg a meaning of its own.
func bare(arg string) bool {
	for _, r := range arg {
		if r >= utf8.RuneSelf || !unicode.IsLetter(r) && !unicode.IsDigit(r) && !strings.ContainsRune("_@%+:,./-=", r) {
			return false
		}
	}
	return arg != "" && arg[0] != '='
}

// escape writes arg as it stands between $' and ', and tells whether it holds
// anything that cannot be shown as it is.
func escape(arg string, ascii bool) (escaped string, hidden bool) {
	var b strings.Builder
	marks := 0
	for len(arg) > 0 {
		r, size := utf8.DecodeRuneInString(arg)
		if unicode.Is(unicode.M, r) {
			marks++
		} else {
			marks = 0
		}
		switch {
		case r == utf8.RuneError && size == 1, !unicode.IsPrint(r), marks > 2, ascii && r >= utf8.RuneSelf:
			hidden = true
			for _, c := range []byte(arg[:size]) {
				fmt.Fprintf(&b, `\%03o`, c)
			}
		case r == '\'', r == '\\', r == '!': // ! calls up history in an interactive shell
			fmt.Fprintf(&b, `\%03o`, r)
		default:
			b.WriteRune(r)
		}
		arg = arg[size:]
	}
	return b.String(), hidden
}

// command breaks a command line into lines of n cells that end in a backslash
// where they go on. It breaks between arguments only, and rather not between a
// flag and its value; an argument that is longer than a line stays whole.
func command(args []string, n int, ascii bool) []string {
	const indent, more = "    ", ` \`
	var lines []string
	line := ""
	for _, words := range pairs(args, n-len(indent)-len(more), ascii) {
		switch {
		case line == "":
			line = words
		case width(line)+1+width(words)+len(more) <= n:
			line += " " + words
		default:
			lines = append(lines, line+more)
			line = indent + words
		}
	}
	return append(lines, line)
}

// pairs quotes arguments, and puts a flag and the value that follows it into
// one string where n cells hold both.
func pairs(args []string, n int, ascii bool) []string {
	var words []string
	flag := false
	for _, a := range args {
		isFlag := strings.HasPrefix(a, "--")
		word := quote(a, ascii)
		if last := len(words) - 1; flag && !isFlag && width(words[last])+1+width(word) <= n {
			words[last] += " " + word
		} else {
			words = append(words, word)
		}
		flag = isFlag
	}
	return words
}
