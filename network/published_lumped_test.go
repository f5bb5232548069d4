package network_test

import (
	"fmt"
	"math"
	"strings"
	"testing"
)

// pulses is the table of a train of equal heat pulses: energy [J] spread evenly over width [s], each begun
// a period [s] after the last.
func pulses(count int, energy, width, period float64) string {
	var b strings.Builder
	b.WriteString(`{"table": [`)
	for k := range count {
		at := float64(k) * period
		for _, row := range [4][2]float64{{at, 0}, {at, energy / width}, {at + width, energy / width}, {at + width, 0}} {
			if k == 0 && row[1] == 0 && row[0] == 0 {
				continue
			}
			fmt.Fprintf(&b, `["%.17g s", "%.17g W"],`, row[0], row[1])
		}
	}
	return strings.TrimSuffix(b.String(), ",") + "]}"
}

// train is how hot, above the air, a lump is at the end of the n-th of equal pulses of a given width: the
// geometric series of Shigley's and Limpert's repeated stops, its first term the answer to one pulse.
func train(n int, single, width, period, tau float64) float64 {
	first := single * -math.Expm1(-width/tau) * tau / width
	r := math.Exp(-period / tau)
	return first * (1 - math.Pow(r, float64(n))) / (1 - r)
}

// Repeated stops of one lump: T_n - T_air = dT (1 - r^n)/(1 - r), r = exp(-P/tau). Shigley's Mechanical
// Engineering Design, equation 16-60 for the limit; for the n-th stop Limpert, Brake Design and Safety, from
// memory. The numbers are computed from the formula for stops of no length. Here a stop lasts 1 ms, which
// lowers the rise by half its share of tau: 1.0e-6 of it in the first case, 0.8e-6 in the second. That and the last
// printed digit make the tolerance. Against the formula for pulses of finite length only the integration counts.
func TestRepeatedStops(t *testing.T) {
	const width = 1e-3
	cases := []struct {
		name                   string
		capacity, film, energy float64 // J/K, W/K, J
		period, start          float64
		rise                   map[int]float64 // after so many stops
		tol                    float64
	}{
		{"type-I heating of one front disc: 7 kg, c 490, 0.12 m^2, h 60, 0.35*0.95 of 1500 kg from 120 to 60 km/h every 45 s",
			7 * 490, 0.12 * 60, 207812.5, 45, 20, map[int]float64{1: 60.587, 2: 115.712, 5: 253.028, 10: 410.806, 15: 509.192, 200: 672.167}, 1.3e-3},
		{"rise 100 K, period 120 s, tau 600 s", 600, 1, 60000, 120, 20,
			map[int]float64{1: 100, 5: 348.71913993, 10: 477.00574226, 200: 551.66556561}, 6e-4},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			tau := c.capacity / c.film
			source := fmt.Sprintf(`"sources": {"stops": {"kind": "given heat", "into": "body", "power": %s}},`,
				pulses(200, c.energy, width, c.period))
			o := run(t, lump(fmt.Sprintf(`{"heat capacity": "%g J/K"}`, c.capacity), fmt.Sprintf("%g degC", c.start),
				fmt.Sprintf(`"area": "1 m^2", "coefficient": "%g W/(m^2 K)"`, c.film), source, rest(200*c.period)), 1e-9)
			for n, rise := range c.rise {
				got := o.at("body", float64(n-1)*c.period+width) - celsius(c.start)
				near(t, fmt.Sprintf("after stop %d, stops of no length", n), got, rise, c.tol)
				near(t, fmt.Sprintf("after stop %d, stops of 1 ms", n), got, train(n, c.energy/c.capacity, width, c.period, tau), 2e-6)
			}
			r := math.Exp(-c.period / tau)
			trough := c.energy / c.capacity / (1 - r) * r
			near(t, "trough in the limit", o.end("body")-celsius(c.start), trough, c.tol)
		})
	}
}

