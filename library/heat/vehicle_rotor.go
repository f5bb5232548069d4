package heat

import (
	"workheat/library/correlation"
	"workheat/network/element"
	"workheat/network/unit"
)

// VehicleRotor returns the kind of a solid disc face on a moving vehicle.
func VehicleRotor() *element.Kind {
	return &element.Kind{
		Section: element.Conductances,
		Name:    "vehicle-rotor convection",
		About:   "Heat from the solid faces of a brake disc on a moving road vehicle, by road speed.",
		Formula: "q = factor * area * (h + still) * (T_A - T_B); with Re = v D/nu, D = diameter: h D/k = 0.70 Re^0.55 up to Re 2.04e5, " +
			"0.04 Re^0.8 from 2.76e5, smooth in between; air at the mean of T_A and T_B",
		Source: "Limpert, Brake Design and Safety: turbulent law seen in use, the rest from memory. " +
			"Air at 1 atm, film -73 to 727 degC, Re up to 3e6 (our bound)",
		Fields: filmFields(element.Field{Key: "diameter", About: "outer diameter of the disc", Want: unit.Length}.Positive().Must()),
		Batch: func() element.Batch {
			return &films{make: rotorLaw, tooFast: "the Reynolds number of the disc is above 3e6"}
		},
	}
}

func rotorLaw(d *element.Declaration) law {
	rotor := correlation.VehicleRotor{Diameter: d.Number("diameter"), Air: air}
	return law{rotor, rotor.Plain, false}
}
