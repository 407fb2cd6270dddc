// Package fault finds what is wrong with a recorded trace before anything is
// made of it: a uniform trace in, a list of [Finding]s out. Each says what was
// found with a number, what would cure it, which samples it touches, and whether
// these can still be used.
//
//	for _, f := range fault.Find(fault.Trace{Values: pressure, Rate: 1000, Quantity: unit.Pressure, Unit: "mmHg"}) {
//		fmt.Println(f.Text, f.Cure)
//	}
//
// No limit is an absolute pressure, flow or velocity. The yardstick is the pulse,
// the median over windows of 2.5 s of the range from the 2nd to the 98th
// percentile, so that a supported patient's 5 mmHg and volts of a transducer are
// treated alike. Under 20 Hz no pulse can be seen, and only held samples, flat lines and
// spikes are looked for. Where a method has no source named, its constants are this
// program's own, stated beside them.
//
// # Spikes
//
// A sample that differs from the median of the 20 ms around it (at least of three
// samples; Tukey's running median) by 10 times what 98 % of samples do, and by a
// quarter of the pulse, is none of the patient's.
//
// # Held samples
//
// A recorder that repeats each value until the next one comes puts all its changes
// on a grid of k samples, k = rate / true rate, whole or not. With the squared
// differences w_i = (x_i - x_(i-1))², the spectrum of w has a line at the true rate
// f (and at its multiples), of the strength that rounding to whole samples leaves,
//
//	|sum w_i exp(-2 pi i f t_i)| / sum w_i = sin(pi f/rate)/(pi f/rate)
//
// and on a clock folded at k samples all of the sum falls into a window of one
// sample. Both are asked for, and that where the trace is steep one jump follows the
// other by one hold. A little noise added after the hold does no harm:
// squares of jumps outweigh it. What lies above half the true rate is the staircase,
// not the patient.
//
// # Quantisation
//
// The step q is the distance of the levels, where 95 % of them lie on a lattice. Rounding adds a noise
// of q/sqrt(12) (uniform error; Widrow 1956, from memory). Less than 100 steps in
// the pulse are warned of.
//
// # Clipping and flat lines
//
// A trace that reaches the end of its scale stays on one value, and begins and
// ends there with a corner. A rounded peak does not: it falls within the length L
// of its flat top by no more than 9 steps (a parabola that falls by q within L/2
// falls by 9 q within 3L/2). Twelve steps on both sides are a corner. Where most of
// the pulses are clipped, they stay usable, since nothing else would be left, and
// their extremes are bounds. A flat line is 2 s or more within 1 % of the pulse.
//
// # Drift
//
// The slope is the median of the slopes between all pairs of windowed medians (Theil
// 1950, Sen 1968, J Am Stat Assoc 63:1379). Told from the wandering of the level
// by its size: a quarter of the pulse over the recording, and 4 times the scatter
// about the line.
//
// # Hum
//
// A line at 50 or 60 Hz in the amplitude spectrum (Hann windows of 4 s) that is 4
// times as high as all else within 8 Hz: harmonics of a regular heart come in rows,
// a mains line stands alone.
//
// # The pressure line
//
// A line filled with fluid is a mass on a spring with a damper. A fast flush that is
// let go of shows its natural frequency f and damping zeta (Gardner 1981, Anesthesiology
// 54:227, from memory): the rings after it are fitted, once the pulse that goes on
// underneath is taken off (the stretch elsewhere in the trace whose beats agree best
// with those after the flush). Rings of the height A, A' one half period apart would say
// the same, zeta = ln(A/A')/sqrt(pi² + ln²(A/A')), f = f_ring/sqrt(1 - zeta²); the fit
// uses all samples. A trace without a flush tells nothing of its line.
//
// # Doppler
//
// A velocity beyond the end of its scale comes in again at the other end (aliasing).
// Adding the range of the scale back at every jump of more than half of it is exact if
// the true velocity never steps so far. The range, where nobody states it, is the
// median of the jumps less the step that the velocity would have made; only jumps of
// 60 % of the range of the trace count, some up and some down, and none over half of
// the scale may be left. A wall filter sets speeds under its own to 0: the trace comes
// out of zeros by a step at least 2.5 times the next one, where a velocity that starts
// from rest makes two alike.
//
// # Recalibration of a finger cuff
//
// A volume clamp finds its set point anew by holding the cuff at two or more
// constant pressures for some tenths of a second each (Penaz 1973; Wesseling 1995,
// from memory). That is what is looked for: level stretches of 0.25 s or more, one
// after the other at different pressures, within the range of the pulse, a second or
// more in all, with steps of at most 0.25 s between them. 0.1 s before it and 0.25 s
// after it are left out too: the clamp lets go and catches on.
package fault
