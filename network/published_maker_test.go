package network_test

import (
	"fmt"
	"math/rand/v2"
	"slices"
	"strings"

	"workheat/library"
	"workheat/network/element"
)

// A maker writes random netlists: trees and meshes of all forms of nodes and all kinds of the catalogue, with a
// random duty. The same seed gives the same text. The data are invented.
type maker struct {
	*rand.Rand
	nodes  []string
	form   []element.Form
	parts  map[string][]string // entries of each section
	heated bool                // heat and work come in
	speed  float64             // of the vehicle at this place of the duty, m/s
}

// writers says how to write an element of each kind between two nodes, or into one. A kind of the catalogue that is
// missing here fails the test.
var writers = map[string]func(m *maker) string{
	"conduction": func(m *maker) string {
		switch m.IntN(3) {
		case 0:
			return fmt.Sprintf(`"value": "%.4g W/K"`, m.between(1, 200))
		case 1:
			return fmt.Sprintf(`"area": "%.4g cm^2", "length": "%.4g mm", "conductivity": "%.4g W/(m K)"`, m.between(5, 300), m.between(3, 60), m.between(1, 150))
		}
		return fmt.Sprintf(`"area": "%.4g cm^2", "length": "%.4g mm", "material": "%s"`, m.between(5, 300), m.between(3, 60), m.pick("carbon steel", "aluminium", "grey iron"))
	},
	"contact": func(m *maker) string {
		return fmt.Sprintf(`"coefficient": "%.4g W/(m^2 K)", "area": "%.4g cm^2"`, m.between(200, 20000), m.between(5, 100))
	},
	"convection": func(m *maker) string {
		text := fmt.Sprintf(`"coefficient": "%.4g W/(m^2 K)", "area": "%.4g m^2"`, m.between(4, 40), m.between(0.01, 0.3))
		switch m.IntN(3) {
		case 0:
			text += fmt.Sprintf(`, "speed coefficient": "%.4g W/(m^2 K)", "speed exponent": %.3g, "speed of": "car"`, m.between(1, 9), m.between(0.5, 1))
		case 1:
			text += fmt.Sprintf(`, "speed coefficient": "%.4g W/(m^2 K)", "speed": {"table": [["0 s", "%.4g m/s"], ["%.4g s", "%.4g m/s"]]}`,
				m.between(1, 9), m.between(1, 20), m.between(10, 200), m.between(1, 20))
		}
		return text
	},
	"radiation": func(m *maker) string {
		return fmt.Sprintf(`"emissivity": %.3g, "area": "%.4g m^2", "view factor": %.3g`, m.between(0.1, 1), m.between(0.01, 0.3), m.between(0.2, 1))
	},
	"rotating-disc convection": func(m *maker) string {
		return fmt.Sprintf(`"diameter": "%.4g mm", "area": "%.4g m^2", "speed of": "car"`, m.between(200, 400), m.between(0.02, 0.2))
	},
	"vehicle-rotor convection": func(m *maker) string {
		return fmt.Sprintf(`"diameter": "%.4g mm", "area": "%.4g m^2", "speed of": "car", "still": "5 W/(m^2 K)"`, m.between(200, 400), m.between(0.02, 0.2))
	},
	"vent-passage convection": func(m *maker) string {
		return fmt.Sprintf(`"outer diameter": "%.4g mm", "inner diameter": "%.4g mm", "passage width": "%.4g mm", "passage height": "%.4g mm", "area": "%.4g m^2", "speed of": "car"`,
			m.between(260, 400), m.between(120, 200), m.between(6, 20), m.between(6, 15), m.between(0.02, 0.2))
	},
	"given heat": func(m *maker) string {
		power := fmt.Sprintf(`"%.4g W"`, m.between(-50, 400))
		if m.IntN(2) == 0 {
			a, b := m.between(5, 60), m.between(70, 200)
			power = fmt.Sprintf(`{"table": [["0 s", "0 W"], ["%.4g s", "%.4g W"], ["%.4g s", "%.4g W"], ["%.4g s", "0 W"]]}`, a, m.between(0, 900), a, m.between(0, 300), b)
		}
		return fmt.Sprintf(`"into": %s, "power": %s`, m.shares(), power)
	},
	"road vehicle": func(m *maker) string {
		return fmt.Sprintf(`"mass": "%.4g kg", "rotating mass factor": %.4g, "rolling resistance": %.3g, "drag area": "%.3g m^2", "wheel radius": "%.3g m"`,
			m.between(800, 2500), m.between(1, 1.2), m.between(0, 0.015), m.between(0, 1), m.between(0.25, 0.4))
	},
	"friction pad": func(m *maker) string {
		return fmt.Sprintf(`"slows": "car", "part of braking": %.3g, "heats": %s`, m.between(0.01, 0.2), m.shares())
	},
}

