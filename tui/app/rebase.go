package app

import (
	"reflect"
	"slices"

	"afterbeat/data/casefile"
)

// same tells whether two cases choose the same; an empty list or table is none.
func same(a, b casefile.Case) bool {
	v, w := reflect.ValueOf(a), reflect.ValueOf(b)
	return !slices.ContainsFunc(choices(v.Type()), func(i int) bool { return !alike(v.Field(i), w.Field(i)) })
}

// choices are the indices of the fields that are choices: those exported.
func choices(of reflect.Type) []int {
	var out []int
	for i := range of.NumField() {
		if of.Field(i).IsExported() {
			out = append(out, i)
		}
	}
	return out
}

func alike(a, b reflect.Value) bool {
	switch a.Kind() {
	case reflect.Map, reflect.Slice:
		if a.Len() == 0 && b.Len() == 0 {
			return true
		}
	}
	return reflect.DeepEqual(a.Interface(), b.Interface())
}

// rebase is the change from base to next made to now, where a screen made it
// before it was shown now: what it chose anew is chosen, entry by entry of a
// table and of a list, and everything else stays as it is now. So of two quick
// changes neither takes the other back.
func rebase(base, next, now casefile.Case) casefile.Case {
	if same(base, now) {
		return next
	}
	b, n, out := reflect.ValueOf(base), reflect.ValueOf(next), reflect.ValueOf(&now).Elem()
	for _, i := range choices(out.Type()) {
		was, is, field := b.Field(i), n.Field(i), out.Field(i)
		switch {
		case alike(was, is):
		case is.Kind() == reflect.Map:
			field.Set(rebasedTable(was, is, field))
		case is.Kind() == reflect.Slice:
			field.Set(rebasedList(was, is, field))
		default:
			field.Set(is)
		}
	}
	return now
}

func rebasedTable(base, next, now reflect.Value) reflect.Value {
	out := reflect.MakeMap(now.Type())
	for _, k := range now.MapKeys() {
		out.SetMapIndex(k, now.MapIndex(k))
	}
	for _, k := range base.MapKeys() {
		if !next.MapIndex(k).IsValid() {
			out.SetMapIndex(k, reflect.Value{}) // taken out
		}
	}
	for _, k := range next.MapKeys() {
		if was := base.MapIndex(k); !was.IsValid() || !was.Equal(next.MapIndex(k)) {
			out.SetMapIndex(k, next.MapIndex(k))
		}
	}
	return out
}

func rebasedList(base, next, now reflect.Value) reflect.Value {
	out := reflect.MakeSlice(now.Type(), 0, now.Len()+next.Len())
	for i := range now.Len() {
		if v := now.Index(i); holds(next, v) || !holds(base, v) {
			out = reflect.Append(out, v)
		}
	}
	for i := range next.Len() {
		if v := next.Index(i); !holds(base, v) && !holds(out, v) {
			out = reflect.Append(out, v)
		}
	}
	return out
}

func holds(list, v reflect.Value) bool {
	for i := range list.Len() {
		if list.Index(i).Equal(v) {
			return true
		}
	}
	return false
}
