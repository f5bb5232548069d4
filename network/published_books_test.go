package network_test

import (
	"fmt"
	"testing"
)

// A row is a worked example of a textbook: one number that the run must give.
type row struct {
	source string
	text   string
	get    func(o outcome) float64
	want   float64
	tol    float64 // of the printed figure, unless said otherwise
}

func checkRows(t *testing.T, rows []row) {
	t.Helper()
	for _, r := range rows {
		t.Run(r.source, func(t *testing.T) { near(t, "result", r.get(run(t, r.text, 1e-9)), r.want, r.tol) })
	}
}

func ends(o outcome) float64 { return o.End }

func endOf(node string) func(outcome) float64 {
	return func(o outcome) float64 { return o.end(node) - 273.15 }
}

func flowOf(element string) func(outcome) float64 {
	return func(o outcome) float64 { return o.flow(element) }
}

func dropOf(hot, cold string) func(outcome) float64 {
	return func(o outcome) float64 { return o.end(hot) - o.end(cold) }
}

// junction is Incropera's thermocouple junction: a sphere in gas at 200 degC with h = 400 W/(m^2 K), density 8500 kg/m^3,
// c 400 J/(kg K), from 25 degC.
func junction(diameter, more, duty string) string {
	return `{"workheat": 1, "parameters": {"across": "` + diameter + `"},
	"nodes": {"body": {"heat capacity": "8500 kg/m^3 * 400 J/(kg K) * pi/6 * across^3", "start": "25 degC"},
	          "gas": {"held": "200 degC"}, "duct": {"held": "400 degC"}},
	"conductances": {"film": {"kind": "convection", "between": ["body", "gas"], "area": "pi * across^2", "coefficient": "400 W/(m^2 K)"},
	                 "glow": {"kind": "radiation", "between": ["body", "duct"], "area": "pi * across^2", "emissivity": ` + more + `}},
	"duty": ` + duty + `}`
}

// timeConstant is the diameter for a time constant of 1 s, 6 h tau/(rho c) = 7.0588e-4 m.
const timeConstant = "6 * 400 W/(m^2 K) * 1 s / (8500 kg/m^3 * 400 J/(kg K))"

// bookSigma is the factor on radiation that makes its constant the 5.67e-8 W/(m^2 K^4) of the textbooks.
const bookSigma = `"factor": "5.67/5.670374419"`

// Incropera, DeWitt, Bergman and Lavine, Fundamentals of Heat and Mass Transfer, examples 5.1 and 5.2: printed values
// as retyped and run in an open companion to the book; more digits computed from the book's formulas. The books used
// 5.67e-8 W/(m^2 K^4) and 273 K.
func TestThermocoupleJunction(t *testing.T) {
	checkRows(t, []row{
		{"example 5.1: to 199 degC, diameter 7.06e-4 m", junction("7.06e-4 m", "0", falls("rises to", celsius(199))), ends, 5.16, 0.01},
		{"example 5.1: to 199 degC, tau 1 s: ln 175", junction(timeConstant, "0", falls("rises to", celsius(199))), ends, 5.164785974, 1e-7},
		{"example 5.2: steady", junction("7.06e-4 m", "0.9", rest(60)), endOf("body"), 218.7, 0.05},
		{"example 5.2: steady, more digits", junction("7.06e-4 m", "0.9", rest(60)), endOf("body"), 218.72806, 1e-5},
		{"example 5.2: to 1 K below, printed 4.9 from a coarse integration", junction("7.06e-4 m", "0.9", falls("rises to", celsius(217.72806))), ends, 4.9, 0.1},
		{"example 5.2: to 1 K below, more digits", junction("7.06e-4 m", "0.9", falls("rises to", celsius(217.72806))), ends, 4.993952, 2e-5},
	})
	o := run(t, junction("7.06e-4 m", "0.9", rest(5)), tight)
	for _, w := range [][2]float64{{1, 150.38572}, {2, 194.88900}, {3, 210.45144}, {5, 217.73446}} {
		near(t, fmt.Sprintf("example 5.2 at %g s", w[0]), o.at("body", w[0]), celsius(w[1]), 1e-5)
	}
}

