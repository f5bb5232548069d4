package main

import (
	"bytes"
	"context"
	"errors"
	"os"
	"path/filepath"
	"strings"
	"testing"
)

const driven = `{"workheat": 1,
 "nodes": {"block": {"heat capacity": "500 J/K"}, "air": {"held": {"file": "air.csv", "time": "time", "value": "air"}}},
 "conductances": {"film": {"kind": "conduction", "between": ["block", "air"], "value": "1 W/K"}},
 "duty": [{"rest": {"for": "10 min"}}]}`

// A run never writes over what it reads, by whatever name, nor one file twice.
func TestInputsAreNotWrittenOver(t *testing.T) {
	folder := t.TempDir()
	in := func(name string) string { return filepath.Join(folder, name) }
	for name, text := range map[string]string{"net.csv": driven, "air.csv": "time [s],air [degC]\n0,20\n600,40\n"} {
		if err := os.WriteFile(in(name), []byte(text), 0o644); err != nil {
			t.Fatal(err)
		}
	}
	if err := errors.Join(os.Symlink("net.csv", in("link.svg")), os.Link(in("net.csv"), in("hard.csv"))); err != nil {
		t.Skip("no links here: ", err)
	}
	for name, files := range map[string][]string{
		"the netlist": {"net.csv"}, "a link": {"link.svg"}, "a hard link": {"hard.csv"}, "a table": {"air.csv"},
		"another way": {"../" + filepath.Base(folder) + "/air.csv"}, "twice": {"new.csv", "./new.csv"},
	} {
		args := []string{"run", in("net.csv")}
		for _, f := range files {
			args = append(args, "-o", folder+"/"+f)
		}
		if _, err, code := call(context.Background(), args...); code != exitProblem || !strings.Contains(err, "-o") {
			t.Errorf("%s: exit code %d, stderr %q", name, code, err)
		}
	}
	if text, _ := os.ReadFile(in("net.csv")); string(text) != driven {
		t.Error("the netlist has changed")
	}
	if _, err := os.Stat(in("new.csv")); err == nil {
		t.Error("a file was written all the same")
	}
	if _, err, code := call(context.Background(), "run", "-o", in("a.csv"), in("net.csv")); code != 0 {
		t.Errorf("a name of its own: exit code %d, stderr %q", code, err)
	}
}

// Files that can be written are written when one before them cannot, and all faults are told.
func TestOtherFilesAreWritten(t *testing.T) {
	folder := t.TempDir()
	good := filepath.Join(folder, "a.svg")
	_, err, code := call(context.Background(), "run", "-o", filepath.Join(folder, "no", "a.csv"), "-o", good, "-o",
		filepath.Join(folder, "none", "b.csv"), write(t, sound))
	if code != exitProblem || strings.Count(err, "workheat: writing") != 2 {
		t.Errorf("exit code %d, stderr %q", code, err)
	}
	if _, err := os.Stat(good); err != nil {
		t.Error(err)
	}
}

// full takes nothing.
type full struct{}

func (full) Write([]byte) (int, error) { return 0, errors.New("no space left on device") }

// Output that is lost is no success.
func TestLostOutput(t *testing.T) {
	good := write(t, sound)
	for _, args := range [][]string{{"run", good}, {"run", "--json", good}, {"check", good}, {"catalogue"}, {"--help"}} {
		var err bytes.Buffer
		if code := execute(context.Background(), env{out: full{}, err: &err}, args); code != exitProblem || !strings.Contains(err.String(), "no space left") {
			t.Errorf("%v: exit code %d, stderr %q", args, code, err.String())
		}
	}
}

// What comes from the command line cannot steer the terminal.
func TestNothingSteersTheTerminal(t *testing.T) {
	bad := filepath.Join(t.TempDir(), "\x1b[31mred\u009b1m\u202e.json")
	if err := os.WriteFile(bad, []byte(sound), 0o644); err != nil {
		t.Skip("no such names here: ", err)
	}
	for _, args := range [][]string{{"run", bad}, {"check", bad}, {"run", bad + "x"}, {"run", "--\x1b[31m", bad}, {bad},
		{"run", "-o", strings.TrimSuffix(bad, "json") + "svg", bad}} {
		out, err, _ := call(context.Background(), args...)
		if strings.ContainsAny(out+err, "\x1b\u009b\u202e") {
			t.Errorf("%q: %q", args, out+err)
		}
	}
}

// A run that failed says so on the page and in its files, in the words of the network.
func TestFailedRun(t *testing.T) {
	file := filepath.Join(t.TempDir(), "a.csv")
	cold := strings.Replace(sound, `{"table": [["0 s", "100 W"], ["100 s", "100 W"], ["100 s", "0 W"]]}`, `"-1 kW"`, 1)
	out, err, code := call(context.Background(), "run", "-o", file, write(t, cold))
	if code != exitFailed || !strings.Contains(err, "block has cooled to absolute zero") || !strings.Contains(err, "cure:") {
		t.Errorf("exit code %d, stderr %q", code, err)
	}
	if !strings.Contains(out, "THE NUMBERS FAILED") {
		t.Errorf("the page hides it:\n%s", out)
	}
	if csv, _ := os.ReadFile(file); !strings.Contains(string(csv), "THE NUMBERS FAILED") {
		t.Error("the file hides it")
	}
}
