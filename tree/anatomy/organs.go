package anatomy

// Organ is a row of the organ table: its part of the output of an adult at rest,
// and the terminals that feed it, by id of the embedded table.
type Organ struct {
	Name    string
	Percent float64 // as published; all of them add up to 102.55
	// Feeds are parts of the organ's flow by terminal. Empty: tissue of the whole
	// body, fed by all terminals of limbs, head and trunk in the proportion of
	// the table's own resistances.
	Feeds map[string]float64
}

// Organs is the organ table (values.md 8). The heart is not in it: its 4 % are
// left out, since the tree has no coronary arteries. Which terminal feeds what is
// anatomy; that three quarters of the brain's flow come through the carotids is
// common practice.
func Organs() []Organ {
	return []Organ{
		{"kidneys", 19, map[string]float64{"36": 0.5, "38": 0.5}},
		{"brain", 12, map[string]float64{"12": 0.375, "16": 0.375, "6": 0.125, "20": 0.125}},
		{"small intestine", 10, map[string]float64{"34": 1}},
		{"upper large intestine", 2, map[string]float64{"34": 1}},
		{"lower large intestine", 2, map[string]float64{"40": 1}},
		{"liver (hepatic artery)", 6.5, map[string]float64{"31": 1}},
		{"spleen", 3, map[string]float64{"33": 1}},
		{"pancreas", 1, map[string]float64{"33": 1}},
		{"stomach", 1, map[string]float64{"32": 1}},
		{"lung tissue (bronchial)", 2.5, map[string]float64{"26": 1}},
		{"thyroid", 1.5, map[string]float64{"13": 0.5, "17": 0.5}},
		{"adrenals", 0.3, map[string]float64{"26": 1}},
		{"testes", 0.05, map[string]float64{"45": 0.5, "51": 0.5}},
		{"muscle", 17, nil},
		{"adipose tissue", 5, nil},
		{"skin", 5, nil},
		{"red marrow", 3, nil},
		{"yellow marrow", 3, nil},
		{"trabecular bone", 0.9, nil},
		{"cortical bone", 0.6, nil},
		{"other", 3.2, nil},
	}
}

// Heart is the part of the output that the organ table gives the heart, percent.
const Heart = 4.0

// BrainFlow is the brain's flow where it is defended, mL/s: 12 % of 5.5 L/min.
const BrainFlow = 0.12 * 5500 / 60

// LowOutput is the output below which the brain is shown by its flow beside its
// share, mL/s: 4.5 L/min.
const LowOutput = 4500.0 / 60

// mostBrain is the most of the output that a brain's given flow may take.
const mostBrain = 0.5

// shares are the parts of the flow by terminal id, adding up to 1. brain is the
// brain's part where it is above 0, else that of the organ table.
func shares(rows []vessel, brain float64) map[string]float64 {
	all, parietal := 0.0, 0.0
	for _, v := range rows {
		if v.bed == "arms" || v.bed == "legs" || v.bed == "trunk" {
			parietal += 1 / v.terminal
		}
	}
	out := map[string]float64{}
	for _, o := range Organs() {
		all += o.Percent
		for _, v := range rows {
			if o.Feeds == nil && (v.bed == "arms" || v.bed == "legs" || v.bed == "trunk") {
				out[v.id] += o.Percent / v.terminal / parietal
			}
			out[v.id] += o.Percent * o.Feeds[v.id]
		}
	}
	brainOf := 0.0
	for _, v := range rows {
		out[v.id] /= all
		if v.bed == "brain" {
			brainOf += out[v.id]
		}
	}
	if brain <= 0 {
		return out
	}
	brain = min(brain, mostBrain)
	for _, v := range rows {
		if v.bed == "brain" {
			out[v.id] *= brain / brainOf
		} else {
			out[v.id] *= (1 - brain) / (1 - brainOf)
		}
	}
	return out
}
