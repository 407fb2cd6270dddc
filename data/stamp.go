package data

import (
	"strings"
	"time"
)

// stamps reads times of day, hh:mm:ss with any number of decimals, and dates
// with one, 2024-03-01T12:00:00.5+01:00 (ISO 8601; a space for the T, strokes
// for the hyphens, a decimal comma and a missing zone are taken too). The
// times it returns count in s from midnight of the first one's day, by the
// clock that the file has written, so that they are the clock of day as long
// as the recording stays within one. Times without a date pass midnight: one
// that falls by more than half a day is on the next day.
type stamps struct {
	started  bool
	dated    bool
	midnight int64   // of the first stamp's day, s since 1970 in UTC
	days     float64 // midnights passed, s
	last     float64 // the last time of day, s
}

const day = 86400

// isStamp tells whether a field is a time of day, with or without a date.
func isStamp(s string) bool {
	_, ok := new(stamps).seconds(s)
	return ok
}

// seconds reads the next stamp. ok is false for what is none, and for a stamp
// without a date in a column whose first had one (or the reverse).
func (s *stamps) seconds(text string) (t float64, ok bool) {
	date, clock := "", text
	if i := strings.IndexAny(text, "Tt "); i >= 0 {
		date, clock = text[:i], strings.TrimSpace(text[i+1:])
	}
	zone := 0
	if date != "" {
		if clock, zone, ok = cutZone(clock); !ok {
			return 0, false
		}
	}
	sinceMidnight, ok := parseClock(clock)
	if !ok || s.started && s.dated != (date != "") {
		return 0, false
	}
	if date == "" {
		s.started = true
		return s.pastMidnight(sinceMidnight), true
	}
	midnight, ok := parseDate(date)
	if !ok {
		return 0, false
	}
	midnight -= int64(zone)
	if !s.started {
		s.started, s.dated, s.midnight = true, true, midnight
	}
	return float64(midnight-s.midnight) + sinceMidnight, true
}

// pastMidnight adds the days that have gone by.
func (s *stamps) pastMidnight(t float64) float64 {
	if s.last-t > day/2 {
		s.days += day
	}
	s.last = t
	return t + s.days
}

// parseClock reads hh:mm, hh:mm:ss or hh:mm:ss.fff, in s.
func parseClock(s string) (float64, bool) {
	hours, rest, ok := strings.Cut(s, ":")
	if !ok {
		return 0, false
	}
	minutes, seconds, _ := strings.Cut(rest, ":")
	h, okH := parseDigits(hours, 1, 2, 23)
	m, okM := parseDigits(minutes, 2, 2, 59)
	if !okH || !okM {
		return 0, false
	}
	t := float64(3600*h + 60*m)
	if len(rest) == len(minutes) {
		return t, true
	}
	whole, _, fraction := strings.Cut(strings.Replace(seconds, ",", ".", 1), ".")
	if _, ok := parseDigits(whole, 1, 2, 60); !ok {
		return 0, false
	}
	if !fraction {
		seconds = whole
	}
	v, what := parseNumber([]byte(strings.Replace(seconds, ",", ".", 1)), '.')
	return t + v, what == isNumber && strings.Trim(seconds, "0123456789.,") == ""
}

// parseDate reads yyyy-mm-dd or yyyy/mm/dd, in s since 1970-01-01.
func parseDate(s string) (int64, bool) {
	parts := strings.Split(strings.ReplaceAll(s, "/", "-"), "-")
	if len(parts) != 3 {
		return 0, false
	}
	y, okY := parseDigits(parts[0], 4, 4, 9999)
	m, okM := parseDigits(parts[1], 1, 2, 12)
	d, okD := parseDigits(parts[2], 1, 2, 31)
	date := time.Date(y, time.Month(m), d, 0, 0, 0, 0, time.UTC)
	if !okY || !okM || !okD || date.Day() != d || int(date.Month()) != m {
		return 0, false
	}
	return date.Unix(), true
}

// cutZone cuts Z, +hh:mm, -hhmm or +hh off a time of day; the zone is in s east
// of Greenwich, 0 where there is none.
func cutZone(s string) (clock string, zone int, ok bool) {
	if clock, found := strings.CutSuffix(strings.ToUpper(s), "Z"); found {
		return strings.TrimSpace(clock), 0, true
	}
	i := strings.LastIndexAny(s, "+-")
	if i < 0 {
		return s, 0, true
	}
	digits := strings.ReplaceAll(s[i+1:], ":", "")
	if len(digits) == 2 {
		digits += "00"
	}
	if len(digits) != 4 {
		return "", 0, false
	}
	h, okH := parseDigits(digits[:2], 2, 2, 14)
	m, okM := parseDigits(digits[2:], 2, 2, 59)
	zone = 3600*h + 60*m
	if s[i] == '-' {
		zone = -zone
	}
	return strings.TrimSpace(s[:i]), zone, okH && okM
}

// parseDigits reads a number of at least low and at most high digits, up to limit.
func parseDigits(s string, low, high, limit int) (int, bool) {
	n := 0
	for i := range len(s) {
		if s[i]-'0' > 9 {
			return 0, false
		}
		n = 10*n + int(s[i]-'0')
	}
	return n, low <= len(s) && len(s) <= high && n <= limit
}
