package warnlist

import (
	"maps"

	"afterbeat/data"
)

// Intake says which keys of the intake cure a warning.
func Intake() map[data.Code]string {
	const (
		span    = "[ and ] set the span at the cursor"
		site    = "o sets the site"
		channel = "enter uses the channel under the cursor"
	)
	return map[data.Code]string{
		data.CodeMissing:      span,
		data.CodeHole:         span,
		data.CodeIrregular:    span,
		data.CodeOpenBeat:     span,
		data.CodeFlat:         span,
		data.CodeClipped:      span,
		data.CodeDrift:        span + ", c sets the offset",
		data.CodeRecalibrated: "c calibrates anew, " + span,
		data.CodeCuff:         "c calibrates anew",
		data.CodeNoUnit:       "e states the unit",
		data.CodeUncalibrated: "e states the unit, c its scale, offset or cuff",
		data.CodeUnlikely:     "e states the unit, c calibrates, i inverts",
		data.CodeGuessedRole:  channel,
		data.CodeNotArterial:  channel,
		data.CodeStandIn:      site + ", " + channel,
		data.CodeRegional:     site + ", " + channel,
		data.CodeSiteUnknown:  site,
		data.CodeNegativeFlow: "i inverts, c sets the offset",
		data.CodePerArea:      "m states the diameter",
		data.CodeSteepAngle:   "m states the angle",
		data.CodeDelay:        "m states the delay",
		data.CodeOutflow:      "m states the outflow pressure",
		data.CodeDisagree:     "m states the delay and the outflow pressure",
	}
}

// Elsewhere is [Intake] for another screen, from where 1 opens the intake; own
// are the keys of that screen itself, which come first.
func Elsewhere(own map[data.Code]string) map[data.Code]string {
	out := Intake()
	for code, keys := range out {
		out[code] = "1 opens the intake, where " + keys
	}
	maps.Copy(out, own)
	return out
}
