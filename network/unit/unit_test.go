package unit

import (
	"math"
	"strings"
	"testing"
)

// params used by the tables below; the values are invented.
var testParams = Params{
	"r":      {Value: 0.1, Dim: Dim{inLength: 1}},
	"t_disc": {Value: 0.02, Dim: Dim{inLength: 1}},
	"rho":    {Value: 7200, Dim: Dim{inLength: -3, inMass: 1}},
	"corner": {Value: 0.34},
	"amb":    {Value: 293.15, Dim: pureTemperature, Temp: Level},
	"rise":   {Value: 40, Dim: pureTemperature, Temp: Difference},
	"m":      {Value: 5}, // hidden by the unit
}

var (
	dimSpecial = Dim{2, 0, -2, -1}
	dimHTC     = Dim{0, 1, -3, -1}
)

func TestParse(t *testing.T) {
	cases := []struct {
		text string
		want float64
		dim  Dim
		temp Thermal
	}{
		{"0.4", 0.4, Dim{}, NotTemp},
		{".5", 0.5, Dim{}, NotTemp},
		{"5.", 5, Dim{}, NotTemp},
		{"1e3", 1000, Dim{}, NotTemp},
		{"6.2 kg", 6.2, Dim{0, 1}, NotTemp},
		{"  6.2kg\t", 6.2, Dim{0, 1}, NotTemp},
		{"6.2\u00a0kg", 6.2, Dim{0, 1}, NotTemp},
		{"-3 kN", -3000, Dim{1, 1, -2}, NotTemp},
		{"−3 kN", -3000, Dim{1, 1, -2}, NotTemp},
		{"450 J/(kg K)", 450, dimSpecial, NotTemp},
		{"0.45 kJ/kg/K", 450, dimSpecial, NotTemp},
		{"25 W m^-2 K^-1", 25, dimHTC, NotTemp},
		{"25 W·m⁻²·K⁻¹", 25, dimHTC, NotTemp},
		{"25 W/m2/K", 25, dimHTC, NotTemp},
		{"25 W/(m^(2) K)", 25, dimHTC, NotTemp},
		{"45 W/(m·K)", 45, Dim{1, 1, -3, -1}, NotTemp},
		{"45 W/(m*K)", 45, Dim{1, 1, -3, -1}, NotTemp},
		{"45 W/m × 1/K", 45, Dim{1, 1, -3, -1}, NotTemp},
		{"1.2e-5 m²/s", 1.2e-5, Dim{2, 0, -1}, NotTemp},
		{"12 kN s/m", 12000, Dim{0, 1, -1}, NotTemp},
		{"3 (km/h)/s", 3 / 3.6, Dim{1, 0, -2}, NotTemp},
		{"7 µm", 7e-6, Dim{1}, NotTemp},
		{"7 μm", 7e-6, Dim{1}, NotTemp},
		{"7 um", 7e-6, Dim{1}, NotTemp},
		{"8/4/2", 1, Dim{}, NotTemp},
		{"8/4*2", 4, Dim{}, NotTemp},
		{"2 - -3", 5, Dim{}, NotTemp},
		{"-2^2", -4, Dim{}, NotTemp},
		{"2 * 3 + 4", 10, Dim{}, NotTemp},
		{"2 * (3 + 4)", 14, Dim{}, NotTemp},
		{"(9 m^2)^0.5", 3, Dim{1}, NotTemp},
		{"2^0.5", math.Sqrt2, Dim{}, NotTemp},
		{"2 pi rad", 2 * math.Pi, Dim{inAngle: 1}, NotTemp},
		{"2 * pi * r * t_disc * rho", 2 * math.Pi * 0.1 * 0.02 * 7200, Dim{-1, 1}, NotTemp},
		{"corner * 2 kg", 0.68, Dim{0, 1}, NotTemp},
		{"corner kg", 0.34, Dim{0, 1}, NotTemp},
		{"3 m", 3, Dim{1}, NotTemp},
		{"6 %", 0.06, Dim{}, NotTemp},
		{"6%", 0.06, Dim{}, NotTemp},
		{"6 percent", 0.06, Dim{}, NotTemp},

		{"20 degC", 293.15, pureTemperature, Level},
		{"20 °C", 293.15, pureTemperature, Level},
		{"-20 degC", 253.15, pureTemperature, Level},
		{"(15 + 5) degC", 293.15, pureTemperature, Level},
		{"212 degF", 373.15, pureTemperature, Level},
		{"-40 degF", 233.15, pureTemperature, Level},
		{"5 K", 5, pureTemperature, Either},
		{"5 K + 3 K", 8, pureTemperature, Either},
		{"1.1 * 5 K", 5.5, pureTemperature, Either},
		{"5 K / 2", 2.5, pureTemperature, Either},
		{"9 degR", 5, pureTemperature, Either},
		{"20 degC + 5 K", 298.15, pureTemperature, Level},
		{"5 K + 20 degC", 298.15, pureTemperature, Level},
		{"20 degC - 5 K", 288.15, pureTemperature, Level},
		{"80 degC - 20 degC", 60, pureTemperature, Difference},
		{"(80 degC - 20 degC) * 2", 120, pureTemperature, Difference},
		{"300 K - 20 degC", 6.85, pureTemperature, Difference},
		{"10 W / (5 W/K)", 2, pureTemperature, Difference},
		{"(4 K^2)^0.5", 2, pureTemperature, Difference},
		{"amb + rise", 333.15, pureTemperature, Level},
		{"amb - rise", 253.15, pureTemperature, Level},
		{"rise + amb", 333.15, pureTemperature, Level},
		{"rise - 5 K", 35, pureTemperature, Difference},
		{"rise + 5 K", 45, pureTemperature, Either},
		{"-rise", -40, pureTemperature, Difference},
	}
	for _, c := range cases {
		got, fault := Parse(c.text, testParams)
		if fault != nil {
			t.Errorf("Parse(%q): %v", c.text, fault)
			continue
		}
		if math.Abs(got.Value-c.want) > 1e-14*(300+math.Abs(c.want)) && !near(got.Value, c.want, 1e-14) {
			t.Errorf("Parse(%q) = %v, want %v", c.text, got.Value, c.want)
		}
		if got.Dim != c.dim || got.Temp != c.temp {
			t.Errorf("Parse(%q) is %v %d, want %v %d", c.text, got.Dim, got.Temp, c.dim, c.temp)
		}
	}
}

