package support

// A margin may be passed by the slack before the mode is taken to have ended,
// mmHg or mL/s: less than any output shows, more than rounding. Where a state
// rests on the edge of a mode, as blood that stands in front of a valve, events
// follow each other without end; then the slack grows, tenfold after every
// manyTurns.
const (
	firstSlack = 1e-9
	manyTurns  = 100
)

// turn finds the first event of the step just taken: its share of the step and
// which it is; -1 where there is none. Only a step on which a margin comes near
// to 0, beside its change over the step, is looked at closely.
func (r *run) turn() (share float64, event int) {
	event = -1
	for e := range r.least {
		if r.least[e] < r.most[e]-r.least[e] {
			at, found := r.passes(e)
			if found && (event < 0 || at < share) {
				share, event = at, e
			}
		}
	}
	return share, event
}

// passes tells where in the step the margin of an event first passes 0, if it
// does: between points an eighth of the step apart, or in the dip of a parabola
// through three of them.
func (r *run) passes(event int) (share float64, found bool) {
	const parts = 8
	r.step.between(&r.dense)
	var at, margin [parts + 1]float64
	for k := range at {
		at[k] = float64(k) / parts
		margin[k] = r.marginAt(event, at[k])
		if k > 0 && margin[k] < -r.slack {
			return r.root(event, at[k-1], at[k]), true
		}
		if k < 2 {
			continue
		}
		dip, ok := vertex(at[k-2:k+1], margin[k-2:k+1])
		if ok && r.marginAt(event, dip) < -r.slack {
			return r.root(event, at[k-2], dip), true
		}
	}
	return 0, false
}

func (r *run) marginAt(event int, share float64) float64 {
	r.peek(share)
	return r.now.margin[event]
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
	atHigh, atLow := r.marginAt(event, high), r.marginAt(event, low)
	if atLow <= 0 {
		return low
	}
	side := 0
	for range 60 {
		at := (low*atHigh - high*atLow) / (atHigh - atLow)
		if high-low < 1e-13 {
			break
		}
		switch margin := r.marginAt(event, at); {
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
	if event == aortic && r.series && !r.mode[aortic] && r.heart.Rar == 0 {
		s.start[qx] = 0
	}
	r.slope(0, s.t, &s.start, &s.k[0])
}
