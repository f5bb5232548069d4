package library_test

import (
	"testing"

	"workheat/library"
	"workheat/network/element"
	"workheat/network/unit"
)

// The network of these tests: so many nodes, and these signals.
const (
	nodes   = 4
	speed   = 0 // of the vehicle
	brakes  = 1
	heating = 2 // a power
	wind    = 3 // a speed
	signals = 4
)

// A sample is one element as an author would write it. Nodes are written as numbers; a material or body by
// its name; a signal is that of its sort.
type sample struct {
	section element.Section
	kind    string
	fields  map[string]string
	nodes   []int
	shares  []float64
}

// samples has at least one element of every kind but bodies. The data are invented.
var samples = []sample{
	{element.Conductances, "conduction", map[string]string{"value": "310 W/K"}, []int{0, 1}, nil},
	{element.Conductances, "conduction", map[string]string{"area": "200 cm^2", "length": "12 mm", "conductivity": "46 W/(m K)", "factor": "1.1"}, []int{2, 1}, nil},
	{element.Conductances, "conduction", map[string]string{"area": "200 cm^2", "length": "12 mm", "material": "carbon steel"}, []int{1, 0}, nil},
	{element.Conductances, "conduction", map[string]string{"area": "2 cm^2", "length": "1 m", "material": "grey iron", "factor": "0.7"}, []int{3, 2}, nil},
	{element.Conductances, "contact", map[string]string{"coefficient": "3000 W/(m^2 K)", "area": "0.004 m^2"}, []int{0, 3}, nil},
	{element.Conductances, "convection", map[string]string{"coefficient": "8 W/(m^2 K)", "area": "0.11 m^2"}, []int{0, 3}, nil},
	{element.Conductances, "convection", map[string]string{"coefficient": "8 W/(m^2 K)", "area": "0.11 m^2", "speed coefficient": "5 W/(m^2 K)", "speed of": "van"}, []int{1, 3}, nil},
	{element.Conductances, "convection", map[string]string{"coefficient": "8 W/(m^2 K)", "area": "0.3 m^2", "speed coefficient": "9 W/(m^2 K)", "speed of": "van", "factor": "1.3"}, []int{2, 3}, nil},
	{element.Conductances, "convection", map[string]string{"coefficient": "0 W/(m^2 K)", "area": "0.2 m^2", "speed coefficient": "5 W/(m^2 K)", "speed exponent": "0.5", "speed": "wind"}, []int{0, 3}, nil},
	{element.Conductances, "convection", map[string]string{"coefficient": "1 W/(m^2 K)", "area": "0.2 m^2", "speed coefficient": "0.5 W/(m^2 K)", "speed exponent": "1.6", "speed": "wind"}, []int{0, 2}, nil},
	{element.Conductances, "rotating-disc convection", map[string]string{"diameter": "280 mm", "area": "0.1 m^2", "speed of": "van", "still": "6 W/(m^2 K)"}, []int{0, 3}, nil},
	{element.Conductances, "rotating-disc convection", map[string]string{"diameter": "330 mm", "area": "0.12 m^2", "speed of": "van", "wheel radius": "0.25 m"}, []int{1, 2}, nil},
	{element.Conductances, "vehicle-rotor convection", map[string]string{"diameter": "280 mm", "area": "0.1 m^2", "speed of": "van", "factor": "0.8"}, []int{0, 3}, nil},
	{element.Conductances, "vent-passage convection", map[string]string{"outer diameter": "280 mm", "inner diameter": "160 mm", "passage width": "11 mm", "passage height": "8 mm", "area": "0.09 m^2", "speed of": "van", "still": "5 W/(m^2 K)"}, []int{1, 3}, nil},
	{element.Conductances, "vent-passage convection", map[string]string{"outer diameter": "300 mm", "inner diameter": "170 mm", "passage width": "9 mm", "outlet width": "17 mm", "passage height": "12 mm", "passage length": "70 mm", "area": "0.1 m^2", "speed of": "van", "wheel radius": "300 mm"}, []int{2, 3}, nil},
	{element.Conductances, "radiation", map[string]string{"emissivity": "0.55", "area": "0.1 m^2"}, []int{0, 3}, nil},
	{element.Conductances, "radiation", map[string]string{"emissivity": "80 %", "area": "120 cm^2", "view factor": "0.4", "factor": "2"}, []int{1, 0}, nil},
	{element.Sources, "given heat", map[string]string{"power": "heating"}, []int{2}, []float64{1}},
	{element.Sources, "given heat", map[string]string{"power": "heating", "factor": "1.4"}, []int{0, 3}, []float64{0.25, 0.75}},
	{element.Dissipators, "friction pad", map[string]string{"slows": "van", "part of braking": "0.34"}, []int{0, 1}, []float64{0.94, 0.06}},
	{element.Dissipators, "friction pad", map[string]string{"slows": "van", "part of braking": "12 %"}, []int{2}, []float64{1}},
}

