package network

import (
	"context"
	"fmt"
	"math"
	"strings"
	"testing"

	"workheat/library"
	"workheat/network/diag"
	"workheat/network/energy"
)

// corner is a small brake corner with invented data: a massless rubbing face, a held table, radiation, a
// law of speed, a wait for a temperature and a table of given heat with a jump.
const corner = `{
  "workheat": 1,
  "title": "small brake corner, invented data",
  "nodes": {
    "face":  {"massless": true, "start": "20 degC"},
    "disc":  {"mass": "5.2 kg", "material": "carbon steel", "start": "20 degC"},
    "hub":   {"mass": "3.4 kg", "material": "nodular iron", "start": "20 degC"},
    "pad":   {"mass": "0.6 kg", "material": "organic lining", "start": "20 degC"},
    "fluid": {"heat capacity": "90 J/K", "start": "20 degC"},
    "air":   {"held": {"table": [["0 s", "20 degC"], ["40 s", "32 degC"], ["90 s", "25 degC"]]}}
  },
  "conductances": {
    "face to disc": {"kind": "contact", "between": ["face", "disc"], "coefficient": "20000 W/(m^2 K)", "area": "0.02 m^2"},
    "face to pad":  {"kind": "contact", "between": ["face", "pad"], "coefficient": "900 W/(m^2 K)", "area": "0.004 m^2"},
    "neck":         {"kind": "conduction", "between": ["disc", "hub"], "area": "9 cm^2", "length": "25 mm", "material": "carbon steel"},
    "backing":      {"kind": "conduction", "between": ["pad", "fluid"], "value": "1.1 W/K"},
    "draught":      {"kind": "convection", "between": ["disc", "air"], "coefficient": "7 W/(m^2 K)", "speed coefficient": "5 W/(m^2 K)", "area": "0.11 m^2", "speed of": "van"},
    "hub air":      {"kind": "convection", "between": ["hub", "air"], "coefficient": "9 W/(m^2 K)", "area": "0.06 m^2"},
    "fluid air":    {"kind": "convection", "between": ["fluid", "air"], "coefficient": "6 W/(m^2 K)", "area": "0.02 m^2"},
    "glow":         {"kind": "radiation", "between": ["disc", "air"], "emissivity": 0.7, "area": "0.1 m^2"}
  },
  "sources": {
    "bearing": {"kind": "given heat", "into": {"hub": 0.7, "fluid": 0.3}, "power": {"table": [["0 s", "30 W"], ["25 s", "60 W"], ["25 s", "20 W"], ["80 s", "45 W"]]}}
  },
  "bodies": {
    "van": {"kind": "road vehicle", "mass": "2400 kg", "rotating mass factor": 1.06, "rolling resistance": 0.011, "drag area": "1.3 m^2"}
  },
  "dissipators": {
    "front left": {"kind": "friction pad", "slows": "van", "part of braking": 0.33, "heats": {"face": 0.9, "pad": 0.1}}
  },
  "duty": [
    {"repeat": 3, "phases": [
      {"brake": {"from": "110 km/h", "to": "30 km/h", "deceleration": "4 m/s^2"}},
      {"speed up": {"to": "110 km/h", "acceleration": "2.5 m/s^2"}}]},
    {"brake": {"to": "0 km/h", "deceleration": "3 m/s^2"}},
    {"rest": {"until": {"node": "disc", "falls to": "200 degC"}, "at most": "30 min"}},
    {"rest": {"for": "20 s"}}
  ]
}`

// load loads a netlist that must have no fault.
func load(t *testing.T, text string) *Model {
	t.Helper()
	m, problems := Load(&diag.Source{Name: t.Name(), Text: []byte(text)}, library.Catalogue(), nil)
	if m == nil {
		t.Fatalf("the netlist has problems: %v", problems)
	}
	return m
}

// account is a book in a few lines, for messages.
func account(b *energy.Book) string {
	text := fmt.Sprintf("throughput %.4g J, work in %.4g, heat in %.4g, heat out %.4g, stored %.4g\n", b.Throughput, b.WorkIn, b.HeatIn, b.HeatOut, b.Stored)
	for _, c := range b.Checks {
		text += fmt.Sprintf("  layer %d %-12s gap %.3g %s of %.3g at %s, passed %t\n", c.Layer, c.Name, c.Gap, c.Unit, c.Allowed, c.Where, c.Passed)
	}
	return text
}

