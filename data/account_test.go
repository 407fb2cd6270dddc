package data

import "testing"

func TestPublishedSaysWhetherItWasSeen(t *testing.T) {
	p := Published{Group: Healthy, Words: "0.72 +- 0.16", Source: "Somebody 2017", Seen: true}
	if got := p.String(); got != "0.72 +- 0.16; Somebody 2017 (seen)" {
		t.Error(got)
	}
	p.Seen = false
	if got := p.String(); got != "0.72 +- 0.16; Somebody 2017 (from memory)" {
		t.Error(got)
	}
}
