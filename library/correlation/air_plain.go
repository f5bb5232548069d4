package correlation

// Plain returns conductivity [W/(m K)], kinematic viscosity [m^2/s] and Prandtl number at temperature t in
// K as At does, by drawing the cubic of each interval from its four control points.
func (a Air) Plain(t float64) (k, nu, pr float64) {
	p := a.Pressure
	if p == 0 {
		p = atmosphere
	}
	return drawn(airConductivity[:], t), drawn(airViscosity[:], t) * airPressure / p, drawn(airPrandtl[:], t)
}

// drawn returns the value at t of the curve through a column of the table.
func drawn(y []float64, t float64) float64 {
	n := len(y)
	slope := func(i int) float64 {
		if i == 0 {
			return -1.5*y[0] + 2*y[1] - 0.5*y[2]
		}
		if i == n-1 {
			return 1.5*y[n-1] - 2*y[n-2] + 0.5*y[n-3]
		}
		return 0.5*y[i+1] - 0.5*y[i-1]
	}
	if t < airLow {
		under := 1 - min((airLow-t)/airStep, 1)
		return y[0] - slope(0)*(1-under*under)/2
	}
	if t >= airHigh {
		over := min((t-airHigh)/airStep, 1)
		return y[n-1] + slope(n-1)*(1-(1-over)*(1-over))/2
	}
	row := 0
	for row < n-2 && t >= airLow+airStep*float64(row+1) {
		row++
	}
	b := (t - airLow - airStep*float64(row)) / airStep
	a := 1 - b
	first, second := y[row]+slope(row)/3, y[row+1]-slope(row+1)/3
	return a*a*a*y[row] + 3*a*a*b*first + 3*a*b*b*second + b*b*b*y[row+1]
}
