package unit

import (
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

func TestRead(t *testing.T) {
	cases := []struct {
		want Want
		text string
		si   float64
	}{
		{Conductance, "310 W/K", 310},
		{Mass, "corner * 10 kg", 3.4},
		{Number, "0.55", 0.55},
		{Number, "55 %", 0.55},
		{Temperature, "20 degC", 293.15},
		{Temperature, "300 K", 300},
		{Temperature, "0 K", 0},
		{TemperatureDifference, "30 K", 30},
		{TemperatureDifference, "-30 K", -30},
		{TemperatureDifference, "80 degC - 20 degC", 60},
		{AngularSpeed, "60 rpm", 2 * math.Pi},
		{AngularSpeed, "1 Hz * 1 rev", 2 * math.Pi},
		{Torque, "250 N m", 250},
		{NewWant("spring rate", "N/mm"), "20 N/mm", 20000},
	}
	for _, c := range cases {
		got, fault := c.want.Read(c.text, testParams)
		if fault != nil || !near(got, c.si, 1e-15) {
			t.Errorf("%s: Read(%q) = %v, %v; want %v", c.want.Name, c.text, got, fault, c.si)
		}
	}
}

func TestReadFaults(t *testing.T) {
	cases := []struct {
		want             Want
		text, text2, fix string
	}{
		{Conductance, "6.2 kg", "6.2 kg is a mass, but a conductance is due", "give it in W/K"},
		{Conductance, " 0.4 ", "0.4 has no unit, but a conductance is due", `give it in W/K, for example "0.4 W/K"`},
		{Conductance, "corner", "corner has no unit, but a conductance is due", "give it in W/K"},
		{Conductance, "5 furlong", `unknown unit "furlong"`, "give it in W/K"},
		{Conductance, "5 kA", "5 kA is an electric current, but a conductance is due", "give it in W/K"},
		{Conductance, "5 N m", "5 N m is an energy or a torque, but a conductance is due", "give it in W/K"},
		{Area, "5 s^7", "5 s^7 is in s^7, but an area is due", "give it in m^2"},
		{AngularSpeed, "15 Hz", "15 Hz is a frequency, but an angular speed is due", "multiply by rad; give it in rad/s"},
		{Frequency, "900 rpm", "900 rpm is an angular speed, but a frequency is due", "divide by rad; give it in Hz"},
		{Frequency, "900 rpm*1 rad", "but a frequency is due", "multiply by rad^-2; give it in Hz"},
		{Number, "5 K", "5 K is a temperature, but a plain number is due", "give it as a number without unit"},
		{Number, "30 deg", "30 deg is an angle, but a plain number is due", "divide by rad"},
		{Temperature, "20", "20 has no unit, but a temperature level is due", `for example "20 degC"`},
		{Temperature, "80 degC - 20 degC", "is a temperature difference, but a temperature level is due", "give it in degC, or in K above absolute zero"},
		{Temperature, "5 kg", "5 kg is a mass, but a temperature level is due", "give it in degC, K or degF"},
		{Temperature, "-5 K", "below absolute zero", ""},
		{TemperatureDifference, "20 degC", "20 degC is a temperature level, but a temperature difference is due", "give it in K"},
	}
	for _, c := range cases {
		_, fault := c.want.Read(c.text, map[string]Quantity(testParamsFor(c.text)))
		if fault == nil {
			t.Errorf("%s: Read(%q) found no fault", c.want.Name, c.text)
			continue
		}
		if !strings.Contains(fault.Text, c.text2) || !strings.Contains(fault.Help, c.fix) {
			t.Errorf("%s: Read(%q): %q, help %q; want %q, help %q", c.want.Name, c.text, fault.Text, fault.Help, c.text2, c.fix)
		}
		if fault.Start < 0 || fault.End > len(c.text) || fault.Start >= fault.End {
			t.Errorf("%s: Read(%q): fault at %d:%d", c.want.Name, c.text, fault.Start, fault.End)
		}
	}
}

// testParamsFor gives parameters only to the text that uses one.
func testParamsFor(text string) Params {
	if text == "corner" {
		return testParams
	}
	return nil
}

func TestFormat(t *testing.T) {
	cases := []struct {
		want   Want
		si     float64
		digits int
		text   string
	}{
		{Temperature, 293.15, 4, "20 degC"},
		{Temperature, 253.15, 0, "-20 degC"},
		{Conductance, 1234.5678, 3, "1230 W/K"},
		{Number, 0.06, 6, "0.06"},
		{Stress, 2.5e6, 6, "2.5 MPa"},
		{KinematicViscosity, 1.2e-5, 3, "1.2e-05 m^2/s"},
		{Energy, 4.5e12, 3, "4.5e+12 J"},
		{Force, 0, 3, "0 N"},
		{Power, math.Inf(1), 3, "+Inf W"},
	}
	for _, c := range cases {
		if got := c.want.Format(c.si, c.digits); got != c.text {
			t.Errorf("%s.Format(%v, %d) = %q, want %q", c.want.Name, c.si, c.digits, got, c.text)
		}
	}
}

// What Format writes, Read reads, for every want.
func TestFormatReadRoundTrip(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		w := rapid.SampledFrom(wants).Draw(t, "want")
		si := rapid.Float64Range(-1e12, 1e12).Draw(t, "si")
		if w.Level {
			si = rapid.Float64Range(0, 5000).Draw(t, "level")
		}
		if w.Level && si < 1e-9 || math.Abs(si) < 1e-280 {
			si = 1
		}
		text := w.Format(si, 17)
		got, fault := w.Read(text, nil)
		// A level loses the digits that 273.15 takes.
		if fault != nil || math.Abs(got-si) > 4e-16*math.Abs(si)+map[bool]float64{true: 1e-12}[w.Level] {
			t.Fatalf("%s: %v -> %q -> %v, %v", w.Name, si, text, got, fault)
		}
	})
}

