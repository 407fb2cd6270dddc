package cohort

import (
	"bytes"
	"context"
	"errors"
	"fmt"
	"io/fs"
	"math"
	"slices"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"afterbeat/data"
	"afterbeat/data/casefile"
	"afterbeat/data/casenote"
)

// recording is an invented pressure of rate beats a minute.
func recording(rate float64) []byte {
	var b strings.Builder
	b.WriteString("time_s,ao_mmHg\n")
	for i := range 1200 {
		t := float64(i) / 100
		phase := math.Mod(t*rate/60, 1)
		p := 70 + 45*math.Exp(-3*phase)*math.Min(1, phase/0.1)
		fmt.Fprintf(&b, "%.2f,%.3f\n", t, p+0.1*math.Sin(7*t))
	}
	return []byte(b.String())
}

// folder holds recordings.
type folder map[string][]byte

func (f folder) read(name string) ([]byte, error) {
	if content, ok := f[name]; ok {
		return content, nil
	}
	return nil, &data.FileError{File: name, What: "cannot be read", Err: fs.ErrNotExist}
}

func (f folder) source(name string) Source {
	n := 10
	return Source{Name: name, Case: casefile.Case{Recording: name, Replicates: &n}, Read: f.read}
}

// ward has three recordings, one that is none, and one that is not there.
func ward() (folder, []Source) {
	f := folder{
		"here/a.csv": recording(62), "here/b.csv": recording(80), "here/c.csv": recording(97),
		"here/flat.csv": []byte("time_s,ao_mmHg\n" + strings.Repeat("0,80\n", 3)),
	}
	var all []Source
	for _, name := range []string{"here/c.csv", "here/a.csv", "here/gone.csv", "here/flat.csv", "here/b.csv"} {
		all = append(all, f.source(name))
	}
	return f, all
}

func run(t *testing.T, sources []Source, s Settings) Outcome {
	t.Helper()
	done, err := Run(context.Background(), sources, s)
	if err != nil {
		t.Fatal(err)
	}
	return done
}

func column(t *testing.T, rows []Row, name string) []string {
	t.Helper()
	at := slices.Index(names(), name)
	if at < 0 {
		t.Fatalf("no column %s", name)
	}
	var all []string
	for _, r := range rows {
		all = append(all, r.Cells[at])
	}
	return all
}

func TestARowEachInTheOrderOfTheSources(t *testing.T) {
	_, sources := ward()
	rows := run(t, sources, Settings{}).Rows
	if got := column(t, rows, "file"); !slices.Equal(got, []string{"c.csv", "a.csv", "gone.csv", "flat.csv", "b.csv"}) {
		t.Errorf("files %v", got)
	}
	if got := column(t, rows, "status"); !slices.Equal(got, []string{"done", "done", "failed", "failed", "done"}) {
		t.Errorf("status %v: %v", got, column(t, rows, "reason"))
	}
	for i, want := range []string{"97", "62", "", "", "80"} {
		got := column(t, rows, "heart_rate_per_min")[i]
		if (want == "") != (got == "") || want != "" && !strings.HasPrefix(fmt.Sprintf("%.0f", atof(t, got)), want) {
			t.Errorf("row %d: heart rate %q, want %s", i, got, want)
		}
	}
	for i, r := range rows {
		if r.Cells[0] != casenote.Caution || len(r.Cells) != len(Columns()) {
			t.Errorf("row %d: %d cells, the first %q", i, len(r.Cells), r.Cells[0])
		}
		if r.Failed() != (r.Cells[5] != "") {
			t.Errorf("row %d: reason %q", i, r.Cells[5])
		}
	}
	if reasons := strings.Join(column(t, rows, "reason"), "\n"); strings.Contains(reasons, "here/") {
		t.Errorf("a table carries no path: %s", reasons)
	}
}

func atof(t *testing.T, s string) float64 {
	t.Helper()
	var v float64
	if _, err := fmt.Sscan(s, &v); err != nil {
		t.Fatalf("%q: %v", s, err)
	}
	return v
}

func TestTheSameBytesOnOneCoreAndMore(t *testing.T) {
	_, sources := ward()
	one := Write(run(t, sources, Settings{Workers: 1}).Rows)
	if more := Write(run(t, sources, Settings{Workers: 4}).Rows); !bytes.Equal(one, more) {
		t.Errorf("one core:\n%s\nmore:\n%s", one, more)
	}
}

func TestWhatIsKnownIsNotComputedAgain(t *testing.T) {
	_, sources := ward()
	whole := run(t, sources, Settings{})
	half := run(t, sources[:2], Settings{})
	rest := run(t, sources, Settings{Known: half.Rows})
	if half.Computed != 2 || rest.Computed != 3 || rest.Others != 0 {
		t.Errorf("computed %d, then %d; %d others", half.Computed, rest.Computed, rest.Others)
	}
	if !bytes.Equal(Write(whole.Rows), Write(rest.Rows)) {
		t.Errorf("the rows differ")
	}
	// What could not be read is tried again, what was refused is not.
	if again := run(t, sources, Settings{Known: whole.Rows}); again.Computed != 1 {
		t.Errorf("computed %d again, want the file that is not there", again.Computed)
	}
}

