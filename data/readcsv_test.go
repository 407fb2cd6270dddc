package data

import (
	"bytes"
	"errors"
	"fmt"
	"io"
	"math"
	"strings"
	"testing"

	"afterbeat/data/unit"

	"github.com/google/go-cmp/cmp"
	"pgregory.net/rapid"
)

func read(text string, o ReadOptions) (*Recording, error) {
	return ReadCSV("dir/trace.csv", strings.NewReader(text), o)
}

func mustRead(t *testing.T, text string, o ReadOptions) *Recording {
	t.Helper()
	rec, err := read(text, o)
	if err != nil {
		t.Fatalf("%v\n%s", err, text)
	}
	return rec
}

// sameValues compares numbers exactly, NaN being like NaN.
func sameValues(a, b []float64) bool {
	return cmp.Equal(a, b, cmp.Comparer(func(x, y float64) bool { return x == y || math.IsNaN(x) && math.IsNaN(y) }))
}

var nan = math.NaN()

func TestReadCSVForms(t *testing.T) {
	want := []float64{80, 81.5, nan, 79}
	for name, text := range map[string]string{
		"plain":             "time_s,abp_mmHg\n0,80\n0.1,81.5\n0.2,\n0.3,79\n",
		"no last line end":  "time_s,abp_mmHg\n0,80\n0.1,81.5\n0.2,\n0.3,79",
		"CRLF":              "time_s,abp_mmHg\r\n0,80\r\n0.1,81.5\r\n0.2,\r\n0.3,79\r\n",
		"CR":                "time_s,abp_mmHg\r0,80\r0.1,81.5\r0.2,\r0.3,79\r",
		"comments":          "# made by hand\n\ntime_s,abp_mmHg\n# start\n0,80\n0.1,81.5\n\n  \n0.2,\n #\n0.3,79\n#end",
		"quoted":            "\"time_s\",\"abp_mmHg\"\n\"0\",\"80\"\n0.1,\"81.5\" \n0.2,\"\"\n0.3,79\n",
		"spaces":            "time_s , abp_mmHg\n 0 , 80\n0.1,\t81.5 \n0.2, \n0.3,79\n",
		"trailing commas":   "time_s,abp_mmHg,\n0,80,\n0.1,81.5,\n0.2,,\n0.3,79,\n",
		"comma in rows":     "time_s,abp_mmHg\n0,80,\n0.1,81.5,\n0.2,,\n0.3,79,\n",
		"comma in header":   "time_s,abp_mmHg,\n0,80\n0.1,81.5\n0.2,\n0.3,79\n",
		"empty rows":        "time_s,abp_mmHg\n0,80\n,\n0.1,81.5\n0.2,\n0.3,79\n,\n,\n",
		"byte order mark":   "\xef\xbb\xbf\"time_s\",abp_mmHg\n0,80\n0.1,81.5\n0.2,\n0.3,79\n",
		"UTF-16":            utf16("time_s,abp_mmHg\n0,80\n0.1,81.5\n0.2,\n0.3,79\n", "\xff\xfe", 0),
		"UTF-16 big-endian": utf16("time_s,abp_mmHg\n0,80\n0.1,81.5\n0.2,\n0.3,79\n", "\xfe\xff", 1),
		"missing words":     "time_s,abp_mmHg\n0,80\n0.1,81.5\n0.2,N/A\n0.3,79\n",
		"infinity":          "time_s,abp_mmHg\n0,80\n0.1,81.5\n0.2,-Inf\n0.3,79\n",
		"notes":             "time_s,abp_mmHg,note\n0,80,start\n0.1,81.5,\"a \"\"b\"\", c\"\n0.2,,\"two\nlines\"\n0.3,79,\n",
		"notes only in use": "time_s,abp_mmHg,hr_bpm\n0,80,60\n0.1,81.5,off\n0.2,,61\n0.3,79,62\n",
		"exponents":         "time_s,abp_mmHg\n0,8e1\n1e-1,+81.50\n.2,\n0.3,79.\n",
		"milliseconds":      "time_ms,abp_mmHg\n0,80\n100,81.5\n200,\n300,79\n",
		"clock":             "time,abp_mmHg\n00:00:00,80\n00:00:00.1,81.5\n0:00:00.200,\n00:00:00.300,79\n",
		"header mark":       "time_s,#abp_mmHg\n0,80\n0.1,81.5\n0.2,\n0.3,79\n",
	} {
		rec := mustRead(t, text, ReadOptions{})
		if !sameValues(rec.Channels[0].Values, want) || !sameValues(rec.Time, []float64{0, 0.1, 0.2, 0.3}) {
			t.Errorf("%s: values %v at %v", name, rec.Channels[0].Values, rec.Time)
		}
		if rec.Channels[0].Quantity != unit.Pressure || rec.Name.String() != "trace.csv" {
			t.Errorf("%s: %q has quantity %s", name, rec.Name, rec.Channels[0].Quantity)
		}
	}
}

