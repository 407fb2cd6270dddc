package casefile

import (
	"errors"
	"fmt"
	"math"
	"reflect"
	"slices"
	"strconv"
	"strings"
)

// set gives the field a value as TOML holds it; a list gets one more.
func (f field) set(c *Case, v any) error {
	x, err := f.convert(v)
	if err != nil {
		return err
	}
	switch target := f.in(c); f.shape {
	case reflect.Pointer:
		p := reflect.New(f.value)
		p.Elem().Set(x)
		target.Set(p)
	case reflect.Slice:
		target.Set(reflect.Append(target, x))
	default:
		target.Set(x)
	}
	return nil
}

// enter sets an entry of a table.
func (f field) enter(c *Case, name string, v any) error {
	if f.Name == "error" && !slices.Contains(Errors(), name) {
		return unknown("systematic error", name, Errors())
	}
	x, err := f.convertEntry(name, v)
	switch {
	case err != nil:
		return err
	case strings.ContainsRune(name, 0):
		return errNUL
	case f.value.Kind() == reflect.String && strings.Contains(x.String(), "="):
		return errors.New("the value holds a =, which ends a name on the command line")
	}
	table := f.in(c)
	if len(f.entries) > 0 && x.String() == "" { // as any text: not chosen
		return nil
	}
	if table.IsNil() {
		table.Set(reflect.MakeMap(table.Type()))
	}
	table.SetMapIndex(reflect.ValueOf(name), x)
	return nil
}

// convertEntry makes v, as TOML holds it, the value of an entry of a table.
func (f field) convertEntry(name string, v any) (reflect.Value, error) {
	if len(f.entries) == 0 {
		return f.convert(v)
	}
	e, err := f.entry(name)
	if err != nil {
		return reflect.Value{}, err
	}
	if e.text {
		x, err := text(v, false)
		return reflect.ValueOf(x), err
	}
	x, err := number(v)
	return reflect.ValueOf(decimal(x)), err
}

// cloned copies a list or a table, so that copies of a [Case] stay apart.
func cloned(v reflect.Value) reflect.Value {
	if v.Kind() == reflect.Slice {
		return reflect.AppendSlice(reflect.Zero(v.Type()), v)
	}
	c := reflect.MakeMap(v.Type())
	for entry := v.MapRange(); entry.Next(); {
		c.SetMapIndex(entry.Key(), entry.Value())
	}
	return c
}

// convert makes v, as TOML holds it, one value of the field.
func (f field) convert(v any) (reflect.Value, error) {
	var x any
	var err error
	switch f.value.Kind() {
	case reflect.String:
		x, err = text(v, f.amount)
	case reflect.Float64:
		x, err = number(v)
	case reflect.Int:
		x, err = integer(v)
	case reflect.Bool:
		x, err = yesNo(v)
	default:
		panic("casefile: the key " + f.Name + " is a " + f.value.String())
	}
	if err == nil {
		err = f.rule(x)
	}
	return reflect.ValueOf(x), err
}

// rule checks what a key asks of its values beyond their type.
func (f field) rule(x any) error {
	switch f.Name {
	case "label":
		return CheckLabel(x.(string))
	case "share":
		if s := x.(float64); s < 0 || s > 1 {
			return fmt.Errorf("want a number from 0 to 1, not %s", decimal(s))
		}
	}
	return nil
}

var errNUL = errors.New("holds a NUL character, which no name has")

// text takes text; an amount may be a number, and loses its blanks: "10 %" is "10%".
func text(v any, amount bool) (string, error) {
	switch x := v.(type) {
	case string:
		if strings.ContainsRune(x, 0) {
			return "", errNUL
		}
		if amount {
			x = strings.Join(strings.Fields(x), "")
		}
		return x, nil
	case int64, float64:
		if amount {
			n, err := number(v)
			return decimal(n), err
		}
	}
	return "", fmt.Errorf("want text in quotes, not %s", describe(v))
}

// number takes a finite number.
func number(v any) (float64, error) {
	switch x := v.(type) {
	case int64:
		return float64(x), nil
	case float64:
		if math.IsNaN(x) || math.IsInf(x, 0) {
			return 0, fmt.Errorf("want a finite number, not %v", x)
		}
		return x, nil
	}
	return 0, fmt.Errorf("want a number, not %s", describe(v))
}

// integer takes a whole number.
func integer(v any) (int, error) {
	x, ok := v.(int64)
	if !ok || int64(int(x)) != x {
		return 0, fmt.Errorf("want a whole number, not %s", describe(v))
	}
	return int(x), nil
}

func yesNo(v any) (bool, error) {
	x, ok := v.(bool)
	if !ok {
		return false, fmt.Errorf("want true or false, not %s", describe(v))
	}
	return x, nil
}

// describe names a TOML value in an error.
func describe(v any) string {
	switch x := v.(type) {
	case string:
		return "text"
	case int64:
		return "the number " + strconv.FormatInt(x, 10)
	case float64:
		return "the number " + decimal(x)
	case bool:
		return strconv.FormatBool(x)
	case []any:
		return "a list"
	case map[string]any:
		return "a table (a name that holds a dot stands in quotes)"
	}
	return "a date or a time"
}

// decimal writes a number so that it reads back the same, without an exponent
// where the size is ordinary.
func decimal(x float64) string {
	size := math.Abs(x)
	switch {
	case x == 0:
		return "0"
	case size >= 1e-6 && size < 1e15:
		return strconv.FormatFloat(x, 'f', -1, 64)
	}
	return strconv.FormatFloat(x, 'e', -1, 64)
}
