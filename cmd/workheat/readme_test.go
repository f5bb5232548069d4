package main

import (
	"context"
	"encoding/json"
	"os"
	"regexp"
	"strings"
	"testing"
)

// readme returns the README and its fenced blocks.
func readme(t *testing.T) (text string, blocks []string) {
	t.Helper()
	b, err := os.ReadFile("../../README.md")
	if err != nil {
		t.Fatal(err)
	}
	for i, part := range strings.Split(string(b), "\n```") {
		if i%2 == 1 {
			_, body, _ := strings.Cut(part, "\n")
			blocks = append(blocks, body)
		}
	}
	return string(b), blocks
}

// What the README shows is what the program prints. The figures of the gaps, which are round-off, may differ.
func TestReadmeShowsTheOutput(t *testing.T) {
	_, blocks := readme(t)
	out, _, code := call(context.Background(), "run", corner)
	if code != 0 {
		t.Fatalf("exit code %d", code)
	}
	gaps := regexp.MustCompile(`[0-9.e-]+ J|\([0-9.e-]+`)
	want, got := strings.Split(blocks[0], "\n"), strings.Split(out, "\n")
	if len(want) < 40 || len(got) < len(want) {
		t.Fatalf("the README shows %d lines, the program prints %d", len(want), len(got))
	}
	for i := range want {
		if strings.HasPrefix(want[i], "The book is closed") {
			want[i], got[i] = gaps.ReplaceAllString(want[i], "#"), gaps.ReplaceAllString(got[i], "#")
		}
		if want[i] != got[i] {
			t.Errorf("line %d\nREADME:  %q\nprogram: %q", i+1, want[i], got[i])
		}
	}
}

// The netlist of the README runs, and so does its flywheel when its two lines take the place of the van.
func TestReadmeNetlists(t *testing.T) {
	_, blocks := readme(t)
	small, flywheel := blocks[1], blocks[2]
	out, err, code := call(context.Background(), "run", "--strict", write(t, small))
	if code != 0 || !strings.Contains(out, "The book is closed") {
		t.Errorf("exit code %d, stderr %s", code, err)
	}
	at, end := strings.Index(small, `  "bodies"`), strings.Index(small, `  "nodes"`)
	if at < 0 || end < at {
		t.Fatal("the netlist of the README has no bodies before its nodes")
	}
	small = small[:at] + flywheel + "\n" + small[end:]
	small = strings.NewReplacer(`"van"`, `"flywheel"`, `"90 km/h"`, `"full"`, `"deceleration": "4 m/s^2"`, `"torque": "300 N m"`).Replace(small)
	out, err, code = call(context.Background(), "run", "--json", write(t, small))
	if code != 0 {
		t.Fatalf("exit code %d, stderr %s", code, err)
	}
	var got struct{ Vehicle struct{ Brake float64 } }
	if err := json.Unmarshal([]byte(out), &got); err != nil {
		t.Fatal(err)
	}
	want := 0.5 * 12 * (20 * 3.141592653589793) * (20 * 3.141592653589793) // J w^2 / 2 at 600 rpm
	if d := got.Vehicle.Brake/want - 1; d > 1e-9 || d < -1e-9 {
		t.Errorf("the brake took %g J, want %g J", got.Vehicle.Brake, want)
	}
}

// Every flag in the README exists, and every flag of run stands in the README.
func TestReadmeFlags(t *testing.T) {
	text, _ := readme(t)
	help := ""
	for _, c := range []string{"run", "check", "catalogue"} {
		out, _, _ := call(context.Background(), c, "--help")
		help += out
	}
	flag := regexp.MustCompile(`--[a-z][a-z-]*`)
	for _, f := range flag.FindAllString(text, -1) {
		if !strings.Contains(help, f+" ") {
			t.Errorf("the README names %s, which no command has", f)
		}
	}
	out, _, _ := call(context.Background(), "run", "--help")
	for _, f := range flag.FindAllString(out, -1) {
		short := map[string]string{"--output": "`-o FILE`", "--quiet": "`-q`", "--help": "--help"}
		if s := short[f]; s != "" {
			f = s
		}
		if !strings.Contains(text, f) {
			t.Errorf("the README lacks %s", f)
		}
	}
}

// Every key of the JSON of a run stands in the README.
func TestReadmeKeys(t *testing.T) {
	text, _ := readme(t)
	out, _, _ := call(context.Background(), "run", "--json", drum)
	var top map[string]any
	if err := json.Unmarshal([]byte(out), &top); err != nil {
		t.Fatal(err)
	}
	keys := func(place string, x any) {
		m, ok := x.(map[string]any)
		if !ok || len(m) == 0 {
			t.Errorf("%s is no object", place)
		}
		for key := range m {
			if !strings.Contains(text, "`"+key+"`") && !strings.Contains(text, "`\""+key+"\"`") {
				t.Errorf("the README lacks %q of %s", key, place)
			}
		}
	}
	first := func(x any) any { return x.([]any)[0] }
	node := top["nodes"].(map[string]any)["wheel cylinder"].(map[string]any)
	energy := top["energy"].(map[string]any)
	keys("the object", top)
	keys("a node", node)
	keys("a limit", first(node["limits"]))
	keys("energy", energy)
	keys("a path", first(energy["paths"]))
	keys("a check", first(energy["checks"]))
	keys("vehicle", top["vehicle"])
	keys("stats", top["stats"])
}
