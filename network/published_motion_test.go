package network_test

import (
	"fmt"
	"math"
	"os"
	"testing"

	"workheat/network/duty"
)

// A road is a vehicle on a grade under a constant braking torque, for the equation of motion alone.
type road struct {
	name                          string
	mass, rotating, rolling, area float64 // area: drag area, m^2
	torque, grade, from, to       float64 // N m; rise over run; m/s
}

const (
	wheel      = 0.31  // m
	airDensity = 1.204 // kg/m^3, the default of a road vehicle
)

// slowing returns the deceleration [m/s^2] at a speed, straight from the balance of forces.
func (r road) slowing(v float64) float64 {
	angle := math.Atan(r.grade)
	force := r.torque/wheel + r.mass*duty.Gravity*(math.Sin(angle)+r.rolling*math.Cos(angle)) + 0.5*airDensity*r.area*v*v
	return force / (r.mass * r.rotating)
}

// marched returns speed and distance at the end of a time by the classical Runge-Kutta method of order 4.
func (r road) marched(t float64) (v, x float64) {
	const n = 4000
	v, h := r.from, t/n
	for range n {
		k1 := r.slowing(v)
		k2 := r.slowing(v - 0.5*h*k1)
		k3 := r.slowing(v - 0.5*h*k2)
		k4 := r.slowing(v - h*k3)
		x += h * (v - h*(k1+k2+k3)/6)
		v -= h * (k1 + 2*k2 + 2*k3 + k4) / 6
	}
	return v, x
}

func (r road) netlist() string {
	return braked(fmt.Sprintf("%g kg", r.mass), fmt.Sprintf(`, "rotating mass factor": %g, "rolling resistance": %g, "drag area": "%g m^2", "wheel radius": "%g m"`,
		r.rotating, r.rolling, r.area, wheel), 2, "3 kJ/K",
		fmt.Sprintf(`{"brake": {"from": "%g m/s", "to": "%g m/s", "torque": "%g N m", "grade": %g}}`, r.from, r.to, r.torque, r.grade))
}

// Braking under a constant torque is an equation of motion of its own: m' dv/dt = -(T/R + resistances + c v^2). Its
// closed forms in the program (a straight line, an arc tangent, a reciprocal, a hyperbolic cotangent) are held against
// integrals of dv/a and v dv/a by Gauss-Legendre quadrature and against a march in time.
func TestConstantTorque(t *testing.T) {
	// The torque that leaves nothing but air drag on 8 % downhill without rolling resistance.
	balance := 1600 * duty.Gravity * math.Sin(math.Atan(0.08)) * wheel
	cases := []road{
		{"no air drag", 1500, 1, 0, 0, 2400, 0, 30, 0},
		{"rotating parts, rolling resistance, uphill", 1500, 1.08, 0.012, 0, 1800, 0.05, 25, 5},
		{"air drag", 1500, 1.05, 0.012, 0.7, 2000, 0, 50, 0},
		{"air drag downhill", 1600, 1.05, 0.01, 2.2, 3000, -0.06, 40, 2},
		{"air drag alone", 1600, 1.05, 0, 2.2, balance, -0.08, 40, 20},
		{"torque below the pull of the grade", 1600, 1.05, 0, 6, balance - 40, -0.08, 40, 25},
	}
	for _, r := range cases {
		t.Run(r.name, func(t *testing.T) {
			o := run(t, r.netlist(), 1e-9)
			seconds := gauss(func(v float64) float64 { return 1 / r.slowing(v) }, r.to, r.from, 400)
			metres := gauss(func(v float64) float64 { return v / r.slowing(v) }, r.to, r.from, 400)
			near(t, "time", o.End, seconds, 1e-9*seconds)
			near(t, "distance", o.Book.Vehicle.Distance, metres, 1e-9*metres)
			near(t, "work", o.work("brakes"), r.torque/wheel*metres, 1e-8*r.torque/wheel*metres)
			near(t, "rise", o.end("brake 1")-celsius(20), r.torque/wheel*metres/6000, 1e-8*r.torque/wheel*metres/6000)
			series := o.Series(o.End / 4)
			for _, c := range series.Columns {
				if c.Name != "speed of vehicle" {
					continue
				}
				for k, x := range series.Time {
					v, _ := r.marched(x)
					near(t, fmt.Sprintf("speed at %g s", x), c.Values[k], v, 1e-8)
				}
			}
			_, x := r.marched(o.End)
			near(t, "distance by the march", o.Book.Vehicle.Distance, x, 1e-8*x)
		})
	}
}

