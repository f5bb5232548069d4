package rosenbrock

// The sums over stages, unrolled by up to four stages a pass: they are a quarter of a step's time.

// combine writes y = y0 + Σ aⱼuⱼ and g = Σ cⱼuⱼ.
func combine(y, g, y0 []float64, u [][]float64, a, c []float64) {
	n := len(y)
	g, y0 = g[:n], y0[:n]
	j := 0
	switch len(u) % 4 {
	case 0:
		copy(y, y0)
		for i := range g {
			g[i] = 0
		}
	case 1:
		u0, a0, c0 := u[0][:n], a[0], c[0]
		for i := range y {
			y[i] = y0[i] + a0*u0[i]
			g[i] = c0 * u0[i]
		}
		j = 1
	case 2:
		u0, u1 := u[0][:n], u[1][:n]
		a0, a1, c0, c1 := a[0], a[1], c[0], c[1]
		for i := range y {
			y[i] = y0[i] + a0*u0[i] + a1*u1[i]
			g[i] = c0*u0[i] + c1*u1[i]
		}
		j = 2
	case 3:
		u0, u1, u2 := u[0][:n], u[1][:n], u[2][:n]
		a0, a1, a2, c0, c1, c2 := a[0], a[1], a[2], c[0], c[1], c[2]
		for i := range y {
			y[i] = y0[i] + a0*u0[i] + a1*u1[i] + a2*u2[i]
			g[i] = c0*u0[i] + c1*u1[i] + c2*u2[i]
		}
		j = 3
	}
	for ; j < len(u); j += 4 {
		u0, u1, u2, u3 := u[j][:n], u[j+1][:n], u[j+2][:n], u[j+3][:n]
		a0, a1, a2, a3 := a[j], a[j+1], a[j+2], a[j+3]
		c0, c1, c2, c3 := c[j], c[j+1], c[j+2], c[j+3]
		for i := range y {
			x0, x1, x2, x3 := u0[i], u1[i], u2[i], u3[i]
			y[i] += (a0*x0 + a1*x1) + (a2*x2 + a3*x3)
			g[i] += (c0*x0 + c1*x1) + (c2*x2 + c3*x3)
		}
	}
}

// combineOne writes y += the last u, and g = Σ cⱼuⱼ.
func combineOne(y, g []float64, u [][]float64, c []float64) {
	n := len(y)
	last := u[len(u)-1][:n]
	for i := range y {
		y[i] += last[i]
	}
	sum(g, nil, u, c)
}

// sum writes dst = base + Σ cⱼuⱼ, leaving out zero coefficients; base nil stands for zero.
func sum(dst, base []float64, u [][]float64, c []float64) {
	n := len(dst)
	if base == nil {
		for i := range dst {
			dst[i] = 0
		}
	} else {
		copy(dst, base)
	}
	j := 0
	for ; j+4 <= len(u); j += 4 {
		c0, c1, c2, c3 := c[j], c[j+1], c[j+2], c[j+3]
		if c0 == 0 && c1 == 0 && c2 == 0 && c3 == 0 {
			continue
		}
		u0, u1, u2, u3 := u[j][:n], u[j+1][:n], u[j+2][:n], u[j+3][:n]
		for i := range dst {
			dst[i] += (c0*u0[i] + c1*u1[i]) + (c2*u2[i] + c3*u3[i])
		}
	}
	for ; j < len(u); j++ {
		if c[j] != 0 {
			axpy(dst, c[j], u[j])
		}
	}
}

// axpy adds c·x to dst.
func axpy(dst []float64, c float64, x []float64) {
	x = x[:len(dst)]
	for i := range dst {
		dst[i] += c * x[i]
	}
}

// add adds x to dst.
func add(dst, x []float64) {
	x = x[:len(dst)]
	for i := range dst {
		dst[i] += x[i]
	}
}

// scale writes dst = d·v.
func scale(dst, d, v []float64) {
	d, v = d[:len(dst)], v[:len(dst)]
	for i := range dst {
		dst[i] = d[i] * v[i]
	}
}

// weigh writes dst = c·x if first, else adds it.
func weigh(dst []float64, c float64, x []float64, first bool) {
	x = x[:len(dst)]
	if first {
		for i := range dst {
			dst[i] = c * x[i]
		}
		return
	}
	for i := range dst {
		dst[i] += c * x[i]
	}
}
