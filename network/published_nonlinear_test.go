package network_test

import (
	"fmt"
	"math"
	"strings"
	"testing"
)

// radiating is a body of 1000 J/K and 0.1 m^2 with emissivity 0.8 in surroundings at a temperature.
func radiating(start, surroundings, more, duty string) string {
	return fmt.Sprintf(`{"workheat": 1,
	"nodes": {"body": {"heat capacity": "1000 J/K", "start": "%s"}, "walls": {"held": "%s"}},
	"conductances": {"glow": {"kind": "radiation", "between": ["body", "walls"], "area": "0.1 m^2", "emissivity": 0.8}%s},
	"duty": %s}`, start, surroundings, more, duty)
}

// falls is a duty that waits for one temperature [K] of the body after another.
func falls(way string, marks ...float64) string {
	var b strings.Builder
	for _, m := range marks {
		fmt.Fprintf(&b, `{"rest": {"until": {"node": "body", "%s": "%.17g K"}, "at most": "10 h"}},`, way, m)
	}
	return "[" + strings.TrimSuffix(b.String(), ",") + "]"
}

// One lump that radiates, with and without a film: closed forms of the time to a temperature (Bejan and Kraus, Heat
// Transfer Handbook, equations 3.283 and 3.284, with the constant of radiation of CODATA 2018); the numbers are
// computed from them and printed to eight decimals.
func TestRadiationCooling(t *testing.T) {
	type pair struct{ time, kelvin float64 }
	cases := []struct {
		name, text string
		want       []pair
		ends       []float64 // s, of the phases
	}{
		{name: "1000 K in 300 K, times", text: radiating("1000 K", "300 K", "", falls("falls to", 900, 800, 700, 600, 500, 400, 350)),
			ends: []float64{27.59724580, 71.01236024, 143.65914762, 275.94577623, 549.74189424, 1271.19094414, 2268.88145023}},
		{name: "1000 K in 300 K", text: radiating("1000 K", "300 K", "", rest(10000)),
			want: []pair{{100, 753.3634301}, {500, 513.0136033}, {1000, 425.5665508}, {2000, 359.3962067}, {5000, 310.9615006}, {10000, 300.9005961}}},
		{name: "1000 K into nothing", text: radiating("1000 K", "0 K", "", rest(10000)),
			want: []pair{{100, 751.00257196}, {1000, 409.06674501}, {10000, 193.93929471}}},
		{name: "300 K in 1000 K", text: radiating("300 K", "1000 K", "", falls("rises to", 900)), ends: []float64{176.80249950}},
		{name: "1000 K into nothing with a film of 10 W/(m^2 K)", text: radiating("1000 K", "0 K",
			`, "film": {"kind": "convection", "between": ["body", "walls"], "area": "0.1 m^2", "coefficient": "10 W/(m^2 K)"}`,
			falls("falls to", 500)), ends: []float64{272.43402504}},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			o := run(t, c.text, tight)
			for _, w := range c.want {
				near(t, fmt.Sprintf("body at %g s", w.time), o.at("body", w.time), w.kelvin, 2e-7)
			}
			if c.ends == nil {
				return
			}
			legs := o.legs()
			if len(legs) != len(c.ends) {
				t.Fatalf("%d phases, want %d", len(legs), len(c.ends))
			}
			for k, want := range c.ends {
				near(t, fmt.Sprintf("end of phase %d", k+1), legs[k], want, 2e-6) // the slowest mark is passed at 0.03 K/s
			}
		})
	}
}

