package material

import "workheat/network/element"

// airTable is c [J/(kg K)] and k [W/(m K)] of air over K. Incropera, DeWitt, Bergman and Lavine,
// Fundamentals of Heat and Mass Transfer, Table A.4.
var airTable = [...]struct{ t, c, k float64 }{
	{200, 1007, 18.1e-3},
	{250, 1006, 22.3e-3},
	{300, 1007, 26.3e-3},
	{350, 1009, 30.0e-3},
	{400, 1014, 33.8e-3},
	{450, 1021, 37.3e-3},
	{500, 1030, 40.7e-3},
	{550, 1040, 43.9e-3},
	{600, 1051, 46.9e-3},
	{650, 1063, 49.7e-3},
	{700, 1075, 52.4e-3},
	{750, 1087, 54.9e-3},
	{800, 1099, 57.3e-3},
	{850, 1110, 59.6e-3},
	{900, 1121, 62.0e-3},
	{950, 1131, 64.3e-3},
	{1000, 1141, 66.7e-3},
}

func air() *element.Material {
	n := len(airTable)
	t, c, k := make([]float64, n), make([]float64, n), make([]float64, n)
	for i, row := range airTable {
		t[i], c[i], k[i] = row.t, row.c, row.k
	}
	return &element.Material{
		Name:         "air",
		About:        "dry air at constant pressure; density is that at 300 K and 1 bar",
		Source:       "Incropera, DeWitt, Bergman and Lavine, Table A.4",
		Density:      1.1614,
		Capacity:     element.MustCurve(t, c),
		Conductivity: element.MustCurve(t, k),
		Low:          t[0],
		High:         t[n-1],
	}
}