// panel is one square metre of Incropera's aluminium panel, 3 mm thick and wetted on both sides, in air and walls at
// one temperature.
func panel(start, air, h, duty string) string {
	return fmt.Sprintf(`{"workheat": 1,
	"nodes": {"body": {"heat capacity": "3 mm * 1 m^2 * 2770 kg/m^3 * 875 J/(kg K)", "start": "%s"}, "oven": {"held": "%s"}},
	"conductances": {"film": {"kind": "convection", "between": ["body", "oven"], "area": "2 m^2", "coefficient": "%s"},
	                 "glow": {"kind": "radiation", "between": ["body", "oven"], "area": "2 m^2", "emissivity": 0.8, %s}},
	"duty": %s}`, start, air, h, bookSigma, duty)
}

// Incropera, DeWitt, Bergman and Lavine, example 5.3: cured in an oven at 175 degC until 300 s above 150 degC, then
// cooled in air at 25 degC to 37 degC. The companion's run gives 123 s and 987 s in all, the book prints 124 s, 175 degC and
// 989 s from coarse steps; computed: 123.075 s, 174.754 degC at 423.08 s, 986.33 s,
// with 273 K for 0 degC and 5.67e-8 W/(m^2 K^4) as in the book.
func TestCuredPanel(t *testing.T) {
	oven := run(t, panel("298 K", "448 K", "40 W/(m^2 K)", `[
		{"rest": {"until": {"node": "body", "rises to": "423 K"}, "at most": "1 h"}}, {"rest": {"for": "300 s"}}]`), 1e-9)
	near(t, "to 150 degC", oven.legs()[0], 123, 0.5)
	near(t, "to 150 degC, more digits", oven.legs()[0], 123.075, 6e-4)
	near(t, "out of the oven", oven.end("body"), 273+174.754, 6e-4)
	cooled := run(t, panel(fmt.Sprintf("%.17g K", oven.end("body")), "298 K", "10 W/(m^2 K)", falls("falls to", 310)), 1e-9)
	near(t, "in all", oven.End+cooled.End, 986.33, 0.006)
}

// Worked examples of one lump. Printed values as retyped and run in open companions to the books.
func TestLumpExamples(t *testing.T) {
	checkRows(t, []row{
		{"Cengel, Heat Transfer, 3rd ed., example 4-1: 1 mm junction to 99 % of the step, printed 10 s, computed 9.9413",
			lump(`{"heat capacity": "8500 kg/m^3 * 320 J/(kg K) * pi/6 * (1 mm)^3", "start": "0 degC"}`, "100 degC",
				`"area": "pi * (1 mm)^2", "coefficient": "210 W/(m^2 K)"`, "", falls("rises to", celsius(99))), ends, 9.9413, 6e-5},
		{"Holman, Heat Transfer, example 4-1: 5 cm steel ball from 450 to 150 degC in air at 100 degC, 5818 s",
			lump(`{"heat capacity": "7800 kg/m^3 * 460 J/(kg K) * pi/6 * (5 cm)^3", "start": "450 degC"}`, "100 degC",
				`"area": "pi * (5 cm)^2", "coefficient": "10 W/(m^2 K)"`, "", falls("falls to", celsius(150))), ends, 5818, 0.5},
		{"Kreith, Manglik and Bohn, 7th ed., example 3.3 as a lump: 20 mm sheet from 500 to 250 degC; computed",
			lump(`{"heat capacity": "8500 kg/m^3 * 460 J/(kg K) * 20 mm * 1 m^2", "start": "500 degC"}`, "20 degC",
				`"area": "2 m^2", "coefficient": "80 W/(m^2 K)"`, "", falls("falls to", celsius(250))), ends, 359.577, 6e-4},
	})
}

