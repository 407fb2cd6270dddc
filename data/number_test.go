package data

import (
	"math"
	"strconv"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

// Every number that scanNumber takes is the float64 that strconv gives, and it
// ends where the number ends.
func TestScannedNumbersAreExact(t *testing.T) {
	digits := rapid.StringMatching(`[-+]?[0-9]{0,17}(\.[0-9]{0,17})?`)
	printed := rapid.Map(rapid.Float64(), func(x float64) string { return strconv.FormatFloat(x, 'f', -1, 64) })
	taken := map[bool]int{}
	rapid.Check(t, func(t *rapid.T) {
		s := rapid.OneOf(digits, printed).Draw(t, "number")
		tail := rapid.SampledFrom([]string{",", "\n", "\r\n", " ", ",123456789012345678", "e5,", "x"}).Draw(t, "tail")
		want, err := strconv.ParseFloat(s, 64)
		v, next, ok := scanNumber([]byte("7,"+s+tail), 2, '.')
		taken[ok]++
		if ok && (err != nil || v != want || math.Signbit(v) != math.Signbit(want) || next != 2+len(s)) {
			t.Fatalf("scanNumber(%q) = %v, %d; want %v, %d", s, v, next, want, 2+len(s))
		}
	})
	if taken[true] < 20 || taken[false] < 10 {
		t.Errorf("numbers taken and not: %v", taken)
	}
}

func TestScanNumberTakesPlainNumbers(t *testing.T) {
	for _, s := range []string{"0", "-0.5", "123456.789", ".5", "5.", "900.0005", "-841", "+1", "9007199254740992"} {
		if v, _, ok := scanNumber([]byte(s), 0, '.'); !ok || strconv.FormatFloat(v, 'g', -1, 64) == "" {
			t.Errorf("%q is not taken", s)
		}
	}
	for _, s := range []string{"", "-", ".", "+.", "abc", "1234567890123456789", "9007199254740993"} {
		if v, _, ok := scanNumber([]byte(s), 0, '.'); ok {
			t.Errorf("%q is taken for %v", s, v)
		}
	}
	if v, _, ok := scanNumber([]byte("1,5"), 0, ','); !ok || v != 1.5 {
		t.Errorf("1,5 with a decimal comma is %v", v)
	}
}

func TestParseNumber(t *testing.T) {
	for s, want := range map[string]float64{
		"1e3": 1000, "-2.5E-1": -0.25, "12345678901234567890": 12345678901234567890, "1e100": 1e100,
	} {
		if v, what := parseNumber([]byte(s), '.'); what != isNumber || v != want {
			t.Errorf("%q is %v", s, v)
		}
	}
	for _, s := range []string{"", "NaN", "nan", "-nan", "NA", "N/A", "n/a", "#N/A", "null", "NULL", "None", "-", "--", ".", "Inf", "-inf", "+Infinity", "1.#QNAN"} {
		if v, what := parseNumber([]byte(s), '.'); what != isMissing || !math.IsNaN(v) {
			t.Errorf("%q is %v, kind %d", s, v, what)
		}
	}
	for _, s := range []string{"abc", "1 2", "1,5", "0x1p4", "1_000", "1e999", "-1e101", "1e", "--1", "12:00", "nanometre", strings.Repeat("1", 65)} {
		if v, what := parseNumber([]byte(s), '.'); what != isText || !math.IsNaN(v) {
			t.Errorf("%q is %v, kind %d", s, v, what)
		}
	}
	if v, what := parseNumber([]byte("-1,5e1"), ','); what != isNumber || v != -15 {
		t.Errorf("a decimal comma gives %v", v)
	}
}