// An odd network tries what a book could take for a fault.
var odd = []struct{ name, text string }{
	{"brake corner", corner},
	{"adiabatic, nothing crosses the border", `{"workheat": 1, "nodes": {
		"hot": {"mass": "3 kg", "material": "carbon steel", "start": "800 degC"}, "mid": {"massless": true}, "cold": {"heat capacity": "700 J/K", "start": "20 degC"}},
		"conductances": {"a": {"kind": "conduction", "between": ["hot", "mid"], "value": "12 W/K"}, "b": {"kind": "radiation", "between": ["mid", "cold"], "emissivity": 0.9, "area": "0.2 m^2"}},
		"duty": [{"rest": {"for": "1 h"}}]}`},
	{"no heat at all", `{"workheat": 1, "nodes": {
		"one": {"heat capacity": "700 J/K", "start": "20 degC"}, "two": {"massless": true, "start": "20 degC"}, "air": {"held": "20 degC"}},
		"conductances": {"a": {"kind": "conduction", "between": ["one", "two"], "value": "12 W/K"}, "b": {"kind": "convection", "between": ["two", "air"], "coefficient": "8 W/(m^2 K)", "area": "0.3 m^2"}},
		"duty": [{"rest": {"for": "1 h"}}]}`},
	{"almost no heat", `{"workheat": 1, "nodes": {
		"one": {"heat capacity": "700 J/K", "start": "20 degC"}, "two": {"massless": true, "start": "20 degC"}, "air": {"held": "68 degF"}},
		"conductances": {"a": {"kind": "conduction", "between": ["one", "two"], "value": "12 W/K"}, "b": {"kind": "convection", "between": ["two", "air"], "coefficient": "8 W/(m^2 K)", "area": "0.3 m^2"}},
		"duty": [{"rest": {"for": "1 h"}}]}`},
	{"tiny and huge capacities", `{"workheat": 1, "nodes": {
		"film": {"heat capacity": "1e-6 J/K", "start": "20 degC"}, "rotor": {"heat capacity": "3000 J/K", "start": "20 degC"}, "room": {"heat capacity": "1e12 J/K", "start": "20 degC"}},
		"conductances": {"a": {"kind": "conduction", "between": ["film", "rotor"], "value": "250 W/K"}, "b": {"kind": "convection", "between": ["rotor", "room"], "coefficient": "40 W/(m^2 K)", "area": "0.3 m^2"}},
		"sources": {"lamp": {"kind": "given heat", "into": {"film": 1}, "power": {"table": [["0 s", "0 W"], ["10 s", "8 kW"], ["60 s", "0 W"]]}}},
		"duty": [{"rest": {"for": "1 h"}}]}`},
	{"welded nodes", `{"workheat": 1, "nodes": {
		"left": {"heat capacity": "1500 J/K", "start": "20 degC"}, "seam": {"massless": true}, "right": {"heat capacity": "900 J/K", "start": "150 degC"}, "air": {"held": "20 degC"}},
		"conductances": {"a": {"kind": "conduction", "between": ["left", "seam"], "value": "1e8 W/K"}, "b": {"kind": "conduction", "between": ["seam", "right"], "value": "1e8 W/K"},
		"c": {"kind": "radiation", "between": ["right", "air"], "emissivity": 0.9, "area": "0.2 m^2"}},
		"sources": {"lamp": {"kind": "given heat", "into": {"seam": 1}, "power": {"table": [["0 s", "0 W"], ["10 s", "8 kW"], ["60 s", "0 W"]]}}},
		"duty": [{"rest": {"for": "1 h"}}]}`},
	{"over the steel peak and back", `{"workheat": 1, "nodes": {
		"bar": {"mass": "2 kg", "material": "carbon steel", "start": "700 degC"}, "oven": {"held": {"table": [["0 s", "1000 degC"], ["20 min", "1000 degC"], ["20 min", "20 degC"]]}}},
		"conductances": {"a": {"kind": "radiation", "between": ["bar", "oven"], "emissivity": 0.8, "area": "0.05 m^2"}},
		"duty": [{"rest": {"for": "2 h"}}]}`},
	{"capacity with a jump", `{"workheat": 1, "nodes": {
		"wax": {"heat capacity": {"table": [["20 degC", "900 J/K"], ["60 degC", "900 J/K"], ["60 degC", "50 kJ/K"], ["61 degC", "50 kJ/K"], ["61 degC", "1100 J/K"]]}, "start": "20 degC"}, "air": {"held": "20 degC"}},
		"conductances": {"a": {"kind": "convection", "between": ["wax", "air"], "coefficient": "8 W/(m^2 K)", "area": "0.2 m^2"}},
		"sources": {"heater": {"kind": "given heat", "into": {"wax": 1}, "power": {"table": [["0 s", "400 W"], ["10 min", "400 W"], ["10 min", "0 W"]]}}},
		"duty": [{"rest": {"for": "2 h"}}]}`},
	{"held table alone", `{"workheat": 1, "nodes": {
		"lump": {"heat capacity": "500 J/K", "start": "20 degC"}, "bath": {"held": {"table": [["0 s", "20 degC"], ["1 h", "21 degC"], ["2 h", "20 degC"]]}}},
		"conductances": {"a": {"kind": "convection", "between": ["lump", "bath"], "coefficient": "300 W/(m^2 K)", "area": "0.2 m^2"}},
		"duty": [{"rest": {"for": "3 h"}}]}`},
	{"swing about zero", `{"workheat": 1, "nodes": {
		"lump": {"heat capacity": "500 J/K", "start": "20 degC"}, "air": {"held": "20 degC"}},
		"conductances": {"a": {"kind": "convection", "between": ["lump", "air"], "coefficient": "5 W/(m^2 K)", "area": "0.2 m^2"}},
		"sources": {"peltier": {"kind": "given heat", "into": {"lump": 1}, "power": {"table": [["0 s", "-100 W"], ["100 s", "100 W"], ["200 s", "-100 W"], ["300 s", "100 W"], ["400 s", "-100 W"]]}}},
		"duty": [{"rest": {"for": "400 s"}}]}`},
	{"late in a long rest", `{"workheat": 1, "nodes": {
		"lump": {"heat capacity": "500 J/K", "start": "20 degC"}, "air": {"held": {"table": [["0 s", "20 degC"], ["1e6 s", "20 degC"], ["1000001 s", "25 degC"], ["1000002 s", "20 degC"]]}}},
		"conductances": {"a": {"kind": "convection", "between": ["lump", "air"], "coefficient": "5 W/(m^2 K)", "area": "0.2 m^2"}, "b": {"kind": "radiation", "between": ["lump", "air"], "emissivity": 0.9, "area": "0.2 m^2"}},
		"bodies": {"van": {"kind": "road vehicle", "mass": "1000 kg"}},
		"dissipators": {"pad": {"kind": "friction pad", "slows": "van", "part of braking": 0.2, "heats": {"lump": 1}}},
		"duty": [{"rest": {"for": "1000003 s"}}, {"speed up": {"to": "1 km/h", "in": "0.02 s"}}, {"brake": {"to": "0 km/h", "deceleration": "9 m/s^2"}}, {"rest": {"for": "10 s"}}]}`},
	{"downhill at held speed, brake to drive", `{"workheat": 1, "nodes": {
		"drum": {"mass": "40 kg", "material": "grey iron", "start": "20 degC"}, "air": {"held": "20 degC"}},
		"conductances": {"a": {"kind": "rotating-disc convection", "between": ["drum", "air"], "diameter": "400 mm", "area": "0.4 m^2", "speed of": "truck"}},
		"bodies": {"truck": {"kind": "road vehicle", "mass": "18 t", "rolling resistance": 0.007, "drag area": "6 m^2", "grade": "-2 %", "wheel radius": "0.5 m"}},
		"dissipators": {"drum brake": {"kind": "friction pad", "slows": "truck", "part of braking": 0.25, "heats": {"drum": 1}}},
		"duty": [{"hold": {"speed": "30 km/h", "over": "3 km"}}, {"speed up": {"to": "90 km/h", "in": "5 min"}}, {"brake": {"to": "20 km/h", "deceleration": "0.2 m/s^2"}}, {"hold": {"for": "10 min"}}]}`},
	{"torque to a stop, roots of the speed", `{"workheat": 1, "nodes": {
		"rotor": {"mass": "7 kg", "material": "aluminium", "start": "20 degC"}, "shell": {"massless": true}, "skin": {"massless": true}, "air": {"held": "20 degC"}},
		"conductances": {"a": {"kind": "conduction", "between": ["rotor", "shell"], "value": "90 W/K"}, "b": {"kind": "conduction", "between": ["shell", "skin"], "value": "70 W/K"},
		"c": {"kind": "convection", "between": ["skin", "air"], "coefficient": "0 W/(m^2 K)", "speed coefficient": "20 W/(m^2 K)", "speed exponent": 0.5, "area": "0.3 m^2", "speed of": "car"}},
		"bodies": {"car": {"kind": "road vehicle", "mass": "1500 kg", "rolling resistance": 0.01, "drag area": "0.7 m^2", "wheel radius": "0.3 m", "grade": "-3 %"}},
		"dissipators": {"pad": {"kind": "friction pad", "slows": "car", "part of braking": 0.4, "heats": {"rotor": 1}}},
		"duty": [{"hold": {"speed": "150 km/h", "until": {"node": "rotor", "rises to": "26 degC"}, "at most": "10 min"}}, {"brake": {"torque": "1200 N m", "to": "60 km/h"}}, {"brake": {"torque": "1500 N m", "to": "0 km/h"}},
		{"follow": {"table": [["0 s", "0 km/h"], ["7 s", "80 km/h"], ["7 s", "80 km/h"], ["12 s", "78 km/h"], ["30 s", "0 km/h"]]}}, {"rest": {"for": "10 min"}}]}`},
	{"a table that is constant, a start far outside", `{"workheat": 1, "nodes": {
		"same": {"heat capacity": {"table": [["20 degC", "400 J/K"], ["60 degC", "400 J/K"], ["90 degC", "400 J/K"]]}, "start": "-180 degC"},
		"iron": {"mass": "1 kg", "material": "carbon steel", "start": "-190 degC"}, "room": {"held": "20 degC"}},
		"conductances": {"a": {"kind": "convection", "between": ["same", "room"], "coefficient": "12 W/(m^2 K)", "area": "0.2 m^2"}, "b": {"kind": "contact", "between": ["same", "iron"], "coefficient": "300 W/(m^2 K)", "area": "0.01 m^2"}},
		"duty": [{"rest": {"for": "2 h"}}]}`},
}

