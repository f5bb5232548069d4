package heat

import (
	"workheat/library/correlation"
	"workheat/network/element"
	"workheat/network/unit"
)

// VentPassage returns the kind of the passages of a ventilated disc.
func VentPassage() *element.Kind {
	return &element.Kind{
		Section: element.Conductances,
		Name:    "vent-passage convection",
		About:   "Heat from the walls of the passages between the vanes of a ventilated disc, which pumps air as it turns.",
		Formula: "q = factor * area * (h + still) * (T_A - T_B); with Re = v d/nu, d = 2 w b/(w + b) of the mean width w and height b, l the length, " +
			"v = the mean of w0 (ro^2 - ri^2)^(1/2) at the inlet, w0 the angular speed, and its outlet value by the ratio of areas: " +
			"h d/k = 1.86 (Re Pr d/l)^(1/3) up to Re 2300, 0.023 (1 + (d/l)^0.67) Re^0.8 Pr^0.33 from 1e4, smooth in between; " +
			"air at the mean of T_A and T_B",
		Source: "Limpert, Brake Design and Safety, from memory; factors of Sieder and Tate and of Dittus and Boelter. " +
			"Air at 1 atm, film -73 to 727 degC, Re up to 1.2e5",
		Fields: filmFields(
			element.Field{Key: "outer diameter", About: "diameter at which the passages end", Want: unit.Length}.Positive().Must(),
			element.Field{Key: "inner diameter", About: "diameter at which the passages begin", Want: unit.Length}.Positive().Must(),
			element.Field{Key: "passage width", About: "clear width between two vanes at the inner diameter", Want: unit.Length}.Positive().Must(),
			element.Field{Key: "outlet width", About: "clear width between two vanes at the outer diameter; left out, the passage width", Want: unit.Length}.Positive(),
			element.Field{Key: "passage height", About: "clear axial gap between the two cheeks", Want: unit.Length}.Positive().Must(),
			element.Field{Key: "passage length", About: "length along the vane; left out, half the difference of the diameters", Want: unit.Length}.Positive(),
			wheel(),
		),
		Check: checkVent,
		Batch: func() element.Batch {
			return &films{make: ventLaw, tooFast: "the Reynolds number of the passages is above 1.2e5"}
		},
	}
}

// checkVent asks for a rolling radius and for diameters in order.
func checkVent(d *element.Declaration) {
	checkWheel(d)
	if d.Number("inner diameter") >= d.Number("outer diameter") {
		d.Report("inner diameter", "the inner diameter is not below the outer diameter", "check the two; the air flows from inner to outer")
	}
}

func ventLaw(d *element.Declaration) law {
	passage := correlation.VentPassage{
		Inner:       d.Number("inner diameter") / 2,
		Outer:       d.Number("outer diameter") / 2,
		InletWidth:  d.Number("passage width"),
		OutletWidth: d.Number("passage width"),
		Height:      d.Number("passage height"),
		Length:      d.Number("passage length"),
		Air:         air,
	}
	if d.Has("outlet width") {
		passage.OutletWidth = d.Number("outlet width")
	}
	return law{passage.Law(), passage.Plain, true}
}
