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
	return solvePart(s, &cobra.Command{
		Use:   "tree SPEC.toml",
		Short: "Pressure, flow, losses and response in a tree of arteries",
		Long:  solveTreeHelp,
	}, func(name string, content []byte) (solution, error) {
		spec, err := study.ReadTreeSpec(name, content)
		if err != nil {
			return solution{}, err
		}
		solved, err := study.SolveTree(name, spec, besides(name))
		if err != nil {
			return solution{}, err
		}
		return solution{solved.Report(), solved.Note(), solved.Reason()}, nil
	})
}
