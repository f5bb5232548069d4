// Command yardstick runs one problem of the benchmark set at one tolerance and prints its end and peak
// temperatures with the work and time that they took, as one JSON object.
//
//	go run ./cmd/yardstick PROBLEM.json RTOL
//
// The problem (format bench-net-1, thermal part) is written out as a netlist and goes through the same
// front door as any other netlist.
package main

import (
	"fmt"
	"os"
	"strconv"
)

func main() {
	if len(os.Args) != 3 {
		fmt.Fprintln(os.Stderr, "usage: yardstick PROBLEM.json RTOL")
		os.Exit(2)
	}
	rtol, err := strconv.ParseFloat(os.Args[2], 64)
	if err == nil {
		err = run(os.Args[1], rtol, os.Stdout)
	}
	if err != nil {
		fmt.Fprintln(os.Stderr, "yardstick:", err)
		os.Exit(1)
	}
}
