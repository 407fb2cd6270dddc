package main

import (
	"github.com/spf13/cobra"

	"afterbeat/data/casenote"
	"afterbeat/tree/study"
)

const solveTreeHelp = casenote.Caution + `

Pressure and flow in a tree of arteries for one period of flow into its root.
SPEC.toml holds

  table = "tree.csv"          # the segments, see below
  inflow = "flow.csv"         # columns time_s,flow_mL_s: one period, even steps
  harmonics = 40              # absent: all that the samples carry
  density_g_mL = 1.06
  viscosity_poise = 0.035
  outflow_pressure_mmHg = 0   # behind every terminal
  wall_tau_s = 0              # s; the wall has E (1 + i w tau)
  line = "womersley"          # or "poiseuille"
  steady = true               # also the same mean flow, steady
  response = true             # also how the beds follow a step at the root

The table has a row a segment, rows and columns in any order:

  id,parent,name,length_cm,radius_cm,wave_speed_m_s,r1,c,r2

The root has no parent. A segment without daughters has r2 (mmHg s/mL), r1 (blank:
matched) and c (mL/mmHg; blank: 0); the others leave all three blank. r1 and r2
may be inf. Further columns: radius_distal_cm, eh_dyn_per_cm (in place of
wave_speed_m_s), poisson, bed.`

// solveTreeCommand is `afterbeat solve tree SPEC.toml`.
func solveTreeCommand(s stream) *cobra.Command {
	c := &cobra.Command{
		Use:   "tree SPEC.toml",
		Short: "Pressure, flow, losses and response in a tree of arteries",
		Long:  solveTreeHelp,
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
		spec, err := study.ReadTreeSpec(args[0], content)
		if err != nil {
			return err
		}
		solved, err := study.SolveTree(args[0], spec, besides(args[0]))
		if err != nil {
			return err
		}
		return o.print(s, solved.Report(), solved.Note(), solved.Reason())
	}
	return c
}
