package data

import (
	"math"

	"afterbeat/data/unit"
)

// Recording is one file of sampled channels, as read: every row of the file is
// a sample of every channel, and times are the file's own clock.
type Recording struct {
	Name   Text   // base name of the file
	SHA256 string // of the bytes of the file, hexadecimal
	// Time of each row, s, never falling. A file without a time column has
	// the times that its given rate implies.
	Time     []float64
	TimeName Text // header of the time column; empty where there is none
	Channels []Channel
	Warnings []Warning
}

// Channel is one column of a recording.
type Channel struct {
	Name     Text // the header as the file has it, cleaned
	Quantity unit.Quantity
	Unit     unit.Unit // the one written in the file
	Site     Site
	// Values in the internal unit of the quantity, NaN where missing. A channel
	// whose unit is not one of its quantity (volts of an uncalibrated
	// transducer) keeps its own unit: Unit.Calibrated is false.
	Values []float64
}

// Missing counts the samples without a value.
func (c Channel) Missing() int {
	n := 0
	for _, v := range c.Values {
		if math.IsNaN(v) {
			n++
		}
	}
	return n
}

// Clock describes the times of a recording.
type Clock struct {
	Rows        int
	Duration    float64 // last time less first, s
	Rate        float64 // Hz: steps that are no holes, repeated stamps included, over the time they take
	LongestStep float64 // s
	Repeated    int     // rows that have the time of the row before
}

// Grid is a uniform clock: sample k is at Start + k/Rate.
type Grid struct {
	Start float64 // s, the file's own clock
	Rate  float64 // Hz
	N     int
}

// At is the time of sample k, s.
func (g Grid) At(k int) float64 { return g.Start + float64(k)/g.Rate }

// Span is a stretch of time on the file's own clock, From included, To not, s.
type Span struct{ From, To float64 }
