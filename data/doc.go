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
