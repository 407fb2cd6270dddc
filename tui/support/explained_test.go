package support_test

import (
	"testing"

	posing "afterbeat/tree/support"
	"afterbeat/tui/screentest"
)

// Every headline number opens into its equation, its intervals and what is
// published of people on support.
func TestEveryNumberOpens(t *testing.T) {
	b := open(forecast(t), "enter")
	says(t, b.View(), "> retained pulse", "(max P - min P) supported / (max P - min P) native", "draws", "doubt from", "-25.3 +- 9.8 mmHg")
	b.Press("down")
	says(t, b.View(), "> pulse pressure")
	b.Press(" ")
	says(t, b.View(), "+- 7 at 10480/min")
	screentest.NamesAll(t, b.Screen)
	b.Press("esc")
	silent(t, b.View(), "doubt from")
}

// A yardstick says so of each of its numbers, and an identity that it is one.
func TestNumbersOfAYardstickSayWhatTheyAre(t *testing.T) {
	s := computed(t)
	b := open(s, "enter")
	says(t, b.View(), "> retained pulse", "a yardstick: no ventricle")
	b = open(s, "left", "enter")
	says(t, b.View(), "by construction: an identity")
	for _, f := range []posing.Figure{posing.PulsePressure, posing.MeanPressure} {
		b.Press("down")
		says(t, b.View(), "> "+string(f))
	}
}
