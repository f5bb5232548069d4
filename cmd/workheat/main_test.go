package main

import (
	"bytes"
	"context"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"github.com/goccy/go-json"
)

const corner = "../../examples/car-front-corner/netlist.json"
const drum = "../../examples/truck-drum-descent/netlist.json"

// call runs a command line and returns what it printed and its exit code.
func call(ctx context.Context, args ...string) (out, err string, code int) {
	var o, e bytes.Buffer
	code = execute(ctx, env{out: &o, err: &e}, args)
	return o.String(), e.String(), code
}

// write puts a netlist into a folder of the test.
func write(t *testing.T, text string) string {
	t.Helper()
	name := filepath.Join(t.TempDir(), "net.json")
	if err := os.WriteFile(name, []byte(text), 0o644); err != nil {
		t.Fatal(err)
	}
	return name
}

const sound = `{"workheat": 1, "nodes": {
  "block": {"heat capacity": "500 J/K", "start": "80 degC", "limits": {"touch": "85 degC"}},
  "air": {"held": "20 degC"}},
 "conductances": {"film": {"kind": "convection", "between": ["block", "air"], "area": "0.1 m^2", "coefficient": "10 W/(m^2 K)"}},
 "sources": {"heater": {"kind": "given heat", "into": "block", "power": {"table": [["0 s", "100 W"], ["100 s", "100 W"], ["100 s", "0 W"]]}}},
 "duty": [{"rest": {"for": "10 min"}}]}`

func TestCommandLines(t *testing.T) {
	broken := write(t, strings.Replace(sound, `"0.1 m^2"`, `"0.1 kg"`, 1))
	good := write(t, sound)
	folder := t.TempDir()
	cases := []struct {
		name     string
		args     []string
		code     int
		out, err []string // texts that must stand there
	}{
		{"help", []string{"--help"}, 0, []string{"energy", "Exit codes", "run", "check", "catalogue"}, nil},
		{"version", []string{"--version"}, 0, []string{"workheat " + version}, nil},
		{"no such command", []string{"runn"}, exitProblem, nil, []string{"unknown command", "run"}},
		{"no netlist", []string{"run"}, exitProblem, nil, []string{"run takes the name of one netlist, not 0"}},
		{"unknown flag", []string{"run", "--fast", good}, exitProblem, nil, []string{"unknown flag: --fast"}},
		{"missing file", []string{"run", filepath.Join(folder, "none.json")}, exitProblem, nil, []string{"cannot be read", "no such file"}},
		{"broken netlist", []string{"run", broken}, exitProblem, nil, []string{"net.json:4:", "mass", "area", "1 problem; nothing was run"}},
		{"broken netlist, check", []string{"check", broken}, exitProblem, nil, []string{"net.json:4:", "area"}},
		{"run", []string{"run", good}, 0, []string{"Temperatures in degC", "block", "touch", "The book is closed", "Energy book", "Design estimate, no proof of safety"}, nil},
		{"strict, limit passed", []string{"run", "--strict", good}, exitLimit, nil, []string{"limit"}},
		{"strict example", []string{"run", "--strict", drum}, exitLimit, []string{"seal, EPDM"}, []string{"limits exceeded: 1"}},
		{"whole book", []string{"run", "--book", good}, 0, []string{"layer", "recount", "slopes", "breaks", "ends"}, nil},
		{"tolerance check", []string{"run", "--tolerance-check", good}, 0, []string{"A second run", "moved the highest temperatures by"}, nil},
		{"tolerance check, whole book", []string{"run", "--book", "--tolerance-check", good}, 0, []string{"3      tolerance"}, nil},
		{"netlist without command", []string{good}, exitProblem, nil, []string{"workheat run " + good}},
		{"word of the catalogue", []string{"catalogue", "iron"}, exitProblem, nil, []string{`no "iron"`, "grey iron, nodular iron"}},
		{"unknown word", []string{"catalogue", "xyzzy"}, exitProblem, nil, []string{"workheat catalogue lists all"}},
		{"two words of the catalogue", []string{"catalogue", "grey", "iron"}, exitProblem, nil, []string{"in quotes"}},
		{"bad interval", []string{"run", "--every", "fast", good}, exitProblem, nil, []string{"--every", "0.5s"}},
		{"bad tolerance", []string{"run", "--relative", "2", good}, exitProblem, nil, []string{"--relative"}},
		{"unknown format", []string{"run", "-o", "x.doc", good}, exitProblem, nil, []string{".doc", ".csv", ".xlsx"}},
		{"clash of flags", []string{"run", "--json", "--book", good}, exitProblem, nil, []string{"--json", "--book"}},
		{"unwritable", []string{"run", "-o", filepath.Join(folder, "no", "x.csv"), good}, exitProblem, nil, []string{"writing", "x.csv"}},
		{"check", []string{"check", corner}, 0, []string{"J/K at start", "Slowest time constant", "massless", "states", "15 times, every 45 s"}, []string{"indicative"}},
		{"check, strict", []string{"check", "--strict", corner}, exitLimit, nil, []string{"warnings"}},
		{"catalogue", []string{"catalogue"}, 0, []string{"conductances", "friction pad", "grey iron"}, nil},
		{"kind", []string{"catalogue", "convection"}, 0, []string{"speed exponent", "W/(m^2 K)", "source:"}, nil},
		{"material", []string{"catalogue", "carbon steel"}, 0, []string{"EN 1993-1-2", "J/(kg K)", "W/(m K)"}, nil},
		{"near kind", []string{"catalogue", "convektion"}, exitProblem, nil, []string{`did you mean "convection"?`}},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			out, err, code := call(context.Background(), c.args...)
			if code != c.code {
				t.Errorf("exit code %d, want %d; stderr: %s", code, c.code, err)
			}
			for _, want := range c.out {
				if !strings.Contains(out, want) {
					t.Errorf("stdout lacks %q:\n%s", want, out)
				}
			}
			for _, want := range c.err {
				if !strings.Contains(err, want) {
					t.Errorf("stderr lacks %q:\n%s", want, err)
				}
			}
			if code == 0 && len(c.err) == 0 && err != "" {
				t.Errorf("stderr is not empty: %s", err)
			}
		})
	}
}

