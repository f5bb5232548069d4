package main

import (
	"bytes"
	"flag"
	"os"
	"testing"

	"github.com/google/go-cmp/cmp"
)

var update = flag.Bool("update", false, "write the stored netlist anew")

// The stored netlist of problem A is what the converter makes of the problem, byte for byte; the network's
// own tests run it against the reference.
func TestStoredNetlist(t *testing.T) {
	const stored = "../../network/testdata/yardstick-a.json"
	text, err := os.ReadFile("testdata/A_brake_small.json")
	if err != nil {
		t.Fatal(err)
	}
	p, err := readProblem(text)
	if err != nil {
		t.Fatal(err)
	}
	if *update {
		if err := os.WriteFile(stored, p.netlist(), 0o644); err != nil {
			t.Fatal(err)
		}
	}
	want, err := os.ReadFile(stored)
	if err != nil {
		t.Fatal(err)
	}
	if got := p.netlist(); !bytes.Equal(got, want) {
		t.Errorf("the netlist is not the stored one (-want +got):\n%s", cmp.Diff(string(want), string(got)))
	}
}

// Problems that the netlist cannot say, or that are none, are refused.
func TestReadProblemRefuses(t *testing.T) {
	for name, text := range map[string]string{
		"another format":    `{"format": "bench-sweep-1"}`,
		"a mechanical part": `{"format": "bench-net-1", "name": "D", "mech": {"ms": 300}}`,
		"no JSON":           `bench`,
	} {
		if _, err := readProblem([]byte(text)); err == nil {
			t.Errorf("%s: no error", name)
		}
	}
}
