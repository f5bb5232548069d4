package energy

import "math"

// gravity is the standard acceleration of free fall, m/s^2 (exact by convention).
const gravity = 9.80665

// checkVehicle counts the vehicle's account again from its speed alone, step by step: what its kinetic and
// potential energy and its resistances leave over was braking if it is too much and driving if it is too
// little. The braking power of the signals, which the dissipators took, is counted beside it.
func (w *witness) checkVehicle() Check {
	c := Check{Layer: 2, Name: "vehicle", Unit: "J",
		About: "the vehicle's account against its speed, step by step, and the area under its braking power"}
	r, v := w.run, &w.run.Road
	var sum VehicleLine
	power, scale := 0.0, 0.0
	for k := range r.Tape.Steps() {
		start, h, segment, _ := r.Tape.Step(k)
		slope := math.Atan(v.Grade(segment))
		before, after := w.speed(segment, start), w.speed(segment, start+h)
		way, cubes := 0.0, 0.0
		for g, theta := range gaussPoint {
			x := w.speed(segment, start+theta*h)
			way += gaussWeight[g] * h * x
			cubes += gaussWeight[g] * h * x * x * x
			power += gaussWeight[g] * h * w.state.Signal[v.Brake]
		}
		kinetic := v.Rotating * v.Mass * (after*after - before*before) / 2
		climb, rolling := v.Mass*gravity*math.Sin(slope)*way, v.Rolling*v.Mass*gravity*math.Cos(slope)*way
		air := v.Air * v.DragArea * cubes / 2
		over := kinetic + climb + rolling + air
		sum.Distance += way
		sum.Kinetic += kinetic
		sum.Climb += climb
		sum.Rolling += rolling
		sum.Air += air
		sum.Brake += math.Max(0, -over)
		sum.Drive += math.Max(0, over)
		scale += abs(kinetic) + abs(climb) + rolling + air
	}
	a := r.Vehicle
	c.Allowed = r.exact() * scale
	c.add(a.Kinetic-sum.Kinetic, "kinetic energy")
	c.add(a.Climb-sum.Climb, "climb")
	c.add(a.Rolling-sum.Rolling, "rolling resistance")
	c.add(a.Air-sum.Air, "air drag")
	c.add(a.Drive-sum.Drive, "drive")
	c.add(a.Brake-sum.Brake, "brakes")
	c.add(power-sum.Brake, "braking power")
	c.close()
	return c
}

// speed returns the vehicle's speed at a time of a segment.
func (w *witness) speed(segment int, t float64) float64 {
	w.run.Signals(segment, t, w.state.Signal, w.state.Rate)
	return w.state.Signal[w.run.Road.Speed]
}
