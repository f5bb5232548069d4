package unit

// Exact by definition (international yard and pound, 1959; standard gravity,
// third General Conference on Weights and Measures, 1901), as in the SI
// Brochure and NIST Special Publication 811, appendix B; from memory unless
// said otherwise. The Unified Code for Units of Measure 2.2, seen, gives the
// same definitions of inch, foot, psi, horsepower, degree, stokes, poise, tonne,
// bar, litre, degR and standard gravity.
const (
	inch    = 0.0254
	foot    = 12 * inch
	yard    = 3 * foot
	mile    = 1760 * yard
	pound   = 0.45359237
	gravity = 9.80665
	minute  = 60
	hour    = 3600
	turn    = 2 * 3.14159265358979323846264338327950288
	rankine = 5.0 / 9

	// btu is that of the International Table: one calorie of that table
	// (4.1868 J for a gram and a kelvin) for a pound and a degree Fahrenheit,
	// 1055.05585262 J. The thermochemical one is 0.07 % smaller.
	btu = 4186.8 * pound * rankine
)

// A unit is one row of the table of units.
type unit struct {
	name     string
	factor   float64
	dim      Dim
	prefixes string  // one letter for each SI prefix that may stand before the name
	powers   bool    // may carry an attached digit: m2, ft3
	zero     float64 // of a level: its zero above absolute zero, in this unit
	level    bool    // a scale of temperature levels
	also     string  // other spellings, one blank between
}

// dims are length, mass, time, temperature, angle, current, amount.
//
// K has no prefixes on purpose: "W/mK" would be watt per millikelvin. Units
// outside the SI have none either, save for those in daily use.
var units = []unit{
	{name: "m", factor: 1, dim: Dim{1}, prefixes: "numcdk", powers: true},
	{name: "g", factor: 1e-3, dim: Dim{0, 1}, prefixes: "umk"},
	{name: "s", factor: 1, dim: Dim{0, 0, 1}, prefixes: "num", powers: true},
	{name: "K", factor: 1, dim: Dim{0, 0, 0, 1}, powers: true},
	{name: "rad", factor: 1, dim: Dim{0, 0, 0, 0, 1}, prefixes: "um"},
	{name: "A", factor: 1, dim: Dim{0, 0, 0, 0, 0, 1}, prefixes: "umk"},
	{name: "mol", factor: 1, dim: Dim{0, 0, 0, 0, 0, 0, 1}, prefixes: "umk"},

	{name: "N", factor: 1, dim: Dim{1, 1, -2}, prefixes: "umkMG"},
	{name: "J", factor: 1, dim: Dim{2, 1, -2}, prefixes: "umkMG"},
	{name: "W", factor: 1, dim: Dim{2, 1, -3}, prefixes: "umkMG"},
	{name: "Pa", factor: 1, dim: Dim{-1, 1, -2}, prefixes: "umhkMG"},
	{name: "Hz", factor: 1, dim: Dim{0, 0, -1}, prefixes: "mkMG"},
	{name: "V", factor: 1, dim: Dim{2, 1, -3, 0, 0, -1}, prefixes: "umk"},
	{name: "ohm", factor: 1, dim: Dim{2, 1, -3, 0, 0, -2}, prefixes: "mkM", also: "Ω"},

	{name: "degC", factor: 1, dim: Dim{0, 0, 0, 1}, zero: 273.15, level: true, also: "°C"},
	{name: "degF", factor: rankine, dim: Dim{0, 0, 0, 1}, zero: 459.67, level: true, also: "°F"},
	{name: "degR", factor: rankine, dim: Dim{0, 0, 0, 1}},

	{name: "min", factor: minute, dim: Dim{0, 0, 1}},
	{name: "h", factor: hour, dim: Dim{0, 0, 1}},
	{name: "d", factor: 24 * hour, dim: Dim{0, 0, 1}},
	{name: "rpm", factor: turn / minute, dim: Dim{0, 0, -1, 0, 1}},
	{name: "rev", factor: turn, dim: Dim{0, 0, 0, 0, 1}},
	{name: "deg", factor: turn / 360, dim: Dim{0, 0, 0, 0, 1}, also: "°"},

	{name: "L", factor: 1e-3, dim: Dim{3}, prefixes: "umcd", also: "l"},
	{name: "t", factor: 1e3, dim: Dim{0, 1}},
	{name: "g0", factor: gravity, dim: Dim{1, 0, -2}},
	{name: "mph", factor: mile / hour, dim: Dim{1, 0, -1}},
	{name: "in", factor: inch, dim: Dim{1}, powers: true},
	{name: "ft", factor: foot, dim: Dim{1}, powers: true},
	{name: "yd", factor: yard, dim: Dim{1}, powers: true},
	{name: "mi", factor: mile, dim: Dim{1}},
	{name: "lb", factor: pound, dim: Dim{0, 1}},
	{name: "oz", factor: pound / 16, dim: Dim{0, 1}},
	{name: "lbf", factor: pound * gravity, dim: Dim{1, 1, -2}},
	{name: "kgf", factor: gravity, dim: Dim{1, 1, -2}},
	{name: "bar", factor: 1e5, dim: Dim{-1, 1, -2}, prefixes: "m"},
	{name: "atm", factor: 101325, dim: Dim{-1, 1, -2}},
	{name: "psi", factor: pound * gravity / (inch * inch), dim: Dim{-1, 1, -2}},
	{name: "Wh", factor: hour, dim: Dim{2, 1, -2}, prefixes: "mkMG"},
	{name: "BTU", factor: btu, dim: Dim{2, 1, -2}, also: "Btu"},
	{name: "hp", factor: 550 * foot * pound * gravity, dim: Dim{2, 1, -3}}, // mechanical: 550 ft lbf/s
	{name: "PS", factor: 75 * gravity, dim: Dim{2, 1, -3}},                 // metric: 75 m kgf/s
	{name: "P", factor: 0.1, dim: Dim{-1, 1, -1}, prefixes: "c"},
	{name: "St", factor: 1e-4, dim: Dim{2, 0, -1}, prefixes: "c"},

	{name: "%", factor: 1e-2, also: "percent"},
	{name: "ppm", factor: 1e-6},
}

