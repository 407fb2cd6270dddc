// Package casefile reads and writes a case: a recording with the choices made
// about it, kept as NAME.afterbeat.toml, in TOML 1.0.
//
//	recording = "pilot-07.csv"
//	label = "pilot-07"
//	pressure = "abp_mmHg"
//	flow = "q_mL_s"
//	outflow_pressure = 5
//
//	[site]
//	abp_mmHg = "root"
//
//	[error]
//	flow = "10 %"
//
// Tables of channels have any names; [error], [pump], [ventricle] and [modulation]
// have fixed ones. A pump may be a name alone, pump = "generic A", and a modulation
// the name of a file.
//
// A case holds choices, never results, and as plain strings and numbers: those
// who use a choice check it, and [Case.Line] tells them which line to name.
// What is checked here is what belongs to the file: that the keys exist, that
// numbers are numbers, that the label looks like one of research ([CheckLabel]).
//
// Every key of the file but recording is a flag of the command line too, with -
// for _. One field of [Case] with its tags makes both: [Keys] lists them,
// [Case.Set] takes a flag, [Case.Arguments] gives the flags back.
package casefile
