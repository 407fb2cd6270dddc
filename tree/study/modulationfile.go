package study

import (
	"bytes"
	"encoding/csv"
	"errors"
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"

	"afterbeat/data"
	"afterbeat/tree/support"
)

// ReadModulation reads a speed over one period: columns time_s and
// speed_1000_per_min, N even steps, period N times the step. Errors are of type
// [data.FileError].
func ReadModulation(name string, content []byte) (support.Modulation, error) {
	var m support.Modulation
	refuse := func(line int, format string, args ...any) (support.Modulation, error) {
		return m, &data.FileError{File: name, Line: line, What: fmt.Sprintf(format, args...)}
	}
	r := csv.NewReader(bytes.NewReader(bytes.TrimPrefix(content, []byte("\ufeff"))))
	r.TrimLeadingSpace = true
	rows, err := r.ReadAll()
	if err != nil {
		var parse *csv.ParseError
		if errors.As(err, &parse) {
			return refuse(parse.Line, "%v", parse.Err)
		}
		return refuse(0, "%v", err)
	}
	if len(rows) == 0 {
		return refuse(1, "no header: the columns are time_s,speed_1000_per_min")
	}
	for i := range rows[0] {
		rows[0][i] = strings.TrimSpace(rows[0][i])
	}
	at, speed := slices.Index(rows[0], "time_s"), slices.Index(rows[0], "speed_1000_per_min")
	if at < 0 || speed < 0 {
		return refuse(1, "the columns are not time_s,speed_1000_per_min")
	}
	if len(rows) < 3 {
		return refuse(len(rows), "one period of a modulation needs two rows or more")
	}
	var times []float64
	for i, row := range rows[1:] {
		for _, column := range []int{at, speed} {
			v, err := strconv.ParseFloat(strings.TrimSpace(row[column]), 64)
			if err != nil || math.IsNaN(v) || math.IsInf(v, 0) {
				return refuse(i+2, "%s is not a number: %q", rows[0][column], data.Clean(row[column]))
			}
			if column == at {
				times = append(times, v)
			} else {
				m.Speeds = append(m.Speeds, v)
			}
		}
	}
	m.Step = (times[len(times)-1] - times[0]) / float64(len(times)-1)
	for i, t := range times {
		if !(m.Step > 0) || math.Abs(t-times[0]-float64(i)*m.Step) > 0.01*m.Step {
			return refuse(i+2, "the steps of time_s are not even")
		}
	}
	return m, nil
}
