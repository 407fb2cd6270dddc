package casefile

import (
	"maps"
	"reflect"
	"strings"
)

// Over lays the choices of c over those of base: what c does not choose, base
// does. Tables are joined entry by entry, lists taken whole. Lines are those of
// base, where base still has a say.
func (c Case) Over(base Case) Case {
	out := base
	out.lines = maps.Clone(base.lines)
	for _, f := range fields() {
		v, target := f.in(&c), f.in(&out)
		switch {
		case !chosen(v):
			continue
		case f.table():
			joined := cloned(target)
			if f.plain != "" && v.MapIndex(reflect.ValueOf(f.plain)).IsValid() { // a whole in place of another
				joined = reflect.MakeMap(target.Type())
				for name := range out.lines {
					if strings.HasPrefix(name, f.Name+".") {
						delete(out.lines, name)
					}
				}
			}
			for _, name := range sorted(v) {
				joined.SetMapIndex(reflect.ValueOf(name), v.MapIndex(reflect.ValueOf(name)))
				delete(out.lines, f.Name+"."+name)
			}
			target.Set(joined)
		default:
			target.Set(v)
		}
		delete(out.lines, f.Name)
	}
	return out
}
