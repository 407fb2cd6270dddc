package casefile

import (
	"reflect"
	"strings"
	"sync"
)

// Key is a key of the case file, and a flag of the command line.
type Key struct {
	Name     string // in the file: diameter_cm
	Flag     string // on the command line, without dashes: diameter-cm
	Value    string // what stands for the value in help texts; empty for a switch
	Help     string
	Repeated bool // the flag may come several times: lists and tables
}

// Keys lists every key in the order of the work. The first is the recording,
// which is an argument of the command line rather than a flag.
func Keys() []Key {
	var keys []Key
	for _, f := range fields() {
		keys = append(keys, f.Key)
	}
	return keys
}

// field is a key with the field of [Case] that it sets: one value, an optional
// number behind a pointer, a list or a table.
type field struct {
	Key
	index  int
	shape  reflect.Kind // Pointer, Slice, Map, or that of the one value
	value  reflect.Type // of one value: string, float64, int or bool
	amount bool         // text that may be given as a number too
	// entries are the names that a table has; empty: any, as of channels.
	entries []tableEntry
	plain   string // the entry that a bare value, in place of the table, sets
}

// tableEntry is a name that a table has: a number unless it is text.
type tableEntry struct {
	name string
	text bool
}

// fields are the keys in the order of [Case].
var fields = sync.OnceValue(tagged)

// tagged reads the tags of [Case].
func tagged() []field {
	var list []field
	t := reflect.TypeFor[Case]()
	for i := range t.NumField() {
		tag, of := t.Field(i).Tag, t.Field(i).Type
		name, ok := tag.Lookup("key")
		if !ok {
			continue
		}
		f := field{index: i, shape: of.Kind(), value: of, amount: tag.Get("amount") == "true"}
		f.entries, f.plain = entriesOf(tag.Get("entries")), tag.Get("plain")
		if f.many() || f.shape == reflect.Pointer {
			f.value = of.Elem()
		}
		f.Key = Key{
			Name: name, Flag: strings.ReplaceAll(name, "_", "-"),
			Value: tag.Get("value"), Help: tag.Get("help"), Repeated: f.many(),
		}
		list = append(list, f)
	}
	return list
}

// entriesOf reads the tag of a table with fixed entries: "set=text,a,b".
func entriesOf(tag string) []tableEntry {
	var all []tableEntry
	for _, one := range strings.FieldsFunc(tag, func(r rune) bool { return r == ',' }) {
		name, _, text := strings.Cut(one, "=")
		all = append(all, tableEntry{name, text})
	}
	return all
}

// entry is the entry of a table with fixed ones.
func (f field) entry(name string) (tableEntry, error) {
	var known []string
	for _, e := range f.entries {
		if e.name == name {
			return e, nil
		}
		known = append(known, e.name)
	}
	return tableEntry{}, unknown("entry of ["+f.Name+"]", name, known)
}

func (f field) many() bool { return f.list() || f.table() }

func (f field) list() bool { return f.shape == reflect.Slice }

func (f field) table() bool { return f.shape == reflect.Map }

// in is the field itself within c.
func (f field) in(c *Case) reflect.Value { return reflect.ValueOf(c).Elem().Field(f.index) }

// chosen tells whether a value of a field was chosen.
func chosen(v reflect.Value) bool {
	switch v.Kind() {
	case reflect.Slice, reflect.Map:
		return v.Len() > 0
	}
	return !v.IsZero()
}

// named is the field whose key in the file is name.
func named(name string) (field, bool) {
	for _, f := range fields() {
		if f.Name == name {
			return f, true
		}
	}
	return field{}, false
}
