package beat

import (
	"afterbeat/data"
	"afterbeat/data/unit"
)

// The measures that are no index, by the names of the tables.
const (
	HeartRateOf Index = "heart rate"
	MeanOf      Index = "mean"
	MaximumOf   Index = "maximum"
	MinimumOf   Index = "minimum"
	SwingOf     Index = "maximum less minimum"
)

// Account is what stands behind a measure of a quantity at a site: its formula,
// and what is published of it there.
func Account(i Index, q unit.Quantity, at data.Site) data.Account {
	a := formulas()[i]
	for _, p := range publications() {
		if p.of == i && p.quantity == q && p.holds(at) {
			a.Published = append(a.Published, p.Published)
		}
	}
	return a
}

// formulas are those of [Measures].
func formulas() map[Index]data.Account {
	of := func(meaning, source string, equation ...string) data.Account {
		return data.Account{Meaning: meaning, Source: source, Equation: equation}
	}
	const read = "read off the average beat"
	return map[Index]data.Account{
		HeartRateOf:    of("beats a minute", "common practice", "60 / median interval of the beats used, s"),
		MeanOf:         of("mean over the average beat", read, "(1/T) integral of x dt"),
		MaximumOf:      of("largest value of the average beat", read, "max x"),
		MinimumOf:      of("smallest value of the average beat", read, "min x"),
		SwingOf:        of("of a pressure: the pulse pressure", read, "max x - min x"),
		GoslingPI:      of("Gosling's pulsatility index", "Gosling and King 1974 (from memory)", "PI = (max - min)/mean, of this channel; no pump's scaled number"),
		PourcelotRI:    of("Pourcelot's resistive index", "Pourcelot 1974 (from memory)", "RI = (max - min)/max; above 1 where flow reverses"),
		SystolicRatio:  of("systolic over diastolic", "common practice", "S/D = max/min"),
		FormFactor:     of("where the mean lies in the pulse", "Chemla 2002, Clin Sci 103:7 (seen)", "(mean - min)/(max - min)"),
		PulsatilePower: of("power of the harmonics over that of the mean", "ASAIO J 2023;69:445 (seen)", "sum over k of (A_k/A_0)^2"),
		TimeToPeak:     of("from the onset to the first maximum", "common practice", "t(max) - t(onset)"),
		MaxSlope:       of("steepest rise, over 20 ms", "common practice", "max of (x(t + 10 ms) - x(t - 10 ms))/20 ms"),
		Augmentation:   of("what a reflected wave adds to the pulse", "Murgo 1980, Circulation 62:105 (groups seen, formula from memory)", "(Ps - Pi)/PP where the inflection Pi comes before the peak Ps,", "(Pi - Ps)/PP where it comes after"),
	}
}

// publication is a published number of a measure of a quantity at some sites;
// at any site where none is given.
type publication struct {
	of       Index
	quantity unit.Quantity
	sites    []data.Site
	data.Published
}

func (p publication) holds(at data.Site) bool {
	for _, s := range p.sites {
		if s == at {
			return true
		}
	}
	return len(p.sites) == 0
}