// One lump whose specific heat rises along a line, c = 450 + 0.5 u with u above the air: time to a temperature,
// t = (m/hA)(c0 ln(u0/u) + c1 (u0 - u)) (separation of variables), its inverse by Lambert's function, and the
// parabola of heating without loss. The numbers are computed from them.
func TestLinearHeatCapacity(t *testing.T) {
	node := func(u float64) string {
		return fmt.Sprintf(`{"heat capacity": {"table": [["20 degC", "900 J/K"], ["1020 degC", "1900 J/K"]]}, "start": "%g degC"}`, 20+u)
	}
	const film = `"area": "1 m^2", "coefficient": "5 W/(m^2 K)"`
	kelvin := func(u float64) float64 { return celsius(20) + u }
	marks := lump(node(500), "20 degC", film, "", falls("falls to", kelvin(400), kelvin(250), kelvin(100), kelvin(50), kelvin(10)))
	legs := run(t, marks, tight).legs()
	for k, want := range []float64{60.16583924, 174.76649250, 369.69882424, 504.46531674, 802.16414098} {
		near(t, fmt.Sprintf("mark %d", k+1), legs[k], want, 1e-6)
	}
	o := run(t, lump(node(500), "20 degC", film, "", rest(1000)), tight)
	for _, w := range [][2]float64{{50, 415.851621906}, {100, 341.949783530}, {300, 140.764951124}, {600, 30.066834684}, {1000, 3.356432751}} {
		near(t, fmt.Sprintf("cooling at %g s", w[0]), o.at("body", w[0]), kelvin(w[1]), 1e-7)
	}
	o = run(t, fmt.Sprintf(`{"workheat": 1, "nodes": {"body": %s},
	"sources": {"heater": {"kind": "given heat", "into": "body", "power": "5 kW"}}, "duty": %s}`, node(0), rest(100)), tight)
	for _, w := range [][2]float64{{10, 53.93920142}, {50, 244.55231423}, {100, 445.36240471}} {
		near(t, fmt.Sprintf("heating at %g s", w[0]), o.at("body", w[0]), kelvin(w[1]), 1e-7)
	}
}

// heated is 1 kg of a material from 20 degC with 1 kW, no losses: the energy in J/kg is a thousand times the time.
func heated(material string, seconds float64) string {
	return fmt.Sprintf(`{"workheat": 1, "nodes": {"body": {"mass": "1 kg", "material": "%s", "start": "20 degC"}},
	"sources": {"heater": {"kind": "given heat", "into": "body", "power": "1 kW"}}, "duty": %s}`, material, rest(seconds))
}

// Enthalpies of the specific heats of EN 1993-1-2:2005, 3.4.1.2 (carbon steel) and EN 1999-1-2:2007, 3.3.1 (aluminium
// alloys), integrated in closed form: kJ/kg from 20 degC. The formulas were seen in transcriptions of the standards.
// The program tabulates the steel to 2e-4 of c, which bounds the temperature's error by 2e-4 of the rise; the
// aluminium's line is exact, and its numbers are printed to three decimals.
func TestMaterialsHeatedWithoutLoss(t *testing.T) {
	cases := []struct {
		material string
		share    float64      // of the rise that the temperature may be off
		rows     [][2]float64 // degC, kJ/kg
	}{
		{"carbon steel", 2e-4, [][2]float64{{100, 37.20698}, {200, 88.19115}, {300, 142.92032}, {400, 201.34448}, {500, 264.74565},
			{600, 335.73782}, {650, 374.88764}, {700, 419.10608}, {735, 475.42781}, {750, 511.36895}, {800, 561.60083},
			{900, 632.06384}, {1000, 697.06384}, {1200, 827.06384}}},
		{"aluminium", 1e-9, [][2]float64{{100, 74.208}, {200, 170.658}, {300, 271.208}, {400, 375.858}, {500, 484.608}}},
	}
	for _, c := range cases {
		t.Run(c.material, func(t *testing.T) {
			o := run(t, heated(c.material, c.rows[len(c.rows)-1][1]), 1e-8)
			for _, row := range c.rows {
				near(t, fmt.Sprintf("after %g kJ/kg", row[1]), o.at("body", row[1]), celsius(row[0]), c.share*(row[0]-20))
			}
		})
	}
}

// The other way round: the time to 735 degC, the top of the peak of 5000 J/(kg K), is the enthalpy at 1 kW. And half
// the steel with a film in air heats in the same energy less what the film took: the book says how much.
func TestSteelThroughItsPeak(t *testing.T) {
	text := strings.Replace(heated("carbon steel", 1), rest(1), falls("rises to", celsius(735)), 1)
	near(t, "to 735 degC", run(t, text, 1e-8).End, 475.42781, 2e-4*475)

	text = `{"workheat": 1, "nodes": {"body": {"mass": "0.5 kg", "material": "carbon steel", "start": "20 degC"}, "air": {"held": "20 degC"}},
	"conductances": {"film": {"kind": "convection", "between": ["body", "air"], "area": "0.02 m^2", "coefficient": "20 W/(m^2 K)"}},
	"sources": {"heater": {"kind": "given heat", "into": "body", "power": "1 kW"}}, "duty": ` + falls("rises to", celsius(735)) + `}`
	o := run(t, text, 1e-8)
	near(t, "energy stored", o.End*1000-o.flow("film")*o.End, 475427.81/2, 2e-4*475427/2)
	if math.Abs(o.flow("film")) < 1 {
		t.Error("the film takes nothing: the check above checks nothing")
	}
}
