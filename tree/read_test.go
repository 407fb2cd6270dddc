package tree

import (
	"bytes"
	"errors"
	"math"
	"os"
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"
	"pgregory.net/rapid"

	"afterbeat/data"
)

const head = "id,parent,name,length_cm,radius_cm,wave_speed_m_s,r1,c,r2\n"

func read(t *testing.T, table string) Network {
	t.Helper()
	n, err := Read("tree.csv", strings.NewReader(table))
	if err != nil {
		t.Fatal(err)
	}
	return n
}

func TestReadTakesRowsAndColumnsInAnyOrder(t *testing.T) {
	got := read(t, "# a hand and an arm\n\nbed,r2,id,c,r1,parent,eh_dyn_per_cm,radius_cm,poisson,length_cm,wave_speed_m_s,radius_distal_cm\n"+
		"hand, 12.5 ,b,0.01,,a,4e5,0.2,0.5,10,,0.1\n"+
		`"""x""",inf,c,,0,a,,0.3,,11,6.172134,`+"\n"+
		",,a,,,,,0.5,,4,5.01,\n").Segments
	want := []Segment{
		{ID: "b", Parent: "a", Bed: "hand", Length: 10, Radius: 0.2, RadiusDistal: 0.1, Eh: 4e5, Poisson: 0.5, Terminal: &Terminal{Matched: true, C: 0.01, R2: 12.5}},
		{ID: "c", Parent: "a", Bed: `"x"`, Length: 11, Radius: 0.3, WaveSpeed: 617.2134, Terminal: &Terminal{R2: math.Inf(1)}},
		{ID: "a", Length: 4, Radius: 0.5, WaveSpeed: 501},
	}
	if diff := cmp.Diff(want, got); diff != "" {
		t.Error(diff)
	}
}

