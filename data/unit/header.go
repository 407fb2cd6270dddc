package unit

import (
	"slices"
	"strings"
)

// Header splits a column header into the name of the channel and its unit:
// "abp_mmHg", "aortic_flow_mL_s", "P [kPa]", "Q (L/min)", "Vel, cm/s",
// "art: mmHg", "pressure/mmHg", "time_ms". A unit in brackets counts wherever
// it stands; elsewhere it is what comes last, but for words such as raw, mean,
// left or a number ("abp_mmHg_raw" is abp_raw in mmHg). A short unit that is
// also a word or a mark (s, min, h, L, v, PA) counts outside brackets only
// where the name speaks of time or volume, or where it is written as the unit
// is (V, Pa): "abp_min" has no unit.
//
// Without a unit ok is false and name is the header, trimmed.
func Header(h string) (name string, u Unit, ok bool) {
	h = strings.TrimSpace(h)
	if name, u, ok = bracketed(h); ok {
		return name, u, true
	}
	if name, u, ok = trailing(h); ok {
		return name, u, true
	}
	for i := len(h) - 1; i > max(0, len(h)-longest); i-- {
		if !isSeparator(h[i]) {
			continue
		}
		if !qualifies(h[i+1:]) {
			break
		}
		if name, u, ok = trailing(h[:i]); ok && u.Calibrated {
			return strings.TrimLeft(name+h[i:], separators), u, true
		}
	}
	return h, Unit{}, false
}

// separators may stand between a name and its unit.
const separators = " _,:;/.-\t"

func isSeparator(b byte) bool { return strings.IndexByte(separators, b) >= 0 }

// bracketed finds a unit in round or square brackets.
func bracketed(h string) (name string, u Unit, ok bool) {
	for i, open := range h {
		if open != '(' && open != '[' {
			continue
		}
		closing := byte(')')
		if open == '[' {
			closing = ']'
		}
		for end := min(len(h)-1, i+longest); end > i; end-- {
			if h[end] != closing {
				continue
			}
			if u, ok = Parse(h[i+1 : end]); ok {
				before := strings.TrimRight(h[:i], separators)
				return strings.TrimSpace(before + " " + strings.Trim(h[end+1:], separators)), u, true
			}
		}
	}
	return "", Unit{}, false
}

// trailing finds the longest unit at the end of h, after a separator or as the
// whole of it.
func trailing(h string) (name string, u Unit, ok bool) {
	if u, ok = Parse(h); ok && !isWord(h, "", u) {
		return "", u, true
	}
	for i := max(0, len(h)-longest); i < len(h); i++ {
		if !isSeparator(h[i]) {
			continue
		}
		name, text := strings.TrimRight(h[:i], separators), strings.TrimSpace(h[i+1:])
		if u, ok = Parse(text); ok && !isWord(text, name, u) {
			return name, u, true
		}
	}
	return "", Unit{}, false
}

// isWord tells whether text, read as u after name, is rather a word or a mark:
// the s of "abp_s" is systolic, the min of "abp_min" is minimum, the L of
// "mcav_L" is left, the PA of "P_PA" is the pulmonary artery.
func isWord(text, name string, u Unit) bool {
	switch u.Name {
	case "s", "min", "h":
		return u.Quantity == Time && len(text) <= 3 && !IsTime(name)
	case "L", "m3":
		return len(text) <= 2 && u.Quantity == Volume && !speaksOf(Volume, Words(name))
	case "V", "Pa":
		return text != u.Name && len(text) <= 2
	case "adu":
		return strings.HasPrefix(strings.ToLower(text), "count")
	}
	return false
}

// qualifies tells whether s may follow a unit in a header.
func qualifies(s string) bool {
	for _, w := range Words(s) {
		if !slices.Contains(qualifiers, w) && strings.Trim(w, "0123456789") != "" {
			return false
		}
	}
	return true
}

var qualifiers = []string{
	"raw", "filtered", "filt", "smooth", "smoothed", "cal", "calibrated", "left", "right", "l", "r",
	"mean", "avg", "max", "min", "sys", "dia", "systolic", "diastolic", "channel", "ch",
}
