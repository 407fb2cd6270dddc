package study

import (
	"afterbeat/tree"
	"afterbeat/tree/energy"
)

// SolvedTreeReport is what `solve tree --json` prints. Powers are in mmHg mL/s,
// means over the beat.
type SolvedTreeReport struct {
	Head
	Frequencies  []Number    `json:"frequencies_hz"`
	DCResistance Number      `json:"dc_input_resistance"`
	Compliance   Number      `json:"total_compliance"`
	Impedance    [][2]Number `json:"root_input_impedance"`
	SolvedTreeState
	Steady   *SolvedTreeState `json:"steady,omitempty"`
	Response *SolvedResponse  `json:"response,omitempty"`
	Warnings []WarningReport  `json:"warnings"`
}

// SolvedTreeState is pressure, flow and power of a state.
type SolvedTreeState struct {
	Segments []SolvedSegment  `json:"segments"`
	Energy   SolvedTreeEnergy `json:"energy"`
}

// SolvedSegment is one segment.
type SolvedSegment struct {
	ID            string      `json:"id"`
	Name          string      `json:"name"`
	Bed           string      `json:"bed"`
	Inlet         SolvedEnd   `json:"inlet"`
	Outlet        SolvedEnd   `json:"outlet"`
	Loss          Number      `json:"loss"`
	LossPulsatile Number      `json:"loss_pulsatile"`
	Shear         SolvedShear `json:"wall_shear_dyn_cm2"`
}

// SolvedEnd is pressure and flow at one end of a segment.
type SolvedEnd struct {
	Pressure SolvedRange `json:"pressure"`
	Flow     SolvedRange `json:"flow"`
}

// SolvedRange is a wave; pulse is max - min, which has a value where the mean
// pressure of a closed tree has none.
type SolvedRange struct {
	Mean  Number `json:"mean"`
	Min   Number `json:"min"`
	Max   Number `json:"max"`
	Pulse Number `json:"pulse"`
}

// SolvedShear is the stress on the wall at the inlet of a segment.
type SolvedShear struct {
	Mean        Number `json:"mean"`
	Amplitude   Number `json:"amplitude"`
	Oscillatory Number `json:"oscillatory_index"`
}

// SolvedTreeEnergy is the ledger of a tree.
type SolvedTreeEnergy struct {
	SolvedTreePower
	Balance   Number          `json:"balance"`
	Steady    SolvedTreePower `json:"steady_part"`
	Pulsatile SolvedTreePower `json:"pulsatile_part"`
}

// SolvedTreePower is power into a tree and where it goes.
type SolvedTreePower struct {
	Input    Number `json:"input"`
	Segments Number `json:"segment_loss"`
	R1       Number `json:"terminal_r1"`
	R2       Number `json:"terminal_r2"`
	Outflow  Number `json:"outflow"`
}

// SolvedResponse is how the beds follow a step of 1 mL/s and of 1 mmHg.
type SolvedResponse struct {
	Flow     []SolvedBed `json:"flow_step"`
	Pressure []SolvedBed `json:"pressure_step"`
}

// SolvedBed is the response of the bed behind one terminal.
type SolvedBed struct {
	ID       string       `json:"id"`
	Name     string       `json:"name"`
	Outflow  SolvedCourse `json:"outflow"`
	Pressure SolvedCourse `json:"pressure"`
	Inflow   SolvedCourse `json:"inflow"`
}

// SolvedCourse is the course of one quantity; null behind a closed terminal.
type SolvedCourse struct {
	Final Number `json:"final"`
	T10   Number `json:"t10_s"`
	T50   Number `json:"t50_s"`
	T90   Number `json:"t90_s"`
	Front bool   `json:"front"`
}

// Report is what --json prints.
func (s SolvedTree) Report() SolvedTreeReport {
	r := SolvedTreeReport{
		Head: head(), Frequencies: numbers(s.Frequency), DCResistance: Number(s.Resistance), Compliance: Number(s.Compliance),
		Impedance: [][2]Number{}, SolvedTreeState: s.stateReport(s.Pulsing), Warnings: warningReports(s.Warnings),
	}
	for _, z := range s.Impedance {
		r.Impedance = append(r.Impedance, [2]Number{Number(real(z)), Number(imag(z))})
	}
	if s.Steady != nil {
		steady := s.stateReport(*s.Steady)
		r.Steady = &steady
	}
	if s.Response != nil {
		r.Response = &SolvedResponse{s.solvedBeds(s.Response.FlowStep), s.solvedBeds(s.Response.PressureStep)}
	}
	return r
}

func (s SolvedTree) stateReport(state TreeState) SolvedTreeState {
	return SolvedTreeState{Segments: solvedSegments(s.Network, state), Energy: solvedTreeEnergy(state)}
}

// solvedSegments are the segments of a state, in the order of the table.
func solvedSegments(n tree.Network, state TreeState) []SolvedSegment {
	out := make([]SolvedSegment, len(state.Segments))
	for i, v := range state.Segments {
		segment := n.Segments[i]
		out[i] = SolvedSegment{
			ID: segment.ID, Name: segment.Name, Bed: segment.Bed,
			Inlet:  SolvedEnd{solvedRange(v.InletPressure), solvedRange(v.InletFlow)},
			Outlet: SolvedEnd{solvedRange(v.OutletPressure), solvedRange(v.OutletFlow)},
			Loss:   Number(v.Loss.Total()), LossPulsatile: Number(v.Loss.Pulsatile),
			Shear: SolvedShear{Number(v.Shear.Mean), Number(v.Shear.Amplitude), Number(v.Shear.Oscillatory)},
		}
	}
	return out
}

func solvedRange(r tree.Range) SolvedRange {
	return SolvedRange{Number(r.Mean), Number(r.Min), Number(r.Max), Number(r.Pulse)}
}

func solvedTreeEnergy(state TreeState) SolvedTreeEnergy {
	of := func(input float64, part func(energy.Term) float64) SolvedTreePower {
		term := func(name string) Number {
			t, _ := state.Ledger.Term(name)
			return Number(part(t))
		}
		return SolvedTreePower{Number(input), term("segments"), term("terminal R1"), term("terminal R2"), term("outflow")}
	}
	return SolvedTreeEnergy{
		SolvedTreePower: of(state.Power.Input, energy.Term.Total), Balance: Number(state.Ledger.Balance()),
		Steady:    of(state.Power.Steady, func(t energy.Term) float64 { return t.Steady }),
		Pulsatile: of(state.Power.Pulsatile, func(t energy.Term) float64 { return t.Pulsatile }),
	}
}

func (s SolvedTree) solvedBeds(beds []tree.BedResponse) []SolvedBed {
	out := make([]SolvedBed, len(beds))
	for i, b := range beds {
		segment := s.Network.Segments[b.Segment]
		out[i] = SolvedBed{segment.ID, segment.Name, solvedCourse(b.Outflow), solvedCourse(b.Pressure), solvedCourse(b.Inflow)}
	}
	return out
}

func solvedCourse(c tree.Course) SolvedCourse {
	return SolvedCourse{Number(c.Final), Number(c.T10), Number(c.T50), Number(c.T90), c.Front}
}
