package motion

import (
	"math"

	"workheat/network/element"
	"workheat/network/unit"
)

// RoadVehicle returns the kind of a vehicle on a road.
func RoadVehicle() *element.Kind {
	return &element.Kind{
		Section: element.Bodies,
		Name:    "road vehicle",
		About:   "A vehicle that the duty moves along a road; its brakes take what the road, the air and the engine do not.",
		Formula: "braking force = -(rotating mass factor * mass * dv/dt) - mass * g * (sin(slope) + rolling resistance * cos(slope)) - " +
			"0.5 * air density * drag area * v^2, slope = atan(grade), g = 9.80665 m/s^2; when negative, the engine drives",
		Source: "Newton's law and the usual road-load equation; default air density 1.204 kg/m^3: Cengel, Heat Transfer, " +
			"Table A-15, 20 degC and 1 atm. Guide values of rolling resistance and rotating mass factor are from memory",
		Fields: []element.Field{
			element.Field{Key: "mass", About: "mass of the vehicle as loaded", Want: unit.Mass}.Positive().Must(),
			number("rotating mass factor", "inertia with all that turns, over the mass: about 1.05 to 1.15 for a car in top gear, more in low gear", "1").From(1, 100),
			number("rolling resistance", "rolling resistance over weight: about 0.008 to 0.015 on asphalt", "0").From(0, 1),
			element.Field{Key: "drag area", About: "drag coefficient times frontal area", Want: unit.Area, Default: "0 m^2"}.From(0, math.MaxFloat64),
			element.Field{Key: "air density", About: "density of the air for the drag", Want: unit.Density, Default: "1.204 kg/m^3"}.From(0, math.MaxFloat64),
			number("grade", "slope of the road where the duty gives none: rise over run, negative downhill", "0").From(-1, 1),
			element.Field{Key: "wheel radius", About: "rolling radius of the wheels, for what turns with them", Want: unit.Length}.Positive(),
		},
		Vehicle: vehicle,
	}
}

// number is a field for a plain number.
func number(key, about, standard string) element.Field {
	return element.Field{Key: key, About: about, Type: element.Number, Want: unit.Number, Default: standard}
}

func vehicle(d *element.Declaration) element.Vehicle {
	return element.Vehicle{
		Mass:     d.Number("mass"),
		Rotating: d.Number("rotating mass factor"),
		Rolling:  d.Number("rolling resistance"),
		DragArea: d.Number("drag area"),
		Air:      d.Number("air density"),
		Grade:    d.Number("grade"),
		Wheel:    d.Number("wheel radius"),
	}
}