// prefixes of the SI; the micro sign has two code points and a plain stand-in.
var prefixes = []struct {
	letter    byte
	spellings []string
	factor    float64
}{
	{'n', []string{"n"}, 1e-9},
	{'u', []string{"u", "\u00b5", "\u03bc"}, 1e-6},
	{'m', []string{"m"}, 1e-3},
	{'c', []string{"c"}, 1e-2},
	{'d', []string{"d"}, 1e-1},
	{'h', []string{"h"}, 1e2},
	{'k', []string{"k"}, 1e3},
	{'M', []string{"M"}, 1e6},
	{'G', []string{"G"}, 1e9},
}

// hints are cures for spellings that are often tried.
var hints = map[string]string{
	"C": "write degC", "F": "write degF", "c": "write degC",
	"deg_C": "write degC", "deg_F": "write degF", "celsius": "write degC", "fahrenheit": "write degF",
	"degK": "write K", "kelvin": "write K", "delta_degC": "write K",
	"kph": "write km/h", "kmh": "write km/h", "kmph": "write km/h",
	"sec": "write s", "hr": "write h", "hrs": "write h", "hour": "write h", "hours": "write h",
	"day": "write d", "days": "write d", "minute": "write min", "minutes": "write min",
	"mins": "write min", "secs": "write s", "second": "write s", "seconds": "write s", "meter": "write m", "metre": "write m",
	"inch": "write in", "inches": "write in", "feet": "write ft", "foot": "write ft",
	"lbs": "write lb", "ton": "write t for 1000 kg", "tonne": "write t", "gr": "write g",
	"cc": "write cm^3", "sqm": "write m^2", "degree": "write deg", "degrees": "write deg",
	"ppb": "write 1e-9", "nan": "a value must be a finite number", "NaN": "a value must be a finite number",
	"inf": "a value must be a finite number", "Inf": "a value must be a finite number",
	"infinity": "a value must be a finite number", "Infinity": "a value must be a finite number",
}

// byName finds a unit by its full spelling, prefixes included. unitNames are
// the same spellings in the order of the table.
var byName, unitNames = spell()

// spell lists every spelling once; two equal ones are a fault of the table.
func spell() (map[string]*unit, []string) {
	found := make(map[string]*unit, 256)
	var names []string
	add := func(name string, u *unit) {
		if found[name] != nil {
			panic("unit: two units are spelled " + name)
		}
		found[name] = u
		names = append(names, name)
	}
	for i := range units {
		u := &units[i]
		spellings := spellingsOf(u)
		for _, name := range spellings {
			add(name, u)
		}
		for _, p := range prefixes {
			if !has(u.prefixes, p.letter) {
				continue
			}
			scaled := *u
			scaled.factor *= p.factor
			for _, sign := range p.spellings {
				for _, name := range spellings {
					add(sign+name, &scaled)
				}
			}
		}
	}
	return found, names
}

func spellingsOf(u *unit) []string {
	out := []string{u.name}
	for rest := u.also; rest != ""; {
		i := 0
		for i < len(rest) && rest[i] != ' ' {
			i++
		}
		out = append(out, rest[:i])
		rest = rest[min(i+1, len(rest)):]
	}
	return out
}

func has(letters string, c byte) bool {
	for i := range len(letters) {
		if letters[i] == c {
			return true
		}
	}
	return false
}

// lookUp finds the unit that a name stands for, and its exponent: 1, or the
// digit attached to the name of a unit that may carry one.
func lookUp(name string) (u *unit, power int) {
	if u = byName[name]; u != nil {
		return u, 1
	}
	last := len(name) - 1
	if last < 1 || name[last] < '2' || name[last] > '4' {
		return nil, 0
	}
	if u = byName[name[:last]]; u == nil || !u.powers {
		return nil, 0
	}
	return u, int(name[last] - '0')
}

// NameFault returns a fault if a parameter of this name would be read as
// something else inside a quantity: as a unit or as pi. Names that could never
// stand inside a quantity, such as those with blanks, are no fault.
func NameFault(name string) *Fault {
	u, _ := lookUp(name)
	if u == nil && name != "pi" {
		return nil
	}
	what := "a unit"
	if u == nil {
		what = "the number pi"
	}
	help := ""
	if IsName(name) {
		help = "choose a longer name, such as " + name + "_part"
	}
	return &Fault{0, len(name), "the name " + name + " already stands for " + what, help}
}

// IsName reports whether name has the form [A-Za-z_][A-Za-z0-9_]* that a
// parameter needs to be used inside a quantity.
func IsName(name string) bool {
	for i := range len(name) {
		if c := name[i]; !letter(c) && (i == 0 || !digit(c)) {
			return false
		}
	}
	return name != ""
}
