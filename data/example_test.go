package data_test

import (
	"fmt"
	"strings"

	"afterbeat/data"
)

func ExampleReadCSV() {
	file := strings.NewReader("time_ms,P [kPa],flow_L_min\n0,12,3\n8,13,6\n16,,9\n")
	rec, err := data.ReadCSV("trace.csv", file, data.ReadOptions{})
	if err != nil {
		fmt.Println(err)
		return
	}
	for _, c := range rec.Channels {
		fmt.Printf("%s: %s in %s, %.1f\n", c.Name, c.Quantity, c.Unit, c.Values)
	}
	fmt.Println(rec.Clock().Rate, "Hz")
	fmt.Println(rec.Warnings[0].Text)
	// Output:
	// P [kPa]: pressure in kPa, [90.0 97.5 NaN]
	// flow_L_min: flow in L/min, [50.0 100.0 150.0]
	// 125 Hz
	// 1 of 3 samples (33 %) are missing, the longest stretch 8 ms
}

func ExampleReadCSV_error() {
	file := strings.NewReader("time_s,abp_mmHg\n0,80\n0.008,8O\n")
	_, err := data.ReadCSV("trace.csv", file, data.ReadOptions{})
	fmt.Println(err)
	// Output: trace.csv:3: abp_mmHg is not a number: "8O"
}