// utf16 writes ASCII text as UTF-16, with the NUL of each unit at place nul.
func utf16(s, mark string, nul int) string {
	for _, r := range s {
		if nul == 0 {
			mark += string(r) + "\x00"
		} else {
			mark += "\x00" + string(r)
		}
	}
	return mark
}

func TestReadCSVErrors(t *testing.T) {
	const head = "time_s,abp_mmHg\n"
	for _, c := range []struct {
		text, want, hint string
		o                ReadOptions
	}{
		{text: "", want: "dir/trace.csv: is empty"},
		{text: "# only a comment\n\n", want: "dir/trace.csv: is empty"},
		{text: head, want: "has a header, but no rows"},
		{text: head + "0,80\n", want: "one row of numbers"},
		{text: "0,80\n0.1,81\n", want: "dir/trace.csv:1: has no header", hint: "time_s,abp_mmHg"},
		{text: "#c\n\n12:00:00,80\n12:00:01,81\n", want: "dir/trace.csv:3: has no header"},
		{text: head + "0,80\n0.1,abc\n0.2,81\n", want: `dir/trace.csv:3: abp_mmHg is not a number: "abc"`},
		{text: head + "0,80\n0.1,\x1b[31m\n", want: `dir/trace.csv:3: abp_mmHg is not a number: "\x1b[31m"`},
		{text: "time_s,note,abp_mmHg\n0,\"a\nb\",80\n0.1,,abc\n", want: "dir/trace.csv:4: abp_mmHg is not a number"},
		{text: head + "0,80\n0.1,1e999\n", want: `:3: abp_mmHg is not a number: "1e999"`},
		{text: head + "0,80\n0.1,0x10\n", want: `:3: abp_mmHg is not a number: "0x10"`},
		{text: head + "0,80\n0.1,1_0\n", want: `:3: abp_mmHg is not a number: "1_0"`},
		{text: head + "0,80\n0.1\n", want: ":3: 1 fields where the header has 2"},
		{text: head + "0,80\n0.1,80,81\n", want: ":3: 3 fields where the header has 2", hint: "decimal comma"},
		{text: head + "0,80\n,81\n", want: ":3: time_s is missing"},
		{text: head + "0,80\nx,81\n", want: `:3: time_s is not a number: "x"`},
		{text: head + "0,80\n0.2,81\n\n0.1,82\n", want: ":5: time_s falls, from 0.2 to 0.1", hint: "order of time"},
		{text: head + "1,80\n1,81\n", want: "time_s does not advance", hint: "--rate HZ"},
		{text: head + "0,n/a\n1,-\n", want: "no column but that of times holds numbers"},
		{text: head + "0,a\n1,b\n", want: "no column but that of times holds numbers"},
		{text: "abp_mmHg\n80\n81\n", want: "no column holds times", hint: "--rate HZ"},
		{text: "sample,abp_mmHg\n1,80\n2,81\n", want: "column sample counts samples", hint: "--rate HZ"},
		{text: "time_s;abp_mmHg\n0;80,5\n", want: ":1: the fields are separated by semicolons", hint: "commas"},
		{text: "time_s\tabp_mmHg\n0\t80\n", want: ":1: the fields are separated by tabs", hint: "commas"},
		{text: "time_s abp_mmHg\n0 80\n", want: ":1: the fields are separated by spaces", hint: "commas"},
		{text: utf16(head+"0,80\n", "", 0), want: "NUL bytes: UTF-16 without a byte order mark", hint: "UTF-8"},
		{text: head + "0,\"80\n", want: ":2: a quoted field does not end"},
		{text: head + "0,\"80\"x\n", want: ":2: text follows a quoted field"},
		{text: "time,abp_mmHg\n12:00:00,80\n12:00:1x,81\n", want: `:3: time is not a time like that of the first row: "12:00:1x"`},
		{text: "time,abp_mmHg\n12:00:00,80\n13,81\n", want: `:3: time is not a time like that of the first row: "13"`},
		{text: "time,abp_mmHg\n12:00:10,80\n12:00:05,81\n", want: ":3: time falls"},
		{text: head + "0,80\n1,81\n", o: ReadOptions{Time: "tim"}, want: `there is no column "tim"; the nearest is "time_s"`},
		{text: head + "0,80\n1,81\n", o: ReadOptions{Units: map[string]string{"bp": "kPa"}}, want: `there is no column "bp"; the nearest is "abp_mmHg" (--unit bp=UNIT)`},
		{text: head + "0,80\n1,81\n", o: ReadOptions{Units: map[string]string{"abp": "kilopond"}}, want: `"kilopond" is no unit known here`},
		{text: head + "0,80\n1,81\n", o: ReadOptions{Time: "time", Rate: 10}, want: "time_s holds times and --rate is for files without them"},
		{text: head + "0,80\n1,81\n", o: ReadOptions{Rate: -1}, want: "a rate of -1 Hz"},
		{text: head + "0,80\n1,81\n", o: ReadOptions{Rate: nan}, want: "a rate of NaN Hz"},
	} {
		_, err := read(c.text, c.o)
		var fe *FileError
		if !errors.As(err, &fe) || !strings.Contains(err.Error(), c.want) || !strings.Contains(fe.Hint, c.hint) {
			t.Errorf("%q:\n got %v (hint %q)\nwant %s (hint %q)", c.text, err, hintOf(fe), c.want, c.hint)
		}
	}
}

