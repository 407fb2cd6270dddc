package casefile

import (
	"fmt"
	"reflect"
	"strings"
	"unicode"
	"unicode/utf8"

	"afterbeat/data/casenote"
)

// Write writes a case as TOML that [Read] takes for the same case: below the
// caution what was chosen and nothing else, keys in the order of [Keys], tables
// last, their entries by name. Bytes that are no UTF-8, which TOML cannot hold,
// become visible as \xff, as they do wherever they are shown.
func Write(c Case) []byte {
	var b strings.Builder
	b.WriteString("# " + casenote.Caution + "\n\n")
	for _, f := range fields() {
		switch v := f.in(&c); {
		case !chosen(v):
		case f.bare(v):
			fmt.Fprintf(&b, "%s = %s\n", f.Name, literal(v.MapIndex(reflect.ValueOf(f.plain))))
		case !f.table():
			fmt.Fprintf(&b, "%s = %s\n", f.Name, literal(reflect.Indirect(v)))
		}
	}
	for _, f := range fields() {
		table := f.in(&c)
		if !f.table() || !chosen(table) || f.bare(table) {
			continue
		}
		fmt.Fprintf(&b, "\n[%s]\n", f.Name)
		for _, name := range sorted(table) {
			value := table.MapIndex(reflect.ValueOf(name))
			written := literal(value)
			if e, err := f.entry(name); err == nil && !e.text {
				written = value.String()
			}
			fmt.Fprintf(&b, "%s = %s\n", keyName(name), written)
		}
	}
	return []byte(b.String())
}

// bare tells a table that is written as its plain value.
func (f field) bare(table reflect.Value) bool {
	return f.plain != "" && table.Len() == 1 && table.MapIndex(reflect.ValueOf(f.plain)).IsValid()
}

// literal writes a value in TOML.
func literal(v reflect.Value) string {
	switch v.Kind() {
	case reflect.String:
		return quoted(v.String())
	case reflect.Slice:
		list := make([]string, v.Len())
		for i := range list {
			list[i] = literal(v.Index(i))
		}
		return "[" + strings.Join(list, ", ") + "]"
	}
	return inWords(v)
}

// keyName writes a name as a key, in quotes unless it is of plain letters.
func keyName(s string) string {
	plain := func(r rune) bool {
		return r < utf8.RuneSelf && (unicode.IsLetter(r) || unicode.IsDigit(r) || r == '_' || r == '-')
	}
	if s != "" && strings.IndexFunc(s, func(r rune) bool { return !plain(r) }) < 0 {
		return s
	}
	return quoted(s)
}

// quoted writes text as a basic string, with escapes for what must not be shown.
func quoted(s string) string {
	var b strings.Builder
	b.WriteByte('"')
	for len(s) > 0 {
		r, size := utf8.DecodeRuneInString(s)
		switch {
		case r == utf8.RuneError && size == 1:
			fmt.Fprintf(&b, `\\x%02x`, s[0])
		case r == '"' || r == '\\':
			b.WriteRune('\\')
			b.WriteRune(r)
		case unicode.IsPrint(r):
			b.WriteRune(r)
		case r > 0xffff:
			fmt.Fprintf(&b, `\U%08x`, r)
		default:
			fmt.Fprintf(&b, `\u%04x`, r)
		}
		s = s[size:]
	}
	b.WriteByte('"')
	return b.String()
}
