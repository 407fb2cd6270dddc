package support

import (
	"math"

	"afterbeat/data"
	"afterbeat/data/unit"
)

// CoupledState is the periodic state of ventricle, pump and load at one speed.
type CoupledState struct {
	Speed   float64 // 1000/min; 0: no pump
	Beats   int     // integrated to find it
	Rounds  int     // of relaxation between heart and tree; 0: the load is lumped
	Settled bool
	// Missed tells that what was to be matched cannot be, at this speed: the
	// state is the one that comes nearest.
	Missed bool

	Arterial    Range   // Pao, mmHg
	PumpFlow    Range   // mL/s
	ValveFlow   Range   // through the aortic valve, mL/s
	RootFlow    Range   // Qav + Qp, mL/s
	ValveOpen   float64 // s a beat
	ValveOpened bool
	Volume      Range   // of the ventricle, mL
	Ventricular Range   // Plv, mmHg
	Loop        float64 // mean of what runs back through the aortic valve, mL/s
	Filling     float64 // Pfill, mmHg
	Resistance  float64 // R, mmHg s/mL: that of the load, unless it is matched
	StrokeWork  float64 // int Plv (Qav + Qp - Qmv) dt, mmHg mL
	EEP, SHE    float64 // mmHg, erg/cm³; the flow is Qav + Qp
	Energy      CoupledEnergy
	Suction     bool // V within 2 mL of V0, or Plv below 0
	Warnings    []data.Warning

	start vector // of the beat
}

// PulsePressure is max - min of arterial pressure, mmHg.
func (s CoupledState) PulsePressure() float64 { return s.Arterial.Swing() }

// Flow is the mean flow into the arteries, mL/s.
func (s CoupledState) Flow() float64 { return s.PumpFlow.Mean + s.ValveFlow.Mean }

// CoupledEnergy is where the energy of a beat comes from and where it goes,
// mmHg mL.
type CoupledEnergy struct {
	Filling, Ventricle, Pump                float64 // sources
	Mitral, Aortic, Cannula, Zc, R, Outflow float64 // sinks
	Segments, TerminalR1, TerminalR2        float64 // sinks of a tree, in place of Zc and R
}

// Sinks is the energy that is lost or passed on in a beat, mmHg mL.
func (e CoupledEnergy) Sinks() float64 {
	return e.Mitral + e.Aortic + e.Cannula + e.Zc + e.R + e.Segments + e.TerminalR1 + e.TerminalR2 + e.Outflow
}

// littleEnergy is less than the energy of a beat that means something, mmHg mL:
// a beat of a person has thousands.
const littleEnergy = 10

// Balance is (sources - sinks)/sinks; NaN where next to nothing flows.
func (e CoupledEnergy) Balance() float64 {
	sinks := e.Sinks()
	if !(sinks >= littleEnergy) {
		return math.NaN()
	}
	return (e.Filling + e.Ventricle + e.Pump - sinks) / sinks
}

// stateOf reads a state from the books of its beat.
func (k *Coupled) stateOf(o orbit, speed float64, b *books) CoupledState {
	surplus := b.surplus()
	s := CoupledState{
		Speed: speed, Beats: o.beats, Settled: o.settled, start: o.start,
		Arterial: b.of(sigPao), PumpFlow: b.of(sigPump), ValveFlow: b.of(sigValve), RootFlow: b.of(sigRoot),
		Volume: b.of(sigVolume), Ventricular: b.of(sigPlv), Filling: k.shooter.fill, Resistance: k.shooter.r, Missed: o.missed,
		StrokeWork: b.power[powVentricle],
		EEP:        b.of(sigPao).Mean + surplus, SHE: unit.DynPerMmHg * surplus,
		Energy: CoupledEnergy{
			Filling: b.power[powFilling], Ventricle: b.power[powVentricle], Pump: b.power[powHead],
			Mitral: b.power[powMitral], Aortic: b.power[powAortic], Cannula: b.power[powCannula],
			Zc: b.power[powZc], R: b.power[powR], Outflow: b.power[powOutflow],
		},
	}
	s.ValveOpen, s.ValveOpened = b.opening()
	if k.Ventricle.Rar > 0 { // else rounding
		s.Loop = b.power[powLoop] / b.time
	}
	s.Suction = k.suction(&s)
	s.Warnings = k.warnings(&s)
	return s
}