func hintOf(e *FileError) string {
	if e == nil {
		return ""
	}
	return e.Hint
}

func TestReadErrorIsPassedOn(t *testing.T) {
	_, err := ReadCSV("a.csv", io.MultiReader(strings.NewReader("time_s"), failing{}), ReadOptions{})
	var fe *FileError
	if !errors.As(err, &fe) || !errors.Is(err, io.ErrUnexpectedEOF) {
		t.Errorf("got %v", err)
	}
}

type failing struct{}

func (failing) Read([]byte) (int, error) { return 0, io.ErrUnexpectedEOF }

func TestOptionErrorsCanBeTold(t *testing.T) {
	var unknown *UnknownNameError
	if _, err := read("time_s,abp\n0,1\n1,2\n", ReadOptions{Time: "x"}); !errors.As(err, &unknown) {
		t.Errorf("got %v", err)
	}
	var ambiguous *AmbiguousError
	if _, err := read("time_s,abp_mmHg,abp_kPa\n0,1,1\n1,2,2\n", ReadOptions{Units: map[string]string{"abp": "kPa"}}); !errors.As(err, &ambiguous) {
		t.Errorf("got %v", err)
	}
}

// Closed form: 10 kPa is 10/0.133322387415 mmHg; 6 L/min is 100 mL/s.
func TestUnitsAreConverted(t *testing.T) {
	rec := mustRead(t, "t,P [kPa],Q (L/min),v_m_s,pleth_NU,etco2_kPa,carotid_pressure_V,note\n0,10,6,0.5,7,5,1.5,a\n1,10,6,0.5,7,5,1.5,b\n", ReadOptions{})
	want := []struct {
		name     string
		quantity unit.Quantity
		unit     string
		site     Site
		value    float64
	}{
		{"P [kPa]", unit.Pressure, "kPa", SiteOther, 75.00615758},
		{"Q (L/min)", unit.Flow, "L/min", SiteOther, 100},
		{"v_m_s", unit.Velocity, "m/s", SiteOther, 50},
		{"pleth_NU", unit.Other, "NU", SiteOther, 7},
		{"etco2_kPa", unit.Other, "kPa", SiteOther, 5},
		{"carotid_pressure_V", unit.Pressure, "V", SiteCarotid, 1.5},
	}
	if len(rec.Channels) != len(want) {
		t.Fatalf("%d channels, want %d (text is left out)", len(rec.Channels), len(want))
	}
	for i, w := range want {
		c := rec.Channels[i]
		if c.Name.String() != w.name || c.Quantity != w.quantity || c.Unit.Name != w.unit || c.Site != w.site || math.Abs(c.Values[1]-w.value) > 1e-7 {
			t.Errorf("got %s %s %s %s %v, want %+v", c.Name, c.Quantity, c.Unit.Name, c.Site, c.Values[1], w)
		}
	}
}