// The dimension of a want is that of its unit, and its text is known to itself.
func TestWantsAgree(t *testing.T) {
	for _, w := range wants {
		if _, f := w.Scale(w.Unit); f != nil {
			t.Errorf("%s does not take its own unit: %v", w.Name, f)
		}
		if got := w.scale.SI(w.Show(400)); !near(got, 400, 1e-15) {
			t.Errorf("%s: 400 shown and back is %v", w.Name, got)
		}
	}
}

func TestScale(t *testing.T) {
	s, fault := Speed.Scale("km/h")
	if fault != nil || !near(s.SI(36), 10, 1e-15) || !near(s.Show(10), 36, 1e-15) {
		t.Errorf("km/h: %v, %v", s, fault)
	}
	s, fault = Temperature.Scale("degF")
	if fault != nil || !near(s.SI(212), 373.15, 1e-15) {
		t.Errorf("degF: %v, %v", s, fault)
	}
	if _, fault = Number.Scale(""); fault != nil {
		t.Errorf("no unit for a plain number: %v", fault)
	}
	for _, text := range []string{"kg", "5 m/s", "furlong", "degC", "m/s s", ""} {
		if _, fault := Speed.Scale(text); fault == nil {
			t.Errorf("Speed.Scale(%q) has no fault", text)
		}
	}
	if _, fault = TemperatureDifference.Scale("degC"); fault == nil {
		t.Error("degC passes as the unit of a difference")
	}
}

// Sums, products and powers of random quantities agree with float64.
func TestArithmetic(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		a := rapid.Float64Range(0.001, 1e6).Draw(t, "a")
		b := rapid.Float64Range(0.001, 1e6).Draw(t, "b")
		n := rapid.IntRange(-3, 3).Draw(t, "n")
		params := Params{"x": {Value: a, Dim: Dim{1}}, "y": {Value: b, Dim: Dim{0, 0, 1}}}
		for text, want := range map[string]Quantity{
			"x + 2 x":       {Value: a + 2*a, Dim: Dim{1}},
			"x - 2 m":       {Value: a - 2, Dim: Dim{1}},
			"x y":           {Value: a * b, Dim: Dim{1, 0, 1}},
			"x / y":         {Value: a / b, Dim: Dim{1, 0, -1}},
			"(x) * (1 / y)": {Value: a / b, Dim: Dim{1, 0, -1}},
			"-x":            {Value: -a, Dim: Dim{1}},
		} {
			got, fault := Parse(text, params)
			if fault != nil || !near(got.Value, want.Value, 1e-15) || got.Dim != want.Dim {
				t.Fatalf("%s = %v, %v; want %v", text, got, fault, want)
			}
		}
		got, fault := Parse("x^"+number(float64(n), 3), params)
		if fault != nil || !near(got.Value, math.Pow(a, float64(n)), 1e-15) || got.Dim != (Dim{int8(n)}) {
			t.Fatalf("x^%d = %v, %v", n, got, fault)
		}
	})
}
