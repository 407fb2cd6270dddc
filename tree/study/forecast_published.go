package study

import (
	"errors"
	"fmt"
	"math"

	"afterbeat/data/beat"
	"afterbeat/tree/support"
)

// published sets the nominal forecast beside published ranges of patients with
// durable pumps: mean +- 2 SD, or the interquartile range widened by half. They
// say what is plausible; a patient may well lie outside.
func (f *Forecast) published(k *support.Coupled) ([]PublishedCheck, error) {
	p := &publishing{forecast: f, coupled: k, native: drawnOf(&f.Native.CoupledState)}
	p.paired()
	p.step()
	p.atFive()
	p.power()
	p.valve()
	return p.all, p.err
}

// publishing collects the checks.
type publishing struct {
	forecast *Forecast
	coupled  *support.Coupled
	native   drawn
	all      []PublishedCheck
	err      error
}

// at is the state at a speed.
func (p *publishing) at(speed float64) drawn {
	s, err := p.coupled.At(speed)
	p.err = errors.Join(p.err, err)
	return drawnOf(&s)
}

// where finds the speed at which the output is that, mL/s; why says why there is
// none.
func (p *publishing) where(output float64) (speed float64, why string) {
	low, high := p.forecast.Pump.Low/2, p.forecast.farthest()
	switch {
	case p.native[drawnOutput] >= output:
		return math.NaN(), "the native output is higher"
	case p.at(high)[drawnOutput] < output:
		return math.NaN(), fmt.Sprintf("not reached up to %.4g", high)
	case p.at(low)[drawnOutput] > output:
		return math.NaN(), fmt.Sprintf("exceeded from %.3g on", low)
	}
	for high-low > 1e-3*high {
		middle := (low + high) / 2
		if p.at(middle)[drawnOutput] < output {
			low = middle
		} else {
			high = middle
		}
	}
	return (low + high) / 2, ""
}

func (p *publishing) add(name, unit, at string, value, low, high float64, source, why string) {
	p.all = append(p.all, PublishedCheck{name, unit, at, value, low, high, source, why})
}

const (
	sourcePaired  = "8 patients before and after, finger cuff, mixed pumps: Eur J Heart Fail 2021;23:1955"
	sourceAxial   = "21 patients, 8900 to 9800/min: Physiol Res, doi 10.33549/physiolres.934738, -24 %, and 13 patients: 26 to 17 mmHg"
	sourceRamp    = "35 patients, ramp: JACC Heart Fail 2016;4:208"
	sourceHigh    = "13 patients at 10480/min, axial: 17 +- 7 mmHg"
	sourcePower   = "71 patients on support, invasive: ASAIO J 2023;69:445"
	sourceClosing = "pumps of this kind shut the valve within their range: common practice"
)

// paired holds the forecast against the paired study, at its rise of output.
func (p *publishing) paired() {
	const rise = 1.29 / litresPerMinute // mL/s
	speed, why := p.where(p.native[drawnOutput] + rise)
	pulse, mean, where := math.NaN(), math.NaN(), "output +1.29 L/min"
	if why == "" {
		now := p.at(speed)
		pulse, mean = now[drawnPulse]-p.native[drawnPulse], now[drawnMean]-p.native[drawnMean]
		where = fmt.Sprintf("output +1.29 L/min, at %.3g", speed)
	}
	p.add("change of pulse pressure", "mmHg", where, pulse, -45, -5, sourcePaired, why)
	p.add("change of mean pressure", "mmHg", where, mean, 0, 32, sourcePaired, why)
}

// step holds two changes of speed, the same share of the pump's range for all,
// against studies at several speeds.
func (p *publishing) step() {
	long, short := 0.9, 0.4
	if p.forecast.Pump.Centrifugal {
		long, short = 0.29, 0.1
	}
	from := (p.forecast.Pump.Low + p.forecast.Pump.High) / 2 * 8.9 / 9
	start, end, next := p.at(from), p.at(from+long), p.at(from+short)
	p.add("pulse pressure after a rise of speed", "%", fmt.Sprintf("%.3g to %.3g", from, from+long),
		100*(end[drawnPulse]/start[drawnPulse]-1), -45, -10, sourceAxial, "")
	where := fmt.Sprintf("%.3g to %.3g", from, from+short)
	p.add("output after a step of speed", "L/min", where, litresPerMinute*(next[drawnOutput]-start[drawnOutput]), 0, 0.55, sourceRamp, "")
	p.add("filling pressure after a step of speed", "mmHg", where, next[drawnFilling]-start[drawnFilling], -3, 0, sourceRamp, "")
}

// atFive holds the pulse at 5 L/min against patients at high speed.
func (p *publishing) atFive() {
	const output = 5 / litresPerMinute // mL/s
	speed, why := p.where(output)
	pulse, where := math.NaN(), "output 5 L/min"
	if why == "" {
		pulse, where = p.at(speed)[drawnPulse], fmt.Sprintf("output 5 L/min, at %.3g", speed)
	}
	p.add("pulse pressure", "mmHg", where, pulse, 3, 31, sourceHigh, why)
}

// power holds the pulsatile power index of pressure in the middle of the pump's
// range against patients at the speeds they live with.
func (p *publishing) power() {
	speed := (p.forecast.Pump.Low + p.forecast.Pump.High) / 2
	w, err := p.coupled.Waves(speed, len(p.forecast.Native.Waves.Pressure.Samples))
	if err != nil {
		p.err = errors.Join(p.err, err)
		return
	}
	p.add("pulsatile power index, pressure", "", fmt.Sprintf("%.3g", speed), beat.Measure(w.Pressure).PulsatilePower, 0.001, 0.02, sourcePower, "")
}

// valve holds the valve limit against the range of the pump.
func (p *publishing) valve() {
	f := p.forecast
	why := ""
	if math.IsNaN(f.ValveLimit.Value) {
		why = f.ValveLimit.Why
	}
	p.add("valve limit", "1000/min", "the pump's range", f.ValveLimit.Value, f.Pump.Low, f.Pump.High, sourceClosing, why)
}
