package study

import (
	"fmt"
	"math"
	"strings"

	"afterbeat/data"
	"afterbeat/data/beat"
	"afterbeat/data/casenote"
	"afterbeat/fitting/estimate"
	"afterbeat/fitting/harmonic"
)

// Waves are the forward and the backward wave of the average beat, with what is
// read off them.
type Waves struct {
	harmonic.Waves
	ZcFrom string // where their characteristic impedance comes from
	// Magnitude and ReturnTime with intervals of random error, from blocks of beats
	// left out in turn.
	Magnitude, ReturnTime data.Estimate
}

// impedance is the input impedance of the beats; nil without a flow.
func impedance(b Beats) []harmonic.Harmonic {
	if b.Flow.Count == 0 || b.Pressure.Count == 0 {
		return nil
	}
	return harmonic.Impedance(b.Ensemble.Beats[0], b.Ensemble.Beats[1], b.Ensemble.Rate)
}

// waves tells the waves apart with the mean modulus of the impedance, or where
// that does not apply with the Zc of the fit in use.
func (f Fit) waves() Waves {
	zc, from := f.zcOfWaves()
	if from == "" {
		return Waves{Waves: harmonic.WithoutWaves("no characteristic impedance is known: the mean modulus of Z does not apply, and the fit in use identifies none")}
	}
	b := f.Beats
	w := Waves{Waves: harmonic.Separate(b.Pressure.Period, b.Flow.Period, zc), ZcFrom: from}
	if w.Reason != "" {
		return w
	}
	left := harmonic.LeaveOut(b.Ensemble.Beats[0], b.Ensemble.Beats[1], b.Ensemble.Rate, zc, leftOutBlock(b))
	magnitudes, times := make([]float64, len(left)), make([]float64, len(left))
	for i, one := range left {
		magnitudes[i], times[i] = one.Magnitude, one.ReturnTime
	}
	w.Magnitude, w.ReturnTime = scattered(w.Waves.Magnitude, magnitudes), scattered(w.Waves.ReturnTime, times)
	return w
}

// scattered is a value with the interval of its scatter, which does not reach
// below 0.
func scattered(v float64, leftOut []float64) data.Estimate {
	i := beat.JackknifeInterval(v, leftOut)
	i.Low = max(0, i.Low)
	return data.Estimate{Value: v, Total: data.NoInterval(), Random: i, Identified: true, Why: "calibration, delay and Zc are not in it"}
}

// leftOutBlock is how many successive beats are left out at a time: three, or a
// breath of 4 s, whichever is longer; one where that leaves fewer than four blocks.
func leftOutBlock(b Beats) int {
	block := max(3, int(math.Ceil(4/b.Pressure.Period.Duration())))
	if len(b.Ensemble.Used)/block < 4 {
		return 1
	}
	return block
}

func (f Fit) zcOfWaves() (zc float64, from string) {
	for _, e := range f.Estimators {
		if e.Name == estimate.ZcModulus && e.Reason == "" {
			return e.Zc, "mean modulus of Z, " + e.Remark
		}
	}
	if f.Chosen < 0 {
		return math.NaN(), ""
	}
	r := f.Results[f.Chosen]
	if p, ok := r.Parameter("Zc"); ok && p.Identified {
		return p.Value, "fit of " + r.Model.Name
	}
	return math.NaN(), ""
}

