package problems

import "math"

// Pleiades are seven stars in a plane that pass each other closely; not stiff.
func Pleiades() *Case {
	const n = 7
	return &Case{
		Name: "Pleiades", Steps: 185, Source: "Bari test set",
		Start: []float64{3.0, 3.0, -1.0, -3.0, 2.0, -2.0, 2.0, 3.0, -3.0, 2.0, 0.0, 0.0, -4.0, 4.0, 0.0, 0.0, 0.0, 0.0, 0.0, 1.75, -1.5, 0.0, 0.0, 0.0, -1.25, 1.0, 0.0, 0.0}, Floor: []float64{1},
		Rates: func(f []float64, _ float64, y []float64) {
			copy(f[:2*n], y[2*n:])
			for i := range n {
				ax, ay := 0.0, 0.0
				for j := range n {
					if j != i {
						dx, dy := y[j]-y[i], y[n+j]-y[n+i]
						r := math.Hypot(dx, dy)
						ax += float64(j+1) * dx / (r * r * r)
						ay += float64(j+1) * dy / (r * r * r)
					}
				}
				f[2*n+i], f[3*n+i] = ax, ay
			}
		},
		Slopes: func(add func(i, j int, v float64), _ []float64, _ float64, y []float64) {
			for i := range 2 * n {
				add(i, 2*n+i, 1)
			}
			for i := range n {
				for j := range n {
					if j == i {
						continue
					}
					dx, dy := y[j]-y[i], y[n+j]-y[n+i]
					r := math.Hypot(dx, dy)
					m := float64(j+1) / (r * r * r)
					xx, xy, yy := m*(1-3*dx*dx/(r*r)), -3*m*dx*dy/(r*r), m*(1-3*dy*dy/(r*r))
					for _, k := range []struct {
						at   int
						sign float64
					}{{j, 1}, {i, -1}} {
						add(2*n+i, k.at, k.sign*xx)
						add(2*n+i, n+k.at, k.sign*xy)
						add(3*n+i, k.at, k.sign*xy)
						add(3*n+i, n+k.at, k.sign*yy)
					}
				}
			}
		},
		Loses: 2.3, Why: "close passages of the stars multiply errors",
		Answers: []Answer{
			{T: 3.0, Y: []float64{0.3706139143970502, 3.237284092057233, -3.222559032418324, 0.659709145577531, 0.3425581707156584, 1.562172101400631, -0.7003092922212495, -3.943437585517392, -3.27138097397255, 5.225081843456543, -2.59061243497747, 1.198213693392275, -0.2429682344935824, 1.09144924042898, 3.417003806314313, 1.354584501625501, -2.590065597810775, 2.025053734714242, -1.155815100160448, -0.8072988170223021, 0.595239635420871, -3.74124496123401, 0.377345968575063, 0.9386858869551074, 0.3667922227200571, -0.347404635380849, 2.344915448180937, -1.947020434263292}, Digits: 11},
		},
	}
}

// Arenstorf is a closed orbit of a small body about earth and moon; not stiff.
func Arenstorf() *Case {
	const mu = 0.012277471
	start := []float64{0.994, 0, 0, -2.00158510637908252240537862224}
	return &Case{
		Name: "Arenstorf", Steps: 132, Source: "Hairer, Nørsett and Wanner, Solving Ordinary Differential Equations I",
		Start: start, Floor: []float64{1},
		Rates: func(f []float64, _ float64, y []float64) {
			x, z := y[0], y[1]
			d1, d2 := math.Pow((x+mu)*(x+mu)+z*z, 1.5), math.Pow((x-1+mu)*(x-1+mu)+z*z, 1.5)
			f[0], f[1] = y[2], y[3]
			f[2] = x + 2*y[3] - (1-mu)*(x+mu)/d1 - mu*(x-1+mu)/d2
			f[3] = z - 2*y[2] - (1-mu)*z/d1 - mu*z/d2
		},
		Slopes: func(add func(i, j int, v float64), _ []float64, _ float64, y []float64) {
			add(0, 2, 1)
			add(1, 3, 1)
			add(2, 3, 2)
			add(3, 2, -2)
			add(2, 0, 1)
			add(3, 1, 1)
			for _, b := range [2][2]float64{{1 - mu, -mu}, {mu, 1 - mu}} {
				x, z := y[0]-b[1], y[1]
				s := x*x + z*z
				m := b[0] / math.Pow(s, 1.5)
				add(2, 0, -m*(1-3*x*x/s))
				add(2, 1, 3*m*x*z/s)
				add(3, 0, 3*m*x*z/s)
				add(3, 1, -m*(1-3*z*z/s))
			}
		},
		Loses: 4.7, Why: "the orbit passes the moon closely, which multiplies errors",
		Answers: []Answer{{T: 17.0652165601579625588917206249, Y: start, Digits: 9.5}},
	}
}

// ProtheroRobinson decays at the rate −lambda towards a moving value, sin(t + 1): y' = λ(y − φ) + φ' with λ
// the argument, and the solution is φ itself.
//
// Source: Prothero and Robinson, Mathematics of Computation 28 (1974) 145.
func ProtheroRobinson(lambda, end float64) *Case {
	phi, dphi := func(t float64) float64 { return math.Sin(t + 1) }, func(t float64) float64 { return math.Cos(t + 1) }
	return &Case{
		Name: "Prothero-Robinson", Steps: 8, Source: "closed form", Start: []float64{phi(0)}, Floor: []float64{1},
		Rates: func(f []float64, t float64, y []float64) { f[0] = lambda*(y[0]-phi(t)) + dphi(t) },
		Slopes: func(add func(i, j int, v float64), ft []float64, t float64, _ []float64) {
			add(0, 0, lambda)
			ft[0] = -lambda*dphi(t) - phi(t)
		},
		Answers: []Answer{{T: end, Y: []float64{phi(end)}, Digits: 15}},
	}
}