// driven is a brake corner with the speed of its vehicle in its films.
func driven(phases string) string {
	return `{"workheat": 1,
	"nodes": {"disc": {"mass": "7 kg", "material": "grey iron"}, "pads": {"heat capacity": "600 J/K", "start": "20 degC"},
	          "face": {"massless": true}, "air": {"held": "20 degC"}},
	"conductances": {
		"film": {"kind": "convection", "between": ["disc", "air"], "area": "0.12 m^2", "coefficient": "8 W/(m^2 K)", "speed coefficient": "6 W/(m^2 K)", "speed of": "car"},
		"vents": {"kind": "vent-passage convection", "between": ["disc", "air"], "area": "0.08 m^2", "speed of": "car", "outer diameter": "280 mm",
			"inner diameter": "160 mm", "passage width": "11 mm", "passage height": "8 mm"},
		"skin": {"kind": "conduction", "between": ["face", "disc"], "value": "400 W/K"},
		"joint": {"kind": "contact", "between": ["face", "pads"], "coefficient": "500 W/(m^2 K)", "area": "80 cm^2"},
		"glow": {"kind": "radiation", "between": ["disc", "air"], "area": "0.1 m^2", "emissivity": 0.6}},
	"bodies": {"car": {"kind": "road vehicle", "mass": "1500 kg", "rotating mass factor": 1.06, "rolling resistance": 0.012, "drag area": "0.65 m^2", "wheel radius": "0.31 m"}},
	"dissipators": {"front": {"kind": "friction pad", "slows": "car", "part of braking": 0.35, "heats": {"face": 0.95, "pads": 0.05}}},
	"duty": [` + phases + `]}`
}

// A speed trace says what phases say: the same ramps give the same heat and the same temperatures. One brake phase
// is so gentle that the brakes let go on the way, where air drag alone slows the car.
func TestTraceEqualsPhases(t *testing.T) {
	phases := finish(t, load(t, driven(`
		{"brake": {"from": "108 km/h", "to": "54 km/h", "deceleration": "3 m/s^2"}},
		{"speed up": {"to": "108 km/h", "in": "10 s"}},
		{"hold": {"for": "15 s"}},
		{"brake": {"to": "72 km/h", "deceleration": "0.25 m/s^2"}},
		{"brake": {"to": "0 km/h", "deceleration": "5 m/s^2"}},
		{"rest": {"for": "30 s"}}`), nil), 1e-8)
	open := func(name string) ([]byte, error) { return os.ReadFile("testdata/" + name) }
	traces := map[string]string{
		"file":  `{"follow": {"file": "stops-trace.csv", "time": "time", "speed": "road speed"}}`,
		"table": `{"follow": {"table": [["0 s", "30 m/s"], ["5 s", "15 m/s"], ["15 s", "30 m/s"], ["30 s", "30 m/s"], ["70 s", "20 m/s"], ["74 s", "0 m/s"], ["104 s", "0 m/s"]]}}`,
	}
	for name, phase := range traces {
		t.Run(name, func(t *testing.T) {
			trace := finish(t, load(t, driven(phase), open), 1e-8)
			near(t, "end", trace.End, phases.End, 1e-9)
			near(t, "distance", trace.Book.Vehicle.Distance, phases.Book.Vehicle.Distance, 1e-6)
			near(t, "work", trace.work("front"), phases.work("front"), 1e-9*phases.work("front"))
			for _, node := range []string{"disc", "pads", "face"} {
				for x := 0.0; x <= 104; x += 0.5 {
					near(t, fmt.Sprintf("%s at %g s", node, x), trace.at(node, x), phases.at(node, x), 1e-6)
				}
			}
		})
	}
	if lost := phases.Book.Vehicle.Air + phases.Book.Vehicle.Rolling; lost < 0.1*phases.Book.Vehicle.Brake {
		t.Errorf("the resistances take only %g J: the trace checks too little", lost)
	}
}
