package beats

import (
	"fmt"
	"math"
	"slices"

	"afterbeat/data"
	"afterbeat/data/beat"
)

// quality says in a few words what to mind about a pulse, the most important
// first: the warnings say the rest.
func quality(p beat.Pulse) []string {
	if !p.Found {
		return nil
	}
	var out []string
	flag := func(code data.Code, words string) {
		if slices.ContainsFunc(p.Warnings(data.Text{}), func(w data.Warning) bool { return w.Code == code }) {
			out = append(out, words)
		}
	}
	flag(data.CodeTwoKinds, "two kinds of beat")
	flag(data.CodeIrregular, "irregular")
	for _, r := range p.Rhythms[min(1, len(p.Rhythms)):] {
		out = append(out, fmt.Sprintf("2nd rhythm %.3g Hz", r.Frequency))
	}
	if v := p.PulseToNoise(); !math.IsNaN(v) {
		out = append(out, fmt.Sprintf("pulse/noise %.2g", v))
	}
	if b := p.Breathing; !math.IsNaN(b.Period) {
		out = append(out, fmt.Sprintf("breath %.2g s, pulse +-%.2g %%", b.Period, 50*b.Variation))
	}
	return out
}
