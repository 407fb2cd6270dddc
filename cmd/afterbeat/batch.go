package main

import (
	"context"
	"errors"
	"fmt"
	"os"
	"regexp"
	"runtime"
	"strconv"
	"time"

	"github.com/spf13/cobra"

	"afterbeat/data/casenote"
	"afterbeat/data/save"
	"afterbeat/tree/cohort"
)

const batchHelp = casenote.Caution + `

Runs the study of every PATH, a recording or a case, on all cores, and keeps one
row a recording in TABLE.csv; what fails is a row too, with its reason. A table
that exists is gone on with: what stands in it is not computed again. Interrupted,
it holds the rows there are. --shard K/N takes every N-th recording by its key;
the tables of all N shards, each less its first line, are the whole. One header
line, and these columns:

`

// batchCommand is `afterbeat batch PATH... -o TABLE.csv`.
func batchCommand(s stream) *cobra.Command {
	c := &cobra.Command{
		Use:   "batch PATH...",
		Short: "Many recordings, all cores, one row each; resumes",
		Long:  batchHelp + columnList(),
	}
	o := newOptions(c)
	c.Flags().StringVarP(&o.saveAs, "output", "o", "", "the table; one that exists is gone on with")
	c.Flags().BoolVar(&o.replace, "replace", false, "begin an existing table anew")
	shard := c.Flags().String("shard", "", "K/N: every N-th recording, from the K-th on")
	c.Flag("json").Hidden, c.Flag("ascii").Hidden = true, true
	c.Args = func(_ *cobra.Command, args []string) error {
		if len(args) == 0 {
			return usageError{errors.New("batch wants at least one PATH"), "see afterbeat batch --help"}
		}
		if o.saveAs == "" {
			return usageError{errors.New("batch wants a table"), "add -o TABLE.csv"}
		}
		return nil
	}
	c.RunE = func(c *cobra.Command, args []string) error { return runBatch(c.Context(), s, o, *shard, args) }
	return c
}

func columnList() string {
	text := ""
	for _, c := range cohort.Columns() {
		text += fmt.Sprintf("  %s: %s\n", c.Name, c.Meaning)
	}
	return text
}

func runBatch(ctx context.Context, s stream, o *options, shard string, args []string) error {
	set := cohort.Settings{Workers: runtime.GOMAXPROCS(0)}
	var err error
	if set.Shard, set.Shards, err = shardOf(shard); err != nil {
		return err
	}
	sources, err := o.sources(args, interruptible{ctx, s.in})
	if err != nil {
		return err
	}
	if set.Known, err = knownRows(o.saveAs, o.replace); err != nil {
		return err
	}
	t := table{path: o.saveAs, replace: o.replace || set.Known != nil}
	set.Save = t.now
	done, err := cohort.Run(ctx, sources, set)
	if saved := t.save(done.Rows); saved != nil {
		return saved
	}
	if err != nil {
		return err
	}
	return s.summary(done, o.saveAs)
}

// sources opens every path. A path that cannot be opened is a row.
func (o *options) sources(args []string, stdin interruptible) ([]cohort.Source, error) {
	var all []cohort.Source
	for _, path := range args {
		from, err := openPath(path, stdin)
		one := cohort.Source{Name: path, Read: from.read, Err: err}
		if err == nil {
			if one.Case, err = o.over(from.base); err != nil {
				return nil, err
			}
			if err := from.spare(o.saveAs, one.Case); err != nil {
				return nil, err
			}
		}
		all = append(all, one)
	}
	return all, nil
}

var shardForm = regexp.MustCompile(`^(\d{1,6})/(\d{1,6})$`)

// shardOf reads K/N; an empty text is the whole.
func shardOf(text string) (k, n int, err error) {
	if text == "" {
		return 0, 0, nil
	}
	if m := shardForm.FindStringSubmatch(text); m != nil {
		k, _ = strconv.Atoi(m[1])
		n, _ = strconv.Atoi(m[2])
	}
	if k < 1 || k > n {
		return 0, 0, usageError{fmt.Errorf("%q is no shard", text), "K/N with 1 <= K <= N, for instance --shard 1/4"}
	}
	return k, n, nil
}

// knownRows are those of a table that exists; none with replace.
func knownRows(path string, replace bool) ([]cohort.Row, error) {
	if _, err := os.Stat(path); err != nil || replace {
		return nil, nil // no table yet
	}
	content, err := readFile(path)
	if err != nil {
		return nil, err
	}
	rows, err := cohort.Read(path, content)
	if rows == nil {
		rows = []cohort.Row{}
	}
	return rows, err
}

// table is the file of a batch.
type table struct {
	path    string
	replace bool // what stands there is this table
	at      time.Time
}

// now saves the rows unless it did so within the last two seconds.
func (t *table) now(rows []cohort.Row) error {
	if time.Since(t.at) < 2*time.Second {
		return nil
	}
	return t.save(rows)
}

func (t *table) save(rows []cohort.Row) error {
	err := save.File(t.path, cohort.Write(rows), t.replace)
	t.replace, t.at = true, time.Now()
	return err
}

// summary says what a batch did, and fails where no recording gave an answer.
func (s stream) summary(done cohort.Outcome, path string) error {
	asked := done.Rows[:len(done.Rows)-done.Others]
	failed := 0
	for _, r := range asked {
		if r.Failed() {
			failed++
			fmt.Fprintf(s.err, "afterbeat: %s: %s\n", r.Cells[1], r.Cells[5])
		}
	}
	fmt.Fprintf(s.err, "afterbeat: %s in %s: %d computed, %d known before, %d failed\n",
		counted(len(asked), "recording"), message(errors.New(path)), done.Computed, len(asked)-done.Computed, failed)
	if done.Others > 0 {
		fmt.Fprintf(s.err, "afterbeat: %s of before, with other recordings or settings, at the end of the table\n", counted(done.Others, "row"))
	}
	if failed == len(asked) && failed > 0 {
		return noAnswer{"no recording gave an answer"}
	}
	return nil
}

func counted(n int, what string) string {
	if n == 1 {
		return "1 " + what
	}
	return fmt.Sprintf("%d %ss", n, what)
}