func TestUnitsOfTheUserRule(t *testing.T) {
	rec := mustRead(t, "stamp,abp_mmHg,ch1,PaO2\n0,16,1,12\n8,17,1,12\n", ReadOptions{
		Time:  "stamp",
		Units: map[string]string{"stamp": "ms", "ABP": "kPa", "ch1": "mL/s", "PaO2": "kPa"},
	})
	if rec.Time[1] != 0.008 || rec.TimeName.String() != "stamp" {
		t.Errorf("time %v of %q", rec.Time, rec.TimeName)
	}
	for i, q := range []unit.Quantity{unit.Pressure, unit.Flow, unit.Pressure} {
		if rec.Channels[i].Quantity != q {
			t.Errorf("%s is %s, want %s", rec.Channels[i].Name, rec.Channels[i].Quantity, q)
		}
	}
	if got := rec.Channels[0].Values[0]; math.Abs(got-120.009852) > 1e-6 {
		t.Errorf("16 kPa is %v mmHg", got)
	}
	if len(rec.Warnings) != 0 {
		t.Errorf("warnings %v", rec.Warnings)
	}
}

func TestTimeColumn(t *testing.T) {
	for _, c := range []struct {
		header, time string
		o            ReadOptions
		step         float64
	}{
		{"time_s,abp_mmHg", "time_s", ReadOptions{}, 1},
		{"abp_mmHg,Time [ms]", "Time [ms]", ReadOptions{}, 1e-3},
		{"t,abp_mmHg", "t", ReadOptions{}, 1},
		{"abp_mmHg,seconds", "seconds", ReadOptions{}, 1},
		{"elapsed (min),abp_mmHg", "elapsed (min)", ReadOptions{}, 60},
		{"TimeStamp_us,abp_mmHg", "TimeStamp_us", ReadOptions{}, 1e-6},
		{"abp_mmHg,sample_time_ms", "sample_time_ms", ReadOptions{}, 1e-3},
		{"ejection_time_ms,time_s,abp_mmHg", "time_s", ReadOptions{}, 1},
		{"sample,abp_mmHg", "sample", ReadOptions{Rate: 4}, 0.25},
		{"n,abp_mmHg", "n", ReadOptions{Time: "n", Rate: 4}, 0.25},
		{"abp_mmHg,mcav_cm_s", "", ReadOptions{Rate: 4}, 0.25},
		{"stamp,abp_mmHg", "stamp", ReadOptions{Time: "stamp"}, 1},
		{"time_s,lag_s,abp_mmHg", "lag_s", ReadOptions{Time: "lag"}, 1},
	} {
		row := strings.Repeat(",7", strings.Count(c.header, ","))
		text := c.header + "\n"
		for k := range 5 {
			row := strings.Split("7"+row, ",")
			for i, h := range strings.Split(c.header, ",") {
				if h == c.time {
					row[i] = fmt.Sprint(k)
				}
			}
			text += strings.Join(row, ",") + "\n"
		}
		rec := mustRead(t, text, c.o)
		if rec.TimeName.String() != c.time || math.Abs(rec.Time[4]-4*c.step) > 1e-15 {
			t.Errorf("%s: times %v from %q, want steps of %v s from %q", c.header, rec.Time, rec.TimeName, c.step, c.time)
		}
		if len(rec.Channels) == 0 || rec.Channels[len(rec.Channels)-1].Values[0] != 7 {
			t.Errorf("%s: channels %v", c.header, rec.Channels)
		}
	}
}

