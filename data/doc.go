// Package data holds the values that every other package of afterbeat shares,
// and reads recordings into them.
//
// The straight line of the work is
//
//	recording -> beats -> average beat -> fit -> tree -> native and supported state -> comparison -> note
//
// and this package is its left end: a [Recording] of sampled [Channel]s, the
// [Period] (one beat, sampled, taken as periodic), the [Interval] and the
// [Estimate] that carries it, and the [Warning] that travels with a result
// until a screen or a note shows it.
//
// # Units
//
// One internal system everywhere: pressure in mmHg, volume in mL, time in s,
// length in cm, mass in g; hence flow in mL/s, velocity in cm/s, resistance in
// mmHg s/mL, compliance in mL/mmHg, inertance in mmHg s²/mL. Values are
// converted where a file is read and where a number is printed (package unit),
// nowhere between. Struct fields say their unit.
//
// # Reading
//
// [ReadCSV] reads a recording, [ReadSpans] the stretches to leave out, [Choose]
// settles which channels are used. Each says what it guessed, in warnings that
// name the flag which states it.
//
// # Clocks
//
// A file's times may be rounded, repeated, late, or jump. [Recording.Clock]
// describes them as written, [Recording.Holes] lists the jumps, and
// [Recording.Uniform] brings all channels to one even clock: untouched where
// the file's own is even, else interpolated,
//
//	x(t) = x_i + (x_{i+1} - x_i) (t - t_i)/(t_{i+1} - t_i),
//
// and NaN where nothing was measured.
//
// # Text from outside
//
// Column names, file names and labels can carry anything, escape sequences for
// a terminal included. They enter through [Clean], which returns a [Text]; what
// is shown or written takes only that type.
//
// # Undefined
//
// A number that does not exist is NaN in memory and null in JSON, never 0.
package data
