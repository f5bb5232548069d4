package network

import (
	"context"
	"math"
	"testing"

	"workheat/network/element"
	"workheat/network/record"
)

// The balances of all nodes hold in the samples: what the flows bring to a node over the run, by Simpson's rule
// on a fine series, is what its temperature says it has gained; and the samples are those of the record.
func TestSeriesOfFlows(t *testing.T) {
	m := load(t, corner)
	res := m.Run(context.Background(), Options{Rel: 1e-8, Audit: true})
	// From the last break to the end everything is smooth: the rest of 20 s.
	const pairs = 400
	from := res.Segments[len(res.Segments)-1].Start
	if res.Book == nil || !res.Book.Closed {
		t.Fatal("the run does not close")
	}
	interval := (res.End - from) / (2 * pairs)
	s := res.Series(interval)
	if last := s.Time[len(s.Time)-1]; last != res.End {
		t.Errorf("the series ends at %g s, the run at %g s", last, res.End)
	}
	first := 0
	for s.Time[first] < from {
		first++
	}
	column := func(name string, g record.Group) []float64 {
		for _, c := range s.Columns {
			if c.Name == name && c.Group == g {
				return c.Values
			}
		}
		t.Fatalf("no column %q", name)
		return nil
	}
	h := s.Time[first+1] - s.Time[first]
	area := func(values []float64) float64 {
		sum := 0.0
		for i := first; i+2 < len(values)-1; i += 2 {
			sum += h / 3 * (values[i] + 4*values[i+1] + values[i+2])
		}
		return sum
	}
	end := first + 2*((len(s.Time)-2-first)/2)
	gain := func(name string) float64 {
		i := node(m, name)
		temps := column(name, record.Temperatures)
		return m.system.Energy(i, temps[end]) - m.system.Energy(i, temps[first])
	}
	brought := area(column("face to disc", record.Flows)) - area(column("neck", record.Flows)) -
		area(column("draught", record.Flows)) - area(column("glow", record.Flows))
	if got := gain("disc"); !(math.Abs(got-brought) <= 1e-5*math.Abs(got)) {
		t.Errorf("disc: gained %.9g J, the flows brought %.9g J", got, brought)
	}
	warmth := 0.3*area(column("bearing to hub", record.Flows))/0.7 + area(column("backing", record.Flows)) - area(column("fluid air", record.Flows))
	if got := gain("fluid"); !(math.Abs(got-warmth) <= 1e-5*math.Abs(got)) {
		t.Errorf("fluid: gained %.9g J, the flows brought %.9g J", got, warmth)
	}
	for _, name := range []string{"front left, work", "front left"} {
		for _, c := range s.Columns {
			if c.Name == name {
				t.Errorf("the meter %q is among the flows", name)
			}
		}
	}
}

// Vehicle columns follow the duty: 110 to 30 km/h at 4 m/s^2, and the power is the force by the speed.
func TestSeriesOfVehicle(t *testing.T) {
	s := load(t, corner).Run(context.Background(), Options{}).Series(1)
	var speed, power []float64
	for _, c := range s.Columns {
		switch c.Name {
		case "speed of van":
			speed = c.Values
		case "braking power of van":
			power = c.Values
		}
	}
	for i := range 5 {
		v := 110/3.6 - 4*s.Time[i]
		force := 2400*(1.06*4-0.011*9.80665) - 0.5*1.204*1.3*v*v
		if math.Abs(speed[i]-v) > 1e-9 || math.Abs(power[i]-force*v) > 1e-6*force*v {
			t.Errorf("at %g s: %g m/s and %g W, want %g and %g", s.Time[i], speed[i], power[i], v, force*v)
		}
	}
}

// The description is that of the start of the duty: a massless node stands at its balance, flows at the first
// braking power, conductances as slopes.
func TestDescription(t *testing.T) {
	d := load(t, corner).Describe()
	flows := map[string]PathInfo{}
	for _, p := range d.Paths {
		flows[p.Name] = p
	}
	v := 110 / 3.6
	rubbing := 0.33 * (2400*(1.06*4-0.011*9.80665) - 0.5*1.204*1.3*v*v) * v
	near := func(what string, got, want, tol float64) {
		t.Helper()
		if !(math.Abs(got-want) <= tol) {
			t.Errorf("%s: got %.12g, want %.12g", what, got, want)
		}
	}
	near("rubbing to face", flows["front left to face"].Flow, 0.9*rubbing, 1e-6*rubbing)
	near("balance of the face", flows["face to disc"].Flow+flows["face to pad"].Flow, 0.9*rubbing, 1e-6*rubbing)
	for _, n := range d.Nodes {
		if n.Name == "face" {
			near("face", n.Start, 293.15+0.9*rubbing/(400+3.6), 1e-6)
		}
		if n.Form == element.Stored && !(n.Capacity > 0) {
			t.Errorf("%s has no capacity", n.Name)
		}
	}
	near("conductance", flows["face to disc"].Conductance, 400, 1e-9)
	near("radiation as conductance", flows["glow"].Conductance, 4*0.7*0.1*5.670374419e-8*math.Pow(293.15, 3), 1e-9)
	if d.States != 5 || !d.HasModes || !(d.Fastest > 0 && d.Fastest <= d.Slowest) {
		t.Errorf("%d states, modes %t from %g to %g s", d.States, d.HasModes, d.Fastest, d.Slowest)
	}
}