// The same cycle driven by the vehicle: braking at 3 m/s^2 from 120 to 60 km/h, speed regained in 10 s, 45 s
// from start to start (UN Regulation 13, annex 4, type I, category M1). Over a stop of length s the power falls
// along a straight line from P to P/2, and the answer of one lump to it is a closed form; the stops add up in
// the same geometric series.
func TestRepeatedStopsOfAVehicle(t *testing.T) {
	const capacity, film, period, count = 7 * 490, 0.12 * 60, 45, 15
	o := run(t, `{"workheat": 1,
	"nodes": {"disc": {"heat capacity": "7 kg * 490 J/(kg K)", "start": "20 degC"},
	          "pads": {"heat capacity": "500 J/K", "start": "20 degC"}, "air": {"held": "20 degC"}},
	"conductances": {"film": {"kind": "convection", "between": ["disc", "air"], "area": "0.12 m^2", "coefficient": "60 W/(m^2 K)"},
	                 "pad film": {"kind": "convection", "between": ["pads", "air"], "area": "0.02 m^2", "coefficient": "20 W/(m^2 K)"}},
	"bodies": {"car": {"kind": "road vehicle", "mass": "1500 kg"}},
	"dissipators": {"front left": {"kind": "friction pad", "slows": "car", "part of braking": 0.35, "heats": {"disc": 0.95, "pads": 0.05}}},
	"duty": [{"repeat": 15, "every": "45 s", "phases": [
		{"brake": {"from": "120 km/h", "to": "60 km/h", "deceleration": "3 m/s^2"}},
		{"speed up": {"to": "120 km/h", "in": "10 s"}}]}]}`, tight)
	v, length, share := 120/3.6, 60/3.6/3, 0.35*0.95
	power, tau := 1500*3*v*share, capacity/film
	fall := 1500 * 3 * 3 * share // W/s
	// The particular solution of C T' = P - f t - film T is (P + f tau - f t)/film.
	first := (power+fall*tau)/film*-math.Expm1(-length/tau) - fall*length/film
	r := math.Exp(-period / tau)
	for n := 1; n <= count; n++ {
		want := first * (1 - math.Pow(r, float64(n))) / (1 - r)
		near(t, fmt.Sprintf("disc after stop %d", n), o.at("disc", float64(n-1)*period+length)-celsius(20), want, 1e-6)
	}
	near(t, "work of the brake", o.work("front left"), count*0.35*625000, 1e-6)
	near(t, "end", o.End, count*period, 1e-9)
}

// Continued drag: T - T_air = (P/hA)(1 - exp(-t/tau)), and cooling by one film: T - T_air falls as exp(-t/tau)
// (Shigley's Mechanical Engineering Design, equation 16-56, for the cooling; the drag from memory of Limpert).
// Disc 7 kg, c 490, 0.12 m^2, h 60; 2038.64 W is 0.35*0.95 of what holds 1500 kg at 30 km/h on 5 %. The numbers are
// computed and printed to three and two digits.
func TestDragAndCooling(t *testing.T) {
	const film = `"area": "0.12 m^2", "coefficient": "60 W/(m^2 K)"`
	o := run(t, lump(`{"heat capacity": "3430 J/K"}`, "20 degC", film,
		`"sources": {"drag": {"kind": "given heat", "into": "body", "power": "2038.64 W"}},`, rest(20000)), tight)
	for _, c := range [][2]float64{{60, 53.507}, {300, 152.305}, {720, 240.681}, {20000, 303.145}} {
		near(t, fmt.Sprintf("drag for %g s", c[0]), o.at("body", c[0]), celsius(c[1]), 6e-4)
		near(t, fmt.Sprintf("drag for %g s", c[0]), o.at("body", c[0]), celsius(20)+2038.64/7.2*-math.Expm1(-c[0]*7.2/3430), 1e-7)
	}

	cool := run(t, lump(`{"heat capacity": "3430 J/K", "start": "500 degC"}`, "20 degC", film, "",
		`[{"rest": {"until": {"node": "body", "falls to": "100 degC"}, "at most": "1 h"}}]`), tight)
	near(t, "500 to 100 degC", cool.End, 853.57, 6e-3)
	near(t, "500 to 100 degC", cool.End, 3430/7.2*math.Log(480.0/80), 1e-5)
}

