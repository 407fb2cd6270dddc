package data

import (
	"fmt"
	"math"

	"afterbeat/data/unit"
)

// timeWarnings speaks of where the times come from: a column without a unit,
// or a rate that rules over a column which says something else (by over 1 %).
func (in *intake) timeWarnings(c Clock) []Warning {
	if in.when.rate == 0 {
		h := in.heads[in.when.column]
		if in.when.stamps != nil || h.unit.Quantity == unit.Time {
			return nil
		}
		return []Warning{{
			Code: CodeNoUnit, Channel: h.name,
			Text: fmt.Sprintf("the header names no unit of time; seconds were taken, which makes %.4g rows a second", c.Rate),
			Cure: fmt.Sprintf("state it with --unit %s=ms (or s, us, min, h)", shellWord(h.name.String())),
		}}
	}
	i := timeColumn(in.heads)
	if i < 0 || i == in.when.column {
		return nil
	}
	values, per := in.columns[i].values, max(in.heads[i].unit.PerSecond(), 1./3600)
	own := float64(c.Rows-1) / (values[c.Rows-1] - values[0]) * per
	if math.Abs(own/in.when.rate-1) <= 0.01 || math.IsNaN(own) {
		return nil
	}
	return []Warning{{
		Code: CodeGivenRate, Channel: in.heads[i].name,
		Text: fmt.Sprintf("the given rate is %.6g Hz; by %s there are %.6g rows a second", in.when.rate, in.heads[i].name, own),
		Cure: "leave out --rate to use the times of the file",
	}}
}

// clockWarnings speaks of holes, repeated stamps and uneven steps.
func (r *Recording) clockWarnings(p pace, c Clock) []Warning {
	var out []Warning
	times, lost := rowTimes(r.Time, p, c.Rate)
	if holes := holesOf(r.Time, p); len(holes) > 0 {
		out = append(out, holeWarning(holes, len(lost), c))
	}
	if c.Repeated > 0 {
		out = append(out, Warning{
			Code: CodeRepeatedTimes, Channel: r.TimeName,
			Text: fmt.Sprintf("%d of %d rows (%s) have the time of the row before", c.Repeated, c.Rows, percent(c.Repeated, c.Rows)),
			Cure: "these rows were spread evenly; export the times with more decimals",
		})
	}
	done := "values were interpolated to it"
	off := farthest(r.Time, times, p, c.Rate)
	if off <= tolerance(c.Rate) && c.Repeated == 0 {
		done = "the rows were taken to be sampled evenly and stamped late"
		off = farthest(r.Time, r.Time, p, c.Rate)
	}
	if off > tolerance(c.Rate) {
		out = append(out, Warning{
			Code: CodeUnevenClock, Channel: r.TimeName,
			Text: fmt.Sprintf("rows are up to %s away from an even clock of %.6g Hz; %s", seconds(off), c.Rate, done),
			Cure: "if the rate of sampling is known, leave the times out and give --rate HZ",
		})
	}
	return out
}

func holeWarning(holes []Span, lost int, c Clock) Warning {
	longest, total := holes[0], 0.0
	for _, h := range holes {
		total += h.To - h.From
		if h.To-h.From > longest.To-longest.From {
			longest = h
		}
	}
	text := fmt.Sprintf("the clock jumps over %s at %.6g s", seconds(total), longest.From)
	if len(holes) > 1 {
		text = fmt.Sprintf("the clock jumps %d times, over %s together; the longest jump is %s at %.6g s",
			len(holes), seconds(total), seconds(longest.To-longest.From), longest.From)
	}
	text += fmt.Sprintf(" (%.3g %% of the recording)", 100*total/c.Duration)
	if lost > 0 {
		text += fmt.Sprintf("; %d rows stamped in a burst after it are not used", lost)
	}
	return Warning{
		Code: CodeHole, Text: text,
		Cure: "beats beside it are left out; choose a stretch without it with --from S and --to S",
	}
}

// channelWarnings speaks of units and missing samples, of the channels that
// have a quantity.
func (r *Recording) channelWarnings(heads []heading, c Clock) []Warning {
	unnamed := map[Text]bool{}
	for _, h := range heads {
		unnamed[h.name] = h.unit.Name == ""
	}
	var out []Warning
	for _, ch := range r.Channels {
		if ch.Quantity == unit.Other {
			continue
		}
		if unnamed[ch.Name] && ch.Quantity != unit.ECG {
			out = append(out, noUnit(ch))
		}
		if !ch.Unit.Calibrated {
			out = append(out, uncalibrated(ch))
		}
		if missing := ch.Missing(); missing > 0 {
			out = append(out, r.missingWarning(ch, missing, c))
		}
	}
	return out
}

func noUnit(ch Channel) Warning {
	return Warning{
		Code: CodeNoUnit, Channel: ch.Name,
		Text: fmt.Sprintf("the header names no unit that is known here; a %s in %s was taken", ch.Quantity, ch.Unit.Name),
		Cure: fmt.Sprintf("state it with --unit %s=UNIT", shellWord(ch.Name.String())),
	}
}

func uncalibrated(ch Channel) Warning {
	return Warning{
		Code: CodeUncalibrated, Channel: ch.Name,
		Text: fmt.Sprintf("a %s in %s: shape and times can be used, absolute values cannot", ch.Quantity, ch.Unit.Name),
		Cure: fmt.Sprintf("state --unit %[1]s=%[2]s, with --scale %[1]s=FACTOR (%[2]s for 1 %[3]s) and --offset %[1]s=VALUE",
			shellWord(ch.Name.String()), unit.Internal(ch.Quantity).Name, ch.Unit.Name),
	}
}

func (r *Recording) missingWarning(ch Channel, count int, c Clock) Warning {
	run, longest := 0, 0
	for _, v := range ch.Values {
		run++
		if !math.IsNaN(v) {
			run = 0
		}
		longest = max(longest, run)
	}
	return Warning{
		Code: CodeMissing, Channel: ch.Name,
		Text: fmt.Sprintf("%d of %d samples (%s) are missing, the longest stretch %s", count, c.Rows, percent(count, c.Rows), seconds(float64(longest)/c.Rate)),
		Cure: "beats that lack some are left out; choose a complete stretch with --from S and --to S",
	}
}

// percent is part of whole, to two digits.
func percent(part, whole int) string {
	return fmt.Sprintf("%.2g %%", 100*float64(part)/float64(whole))
}

// seconds is a duration in the unit that suits it.
func seconds(s float64) string {
	switch {
	case s < 1:
		return fmt.Sprintf("%.3g ms", 1000*s)
	case s < 600:
		return fmt.Sprintf("%.3g s", s)
	case s < 3*3600:
		return fmt.Sprintf("%.3g min", s/60)
	}
	return fmt.Sprintf("%.4g h", s/3600)
}
