package network_test

import (
	"context"
	"math"
	"strings"
	"testing"
	"time"

	"workheat/network"
)

// Networks that have no answer fail where it ends, with the node, its paths and a cure.
func TestFailuresNameTheCause(t *testing.T) {
	const vehicle = `"bodies": {"car": {"kind": "road vehicle", "mass": "1500 kg", "wheel radius": "0.3 m"}},`
	face := func(path, more, duty string) string {
		return `{"workheat": 1, "nodes": {"face": {"massless": true}, "air": {"held": "20 degC"}},` + vehicle + more +
			`"conductances": {"film": {` + path + `, "between": ["face", "air"]}}, "duty": ` + duty + `}`
	}
	lump := func(path, power string) string {
		return `{"workheat": 1, "nodes": {"block": {"heat capacity": "500 J/K"}, "air": {"held": "20 degC"}},
		"sources": {"cooler": {"kind": "given heat", "into": "block", "power": "` + power + `"}},
		"conductances": {"film": {` + path + `, "between": ["block", "air"]}}, "duty": [{"rest": {"for": "10 min"}}]}`
	}
	const rest = `[{"rest": {"for": "10 s"}}]`
	const disc = `"kind": "rotating-disc convection", "diameter": "0.3 m", "area": "0.05 m^2", "speed of": "car"`
	const glow = `"kind": "radiation", "emissivity": 0.8, "area": "0.1 m^2"`
	cases := []struct {
		name, text string
		at         float64 // s; NaN: not asked
		words      []string
	}{
		{"a film at rest alone", face(disc, "", rest), 0, []string{"face has no mass", `"film" brings 0 W`, "still"}},
		{"a film that comes to rest", face(disc, "", `[{"brake": {"from": "36 km/h", "to": "0 km/h", "deceleration": "2 m/s^2"}}, {"rest": {"for": "9 s"}}]`),
			5, []string{"face has no mass", "film"}},
		{"a path of no conductance", face(`"kind": "conduction", "value": "1 W/K", "factor": 0`, "", rest), 0, []string{"face has no mass", "film"}},
		{"more heat taken than radiation gives", face(glow, `"sources": {"cooler": {"kind": "given heat", "into": "face", "power": "-100 W"}},`, rest),
			0, []string{"balances face", `"cooler" brings -100 W`}},
		// 500 J/K dT/dt = -1 kW + 1 W/K (293.15 K - T) is at 0 K after 500 s log(1000/(1000 - 293.15)).
		{"cooled to nothing", lump(`"kind": "conduction", "value": "1 W/K"`, "-1 kW"), 500 * math.Log(1000/(1000-293.15)),
			[]string{"block has cooled to absolute zero", `"cooler" brings -1000 W`}},
		{"cooled to nothing, glowing", lump(glow, "-1 kW"), math.NaN(), []string{"block has cooled to absolute zero", "cooler"}},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			res := load(t, c.text, nil).Run(context.Background(), network.Options{Audit: true})
			if res.Failure == nil {
				t.Fatal("it did not fail")
			}
			if !math.IsNaN(c.at) {
				near(t, "time", res.Failure.T, c.at, 1e-3)
			}
			if res.Failure.Help == "" {
				t.Error("no cure")
			}
			for _, w := range c.words {
				if text := res.Failure.Error(); !strings.Contains(text, w) {
					t.Errorf("%q lacks %q", text, w)
				}
			}
		})
	}
}

// A node that follows its neighbours quicker than a late clock can tell fails and does not hang.
func TestTooQuickForTheClock(t *testing.T) {
	m := load(t, `{"workheat": 1, "nodes": {"mote": {"heat capacity": "1e-9 J/K"}, "block": {"heat capacity": "1 MJ/K"}},
	"conductances": {"joint": {"kind": "conduction", "between": ["mote", "block"], "value": "1 W/K"}},
	"sources": {"heater": {"kind": "given heat", "into": "mote", "power": {"table": [["0 s", "1 W"], ["1e6 s", "1 W"], ["1e6 s", "100 W"]]}}},
	"duty": [{"rest": {"for": "2e6 s"}}]}`, nil)
	ctx, cancel := context.WithTimeout(context.Background(), 20*time.Second)
	defer cancel()
	res := m.Run(ctx, network.Options{})
	if res.Failure == nil || !strings.Contains(res.Failure.Error(), `mote follows its neighbours`) || !strings.Contains(res.Failure.Error(), "massless") {
		t.Errorf("interrupted %v, failure %v", res.Interrupted, res.Failure)
	}
}

// A temperature that no part can have is told.
func TestTooHotForAnySolid(t *testing.T) {
	m := load(t, `{"workheat": 1, "nodes": {"block": {"heat capacity": "10 J/K"}, "air": {"held": "20 degC"}},
	"conductances": {"film": {"kind": "conduction", "between": ["block", "air"], "value": "1 W/K"}},
	"sources": {"heater": {"kind": "given heat", "into": "block", "power": "1 MW"}}, "duty": [{"rest": {"for": "10 s"}}]}`, nil)
	res := m.Run(context.Background(), network.Options{})
	if !strings.Contains(strings.Join(res.Warnings, "\n"), "block: no solid stands") {
		t.Errorf("warnings %q", res.Warnings)
	}
}

// A phase may wait for a temperature that a held node, or a node without mass beside it, jumps over where the duty
// ends: the book of it closes.
func TestWaitForAJump(t *testing.T) {
	for _, node := range []string{"oven", "face"} {
		for _, more := range []string{"", `, {"rest": {"for": "3 s"}}`} {
			o := run(t, `{"workheat": 1, "nodes": {"face": {"massless": true}, "block": {"heat capacity": "500 J/K"},
			"oven": {"held": {"table": [["0 s", "20 degC"], ["5 s", "20 degC"], ["5 s", "300 degC"]]}}},
			"conductances": {"a": {"kind": "conduction", "between": ["oven", "face"], "value": "5 W/K"},
			"b": {"kind": "conduction", "between": ["face", "block"], "value": "5 W/K"}},
			"duty": [{"rest": {"until": {"node": "`+node+`", "rises to": "100 degC"}, "at most": "1 h"}}`+more+`]}`, 1e-6)
			if o.Book == nil || !o.Book.Closed {
				t.Errorf("%s%s: the book is open: %+v", node, more, o.Book)
			}
		}
	}
}
