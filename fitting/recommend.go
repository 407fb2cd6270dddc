package fitting

import (
	"fmt"
	"math"
	"slices"
)

// Recommendation names a result and the reason. Without a Model it says why
// none is recommended.
type Recommendation struct {
	Model, Basis string
	Why          string // a sentence
}

// Recommend picks among results of the same beats: of those whose parameters
// are all identified the one with the lowest AICc, or where that is undefined
// the one with the smallest residual. Results of the whole span, where there
// are identified ones, come before those of the average beat. The person
// decides; nothing switches by itself.
func Recommend(results []Result) Recommendation {
	var sound, doubtful []Result
	for _, r := range results {
		if r.Identified() {
			sound = append(sound, r)
		} else {
			doubtful = append(doubtful, r)
		}
	}
	if span := ofBasis(sound, BasisSpan); len(span) > 0 {
		sound, doubtful = span, ofBasis(doubtful, BasisSpan)
	}
	if len(sound) == 0 {
		return Recommendation{Why: noneIdentified(doubtful)}
	}
	criterion, by := byAICc, "AICc"
	if slices.ContainsFunc(sound, func(r Result) bool { return math.IsNaN(r.AICc) }) {
		criterion, by = byRMSE, "residual"
	}
	best := slices.MinFunc(sound, criterion)
	return Recommendation{Model: best.Model.Name, Basis: best.Basis, Why: best.reason(sound, doubtful, by)}
}

func ofBasis(results []Result, basis string) (some []Result) {
	for _, r := range results {
		if r.Basis == basis {
			some = append(some, r)
		}
	}
	return some
}

func byAICc(a, b Result) int { return compare(a.AICc, b.AICc) }
func byRMSE(a, b Result) int { return compare(a.RMSE, b.RMSE) }

func compare(a, b float64) int {
	switch {
	case a < b:
		return -1
	case a > b:
		return 1
	}
	return 0
}

// reason is the sentence of a recommendation.
func (r Result) reason(sound, doubtful []Result, by string) string {
	var why string
	switch {
	case len(sound) == 1 && len(doubtful) == 0:
		return fmt.Sprintf("%s is the only model fitted, and its parameters are identified", r.Model.Name)
	case len(sound) == 1:
		why = fmt.Sprintf("%s is the only model whose parameters are all identified", r.Model.Name)
	case by == "AICc":
		next := math.Inf(1)
		for _, other := range sound {
			if other.Model != r.Model {
				next = min(next, other.AICc)
			}
		}
		why = fmt.Sprintf("%s has the lowest AICc, by %.1f, among the models whose parameters are all identified", r.Model.Name, next-r.AICc)
	default:
		why = fmt.Sprintf("%s leaves the smallest residual, %.3g mmHg, among the models whose parameters are all identified; AICc is undefined: %s",
			r.Model.Name, r.RMSE, r.CriterionReason)
	}
	if len(doubtful) > 0 {
		why += "; left out: " + faults(doubtful)
	}
	return why
}

func noneIdentified(doubtful []Result) string {
	if len(doubtful) == 0 {
		return "no model was fitted"
	}
	return "no model has all its parameters identified: " + faults(doubtful)
}

// faults names the first parameter of each result that is not identified.
func faults(results []Result) string {
	text := ""
	for _, r := range results {
		for _, p := range r.Parameters {
			if p.Identified {
				continue
			}
			if text != "" {
				text += "; "
			}
			text += fmt.Sprintf("%s of %s is not identified (%s)", p.Name, r.Model.Name, p.Why)
			break
		}
	}
	return text
}