// A sound run passes every check, however odd the network and whatever the tolerance.
func TestSoundRunsClose(t *testing.T) {
	for _, o := range odd {
		for _, rel := range []float64{1e-3, 1e-4, 1e-5, 1e-6, 1e-7, 1e-8, 1e-9} {
			t.Run(fmt.Sprintf("%s at %g", strings.ReplaceAll(o.name, " ", "_"), rel), func(t *testing.T) {
				res := load(t, o.text).Run(context.Background(), Options{Rel: rel, Audit: true})
				if res.Failure != nil {
					t.Fatalf("failed: %v", res.Failure)
				}
				if !res.Book.Closed {
					t.Errorf("not closed after %d steps\n%s", res.Stats.Steps, account(res.Book))
				}
				consistent(t, res.Book)
			})
		}
	}
}

// consistent checks what must hold in any account, sound or not: its totals are those of its lines.
func consistent(t *testing.T, b *energy.Book) {
	t.Helper()
	near := func(what string, got, want float64) {
		t.Helper()
		if !(math.Abs(got-want) <= 1e-7*(b.Throughput+math.Abs(want))+b.LedgerGap) {
			t.Errorf("%s: got %.12g J, want %.12g J", what, got, want)
		}
	}
	var work, in, out, stored, inside float64
	kinds := map[string]energy.DissipatorLine{}
	for _, d := range b.Dissipators {
		kinds[d.Name] = d
	}
	for _, p := range b.Paths {
		x := p.Net
		if p.Border && p.To == "" || p.Border && held(b, p.To) {
			x = -x
		}
		_, rubs := kinds[p.Element]
		switch {
		case p.Inside:
			inside += math.Abs(x)
		case rubs:
			work += x
		case x > 0:
			in += x
		default:
			out -= x
		}
	}
	for _, n := range b.Nodes {
		stored += n.Stored
		near("the line of "+n.Name, n.Stored, n.Net+n.Gap+map[bool]float64{true: -n.Net}[n.Held])
	}
	near("work in", b.WorkIn, work)
	near("heat in", b.HeatIn, in)
	near("heat out", b.HeatOut, out)
	near("stored", b.Stored, stored)
	near("stored from the border", b.Stored, b.WorkIn+b.HeatIn-b.HeatOut)
	if b.Throughput < (work+in+out)*(1-1e-12) {
		t.Errorf("throughput %g J is below the balances at the border, %g J", b.Throughput, work+in+out)
	}
	if v := b.Vehicle; v != nil {
		near("the vehicle's drive", v.Drive, v.Kinetic+v.Climb+v.Rolling+v.Air+v.Brake)
		sum := 0.0
		for _, d := range b.Dissipators {
			near("the work of "+d.Name, d.Work, d.Expected)
			sum += d.Expected
		}
		near("the brakes that are modelled", v.Modelled, sum)
	}
}

// held reports whether a node of the book is held.
func held(b *energy.Book, name string) bool {
	for _, n := range b.Nodes {
		if n.Name == name {
			return n.Held
		}
	}
	return false
}
