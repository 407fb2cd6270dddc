package study

import (
	"fmt"
	"math"
	"strings"

	"afterbeat/data"
	"afterbeat/data/casenote"
)

// shownMove is the least change of the retained pulse that the note lists.
const shownMove = 0.01

// leaningSection says what the forecast depends on, and what would prove it
// wrong.
func (f Forecast) leaningSection() casenote.Section {
	t := casenote.Table{Header: []string{"assumption", "change", "retained pulse", "retained pulse, difference"}}
	small := 0
	for _, s := range f.Sensitivity {
		if math.Abs(s.Difference) < shownMove {
			small++
			continue
		}
		t.Rows = append(t.Rows, []casenote.Cell{
			{Words: data.Clean(s.Assumption)}, {Words: data.Clean(s.Change)}, plain(s.RetainedPulse), plain(s.Difference),
		})
	}
	if small > 0 {
		t.Foot = fmt.Sprintf("%d further moves change it by less than %g.", small, shownMove)
	}
	middle := f.Speeds[f.Middle]
	return casenote.Section{
		Title: "Forecast: what it depends on",
		Words: words(
			fmt.Sprintf("Retained pulse at %.4g (1000/min), nominally %.3g, when one assumption is moved and the native state is met again; \"on support\" moves it on support only. The largest effect comes first.", middle.Speed, middle.RetainedPulse.Value),
			"What matters most: "+f.heaviestWords()+".",
			"What would prove it wrong: "+f.Disproof,
			"C at another mean pressure follows the aorta's curve (Langewouters 1984) of "+ageOf(f.caseOf()).words()+": an upper bound.",
		),
		Tables: []casenote.Table{t},
	}
}

// heaviestWords name the two assumptions that matter most.
func (f Forecast) heaviestWords() string {
	var all []string
	for _, s := range f.heaviest(2) {
		all = append(all, fmt.Sprintf("%s (%s: retained pulse %.2f)", s.Assumption, s.Change, s.RetainedPulse))
	}
	return strings.Join(all, "; ")
}

// shortRows are the forecast in a few lines: the middle speed.
func (f Forecast) shortRows() []casenote.Row {
	s := f.Speeds[f.Middle]
	at := fmt.Sprintf(", forecast at %.4g/min", 1000*s.Speed)
	return []casenote.Row{
		casenote.Quantity("retained pulse"+at, s.RetainedPulse, "of native", data.Estimated),
		casenote.Quantity("pulse pressure"+at, s.PulsePressure, "mmHg", data.Estimated),
		casenote.Quantity("mean pressure"+at, s.MeanPressure, "mmHg", data.Estimated),
		casenote.Quantity("valve stays shut from, forecast", f.ValveLimit, "1000/min", data.Estimated),
	}
}

// shortWords say what the forecast rests on.
func (f Forecast) shortWords() string {
	volume := "an end-diastolic volume and filling drawn from assumed ranges"
	if c := f.caseOf(); c.EDVML != nil || c.EF != nil {
		volume = "the end-diastolic volume given and filling drawn from assumed ranges"
	}
	return fmt.Sprintf("The forecast couples a ventricle (set up to eject what was measured, with %s) and the pump %s (%s) to the fitted load, which is held. What matters most: %s. The yardstick has no ventricle and is no forecast. Each line has its place below.",
		volume, f.Pump.Name, f.Pump.Origin, f.heaviestWords())
}
