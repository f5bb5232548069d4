package network_test

import (
	"strings"
	"testing"
)

// What a duty does that its author surely did not mean is said in a warning.
func TestLegWarnings(t *testing.T) {
	const body = `"workheat": 1,
 "bodies": {"car": {"kind": "road vehicle", "mass": "1000 kg", "rolling resistance": 0.02, "wheel radius": "0.3 m"}},
 "nodes": {"disc": {"heat capacity": "3000 J/K", "start": "50 degC"}, "air": {"held": "20 degC"}},
 "conductances": {"film": {"kind": "contact", "between": ["disc", "air"], "coefficient": "30 W/(m^2 K)", "area": "0.1 m^2"}},
 "dissipators": {"brake": {"kind": "friction pad", "slows": "car", "part of braking": 1, "heats": "disc"}}`
	cases := []struct{ name, duty, want string }{
		{"idle brakes", `[{"brake": {"from": "50 km/h", "to": "40 km/h", "deceleration": "0.1 m/s^2"}}]`, "the brakes took no work"},
		{"real brakes", `[{"brake": {"from": "50 km/h", "to": "40 km/h", "deceleration": "1 m/s^2"}}]`, ""},
		{"waited in vain", `[{"rest": {"until": {"node": "disc", "falls to": "25 degC"}, "at most": "10 s"}}]`, "the longest time passed before disc came to 25 degC"},
		{"passed before", `[{"rest": {"until": {"node": "disc", "falls to": "60 degC"}, "at most": "10 s"}}, {"rest": {"for": "1 s"}}]`, "took no time"},
		{"time first", `[{"rest": {"until": {"node": "disc", "falls to": "25 degC"}, "for": "10 s"}}]`, ""},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			res := run(t, "{"+body+`, "duty": `+c.duty+"}", 1e-6)
			got := strings.Join(res.Warnings, "; ")
			if !strings.Contains(got, c.want) || c.want == "" && got != "" {
				t.Errorf("warnings %q, want %q", got, c.want)
			}
		})
	}
}
