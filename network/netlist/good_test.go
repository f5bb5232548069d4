package netlist_test

import (
	"math"
	"testing"

	"workheat/network/duty"
	"workheat/network/element"
	"workheat/network/netlist"
)

// Good netlists read without a problem or a warning.
func TestGood(t *testing.T) {
	for _, name := range names(t, "testdata/good") {
		if _, problems := read(t, "testdata/good", name); len(problems) > 0 {
			t.Errorf("%v", problems)
		}
	}
}

// near compares with a tolerance of a few roundings.
func near(t *testing.T, what string, got, want float64) {
	t.Helper()
	if math.Abs(got-want) > 1e-12*math.Max(1, math.Abs(want)) {
		t.Errorf("%s: got %.17g, want %.17g", what, got, want)
	}
}

// elementNamed finds an element.
func elementNamed(t *testing.T, n *netlist.Netlist, name string) *element.Declaration {
	t.Helper()
	for _, g := range n.Groups {
		for _, d := range g.Elements {
			if d.Name == name {
				return d
			}
		}
	}
	t.Fatalf("no element %q", name)
	return nil
}

// Every form comes to the SI value that its text says, computed here by hand.
func TestEveryForm(t *testing.T) {
	n, _ := read(t, "testdata/good", "every-form.json")
	if want := "Every form, µ and \"quotes\" and \\ included"; n.Title != want {
		t.Errorf("title %q, want %q", n.Title, want)
	}
	order := []string{"disc", "hub", "Beläge", "fluid", "skin", "air", "road", "coolant"}
	node := map[string]int{}
	for k, i := range n.Order {
		if n.Nodes[i].Name != order[k] {
			t.Fatalf("node %d is %q, want %q", k, n.Nodes[i].Name, order[k])
		}
		node[order[k]] = i
	}
	checkNodes(t, n, node)
	checkSignals(t, n, node)
	checkElements(t, n, node)
	checkDuty(t, n, node)
	near(t, "relative", n.Rel, 1e-7)
	near(t, "absolute", n.Abs, 1e-3)
	near(t, "every", n.Every, 0.5)
}

func checkNodes(t *testing.T, n *netlist.Netlist, node map[string]int) {
	disc, skin := n.Nodes[node["disc"]], n.Nodes[node["skin"]]
	steel := n.Material[node["disc"]]
	if steel == nil || steel.Name != "carbon steel" {
		t.Fatalf("the disc is of %v", steel)
	}
	near(t, "capacity of the disc", disc.Capacity.At(400), 6.2*steel.Capacity.At(400))
	near(t, "start of the disc", disc.Start, 298.15)
	near(t, "start of the pads", n.Nodes[node["Beläge"]].Start, 293.15)
	near(t, "capacity of the pads", n.Nodes[node["Beläge"]].Capacity.At(373.15), 530)
	near(t, "capacity of the fluid", n.Nodes[node["fluid"]].Capacity.At(323.15), 1000)
	near(t, "capacity of the hub", n.Nodes[node["hub"]].Capacity.At(300), 2000)
	if skin.Form != element.Massless || skin.Capacity != nil {
		t.Errorf("the skin is %+v", skin)
	}
	limits := n.Limits[node["disc"]]
	if len(limits) != 2 || limits[0].Name != "fade" || limits[1].Temperature != 900 {
		t.Errorf("limits of the disc %v", limits)
	}
	near(t, "fade", limits[0].Temperature, 723.15)
}

func checkSignals(t *testing.T, n *netlist.Netlist, node map[string]int) {
	held := func(name string) *element.Curve { return n.Tables[n.Nodes[node[name]].Signal-duty.FirstTable] }
	near(t, "air after 1 h", held("air").At(3600), 300.65)
	near(t, "air after 2 h", held("air").At(7200), 303.15) // the right side of the jump
	near(t, "air after 4 h", held("air").At(14400), 303.15)
	near(t, "road", held("road").At(0), 308.15)
	near(t, "coolant", held("coolant").At(300), 358.15)
	windy := elementNamed(t, n, "windy")
	near(t, "wind", n.Tables[windy.Signal("speed")-duty.FirstTable].At(300), 5)
	near(t, "wind after the gust", n.Tables[windy.Signal("speed")-duty.FirstTable].At(600), 5)
	near(t, "lamp", n.Tables[elementNamed(t, n, "lamp").Signal("power")-duty.FirstTable].At(9), 40)
	near(t, "heaters", n.Tables[elementNamed(t, n, "heaters").Signal("power")-duty.FirstTable].At(15), 500)
}

