package problems

import (
	"math"
	"slices"
)

// VanDerPol is the relaxation oscillator in slow time, with 1/ε = 1e6.
func VanDerPol() *Case {
	const eps = 1e-6
	return &Case{
		Name: "Van der Pol, slow time", Steps: 2205, Source: "Hairer and Wanner's stiff test set; 2 also in the Bari set",
		Start: []float64{2, 0}, Floor: []float64{1e-2},
		Rates: func(f []float64, _ float64, y []float64) {
			f[0] = y[1]
			f[1] = ((1-y[0]*y[0])*y[1] - y[0]) / eps
		},
		Slopes: func(add func(i, j int, v float64), _ []float64, _ float64, y []float64) {
			add(0, 1, 1)
			add(1, 0, (-2*y[0]*y[1]-1)/eps)
			add(1, 1, (1-y[0]*y[0])/eps)
		},
		Answers: []Answer{
			{T: 1.0, Y: []float64{-1.86364625480813, 0.753543086543546}, Digits: 12},
			{T: 2.0, Y: []float64{1.706167732170456, -0.8928097010248257}, Digits: 12},
			{T: 3.0, Y: []float64{-1.510606936744095, 1.178380000730945}, Digits: 12},
			{T: 4.0, Y: []float64{1.194414677695905, -2.799585996540082}, Digits: 12},
			{T: 5.0, Y: []float64{1.890428596416747, -0.734511868016694}, Digits: 12},
			{T: 6.0, Y: []float64{-1.737716306805883, 0.8604008653025923}, Digits: 12},
			{T: 7.0, Y: []float64{1.551614645548223, -1.102382892533321}, Digits: 12},
			{T: 8.0, Y: []float64{-1.278631984330405, 2.013890883009155}, Digits: 12},
			{T: 9.0, Y: []float64{-1.91655294948983, 0.7169573003463228}, Digits: 12},
			{T: 10.0, Y: []float64{1.768163792391936, -0.8315276407898496}, Digits: 12},
			{T: 11.0, Y: []float64{-1.590150544829062, 1.040279389212485}, Digits: 12},
		},
	}
}

// VanDerPolFast is the same oscillator in fast time, with μ = 1000.
func VanDerPolFast() *Case {
	const mu = 1000
	return &Case{
		Name: "Van der Pol, fast time", Steps: 361, Source: "Bari test set",
		Start: []float64{2, 0}, Floor: []float64{1e-2, 1e-5},
		Rates: func(f []float64, _ float64, y []float64) {
			f[0] = y[1]
			f[1] = mu*(1-y[0]*y[0])*y[1] - y[0]
		},
		Slopes: func(add func(i, j int, v float64), _ []float64, _ float64, y []float64) {
			add(0, 1, 1)
			add(1, 0, -2*mu*y[0]*y[1]-1)
			add(1, 1, mu*(1-y[0]*y[0]))
		},
		Answers: []Answer{
			{T: 2000.0, Y: []float64{1.706167732170469, -0.0008928097010248125}, Digits: 13},
		},
	}
}

// RingModulator mixes a low with a high frequency through four diodes (Horneber 1976). The answer is that
// of an own calculation of order 9 in extended precision, which agrees with the published one to 9.6
// digits; that one was made at a tolerance of 1e-12.
func RingModulator() *Case {
	return &Case{
		Name: "Ring modulator", Steps: 48440, Source: "Bari test set", Heavy: true,
		Start: make([]float64, 15), Floor: ringFloor(),
		Rates: ringRates, Slopes: ringSlopes,
		Answers: []Answer{{T: 1e-3, Digits: 9.5, Y: []float64{-0.023390573584371646, -0.00736748548600828, 0.2582956709996102, -0.40644657205838286, -0.4039455664451258, 0.26079667661286704, 0.11067618612732982, 2.939904342433003e-07, -2.8400299330664698e-08, 0.0007267198267291427, 0.0007929487197023263, -0.0007255283495765873, -0.0007941401968548818, 7.088495416875679e-05, 2.3900590752771064e-05}}},
	}
}

// The circuit's values, in SI units.
const (
	ringC, ringCs, ringCp     = 1.6e-8, 2e-12, 1e-8
	ringR, ringRp, ringLh     = 25e3, 50.0, 4.45
	ringLs1, ringLs2, ringLs3 = 2e-3, 5e-4, 5e-4
	ringRg1, ringRg2, ringRg3 = 36.3, 17.3, 17.3
	ringRi, ringRc            = 50.0, 600.0
	ringGamma, ringDelta      = 40.67286402e-9, 17.7493332
	ringSlow, ringFast        = 2000 * math.Pi, 20000 * math.Pi
)

func ringFloor() []float64 {
	f := slices.Repeat([]float64{1e-2}, 15) // volts
	for i := 7; i < 15; i++ {
		f[i] = 1e-6 // amperes
	}
	return f
}