// van is the vehicle of the samples.
var van = element.Vehicle{Mass: 2100, Rotating: 1.05, Wheel: 0.31}

// faults collects what a check reports.
type faults []struct{ key, text, help string }

// declare makes a sample's declaration as the reader of netlists would.
func declare(t testing.TB, c *element.Catalogue, s sample) (*element.Kind, *element.Declaration, *faults) {
	t.Helper()
	k, found := c.Find(s.section, s.kind), new(faults)
	if k == nil {
		t.Fatalf("no kind %q in %s", s.kind, s.section)
	}
	d := &element.Declaration{
		Name: s.kind, Values: map[string]element.Value{},
		Brake:   func(int) int { return brakes },
		Vehicle: func(int) element.Vehicle { return van },
		Report: func(key, text, help string) {
			*found = append(*found, struct{ key, text, help string }{key, text, help})
		},
	}
	known := map[string]bool{}
	for _, f := range k.Fields {
		known[f.Key] = true
		text, written := s.fields[f.Key]
		if !written {
			text = f.Default
		}
		if v, ok := read(t, c, f, text, s); ok {
			d.Values[f.Key] = v
		} else if f.Required {
			t.Errorf("sample of %s: %q is missing", s.kind, f.Key)
		}
	}
	for key := range s.fields {
		if !known[key] {
			t.Fatalf("sample of %s: unknown key %q", s.kind, key)
		}
	}
	if k.Check != nil {
		k.Check(d)
	}
	return k, d, found
}

// read reads one field; ok is false if it was left out.
func read(t testing.TB, c *element.Catalogue, f element.Field, text string, s sample) (v element.Value, ok bool) {
	switch f.Type {
	case element.NodePair, element.Shares:
		return element.Value{Nodes: s.nodes, Shares: s.shares}, true
	}
	if text == "" {
		return v, false
	}
	switch f.Type {
	case element.Quantity, element.Number:
		x, fault := f.Want.Read(text, nil)
		if fault != nil {
			t.Fatalf("%s of %s: %v", f.Key, s.kind, fault)
		}
		if f.Bounded && (x < f.Min || x > f.Max || f.Open && x == f.Min) {
			t.Fatalf("%s of %s: %s is outside its range", f.Key, s.kind, text)
		}
		v.Number = x
	case element.BodyName:
		v.Signal = speed
	case element.MaterialOf:
		if v.Material = c.Material(text); v.Material == nil {
			t.Fatalf("no material %q", text)
		}
	case element.Signal:
		at, known := map[string]int{"heating": heating, "wind": wind}[text]
		if want := map[int]string{heating: unit.Power.Name, wind: unit.Speed.Name}[at]; !known || f.Want.Name != want {
			t.Fatalf("%s of %s: no signal %q", f.Key, s.kind, text)
		}
		v.Signal = at
	}
	return v, true
}

// A loaded batch holds all samples of one kind.
type loaded struct {
	*element.Kind
	element.Batch
	paths []element.Path
	deps  int // of each path
}

// load makes the batch of a kind from its samples.
func load(t testing.TB, c *element.Catalogue, k *element.Kind) loaded {
	t.Helper()
	l := loaded{Kind: k, Batch: k.Batch()}
	for _, s := range samples {
		if s.section != k.Section || s.kind != k.Name {
			continue
		}
		_, d, found := declare(t, c, s)
		for _, f := range *found {
			t.Errorf("sample of %s: %s: %s", s.kind, f.key, f.text)
		}
		l.paths = append(l.paths, l.Batch.Add(d)...)
	}
	if len(l.paths) == 0 {
		t.Fatalf("the kind %q has no sample", k.Name)
	}
	l.deps = len(l.paths[0].Deps)
	return l
}

// eachBatch runs a test on the samples of every kind that has a batch.
func eachBatch(t *testing.T, test func(t *testing.T, l loaded)) {
	c := library.Catalogue()
	for _, k := range c.Kinds {
		if k.Batch != nil {
			t.Run(k.Name, func(t *testing.T) { test(t, load(t, c, k)) })
		}
	}
}
