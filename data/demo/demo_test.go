package demo

import (
	"encoding/csv"
	"io/fs"
	"math"
	"slices"
	"strconv"
	"strings"
	"testing"

	"afterbeat/data"
	"afterbeat/data/casenote"
	"afterbeat/data/doppler"
)

func content(t *testing.T, name string) string {
	t.Helper()
	b, err := fs.ReadFile(Files(), name)
	if err != nil {
		t.Fatal(err)
	}
	return string(b)
}

// columns are time, pressure and velocity as the file has them.
func columns(t *testing.T) (columns [3][]float64) {
	t.Helper()
	r := csv.NewReader(strings.NewReader(content(t, RecordingName)))
	r.Comment = '#'
	rows, err := r.ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	if got := strings.Join(rows[0], " "); got != "time_s aortic_pressure_mmHg lvot_velocity_cm_s" {
		t.Fatalf("header %q", got)
	}
	for _, row := range rows[1:] {
		for i := range columns {
			x, err := strconv.ParseFloat(row[i], 64)
			if err != nil {
				t.Fatal(err)
			}
			columns[i] = append(columns[i], x)
		}
	}
	return columns
}

// onsets are the samples where the velocity passes 20 cm/s upward, some 15 ms
// after the foot, after more than 0.1 s below.
func onsets(velocity []float64, rate float64) []int {
	var all []int
	below := 0
	for i, v := range velocity {
		if v < 20 {
			below++
			continue
		}
		if float64(below) > 0.1*rate {
			all = append(all, i)
		}
		below = 0
	}
	return all
}

func within(t *testing.T, what string, got, low, high float64) {
	t.Helper()
	if !(got >= low && got <= high) {
		t.Errorf("%s is %.4g, not within %g to %g", what, got, low, high)
	}
}

func TestFilesSayThatTheyAreInvented(t *testing.T) {
	recording := content(t, RecordingName)
	if !strings.HasPrefix(recording, "# invented data: no patient, made by cmd/demodata, seed ") {
		t.Errorf("the recording begins %q", recording[:60])
	}
	lines := strings.Split(content(t, CaseName), "\n")
	if lines[0] != "# "+casenote.Caution || !strings.Contains(lines[1], "invented: no patient") {
		t.Errorf("the case file begins %q, %q", lines[0], lines[1])
	}
}

func TestRecordingIsEvenAndRounded(t *testing.T) {
	all := columns(t)
	for i := range all[0] {
		if got, want := all[0][i], float64(i)/Truth().Rate; math.Abs(got-want) > 1e-9 {
			t.Fatalf("row %d is at %v s, want %v", i, got, want)
		}
		for _, x := range []float64{all[1][i], all[2][i]} {
			if math.Abs(10*x-math.Round(10*x)) > 1e-9 {
				t.Fatalf("row %d: %v has more than one decimal", i, x)
			}
		}
	}
}

// R 0.6-1.8 mmHg s/mL and C 0.5-2.0 mL/mmHg: human pathophysiological range of
// Segers, Stergiopulos and Westerhof, Am J Physiol 2002;282:H1041. C in dilated
// cardiomyopathy 1.57 +- 0.72: Laskey et al., J Appl Physiol 1990;69:112. Zc
// between 0.035 of normals (Murgo et al., Circulation 1980;62:105) and 0.15 of
// hypertensives with coronary disease (Nichols et al., Circ Res 1977;40:451).
func TestTruthIsPlausible(t *testing.T) {
	p := Truth()
	within(t, "R", p.R, 0.6, 1.8)
	within(t, "C", p.C, 0.5, 2.0)
	within(t, "C in dilated cardiomyopathy", p.C, 1.57-0.72, 1.57+0.72)
	within(t, "Zc", p.Zc, 0.035, 0.152)
	within(t, "delay", p.Delay, 0.005, 0.060)
}

