package data

// Site is where on the body a channel was measured. It decides what a fit
// means: at the root it is systemic, elsewhere regional.
type Site string

// The sites. SiteOther is a channel whose name says only "arterial", or nothing.
const (
	SiteRoot     Site = "root"
	SiteLVOT     Site = "lvot"
	SiteGraft    Site = "graft"
	SiteCarotid  Site = "carotid"
	SiteMCA      Site = "mca"
	SiteBrachial Site = "brachial"
	SiteRadial   Site = "radial"
	SiteFinger   Site = "finger"
	SiteFemoral  Site = "femoral"
	SiteRenal    Site = "renal"
	SitePump     Site = "pump"
	SiteOther    Site = "other"
)

// Sites lists every site, in the order of help texts.
func Sites() []Site {
	return []Site{
		SiteRoot, SiteLVOT, SiteGraft, SiteCarotid, SiteMCA, SiteBrachial,
		SiteRadial, SiteFinger, SiteFemoral, SiteRenal, SitePump, SiteOther,
	}
}

// Systemic tells whether all of the heart's output passes the site, so that a
// load fitted with the flow measured there is that of the whole body: the
// root, the outflow tract, or the pump's graft.
func (s Site) Systemic() bool { return s == SiteRoot || s == SiteLVOT || s == SiteGraft }