func checkElements(t *testing.T, n *netlist.Netlist, node map[string]int) {
	face := math.Pi * (0.14*0.14 - 0.08*0.08)
	for _, c := range []struct {
		element, key string
		want         float64
	}{
		{"to hub", "value", 60}, {"to hub", "factor", 1.2}, {"by size", "area", 0.002}, {"by size", "length", 0.012},
		{"by size", "factor", 1}, {"by material", "length", 0.0127}, {"joint", "coefficient", 1200}, {"joint", "area", 0.004},
		{"windy", "area", face}, {"windy", "speed exponent", 0.75}, {"driven", "area", 2 * face}, {"driven", "speed exponent", 0.8},
		{"glow", "view factor", 0.5}, {"front", "part of braking", 0.7}, {"rear", "part of braking", 0.3},
	} {
		near(t, c.element+", "+c.key, elementNamed(t, n, c.element).Number(c.key), c.want)
	}
	if a, b := elementNamed(t, n, "by size").Between("between"); a != node["disc"] || b != node["Beläge"] {
		t.Errorf("by size links %d and %d", a, b)
	}
	shares := elementNamed(t, n, "heaters").Values["into"]
	if len(shares.Nodes) != 2 || shares.Nodes[1] != node["fluid"] || shares.Shares[0]+shares.Shares[1] != 1 {
		t.Errorf("the heaters heat %+v", shares)
	}
	if v := elementNamed(t, n, "rear").Values["heats"]; len(v.Nodes) != 1 || v.Nodes[0] != node["hub"] || v.Shares[0] != 1 {
		t.Errorf("rear heats %+v", v)
	}
	v := n.Duty.Vehicle
	for _, c := range [][2]float64{{v.Mass, 1250}, {v.Rotating, 1.08}, {v.Rolling, 0.011}, {v.DragArea, 0.66}, {v.Air, 1.2}, {v.Grade, 0.01}, {v.Wheel, 0.3048}} {
		near(t, "vehicle", c[0], c[1])
	}
}

func checkDuty(t *testing.T, n *netlist.Netlist, node map[string]int) {
	p := n.Duty.Phases
	if len(p) != 5 || p[0].Verb != duty.Repeat || p[0].Count != 3 || p[0].Every != 60 || len(p[0].Phases) != 5 {
		t.Fatalf("duty %+v", p)
	}
	in := p[0].Phases
	for _, c := range []struct {
		what      string
		got, want float64
	}{
		{"from", in[0].From, 100 / 3.6}, {"deceleration", in[0].Deceleration, 0.4 * 9.80665}, {"torque", in[1].Torque, 2000},
		{"to", in[1].To, 0}, {"angle", in[1].Grade, math.Tan(-2 * math.Pi / 180)}, {"at most", in[2].AtMost, 20},
		{"until", in[2].Until.Temperature, 373.15}, {"acceleration", in[3].Acceleration, 1.5}, {"in", in[4].In, 10},
		{"grade", in[4].Grade, 0.02}, {"over", p[1].Over, 2000}, {"downhill", p[1].Grade, -0.06},
		{"trace", p[2].Trace.At(35), 68 / 3.6}, {"file", p[3].Trace.At(10), 5}, {"for", p[4].For, 1800},
	} {
		near(t, c.what, c.got, c.want)
	}
	if u := in[2].Until; !u.Falls || u.Node != node["disc"] {
		t.Errorf("until %+v", u)
	}
	if u := p[4].Until; u.Falls || u.Node != node["Beläge"] || duty.Given(p[4].AtMost) {
		t.Errorf("until %+v", u)
	}
	if in[2].Label != "1.3 hold" {
		t.Errorf("label %q", in[2].Label)
	}
}
