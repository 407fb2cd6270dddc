package study

import (
	"afterbeat/data"
	"afterbeat/tree/support"
)

// Forecast is the coupled state of a ventricle, a pump and the fitted load: what
// would be left of the pulse with the pump at a speed, as far as the arteries
// stay as they are. The ventricle is set up so that natively it ejects what was
// measured; what the traces do not fix of it is drawn from stated ranges, inside
// every total interval.
type Forecast struct {
	Comparison Comparison
	// Ventricle are the parameters of the ventricle, the filling line included,
	// in the order of a table.
	Ventricle []VentricleParameter
	Pump      ForecastPump
	// Native is the state of the model without a pump: Speed 0.
	Native ForecastState
	// Speeds has one state a speed above 0, rising.
	Speeds []ForecastState
	// Middle is the index in Speeds of the state that stands for the forecast in
	// few words.
	Middle int
	// ValveLimit is the lowest speed at which the aortic valve stays shut,
	// 1000/min. NaN, with the reason, where there is none.
	ValveLimit data.Estimate
	// Sensitivity is what one assumption at a time does to the retained pulse of
	// the middle state, the largest effect first.
	Sensitivity []ForecastSensitivity
	// Mismatch sets the native state of the model beside what was measured.
	Mismatch []Mismatch
	// Held is what is the same at every speed.
	Held []ForecastHeld
	// Matching is what was made equal to the native state at every speed.
	Matching Matching
	// Published sets the forecast beside published ranges.
	Published []PublishedCheck
	// Disproof is the one bedside measurement that would prove the forecast
	// wrong, in a sentence.
	Disproof string
	Draws    int    // of each kind of interval
	Reason   string // why there is no forecast; empty where there is one
	Warnings []data.Warning

	// Modulated is the state under a speed that changes over time; nil: none was
	// asked for.
	Modulated *ForecastModulated

	match      matching
	modulation *modulation
	own        ownVentricle
	drawn      *drawing         // what the draws are made from; nil: no forecast
	nominal    support.Coupling // natively
}

// ForecastHeld is a quantity that is the same at every speed.
type ForecastHeld struct {
	Quantity string
	Unit     string
	data.Estimate
	Origin data.Origin
}

// VentricleParameter is one parameter of the ventricle with where it comes from.
type VentricleParameter struct {
	Symbol  string // "Emax"
	Meaning string
	Unit    string
	data.Estimate
	Origin data.Origin
}

// ForecastState is the coupled state at one speed: that of the nominal
// ventricle, and the estimates of what a note quotes.
type ForecastState struct {
	support.CoupledState
	Waves support.Waves // of the nominal state, over a beat from the onset of contraction

	MeanPressure   data.Estimate // mmHg
	Output         data.Estimate // mean flow into the arteries, mL/s
	PulsePressure  data.Estimate // mmHg
	RetainedPulse  data.Estimate // pulse pressure over that of the native state of the model
	EEPressure     data.Estimate // energy-equivalent pressure, mmHg
	SurplusEnergy  data.Estimate // SHE, erg/cm³
	FillingPress   data.Estimate // mmHg
	Resistance     data.Estimate // R over the native one
	ValveOpenTime  data.Estimate // of a beat, s
	PumpSwing      data.Estimate // max - min of pump flow, mL/s; 0 at speed 0
	PressureChange data.Estimate // of the mean, against the native state of the model, mmHg
	OutputChange   data.Estimate // mL/s
	// Powers into the arteries, mmHg mL/s; InputPower is the other two together.
	InputPower, SteadyPower, PulsatilePower data.Estimate
	// Against sets the state against the native one of the model, in full.
	Against support.Comparison
	// ValveOpenDraws is the share of the draws in which the aortic valve opens,
	// 0 to 1; that of the nominal state (0 or 1) where there are none.
	ValveOpenDraws float64
}

// ForecastSensitivity is the retained pulse of the middle state with one
// assumption moved.
type ForecastSensitivity struct {
	Assumption    string // "outflow-pressure"
	Change        string // "+10 mmHg"
	RetainedPulse float64
	Difference    float64 // against the nominal one
	PulsePressure float64 // mmHg
	// Beyond tells that the move goes beyond the error of the assumption: it is
	// shown, and not ranked.
	Beyond bool
}

// Mismatch is a quantity of the native state as measured and as the model has it.
type Mismatch struct {
	Quantity           string
	Unit               string
	Measured, Modelled float64
}

// Percent is by how much the model differs, in percent of what was measured.
func (m Mismatch) Percent() float64 { return 100 * (m.Modelled/m.Measured - 1) }

// PublishedCheck is a number of the forecast beside a published range.
type PublishedCheck struct {
	Name   string // "a, change of pulse pressure"
	Unit   string
	At     string // the speed or the speeds, in words
	Value  float64
	Low    float64
	High   float64
	Source string
	Reason string // why there is no value; empty where there is one
}

// Inside tells whether the value lies in the range; a missing value does not.
func (p PublishedCheck) Inside() bool { return p.Value >= p.Low && p.Value <= p.High }