// glowing is a massless body between a film to the air and radiation to walls, with heat given to it.
// The temperatures are in K.
func glowing(air, h, area, walls string, emissivity float64, power string) string {
	return fmt.Sprintf(`{"workheat": 1,
	"nodes": {"body": {"massless": true}, "air": {"held": "%s K"}, "walls": {"held": "%s K"}},
	"conductances": {"film": {"kind": "convection", "between": ["body", "air"], "area": "%s", "coefficient": "%s W/(m^2 K)"},
	                 "glow": {"kind": "radiation", "between": ["body", "walls"], "area": "%s", "emissivity": %g, %s}},
	"sources": {"heat": {"kind": "given heat", "into": "body", "power": "%s"}}, "duty": %s}`,
		air, walls, area, h, area, emissivity, bookSigma, power, rest(10))
}

// Worked examples of a steady balance of film and radiation: a node without mass finds it at once. Printed values as
// retyped and run in open companions to the books; those with more digits computed from the books' formulas. The
// books take 0 degC as 273 K, and so do these netlists by writing kelvin.
func TestSteadyBalances(t *testing.T) {
	body := func(o outcome) float64 { return o.end("body") }
	above := func(o outcome) float64 { return o.end("body") - 273 }
	checkRows(t, []row{
		{"Lienhard, A Heat Transfer Textbook, example 1.5: thermocouple, 28.395 degC", glowing("293", "75", "1 m^2", "373", 1, "0 W"), above, 28.395, 1e-3},
		{"Lienhard, example 1.6: shielded thermocouple; computed", glowing("293", "75", "1 m^2", "373", 0.4, "0 W"), above, 23.51614, 1e-3},
		{"Lienhard, example 2.8: resistor, 72.3 degC; computed with 273.15 K",
			glowing("308.15", "13", "1.33e-4 m^2", "308.15", 0.9, "0.1 W"), endOf("body"), 72.3, 0.05},
		{"Cengel, example 13-12: gas at 715 K (more digits computed) gives the thermocouple 650 K", glowing("715.0234", "80", "1 m^2", "400", 0.6, "0 W"), body, 650, 5e-5},
		{"Incropera and others, example 1.7: coating at 104 degC", glowing("293", "15", "1 m^2", "303", 0.5, "0.8 * 2000 W"), above, 104, 0.5},
		{"Incropera and others, example 1.7, more digits", glowing("293", "15", "1 m^2", "303", 0.5, "0.8 * 2000 W"), above, 104.2974, 6e-5},
		{"Incropera and others, example 1.7: 51.0 W/(m^2 K) hold 50 degC", glowing("293", "51.0127", "1 m^2", "303", 0.5, "0.8 * 2000 W"), above, 50, 5e-5},
		{"Borgnakke and Sonntag, Fundamentals of Thermodynamics, 6th ed., problem 4.102: brake drum, 25 W, 0.1 m^2, h 10 in 20 degC; computed",
			glowing("293", "10", "0.1 m^2", "293", 0, "25 W"), above, 45, 1e-9},
	})
}

// wall is a stack of plane layers and joints between two held temperatures, its nodes without mass: the ends
// are hot and cold, the faces between them a, b, c and so on.
func wall(hot, cold string, layers ...string) string {
	text, last := fmt.Sprintf(`{"workheat": 1, "nodes": {"hot": {"held": "%s"}, "cold": {"held": "%s"}`, hot, cold), "hot"
	links := ""
	for k, layer := range layers {
		next := string(rune('a' + k))
		if k == len(layers)-1 {
			next = "cold"
		} else {
			text += fmt.Sprintf(`, "%s": {"massless": true}`, next)
		}
		if k > 0 {
			links += ", "
		}
		links += fmt.Sprintf(`"layer %d": {%s, "between": ["%s", "%s"]}`, k+1, layer, last, next)
		last = next
	}
	return text + `}, "conductances": {` + links + `}, "duty": ` + rest(1) + `}`
}

