package study

import (
	"fmt"
	"math"

	"afterbeat/data"
	"afterbeat/data/casefile"
	"afterbeat/tree/support"
)

// modulation is what the case says of a speed that changes over time.
type modulation struct {
	file        *support.Modulation // nil: a shape
	name        string              // of the file, or of the shape
	low, high   float64             // 1000/min, of a shape
	rise        float64             // s, of a square
	duty, phase float64             // parts of its period
	period      float64             // s; 0: locked
	locked      int                 // beats of its period; 0: free
	auto        bool                // locked where the period of a file comes near to whole beats
}

// What a modulation by a shape has where the case does not say (assumptions).
const (
	standardRise = 0.05 // s
	standardDuty = 0.5
	shapeRows    = 64
	mostLocked   = 20
)

// modulationOf reads the modulation of the case; nil where there is none.
func (f *Forecast) modulationOf(c casefile.Case) (*modulation, error) {
	if len(c.Modulation) == 0 {
		return nil, nil
	}
	own, err := numbersOf("modulation", c.Modulation)
	if err != nil {
		return nil, err
	}
	m := &modulation{rise: standardRise, duty: standardDuty, locked: 1}
	if locked, ok := own["locked"]; ok {
		if locked != math.Round(locked) || locked < 0 || locked > mostLocked {
			return nil, &ChoiceError{Key: "modulation.locked", What: fmt.Sprintf("%v is no number of beats from 0 to %d", locked, mostLocked), Hint: "1: every beat; n: every n-th; 0: free"}
		}
		m.locked = int(locked)
	}
	if c.Modulation["file"] != "" {
		_, given := own["locked"]
		return m, m.ofFile(c, f.Comparison.Fit.Beats.Intake.Modulation, !given)
	}
	return m, m.ofShape(c, own, farBeyond*f.Pump.High)
}

// ofFile takes the speeds of a file.
func (m *modulation) ofFile(c casefile.Case, read *support.Modulation, auto bool) error {
	if c.Modulation["shape"] != "" {
		return &ChoiceError{Key: "modulation.shape", What: "a file and a shape both say how the speed changes", Hint: "leave one of them out"}
	}
	m.name, m.file, m.auto = baseName(c.Modulation["file"]), read, auto
	if read == nil {
		return &ChoiceError{Key: "modulation", What: "its file was not read", Hint: "open the case again"}
	}
	return nil
}

// ofShape takes a sine or a square; most is the highest speed there may be.
func (m *modulation) ofShape(c casefile.Case, own map[string]float64, most float64) error {
	if m.name = c.Modulation["shape"]; m.name != "sine" && m.name != "square" {
		return &ChoiceError{Key: "modulation.shape", What: fmt.Sprintf("%q is no shape", data.Clean(m.name)), Hint: "sine or square, for instance --modulation shape=sine --modulation low=8 --modulation high=10; or a file"}
	}
	m.low, m.high = own["low"], own["high"]
	if !(m.low > 0 && m.high >= m.low && m.high <= most) {
		return &ChoiceError{Key: "modulation", What: fmt.Sprintf("low and high, %v and %v, are no speeds between 0 and %g", m.low, m.high, most), Hint: "in 1000/min, for instance --modulation low=8 --modulation high=10"}
	}
	for name, into := range map[string]*float64{"rise_s": &m.rise, "duty": &m.duty, "phase": &m.phase, "period_s": &m.period} {
		if v, ok := own[name]; ok {
			*into = v
		}
	}
	free := m.locked == 0
	switch {
	case !(m.rise >= 0):
		return &ChoiceError{Key: "modulation.rise_s", What: fmt.Sprintf("%v is no time", m.rise), Hint: "the time of a change of speed, s, for instance 0.05"}
	case !(m.duty > 0 && m.duty < 1):
		return &ChoiceError{Key: "modulation.duty", What: fmt.Sprintf("%v is not between 0 and 1", m.duty), Hint: "the part of the period at the higher speed"}
	case !(m.phase >= 0 && m.phase <= 1):
		return &ChoiceError{Key: "modulation.phase", What: fmt.Sprintf("%v is not between 0 and 1", m.phase), Hint: "the part of the period by which it is late behind the start of contraction"}
	case free != (m.period > 0):
		return &ChoiceError{Key: "modulation.period_s", What: "a free modulation has a period of its own, one that is locked has not", Hint: "locked=0 with period_s, or neither"}
	}
	return nil
}

// at is the modulation at a heart period, s, and the beats that it is locked to;
// 0: free.
func (m *modulation) at(heart float64) (support.Modulation, int, error) {
	locked := m.locked
	if m.file != nil {
		out := *m.file
		beats := out.Period() / heart
		whole := max(1, math.Round(beats))
		if m.auto {
			locked = 0
			if math.Abs(beats/whole-1) <= 0.01 && whole <= mostLocked {
				locked = int(whole)
			}
		}
		if locked > 0 && math.Abs(beats/float64(locked)-1) <= 0.02 { // the period of a draw is a little another
			out.Step = float64(locked) * heart / float64(len(out.Speeds))
		}
		return out, locked, nil
	}
	period := m.period
	if locked > 0 {
		period = float64(locked) * heart
	}
	if m.name == "square" && (m.rise > m.duty*period || m.rise > (1-m.duty)*period) {
		return support.Modulation{}, 0, &ChoiceError{Key: "modulation.rise_s", What: fmt.Sprintf("a rise of %.3g s does not fit into a period of %.3g s", m.rise, period), Hint: "a shorter one"}
	}
	out := support.Modulation{Step: period / shapeRows}
	for i := range shapeRows {
		part := math.Mod(float64(i)/shapeRows-m.phase+1, 1)
		out.Speeds = append(out.Speeds, m.low+(m.high-m.low)*m.level(part, period))
	}
	return out, locked, nil
}

// level is the speed at a part of the period, 0 for low and 1 for high.
func (m *modulation) level(part, period float64) float64 {
	if m.name == "sine" {
		return (1 + math.Sin(2*math.Pi*part)) / 2
	}
	if m.rise == 0 {
		if part < m.duty {
			return 1
		}
		return 0
	}
	up, down := part*period/m.rise, (part-m.duty)*period/m.rise
	return min(max(0, up), 1) - min(max(0, down), 1)
}

// words say how the speed changes.
func (m *modulation) words(low, high float64, locked int) string {
	how := "locked to every beat"
	switch {
	case locked == 0:
		how = "free of the beat"
	case locked > 1:
		how = fmt.Sprintf("one period in %d beats", locked)
	}
	text := fmt.Sprintf("%s, %.4g to %.4g (1000/min), %s", m.name, low, high, how)
	if m.name == "square" && m.file == nil {
		text += fmt.Sprintf(", high for %.3g of its period, rising and falling in %.3g s", m.duty, m.rise)
	}
	if m.phase > 0 {
		text += fmt.Sprintf(", late by %.3g of its period", m.phase)
	}
	return text
}
