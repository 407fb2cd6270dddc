package data

import (
	"slices"

	"afterbeat/data/unit"
)

// neverGuessed tells whether only a person may choose the channel: a pump's
// own flow or pressure, and what the name places elsewhere than in a systemic
// artery.
func neverGuessed(ch Channel) bool {
	return ch.Site == SitePump || slices.ContainsFunc(channelWords(ch), func(w string) bool { return slices.Contains(elsewhere, w) })
}

// Arterial tells whether a pressure may be one of a systemic artery: its name
// does not place it elsewhere, in the pulmonary circulation, a vein, a ventricle.
func (c Channel) Arterial() bool { return !neverGuessed(c) }

// elsewhere are words of pulmonary, venous, intracranial, airway, ventricular,
// atrial and other pressures and flows outside the systemic arteries.
var elsewhere = []string{
	"pulmonary", "pap", "mpap", "pa", "ppa", "pcwp", "pawp", "wedge", "capillary", "venous", "vein", "cvp", "pv", "svc", "ivc", "portal",
	"icp", "intracranial", "csf", "cpp", "airway", "paw", "peep", "insp", "inspiratory", "exp", "expiratory", "ventilator", "vent",
	"gas", "air", "lvp", "plv", "lvedp", "rvp", "prv", "lv", "rv", "ventricular", "ventricle", "la", "ra", "lap", "rap", "pla", "pra",
	"atrial", "atrium", "mitral", "tricuspid", "iap", "esophageal", "oesophageal", "bladder", "cuff", "nibp", "filling",
}

func channelWords(ch Channel) []string {
	name, _, _ := unit.Header(ch.Name.String())
	return unit.Words(name)
}

// sharesSite tells whether two channels were measured at the same named site.
func sharesSite(a, b Channel) bool { return a.Site == b.Site && a.Site != SiteOther }

// nearness orders channels from the root outwards: the root, the outflow tract
// and the graft, names that say only "arterial", names that say nothing, named
// arteries.
func nearness(ch Channel) int {
	switch {
	case ch.Site == SiteRoot:
		return 0
	case ch.Site.Systemic():
		return 1
	case ch.Site != SiteOther:
		return 4
	case slices.ContainsFunc(channelWords(ch), func(w string) bool {
		return slices.Contains([]string{"abp", "art", "arterial", "ibp"}, w)
	}):
		return 2
	}
	return 3
}
