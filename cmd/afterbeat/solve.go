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
		Args:  exactly(0, "a part: load, tree, support"),
		RunE:  func(c *cobra.Command, _ []string) error { return c.Help() },
	}
	c.AddCommand(solveLoadCommand(s), solveTreeCommand(s), solveSupportCommand(s))
	return c
}

const solveLoadHelp = casenote.Caution + `

Evaluates a lumped load for one period of flow. SPEC.toml holds

  model = "wk3"           # wk2, wk3, wk4s or wk4p
  R = 1.0                 # mmHg s/mL
  C = 1.5                 # mL/mmHg
  Zc = 0.05               # mmHg s/mL (not of wk2)
  L = 0.005               # mmHg s²/mL (wk4s and wk4p only)
  Pv = 0                  # outflow pressure, mmHg
  inflow = "flow.csv"     # columns time_s,flow_mL_s: one period, even steps
  posing = "late-valve"   # or "scaled"; may be absent
  shares = [0, 0.5, 1]    # of the flow that a steady pump carries`

// solveLoadCommand is `afterbeat solve load SPEC.toml`.
func solveLoadCommand(s stream) *cobra.Command {
	return solvePart(s, &cobra.Command{
		Use:   "load SPEC.toml",
		Short: "Pressure, power and retained pulse of a lumped load",
		Long:  solveLoadHelp,
	}, func(name string, content []byte) (solution, error) {
		spec, err := study.ReadLoadSpec(name, content)
		if err != nil {
			return solution{}, err
		}
		solved, err := study.SolveLoad(name, spec, besides(name))
		if err != nil {
			return solution{}, err
		}
		return solution{solved.Report(), solved.Note(), solved.Reason()}, nil
	})
}

// solution is what a part of solve answers: a report, a note, and why it is no
// answer where it is none.
type solution struct {
	report any
	note   casenote.Note
	reason *string
}

// solvePart gives a part of solve its argument, its flags and its run; solve
// answers the content of a spec.
func solvePart(s stream, c *cobra.Command, solve func(name string, content []byte) (solution, error)) *cobra.Command {
	c.Args = exactly(1, "one SPEC.toml")
	o := &options{flags: c.Flags()}
	o.flags.BoolVar(&o.json, "json", false, "print one JSON object")
	o.flags.BoolVar(&o.ascii, "ascii", false, "print ASCII only")
	c.RunE = func(_ *cobra.Command, args []string) error {
		content, err := readFile(args[0])
		if err != nil {
			return err
		}
		solved, err := solve(args[0], content)
		if err != nil {
			return err
		}
		return o.print(s, solved.report, solved.note, solved.reason)
	}
	return c
}

// besides reads files whose names are relative to a spec.
func besides(spec string) func(name string) ([]byte, error) {
	return func(name string) ([]byte, error) {
		if !filepath.IsAbs(name) {
			name = filepath.Join(filepath.Dir(spec), name)
		}
		return readFile(name)
	}
}

const solveSupportHelp = casenote.Caution + `

The periodic state of a ventricle, a load and a pump. SPEC.toml holds

  speeds = [0, 8, 9]          # 1000/min; 0: no pump
  step = {from = 8, to = 9.5, beats = 40}   # may be absent
  modulation = "speed.csv"    # columns time_s,speed_1000_per_min: one period
  locked = 1                  # beats of its period; 0: free
  tree = "tree.csv"           # in place of [load] (then no modulation): a table as
                              # of solve tree, with
  density_g_mL = 1.06         # these three beside it
  viscosity_poise = 0.035
  outflow_pressure_mmHg = 5

  [ventricle]
  period_s = 0.8              # s
  activation = "hill"         # or "cosine", with Tes and Tr in s
  Emax = 0.62                 # mmHg/mL
  Emin = 0.1
  V0 = 10                     # mL
  Pfill = 20                  # mmHg
  Rmv = 0.01                  # mmHg s/mL, mitral valve
  Rav = 0.005                 # mmHg s/mL, aortic valve
  Rar = 0                     # mmHg s/mL, aortic valve to flow back; 0: tight
  filling_slope = 0.46        # mmHg s/mL; 0: constant filling pressure
  filling_flow = 60           # mL/s at Pfill; absent: that without the pump

  [load]
  model = "wk3"               # wk2, wk3, wk4s, wk4p
  R = 1.2                     # mmHg s/mL
  C = 1.3                     # mL/mmHg
  Zc = 0.05                   # mmHg s/mL (not wk2)
  L = 0.005                   # mmHg s2/mL (wk4s, wk4p)
  Pv = 5                      # mmHg

  [pump]                      # H = a n^2 - b n Q - c Q|Q|, n in 1000/min
  a = 1.05
  b = 0.013
  c = 0.0006
  Rc = 0.12                   # mmHg s/mL, cannulas
  Lc = 0.035                  # mmHg s2/mL
  inlet = "ventricle"         # or "atrium", the left one, at Pfill`

// solveSupportCommand is `afterbeat solve support SPEC.toml`.
func solveSupportCommand(s stream) *cobra.Command {
	return solvePart(s, &cobra.Command{
		Use:   "support SPEC.toml",
		Short: "The state of a ventricle, a load and a pump at each speed",
		Long:  solveSupportHelp,
	}, func(name string, content []byte) (solution, error) {
		spec, err := study.ReadSupportSpec(name, content)
		if err != nil {
			return solution{}, err
		}
		solved, err := study.SolveSupport(name, spec, besides(name))
		if err != nil {
			return solution{}, err
		}
		return solution{solved.Report(), solved.Note(), solved.Reason()}, nil
	})
}