// ringDiodes returns the voltages at the four diodes.
func ringDiodes(t float64, y []float64) [4]float64 {
	u := 2 * math.Sin(ringFast*t)
	return [4]float64{y[2] - y[4] - y[6] - u, -y[3] + y[5] - y[6] - u, y[3] + y[4] + y[6] + u, -y[2] - y[5] + y[6] + u}
}

func ringRates(f []float64, t float64, y []float64) {
	var q [4]float64
	for k, u := range ringDiodes(t, y) {
		q[k] = ringGamma * (math.Exp(ringDelta*u) - 1)
	}
	f[0] = (y[7] - y[9]/2 + y[10]/2 + y[13] - y[0]/ringR) / ringC
	f[1] = (y[8] - y[11]/2 + y[12]/2 + y[14] - y[1]/ringR) / ringC
	f[2] = (y[9] - q[0] + q[3]) / ringCs
	f[3] = (-y[10] + q[1] - q[2]) / ringCs
	f[4] = (y[11] + q[0] - q[2]) / ringCs
	f[5] = (-y[12] - q[1] + q[3]) / ringCs
	f[6] = (-y[6]/ringRp + q[0] + q[1] - q[2] - q[3]) / ringCp
	f[7], f[8] = -y[0]/ringLh, -y[1]/ringLh
	f[9] = (y[0]/2 - y[2] - ringRg2*y[9]) / ringLs2
	f[10] = (-y[0]/2 + y[3] - ringRg3*y[10]) / ringLs3
	f[11] = (y[1]/2 - y[4] - ringRg2*y[11]) / ringLs2
	f[12] = (-y[1]/2 + y[5] - ringRg3*y[12]) / ringLs3
	f[13] = (-y[0] + 0.5*math.Sin(ringSlow*t) - (ringRi+ringRg1)*y[13]) / ringLs1
	f[14] = (-y[1] - (ringRc+ringRg1)*y[14]) / ringLs1
}

// ringLinear lists the entries of df/dy that are constant.
var ringLinear = []struct {
	i, j int
	v    float64
}{
	{0, 7, 1 / ringC}, {0, 9, -0.5 / ringC}, {0, 10, 0.5 / ringC}, {0, 13, 1 / ringC}, {0, 0, -1 / (ringR * ringC)},
	{1, 8, 1 / ringC}, {1, 11, -0.5 / ringC}, {1, 12, 0.5 / ringC}, {1, 14, 1 / ringC}, {1, 1, -1 / (ringR * ringC)},
	{2, 9, 1 / ringCs}, {3, 10, -1 / ringCs}, {4, 11, 1 / ringCs}, {5, 12, -1 / ringCs}, {6, 6, -1 / (ringRp * ringCp)},
	{7, 0, -1 / ringLh}, {8, 1, -1 / ringLh},
	{9, 0, 0.5 / ringLs2}, {9, 2, -1 / ringLs2}, {9, 9, -ringRg2 / ringLs2},
	{10, 0, -0.5 / ringLs3}, {10, 3, 1 / ringLs3}, {10, 10, -ringRg3 / ringLs3},
	{11, 1, 0.5 / ringLs2}, {11, 4, -1 / ringLs2}, {11, 11, -ringRg2 / ringLs2},
	{12, 1, -0.5 / ringLs3}, {12, 5, 1 / ringLs3}, {12, 12, -ringRg3 / ringLs3},
	{13, 0, -1 / ringLs1}, {13, 13, -(ringRi + ringRg1) / ringLs1}, {14, 1, -1 / ringLs1}, {14, 14, -(ringRc + ringRg1) / ringLs1},
}

func ringSlopes(add func(i, j int, v float64), ft []float64, t float64, y []float64) {
	for _, e := range ringLinear {
		add(e.i, e.j, e.v)
	}
	// Each diode's voltage by the states 3 to 7 and by the fast voltage, and its current's effect on them.
	by := [4][6]float64{{1, 0, -1, 0, -1, -1}, {0, -1, 0, 1, -1, -1}, {0, 1, 1, 0, 1, 1}, {-1, 0, 0, -1, 1, 1}}
	on := [4][5]float64{{-1, 0, 1, 0, 1}, {0, 1, 0, -1, 1}, {0, -1, -1, 0, -1}, {1, 0, 0, 1, -1}}
	capacity := [5]float64{ringCs, ringCs, ringCs, ringCs, ringCp}
	du := 2 * ringFast * math.Cos(ringFast*t)
	for k, u := range ringDiodes(t, y) {
		g := ringGamma * ringDelta * math.Exp(ringDelta*u)
		for i, effect := range on[k] {
			for j := range 5 {
				add(2+i, 2+j, effect*g*by[k][j]/capacity[i])
			}
			ft[2+i] += effect * g * by[k][5] * du / capacity[i]
		}
	}
	ft[13] += 0.5 * ringSlow * math.Cos(ringSlow*t) / ringLs1
}