// publications are published numbers. All of them were
// seen in a text, as a rule an abstract, unless they say otherwise.
func publications() []publication {
	var (
		stoehr  = "Stöhr 2017, Artery Res 20:57"
		cowger  = "Cowger 2020, J Heart Lung Transplant 39:441"
		legs    = "duplex of the legs, 136 control limbs, 29 patients (abstract)"
		arm     = "brachial Doppler at rest, two series (abstracts)"
		powers  = "invasive, ASAIO J 2023;69:445"
		neck    = "duplex of 199 people, 21 to 92 years (abstract)"
		central = []data.Site{data.SiteRoot, data.SiteLVOT, data.SiteGraft}
	)
	seen := func(of Index, q unit.Quantity, group, words, source string, sites ...data.Site) publication {
		return publication{of, q, sites, data.Published{Group: group, Words: words, Source: source, Seen: true}}
	}
	recalled := func(of Index, q unit.Quantity, group, words, source string, sites ...data.Site) publication {
		p := seen(of, q, group, words, source, sites...)
		p.Seen = false
		return p
	}
	return []publication{
		seen(MeanOf, unit.Pressure, data.OnSupport, "84 mmHg, quartiles 77 to 90, n 16155", cowger),
		seen(MaximumOf, unit.Pressure, data.OnSupport, "99 mmHg, quartiles 90 to 107, n 16155", cowger),
		seen(SwingOf, unit.Pressure, data.Healthy, "30 to 40 mmHg", stoehr),
		seen(SwingOf, unit.Pressure, data.OnSupport, "about 20 mmHg", stoehr),
		seen(SwingOf, unit.Pressure, data.OnSupport, "median 22 mmHg, n 220, axial pumps", "outpatients (abstract)"),
		seen(FormFactor, unit.Pressure, data.Mixed, "0.45, range 0.35 to 0.53, n 73", "Chemla 2002, Clin Sci 103:7", data.SiteRoot),
		seen(FormFactor, unit.Pressure, data.Mixed, "0.33", "Chemla 2002, Clin Sci 103:7", data.SiteBrachial),
		seen(PulsatilePower, unit.Pressure, data.Ill, "heart failure 0.09 (0.06 to 0.17), n 44", powers),
		seen(PulsatilePower, unit.Pressure, data.OnSupport, "0.006 (0.002 to 0.012), n 71", powers),
		seen(MaxSlope, unit.Pressure, data.Ill, "813 +- 216 mmHg/s (SD), n 17, before bypass", "femoral pressure (abstract)", data.SiteFemoral),
		seen(MeanOf, unit.Flow, data.Healthy, "58 to 137 mL/s in men, 55 to 122 in women (limits), n 3090", "cardiac output by echocardiography (abstract)", central...),
		seen(MeanOf, unit.Flow, data.Healthy, "6.9 +- 1.5 mL/s (SD), n 174", "common carotid flow (abstract)", data.SiteCarotid),
		seen(MeanOf, unit.Velocity, data.Healthy, "58.4 +- 8.4 cm/s under 40 years, 44.7 +- 11.1 over 60 (SD), n 50", "Hennerici 1987, Surg Neurol 27:439", data.SiteMCA),
		seen(GoslingPI, unit.Velocity, data.Healthy, "0.72 +- 0.16 (SD), n 20", stoehr, data.SiteMCA),
		seen(GoslingPI, unit.Velocity, data.Ill, "heart failure 1.32 +- 0.17, n 4; a later series of 30 lay below healthy people", stoehr, data.SiteMCA),
		seen(GoslingPI, unit.Velocity, data.OnSupport, "0.36 +- 0.21 (SD), n 8", stoehr, data.SiteMCA),
		seen(GoslingPI, unit.Velocity, data.Healthy, "1.8 common, 1.2 internal carotid", neck, data.SiteCarotid),
		seen(PourcelotRI, unit.Velocity, data.Healthy, "0.78 common, 0.67 internal carotid", neck, data.SiteCarotid),
		seen(MaximumOf, unit.Velocity, data.Healthy, "63 cm/s common, 74 internal carotid", neck, data.SiteCarotid),
		recalled(PourcelotRI, unit.Velocity, data.Healthy, "0.58 to 0.70 within the kidney", "common practice", data.SiteRenal),
		seen(GoslingPI, unit.Velocity, data.Healthy, "14 +- 7, n 15; 13 +- 2, n 10", arm, data.SiteBrachial),
		seen(GoslingPI, unit.Velocity, data.OnSupport, "3 +- 2, n 15; 2 +- 1, n 11", arm, data.SiteBrachial),
		seen(MaximumOf, unit.Velocity, data.OnSupport, "11 cm/s (6 to 26), n 9, at a mean of 92 mmHg", "brachial Doppler (abstract)", data.SiteBrachial),
		seen(MaximumOf, unit.Velocity, data.Healthy, "137 +- 4.8 cm/s, common femoral", legs, data.SiteFemoral),
		seen(MaximumOf, unit.Velocity, data.OnSupport, "49.5 +- 4.9 cm/s, common femoral", legs, data.SiteFemoral),
		seen(TimeToPeak, unit.Velocity, data.Healthy, "0.097 s, common femoral", legs, data.SiteFemoral),
		seen(TimeToPeak, unit.Velocity, data.OnSupport, "0.207 s, common femoral", legs, data.SiteFemoral),
	}
}
