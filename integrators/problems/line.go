package problems

import "math"

// MedicalAkzoNobel is the penetration of antibodies into a tissue, a line of 200 cells with a supply that
// stops at t = 5. The published values (made at a tolerance of 1e-10) hold to 6.5 digits; the answer is that
// of an own calculation by a Radau method at 1e-9 and 1e-10, which agree to 9.6 digits.
func MedicalAkzoNobel() *Case {
	const n, k, c = 200, 100, 4
	supply := 2.0
	slopes := func(j int) (near, far float64) { // advection and diffusion at cell j
		z := float64(j) / n
		return 2 * math.Pow(z-1, 3) / (c * c) * n / 2, math.Pow(z-1, 4) / (c * c) * n * n
	}
	start := make([]float64, 2*n)
	for j := range n {
		start[2*j+1] = 1
	}
	ma := &Case{
		Name: "Medical Akzo Nobel", Steps: 270, Source: "Bari test set", Start: start, Heavy: true,
		Breaks: []float64{5}, Floor: []float64{1e-3},
		Answers: []Answer{{T: 20, Digits: 9, Index: []int{78, 132, 148, 170, 198, 197, 199, 201, 205, 209, 213},
			Y: []float64{0.00023399422229566114, 0.0003576835966812783, 0.0003595616025778918, 0.0003085949840638448, 0.0001173741296163184, 1.0966248085084916e-07, 6.190822024288437e-06, 0.00019862733202200017, 0.03234526078925293, 0.40269805307456036, 0.8409284546645169}}},
	}
	ma.Enter = func(t float64) {
		supply = 2
		if t >= 5 {
			supply = 0
		}
	}
	ma.Rates = func(f []float64, _ float64, y []float64) {
		for j := range n {
			u, v := y[2*j], y[2*j+1]
			left, right := supply, u
			if j > 0 {
				left = y[2*j-2]
			}
			if j < n-1 {
				right = y[2*j+2]
			}
			a, b := slopes(j + 1)
			f[2*j] = a*(right-left) + b*(left-2*u+right) - k*u*v
			f[2*j+1] = -k * u * v
		}
	}
	ma.Slopes = func(add func(i, j int, v float64), _ []float64, _ float64, y []float64) {
		for j := range n {
			a, b := slopes(j + 1)
			i := 2 * j
			own := -2*b - k*y[i+1]
			if j > 0 {
				add(i, i-2, b-a)
			}
			if j < n-1 {
				add(i, i+2, b+a)
			} else {
				own += b + a
			}
			add(i, i, own)
			add(i, i+1, -k*y[i])
			add(i+1, i, -k*y[i+1])
			add(i+1, i+1, -k*y[i])
		}
	}
	return ma
}

// Brusselator is a reaction that diffuses along a line of 500 points.
func Brusselator() *Case {
	const n = 500
	const g = 0.02 * (n + 1) * (n + 1)
	start := make([]float64, 2*n)
	for i := range n {
		start[2*i] = 1 + 0.5*math.Sin(2*math.Pi*float64(i+1)/(n+1))
		start[2*i+1] = 3
	}
	edge := [2]float64{1, 3}
	return &Case{
		Name: "Brusselator", Steps: 43, Source: "Hairer and Wanner's stiff test set", Start: start, Heavy: true, Floor: []float64{1e-2},
		Rates: func(f []float64, _ float64, y []float64) {
			at := func(i int) float64 {
				if i < 0 || i >= 2*n {
					return edge[i&1]
				}
				return y[i]
			}
			for i := 0; i < 2*n; i += 2 {
				u, v := y[i], y[i+1]
				f[i] = 1 + u*u*v - 4*u + g*(at(i-2)-2*u+at(i+2))
				f[i+1] = 3*u - u*u*v + g*(at(i-1)-2*v+at(i+3))
			}
		},
		Slopes: func(add func(i, j int, v float64), _ []float64, _ float64, y []float64) {
			for i := 0; i < 2*n; i += 2 {
				u, v := y[i], y[i+1]
				add(i, i, 2*u*v-4-2*g)
				add(i, i+1, u*u)
				add(i+1, i, 3-2*u*v)
				add(i+1, i+1, -u*u-2*g)
				for k := i; k < i+2; k++ {
					if k >= 2 {
						add(k, k-2, g)
					}
					if k < 2*n-2 {
						add(k, k+2, g)
					}
				}
			}
		},
		Answers: []Answer{{T: 10, Digits: 11, Index: []int{0, 7, 14, 21, 28, 35, 42, 49, 56, 63, 994},
			Y: []float64{0.9949197002317599, 3.0213845767604077, 0.9594350193986054, 3.058598977816542, 0.9243010095428502, 3.0952478919989637, 0.8897959106772672, 3.131011828905473, 0.8561653620284367, 3.165610119877016, 0.9848367306701233}}},
	}
}
