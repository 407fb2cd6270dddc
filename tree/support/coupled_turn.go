package support

// slack is how far a margin may be passed before the mode is taken to have
// ended, mmHg or mL/s: below what any output shows, above rounding.
const slack = 1e-9

// turn finds the first event of the step just taken: its share of the step and
// which it is; -1 where there is none.
func (r *run) turn() (share float64, event int) {
	if r.least[mitral] >= 0 && r.least[aortic] >= 0 && r.least[reverse] >= 0 {
		return 1, -1
	}
	r.step.between(&r.dense)
	const parts = 8
	before := 0.0
	for k := 1; k <= parts; k++ {
		after := float64(k) / parts
		r.peek(after)
		share, event = after, -1
		for e, margin := range r.now.margin {
			if margin < -slack {
				if at := r.root(e, before, after); event < 0 || at < share {
					share, event = at, e
				}
				r.peek(after)
			}
		}
		if event >= 0 {
			return share, event
		}
		before = after
	}
	return 1, -1
}

// peek looks at a share of the step, within its mode.
func (r *run) peek(share float64) {
	y := &r.step.y
	r.dense.at(share, y)
	r.look(r.step.t+share*r.step.h, y, r.mode, &r.drive, &r.now)
}

// root is where the margin of an event passes 0 between two shares of a step,
// the first of which lies within the mode: regula falsi with the Illinois
// correction (Dowell and Jarratt 1971, BIT 11:168).
func (r *run) root(event int, low, high float64) float64 {
	r.peek(high)
	atHigh := r.now.margin[event]
	r.peek(low)
	atLow := r.now.margin[event]
	if atLow <= 0 {
		return low
	}
	side := 0
	for range 60 {
		at := (low*atHigh - high*atLow) / (atHigh - atLow)
		if high-low < 1e-13 {
			break
		}
		r.peek(at)
		switch margin := r.now.margin[event]; {
		case margin == 0:
			return at
		case margin > 0:
			low, atLow = at, margin
			if side == 1 {
				atHigh /= 2
			}
			side = 1
		default:
			high, atHigh = at, margin
			if side == -1 {
				atLow /= 2
			}
			side = -1
		}
	}
	return high
}

// flip changes the mode at an event, at the start of the step to come.
func (r *run) flip(event int) {
	s := &r.step
	r.mode[event] = !r.mode[event]
	if event == aortic && r.series && !r.mode[aortic] {
		s.start[qx] = 0
	}
	r.slope(0, s.t, &s.start, &s.k[0])
}
