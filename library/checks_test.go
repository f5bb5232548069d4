package library_test

import (
	"maps"
	"math"
	"strings"
	"testing"

	"workheat/library"
	"workheat/library/correlation"
	"workheat/network/element"
)

// Each case is a sample with keys changed (an empty text leaves the key out) and what its check must say.
func TestChecksReportFaults(t *testing.T) {
	disc := map[string]string{"diameter": "280 mm", "area": "0.1 m^2", "speed of": "van"}
	vent := map[string]string{"outer diameter": "280 mm", "inner diameter": "160 mm", "passage width": "11 mm", "passage height": "8 mm", "area": "0.09 m^2", "speed of": "van"}
	bar := map[string]string{"area": "2 cm^2", "length": "10 mm", "conductivity": "40 W/(m K)"}
	air := map[string]string{"coefficient": "8 W/(m^2 K)", "area": "0.1 m^2"}
	cases := []struct {
		kind    string
		good    map[string]string
		change  map[string]string
		noWheel bool
		key     string
		text    string
	}{
		{"conduction", bar, map[string]string{"value": "3 W/K", "length": "", "conductivity": ""}, false, "area", "both set the conductance"},
		{"conduction", bar, map[string]string{"area": ""}, false, "", `neither "value" nor "area"`},
		{"conduction", bar, map[string]string{"length": ""}, false, "", `neither "value" nor "length"`},
		{"conduction", bar, map[string]string{"conductivity": ""}, false, "", "conductivity is not given"},
		{"conduction", bar, map[string]string{"material": "grey iron"}, false, "conductivity", "both set the conductivity"},
		{"convection", air, map[string]string{"speed coefficient": "5 W/(m^2 K)"}, false, "speed coefficient", "no speed is given"},
		{"convection", air, map[string]string{"speed of": "van"}, false, "speed of", "no effect"},
		{"convection", air, map[string]string{"speed": "wind"}, false, "speed", "no effect"},
		{"convection", air, map[string]string{"speed coefficient": "5 W/(m^2 K)", "speed": "wind", "speed of": "van"}, false, "speed", "both set the speed"},
		{"rotating-disc convection", disc, nil, true, "", "wheel radius"},
		{"vent-passage convection", vent, nil, true, "", "wheel radius"},
		{"vent-passage convection", vent, map[string]string{"inner diameter": "0.28 m"}, false, "inner diameter", "not below the outer diameter"},
	}
	c := library.Catalogue()
	for _, k := range cases {
		s := sample{element.Conductances, k.kind, maps.Clone(k.good), []int{0, 1}, nil}
		if _, _, found := declare(t, c, s); len(*found) != 0 {
			t.Errorf("%s %v: %v, want no fault", k.kind, s.fields, *found)
		}
		for key, text := range k.change {
			if s.fields[key] = text; text == "" {
				delete(s.fields, key)
			}
		}
		kind, d, found := declare(t, c, s)
		if k.noWheel {
			d.Vehicle = func(int) element.Vehicle { return element.Vehicle{Mass: 1000, Rotating: 1} }
			kind.Check(d)
		}
		if len(*found) != 1 || (*found)[0].key != k.key || !strings.Contains((*found)[0].text, k.text) || (*found)[0].help == "" {
			t.Errorf("%s %v: %v, want one fault at %q with %q and a cure", k.kind, s.fields, *found, k.key, k.text)
		}
	}
}

// A material without a conductivity cannot conduct.
func TestConductionNeedsAConductivity(t *testing.T) {
	c := library.Catalogue()
	m := &element.Material{Name: "mist", Capacity: element.Constant(1000)}
	c.Materials = append(c.Materials, m)
	_, _, found := declare(t, c, sample{element.Conductances, "conduction",
		map[string]string{"area": "1 m^2", "length": "1 m", "material": "mist"}, []int{0, 1}, nil})
	if len(*found) != 1 || (*found)[0].key != "material" {
		t.Errorf("got %v, want one fault at \"material\"", *found)
	}
}