func near(a, b, tol float64) bool { return math.Abs(a-b) <= tol*math.Max(math.Abs(a), math.Abs(b)) }

func TestParseFaults(t *testing.T) {
	deep := strings.Repeat("(", 51) + "1" + strings.Repeat(")", 51)
	cases := []struct{ text, at, fault, help string }{
		{"", "", "a value is missing", ""},
		{" \t", " \t", "a value is missing", ""},
		{"kg", "kg", "the number is missing before kg", "write 1 kg"},
		{"(m/s)", "(m/s)", "the number is missing", ""},
		{"%", "%", "the number is missing", ""},
		{"degC", "degC", "the number is missing", ""},
		{"-kg", "kg", "the number is missing", ""},
		{"5 kg + kg", "kg", "the number is missing", ""},
		{"5 furlong", "furlong", `unknown unit or parameter "furlong"`, ""},
		{"10 kPA", "kPA", "unknown unit", "did you mean kPa?"},
		{"3 rhoo", "rhoo", "unknown unit", "did you mean rho?"},
		{"100 kph", "kph", "unknown unit", "write km/h"},
		{"5 Nm", "Nm", "unknown unit", "write N m"},
		{"45 W/(mK)", "mK", "unknown unit", "write m K"},
		{"5 kg2", "kg2", "unknown unit", "write kg^2"},
		{"20 deg C", "C", "unknown unit", "write degC"},
		{"NaN", "NaN", "unknown unit", "finite"},
		{"inf", "inf", "unknown unit", "finite"},
		{"5 größe", "größe", "unknown unit", ""},
		{"5 W/m K", "m K", "two ways", "write /(m K), or * before K"},
		{"5 W/m·K", "m·K", "two ways", "write /(m K)"},
		{"5 W/m (K)", "m (K)", "two ways", ""},
		{"2/3 kg", "3 kg", "two ways", "write /(3 kg)"},
		{"6,2 kg", "6,2", "comma", "write 6.2"},
		{"1,200 kg", "1,200", "comma", "write 1.200 or 1200"},
		{"1 200 kg", "1 200", "grouped", "write 1200"},
		{"1\u202f200 kg", "1\u202f200", "grouped", "write 1200"},
		{"1'200 kg", "1'200", "grouped", "write 1200"},
		{"1_200 kg", "1_200", "grouped", "write 1200"},
		{"1.200.000", "1.200.000", "one decimal point", ""},
		{"1e5.5", "1e5.5", "exponent", ""},
		{"5 kg 3", "3", "operator is missing before 3", ""},
		{"5 (3)", "(3)", "operator is missing before the bracket", ""},
		{"5 +", "+", "ends too early", ""},
		{"5 *", "*", "ends too early", ""},
		{"5 ** 2", "*", "value is missing before *", ""},
		{"5 kg)", ")", "closed that was not opened", ""},
		{"5 W/(m K", "(", "not closed", ""},
		{"()", ")", "value is missing before the bracket", ""},
		{"5 kg;", ";", "cannot stand", ""},
		{"5 kg]", "]", "cannot stand", "round brackets"},
		{"5 \x00", "\x00", "cannot stand", ""},
		{"\xff", "\xff", "cannot stand", ""},
		{"2^3^2", "^", "power of a power", ""},
		{"2 m2^2", "^", "power of a power", ""},
		{"2^x", "", "an exponent must be a number", ""},
		{"2^(1/2)", "(1", "single number", ""},
		{"2 m⁻", "⁻", "an exponent must be a number", ""},
		{"(9 m)^0.5", "(9 m)^0.5", "root of m", ""},
		{"(-4)^0.5", "(-4)^0.5", "negative value", ""},
		{"2 m^99", "m^99", "too high", ""},
		{"2 m^50 * 1 m^50", "2 m^50 * 1 m^50", "too high", ""},
		{"5/0", "0", "division by zero", ""},
		{"5/(3 - 3)", "(3 - 3)", "division by zero", ""},
		{"0^-1", "0", "division by zero", ""},
		{"1e999", "1e999", "too large", ""},
		{"1e-999", "1e-999", "too small", ""},
		{"1e200 * 1e200", "1e200 * 1e200", "too large", ""},
		{"10^400", "10^400", "too large", ""},
		{"5 m - 3 kg", "5 m - 3 kg", "5 m is a length, but 3 kg is a mass", "one kind"},
		{"5 - 3 kg", "5 - 3 kg", "5 is a plain number, but 3 kg is a mass", ""},
		{deep, "(", "more than 50 deep", ""},

		{"20 degC + 5 degC", "20 degC + 5 degC", "two temperature levels cannot be added", "in K"},
		{"rise - 20 degC", "rise - 20 degC", "cannot be taken from a difference", ""},
		{"amb * 2", "amb", "cannot be multiplied", ""},
		{"2 amb", "amb", "cannot be multiplied", ""},
		{"1 W / amb", "amb", "cannot be multiplied", ""},
		{"amb^2", "amb", "cannot be multiplied", ""},
		{"-amb", "-amb", "cannot be given a sign", ""},
		{"-(20 degC)", "-(20 degC)", "cannot be given a sign", "-20 degC"},
		{"(20 degC) m", "(20 degC)", "cannot be multiplied", ""},
		{"5 W/(m2 degC)", "degC", "cannot stand in a product", "write K"},
		{"5 BTU/(h ft2 degF)", "degF", "cannot stand in a product", "write degR"},
		{"2 * 10 degC", "degC", "cannot stand in a product", ""},
		{"20 * degC", "degC", "cannot stand in a product", ""},
		{"5 kg degC", "degC", "cannot stand in a product", ""},
		{"20 degC^2", "degC", "cannot stand in a product", ""},
		{"-300 degC", "-300 degC", "below absolute zero", ""},
		{"20 degC - 400 K", "20 degC - 400 K", "below absolute zero", ""},
	}
	for _, c := range cases {
		_, fault := Parse(c.text, testParams)
		if fault == nil {
			t.Errorf("Parse(%q): no fault, want %q", c.text, c.fault)
			continue
		}
		if at := c.text[fault.Start:fault.End]; at != c.at {
			t.Errorf("Parse(%q): fault at %q, want %q (%v)", c.text, at, c.at, fault)
		}
		if !strings.Contains(fault.Text, c.fault) || !strings.Contains(fault.Help, c.help) {
			t.Errorf("Parse(%q): %q, help %q; want %q, help %q", c.text, fault.Text, fault.Help, c.fault, c.help)
		}
	}
}

