package data

// Account is what stands behind a number, to be read by whoever doubts it. The
// layer that computes the number gives it.
type Account struct {
	Meaning   string      // "peripheral resistance"
	Equation  []string    // one line each, symbols as in the source
	Source    string      // of the equation; with "from memory" where its text was not seen
	Published []Published // numbers of other people, to compare with
}

// Published is what a publication says of a number.
type Published struct {
	Group  string // who was measured: "healthy", "on support"
	Words  string // "0.72 +- 0.16 (SD), n 20"
	Source string // "Stöhr 2017, Artery Res 20:57"
	Seen   bool   // its text was seen; else it is from memory
}

// String is the line that a person reads: "0.72 +- 0.16 (SD), n 20; Stöhr 2017,
// Artery Res 20:57 (seen)".
func (p Published) String() string {
	where := "from memory"
	if p.Seen {
		where = "seen"
	}
	return p.Words + "; " + p.Source + " (" + where + ")"
}

// The groups of published numbers.
const (
	Healthy   = "healthy"
	Ill       = "ill"
	Mixed     = "both" // healthy and ill together
	OnSupport = "support"
)
