package unit

import (
	"testing"

	gonum "gonum.org/v1/gonum/unit"
	"gonum.org/v1/gonum/unit/constant"
)

// Factors to the SI. "exact" are definitions; SP 811 is NIST Special
// Publication 811 (2008), appendix B.8, rounded to seven figures as printed
// there, from memory; UCUM is the Unified Code for Units of Measure 2.2, seen.
func TestUnitFactors(t *testing.T) {
	cases := []struct {
		text   string
		want   float64
		tol    float64
		source string
	}{
		{"1 min", 60, 0, "exact"},
		{"1 h", 3600, 0, "exact"},
		{"1 d", 86400, 0, "exact"},
		{"36 km/h", 10, 1e-15, "exact"},
		{"1 kWh", 3.6e6, 0, "exact"},
		{"1 t", 1000, 0, "UCUM"},
		{"1 L", 1e-3, 0, "UCUM: dm3"},
		{"1 mL - 1 cm^3", 0, 1e-20, "exact"},
		{"1 bar", 1e5, 0, "UCUM"},
		{"1 mbar", 100, 1e-15, "exact"},
		{"1 hPa", 100, 0, "exact"},
		{"1 atm", 101325, 0, "SP 811"},
		{"1 g0", 9.80665, 0, "UCUM: [g]"},
		{"1 in", 0.0254, 0, "UCUM: 2.54 cm"},
		{"1 ft", 0.3048, 1e-15, "UCUM: 12 inches"},
		{"1 yd", 0.9144, 1e-15, "SP 811"},
		{"1 mi", 1609.344, 1e-15, "SP 811"},
		{"1 mph", 0.44704, 1e-15, "SP 811"},
		{"1 lb", 0.45359237, 0, "SP 811"},
		{"1 oz", 0.02834952, 1e-7, "SP 811"},
		{"1 lbf", 4.448222, 1e-7, "SP 811"},
		{"1 kgf", 9.80665, 0, "SP 811"},
		{"1 psi", 6894.757, 1e-7, "SP 811"},
		{"1 psi - 1 lbf/in^2", 0, 1e-11, "UCUM: [lbf_av]/[in_i]2"},
		{"1 hp", 745.6999, 1e-7, "SP 811"},
		{"1 hp - 550 ft lbf/s", 0, 1e-12, "UCUM: 550 [ft_i].[lbf_av]/s"},
		{"1 PS", 735.49875, 1e-15, "SP 811, metric horsepower 735.4988"},
		{"1 BTU", 1055.05585262, 1e-15, "SP 811, footnote 9"},
		// 1 BTU/lb is 2326 J/kg exactly, the definition by the steam tables.
		{"1 BTU / (1 lb) / (2326 J/kg)", 1, 1e-15, "Fifth International Conference on the Properties of Steam, from memory"},
		{"1 BTU/(h ft^2 degR)", 5.678263, 1e-7, "SP 811"},
		{"1 BTU/(lb degR)", 4186.8, 1e-15, "SP 811"},
		{"1 BTU in/(h ft^2 degR)", 0.1442279, 1e-6, "SP 811"},
		{"1 cSt", 1e-6, 1e-15, "SP 811"},
		{"1 St", 1e-4, 0, "UCUM: cm2/s"},
		{"1 P", 0.1, 0, "UCUM: dyn.s/cm2"},
		{"1 cP", 1e-3, 1e-15, "SP 811"},
		{"1 rev/min", 0.104719755, 1e-8, "UCUM: circ/min"},
		{"1 rpm", 0.104719755, 1e-8, "UCUM: circ/min"},
		{"180 deg", 3.14159265358979, 1e-14, "exact"},
		{"9 degR", 5, 1e-15, "UCUM: 5 K/9"},
		{"1 %", 0.01, 0, "UCUM: 10*-2"},
		{"1 ppm", 1e-6, 0, "exact"},
		{"1 V A - 1 W", 0, 0, "exact"},
		{"1 ohm * 1 A - 1 V", 0, 0, "exact"},
		{"0 degC", 273.15, 0, "SI Brochure 2.3.1, from memory"},
		{"32 degF", 273.15, 1e-15, "SP 811"},
		{"-459.67 degF", 0, 0, "SP 811"},
	}
	for _, c := range cases {
		q, fault := Parse(c.text, nil)
		if fault != nil {
			t.Errorf("%s: %v", c.text, fault)
			continue
		}
		if d := q.Value - c.want; d > c.tol*max(1, c.want) || -d > c.tol*max(1, c.want) {
			t.Errorf("%s = %.17g, want %.17g (%s)", c.text, q.Value, c.want, c.source)
		}
	}
}

