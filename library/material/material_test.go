package material

import (
	"math"
	"os"
	"slices"
	"strings"
	"testing"

	"workheat/network/element"
)

// find returns the material of a name or ends the test.
func find(t *testing.T, name string) *element.Material {
	t.Helper()
	for _, m := range All() {
		if m.Name == name {
			return m
		}
	}
	t.Fatalf("no material %q", name)
	return nil
}

// off returns how far got is from want, relative to want.
func off(got, want float64) float64 { return math.Abs(got-want) / math.Abs(want) }

func TestEveryMaterial(t *testing.T) {
	seen := map[string]bool{}
	for _, m := range All() {
		t.Run(m.Name, func(t *testing.T) {
			if m.Name != strings.ToLower(strings.TrimSpace(m.Name)) || seen[m.Name] {
				t.Errorf("name %q is not lower case, or not the only one", m.Name)
			}
			seen[m.Name] = true
			if m.About == "" || m.Source == "" {
				t.Error("without description or source")
			}
			if strings.Contains(m.Source, "from memory") && m.Doubtful == "" {
				t.Error("has values from memory but no text on what is doubtful")
			}
			if !(m.Density > 0) || m.Capacity == nil || m.Conductivity == nil {
				t.Fatal("density, capacity or conductivity is missing")
			}
			if !(slices.Min(m.Capacity.Y) > 0) || !(slices.Min(m.Conductivity.Y) > 0) {
				t.Error("a property is not positive")
			}
			if !(0 < m.Low && m.Low < m.High) {
				t.Errorf("range %g to %g K", m.Low, m.High)
			}
			for _, l := range m.Limits {
				if l.Name == "" || l.Source == "" || l.Temperature < m.Low || l.Temperature > m.High+0.01 {
					t.Errorf("limit %+v has no name or source, or lies outside the material's range", l)
				}
			}
		})
	}
}

// Corners that vary must span exactly the stated range, so that the warning of leaving it is true.
func TestCapacityCornersSpanTheRange(t *testing.T) {
	for _, m := range All() {
		x := m.Capacity.X
		if m.Capacity.IsConstant() {
			continue
		}
		if x[0] != m.Low || x[len(x)-1] != m.High {
			t.Errorf("%s: c(T) has corners from %g to %g K, its range is %g to %g K", m.Name, x[0], x[len(x)-1], m.Low, m.High)
		}
	}
}

// One material, one file, one row in the list.
func TestOneFileForEachMaterial(t *testing.T) {
	entries, err := os.ReadDir(".")
	if err != nil {
		t.Fatal(err)
	}
	shared := map[string]bool{"material.go": true, "iron.go": true}
	files := map[string]bool{}
	for _, e := range entries {
		if name := e.Name(); strings.HasSuffix(name, ".go") && !strings.HasSuffix(name, "_test.go") && !shared[name] {
			files[name] = true
		}
	}
	for _, m := range All() {
		name := strings.ReplaceAll(m.Name, " ", "_") + ".go"
		if !files[name] {
			t.Errorf("%s: no file %s", m.Name, name)
		}
		delete(files, name)
	}
	for name := range files {
		t.Errorf("%s holds no material of the list", name)
	}
}

func TestAllIsMadeOnce(t *testing.T) {
	if a, b := All(), All(); &a[0] != &b[0] {
		t.Error("a second call made the tables again")
	}
}

