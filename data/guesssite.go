package data

import (
	"slices"

	"afterbeat/data/unit"
)

// GuessSite guesses from a header where a channel was measured. The first rule
// of siteWords that has a word of the name decides; a name that says no more
// than "arterial" (abp, art), or nothing, is [SiteOther], and so is every
// channel that is no pressure, flow or velocity.
func GuessSite(header string, q unit.Quantity) Site {
	if q != unit.Pressure && q != unit.Flow && q != unit.Velocity {
		return SiteOther
	}
	name, _, _ := unit.Header(header)
	words := unit.Words(name)
	for _, rule := range siteWords {
		if slices.ContainsFunc(words, func(w string) bool { return slices.Contains(rule.words, w) }) {
			return rule.site
		}
	}
	return SiteOther
}

// siteWords are in the order of precedence: what lies elsewhere than the words
// after it would say ("pulmonary artery root", "descending aorta") comes first.
var siteWords = []struct {
	site  Site
	words []string
}{
	{SiteOther, []string{
		"pulmonary", "pap", "pa", "venous", "vein", "cvp", "descending", "desc", "abdominal", "thoracic", "coronary",
		"ventricular", "ventricle", "lv", "rv", "lvp", "rvp", "atrial", "atrium",
	}},
	{SiteLVOT, []string{"lvot"}},
	{SiteGraft, []string{"graft"}},
	{SitePump, []string{"pump", "lvad", "vad", "rotor"}},
	{SiteRoot, []string{"aortic", "aorta", "ao", "root", "aop", "pao", "qao", "aof"}},
	{SiteCarotid, []string{"carotid", "cca", "ica"}},
	{SiteMCA, []string{"mca", "mcav", "tcd"}},
	{SiteBrachial, []string{"brachial"}},
	{SiteRadial, []string{"radial"}},
	{SiteFinger, []string{"finger", "fin"}},
	{SiteFemoral, []string{"femoral", "fem", "cfa"}},
	{SiteRenal, []string{"renal"}},
}