// The dimensions and factors agree with an independent package of units.
func TestAgainstGonum(t *testing.T) {
	cases := []struct {
		text string
		want *gonum.Unit
	}{
		{"1 m", gonum.Metre.Unit()},
		{"1 kg", (1000 * gonum.Gram).Unit()},
		{"1 s", gonum.Second.Unit()},
		{"1 K", gonum.Kelvin.Unit()},
		{"1 A", gonum.Ampere.Unit()},
		{"1 mol", gonum.Mol.Unit()},
		{"1 rad", gonum.Rad.Unit()},
		{"1 Hz", gonum.Hertz.Unit()},
		{"1 N", gonum.Newton.Unit()},
		{"1 J", gonum.Joule.Unit()},
		{"1 W", gonum.Watt.Unit()},
		{"1 Pa", gonum.Pascal.Unit()},
		{"1 V", gonum.Volt.Unit()},
		{"1 ohm", gonum.Ohm.Unit()},
		{"1 L", gonum.Litre.Unit()},
		{"1 m/s", gonum.Velocity(1).Unit()},
		{"1 m/s^2", gonum.Acceleration(1).Unit()},
		{"1 m^2", gonum.Area(1).Unit()},
		{"1 m^3", gonum.Volume(1).Unit()},
		{"1 N m", gonum.Newtonmetre.Unit()},
		{"1 h", gonum.Hour.Unit()},
		{"1 min", gonum.Minute.Unit()},
		{"1 g0", constant.StandardGravity.Unit()},
		{"1 km", (gonum.Kilo * gonum.Metre).Unit()},
		{"1 mm", (gonum.Milli * gonum.Metre).Unit()},
		{"1 um", (gonum.Micro * gonum.Metre).Unit()},
		{"1 MPa", (gonum.Mega * gonum.Pascal).Unit()},
		{"1 W/K", gonum.Watt.Unit().Div(gonum.Kelvin)},
		{"1 J/(kg K)", gonum.Joule.Unit().Div((1000 * gonum.Gram).Unit().Mul(gonum.Kelvin))},
		{"1 Pa s", gonum.Pascal.Unit().Mul(gonum.Second)},
	}
	for _, c := range cases {
		q, fault := Parse(c.text, nil)
		if fault != nil {
			t.Errorf("%s: %v", c.text, fault)
			continue
		}
		if !near(q.Value, c.want.Value(), 1e-14) {
			t.Errorf("%s = %v, gonum has %v", c.text, q.Value, c.want.Value())
		}
		if !gonum.DimensionsMatch(gonum.New(1, dimensions(q.Dim)), c.want) {
			t.Errorf("%s is %v, gonum has %v", c.text, q.Dim, c.want.Dimensions())
		}
	}
}

func dimensions(d Dim) gonum.Dimensions {
	order := [...]gonum.Dimension{
		gonum.LengthDim, gonum.MassDim, gonum.TimeDim, gonum.TemperatureDim,
		gonum.AngleDim, gonum.CurrentDim, gonum.MoleDim,
	}
	out := gonum.Dimensions{}
	for i, e := range d {
		if e != 0 {
			out[order[i]] = int(e)
		}
	}
	return out
}

// Every spelling of every unit can be read, with a number and alone.
func TestEverySpelling(t *testing.T) {
	for _, name := range unitNames {
		s, fault := ParseUnit(name)
		if fault != nil || s.Factor <= 0 {
			t.Errorf("unit %q: %v, %v", name, s, fault)
		}
		q, fault := Parse("300"+name, nil)
		if fault != nil {
			t.Errorf("300%s: %v", name, fault)
			continue
		}
		if want := s.SI(300); !near(q.Value, want, 1e-15) || q.Dim != s.Dim {
			t.Errorf("300%s = %v, want %v", name, q.Value, want)
		}
	}
}

// The cures in the tables of hints can themselves be read.
func TestHintsHold(t *testing.T) {
	for name, cure := range hints {
		if u, _ := lookUp(name); u != nil {
			t.Errorf("hint for %q, which is a unit", name)
		}
		var unit string
		if n, _ := scan(cure, &unit); n {
			if _, fault := ParseUnit(unit); fault != nil && unit != "1e-9" {
				t.Errorf("the hint %q does not hold: %v", cure, fault)
			}
		}
	}
}

// scan takes the first word after "write ".
func scan(cure string, word *string) (bool, string) {
	const lead = "write "
	if len(cure) < len(lead) || cure[:len(lead)] != lead {
		return false, cure
	}
	rest := cure[len(lead):]
	for i := range len(rest) {
		if rest[i] == ' ' {
			*word = rest[:i]
			return true, rest[i:]
		}
	}
	*word = rest
	return true, ""
}