// Every refusal names file, line and segment, and says what is wrong.
func TestReadNamesTheRow(t *testing.T) {
	for _, c := range []struct{ name, table, want string }{
		{"empty", "", "tree.csv: is empty"},
		{"no rows", head, "tree.csv:1: has no segment below its header"},
		{"missing column", "id,parent,length_cm,radius_cm,wave_speed_m_s\n1,,1,1,5\n", "tree.csv:1: column r2 is missing"},
		{"no speed column", "id,parent,length_cm,radius_cm,r2\n1,,1,1,5\n", "tree.csv:1: column wave_speed_m_s or eh_dyn_per_cm is missing"},
		{"misspelt column", "id,parent,length_cm,radius_cm,wave_speed_m_s,r2,poison\n1,,1,1,5,1,0\n", `tree.csv:1: unknown column "poison"; did you mean "poisson"?`},
		{"column twice", "id,parent,length_cm,radius_cm,wave_speed_m_s,r2,id\n1,,1,1,5,1,0\n", "tree.csv:1: column id stands twice"},
		{"short row", head + "1,,a,1,1,5,0\n", `tree.csv:2: segment "1": has 7 fields, the header 9`},
		{"no id", head + ",,a,1,1,5,,,1\n", `tree.csv:2: segment "": has no id`},
		{"unknown parent", head + "1,,a,1,1,5,,,\n\n2,7,b,1,1,5,,,1\n", `tree.csv:4: segment "2": its parent "7" is not in the table`},
		{"parent 0", head + "1,0,a,1,1,5,,,1\n", `tree.csv:2: segment "1": its parent "0" is not in the table`},
		{"two roots", head + "1,,a,1,1,5,,,1\n2,,b,1,1,5,,,1\n", `tree.csv:3: segment "2": is a second root beside "1"`},
		{"own parent", head + "1,,a,1,1,5,,,1\n2,2,b,1,1,5,,,\n", `tree.csv:3: segment "2": is its own ancestor: a cycle through "2"`},
		{"cycle beside the root", head + "1,,a,1,1,5,,,1\n2,3,b,1,1,5,,,\n3,2,c,1,1,5,,,\n4,3,d,1,1,5,,,1\n", `tree.csv:3: segment "2": is its own ancestor: a cycle through "3"`},
		{"cycle without a root", head + "2,3,b,1,1,5,,,\n3,2,c,1,1,5,,,\n", `tree.csv:2: segment "2": is its own ancestor: a cycle through "3"`},
		{"id twice", head + "1,,a,1,1,5,,,\n2,1,b,1,1,5,,,1\n2,1,b,1,1,5,,,1\n", `tree.csv:4: segment "2": its id is also that of segment 2 of the table`},
		{"missing length", head + "1,,a,,1,5,,,1\n", `tree.csv:2: segment "1": length_cm is missing`},
		{"missing radius", head + "1,,a,1,,5,,,1\n", `tree.csv:2: segment "1": radius_cm is missing`},
		{"negative radius", head + "1,,a,1,-1,5,,,1\n", `tree.csv:2: segment "1": radius_cm is -1, not a positive number`},
		{"zero length", head + "1,,a,0,1,5,,,1\n", `tree.csv:2: segment "1": length_cm is 0, not a positive number`},
		{"negative c", head + "1,,a,1,1,5,,-0.1,1\n", `tree.csv:2: segment "1": c is negative: -0.1`},
		{"infinite c", head + "1,,a,1,1,5,,inf,1\n", `tree.csv:2: segment "1": c is +Inf, not a number of 0 or more, 1e+12 at most`},
		{"negative r2", head + "1,,a,1,1,5,,,-inf\n", `tree.csv:2: segment "1": r2 is not a number: "-inf"`},
		{"no number", head + "1,,a,1,x\x1b,5,,,1\n", `tree.csv:2: segment "1": radius_cm is not a number: "x\\x1b"`},
		{"not a number", head + "1,,a,1,NaN,5,,,1\n", `tree.csv:2: segment "1": radius_cm is not a number: "NaN"`},
		{"infinite length", head + "1,,a,inf,1,5,,,1\n", `tree.csv:2: segment "1": length_cm is +Inf, not a number between 1e-12 and 1e+12`},
		{"no speed", head + "1,,a,1,1,,,,1\n", `tree.csv:2: segment "1": has neither a wave speed nor eh_dyn_per_cm`},
		{"two speeds", strings.Replace(head, "\n", ",eh_dyn_per_cm\n", 1) + "1,,a,1,1,5,,,1,4e5\n", `tree.csv:2: segment "1": has both a wave speed and eh_dyn_per_cm: one of them`},
		{"poisson", strings.Replace(head, "\n", ",poisson\n", 1) + "1,,a,1,1,5,,,1,0.6\n", `tree.csv:2: segment "1": poisson is 0.6, not a number between 0 and 0.5`},
		{"terminal without r2", head + "1,,a,1,1,5,,,\n", `tree.csv:2: segment "1": has no daughters and no terminal: r2 is missing`},
		{"r1 without r2", head + "1,,a,1,1,5,0.1,,\n", `tree.csv:2: segment "1": has r1 or c, but no r2`},
		{"terminal with daughters", head + "1,,a,1,1,5,,,1\n2,1,b,1,1,5,,,1\n", `tree.csv:2: segment "1": has daughters and a terminal`},
	} {
		t.Run(c.name, func(t *testing.T) {
			_, err := Read("tree.csv", strings.NewReader(c.table))
			if err == nil || err.Error() != c.want {
				t.Errorf("got  %v\nwant %s", err, c.want)
			}
			var file *data.FileError
			if !errors.As(err, &file) {
				t.Errorf("%T is no FileError", err)
			}
		})
	}
}

// A chain as long as this must not end on the stack of a recursion.
func TestOrderOfALongChain(t *testing.T) {
	n := Network{Blood: StandardBlood(), Segments: chain(100_000)}
	order, parent, err := n.Order()
	if err != nil {
		t.Fatal(err)
	}
	for at, i := range order {
		if at > 0 && parent[i] != order[at-1] {
			t.Fatalf("segment %d stands before its parent", i)
		}
	}
}

