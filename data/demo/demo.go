package demo

import (
	"embed"
	"io/fs"
)

//go:generate go run afterbeat/cmd/demodata -o .

// The names of the files.
const (
	CaseName      = "demo.afterbeat.toml"
	RecordingName = "demo.csv"
)

//go:embed demo.csv demo.afterbeat.toml
var files embed.FS

// Files returns the demo case and its recording.
func Files() fs.FS { return files }