func slab(area, length, k string) string {
	return fmt.Sprintf(`"kind": "conduction", "area": "%s", "length": "%s", "conductivity": "%s W/(m K)"`, area, length, k)
}

func skin(kind, area, h string) string {
	return fmt.Sprintf(`"kind": "%s", "area": "%s", "coefficient": "%s W/(m^2 K)"`, kind, area, h)
}

// joint is a joint of 1 m^2 given by the resistance of one unit of area.
func joint(resistance string) string {
	return fmt.Sprintf(`"kind": "contact", "area": "1 m^2", "coefficient": "1/(%s m^2 K/W)"`, resistance)
}

// Worked examples of steady conduction through layers and joints. Printed values as retyped and run in open companions
// to the books, with more digits computed from the books' formulas.
func TestLayersAndJoints(t *testing.T) {
	const bar = "pi/4 * (30 mm)^2"
	kreith := wall("405 degC", "395 degC", slab("1 m^2", "10 mm", "240"), joint("2.75e-4"), slab("1 m^2", "10 mm", "240"))
	holman := wall("100 degC", "0 degC", slab(bar, "100 mm", "16.3"), skin("contact", bar, "1893.93"), slab(bar, "100 mm", "16.3"))
	cengel := wall("70 degC", "20 degC", skin("contact", "0.0008 m^2", "42000"), slab("0.01 m^2", "10 mm", "386"), skin("convection", "0.01 m^2", "25"))
	single := wall("20 degC", "-10 degC", skin("convection", "1.2 m^2", "10"), slab("1.2 m^2", "8 mm", "0.78"), skin("convection", "1.2 m^2", "40"))
	double := wall("20 degC", "-10 degC", skin("convection", "1.2 m^2", "10"), slab("1.2 m^2", "4 mm", "0.78"),
		slab("1.2 m^2", "10 mm", "0.026"), slab("1.2 m^2", "4 mm", "0.78"), skin("convection", "1.2 m^2", "40"))
	clad := wall("400 degC", "100 degC", slab("1 m^2", "3 mm", "372"), slab("1 m^2", "2 mm", "17"), slab("1 m^2", "3 mm", "372"))
	chip := `{"workheat": 1, "nodes": {"chip": {"massless": true}, "face": {"massless": true}, "back": {"massless": true}, "air": {"held": "25 degC"}},
	"conductances": {
		"front film": {` + skin("convection", "1 m^2", "100") + `, "between": ["chip", "air"]},
		"joint": {` + joint("0.9e-4") + `, "between": ["chip", "face"]},
		"plate": {` + slab("1 m^2", "8 mm", "239") + `, "between": ["face", "back"]},
		"back film": {` + skin("convection", "1 m^2", "100") + `, "between": ["back", "air"]}},
	"sources": {"loss": {"kind": "given heat", "into": "chip", "power": "10 kW"}}, "duty": ` + rest(1) + `}`
	generating := `{"workheat": 1, "nodes": {"joint": {"massless": true}, "face": {"massless": true}, "water": {"held": "30 degC"}},
	"conductances": {"b": {` + slab("1 m^2", "20 mm", "150") + `, "between": ["joint", "face"]},
	                 "film": {` + skin("convection", "1 m^2", "1000") + `, "between": ["face", "water"]}},
	"sources": {"a": {"kind": "given heat", "into": "joint", "power": "1.5e6 W/m^3 * 50 mm * 1 m^2"}}, "duty": ` + rest(1) + `}`
	checkRows(t, []row{
		{"Lienhard, example 1.1: 28 kW", wall("110 degC", "50 degC", slab("0.4 m^2", "0.01 m", "35"), slab("0.4 m^2", "0.02 m", "35")), flowOf("layer 1"), 28e3, 0.5},
		{"Lienhard, example 1.2: clad steel; computed, the companion's run is wrong", clad, flowOf("layer 2"), 2242553, 1},
		{"Lienhard, example 1.2: hot face of the steel; computed", clad, endOf("a"), 381.9149, 1e-4},
		{"Kreith, Manglik and Bohn, 7th ed., example 1.6: 2.79e4 W/m^2", kreith, flowOf("layer 2"), 27906.98, 0.01},
		{"Kreith, Manglik and Bohn, example 1.6: contact drop 7.67 K", kreith, dropOf("a", "b"), 7.6744, 1e-4},
		{"Holman, example 2-11: 5.52 W", holman, flowOf("layer 1"), 5.52322, 1e-5},
		{"Holman, example 2-11: drop in the joint 4.13 K", holman, dropOf("a", "b"), 4.12568, 1e-5},
		{"Cengel, example 3-5: 12.4 W", cengel, flowOf("layer 3"), 12.39971, 1e-5},
		{"Cengel, example 3-5: jump 0.37 K", cengel, dropOf("hot", "a"), 0.369039, 1e-6},
		{"Cengel, example 3-2: window 266 W", single, flowOf("layer 1"), 266.161, 1e-3},
		{"Cengel, example 3-2: its inner face at -2.2 degC", single, endOf("a"), -2.180, 1e-3},
		{"Cengel, example 3-3: double window 69.2 W", double, flowOf("layer 1"), 69.248, 1e-3},
		{"Cengel, example 3-3: its inner face at 14.2 degC", double, endOf("a"), 14.229, 1e-3},
		{"Incropera and others, example 3.2: chip at 75.3 degC", chip, endOf("chip"), 75.3068, 1e-4},
		{"Incropera and others, example 3.7: 115 degC between the layers", generating, endOf("joint"), 115, 1e-9},
		{"Incropera and others, example 3.7: 105 degC at the wet face", generating, endOf("face"), 105, 1e-9},
	})
}