func TestFilesAndSilence(t *testing.T) {
	folder := t.TempDir()
	args := []string{"run", "-q", corner}
	for _, name := range []string{"a.csv", "a.xlsx", "a.png", "a.svg"} {
		args = append(args, "-o", filepath.Join(folder, name))
	}
	_, err, code := call(context.Background(), args...)
	if code != 0 || err != "" {
		t.Fatalf("exit code %d, stderr %q", code, err)
	}
	entries, _ := os.ReadDir(folder)
	if len(entries) != 4 {
		t.Errorf("%d files, want 4: %v", len(entries), entries)
	}
	csv, _ := os.ReadFile(filepath.Join(folder, "a.csv"))
	head, rest, _ := strings.Cut(string(csv), "\r\n")
	if !strings.HasPrefix(head, "time [s],rubbing face [degC],disc skin [degC]") {
		t.Errorf("header %q", head)
	}
	if rows := strings.Count(rest, "\r\n"); rows != 1893 { // every second to 1891.67 s, and the end
		t.Errorf("%d rows, want 1893", rows)
	}
}

// The keys are a promise to other programs.
func TestJSON(t *testing.T) {
	out, _, code := call(context.Background(), "run", "--json", drum)
	if code != 0 {
		t.Fatalf("exit code %d", code)
	}
	var got struct {
		Units  map[string]string
		Nodes  map[string]map[string]any
		Energy map[string]any
		Stats  map[string]any
		Warn   []string `json:"warnings"`
	}
	if err := json.Unmarshal([]byte(out), &got); err != nil {
		t.Fatal(err)
	}
	for _, key := range []string{"start", "highest", "when", "end", "limit", "margin"} {
		if _, ok := got.Nodes["cylinder fluid"][key].(float64); !ok {
			t.Errorf("nodes lack the number %q", key)
		}
	}
	for _, key := range []string{"work_in", "heat_in", "heat_out", "stored", "throughput", "ledger_gap", "independent_gap"} {
		if _, ok := got.Energy[key].(float64); !ok {
			t.Errorf("energy lacks the number %q", key)
		}
	}
	if closed, ok := got.Energy["closed"].(bool); !ok || !closed {
		t.Errorf("energy: closed is %v", got.Energy["closed"])
	}
	for _, key := range []string{"method", "steps", "rejected", "rhs", "jacobians", "factorizations", "cpu_s"} {
		if _, ok := got.Stats[key]; !ok {
			t.Errorf("stats lacks %q", key)
		}
	}
	if got.Units["temperature"] != "K" || len(got.Warn) == 0 {
		t.Errorf("units %v, warnings %v", got.Units, got.Warn)
	}
}

// A run that is interrupted keeps, prints and writes what it has.
func TestInterrupt(t *testing.T) {
	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	file := filepath.Join(t.TempDir(), "part.csv")
	out, err, code := call(ctx, "run", "-o", file, corner)
	if code != exitInterrupted {
		t.Errorf("exit code %d, want %d", code, exitInterrupted)
	}
	if !strings.Contains(out, "Interrupted at") || !strings.Contains(err, "interrupted") {
		t.Errorf("stdout %q, stderr %q", out, err)
	}
	if _, err := os.Stat(file); err != nil {
		t.Error(err)
	}
}