// Two bodies of 500 and 2000 J/K joined by 10 W/K, from 400 and 20 degC: closed forms of the linear pair (Bejan and
// Kraus, Heat Transfer Handbook, equations 3.287 and 3.288); the numbers are computed from them. Then with 1000 W
// into the first, and with a loss of 5 W/K from the second to 20 degC.
func TestTwoBodies(t *testing.T) {
	pair := func(first, more, sources string, seconds float64) string {
		return fmt.Sprintf(`{"workheat": 1,
		"nodes": {"one": {"heat capacity": "500 J/K", "start": "%s"}, "two": {"heat capacity": "2 kJ/K", "start": "20 degC"}, "border": {"held": "20 degC"}},
		"conductances": {"link": {"kind": "conduction", "between": ["one", "two"], "value": "10 W/K"}%s},
		%s "duty": %s}`, first, more, sources, rest(seconds))
	}
	heater := `"sources": {"heater": {"kind": "given heat", "into": "one", "power": "1 kW"}},`
	loss := `, "loss": {"kind": "conduction", "between": ["two", "border"], "value": "5 W/K"}`
	cases := []struct {
		name, text string
		want       [][3]float64 // s, degC, degC
	}{
		{"alone", pair("400 degC", "", "", 200), [][3]float64{
			{10, 332.75543805, 36.81114049}, {40, 207.83535012, 68.04116247}, {100, 120.95383958, 89.76154010}, {200, 98.04833589, 95.48791603}}},
		{"heated", pair("400 degC", "", heater, 200), [][3]float64{
			{10, 350.91218794, 37.27195302}, {40, 264.29106588, 73.92723353}, {100, 219.70039967, 115.07490008}, {200, 241.61710728, 159.59572318}}},
		{"heated and losing", pair("20 degC", loss, heater, 3000), [][3]float64{
			{10, 38.156562088552, 20.456965160459}, {60, 93.569639980427, 30.988307929396}, {300, 186.5123971531, 99.610854315222},
			{1000, 286.09606217081, 189.41445006751}, {3000, 319.3239687675, 219.39013612159}}},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			o := run(t, c.text, tight)
			for _, w := range c.want {
				near(t, fmt.Sprintf("one at %g s", w[0]), o.at("one", w[0]), celsius(w[1]), 1e-7)
				near(t, fmt.Sprintf("two at %g s", w[0]), o.at("two", w[0]), celsius(w[2]), 1e-7)
			}
		})
	}
}

// ladder is a chain of five nodes of 100 J/K joined by 2 W/K, hot at its first node or next to a hot wall.
func ladder(first, wall string) string {
	text := `{"workheat": 1, "nodes": {`
	for i := 1; i <= 5; i++ {
		start := "0 degC"
		if i == 1 {
			start = first
		}
		text += fmt.Sprintf(`"n%d": {"heat capacity": "100 J/K", "start": "%s"},`, i, start)
	}
	text += `"wall": {"held": "100 degC"}}, "conductances": {`
	for i := 1; i < 5; i++ {
		text += fmt.Sprintf(`"l%d": {"kind": "conduction", "between": ["n%d", "n%d"], "value": "2 W/K"},`, i, i, i+1)
	}
	return strings.TrimSuffix(text+wall, ",") + `}, "duty": ` + rest(1000) + `}`
}

// Ladders of equal capacities and conductances: sums of the known modes, checked against a dense
// eigenvalue solver at 30 digits and printed to eight.
func TestLadders(t *testing.T) {
	cases := []struct {
		name, text string
		want       map[float64][5]float64 // degC by s
	}{
		{"insulated at both ends", ladder("100 degC", ""), map[float64][5]float64{
			10:   {83.41653949, 15.03492734, 1.44887843, .09478418, .00487056},
			50:   {52.37781091, 30.85124872, 12.20644066, 3.59035496, .97414475},
			200:  {27.95553195, 24.81185481, 19.87138988, 15.10864544, 12.25257793},
			1000: {20.01740837, 20.01075896, 20.00000000, 19.98924104, 19.98259163}}},
		{"one end at a wall", ladder("0 degC", `"wall": {"kind": "conduction", "between": ["wall", "n1"], "value": "2 W/K"}`), map[float64][5]float64{
			50:   {47.62224367, 16.77145673, 4.56884721, 1.00660343, .21178694},
			200:  {72.30999839, 48.05814446, 29.54204264, 17.53033645, 11.74874878},
			1000: {92.95138529, 86.47382594, 81.09210102, 77.24219486, 75.23598384}}},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			o := run(t, c.text, tight)
			for time, want := range c.want {
				for i, degC := range want {
					node := fmt.Sprintf("n%d", i+1)
					near(t, fmt.Sprintf("%s at %g s", node, time), o.at(node, time), celsius(degC), 3e-8)
				}
			}
		})
	}
}