// Heat that a body loses at the temperature at which it starts, by what the program says of its paths.
func TestLossAtTheStart(t *testing.T) {
	cases := []struct {
		source, text string
		want, tol    float64
	}{
		{"Incropera and others, example 1.2: pipe 70 mm at 200 degC, emissivity 0.8, h 15 in 25 degC, 998 W/m",
			hot("200 degC", "25 degC", "pi * 70 mm * 1 m", "15", "0.8"), 998.4, 0.05},
		{"Kreith, Manglik and Bohn, example 1.10: pipe 0.5 m at 500 K, emissivity 0.9, h 20 in 300 K",
			hot("500 K", "300 K", "pi * 0.5 m * 1 m", "20", "0.9"), 10643.77, 1}, // the book's sigma is 5.67e-8
		{"race disc, schoolbook data, loss computed: ring 260/100 mm, 10 mm thick, at 500 degC, h 120 in 30 degC, 5741 W",
			hot("500 degC", "30 degC", "2 * pi * ((130 mm)^2 - (50 mm)^2) + 2 * pi * (130 mm + 50 mm) * 10 mm", "120", "0"), 5741, 0.5},
	}
	for _, c := range cases {
		t.Run(c.source, func(t *testing.T) {
			sum := 0.0
			for _, p := range load(t, c.text, nil).Describe().Paths {
				sum += p.Flow
			}
			near(t, "loss", sum, c.want, c.tol)
		})
	}
}

func hot(start, air, area, h, emissivity string) string {
	return lump(fmt.Sprintf(`{"heat capacity": "1 kJ/K", "start": "%s"}`, start), air,
		fmt.Sprintf(`"area": "%s", "coefficient": "%s W/(m^2 K)"},
		"glow": {"kind": "radiation", "between": ["body", "air"], "area": "%s", "emissivity": %s`, area, h, area, emissivity), "", rest(1))
}
