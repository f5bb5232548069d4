package rosenbrock

// The sums over stages, unrolled by up to four stages a pass.

// combine writes y = y0 + d·Σ aⱼvⱼ and g = Σ cⱼvⱼ over at least one stage.
func combine(y, g, y0, d []float64, v [][]float64, a, c []float64) {
	n := len(y)
	g, y0, d = g[:n], y0[:n], d[:n]
	j := len(v) % 4
	switch j {
	case 0:
		j = 4
		v0, v1, v2, v3 := v[0][:n], v[1][:n], v[2][:n], v[3][:n]
		a0, a1, a2, a3, c0, c1, c2, c3 := a[0], a[1], a[2], a[3], c[0], c[1], c[2], c[3]
		for i := range y {
			x0, x1, x2, x3 := v0[i], v1[i], v2[i], v3[i]
			y[i] = y0[i] + d[i]*((a0*x0+a1*x1)+(a2*x2+a3*x3))
			g[i] = (c0*x0 + c1*x1) + (c2*x2 + c3*x3)
		}
	case 1:
		v0, a0, c0 := v[0][:n], a[0], c[0]
		for i := range y {
			y[i] = y0[i] + d[i]*(a0*v0[i])
			g[i] = c0 * v0[i]
		}
	case 2:
		v0, v1 := v[0][:n], v[1][:n]
		a0, a1, c0, c1 := a[0], a[1], c[0], c[1]
		for i := range y {
			y[i] = y0[i] + d[i]*(a0*v0[i]+a1*v1[i])
			g[i] = c0*v0[i] + c1*v1[i]
		}
	case 3:
		v0, v1, v2 := v[0][:n], v[1][:n], v[2][:n]
		a0, a1, a2, c0, c1, c2 := a[0], a[1], a[2], c[0], c[1], c[2]
		for i := range y {
			y[i] = y0[i] + d[i]*((a0*v0[i]+a1*v1[i])+a2*v2[i])
			g[i] = (c0*v0[i] + c1*v1[i]) + c2*v2[i]
		}
	}
	for ; j < len(v); j += 4 {
		v0, v1, v2, v3 := v[j][:n], v[j+1][:n], v[j+2][:n], v[j+3][:n]
		a0, a1, a2, a3, c0, c1, c2, c3 := a[j], a[j+1], a[j+2], a[j+3], c[j], c[j+1], c[j+2], c[j+3]
		for i := range y {
			x0, x1, x2, x3 := v0[i], v1[i], v2[i], v3[i]
			y[i] += d[i] * ((a0*x0 + a1*x1) + (a2*x2 + a3*x3))
			g[i] += (c0*x0 + c1*x1) + (c2*x2 + c3*x3)
		}
	}
}

// extend writes y += d·(the last v) and g = Σ cⱼvⱼ.
func extend(y, g, d []float64, v [][]float64, c []float64) {
	n := len(y)
	d, last := d[:n], v[len(v)-1][:n]
	for i := range y {
		y[i] += d[i] * last[i]
	}
	sum(g, v, c)
}

// sum writes dst = Σ cⱼvⱼ.
func sum(dst []float64, v [][]float64, c []float64) {
	n := len(dst)
	c = c[:len(v)]
	j := len(v) % 4
	switch j {
	case 0:
		clear(dst)
	case 1:
		v0, c0 := v[0][:n], c[0]
		for i := range dst {
			dst[i] = c0 * v0[i]
		}
	case 2:
		v0, v1, c0, c1 := v[0][:n], v[1][:n], c[0], c[1]
		for i := range dst {
			dst[i] = c0*v0[i] + c1*v1[i]
		}
	case 3:
		v0, v1, v2, c0, c1, c2 := v[0][:n], v[1][:n], v[2][:n], c[0], c[1], c[2]
		for i := range dst {
			dst[i] = (c0*v0[i] + c1*v1[i]) + c2*v2[i]
		}
	}
	for ; j < len(v); j += 4 {
		v0, v1, v2, v3 := v[j][:n], v[j+1][:n], v[j+2][:n], v[j+3][:n]
		c0, c1, c2, c3 := c[j], c[j+1], c[j+2], c[j+3]
		for i := range dst {
			dst[i] += (c0*v0[i] + c1*v1[i]) + (c2*v2[i] + c3*v3[i])
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

// addScaled writes g = f + s·g.
func addScaled(g, f, s []float64) {
	f, s = f[:len(g)], s[:len(g)]
	for i := range g {
		g[i] = f[i] + s[i]*g[i]
	}
}

// addDriven writes g = f + s·g + c·x.
func addDriven(g, f, s []float64, c float64, x []float64) {
	f, s, x = f[:len(g)], s[:len(g)], x[:len(g)]
	for i := range g {
		g[i] = (f[i] + c*x[i]) + s[i]*g[i]
	}
}

// finishStiff writes err = d·v and y1 = y + err.
func finishStiff(y1, err, y, d, v []float64) {
	n := len(y1)
	err, y, d, v = err[:n], y[:n], d[:n], v[:n]
	for i := range y1 {
		e := d[i] * v[i]
		err[i] = e
		y1[i] = y[i] + e
	}
}
