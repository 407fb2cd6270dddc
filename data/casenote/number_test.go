package casenote

import (
	"math"
	"strconv"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"afterbeat/data"
)

var none = data.NoInterval()

func around(v, half float64) data.Interval { return data.Interval{Low: v - half, High: v + half} }

// The rule, worked by hand: two significant digits of the half-width, five of
// the value at most, four without an interval.
func TestFormat(t *testing.T) {
	inf := math.Inf(1)
	for _, c := range []struct {
		v        float64
		i        data.Interval
		want     string
		interval string
	}{
		{0.9512, around(0.9512, 0.041), "0.951", "0.910 to 0.992"},
		{0.9512, data.Interval{Low: 0.8, High: 1.3}, "0.95", "0.80 to 1.30"},
		{86.84, around(86.84, 1.2), "86.8", "85.6 to 88.0"},
		{12345.6, around(12345.6, 2300), "12300", "10000 to 14600"},
		{100.0012, around(100.0012, 0.0003), "100.00", "100.00 to 100.00"},
		{0.0123456, around(0.0123456, 0.0099), "0.0123", "0.0024 to 0.0222"},
		{-0.004, around(-0.004, 5), "0.0", "-5.0 to 5.0"},
		{-12.34, around(-12.34, 0.56), "-12.34", "-12.90 to -11.78"},
		{0, around(0, 0.25), "0.00", "-0.25 to 0.25"},
		{0.00012, around(0.00012, 0.00001), "0.000120", "0.000110 to 0.000130"},
		{3.2e-7, around(3.2e-7, 1e-8), "3.20e-7", "3.10e-7 to 3.30e-7"},
		{0.2, data.Interval{Low: 0.1, High: inf}, "0.2000", "0.1000 to inf"},

		{0.508123, none, "0.5081", "no interval"},
		{167.9994, none, "168.0", "no interval"},
		{168123, none, "168123", "no interval"},
		{168123.4, none, "168100", "no interval"},
		{2.5e12 + 0.5, none, "2.500e12", "no interval"},
		{1.23456e-6, none, "1.235e-6", "no interval"},
		{-0.04, none, "-0.04000", "no interval"},
		{math.Copysign(0, -1), none, "0", "no interval"},
		{math.NaN(), none, "undefined", "no interval"},
		{-inf, none, "-inf", "no interval"},

		{24, around(24, 0), "24", "exact"},
		{0.86, around(0.86, 0), "0.86", "exact"},
		{1.0 / 3, around(1.0/3, 0), "0.33333", "exact"},
		{168123, around(168123, 0), "168123", "exact"},
		{1e-9, around(1e-9, 0), "1e-9", "exact"},
		{99999.6, around(99999.6, 0), "100000", "exact"},
		{math.MaxFloat64, around(math.MaxFloat64, 0), "1.7977e308", "exact"},
		{inf, data.Interval{Low: inf, High: inf}, "inf", "exact"},
	} {
		if got := Format(c.v, c.i); got != c.want {
			t.Errorf("Format(%v, %v) = %q, want %q", c.v, c.i, got, c.want)
		}
		if got := FormatRange(c.v, c.i); got != c.interval {
			t.Errorf("FormatRange(%v, %v) = %q, want %q", c.v, c.i, got, c.interval)
		}
	}
}

// What is printed reads back within the rounding that the rule allows, carries
// no exponent at ordinary sizes and no negative zero.
func TestFormatReadsBack(t *testing.T) {
	size := rapid.Custom(func(t *rapid.T) float64 {
		return rapid.Float64Range(-1, 1).Draw(t, "digits") * math.Pow10(rapid.IntRange(-12, 12).Draw(t, "power"))
	})
	rapid.Check(t, func(t *rapid.T) {
		v, half := size.Draw(t, "v"), math.Abs(size.Draw(t, "half"))
		i := around(v, half)
		if rapid.Bool().Draw(t, "bare") {
			i = none
		}
		s := Format(v, i)
		back, err := strconv.ParseFloat(s, 64)
		if err != nil {
			t.Fatal(err)
		}
		allowed := math.Abs(v) * 0.5e-3 // four digits
		if i.Defined() {
			allowed = max(i.Width()/2*0.05, math.Abs(v)*0.5e-4) // two of the half-width, or five
		}
		if math.Abs(back-v) > allowed*(1+1e-9) {
			t.Fatalf("Format(%v, %v) = %q, off by %v, allowed %v", v, i, s, back-v, allowed)
		}
		if back == 0 && strings.HasPrefix(s, "-") {
			t.Fatalf("%q has a sign", s)
		}
		if a := math.Abs(v); a >= 1e-3 && a < 1e8 && strings.Contains(s, "e") {
			t.Fatalf("%v is written as %q", v, s)
		}
	})
}
