package study

import "afterbeat/tree/support"

// RangeReport is a signal over a beat or a window.
type RangeReport struct {
	Mean Number `json:"mean"`
	Min  Number `json:"min"`
	Max  Number `json:"max"`
}

func rangeReport(r support.Range) RangeReport {
	return RangeReport{Number(r.Mean), Number(r.Min), Number(r.Max)}
}

// ValveReport is the flow through the aortic valve.
type ValveReport struct {
	Mean   Number `json:"mean"`
	Max    Number `json:"max"`
	Opened bool   `json:"opened"`
	Open   Number `json:"open_s"`
}

// VolumeReport is the volume of the ventricle.
type VolumeReport struct {
	Min Number `json:"min"`
	Max Number `json:"max"`
}

// CoupledEnergyReport is the energy of a beat, mmHg mL.
type CoupledEnergyReport struct {
	Filling   Number `json:"filling"`
	Ventricle Number `json:"ventricle"`
	Pump      Number `json:"pump"`
	Mitral    Number `json:"mitral"`
	Aortic    Number `json:"aortic"`
	Cannula   Number `json:"cannula"`
	*LumpedSinks
	*TreeSinks
	Outflow Number `json:"outflow"`
	Balance Number `json:"balance"`
}

// LumpedSinks are the losses in a lumped load, mmHg mL a beat.
type LumpedSinks struct {
	Zc Number `json:"Zc"`
	R  Number `json:"R"`
}

// TreeSinks are those in a tree.
type TreeSinks struct {
	Segments   Number `json:"segments"`
	TerminalR1 Number `json:"terminal_r1"`
	TerminalR2 Number `json:"terminal_r2"`
}

// SpeedReport is the periodic state at one speed.
type SpeedReport struct {
	Speed     Number      `json:"speed"`
	Beats     int         `json:"beats"`
	Rounds    int         `json:"rounds"`
	Settled   bool        `json:"settled"`
	Arterial  RangeReport `json:"arterial"`
	PumpFlow  RangeReport `json:"pump_flow"`
	ValveFlow ValveReport `json:"valve_flow"`
	// Of a leaking aortic valve only: what reaches the body, and what runs back
	// through the valve, mL/s.
	Systemic   *Number             `json:"systemic_flow,omitempty"`
	Loop       *Number             `json:"loop_flow,omitempty"`
	Volume     VolumeReport        `json:"volume"`
	Filling    Number              `json:"filling_pressure"`
	StrokeWork Number              `json:"stroke_work"`
	Energy     CoupledEnergyReport `json:"energy"`
	EEP        Number              `json:"eep"`
	SHE        Number              `json:"she"`
	BackFlow   bool                `json:"back_flow"`
	Suction    bool                `json:"suction"`
	Segments   []SolvedSegment     `json:"segments,omitempty"`
}

func speedReport(s support.CoupledState) SpeedReport {
	e := s.Energy
	r := SpeedReport{
		Speed: Number(s.Speed), Beats: s.Beats, Rounds: s.Rounds, Settled: s.Settled,
		Arterial: rangeReport(s.Arterial), PumpFlow: rangeReport(s.PumpFlow),
		ValveFlow: ValveReport{Number(s.ValveFlow.Mean), Number(s.ValveFlow.Max), s.ValveOpened, Number(s.ValveOpen)},
		Volume:    VolumeReport{Number(s.Volume.Min), Number(s.Volume.Max)},
		Filling:   Number(s.Filling), StrokeWork: Number(s.StrokeWork),
		Energy: CoupledEnergyReport{
			Number(e.Filling), Number(e.Ventricle), Number(e.Pump), Number(e.Mitral), Number(e.Aortic), Number(e.Cannula),
			&LumpedSinks{Number(e.Zc), Number(e.R)}, nil, Number(e.Outflow), Number(e.Balance()),
		},
		EEP: Number(s.EEP), SHE: Number(s.SHE), BackFlow: s.BackFlow(), Suction: s.Suction,
	}
	if s.Loop > 0 {
		systemic, loop := Number(s.Flow()), Number(s.Loop)
		r.Systemic, r.Loop = &systemic, &loop
	}
	return r
}

// StepReport is what follows a step of speed: beat means, one a beat.
type StepReport struct {
	BeatEnd  []Number `json:"beat_end_s"`
	Arterial []Number `json:"arterial_mean"`
	Flow     []Number `json:"total_flow_mean"`
	Filling  []Number `json:"filling_pressure"`
}

// ModulatedReport is a state under a speed that changes over time.
type ModulatedReport struct {
	Window                Number      `json:"window_s"`
	Arterial              RangeReport `json:"arterial"`
	PulsePressure         Number      `json:"pulse_pressure"`
	PulsePressureBeatMean Number      `json:"pulse_pressure_beat_mean"`
	PumpFlow              RangeReport `json:"pump_flow"`
	Filling               Number      `json:"filling_pressure"`
	EEP                   Number      `json:"eep"`
	SHE                   Number      `json:"she"`
	Settled               bool        `json:"settled"`
}

// SupportReport is what `solve support --json` prints.
type SupportReport struct {
	Head
	Speeds    []SpeedReport    `json:"speeds"`
	Step      *StepReport      `json:"step,omitempty"`
	Modulated *ModulatedReport `json:"modulated,omitempty"`
	Warnings  []WarningReport  `json:"warnings"`
}

// Report is what --json prints.
func (s SolvedSupport) Report() SupportReport {
	r := SupportReport{Head: head(), Speeds: []SpeedReport{}, Warnings: warningReports(s.Warnings)}
	for i, state := range s.States {
		speed := speedReport(state)
		if len(s.Trees) > 0 {
			e := state.Energy
			speed.Energy.LumpedSinks, speed.Energy.TreeSinks = nil, &TreeSinks{Number(e.Segments), Number(e.TerminalR1), Number(e.TerminalR2)}
			speed.Segments = solvedSegments(s.Network, s.Trees[i])
		}
		r.Speeds = append(r.Speeds, speed)
	}
	if step := s.Step; step != nil {
		r.Step = &StepReport{numbers(step.BeatEnd), numbers(step.Arterial), numbers(step.Flow), numbers(step.Filling)}
	}
	if m := s.Modular; m != nil {
		r.Modulated = &ModulatedReport{
			Window: Number(m.Window), Arterial: rangeReport(m.Arterial),
			PulsePressure: Number(m.PulsePressure), PulsePressureBeatMean: Number(m.PulsePressureBeatMean),
			PumpFlow: rangeReport(m.PumpFlow), Filling: Number(m.Filling), EEP: Number(m.EEP), SHE: Number(m.SHE),
			Settled: m.Settled,
		}
	}
	return r
}
