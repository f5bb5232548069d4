package network_test

import (
	"context"
	"fmt"
	"testing"

	"workheat/network"
)

// A phase that waits for a temperature is over at once when the temperature has been passed before, also when it is
// the first of the duty; it waits when the temperature is still to come.
func TestUntilPassedBefore(t *testing.T) {
	const film = `"area": "0.12 m^2", "coefficient": "60 W/(m^2 K)"`
	wait := func(way, mark string) string {
		return fmt.Sprintf(`[{"rest": {"until": {"node": "body", "%s": "%s"}, "at most": "100 s"}}, {"rest": {"for": "10 s"}}]`, way, mark)
	}
	cases := []struct {
		name, duty string
		end        float64
	}{
		{"falls to, passed", wait("falls to", "350 degC"), 10},
		{"falls to, at the mark", wait("falls to", "300 degC"), 10},
		{"falls to, far below", wait("falls to", "21 degC"), 110},
		{"rises to, passed", wait("rises to", "100 degC"), 10},
		{"rises to, at the mark", wait("rises to", "300 degC"), 10},
		{"rises to, never", wait("rises to", "301 degC"), 110},
		{"second phase, passed", `[{"rest": {"for": "5 s"}}, {"rest": {"until": {"node": "body", "falls to": "299 degC"}, "at most": "100 s"}}]`, 5},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			o := run(t, lump(`{"heat capacity": "3430 J/K", "start": "300 degC"}`, "20 degC", film, "", c.duty), 1e-8)
			near(t, "end", o.End, c.end, 1e-9)
		})
	}
}

// The temperature of a node without mass jumps with the heat given to it. A phase that waits for it is over when it
// has jumped over the mark: where the phase begins, or at a jump of a table within it.
func TestUntilJumpedOver(t *testing.T) {
	text := func(duty string) string {
		return `{"workheat": 1, "nodes": {"face": {"massless": true}, "body": {"heat capacity": "1 kJ/K", "start": "20 degC"}},
		"conductances": {"skin": {"kind": "conduction", "between": ["face", "body"], "value": "10 W/K"}},
		"sources": {"heater": {"kind": "given heat", "into": "face", "power": {"table": [["0 s", "100 W"], ["30 s", "100 W"], ["30 s", "1 kW"], ["1000 s", "1 kW"]]}}},
		"duty": ` + duty + `}`
	}
	wait := `{"rest": {"until": {"node": "face", "rises to": "%s"}, "at most": "200 s"}}`
	cases := []struct {
		name, duty string
		end        float64
	}{
		// The face is 10 K above the body at 100 W and 100 K at 1 kW; the body gains 0.1 K/s and then 1 K/s.
		{"passed at the very start", "[" + fmt.Sprintf(wait, "25 degC") + `, {"rest": {"for": "7 s"}}]`, 7},
		{"before the jump", "[" + fmt.Sprintf(wait, "32 degC") + "]", 20},
		{"over the jump", "[" + fmt.Sprintf(wait, "80 degC") + `, {"rest": {"for": "7 s"}}]`, 37},
		{"after the jump", "[" + fmt.Sprintf(wait, "133 degC") + "]", 40},
		{"jumped where the phase begins", `[{"rest": {"for": "30 s"}}, ` + fmt.Sprintf(wait, "80 degC") + `, {"rest": {"for": "7 s"}}]`, 37},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) { near(t, "end", run(t, text(c.duty), 1e-8).End, c.end, 1e-5) })
	}
}

// A node without mass cools at once, at a jump of a table within the phase that waits for it or where that phase begins,
// and the brakes heat it again at once where the next begins: the book closes all the same.
func TestUntilJumpedOverAndBack(t *testing.T) {
	text := func(more string) string {
		return `{"workheat": 1, "nodes": {"face": {"massless": true}, "body": {"heat capacity": "1 kJ/K", "start": "20 degC"}},
		"bodies": {"cart": {"kind": "road vehicle", "mass": "500 kg"}},
		"conductances": {"skin": {"kind": "conduction", "between": ["face", "body"], "value": "10 W/K"}},
		"dissipators": {"pad": {"kind": "friction pad", "slows": "cart", "part of braking": 0.1, "heats": {"face": 1}}},
		"sources": {"heater": {"kind": "given heat", "into": "face", "power": {"table": [["0 s", "1 kW"], ["30 s", "1 kW"], ["30 s", "0 W"]]}}},
		"duty": [` + more + `, {"brake": {"to": "0 m/s", "deceleration": "5 m/s^2"}}, {"rest": {"for": "7 s"}}]}`
	}
	const wait = `{"hold": {"speed": "20 m/s", "until": {"node": "face", "falls to": "90 degC"}, "at most": "200 s"}}`
	for name, before := range map[string]string{
		"within the phase": wait,
		"where it begins":  `{"hold": {"speed": "20 m/s", "for": "30 s"}}, ` + wait,
		"after braking":    `{"hold": {"speed": "30 m/s", "for": "40 s"}}, {"brake": {"to": "20 m/s", "deceleration": "5 m/s^2"}}, ` + wait,
	} {
		t.Run(name, func(t *testing.T) {
			end := 30 + 4 + 7.0
			if name == "after braking" {
				end = 40 + 2 + 4 + 7
			}
			near(t, "end", run(t, text(before), 1e-6).End, end, 1e-9)
		})
	}
}

// A duty of which nothing is left to do ends at once and says how things stand.
func TestDutyOverAtOnce(t *testing.T) {
	m := load(t, lump(`{"heat capacity": "3430 J/K", "start": "300 degC"}`, "20 degC", `"area": "0.12 m^2", "coefficient": "60 W/(m^2 K)"`, "",
		`[{"rest": {"until": {"node": "body", "rises to": "100 degC"}, "at most": "100 s"}}]`), nil)
	res := m.Run(context.Background(), network.Options{Audit: true, Tolerance: true})
	if res.Failure != nil || res.End != 0 || len(res.Summary) != 2 {
		t.Fatalf("failure %v, end %g s, %d summaries", res.Failure, res.End, len(res.Summary))
	}
	s := res.Summary[0]
	near(t, "start", s.Start, celsius(300), 1e-9)
	near(t, "highest", s.Highest, celsius(300), 1e-9)
	near(t, "end", s.End, celsius(300), 1e-9)
}
