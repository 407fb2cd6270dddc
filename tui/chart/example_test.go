package chart_test

import (
	"fmt"
	"math"

	"afterbeat/tui/chart"
)

// A trace of 1,000 samples at 250 Hz with one peak: the columns are computed
// once for a width and kept; drawing is then quick.
func Example() {
	trace := make([]float64, 1001)
	for i := range trace {
		trace[i] = 80 + 10*math.Sin(float64(i)/100)
	}
	trace[700] = 120

	p := chart.Plot{
		Title: "pressure",
		X:     chart.Axis{Low: 0, High: 4, Name: "time", Unit: "s"},
		Y:     chart.Covering("mmHg", trace),
	}
	columns, _ := p.Area(50, 10)
	p.Series = []chart.Series{{
		Name:   "measured",
		Values: chart.Columns(trace, 0, len(trace), columns, 0),
	}}
	fmt.Println(p.Draw(50, 10, chart.Theme{ASCII: true}))
	// Output:
	// mmHg  pressure  measured -
	// 120 +                              ..
	//     |                              ||
	// 100 +                              ||
	//     |                              ||
	//     | .----------.                .''-------.
	//  80 +-'          '----.      .----'         '-----
	//     |                 '------'
	//     ++-----+----+-----+----+-----+----+-----+----+
	//     0.0   0.5  1.0   1.5  2.0   2.5  3.0     4.0 s
}
