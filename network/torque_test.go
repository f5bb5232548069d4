package network_test

import (
	"math"
	"testing"
)

// A vehicle is braked by a constant torque against air drag, so that its braking power is no polynomial of time: the
// book of a sound run closes at every tolerance, and the work is the braking force times the way, in closed form for
// a mass m under a force F and a drag of c times the square of the speed:
// way = m/(2 c) log((F + c v0^2)/(F + c v1^2)) (any text on dynamics).
func TestWorkOfConstantTorque(t *testing.T) {
	const text = `{"workheat": 1,
	"bodies": {"bus": {"kind": "road vehicle", "mass": "2600 kg", "drag area": "6.5 m^2", "air density": "1.2 kg/m^3", "wheel radius": "0.5 m"}},
	"nodes": {"drum": {"heat capacity": "40 kJ/K"}, "air": {"held": "20 degC"}},
	"conductances": {"film": {"kind": "convection", "between": ["drum", "air"], "coefficient": "10 W/(m^2 K)", "area": "0.5 m^2"}},
	"dissipators": {"brake": {"kind": "friction pad", "slows": "bus", "part of braking": 0.5, "heats": {"drum": 1}}},
	"duty": [{"brake": {"from": "35 m/s", "to": "0 m/s", "torque": "1500 N m"}}]}`
	way := 2600 / (2 * 3.9) * math.Log((3000+3.9*35*35)/3000)
	for _, rel := range []float64{1e-3, 1e-4, 1e-5, 1e-6, 1e-8} {
		o := run(t, text, rel) // which fails if a check of the book does
		near(t, "work over what is due", o.work("brake")/(0.5*3000*way), 1, 0.5*rel+1e-9)
	}
}
