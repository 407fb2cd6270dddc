package study

import (
	"encoding/json"
	"math"

	"afterbeat/data"
	"afterbeat/data/casenote"
)

// Version is the version of the program, in every output.
const Version = "0.1.0"

// Number is a float64 that JSON has as null where it is undefined.
type Number float64

// MarshalJSON gives full precision, and null for NaN and infinities.
func (n Number) MarshalJSON() ([]byte, error) {
	if v := float64(n); math.IsNaN(v) || math.IsInf(v, 0) {
		return []byte("null"), nil
	}
	return json.Marshal(float64(n))
}

// Program names the program in a report.
type Program struct {
	Name    string `json:"name"`
	Version string `json:"version"`
}

// Head begins every report.
type Head struct {
	Caution string  `json:"caution"`
	Program Program `json:"program"`
}

func head() Head {
	return Head{Caution: casenote.Caution, Program: Program{Name: "afterbeat", Version: Version}}
}

// EstimateReport is a number with its doubt.
type EstimateReport struct {
	Value      Number  `json:"value"`
	Low        Number  `json:"low"`
	High       Number  `json:"high"`
	RandomLow  Number  `json:"random_low"`
	RandomHigh Number  `json:"random_high"`
	Identified bool    `json:"identified"`
	Reason     *string `json:"reason"`
}

func estimateReport(e data.Estimate) EstimateReport {
	return EstimateReport{
		Value: Number(e.Value), Low: Number(e.Total.Low), High: Number(e.Total.High),
		RandomLow: Number(e.Random.Low), RandomHigh: Number(e.Random.High),
		Identified: e.Identified, Reason: reason(e.Why),
	}
}

// reason is null where there is nothing to explain.
func reason(s string) *string {
	if s == "" {
		return nil
	}
	return &s
}

// WarningReport is a warning in a report.
type WarningReport struct {
	Code    data.Code  `json:"code"`
	Channel *data.Text `json:"channel"`
	Text    string     `json:"text"`
	Cure    string     `json:"cure"`
}

func warningReports(warnings []data.Warning) []WarningReport {
	out := []WarningReport{}
	for _, w := range warnings {
		r := WarningReport{Code: w.Code, Text: w.Text, Cure: w.Cure}
		if w.Channel != (data.Text{}) {
			r.Channel = &w.Channel
		}
		out = append(out, r)
	}
	return out
}