// 49 CFR 571.116: least boiling points, degC.
func TestBrakeFluidBoilingPoints(t *testing.T) {
	want := []struct {
		grade    string
		dry, wet float64
	}{{"DOT 3", 205, 140}, {"DOT 4", 230, 155}, {"DOT 5.1", 260, 180}}
	got := map[string]float64{}
	for _, l := range find(t, "glycol brake fluid").Limits {
		got[l.Name] = l.Temperature - 273.15
	}
	for _, w := range want {
		if dry := got[w.grade+" dry boiling point"]; math.Abs(dry-w.dry) > 1e-9 {
			t.Errorf("%s dry: got %g degC, want %g", w.grade, dry, w.dry)
		}
		if wet := got[w.grade+" wet boiling point"]; math.Abs(wet-w.wet) > 1e-9 {
			t.Errorf("%s wet: got %g degC, want %g", w.grade, wet, w.wet)
		}
	}
	if len(got) != 2*len(want) {
		t.Errorf("got %d limits, want %d", len(got), 2*len(want))
	}
}

// Incropera Table A.4 once more, by columns: T from 200 K by 50 K, c [kJ/(kg K)], k [1e-3 W/(m K)].
func TestAirTable(t *testing.T) {
	m := find(t, "air")
	c := []float64{1.007, 1.006, 1.007, 1.009, 1.014, 1.021, 1.030, 1.040, 1.051, 1.063, 1.075, 1.087, 1.099, 1.110, 1.121, 1.131, 1.141}
	k := []float64{18.1, 22.3, 26.3, 30.0, 33.8, 37.3, 40.7, 43.9, 46.9, 49.7, 52.4, 54.9, 57.3, 59.6, 62.0, 64.3, 66.7}
	for i := range c {
		at := 200 + 50*float64(i)
		if off(m.Capacity.At(at), 1000*c[i]) > 1e-12 || off(m.Conductivity.At(at), 1e-3*k[i]) > 1e-12 {
			t.Errorf("at %g K: c %g, k %g, want %g, %g", at, m.Capacity.At(at), m.Conductivity.At(at), 1000*c[i], 1e-3*k[i])
		}
	}
	for i := 1; i < len(airTable); i++ {
		if airTable[i].t != airTable[i-1].t+50 || airTable[i].k <= airTable[i-1].k {
			t.Errorf("row %g K breaks the spacing or the rise of k", airTable[i].t)
		}
		// The ratio of specific heats of air falls, so c rises, from 250 K on.
		if airTable[i].t > 250 && airTable[i].c <= airTable[i-1].c {
			t.Errorf("row %g K: c does not rise", airTable[i].t)
		}
	}
}

// Materials known by one value: density, c, k as published, or within the bounds remembered.
func TestSingleValues(t *testing.T) {
	for _, w := range []struct {
		name      string
		low, high [3]float64
	}{
		{"organic lining", [3]float64{2400, 1230, 1.31}, [3]float64{2400, 1230, 1.31}},          // published student studies
		{"glycol brake fluid", [3]float64{1020, 2000, 0.16}, [3]float64{1070, 2400, 0.20}},      // from memory
		{"nodular iron", [3]float64{7085, 430, 36}, [3]float64{7085, 1020, 36}},                 // wind-turbine study; c over its range
		{"grey iron", [3]float64{7100, 430, 44.5}, [3]float64{7250, 1000, 48.5}},                // span of published densities; EN 1561 k
		{"carbon steel", [3]float64{7850, 439.8, 27.3}, [3]float64{7850, 5000, 53.334 + 1e-12}}, // EN 1993-1-2
		{"aluminium", [3]float64{2700, 903, 190}, [3]float64{2700, 1108, 225}},                  // EN 1999-1-2
	} {
		m := find(t, w.name)
		for T := m.Low; T <= m.High; T += 1 {
			for i, got := range [3]float64{m.Density, m.Capacity.At(T), m.Conductivity.At(T)} {
				if got < w.low[i] || got > w.high[i] {
					t.Fatalf("%s at %g K: %s %g is not within %g to %g", w.name, T, [3]string{"density", "c", "k"}[i], got, w.low[i], w.high[i])
				}
			}
		}
	}
}

func BenchmarkMakeAll(b *testing.B) {
	b.ReportAllocs()
	for b.Loop() {
		for _, makeOne := range list {
			makeOne()
		}
	}
}
