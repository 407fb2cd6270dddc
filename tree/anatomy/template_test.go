package anatomy

import (
	"math"
	"testing"

	"afterbeat/data"
	"afterbeat/tree"
)

// asPublished is the table without replaced radii, with its own resistances and
// the terminals that its checks were made with (values.md 2.2).
func asPublished() tree.Network {
	n := tree.Network{Blood: tree.Blood{Density: tableDensity, Viscosity: 0.04}}
	conductance := 0.0
	rows := published(false)
	for _, v := range rows {
		if !math.IsNaN(v.terminal) {
			conductance += 1 / v.terminal
		}
	}
	for _, v := range rows {
		s := tree.Segment{ID: v.id, Parent: v.parent, Name: v.name, Bed: v.bed, Length: v.length, Radius: v.radius(), WaveSpeed: v.speed()}
		if !math.IsNaN(v.terminal) {
			s.Terminal = &tree.Terminal{C: tableTerminals / conductance / v.terminal}
		}
		n.Segments = append(n.Segments, s)
		if s.Terminal != nil {
			setResistance(&n, len(n.Segments)-1, v.terminal)
		}
	}
	return n
}

// Numbers of values.md 2.2, computed apart from this program from the table as
// stored.
func TestEmbeddedTableIsTheOneThatWasChecked(t *testing.T) {
	n := asPublished()
	if len(n.Segments) != 55 {
		t.Fatalf("%d segments", len(n.Segments))
	}
	parallel, terminals := 0.0, 0
	for _, v := range published(false) {
		if !math.IsNaN(v.terminal) {
			parallel += 1 / v.terminal
			terminals++
		}
	}
	load, err := tree.NewLoad(n)
	if err != nil {
		t.Fatal(err)
	}
	for _, c := range []struct {
		what            string
		got, want, most float64
	}{
		{"terminals", float64(terminals), 28, 0},
		{"parallel of the terminals", 1 / parallel, 1.00660, 1e-5},
		{"input resistance", load.Resistance(), 1.05006461, 2e-6},
		{"compliance of the walls", ComplianceOfWalls(n), 0.6401, 1e-4},
		{"compliance of the terminals", ComplianceOfTerminals(n), 0.56, 1e-12},
		{"compliance of all", load.Compliance(), 0.6401 + 0.56, 1e-4},
		{"speed in the ascending aorta", published(false)[0].speed() / 100, 5.33, 1e-3},
		{"modulus at 1.25 Hz", abs(load.Impedance(2 * math.Pi * 1.25)), 0.13035008, 2e-6},
	} {
		if !(math.Abs(c.got/c.want-1) <= c.most) {
			t.Errorf("%s: %.9g, want %.9g", c.what, c.got, c.want)
		}
	}
}

func abs(z complex128) float64 { return math.Hypot(real(z), imag(z)) }

// Published native values beside those of the table: velocities in m/s, values.md
// 2.2 and 2.3 (aorta 4-8 with 6.68 invasive [C5], carotid 5-8, brachial and
// femoral 7-11, leg 9-18: from memory).
func TestWaveSpeedsAreThoseOfPeople(t *testing.T) {
	n := asPublished()
	for _, c := range []struct {
		id        string
		low, high float64
	}{{"1", 4, 8}, {"18", 4, 8}, {"39", 4, 8}, {"5", 5, 8}, {"46", 7, 11}, {"49", 9, 18}} {
		s := n.Segments[n.Find(c.id)]
		if v := s.WaveSpeed / 100; v < c.low || v > c.high {
			t.Errorf("%s: %.3g m/s, published %g to %g", s.Name, v, c.low, c.high)
		}
	}
	// Medians of healthy people from under 30 to 50 years: 6.1 to 8.1 m/s.
	if v := PulseWaveVelocity(n); v < 5 || v > 8 {
		t.Errorf("carotid-femoral %.3g m/s", v)
	}
}

// The organ table adds up to what was published, and the shares to one, with the
// published parts of kidneys, splanchnic bed and brain (values.md 8).
func TestSharesFollowTheOrganTable(t *testing.T) {
	sum := Heart
	for _, o := range Organs() {
		sum += o.Percent
		part := 0.0
		for _, p := range o.Feeds {
			part += p
		}
		if o.Feeds != nil && math.Abs(part-1) > 1e-12 {
			t.Errorf("%s is fed %g times", o.Name, part)
		}
	}
	if math.Abs(sum-102.55) > 1e-9 {
		t.Errorf("the organs add up to %g, published 102.55", sum)
	}
	rows := published(true)
	for _, c := range []struct {
		brain float64
		want  map[string]float64
	}{
		{0, map[string]float64{"brain": 12 / 98.55, "kidneys": 19 / 98.55, "gut and liver": 25.5 / 98.55}},
		{0.25, map[string]float64{"brain": 0.25, "kidneys": 19 / 98.55 * 0.75 / (1 - 12/98.55)}},
	} {
		all, of := 0.0, map[string]float64{}
		parts := shares(rows, c.brain)
		for _, v := range rows {
			all += parts[v.id]
			of[v.bed] += parts[v.id]
		}
		if math.Abs(all-1) > 1e-12 {
			t.Errorf("shares add up to %g", all)
		}
		for bed, want := range c.want {
			if math.Abs(of[bed]-want) > 1e-12 {
				t.Errorf("%s gets %g, want %g", bed, of[bed], want)
			}
		}
	}
}

// Every terminal belongs to a bed, no other segment does, and every site that a
// distal trace may have is found.
func TestBedsAndSites(t *testing.T) {
	n := asPublished()
	for _, s := range n.Segments {
		if (s.Bed != "") != (s.Terminal != nil) {
			t.Errorf("%s: bed %q", s.Name, s.Bed)
		}
	}
	for site, id := range map[data.Site]string{
		data.SiteRoot: "1", data.SiteCarotid: "5", data.SiteMCA: "12", data.SiteBrachial: "7",
		data.SiteRadial: "8", data.SiteFinger: "8", data.SiteFemoral: "52", data.SiteRenal: "38",
	} {
		at, ok := Find(n, site)
		if !ok || n.Segments[at.Segment].ID != id {
			t.Errorf("%s lies in %+v, want segment %s", site, at, id)
		}
	}
	if _, ok := Find(n, data.SitePump); ok {
		t.Error("a pump lies in the tree")
	}
}

// Medians by age (Eur Heart J 2010;31:2338, from memory).
func TestVelocityOfAge(t *testing.T) {
	for age, want := range map[float64]float64{20: 6.1, 25: 6.1, 30: 6.25, 55: 8.1, 70: 10.15, 90: 10.6} {
		if v := VelocityOfAge(age); math.Abs(v-want) > 1e-12 {
			t.Errorf("at %g years %g m/s, want %g", age, v, want)
		}
	}
	// 70 kg, 175 cm: 1.848 m² (values.md 2.4).
	if a := SurfaceArea(175, 70); math.Abs(a-1.848) > 5e-4 {
		t.Errorf("body surface %g m²", a)
	}
}
