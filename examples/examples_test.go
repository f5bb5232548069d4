// Package examples_test runs every example as its reader would and compares with its expected figures.
package examples_test

import (
	"context"
	"flag"
	"math"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"github.com/goccy/go-json"

	"workheat/library"
	"workheat/network"
	"workheat/network/diag"
)

var update = flag.Bool("update", false, "rewrite the expected figures")

// An expected file holds the figures of one example in SI: they are the program's own, stored to show a
// change, and rounded.
type expected struct {
	About   string             `json:"about"`
	End     float64            `json:"end_time_s"`
	Highest map[string]float64 `json:"highest_K"`
	Final   map[string]float64 `json:"end_K"`
	WorkIn  float64            `json:"work_in_J"`
	HeatOut float64            `json:"heat_out_J"`
}

const (
	slackK = 0.02 // K: stored to 0.01 K
	slackE = 1e-5 // share of an energy or a time
)

func TestExamples(t *testing.T) {
	folders, err := filepath.Glob("*/netlist.json")
	if err != nil || len(folders) == 0 {
		t.Fatalf("no examples found: %v", err)
	}
	for _, name := range folders {
		t.Run(filepath.Dir(name), func(t *testing.T) { runExample(t, name) })
	}
}

func runExample(t *testing.T, name string) {
	text, err := os.ReadFile(name)
	if err != nil {
		t.Fatal(err)
	}
	open := func(file string) ([]byte, error) { return os.ReadFile(filepath.Join(filepath.Dir(name), file)) }
	model, problems := network.Load(&diag.Source{Name: name, Text: text}, library.Catalogue(), open)
	if model == nil {
		t.Fatalf("%v", problems)
	}
	res := model.Run(context.Background(), network.Options{Audit: true, Tolerance: true})
	if res.Failure != nil {
		t.Fatal(res.Failure)
	}
	for _, c := range res.Book.Checks {
		if !c.Passed {
			t.Errorf("check %s: gap %g %s of %g allowed, worst at %s", c.Name, c.Gap, c.Unit, c.Allowed, c.Where)
		}
	}
	if gap := res.Book.LedgerGap / res.Book.Throughput; gap > 1e-12 {
		t.Errorf("the ledger misses %g of the throughput, want at most 1e-12", gap)
	}
	got := figures(res)
	stored := filepath.Join(filepath.Dir(name), "expected.json")
	if *update {
		text, _ := json.MarshalIndent(got, "", "  ")
		if err := os.WriteFile(stored, append(text, '\n'), 0o644); err != nil {
			t.Fatal(err)
		}
		return
	}
	compare(t, got, stored)
	readme, err := os.ReadFile(filepath.Join(filepath.Dir(name), "README.md"))
	if err != nil || !strings.Contains(strings.ToLower(string(readme)), "invented") {
		t.Errorf("the example needs a README.md that says that its data are invented: %v", err)
	}
}

func figures(res *network.Result) expected {
	round := func(x float64) float64 { return math.Round(100*x) / 100 }
	e := expected{
		About: "Figures of this example by the program itself, stored to show a change.",
		End:   round(res.End), Highest: map[string]float64{}, Final: map[string]float64{},
		WorkIn: math.Round(res.Book.WorkIn), HeatOut: math.Round(res.Book.HeatOut),
	}
	for _, s := range res.Summary {
		e.Highest[s.Name], e.Final[s.Name] = round(s.Highest), round(s.End)
	}
	return e
}

func compare(t *testing.T, got expected, stored string) {
	text, err := os.ReadFile(stored)
	if err != nil {
		t.Fatal(err)
	}
	var want expected
	if err := json.Unmarshal(text, &want); err != nil {
		t.Fatal(err)
	}
	near := func(what string, got, want, slack float64) {
		if !(math.Abs(got-want) <= slack) {
			t.Errorf("%s: got %.6g, want %.6g within %g", what, got, want, slack)
		}
	}
	near("end", got.End, want.End, slackE*want.End+0.01)
	near("work in", got.WorkIn, want.WorkIn, slackE*want.WorkIn+1)
	near("heat out", got.HeatOut, want.HeatOut, slackE*want.HeatOut+1)
	if len(got.Highest) != len(want.Highest) {
		t.Errorf("%d nodes, want %d", len(got.Highest), len(want.Highest))
	}
	for name, x := range want.Highest {
		near("highest of "+name, got.Highest[name], x, slackK)
		near("end of "+name, got.Final[name], want.Final[name], slackK)
	}
}
