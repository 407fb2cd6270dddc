package data

import (
	"bytes"
	"errors"
	"math"
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"
)

func TestReadSpans(t *testing.T) {
	for name, c := range map[string]struct {
		text string
		want []Span
	}{
		"plain":       {"start_s,end_s\n1,2\n0.5,0.5\n", []Span{{1, 2}, {0.5, 0.5}}},
		"further":     {"# by hand\nwhy,end_s,start_s\ncough,2,1\n\n,4,3\n", []Span{{1, 2}, {3, 4}}},
		"no units":    {"start,end\n1,2", []Span{{1, 2}}},
		"other units": {"Start [ms],end_min\n500,2\n", []Span{{0.5, 120}}},
		"none":        {"start_s,end_s\n", nil},
	} {
		got, err := ReadSpans("x.csv", strings.NewReader(c.text))
		if err != nil || !cmp.Equal(got, c.want) {
			t.Errorf("%s: %v, %v; want %v", name, got, err, c.want)
		}
	}
}

func TestReadSpansErrors(t *testing.T) {
	for text, want := range map[string]string{
		"":                             "x.csv: is empty",
		"start_s\n1\n":                 "x.csv: has no column end_s",
		"1,2\n":                        "x.csv:1: has no header",
		"start_s,end_s\n2,1\n":         "x.csv:2: the stretch from 2 s to 1 s ends before it begins",
		"start_s,end_s\n1,2\n#\n1,x\n": `x.csv:4: end_s is not a number: "x"`,
		"start_s,end_s\n1,\n":          "x.csv:2: end_s is missing",
		"start_s,end_s\n1\n":           "x.csv:2: 1 fields where the header has 2",
		"start_s,end_s\n1,Inf\n":       "x.csv:2: end_s is missing",
		"start_mmHg,end_s\n1,2\n":      "x.csv: has no column start_s",
		"start_s;end_s\n1;2\n":         "x.csv:1: the fields are separated by semicolons",
		"s\x00t\x00a\x00,\x00":         "NUL bytes",
	} {
		_, err := ReadSpans("x.csv", strings.NewReader(text))
		var fe *FileError
		if !errors.As(err, &fe) || !strings.Contains(err.Error(), want) {
			t.Errorf("%q: %v, want %s", text, err, want)
		}
	}
}

func FuzzReadSpans(f *testing.F) {
	for _, s := range []string{"start_s,end_s\n1,2\n", "# x\nwhy,end_ms,start_h\n\"a\n\",2,1e-9\n", "start,end\n1,1,\n", "\xff\xfes\x00"} {
		f.Add([]byte(s))
	}
	f.Fuzz(func(t *testing.T, raw []byte) {
		spans, err := ReadSpans("fuzz.csv", bytes.NewReader(raw))
		if err != nil {
			var fe *FileError
			if !errors.As(err, &fe) || fe.File != "fuzz.csv" {
				t.Fatalf("an error without the file: %v", err)
			}
			return
		}
		for _, s := range spans {
			if !(s.From <= s.To) || math.IsInf(s.From, 0) || math.IsInf(s.To, 0) {
				t.Fatalf("stretch %v", s)
			}
		}
	})
}