// impedanceSection shows the impedance harmonic by harmonic, and the waves.
func (f Fit) impedanceSection() casenote.Section {
	s := casenote.Section{
		Title: "Input impedance and waves",
		Words: words("Z = P/Q of the average beat, harmonic by harmonic; a negative phase is a pressure that lags. The scatter is the standard deviation over the beats. Waves: P+- = (P +- Zc Q)/2."),
	}
	t := casenote.Table{Header: []string{"harmonic", "at, Hz", "modulus, " + f.unitOf("R"), "scatter, in it", "phase, degrees", "scatter, degrees"}}
	var hidden []int
	for _, h := range f.Impedance {
		if !h.Shown {
			hidden = append(hidden, h.K)
			continue
		}
		t.Rows = append(t.Rows, []casenote.Cell{
			{Words: data.Clean(fmt.Sprint(h.K))}, plain(h.Frequency), plain(h.Modulus()), orDash(h.ModulusSD), plain(degrees(h.Phase())), orDash(degrees(h.PhaseSD)),
		})
	}
	if len(hidden) > 0 {
		t.Foot = "Left out, since their flow does not stand out of its scatter: harmonics " + runs(hidden) + "."
	}
	s.Tables = []casenote.Table{t}
	w := f.Waves
	if w.Reason != "" {
		s.Rows = append(s.Rows, casenote.Words("waves", "not told apart: "+w.Reason))
		return s
	}
	s.Rows = append(s.Rows,
		casenote.Words("told apart with", fmt.Sprintf("Zc %s %s (%s)", casenote.Format(w.Zc, data.NoInterval()), f.unitOf("R"), w.ZcFrom)),
		casenote.Quantity("reflection magnitude, swing of P-", inNote(w.Magnitude), "of P+", data.Estimated),
		casenote.Quantity("return time of P-", inNote(w.ReturnTime), "s", data.Estimated))
	return s
}

// runs writes rising numbers, those in a row as the first and the last: 9, 11 to 20.
func runs(numbers []int) string {
	var parts []string
	for i := 0; i < len(numbers); {
		j := i
		for j+1 < len(numbers) && numbers[j+1] == numbers[j]+1 {
			j++
		}
		part := fmt.Sprint(numbers[i])
		if j > i {
			part += fmt.Sprintf(" to %d", numbers[j])
		}
		parts = append(parts, part)
		i = j + 1
	}
	return strings.Join(parts, ", ")
}

// inNote is an estimate whose interval of random error stands for both.
func inNote(e data.Estimate) data.Estimate {
	e.Total = e.Random
	return e
}

func degrees(rad float64) float64 { return rad * 180 / math.Pi }

// HarmonicReport is one harmonic of the input impedance.
type HarmonicReport struct {
	K           int     `json:"k"`
	Frequency   Number  `json:"frequency_hz"`
	Modulus     Number  `json:"modulus"`
	ModulusSD   Number  `json:"modulus_sd"`
	Phase       Number  `json:"phase_deg"`
	PhaseSD     Number  `json:"phase_sd_deg"`
	Pressure    Number  `json:"pressure_amplitude_mmHg"`
	Flow        Number  `json:"flow_amplitude"`
	FlowScatter Number  `json:"flow_scatter"`
	Reason      *string `json:"reason"` // why it is not shown, and has no impedance
}

// WavesReport is the wave separation.
type WavesReport struct {
	Zc         Number         `json:"Zc"`
	ZcFrom     *string        `json:"Zc_from"`
	Magnitude  EstimateReport `json:"reflection_magnitude"`
	ReturnTime EstimateReport `json:"return_time_s"`
	Reason     *string        `json:"reason"`
}

func impedanceReport(all []harmonic.Harmonic) []HarmonicReport {
	out := []HarmonicReport{}
	for _, h := range all {
		r := HarmonicReport{
			K: h.K, Frequency: Number(h.Frequency), Modulus: nan, Phase: nan,
			ModulusSD: Number(h.ModulusSD), PhaseSD: Number(degrees(h.PhaseSD)),
			Pressure: Number(2 * abs(h.Pressure)), Flow: Number(2 * abs(h.Flow)), FlowScatter: Number(2 * h.FlowScatter), Reason: reason(h.Reason),
		}
		if h.Shown {
			r.Modulus, r.Phase = Number(h.Modulus()), Number(degrees(h.Phase()))
		}
		out = append(out, r)
	}
	return out
}

func abs(z complex128) float64 { return math.Hypot(real(z), imag(z)) }

func (f Fit) wavesReport() *WavesReport {
	if f.Impedance == nil {
		return nil
	}
	w := f.Waves
	r := &WavesReport{Zc: Number(w.Zc), ZcFrom: reason(w.ZcFrom), Reason: reason(w.Reason)}
	r.Magnitude, r.ReturnTime = estimateReport(w.Magnitude), estimateReport(w.ReturnTime)
	if w.Reason != "" {
		none := data.Estimate{Value: math.NaN(), Total: data.NoInterval(), Random: data.NoInterval(), Why: w.Reason}
		r.Magnitude, r.ReturnTime = estimateReport(none), estimateReport(none)
	}
	return r
}