// conducting are the kinds that carry heat at any speed; a node without mass needs one.
var conducting = []string{"conduction", "contact", "convection", "radiation"}

func (m *maker) between(low, high float64) float64 { return low + (high-low)*m.Float64() }

func (m *maker) pick(list ...string) string { return list[m.IntN(len(list))] }

// kinds returns the kinds of a section of the catalogue.
func kinds(section element.Section) []string { return library.Catalogue().Names(section) }

func (m *maker) add(section element.Section, kind, rest string) {
	list := m.parts[string(section)]
	m.parts[string(section)] = append(list, fmt.Sprintf(`"%s %d": {"kind": "%s", %s}`, section, len(list)+1, kind, rest))
}

// node writes one more node, the first always with a heat capacity.
func (m *maker) node() {
	i := len(m.nodes)
	name, start := fmt.Sprintf("n%d", i), fmt.Sprintf(`"start": "%.4g degC"`, m.between(0, 300))
	text, form := fmt.Sprintf(`{"heat capacity": "%.4g J/K", %s}`, m.between(50, 4000), start), element.Stored
	switch k := m.IntN(10); {
	case i == 0:
	case k < 2 && (i > 1 || m.heated):
		text, form = `{"massless": true}`, element.Massless
	case k < 3 || i == 1 && !m.heated: // without heat from outside, a network without a border is refused
		text, form = fmt.Sprintf(`{"held": "%.4g degC"}`, m.between(-20, 60)), element.Held
	case k < 4:
		text, form = fmt.Sprintf(`{"held": {"table": [["0 s", "%.4g degC"], ["%.4g s", "%.4g degC"]]}}`, m.between(0, 40), m.between(20, 300), m.between(0, 200)), element.Held
	case k < 6:
		text = fmt.Sprintf(`{"heat capacity": {"table": [["20 degC", "%.4g J/K"], ["200 degC", "%.4g J/K"], ["200 degC", "%.4g J/K"], ["500 degC", "%.4g J/K"]]}, %s}`,
			m.between(50, 4000), m.between(50, 4000), m.between(50, 4000), m.between(50, 4000), start)
	case k < 9:
		material := m.pick(library.Catalogue().MaterialNames()...)
		text = fmt.Sprintf(`{"mass": "%.4g kg", "material": "%s", %s}`, m.between(0.1, 8), material, start)
	}
	m.nodes, m.form = append(m.nodes, name), append(m.form, form)
	m.parts["nodes"] = append(m.parts["nodes"], fmt.Sprintf(`"%s": %s`, name, text))
}

// link joins two nodes by a random kind; sure asks for one that carries heat at any speed.
func (m *maker) link(a, b int, sure bool) {
	if a == b || m.form[a] == element.Held && m.form[b] == element.Held {
		return
	}
	kind := m.pick(kinds(element.Conductances)...)
	if sure || m.form[a] == element.Massless || m.form[b] == element.Massless {
		kind = m.pick(conducting...)
	}
	m.add(element.Conductances, kind, fmt.Sprintf(`"between": ["%s", "%s"], %s`, m.nodes[a], m.nodes[b], writers[kind](m)))
}

// shares are one to three different nodes with a heat capacity.
func (m *maker) shares() string {
	var open []string
	for i, f := range m.form {
		if f == element.Stored {
			open = append(open, m.nodes[i])
		}
	}
	m.Shuffle(len(open), func(i, j int) { open[i], open[j] = open[j], open[i] })
	switch n := min(len(open), 1+m.IntN(3)); n {
	case 2:
		return fmt.Sprintf(`{"%s": 0.7, "%s": 0.3}`, open[0], open[1])
	case 3:
		return fmt.Sprintf(`{"%s": 0.5, "%s": 0.375, "%s": 0.125}`, open[0], open[1], open[2])
	}
	return `"` + open[0] + `"`
}

