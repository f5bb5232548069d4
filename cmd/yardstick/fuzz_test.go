package main

import (
	"os"
	"strings"
	"testing"

	"github.com/goccy/go-json"
)

// Whatever the file, reading it and writing it as a netlist does not panic, and the netlist is JSON.
func FuzzReadProblem(f *testing.F) {
	text, err := os.ReadFile("testdata/A_brake_small.json")
	if err != nil {
		f.Fatal(err)
	}
	f.Add(text)
	f.Add([]byte(`{"format": "bench-net-1", "name": "n", "t_end": 1, "dt_out": 1, "node": {"C0": [1], "C1": [0], "T0": [300]},
		"segment": {"t": [0, 1], "P0": [0], "P1": [0], "v0": [0], "v1": [0]}}`))
	f.Fuzz(func(t *testing.T, text []byte) {
		p, err := readProblem(text)
		if err != nil {
			return
		}
		if out := p.netlist(); !json.Valid(out) {
			t.Errorf("not JSON: %s", out)
		}
	})
}

func TestProblemsThatDoNotFit(t *testing.T) {
	const sound = `{"format": "bench-net-1", "name": "n", "t_end": 1, "dt_out": 1, "boundary": {"T": [293]},
		"node": {"C0": [1, 2], "C1": [0, 0], "T0": [300, 300]}, "link": {"a": [0], "b": [1], "G": [3]},
		"segment": {"t": [0, 1], "P0": [0], "P1": [0], "v0": [0], "v1": [0]}, "probe": [0]}`
	if _, err := readProblem([]byte(sound)); err != nil {
		t.Fatal(err)
	}
	for _, change := range [][2]string{
		{`"C0": [1, 2]`, `"C0": [1]`}, {`"b": [1]`, `"b": [2]`}, {`"a": [0]`, `"a": [-1]`}, {`"probe": [0]`, `"probe": [7]`},
		{`"P1": [0]`, `"P1": []`}, {`"t_end": 1`, `"t_end": 0`}, {`bench-net-1`, `bench-net-2`}, {`"dt_out": 1`, `"dt_out": 0`},
	} {
		if _, err := readProblem([]byte(strings.Replace(sound, change[0], change[1], 1))); err == nil {
			t.Errorf("no error with %s", change[1])
		}
	}
}