func TestOtherSettingsAreOtherRows(t *testing.T) {
	f, sources := ward()
	known := run(t, sources[:1], Settings{}).Rows
	changed := sources[:1:1]
	pv := 5.0
	changed[0].Case.OutflowPressure = &pv
	done := run(t, changed, Settings{Known: known})
	if done.Computed != 1 || done.Others != 1 || len(done.Rows) != 2 || done.Rows[0].Key() == done.Rows[1].Key() {
		t.Errorf("%d computed, %d others", done.Computed, done.Others)
	}
	// What a file named by the case holds is a setting too.
	f["ex.csv"] = []byte("start_s,end_s\n2,3\n")
	changed[0].Case.Exclude = "ex.csv"
	first := run(t, changed, Settings{}).Rows[0].Key()
	f["ex.csv"] = []byte("start_s,end_s\n2,4\n")
	if second := run(t, changed, Settings{}).Rows[0].Key(); first == second || first.SHA256 != second.SHA256 {
		t.Errorf("keys %v and %v", first, second)
	}
}

// Every recording is in exactly one shard, and no shard has two more than another.
func TestShards(t *testing.T) {
	_, sources := ward()
	whole := run(t, sources, Settings{}).Rows
	for n := 1; n <= 6; n++ {
		var together []string
		for k := 1; k <= n; k++ {
			rows := run(t, sources, Settings{Shard: k, Shards: n, Known: whole}).Rows[:]
			mine := rows[:len(share(sources, keysOf(sources), k, n))]
			if len(mine) < len(sources)/n || len(mine) > (len(sources)+n-1)/n {
				t.Errorf("shard %d/%d has %d rows", k, n, len(mine))
			}
			together = append(together, column(t, mine, "file")...)
		}
		slices.Sort(together)
		if want := []string{"a.csv", "b.csv", "c.csv", "flat.csv", "gone.csv"}; !slices.Equal(together, want) {
			t.Errorf("%d shards hold %v", n, together)
		}
	}
}

func keysOf(sources []Source) []Key {
	var keys []Key
	for _, s := range sources {
		_, k, _ := s.inputs()
		keys = append(keys, k)
	}
	return keys
}

func TestInterruptedItHasTheRowsThereAre(t *testing.T) {
	_, sources := ward()
	ctx, stop := context.WithCancel(context.Background())
	done, err := Run(ctx, sources, Settings{Save: func([]Row) error { stop(); return nil }})
	if !errors.Is(err, context.Canceled) || len(done.Rows) != 1 {
		t.Errorf("%v, %d rows", err, len(done.Rows))
	}
	full := errors.New("disk full")
	if _, err := Run(context.Background(), sources, Settings{Save: func([]Row) error { return full }}); !errors.Is(err, full) {
		t.Errorf("error %v", err)
	}
}

// Whatever text a cell has, it reads back the same, and no spreadsheet calculates
// with it.
func TestTableReadsBack(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		cell := rapid.OneOf(rapid.StringMatching(`'{0,2}[=+@-]?[a-z0-9.,"]{0,4}`), rapid.Custom(func(t *rapid.T) string {
			return data.Clean(rapid.String().Draw(t, "text")).String()
		}))
		row := Row{make([]string, len(Columns()))}
		for i := range row.Cells {
			row.Cells[i] = cell.Draw(t, "cell")
		}
		content := Write([]Row{row})
		back, err := Read("t.csv", content)
		if err != nil || len(back) != 1 || !slices.Equal(back[0].Cells, row.Cells) {
			t.Fatalf("%v: %q became %q", err, row.Cells, back)
		}
		for _, c := range row.Cells {
			g := guard(c)
			if g != "" && strings.ContainsRune("=+@", rune(g[0])) || strings.HasPrefix(g, "-") && !numeric(g) {
				t.Fatalf("%q is written as %q", c, g)
			}
		}
	})
}

func TestReadRefusesWhatIsNoTable(t *testing.T) {
	for content, want := range map[string]string{
		"":                                       "no table with the columns",
		"time_s,p\n0,1\n":                        "no table with the columns",
		strings.Join(names(), ",") + "\na,b\n":   "2 cells",
		"\"":                                     "no table of this program",
		strings.Join(names()[1:], ",") + "\nx\n": "no table with the columns",
	} {
		_, err := Read("t.csv", []byte(content))
		var file *data.FileError
		if !errors.As(err, &file) || !strings.Contains(err.Error(), want) || file.Hint == "" {
			t.Errorf("%.20q: %v", content, err)
		}
	}
}

func FuzzRead(f *testing.F) {
	f.Add(Write(nil))
	f.Add([]byte("caution\n"))
	f.Fuzz(func(t *testing.T, content []byte) {
		rows, err := Read("t.csv", content)
		if err != nil {
			return
		}
		back, err := Read("t.csv", Write(rows))
		if err != nil || len(back) != len(rows) {
			t.Fatalf("%v: %d rows became %d", err, len(rows), len(back))
		}
	})
}
