package network_test

import (
	"math"
	"testing"
)

// A lump whose heat capacity jumps, as that of a wax does where it melts, cools through a film of 10 W/K from 200 degC
// in air at 0 degC. Between the jumps it cools to the first order with a time constant of its own: closed form (any
// text on heat transfer). Steps that end at the jumps keep the error to three tenths of the tolerance; with steps
// across them it was 7 to 54 times the tolerance.
func TestCoolingThroughJumps(t *testing.T) {
	const film = 10.0 // W/K
	text := lump(`{"heat capacity": {"table": [["90 degC", "400 J/K"], ["90 degC", "20 kJ/K"], ["92 degC", "20 kJ/K"],
		["92 degC", "800 J/K"]]}, "start": "200 degC"}`, "0 degC", `"area": "1 m^2", "coefficient": "10 W/(m^2 K)"`, "", rest(300))
	melts := 800 / film * math.Log(200./92)
	solid := melts + 20000/film*math.Log(92./90)
	wax := func(x float64) float64 {
		switch {
		case x < melts:
			return celsius(200 * math.Exp(-film/800*x))
		case x < solid:
			return celsius(92 * math.Exp(-film/20000*(x-melts)))
		}
		return celsius(90 * math.Exp(-film/400*(x-solid)))
	}
	for _, rel := range []float64{1e-3, 1e-4, 1e-5, 1e-6, 1e-7, 1e-8} {
		o := run(t, text, rel)
		worst := 0.0
		for x := 1.0; x <= 300; x++ {
			worst = math.Max(worst, math.Abs(o.at("body", x)-wax(x)))
		}
		near(t, "error over the tolerance of the change", worst/(200*rel), 0, 0.5)
	}
}
