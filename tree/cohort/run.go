package cohort

import (
	"context"
	"errors"
	"path/filepath"
	"slices"
	"strings"
	"sync"

	"afterbeat/data"
	"afterbeat/data/casenote"
	"afterbeat/tree/study"
)

// Settings say how a table is made. The zero value computes every source, one
// after the other.
type Settings struct {
	// Workers are how many recordings are computed at once; 0 is one.
	Workers int
	// Known are rows of an earlier run.
	Known []Row
	// Shard takes every Shards-th key, from the Shard-th on, counted from 1.
	// Shards 0 takes all.
	Shard, Shards int
	// Save is called with the rows there are, in order, after each that is
	// computed; nil does nothing. Its error ends the run.
	Save func([]Row) error
}

// Outcome is the end of a run.
type Outcome struct {
	Rows     []Row // in the order of the sources, and then the others
	Computed int   // of Rows, in this run
	Others   int   // of Rows, of an earlier run, which no source asks for
}

// Run makes a row of every source. After ctx has ended it returns its error and
// the rows there are.
func Run(ctx context.Context, sources []Source, s Settings) (Outcome, error) {
	keys := make([]Key, len(sources))
	for i, one := range sources {
		if err := ctx.Err(); err != nil {
			return Outcome{}, err
		}
		_, keys[i], _ = one.inputs()
	}
	known := map[Key]Row{}
	for _, r := range s.Known {
		if r.Key().complete() {
			known[r.Key()] = r
		}
	}
	b := book{rows: make([]*Row, len(sources)), others: others(s.Known, sources, keys), save: s.Save}
	var todo []int
	for _, i := range share(sources, keys, s.Shard, s.Shards) {
		if r, ok := known[keys[i]]; ok {
			b.rows[i] = named(r, sources[i].file())
			continue
		}
		todo = append(todo, i)
	}
	err := b.fill(ctx, sources, todo, max(s.Workers, 1))
	return Outcome{Rows: b.inOrder(), Computed: b.computed, Others: len(b.others)}, err
}

// others are the known rows that no source asks for: they stay in the table.
func others(known []Row, sources []Source, keys []Key) []Row {
	asked, files := map[Key]bool{}, map[string]bool{}
	for i, s := range sources {
		asked[keys[i]], files[s.file().String()] = true, true
	}
	var all []Row
	for _, r := range known {
		if !asked[r.Key()] && (r.Key().complete() || !files[r.Cells[1]]) {
			all = append(all, r)
		}
	}
	return all
}

// share lists the sources of a shard in their order: of all keys in order, every
// shards-th.
func share(sources []Source, keys []Key, shard, shards int) []int {
	order := make([]int, len(keys))
	for i := range order {
		order[i] = i
	}
	if shards == 0 {
		return order
	}
	slices.SortStableFunc(order, func(a, b int) int {
		return strings.Compare(rank(sources[a], keys[a]), rank(sources[b], keys[b]))
	})
	var mine []int
	for n := shard - 1; n < len(order); n += shards {
		mine = append(mine, order[n])
	}
	slices.Sort(mine)
	return mine
}

func rank(s Source, k Key) string { return k.SHA256 + " " + k.Settings + " " + s.Name }

// named is a row under another name of the same file.
func named(r Row, file data.Text) *Row {
	cells := slices.Clone(r.Cells)
	cells[1] = file.String()
	return &Row{cells}
}

// book are the rows of a run as they come in.
type book struct {
	mu       sync.Mutex
	rows     []*Row // by source; nil where there is none yet
	others   []Row
	computed int
	save     func([]Row) error
}

func (b *book) inOrder() []Row {
	var all []Row
	for _, r := range b.rows {
		if r != nil {
			all = append(all, *r)
		}
	}
	return append(all, b.others...)
}

// fill computes the sources of todo.
func (b *book) fill(ctx context.Context, sources []Source, todo []int, workers int) error {
	ctx, stop := context.WithCancelCause(ctx)
	defer stop(nil)
	next := make(chan int)
	var all sync.WaitGroup
	for range workers {
		all.Go(func() {
			for i := range next {
				r, err := row(ctx, sources[i])
				if err == nil {
					err = b.enter(i, r)
				}
				if err != nil {
					stop(err)
				}
			}
		})
	}
	for _, i := range todo {
		select {
		case next <- i:
		case <-ctx.Done():
		}
	}
	close(next)
	all.Wait()
	return context.Cause(ctx)
}

func (b *book) enter(i int, r Row) error {
	b.mu.Lock()
	defer b.mu.Unlock()
	b.rows[i] = &r
	b.computed++
	if b.save == nil {
		return nil
	}
	return b.save(b.inOrder())
}

// row computes one source. Its error is that of ctx; any other is a row.
func row(ctx context.Context, s Source) (Row, error) {
	in, key, err := s.inputs()
	var st study.Study
	if err == nil {
		st, err = study.Run(ctx, in, study.StageDone)
	}
	if ctx.Err() != nil {
		return Row{}, context.Cause(ctx)
	}
	if err != nil {
		return Row{cells(key, s.file(), because(err), nil)}, nil
	}
	report := st.Report(casenote.Options{})
	failed := ""
	if report.Reason != nil {
		failed = *report.Reason
	}
	return Row{cells(key, s.file(), failed, &report)}, nil
}

// because is an error on one line, with what to do about it.
func because(err error) string {
	var (
		file   *data.FileError
		choice *study.ChoiceError
		hint   string
	)
	switch {
	case errors.As(err, &file):
		own := *file
		own.File = filepath.Base(own.File) // a table carries no path
		err, hint = &own, own.Hint
	case errors.As(err, &choice):
		hint = choice.Hint
	}
	what := err.Error()
	if hint != "" {
		what += "; " + hint
	}
	return data.Clean(what).String()
}
