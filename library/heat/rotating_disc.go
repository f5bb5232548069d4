package heat

import (
	"workheat/library/correlation"
	"workheat/network/element"
	"workheat/network/unit"
)

// RotatingDisc returns the kind of a disc face that spins in still air.
func RotatingDisc() *element.Kind {
	return &element.Kind{
		Section: element.Conductances,
		Name:    "rotating-disc convection",
		About:   "Heat from the flat faces of a disc that turns with the wheel in air that stands still, as on a test stand.",
		Formula: "q = factor * area * (h + still) * (T_A - T_B); with Re = w r^2/nu, r = diameter/2 and rc/r = (2.5e5/Re)^(1/2): " +
			"h r/k = 0.36 Re^(1/2) up to Re 2e5, 0.36 Re^(1/2) (rc/r)^2 + 0.015 Re^0.8 (1 - (rc/r)^2.6) from 3e5, smooth in between; " +
			"air at the mean of T_A and T_B",
		Source: "Kreith, Principles of Heat Transfer, rotating disc, from memory; the laminar constant lies 10 % above the similarity " +
			"solution of the isothermal disc, the turbulent one within 1 % of the analogy of heat and momentum. Air at 1 atm, film -73 to 727 degC, Re up to 1e7. " +
			"A disc on a moving vehicle is also blown on: see vehicle-rotor convection",
		Fields: filmFields(
			element.Field{Key: "diameter", About: "outer diameter of the disc", Want: unit.Length}.Positive().Must(),
			wheel(),
		),
		Check: checkWheel,
		Batch: func() element.Batch {
			return &films{make: discLaw, tooFast: "the Reynolds number of the disc is above 1e7"}
		},
	}
}

func discLaw(d *element.Declaration) law {
	disc := correlation.RotatingDisc{Radius: d.Number("diameter") / 2, Air: air}
	return law{disc, disc.Plain, true}
}