func TestHeadersAreCleanAndToldApart(t *testing.T) {
	rec := mustRead(t, "time_s,\x1b[31mabp_mmHg,,abp_mmHg,abp_mmHg,Gr\xf6\xdfe_\xb5V\n0,1,2,3,4,5\n1,1,2,3,4,5\n", ReadOptions{})
	var names []string
	for _, c := range rec.Channels {
		names = append(names, c.Name.String())
	}
	want := []string{`\x1b[31mabp_mmHg`, "column 3", "abp_mmHg (column 4)", "abp_mmHg (column 5)", "Größe_µV"}
	if diff := cmp.Diff(want, names); diff != "" {
		t.Error(diff)
	}
}

func TestReadWarnings(t *testing.T) {
	for _, c := range []struct {
		text       string
		o          ReadOptions
		code       Code
		words, how string
	}{
		{"time_s,abp_mmHg\n0,80\n0.01,\n0.02,\n0.03,81\n", ReadOptions{}, CodeMissing, "2 of 4 samples (50 %) are missing, the longest stretch 20 ms", "--from"},
		{"time_s,P\n0,80\n0.01,81\n", ReadOptions{}, CodeNoUnit, "a pressure in mmHg was taken", "--unit P=UNIT"},
		{"time_s,my P\n0,80\n0.01,81\n", ReadOptions{}, CodeNoUnit, "a pressure in mmHg was taken", "--unit 'my P'=UNIT"},
		{"time,abp_mmHg\n0,80\n8,81\n", ReadOptions{}, CodeNoUnit, "seconds were taken, which makes 0.125 rows a second", "--unit time=ms"},
		{"time_s,P_V\n0,80\n0.01,81\n", ReadOptions{}, CodeUncalibrated, "a pressure in V", "--scale P_V=FACTOR (mmHg for 1 V)"},
		{"time_s,flow_adu\n0,80\n0.01,81\n", ReadOptions{}, CodeUncalibrated, "a flow in adu", "--scale"},
		{"time_s,abp_mmHg\n0,80\n0.01,81\n", ReadOptions{Rate: 50}, CodeGivenRate, "the given rate is 50 Hz; by time_s there are 100 rows a second", "leave out --rate"},
		{"time_s,abp_mmHg\n0,1\n0.01,1\n0.02,1\n1.02,1\n1.03,1\n", ReadOptions{}, CodeHole, "jumps over 1 s at 0.02 s (97.1 % of the recording)", "--from"},
		{"time_s,abp_mmHg\n0,1\n0.02,1\n0.02,1\n0.03,1\n0.04,1\n", ReadOptions{}, CodeRepeatedTimes, "1 of 5 rows (20 %)", "decimals"},
		{"time_s,abp_mmHg\n0,1\n0.01,1\n0.02,1\n0.035,1\n0.045,1\n", ReadOptions{}, CodeUnevenClock, "ms away from an even clock", "--rate"},
	} {
		rec := mustRead(t, c.text, c.o)
		if len(rec.Warnings) != 1 {
			t.Errorf("%q: warnings %v", c.text, rec.Warnings)
			continue
		}
		w := rec.Warnings[0]
		if w.Code != c.code || !strings.Contains(w.Text, c.words) || !strings.Contains(w.Cure, c.how) {
			t.Errorf("%q: got %+v\nwant %s, %s, %s", c.text, w, c.code, c.words, c.how)
		}
	}
}

// What is written reads back the same.
func TestRoundTrip(t *testing.T) {
	value := rapid.OneOf(rapid.Float64Range(-1e3, 1e3), rapid.Float64Range(-1e90, 1e90), rapid.Just(nan), rapid.Just(0.))
	rapid.Check(t, func(t *rapid.T) {
		n := rapid.IntRange(2, 30).Draw(t, "rows")
		steps := rapid.SliceOfN(rapid.OneOf(rapid.Float64Range(0, 2), rapid.Just(0.)), n-1, n-1).Draw(t, "steps")
		times := []float64{rapid.Float64Range(-1e4, 1e6).Draw(t, "start")}
		for _, s := range steps {
			times = append(times, times[len(times)-1]+s)
		}
		times[n-1]++ // so that time advances
		pressure := rapid.SliceOfN(value, n, n).Draw(t, "pressure")
		pressure[0] = 80
		other := rapid.SliceOfN(value, n, n).Draw(t, "other")
		other[n-1] = 1
		var b bytes.Buffer
		fmt.Fprint(&b, "time_s,abp_mmHg,hr_bpm")
		for i := range times {
			fmt.Fprintf(&b, "%s%v,%v,%v", rapid.SampledFrom([]string{"\n", "\r\n", "\n\n", "\n# x\n"}).Draw(t, "line end"), times[i], pressure[i], other[i])
		}
		rec, err := ReadCSV("a.csv", &b, ReadOptions{})
		if err != nil {
			t.Fatal(err)
		}
		if !sameValues(rec.Time, times) || !sameValues(rec.Channels[0].Values, pressure) || !sameValues(rec.Channels[1].Values, other) {
			t.Fatalf("read %v %v", rec.Time, rec.Channels)
		}
	})
}

