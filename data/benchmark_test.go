package data

import (
	"bytes"
	"fmt"
	"math"
	"strconv"
	"testing"
)

// benchmarkFile is 100 s of pressure and velocity at 1000 Hz.
func benchmarkFile() []byte {
	var b bytes.Buffer
	b.WriteString("time_s,abp_mmHg,mcav_cm_s,hr_bpm\n")
	for i := range 100_000 {
		a := 2 * math.Pi * float64(i) / 700
		fmt.Fprintf(&b, "%.4f,%.2f,%.1f,%.2f\n", 900+float64(i)/1000, 80+20*math.Sin(a), 50+30*math.Sin(a), 85.7)
	}
	return b.Bytes()
}

// BenchmarkReferenceLoop is the plain way to the same numbers: split, then
// strconv, without any of the checks.
func BenchmarkReferenceLoop(b *testing.B) {
	raw := benchmarkFile()
	b.SetBytes(int64(len(raw)))
	b.ReportAllocs()
	for b.Loop() {
		var columns [4][]float64
		for i, line := range bytes.Split(raw, []byte{'\n'}) {
			if i == 0 || len(line) == 0 {
				continue
			}
			for k, field := range bytes.Split(line, []byte{','}) {
				v, err := strconv.ParseFloat(string(field), 64)
				if err != nil {
					b.Fatal(err)
				}
				columns[k] = append(columns[k], v)
			}
		}
	}
}