// drawn is any network that can be written.
func drawn(t *rapid.T) Network {
	n := Network{Blood: StandardBlood()}
	positive := rapid.Float64Range(1e-6, 1e6)
	count := rapid.IntRange(1, 12).Draw(t, "count")
	leaf := make([]bool, count)
	for i := range count {
		s := Segment{
			ID: string(rune('a' + i)), Name: rapid.StringMatching(`[ -~éα"]{0,8}`).Draw(t, "name"), Bed: rapid.SampledFrom([]string{"", "brain", "a;b", "#"}).Draw(t, "bed"),
			Length: positive.Draw(t, "length"), Radius: positive.Draw(t, "radius"),
		}
		s.Name = strings.TrimSpace(s.Name)
		if rapid.Bool().Draw(t, "taper") {
			s.RadiusDistal = positive.Draw(t, "distal")
		}
		if rapid.Bool().Draw(t, "speed given") {
			s.WaveSpeed = positive.Draw(t, "speed")
		} else {
			s.Eh, s.Poisson = positive.Draw(t, "eh"), rapid.Float64Range(0, 0.5).Draw(t, "poisson")
		}
		if leaf[i] = true; i > 0 {
			p := rapid.IntRange(0, i-1).Draw(t, "parent")
			s.Parent, leaf[p] = n.Segments[p].ID, false
		}
		n.Segments = append(n.Segments, s)
	}
	for i := range n.Segments {
		if leaf[i] {
			r := rapid.OneOf(positive, rapid.SampledFrom([]float64{0, math.Inf(1)}))
			n.Segments[i].Terminal = &Terminal{R1: r.Draw(t, "r1"), R2: r.Draw(t, "r2"), C: rapid.Float64Range(0, 10).Draw(t, "c")}
			if rapid.Bool().Draw(t, "matched") {
				n.Segments[i].Terminal.R1, n.Segments[i].Terminal.Matched = 0, true
			}
		}
	}
	return n
}

func TestWhatIsWrittenReadsBackTheSame(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		n := drawn(t)
		var b bytes.Buffer
		if err := n.Write(&b); err != nil {
			t.Fatal(err)
		}
		got, err := Read("tree.csv", &b)
		if err != nil {
			t.Fatalf("%v\n%s", err, b.String())
		}
		if diff := cmp.Diff(n, got); diff != "" {
			t.Fatal(diff)
		}
	})
}

func TestWriteRefusesWhatIsNoTree(t *testing.T) {
	n := Network{Blood: StandardBlood(), Segments: chain(3)}
	n.Segments[1].Parent = "nobody"
	if err := n.Write(&bytes.Buffer{}); err == nil {
		t.Error("a broken tree was written")
	}
}

func TestCloneSharesNothing(t *testing.T) {
	n := Network{Segments: chain(2)}
	c := n.Clone()
	c.Segments[1].Terminal.R2, c.Segments[0].Radius = 7, 9
	if n.Segments[1].Terminal.R2 == 7 || n.Segments[0].Radius == 9 {
		t.Error("the copy is the same")
	}
}

func FuzzRead(f *testing.F) {
	f.Add([]byte(head + "1,,a,1,1,5,,,1\n"))
	f.Add([]byte(head + "1,,a,1,1,5,,,\n2,1,b,1e1,0.5,5,inf,0.1,0\n"))
	f.Add([]byte("\xef\xbb\xbfid;parent;length_cm;radius_cm;wave_speed_m_s;r2\n1;;1,5;1;5;1\n"))
	if text, err := os.ReadFile("testdata/tree55.csv"); err == nil {
		f.Add(text)
	}
	f.Fuzz(func(t *testing.T, text []byte) {
		n, err := Read("tree.csv", bytes.NewReader(text))
		if err != nil {
			var file *data.FileError
			if !errors.As(err, &file) || !strings.HasPrefix(err.Error(), "tree.csv:") {
				t.Fatalf("%T %v names no place", err, err)
			}
			return
		}
		var b bytes.Buffer
		if err := n.Write(&b); err != nil {
			t.Fatal(err)
		}
		again, err := Read("tree.csv", bytes.NewReader(b.Bytes()))
		if err != nil {
			t.Fatalf("%v\n%q", err, b.String())
		}
		if diff := cmp.Diff(n, again); diff != "" {
			t.Fatal(diff)
		}
	})
}
