// Package cohort runs the study of many recordings and keeps what they say in one
// table, a row a recording.
//
//	sources := []cohort.Source{{Name: "a.csv", Case: c, Read: os.ReadFile}, ...}
//	rows, err := cohort.Run(ctx, sources, cohort.Settings{Known: old, Save: save})
//
// # Rows
//
// A row is known by two things: the SHA-256 of the recording, and a hash of the
// settings: of the version of the program, of every choice of the case, and of
// every other file that the case names. A recording whose key stands in the table
// already is not computed again. A recording that fails is a row too, with the
// reason; where its file cannot be read it has no SHA-256, and is tried again the
// next time.
//
// Rows stand in the order of the sources, and hold nothing that depends on the
// number of cores, on the time, or on what was known before: the same sources give
// the same table, byte for byte.
//
// # The table
//
// [Columns] lists the columns, each with its unit in its name. An undefined number
// is an empty cell. An estimate has six: its value, the ends of its total and of
// its random 95 % interval, and whether the data determine it. Text that a
// spreadsheet would take for a formula begins with ' in the file.
//
// # Shards
//
// With [Settings.Shards] a run takes every N-th of the keys in their order, so
// that N runs, wherever they happen, take every recording once, and their tables
// put together are the whole.
package cohort
