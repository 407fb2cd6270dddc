package casefile

import (
	"fmt"
	"reflect"
	"slices"
	"strconv"
	"strings"
)

// Set takes a flag of the command line, without dashes, with its text: for a
// table NAME=VALUE, where the last = counts, since a name may hold one; for a
// switch "true". A list gets one more.
func (c *Case) Set(flag, text string) error {
	for _, f := range fields() {
		if f.Flag == flag {
			return f.parse(c, text)
		}
	}
	return unknown("flag", flag, flags())
}

func flags() []string {
	var list []string
	for _, k := range Keys() {
		list = append(list, k.Flag)
	}
	return list
}

// parse sets the field from the text of a flag.
func (f field) parse(c *Case, text string) error {
	if f.many() {
		f.in(c).Set(cloned(f.in(c)))
	}
	if !f.table() {
		v, err := f.fromText(text)
		if err != nil {
			return err
		}
		return f.set(c, v)
	}
	equals := strings.LastIndexByte(text, '=')
	if equals < 0 && f.plain != "" {
		return f.enter(c, f.plain, text)
	}
	if equals < 0 {
		return fmt.Errorf("want %s", f.Value)
	}
	if len(f.entries) > 0 {
		return f.enterText(c, text[:equals], text[equals+1:])
	}
	v, err := f.fromText(text[equals+1:])
	if err != nil {
		return err
	}
	return f.enter(c, text[:equals], v)
}

// enterText sets an entry of a table with fixed ones from the text of a flag.
func (f field) enterText(c *Case, name, text string) error {
	e, err := f.entry(name)
	if err != nil {
		return err
	}
	if e.text {
		return f.enter(c, name, text)
	}
	v, err := strconv.ParseFloat(text, 64)
	if err != nil {
		return fmt.Errorf("%s: want a number, not %q", name, clean(text))
	}
	return f.enter(c, name, v)
}

// fromText makes text what TOML would hold in its place.
func (f field) fromText(text string) (any, error) {
	var v any = text
	var err error
	switch f.value.Kind() {
	case reflect.Float64:
		v, err = strconv.ParseFloat(text, 64)
	case reflect.Int:
		v, err = strconv.ParseInt(text, 10, 64)
	case reflect.Bool:
		v, err = strconv.ParseBool(text)
	}
	if err != nil {
		return nil, fmt.Errorf("want %s, not %q", wanted[f.value.Kind()], clean(text))
	}
	return v, nil
}

var wanted = map[reflect.Kind]string{
	reflect.Float64: "a number", reflect.Int: "a whole number", reflect.Bool: "true or false",
}

// Arguments gives the choices as flags, each followed by its value, without the
// recording: in the order of [Keys], entries of tables by name. [Case.Set] reads
// them back.
func (c Case) Arguments() []string {
	var args []string
	for _, f := range fields()[1:] {
		for _, text := range f.texts(&c) {
			args = append(args, "--"+f.Flag)
			if f.shape != reflect.Bool {
				args = append(args, text)
			}
		}
	}
	return args
}

// Command is the command line that does name ("study") to the recording in its
// own folder, where it is called base, or - for standard input, with the
// choices of the case.
func (c Case) Command(name, base string) []string {
	if strings.HasPrefix(base, "-") && base != "-" {
		base = "./" + base
	}
	return append([]string{"afterbeat", name, base}, c.Arguments()...)
}

// texts gives the texts that set the field as it is in c; none where it was
// not chosen.
func (f field) texts(c *Case) []string {
	v := f.in(c)
	if !chosen(v) {
		return nil
	}
	var list []string
	switch f.shape {
	case reflect.Slice:
		for i := range v.Len() {
			list = append(list, inWords(v.Index(i)))
		}
	case reflect.Map:
		for _, name := range sorted(v) {
			text := inWords(v.MapIndex(reflect.ValueOf(name)))
			if f.plain != "" && name == f.plain {
				list = append([]string{text}, list...)
				continue
			}
			list = append(list, name+"="+text)
		}
	default:
		list = append(list, inWords(reflect.Indirect(v)))
	}
	return list
}

// sorted lists the names of a table's entries.
func sorted(table reflect.Value) []string {
	var names []string
	for entry := table.MapRange(); entry.Next(); {
		names = append(names, entry.Key().String())
	}
	slices.Sort(names)
	return names
}

// inWords writes one value as a flag has it.
func inWords(v reflect.Value) string {
	switch v.Kind() {
	case reflect.Float64:
		return decimal(v.Float())
	case reflect.Int:
		return strconv.FormatInt(v.Int(), 10)
	case reflect.Bool:
		return strconv.FormatBool(v.Bool())
	}
	return v.String()
}
