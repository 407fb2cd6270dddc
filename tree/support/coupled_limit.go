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
	for _, end := range []struct {
		speed float64
		opens bool
	}{{opens, true}, {shut, false}} {
		s, err := k.At(end.speed)
		if err != nil || !s.Settled || s.ValveOpened != end.opens {
			return math.NaN(), err
		}
	}
	return k.between(opens, shut)
}

// between halves the distance of two speeds on either side of the limit.
func (k *Coupled) between(opens, shut float64) (float64, error) {
	for shut-opens > limitWithin*shut {
		middle := (opens + shut) / 2
		s, err := k.At(middle)
		if err == nil && !s.Settled { // where the valve barely opens, once beside it
			middle = opens + 0.4*(shut-opens)
			s, err = k.At(middle)
		}
		if err != nil || !s.Settled {
			return math.NaN(), err
		}
		if s.ValveOpened {
			opens = middle
		} else {
			shut = middle
		}
	}
	return (opens + shut) / 2, nil
}
