package study

import (
	"context"
	"flag"
	"fmt"
	"io/fs"
	"math"
	"math/rand/v2"
	"os"
	"strings"
	"sync"
	"testing"

	"afterbeat/data"
	"afterbeat/data/casefile"
	"afterbeat/data/casenote"
	"afterbeat/data/demo"
)

// A check of a property is one or two whole studies here; -rapid.checks asks for
// more of them.
func TestMain(m *testing.M) {
	if err := flag.Set("rapid.checks", "25"); err != nil {
		panic(err)
	}
	os.Exit(m.Run())
}

func ptr[T any](v T) *T { return &v }

// few replicates, where a test does not look at intervals, and one share.
const few = 40

// fewest replicates, where a forecast is wanted without its intervals.
const fewest = 4

// folder holds the files that a case may name.
type folder map[string]string

func (f folder) read(name string) ([]byte, error) {
	content, ok := f[name]
	if !ok {
		return nil, &data.FileError{File: name, What: "cannot be read"}
	}
	return []byte(content), nil
}

// demoFolder holds the demo, and further files beside it.
func demoFolder(t testing.TB) folder {
	t.Helper()
	f, err := demoFiles()
	if err != nil {
		t.Fatal(err)
	}
	return f
}

func demoFiles() (folder, error) {
	f := folder{}
	for _, name := range []string{demo.CaseName, demo.RecordingName} {
		content, err := fs.ReadFile(demo.Files(), name)
		if err != nil {
			return nil, err
		}
		f[name] = string(content)
	}
	return f, nil
}

// demoCase is the demo's case with few replicates, one share and one speed.
func demoCase(t testing.TB) casefile.Case {
	t.Helper()
	c, err := demoChoices(demoFolder(t))
	if err != nil {
		t.Fatal(err)
	}
	return c
}

func demoChoices(f folder) (casefile.Case, error) {
	c, err := casefile.Read(demo.CaseName, []byte(f[demo.CaseName]))
	c.Replicates, c.Share, c.Speed = ptr(few), []float64{0.5}, []float64{9}
	return c, err
}

// try computes a case up to and with the stage last.
func try(c casefile.Case, f folder, last Stage) (Study, error) {
	in, err := Read(c, f.read)
	if err != nil {
		return Study{}, err
	}
	return Run(context.Background(), in, last)
}

// whole computes a case.
func whole(t testing.TB, c casefile.Case, f folder) Study {
	t.Helper()
	s, err := try(c, f, StageDone)
	if err != nil {
		t.Fatal(err)
	}
	return s
}

// fitted computes a case without its forecast, which takes the longest.
func fitted(t testing.TB, c casefile.Case, f folder) Study {
	t.Helper()
	s, err := try(c, f, StageSupport)
	if err != nil {
		t.Fatal(err)
	}
	return s
}

// demoFitted is [demoWith] without the forecast.
func demoFitted(t testing.TB, change func(*casefile.Case)) Study {
	t.Helper()
	c := demoCase(t)
	change(&c)
	return fitted(t, c, demoFolder(t))
}

// demoWith computes the demo as change makes its case.
func demoWith(t testing.TB, change func(*casefile.Case)) Study {
	t.Helper()
	c := demoCase(t)
	change(&c)
	return whole(t, c, demoFolder(t))
}

// sharedDemo is the demo's whole study, computed once, for tests that do not
// change what they look at.
func sharedDemo(t testing.TB) Study {
	t.Helper()
	s, err := computedDemo()
	if err != nil {
		t.Fatal(err)
	}
	return s
}

var computedDemo = sync.OnceValues(func() (Study, error) {
	f, err := demoFiles()
	if err != nil {
		return Study{}, err
	}
	c, err := demoChoices(f)
	if err != nil {
		return Study{}, err
	}
	return try(c, f, StageDone)
})

// chosen is the fit that goes downstream.
func chosen(t testing.TB, s Study) (r, c, zc float64) {
	t.Helper()
	if s.Fit == nil || s.Fit.Chosen < 0 {
		t.Fatalf("no fit was chosen: %q", *s.Reason())
	}
	v := s.Fit.Results[s.Fit.Chosen].Values
	return v.R, v.C, v.Zc
}