// An outflow tract has a velocity-time integral of 16 +- 3 cm in health (n = 156,
// PubMed 8685522); in a failing heart it is less. Output is within 3.3-8.2 L/min
// (limits of either sex, n = 3090, HAL 03579647). The energy equivalent pressure
// exceeds the mean by an order of 10 mmHg (harmonic analysis, Artif Organs 2021).
// The other ranges are what the demo was meant to be.
func TestRecordingIsPlausible(t *testing.T) {
	p := Truth()
	all := columns(t)
	late := int(math.Round(p.Delay * p.Rate))
	pressure, velocity := all[1][late:], all[2][:len(all[2])-late]
	beats := onsets(velocity, p.Rate)
	conversion, err := doppler.NewConversion(doppler.Settings{Diameter: p.Diameter, Site: data.SiteLVOT})
	if err != nil {
		t.Fatal(err)
	}
	flow := conversion.Flow(velocity)

	var intervals, pulses, integrals []float64
	for k := range len(beats) - 1 {
		from, to := beats[k], beats[k+1]
		intervals = append(intervals, float64(to-from)/p.Rate)
		pulses = append(pulses, slices.Max(pressure[from:to])-slices.Min(pressure[from:to]))
		integrals = append(integrals, mean(velocity[from:to])*float64(to-from)/p.Rate)
	}
	within(t, "heart rate, 1/min", 60/median(intervals), 80, 85)
	within(t, "pulse pressure, mmHg", median(pulses), 35, 40)
	within(t, "velocity-time integral, cm", median(integrals), 16-2*3, 16)

	first, last := beats[0], beats[len(beats)-1]
	meanPressure, meanFlow := mean(pressure[first:last]), mean(flow[first:last])
	within(t, "mean pressure, mmHg", meanPressure, 75, 80)
	within(t, "output, L/min", meanFlow*0.06, 3.8, 4.2)
	within(t, "output against its limits, L/min", meanFlow*0.06, 3.3, 8.2)

	power := 0.0
	for i := first; i < last; i++ {
		power += pressure[i] * flow[i] / float64(last-first)
	}
	within(t, "energy equivalent less mean pressure, mmHg", power/meanFlow-meanPressure, 5, 20)

	// Means alone give the total resistance, R + Zc, but for the storage of C.
	within(t, "total resistance found over true", (meanPressure-p.OutflowPressure)/meanFlow/(p.R+p.Zc), 0.99, 1.01)
}

func TestRecordingHasItsBeats(t *testing.T) {
	p := Truth()
	velocity := columns(t)[2]
	beats := onsets(velocity, p.Rate)
	if len(beats) != p.Beats+1 {
		t.Fatalf("%d onsets, want %d beats and the onset that ends them", len(beats), p.Beats)
	}
	interval := func(k int) float64 { return float64(beats[k+1]-beats[k]) / p.Rate }
	peak := func(k int) float64 { return slices.Max(velocity[beats[k]:beats[k+1]]) }
	for k := range p.Beats {
		switch k {
		case p.Ectopic - 1:
			within(t, "interval before the premature beat, s", interval(k), 0.4, 0.6*p.Period+0.03)
		case p.Ectopic:
			within(t, "interval after the premature beat, s", interval(k), 1.3*p.Period, 1.5*p.Period)
			within(t, "both intervals, s", interval(k-1)+interval(k), 2*p.Period-0.02, 2*p.Period+0.02)
			within(t, "peak of the premature beat, cm/s", peak(k), 30, 55)
		case p.Ectopic + 1:
			within(t, "peak of the beat after the pause, cm/s", peak(k), 90, 110)
		default:
			within(t, "interval, s", interval(k), 0.95*p.Period, 1.05*p.Period)
			within(t, "peak, cm/s", peak(k), 65, 85)
		}
	}
}

func mean(x []float64) float64 {
	sum := 0.0
	for _, v := range x {
		sum += v
	}
	return sum / float64(len(x))
}

func median(x []float64) float64 {
	sorted := slices.Sorted(slices.Values(x))
	return sorted[len(sorted)/2]
}