// netlist writes a whole netlist of n nodes.
func (m *maker) netlist(n int) string {
	m.parts = map[string][]string{}
	for range n {
		m.node()
	}
	for i := 1; i < n; i++ { // a tree, its held nodes never next to each other
		j := m.IntN(i)
		if m.form[j] == element.Held {
			j = 0
		}
		m.link(i, j, true)
	}
	for range m.IntN(n + 1) {
		m.link(m.IntN(n), m.IntN(n), false)
	}
	m.add(element.Bodies, "road vehicle", writers["road vehicle"](m))
	m.parts["bodies"][0] = replaceName(m.parts["bodies"][0], "car")
	if m.heated {
		for range 1 + m.IntN(3) {
			m.add(element.Sources, "given heat", writers["given heat"](m))
			m.add(element.Dissipators, "friction pad", writers["friction pad"](m))
		}
	}
	text := `{"workheat": 1`
	for _, section := range []string{"nodes", "conductances", "sources", "bodies", "dissipators"} {
		if list := m.parts[section]; len(list) > 0 {
			text += fmt.Sprintf(",\n%q: {\n%s}", section, strings.Join(list, ",\n"))
		}
	}
	return text + ",\n\"duty\": [\n" + strings.Join(m.duty(), ",\n") + "]}\n"
}

func replaceName(entry, name string) string {
	return `"` + name + entry[strings.Index(entry, `":`):]
}

// duty writes three to six phases, and in a repeat some more.
func (m *maker) duty() []string {
	var list []string
	m.speed = 0
	for range 3 + m.IntN(4) {
		if m.speed == 0 && m.IntN(4) == 0 {
			list = append(list, fmt.Sprintf(`{"repeat": %d, "every": "%.4g s", "phases": [%s, %s, %s]}`, 2+m.IntN(3), m.between(20, 60), m.phase(), m.phase(), m.brakeTo(0)))
			continue
		}
		list = append(list, m.phase())
	}
	return list
}

// phase writes one phase that fits the present speed.
func (m *maker) phase() string {
	wait := ""
	if m.IntN(3) == 0 {
		node := m.nodes[m.IntN(len(m.nodes))]
		for strings.Contains(m.parts["nodes"][slices.Index(m.nodes, node)], `"held": "`) { // never moves: refused
			node = m.nodes[m.IntN(len(m.nodes))]
		}
		wait = fmt.Sprintf(`"until": {"node": "%s", "%s": "%.4g degC"}, "at most": "%.4g s"`, node, m.pick("rises to", "falls to"), m.between(10, 300), m.between(5, 60))
	} else {
		wait = fmt.Sprintf(`"for": "%.4g s"`, m.between(5, 60))
	}
	if m.speed == 0 {
		switch m.IntN(3) {
		case 0:
			return `{"rest": {` + wait + `}}`
		case 1:
			return fmt.Sprintf(`{"follow": {"table": [["0 s", "0 km/h"], ["%.4g s", "%.4g km/h"], ["%.4g s", "0 km/h"]]}}`, m.between(5, 20), m.between(20, 130), m.between(25, 60))
		}
		m.speed = m.between(30, 140)
		return fmt.Sprintf(`{"speed up": {"to": "%.17g km/h", "in": "%.4g s"}}`, m.speed, m.between(4, 15))
	}
	if m.IntN(2) == 0 {
		return fmt.Sprintf(`{"hold": {"grade": %.3g, %s}}`, m.between(-0.12, 0.05), wait)
	}
	return m.brakeTo(m.speed * m.Float64())
}

// brakeTo writes a braking, or a rest at standstill.
func (m *maker) brakeTo(to float64) string {
	if m.speed == 0 {
		return `{"rest": {"for": "3 s"}}`
	}
	m.speed = to
	how := fmt.Sprintf(`"deceleration": "%.3g m/s^2"`, m.between(0.5, 7))
	if m.IntN(3) == 0 {
		how = fmt.Sprintf(`"torque": "%.4g N m"`, m.between(300, 4000))
	}
	return fmt.Sprintf(`{"brake": {"to": "%.17g km/h", %s}}`, to, how)
}
