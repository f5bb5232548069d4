package problems

import "math"

// The transistor amplifier's values, in SI units.
const (
	ampUb, ampUf, ampAlpha, ampBeta = 6.0, 0.026, 0.99, 1e-6
	ampR0, ampR                     = 1000.0, 9000.0
	ampDrive                        = 200 * math.Pi
)

// TransistorAmplifier is a two-stage amplifier. Its published mass matrix couples three pairs of nodes
// through capacitors; with the capacitors' voltages y1−y2, y4−y5 and y7−y8 in place of y1, y4 and y7, and
// the sums of the pairs' equations as algebraic ones, it becomes diagonal (index 1).
func TransistorAmplifier() *Case {
	want := []float64{-0.005562145012262709, 3.006522471903042, 2.849958788608128, 2.926422536206241, 2.704617865010554, 2.761837778393145, 4.770927631616772, 1.236995868091548}
	start := []float64{0, 3, 3, 6, 3, 3, 6, 0}
	return &Case{
		Name: "Transistor amplifier", Steps: 1837, Source: "Bari test set",
		Start: voltages(start), Mass: []float64{1e-6, 0, 2e-6, 3e-6, 0, 4e-6, 5e-6, 0}, Floor: []float64{1e-2},
		Rates: amplifierRates, Slopes: amplifierSlopes,
		Answers: []Answer{{T: 0.2, Y: voltages(want), Digits: 12}},
	}
}

// voltages replaces the nodes left of a capacitor by the voltage across it.
func voltages(node []float64) []float64 {
	y := append([]float64(nil), node...)
	y[0] -= y[1]
	y[3] -= y[4]
	y[6] -= y[7]
	return y
}

// gate returns the current of a transistor and its slope.
func gate(u float64) (current, slope float64) {
	e := math.Exp(u / ampUf)
	return ampBeta * (e - 1), ampBeta * e / ampUf
}

func amplifierRates(f []float64, t float64, y []float64) {
	y1, y4, y7 := y[0]+y[1], y[3]+y[4], y[6]+y[7]
	g1, _ := gate(y[1] - y[2])
	g2, _ := gate(y[4] - y[5])
	f1 := (y1 - 0.1*math.Sin(ampDrive*t)) / ampR0
	f4 := (y4-ampUb)/ampR + ampAlpha*g1
	f7 := (y7-ampUb)/ampR + ampAlpha*g2
	f[0] = -f1
	f[1] = -(f1 + y[1]/ampR + (y[1]-ampUb)/ampR + (1-ampAlpha)*g1)
	f[2] = -(y[2]/ampR - g1)
	f[3] = -f4
	f[4] = -(f4 + y[4]/ampR + (y[4]-ampUb)/ampR + (1-ampAlpha)*g2)
	f[5] = -(y[5]/ampR - g2)
	f[6] = -f7
	f[7] = -(f7 + y[7]/ampR)
}

func amplifierSlopes(add func(i, j int, v float64), ft []float64, t float64, y []float64) {
	_, s1 := gate(y[1] - y[2])
	_, s2 := gate(y[4] - y[5])
	const r0, r = 1 / ampR0, 1 / ampR
	drive := 0.1 * ampDrive * math.Cos(ampDrive*t) / ampR0
	ft[0], ft[1] = drive, drive
	for _, i := range []int{0, 1} {
		add(i, 0, -r0)
		add(i, 1, -r0)
	}
	add(1, 1, -2*r-(1-ampAlpha)*s1)
	add(1, 2, (1-ampAlpha)*s1)
	add(2, 1, s1)
	add(2, 2, -r-s1)
	for _, i := range []int{3, 4} {
		add(i, 3, -r)
		add(i, 4, -r)
		add(i, 1, -ampAlpha*s1)
		add(i, 2, ampAlpha*s1)
	}
	add(4, 4, -2*r-(1-ampAlpha)*s2)
	add(4, 5, (1-ampAlpha)*s2)
	add(5, 4, s2)
	add(5, 5, -r-s2)
	for _, i := range []int{6, 7} {
		add(i, 6, -r)
		add(i, 7, -r)
		add(i, 4, -ampAlpha*s2)
		add(i, 5, ampAlpha*s2)
	}
	add(7, 7, -r)
}
