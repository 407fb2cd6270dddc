package support

import "math"

// limitWithin is how near to the valve limit the answer lies, relative.
const limitWithin = 1e-3

// ValveLimit is the lowest speed, 1000/min, at which the aortic valve stays shut
// over the whole beat, between a speed at which it opens and a higher one at
// which it does not: where they do not, or no periodic state is found, NaN. With
// more speed the ventricle is emptied and the arteries filled, so that there is
// one such speed. It is found to a thousandth of it.
func (k *Coupled) ValveLimit(opens, shut float64) (float64, error) {
	first, last := opens, shut
	for shut-opens > limitWithin*shut {
		middle := (opens + shut) / 2
		opened, settled, err := k.opens(middle)
		if err == nil && !settled { // where the valve barely opens, once beside it
			middle = opens + 0.4*(shut-opens)
			opened, settled, err = k.opens(middle)
		}
		if err != nil || !settled {
			return math.NaN(), err
		}
		if opened {
			opens = middle
		} else {
			shut = middle
		}
	}
	// An end that was never moved from has not been looked at.
	if opens == first {
		if opened, settled, err := k.opens(first); err != nil || !settled || !opened {
			return math.NaN(), err
		}
	}
	if shut == last {
		if opened, settled, err := k.opens(last); err != nil || !settled || opened {
			return math.NaN(), err
		}
	}
	return (opens + shut) / 2, nil
}

// opens tells whether the valve opens at a speed, and whether a periodic state
// was found there.
func (k *Coupled) opens(speed float64) (opened, settled bool, err error) {
	s, err := k.At(speed)
	return s.ValveOpened, s.Settled && !s.Missed, err
}
