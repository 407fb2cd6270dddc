package data

import (
	"go/ast"
	"go/parser"
	"go/token"
	"strconv"
	"testing"
)

// Every code of the source is in the table once, and the table has no other.
func TestWarningTableIsComplete(t *testing.T) {
	file, err := parser.ParseFile(token.NewFileSet(), "warning.go", nil, 0)
	if err != nil {
		t.Fatal(err)
	}
	declared := map[Code]int{}
	ast.Inspect(file, func(n ast.Node) bool {
		spec, ok := n.(*ast.ValueSpec)
		if !ok {
			return true
		}
		if name, ok := spec.Type.(*ast.Ident); ok && name.Name == "Code" {
			value, err := strconv.Unquote(spec.Values[0].(*ast.BasicLit).Value)
			if err != nil {
				t.Fatal(err)
			}
			declared[Code(value)] = 0
		}
		return true
	})
	if len(declared) == 0 {
		t.Fatal("no code found in warning.go")
	}
	for _, row := range WarningCodes() {
		if _, ok := declared[row.Code]; !ok {
			t.Errorf("%q is in the table but not declared", row.Code)
		}
		if row.Meaning == "" {
			t.Errorf("%q has no meaning", row.Code)
		}
		declared[row.Code]++
	}
	for code, n := range declared {
		if n != 1 {
			t.Errorf("%q is %d times in the table", code, n)
		}
	}
}
