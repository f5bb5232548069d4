package network_test

import (
	"context"
	"strings"
	"testing"

	"workheat/network"
)

// idle is a car that does nothing yet.
const idle = `"workheat": 1,
 "bodies": {"car": {"kind": "road vehicle", "mass": "1000 kg", "rolling resistance": 0.02, "wheel radius": "0.3 m"}},
 "nodes": {"disc": {"heat capacity": "3000 J/K", "start": "50 degC"}, "air": {"held": "20 degC"}},
 "conductances": {"film": {"kind": "contact", "between": ["disc", "air"], "coefficient": "30 W/(m^2 K)", "area": "0.1 m^2"}},
 "dissipators": {"brake": {"kind": "friction pad", "slows": "car", "part of braking": 1, "heats": "disc"}}`

// What a duty does that its author surely did not mean is said in a warning.
func TestLegWarnings(t *testing.T) {
	cases := []struct{ name, duty, want string }{
		{"idle brakes", `[{"brake": {"from": "50 km/h", "to": "40 km/h", "deceleration": "0.1 m/s^2"}}]`, "the brakes took no work"},
		{"real brakes", `[{"brake": {"from": "50 km/h", "to": "40 km/h", "deceleration": "1 m/s^2"}}]`, ""},
		{"waited in vain", `[{"rest": {"until": {"node": "disc", "falls to": "25 degC"}, "at most": "10 s"}}]`, "the longest time passed before disc came to 25 degC"},
		{"passed before", `[{"rest": {"until": {"node": "disc", "falls to": "60 degC"}, "at most": "10 s"}}, {"rest": {"for": "1 s"}}]`, "took no time"},
		{"late rounds", `[{"repeat": 3, "every": "10 s", "phases": [{"rest": {"until": {"node": "disc", "falls to": "48.5 degC"}, "for": "12 s"}}]}]`, "began late 2 times, by up to 2 s"},
		{"time first", `[{"rest": {"until": {"node": "disc", "falls to": "25 degC"}, "for": "10 s"}}]`, ""},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			res := run(t, "{"+idle+`, "duty": `+c.duty+"}", 1e-6)
			got := strings.Join(res.Warnings, "; ")
			if !strings.Contains(got, c.want) || c.want == "" && got != "" {
				t.Errorf("warnings %q, want %q", got, c.want)
			}
		})
	}
}

// An interruption in the second run is an interruption: the first is kept whole, and nobody takes the missing
// layer for a passed one.
func TestInterruptedToleranceCheck(t *testing.T) {
	m := load(t, "{"+idle+`, "duty": [{"rest": {"for": "100 s"}}]}`, nil)
	ctx, cancel := context.WithCancel(context.Background())
	res := m.Run(ctx, network.Options{Audit: true, Tolerance: true, Progress: func(float64, string) { cancel() }})
	if !res.Interrupted || res.End != 100 || len(res.Warnings) != 1 {
		t.Errorf("interrupted %v at %g s, warnings %q", res.Interrupted, res.End, res.Warnings)
	}
	for _, c := range res.Book.Checks {
		if c.Layer == 3 {
			t.Error("the book holds the check that was cut short")
		}
	}
}
