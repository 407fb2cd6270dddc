package main

import (
	"path/filepath"

	"github.com/spf13/cobra"

	"afterbeat/data/casenote"
	"afterbeat/tree/study"
)

// solveCommand is `afterbeat solve`, and its parts.
func solveCommand(s stream) *cobra.Command {
	c := &cobra.Command{
		Use:   "solve",
		Short: "Evaluate given parameters, without a measurement",
		Args:  exactly(0, "a part: load"),
		RunE:  func(c *cobra.Command, _ []string) error { return c.Help() },
	}
	c.AddCommand(solveLoadCommand(s))
	return c
}

const solveLoadHelp = casenote.Caution + `

Evaluates a lumped load for one period of flow. SPEC.toml holds

  model = "wk3"           # wk2 or wk3
  R = 1.0                 # mmHg s/mL
  C = 1.5                 # mL/mmHg
  Zc = 0.05               # mmHg s/mL (wk3)
  Pv = 0                  # outflow pressure, mmHg
  inflow = "flow.csv"     # columns time_s,flow_mL_s: one period, even steps
  posing = "late-valve"   # or "scaled"; may be absent
  shares = [0, 0.5, 1]    # of the flow that a steady pump carries`

// solveLoadCommand is `afterbeat solve load SPEC.toml`.
func solveLoadCommand(s stream) *cobra.Command {
	c := &cobra.Command{
		Use:   "load SPEC.toml",
		Short: "Pressure, power and retained pulse of a lumped load",
		Long:  solveLoadHelp,
		Args:  exactly(1, "one SPEC.toml"),
	}
	o := &options{flags: c.Flags()}
	o.flags.BoolVar(&o.json, "json", false, "print one JSON object")
	o.flags.BoolVar(&o.ascii, "ascii", false, "print ASCII only")
	c.RunE = func(_ *cobra.Command, args []string) error {
		content, err := readFile(args[0])
		if err != nil {
			return err
		}
		spec, err := study.ReadLoadSpec(args[0], content)
		if err != nil {
			return err
		}
		solved, err := study.SolveLoad(args[0], spec, func(name string) ([]byte, error) {
			if !filepath.IsAbs(name) {
				name = filepath.Join(filepath.Dir(args[0]), name)
			}
			return readFile(name)
		})
		if err != nil {
			return err
		}
		return o.print(s, solved.Report(), solved.Note(), solved.Reason())
	}
	return c
}
