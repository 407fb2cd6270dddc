// Package beat finds the beats of a uniform trace of pressure, flow or
// velocity, says of each whether it can be used and why not, and makes the
// average beat and its indices.
//
//	pulse := beat.Find(pressure, rate, unit.Pressure)
//	beats := beat.Match(pulse, beat.Find(flow, rate, unit.Flow))
//	cut := beat.Cut(beats, rate, beat.Signal{Values: pressure}, beat.Signal{Values: flow})
//	average := cut.Average(0)
//
// A sample that cannot be used is NaN. No threshold is an absolute pressure,
// flow or velocity: an uncalibrated channel, a failing heart at 45/28 mmHg and
// the small pulse that a rotary pump leaves are treated alike.
//
// # Is there a pulse?
//
// The slope of the trace, less its running mean, is compared with itself in
// windows of 10 s. With z the slope at a sample,
//
//	r(L) = sum z(t) z(t+L) / sqrt(sum z(t)² sum z(t+L)²)
//
// has a peak at the period of a pulse, while the slope of a random walk is
// white and has none. A period between 0.25 and 2.5 s counts if r reaches 0.55
// there (more where the window is shorter than 8.5 s), r has fallen to half of
// that before it, no other lag does much better, and the next window agrees. An
// irregular rhythm shows no such peak; it is recognised by upstrokes that
// resemble one another.
//
// # A faint pulse
//
// By the criteria of [Support] ([FindBy]) a pulse of a few mmHg is found in noise.
// Where the slope has no period, that of the level is taken, less its running
// mean. Onsets are then not looked for one by one: the trace is matched with the
// average upstroke, which is averaged anew over what it matched (Woody 1967, Med
// Biol Eng 5:539, from memory), and of the matches those are taken that follow one
// another most evenly (dynamic programming after Ellis 2007, J New Music Res
// 36:51, from memory). An irregular rhythm is searched as a native one.
//
// [Pulse.PulseToNoise] sets the amplitude of the average beat beside what single
// beats differ from it. Under 2 there is no pulse, whatever the criteria.
//
// # Onsets
//
// Upstrokes are the peaks of the slope sum function of Zong, Heldt, Moody and
// Mark (2003, Comput Cardiol 30:259; its settings are from memory):
//
//	SSF(i) = sum over the last 128 ms of max(0, y(k) - y(k-1)),  y smoothed
//
// The onset is the foot by intersecting tangents (Chiu et al. 1991, Am Heart J
// 121:1460, from memory): where the tangent at the steepest point of the
// upstroke meets the level of the lowest point before it,
//
//	t_foot = t_s - (y(t_s) - y_min)/y'(t_s)
//
// It moves less with noise and with coarse steps of the recorder than the
// first sample of the rise. On a rise (1 - cos)/2 it lies 18 % of the rise time
// after its very beginning, which is a property of the method.
//
// Where the rhythm is regular, an upstroke between two higher ones that are one
// period apart is a secondary wave (dicrotic, the end of a reversal) and no
// onset.
//
// # Beats
//
// A beat is the samples From <= i < To, from onset to onset. Every beat is
// listed; [Beat.Rejected] says why one is not used. The limits are relative to
// the beats around it, because absolute limits such as those of Sun, Reisner
// and Mark (2006, Comput Cardiol 33:13: systolic at most 300, diastolic at
// least 20, pulse at least 20 mmHg; from memory) would throw away whole recordings
// of shock, of uncalibrated channels and of patients on a pump.
//
// # The average beat
//
// A used beat is sampled at From + j (To - From)/N, j = 0 .. N-1, N the median
// length, linearly between samples; other signals at the same instants, or
// later by their delay. Value(To) - value(From), averaged over the beats, is
// kept: it is what a periodic fit would have to force shut.
//
// # What it cannot do
//
// A lasting bigeminy, or pulses of which every other one is weaker than half,
// count as one beat of two pulses: Pulse.SecondPulse tells it, and a warning says
// so. A pump that changes its speed in a cycle of 0.25 to 2.5 s by more than the
// heart's own pulse is taken for the pulse. Of two rhythms in a ratio of small
// numbers neither can be told from the other's harmonics: Pulse.Overlap. With a
// balloon that lifts diastole as high as systole nearly every beat is rejected.
// A trace that is upside down has onsets, in the wrong places.
package beat