func FuzzReadCSV(f *testing.F) {
	for _, s := range []string{
		"time_s,abp_mmHg\n0,80\n0.1,81.5\n0.2,\n0.3,79\n",
		"\xef\xbb\xbf\"time_s\",\"P [kPa]\"\r\n0,\"1\n\"\r\n1,2\r\n",
		utf16("t,Q\n0,1\n1,2\n", "\xff\xfe", 0),
		"time,Gr\xf6\xdfe\n23:59:59.9,1\n0:00:00,2,\n",
		"t,P\n2024-02-29T23:59:59Z,1\n2024-03-01 00:00:00+01:00,n/a\n",
		"#\nsample,\x1b[31m,x,x\n1,,1e99,a\n9,\"\"\"\",-inf,\n",
		"t,p\n0,1\n0,2\n0,3\n1e-320,4\n1e99,5\n",
		"a;b\n1;2\n",
	} {
		f.Add([]byte(s), 0.)
		f.Add([]byte(s), 125.)
	}
	f.Fuzz(func(t *testing.T, raw []byte, rate float64) {
		rec, err := ReadCSV("fuzz.csv", bytes.NewReader(raw), ReadOptions{Rate: rate})
		if err != nil {
			var fe *FileError
			if !errors.As(err, &fe) || fe.File != "fuzz.csv" {
				t.Fatalf("an error without the file: %v", err)
			}
			return
		}
		checkRecording(t, rec)
	})
}

// checkRecording fails where a recording breaks what [ReadCSV] and
// [Recording.Uniform] promise.
func checkRecording(t *testing.T, rec *Recording) {
	t.Helper()
	for i, x := range rec.Time {
		if math.IsNaN(x) || math.IsInf(x, 0) || i > 0 && x < rec.Time[i-1] {
			t.Fatalf("time %d is %v", i, x)
		}
	}
	if len(rec.Time) < 2 || len(rec.Channels) == 0 || len(rec.SHA256) != 64 {
		t.Fatalf("%d rows, %d channels", len(rec.Time), len(rec.Channels))
	}
	for _, c := range rec.Channels {
		if len(c.Values) != len(rec.Time) || c.Name.String() == "" || Clean(c.Name.String()) != c.Name {
			t.Fatalf("channel %q has %d values for %d times", c.Name, len(c.Values), len(rec.Time))
		}
		for _, v := range c.Values {
			if math.IsInf(v, 0) {
				t.Fatalf("%s holds an infinity", c.Name)
			}
		}
	}
	for _, w := range rec.Warnings {
		if w.Text == "" || w.Cure == "" || strings.Contains(w.Text+w.Cure, "%!") {
			t.Fatalf("warning %+v", w)
		}
	}
	if c := rec.Clock(); !(c.Rate > 0) || math.IsInf(c.Rate, 0) || !(c.Duration > 0) {
		t.Fatalf("clock %+v", c)
	}
	g, even, err := rec.Uniform()
	if err != nil {
		return
	}
	for i, values := range even {
		if len(values) != g.N {
			t.Fatalf("%d values on a grid of %d", len(values), g.N)
		}
		low, high := Period{Samples: finite(rec.Channels[i].Values)}.Extremes()
		for _, v := range values {
			if v < low-1e-9*math.Abs(low) || v > high+1e-9*math.Abs(high) {
				t.Fatalf("%v lies outside the samples, %v to %v", v, low, high)
			}
		}
	}
}

func finite(x []float64) []float64 {
	var out []float64
	for _, v := range x {
		if !math.IsNaN(v) {
			out = append(out, v)
		}
	}
	return out
}