// near tells whether got is within part of want.
func near(got, want, part float64) bool { return math.Abs(got-want) <= part*math.Abs(want) }

// The half-sine beat on a three-element load: flow Qm sin(pi t/Ts) up to Ts,
// then none, period T, and its pressure in closed form (the worked example 2 of
// the project's reference values, computed there from the equation of Westerhof
// 1969: C dPc/dt + Pc/R = Q, P = Pc + Zc Q, periodic).
const (
	halfR, halfC, halfZc = 1.0, 1.5, 0.05
	halfT, halfTs        = 0.8, 0.3
	halfQm               = math.Pi * 70 / (2 * halfTs)
)

func halfFlow(at float64) float64 {
	if t := phase(at); t < halfTs {
		return max(0, halfQm*math.Sin(math.Pi*t/halfTs))
	}
	return 0
}

func halfPressure(at float64) float64 {
	const tau, a = halfR * halfC, math.Pi / halfTs
	k := halfQm / halfC / (1/(tau*tau) + a*a)
	start := k * a * (1 + math.Exp(-halfTs/tau)) * math.Exp(-(halfT-halfTs)/tau) / (1 - math.Exp(-halfT/tau))
	systole := func(t float64) float64 {
		return start*math.Exp(-t/tau) + k*(math.Sin(a*t)/tau-a*math.Cos(a*t)+a*math.Exp(-t/tau))
	}
	t := phase(at)
	if t < halfTs {
		return systole(t) + halfZc*halfFlow(at)
	}
	return systole(halfTs) * math.Exp(-(t-halfTs)/tau)
}

// phase is the time since the beat began, s. The hair keeps a rounded multiple
// of the period from falling before it.
func phase(at float64) float64 {
	return math.Mod(math.Mod(at+1e-9, halfT)+halfT, halfT)
}

// column is one channel of an invented file.
type column struct {
	header string
	at     func(t float64) float64
}

// table writes a recording of so many samples at a rate, Hz.
func table(rate float64, samples int, columns ...column) string {
	var b strings.Builder
	b.WriteString("time_s")
	for _, c := range columns {
		b.WriteString("," + c.header)
	}
	for i := range samples {
		at := float64(i) / rate
		fmt.Fprintf(&b, "\n%v", at)
		for _, c := range columns {
			fmt.Fprintf(&b, ",%v", c.at(at))
		}
	}
	return b.String() + "\n"
}

// emptied is a table whose samples from <= i < to have no values.
func emptied(table string, from, to int) string {
	lines := strings.Split(table, "\n")
	for i := from + 1; i <= to; i++ {
		at, values, _ := strings.Cut(lines[i], ",")
		lines[i] = at + "," + strings.Repeat(",", strings.Count(values, ","))
	}
	return strings.Join(lines, "\n")
}

// noisy adds white noise of the given standard deviation, the same every time.
func noisy(f func(float64) float64, sd float64) func(float64) float64 {
	random := rand.New(rand.NewPCG(7, 7))
	return func(at float64) float64 { return f(at) + sd*random.NormFloat64() }
}

func scaled(f func(float64) float64, scale, shift float64) func(float64) float64 {
	return func(at float64) float64 { return scale*f(at) + shift }
}

func steady(v float64) func(float64) float64 { return func(float64) float64 { return v } }

// invented is 20 s of the half-sine beat at 200 Hz, in the named columns.
func invented(columns ...column) folder { return folder{"a.csv": table(200, 4000, columns...)} }

// aortic and outflow are the pressure and the flow of the half-sine beat, with
// a little noise.
func aortic(header string) column    { return column{header, noisy(halfPressure, 0.3)} }
func outflowTo(header string) column { return column{header, noisy(halfFlow, 1)} }

// inventedCase is a case of the invented recording.
func inventedCase() casefile.Case {
	return casefile.Case{Recording: "a.csv", Replicates: ptr(few), Share: []float64{0.5}, Speed: []float64{9}}
}

// code tells whether a warning of this code is among those of the study.
func warned(s Study, code data.Code) (data.Warning, bool) {
	for _, w := range s.Warnings() {
		if w.Code == code {
			return w, true
		}
	}
	return data.Warning{}, false
}

// defaults are the options of a note on a screen.
var defaults = casenote.Options{}