func TestLongTextIsRefused(t *testing.T) {
	text := strings.Repeat("1+", longest/2) + "1"
	if _, fault := Parse(text, nil); fault == nil || !strings.Contains(fault.Text, "longer than 4096") {
		t.Errorf("text of %d bytes: %v", len(text), fault)
	}
	if q, fault := Parse(text[2:], nil); fault != nil || q.Value != longest/2 {
		t.Errorf("text of %d bytes: %v, %v", len(text)-2, q.Value, fault)
	}
}

func TestNameFault(t *testing.T) {
	for _, name := range []string{"m", "t", "kN", "min", "m2", "s2", "pi", "%", "g0", "degC", "percent"} {
		if NameFault(name) == nil {
			t.Errorf("NameFault(%q) is nil, want a clash", name)
		}
	}
	for _, name := range []string{"", "r", "rho_disc", "d1", "h1", "kg2", "van mass", "x", "T", "pi2", "m5"} {
		if f := NameFault(name); f != nil {
			t.Errorf("NameFault(%q) = %v, want nil", name, f)
		}
	}
}

func TestIsName(t *testing.T) {
	for name, want := range map[string]bool{
		"r": true, "_x": true, "rho_1": true, "": false, "1x": false, "a b": false, "é": false, "%": false,
	} {
		if got := IsName(name); got != want {
			t.Errorf("IsName(%q) = %v, want %v", name, got, want)
		}
	}
}

// A parameter never hides a unit, and a parameter of every other name is found.
func TestParameterHidesNothing(t *testing.T) {
	for _, name := range unitNames {
		params := Params{name: {Value: 1234.5}}
		q, fault := Parse("1 "+name, params)
		if fault == nil && q.Value == 1234.5 {
			t.Errorf("parameter %q hides the unit", name)
		}
	}
}

func BenchmarkParse(b *testing.B) {
	b.ReportAllocs()
	for b.Loop() {
		if _, fault := Parse("450 J/(kg K)", nil); fault != nil {
			b.Fatal(fault)
		}
	}
}

func BenchmarkRead(b *testing.B) {
	b.ReportAllocs()
	for b.Loop() {
		if _, fault := SpecificHeat.Read("450 J/(kg K)", testParams); fault != nil {
			b.Fatal(fault)
		}
	}
}