// The texts that warn of a law outside its range name the bounds at which they begin.
func TestRangesBeginWhereTheySay(t *testing.T) {
	viscosity := func(celsius float64) float64 {
		_, nu, _ := correlation.Air{}.Plain(celsius + 273.15)
		return nu
	}
	disc := map[string]string{"diameter": "400 mm", "area": "0.1 m^2", "speed of": "van", "wheel radius": "0.3 m"}
	vent := map[string]string{"outer diameter": "400 mm", "inner diameter": "240 mm", "passage width": "20 mm", "passage height": "30 mm", "area": "0.1 m^2", "speed of": "van", "wheel radius": "0.3 m"}
	cases := []struct {
		kind   string
		fields map[string]string
		most   float64 // Re, as the text says
		text   string
		perRe  float64 // speed of the vehicle at Re 1 and a viscosity of 1
	}{
		{"rotating-disc convection", disc, 1e7, "1e7", 0.3 / (0.2 * 0.2)},
		{"vehicle-rotor convection", map[string]string{"diameter": "400 mm", "area": "0.1 m^2", "speed of": "van"}, 3e6, "3e6", 1 / 0.4},
		{"vent-passage convection", vent, 1.2e5, "1.2e5", 0.3 / math.Sqrt(0.2*0.2-0.12*0.12) / 0.024},
	}
	c := library.Catalogue()
	for _, k := range cases {
		kind, d, _ := declare(t, c, sample{element.Conductances, k.kind, k.fields, []int{0, 1}, nil})
		b := kind.Batch()
		b.Add(d)
		said := func(celsius, v float64) (texts []string) {
			s := &element.State{T: []float64{celsius + 283.15, celsius + 263.15, 0, 0}, Signal: make([]float64, signals), Rate: make([]float64, signals)}
			s.Signal[speed] = v
			b.(element.Ranger).Range(s, func(path int, text string) { texts = append(texts, text) })
			return texts
		}
		edge := k.most * viscosity(20) * k.perRe
		for _, at := range []struct {
			celsius, v float64
			want       string
		}{
			{20, 0, ""}, {20, 20, ""}, {-72.5, 0, ""}, {-73.5, 0, "-73 to"}, {726, 0, ""}, {728, 0, "to 727 degC"},
			{20, 0.999 * edge, ""}, {20, 1.001 * edge, "above " + k.text},
		} {
			got := said(at.celsius, at.v)
			if at.want == "" && len(got) != 0 || at.want != "" && (len(got) != 1 || !strings.Contains(got[0], at.want)) {
				t.Errorf("%s at film %g degC, %g m/s: said %q, want %q", k.kind, at.celsius, at.v, got, at.want)
			}
		}
	}
}

// A path through a material warns when an end leaves what the source of the material covers.
func TestConductionWarnsOutsideItsMaterial(t *testing.T) {
	c := library.Catalogue()
	kind, d, _ := declare(t, c, sample{element.Conductances, "conduction",
		map[string]string{"area": "1 m^2", "length": "1 m", "material": "carbon steel"}, []int{0, 1}, nil})
	m := c.Material("carbon steel")
	b := kind.Batch()
	b.Add(d)
	for _, at := range []struct {
		cold, hot float64
		want      int
	}{
		{m.Low + 1, m.High - 1, 0}, {m.Low - 1, m.High - 1, 1}, {m.Low + 1, m.High + 1, 1}, {m.High + 1, m.Low + 1, 1},
	} {
		n := 0
		b.(element.Ranger).Range(&element.State{T: []float64{at.cold, at.hot}}, func(path int, text string) {
			n++
			if !strings.Contains(text, "carbon steel") || !strings.Contains(text, "20 degC to 1200 degC") {
				t.Errorf("the text is %q", text)
			}
		})
		if n != at.want {
			t.Errorf("%g K and %g K: %d warnings, want %d", at.cold, at.hot, n, at.want)
		}
	}
}

// A vehicle is made from what was written, and from the defaults of what was not.
func TestRoadVehicle(t *testing.T) {
	cases := []struct {
		fields map[string]string
		want   element.Vehicle
	}{
		{map[string]string{"mass": "2.1 t"}, element.Vehicle{Mass: 2100, Rotating: 1, Air: 1.204}},
		{map[string]string{"mass": "1500 kg", "rotating mass factor": "1.1", "rolling resistance": "1.2 %", "drag area": "0.7 m^2",
			"air density": "1.1 kg/m^3", "grade": "-6 %", "wheel radius": "310 mm"},
			element.Vehicle{Mass: 1500, Rotating: 1.1, Rolling: 0.012, DragArea: 0.7, Air: 1.1, Grade: -0.06, Wheel: 0.31}},
	}
	for _, k := range cases {
		kind, d, _ := declare(t, library.Catalogue(), sample{element.Bodies, "road vehicle", k.fields, nil, nil})
		if got := kind.Vehicle(d); got != k.want {
			t.Errorf("%v: got %+v, want %+v", k.fields, got, k.want)
		}
	}
}

// The catalogue's own names are what its finders return.
func TestCatalogueFindsItsRows(t *testing.T) {
	c := library.Catalogue()
	for _, k := range c.Kinds {
		if c.Find(k.Section, k.Name) != k {
			t.Errorf("%s is not found", k.Name)
		}
	}
	for _, m := range c.Materials {
		if c.Material(m.Name) != m {
			t.Errorf("%s is not found", m.Name)
		}
	}
	if len(c.Materials) < 7 {
		t.Errorf("%d materials", len(c.Materials))
	}
}
