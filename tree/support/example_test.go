package support_test

import (
	"fmt"
	"math"

	"afterbeat/data"
	"afterbeat/fitting"
	"afterbeat/tree/support"
)

// What two yardsticks leave of a half-sine of 70 mL on a three-element load.
func Example() {
	flow := data.Period{Samples: make([]float64, 800), Rate: 1000}
	for j := range 300 {
		flow.Samples[j] = math.Pi * 70 / 0.6 * math.Sin(math.Pi*float64(j)/300)
	}
	model, _ := fitting.ByName("wk3")
	load := fitting.Lumped{Model: model, Values: fitting.Values{R: 1, C: 1.5, Zc: 0.05}}
	for _, posing := range support.Posings() {
		answer, err := support.Pose(load, flow, 0, posing, []float64{0.5, 0.9})
		if err != nil {
			fmt.Println(err)
			return
		}
		for _, c := range answer.Comparisons {
			fmt.Printf("%s, share %.1f: retained pulse pressure %.3f, by construction: %v\n",
				posing, c.Share, c.RetainedPressure.Value, c.ByConstruction)
		}
	}
	// Output:
	// scaled, share 0.5: retained pulse pressure 0.500, by construction: true
	// scaled, share 0.9: retained pulse pressure 0.100, by construction: true
	// late-valve, share 0.5: retained pulse pressure 0.586, by construction: false
	// late-valve, share 0.9: retained pulse pressure 0.164, by construction: false
}
