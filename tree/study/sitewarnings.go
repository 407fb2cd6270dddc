package study

import (
	"fmt"

	"afterbeat/data"
	"afterbeat/data/unit"
)

// siteWarnings speaks of what the sites of the chosen channels mean for a fit.
func siteWarnings(t Intake) []data.Warning {
	var out []data.Warning
	p, hasPressure := t.Chosen(t.Selection.Pressure)
	q, hasFlow := t.flowChannel()
	if hasFlow && q.Site == data.SiteOther {
		out = append(out, data.Warning{
			Code: data.CodeSiteUnknown, Channel: q.Name,
			Text: "where the flow was measured is not known; the fit is named after no bed",
			Cure: fmt.Sprintf("--site %s=SITE, SITE one of %s", q.Name, joinSites()),
		})
	}
	if hasFlow && !q.Site.Systemic() && q.Site != data.SiteOther {
		out = append(out, data.Warning{
			Code: data.CodeRegional, Channel: q.Name,
			Text: fmt.Sprintf("the flow is that of one bed (%s): R and C are of that bed, not of the body", q.Site),
			Cure: "for the load of the body, record flow at the root or in the outflow tract",
		})
	}
	if hasPressure && !p.Arterial() {
		out = append(out, data.Warning{
			Code: data.CodeNotArterial, Channel: p.Name,
			Text: "by its name this is no pressure of a systemic artery: what is fitted with it is not the load of the body",
			Cure: "choose another column with --pressure",
		})
	}
	if hasPressure && hasFlow && !q.Site.Systemic() && q.Site != data.SiteOther && p.Site != q.Site {
		out = append(out, data.Warning{
			Code: data.CodeStandIn, Channel: p.Name,
			Text: fmt.Sprintf("pressure of site %s stands in for that at the %s, where the flow was measured; a pulse 1.3 times too high puts C 23 %% too low and Zc 26 %% too high", p.Site, q.Site),
			Cure: "a pressure measured beside the flow; state the delay between the two with --delay",
		})
	}
	if hasPressure && hasFlow && p.Site != data.SiteRoot && (q.Site.Systemic() || q.Site == data.SiteOther) {
		out = append(out, standIn(p))
	}
	return out
}

// standIn warns of a pressure that was not measured at the root, with the size
// of the effect (half-sine beat on a three-element load, refitted: pulse 1.3
// times too high puts C 23 % too low and Zc 26 % too high; computed).
func standIn(p data.Channel) data.Warning {
	where := "at the " + string(p.Site)
	if p.Site == data.SiteOther {
		where = "at a place that its name does not tell"
	}
	return data.Warning{
		Code: data.CodeStandIn, Channel: p.Name,
		Text: "pressure measured " + where + " stands in for the root's; a pulse 1.3 times that of the root puts C 23 % too low and Zc 26 % too high",
		Cure: fmt.Sprintf("use a root pressure, or state --site %s=root if it is one", p.Name),
	}
}

// guesses are the warnings of channels that were guessed among several of their
// quantity. Where there was no other, the table of channels says enough.
func guesses(t Intake) []data.Warning {
	var out []data.Warning
	for _, w := range t.Selection.Guessed {
		of := map[unit.Quantity]int{}
		var guessed unit.Quantity
		for _, ch := range t.Channels {
			of[ch.Quantity]++
			if ch.Name == w.Channel {
				guessed = ch.Quantity
			}
		}
		if of[guessed] > 1 {
			out = append(out, w)
		}
	}
	return out
}
