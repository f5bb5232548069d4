package main

import (
	"fmt"
	"io"
	"math"
	"path/filepath"

	"github.com/goccy/go-json"

	"workheat/network"
)

// The JSON of a run: SI throughout, units stated once. Numbers that do not exist are null.
type runJSON struct {
	Netlist     string              `json:"netlist"`
	Title       string              `json:"title"`
	Program     string              `json:"program"`
	Caution     string              `json:"caution"`
	Units       map[string]string   `json:"units"`
	End         float64             `json:"end_time"`
	Interrupted bool                `json:"interrupted"`
	Failure     *string             `json:"failure"`
	Nodes       map[string]nodeJSON `json:"nodes"`
	Order       []string            `json:"node_order"`
	Energy      *energyJSON         `json:"energy"`
	Vehicle     *vehicleJSON        `json:"vehicle"`
	Stats       statsJSON           `json:"stats"`
	Warnings    []string            `json:"warnings"`
}

type nodeJSON struct {
	Start   float64     `json:"start"`
	Highest float64     `json:"highest"`
	When    float64     `json:"when"`
	Lowest  *float64    `json:"lowest_after_first_peak"`
	End     float64     `json:"end"`
	Held    bool        `json:"held"`
	Limit   *float64    `json:"limit"`
	Margin  *float64    `json:"margin"`
	Limits  []limitJSON `json:"limits"`
}

type limitJSON struct {
	Name   string   `json:"name"`
	Limit  float64  `json:"limit"`
	Margin float64  `json:"margin"`
	Above  float64  `json:"time_above"`
	First  *float64 `json:"first_passed"`
}

type energyJSON struct {
	WorkIn         float64            `json:"work_in"`
	HeatIn         float64            `json:"heat_in"`
	HeatOut        float64            `json:"heat_out"`
	Stored         float64            `json:"stored"`
	Throughput     float64            `json:"throughput"`
	LedgerGap      float64            `json:"ledger_gap"`
	IndependentGap float64            `json:"independent_gap"`
	Closed         bool               `json:"closed"`
	Work           map[string]float64 `json:"work_by_dissipator"`
	StoredBy       map[string]float64 `json:"stored_by_node"`
	Paths          []pathJSON         `json:"paths"`
	Checks         []checkJSON        `json:"checks"`
}

type pathJSON struct {
	Element string  `json:"element"`
	From    *string `json:"from"`
	To      *string `json:"to"`
	Net     float64 `json:"net"`
}

// drive = kinetic + climb + rolling + air + brake.
type vehicleJSON struct {
	Name     string  `json:"name"`
	Distance float64 `json:"distance"`
	Drive    float64 `json:"drive"`
	Kinetic  float64 `json:"kinetic"`
	Climb    float64 `json:"climb"`
	Rolling  float64 `json:"rolling"`
	Air      float64 `json:"air"`
	Brake    float64 `json:"brake"`
	Modelled float64 `json:"brake_by_dissipators"`
}

type checkJSON struct {
	Layer   int     `json:"layer"`
	Name    string  `json:"name"`
	Gap     float64 `json:"gap"`
	Allowed float64 `json:"allowed"`
	Unit    string  `json:"unit"`
	Passed  bool    `json:"passed"`
	Where   string  `json:"where"`
}

type statsJSON struct {
	Method         string  `json:"method"`
	Relative       float64 `json:"relative_tolerance"`
	Steps          int     `json:"steps"`
	Rejected       int     `json:"rejected"`
	Rates          int     `json:"rhs"`
	Jacobians      int     `json:"jacobians"`
	Factorizations int     `json:"factorizations"`
	Solves         int     `json:"solves"`
	Restarts       int     `json:"restarts"`
	Events         int     `json:"events"`
	CPU            float64 `json:"cpu_s"`
}

// printJSON prints a run as one object.
func printJSON(w io.Writer, name string, res *network.Result, used float64) error {
	j := runJSON{
		Netlist: filepath.Base(name), Title: res.Model.Net.Title, Program: "workheat " + version, Caution: network.Caution,
		Units: map[string]string{"temperature": "K", "margin": "K", "time": "s", "energy": "J", "distance": "m"},
		End:   res.End, Interrupted: res.Interrupted, Nodes: map[string]nodeJSON{}, Warnings: allWarnings(res),
	}
	if j.Warnings == nil {
		j.Warnings = []string{}
	}
	if res.Failure != nil {
		text := res.Failure.Error()
		j.Failure = &text
	}
	for _, s := range res.Summary {
		n := nodeJSON{Start: s.Start, Highest: s.Highest, When: s.When, Lowest: finite(s.Lowest), End: s.End, Held: s.Held, Limits: []limitJSON{}}
		for _, l := range s.Limits {
			n.Limits = append(n.Limits, limitJSON{l.Name, l.Temperature, l.Margin, l.Above, finite(l.First)})
			if n.Margin == nil || l.Margin < *n.Margin { // the tightest one
				n.Limit, n.Margin = finite(l.Temperature), finite(l.Margin)
			}
		}
		j.Nodes[s.Name] = n
		j.Order = append(j.Order, s.Name)
	}
	j.Energy = energyOf(res)
	if b := res.Book; b != nil && b.Vehicle != nil {
		v := b.Vehicle
		j.Vehicle = &vehicleJSON{v.Name, v.Distance, v.Drive, v.Kinetic, v.Climb, v.Rolling, v.Air, v.Brake, v.Modelled}
	}
	s := res.Stats
	j.Stats = statsJSON{res.Method, res.Rel, s.Steps, s.Rejected, s.Rates, s.Jacobians, s.Factorizations, s.Solves, s.Restarts, s.Events, used}
	text, err := json.MarshalIndent(j, "", "  ")
	if err != nil {
		return fmt.Errorf("writing JSON: %w", err)
	}
	fmt.Fprintf(w, "%s\n", text)
	return nil
}

func energyOf(res *network.Result) *energyJSON {
	b := res.Book
	if b == nil {
		return nil
	}
	e := &energyJSON{WorkIn: b.WorkIn, HeatIn: b.HeatIn, HeatOut: b.HeatOut, Stored: b.Stored, Throughput: b.Throughput,
		LedgerGap: b.LedgerGap, IndependentGap: b.IndependentGap, Closed: b.Closed, Work: map[string]float64{}, StoredBy: map[string]float64{}}
	for _, d := range b.Dissipators {
		e.Work[d.Name] = d.Work
	}
	for _, n := range b.Nodes {
		if !n.Held {
			e.StoredBy[n.Name] = n.Stored
		}
	}
	name := func(s string) *string {
		if s == "" {
			return nil
		}
		return &s
	}
	for _, p := range b.Paths {
		e.Paths = append(e.Paths, pathJSON{p.Element, name(p.From), name(p.To), p.Net})
	}
	for _, c := range b.Checks {
		e.Checks = append(e.Checks, checkJSON{c.Layer, c.Name, c.Gap, c.Allowed, c.Unit, c.Passed, c.Where})
	}
	return e
}

// finite returns nil for a number that JSON cannot hold.
func finite(x float64) *float64 {
	if math.IsNaN(x) || math.IsInf(x, 0) {
		return nil
	}
	return &x
}
