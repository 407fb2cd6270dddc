package support

import "math"

// Modulation is a speed that changes over time: one period of rows in even
// steps, linear between them and from the last round to the first.
type Modulation struct {
	Speeds []float64 // 1000/min
	Step   float64   // s
}

// Period is the time after which the speeds come again, s.
func (m *Modulation) Period() float64 { return float64(len(m.Speeds)) * m.Step }

// Mean is the mean speed, 1000/min.
func (m *Modulation) Mean() float64 {
	sum := 0.0
	for _, n := range m.Speeds {
		sum += n
	}
	return sum / float64(len(m.Speeds))
}

// At is the speed at a time of 0 s or more, 1000/min.
func (m *Modulation) At(t float64) float64 {
	rows := len(m.Speeds)
	whole, part := math.Modf(t / m.Step)
	i := int(whole) % rows
	return m.Speeds[i] + part*(m.Speeds[(i+1)%rows]-m.Speeds[i])
}

// next is the time of the first row after t, s.
func (m *Modulation) next(t float64) float64 {
	row := math.Floor(t/m.Step) + 1
	if at := row * m.Step; at > t {
		return at
	}
	return (row + 1) * m.Step
}
