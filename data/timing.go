package data

import (
	"slices"
	"strings"

	"afterbeat/data/unit"
)

// timing says where the times of a recording come from: a column of times, a
// column that counts samples together with a rate, or a rate alone.
type timing struct {
	column    int     // -1: rows are counted
	rate      float64 // Hz, for samples and rows; 0 for a column of times
	perSecond float64 // units of the column in one second
	stamps    *stamps // for times of day
}

// The rates that a user may give, Hz.
const lowestRate, highestRate = 1e-3, 1e6

// findTiming looks for the times of a table with the given headings.
func findTiming(t *table, heads []heading, o ReadOptions) (timing, error) {
	if o.Rate != 0 && !(o.Rate >= lowestRate && o.Rate <= highestRate) {
		return timing{}, t.fail(0, "give --rate in Hz, such as --rate 125", "a rate of %v Hz is no rate of samples", o.Rate)
	}
	switch {
	case o.Time != "":
		i, err := find(o.Time, titles(heads), "--time")
		if err != nil {
			return timing{}, &FileError{File: t.file, What: "looking for the time column", Err: err}
		}
		if o.Rate > 0 && heads[i].unit.Quantity == unit.Time {
			return timing{}, t.fail(0, "leave out --rate or --time", "%s holds times and --rate is for files without them", heads[i].name)
		}
		return timingFrom(t, heads, i, o.Rate)
	case o.Rate > 0:
		return timingFrom(t, heads, slices.IndexFunc(heads, heading.isIndex), o.Rate)
	}
	if i := timeColumn(heads); i >= 0 {
		return timingFrom(t, heads, i, 0)
	}
	if i := slices.IndexFunc(heads, heading.isIndex); i >= 0 {
		return timing{}, t.fail(0, "give the samples a second with --rate HZ", "column %s counts samples, and no column holds times", heads[i].name)
	}
	return timing{}, t.fail(0, "name the time column with --time NAME, or give the samples a second with --rate HZ", "no column holds times")
}

// timingFrom makes a timing of column i (-1 for none) and a rate (0 for none).
func timingFrom(t *table, heads []heading, i int, rate float64) (timing, error) {
	if rate > 0 {
		return timing{column: i, rate: rate, perSecond: rate}, nil
	}
	first, err := t.peek()
	if err != nil {
		return timing{}, err
	}
	out := timing{column: i, perSecond: 1}
	if per := heads[i].unit.PerSecond(); per > 0 {
		out.perSecond = per
	}
	if i < len(first) && isStamp(first[i]) {
		out.stamps, out.perSecond = &stamps{}, 1
	}
	return out, nil
}

// toSeconds converts the values of the time column to s, in place.
func (w timing) toSeconds(values []float64) {
	if w.perSecond == 1 {
		return
	}
	for i := range values {
		values[i] /= w.perSecond
	}
}

// counted gives n rows the times that the rate implies.
func (w timing) counted(n int) []float64 {
	times := make([]float64, n)
	for i := range times {
		times[i] = float64(i)
	}
	w.toSeconds(times)
	return times
}

// timeColumn is the column that the header calls time, -1 if none: one with a
// name that means nothing else, else one that speaks of time and has a unit of
// time; the leftmost of several.
func timeColumn(heads []heading) int {
	if i := slices.IndexFunc(heads, heading.isTime); i >= 0 {
		return i
	}
	return slices.IndexFunc(heads, func(h heading) bool { return h.unit.Quantity == unit.Time && strings.Contains(h.key(), "time") })
}

// key is the name without the unit, its words run together.
func (h heading) key() string { return strings.Join(unit.Words(h.part), "") }

func (h heading) isTime() bool {
	if h.unit.Quantity == unit.Time && h.key() == "" {
		return true
	}
	if h.unit.Name != "" && h.unit.Quantity != unit.Time {
		return false
	}
	return slices.Contains([]string{
		"time", "t", "timestamp", "datetime", "dateandtime", "timeofday", "clock", "clocktime", "walltime", "elapsed", "elapsedtime",
		"timeelapsed", "reltime", "relativetime", "s", "sec", "secs",
	}, h.key())
}

func (h heading) isIndex() bool {
	return h.unit.Name == "" && slices.Contains([]string{
		"sample", "samples", "index", "idx", "sampleno", "samplenumber", "samplenr", "sampleindex", "row", "frame",
	}, h.key())
}
