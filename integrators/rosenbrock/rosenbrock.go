// Package rosenbrock is the family of linearly implicit one-step methods of Rosenbrock and Wanner: one
// factorisation and one solve a stage for each step, no iteration.
package rosenbrock

import "workheat/integrators/ode"

// A Table holds the coefficients of one method in transformed form (Hairer and Wanner, Solving Ordinary
// Differential Equations II, section IV.7): for i = 1..s
//
//	(M/(hγ) − J) Uᵢ = f(t+cᵢh, y0 + Σ aᵢⱼUⱼ) + (M/h) Σ CᵢⱼUⱼ + h dᵢ ∂f/∂t,  y1 = y0 + Σ bᵢUᵢ
//
// with the error estimate Σ errᵢUᵢ and the dense output
//
//	y(θ) = (1−θ) y0 + θ (y1 + (1−θ)(k₁ + θ k₂ + θ² k₃ ...)),  kᵣ = Σ HᵣᵢUᵢ.
type Table struct {
	Label       string
	P, Embedded int
	Gamma       float64
	A, C        [][]float64 // row i has i entries
	Nodes       []float64   // cᵢ
	Times       []float64   // dᵢ
	B, Err      []float64
	Dense       [][]float64 // rows of H
}

var _ ode.Method = (*Table)(nil)

// Name returns the method's name.
func (m *Table) Name() string { return m.Label }

// Order returns the order of the solution.
func (m *Table) Order() int { return m.P }

// Estimate returns the order of the embedded solution.
func (m *Table) Estimate() int { return m.Embedded }

// Degree returns the degree of the dense output.
func (m *Table) Degree() int { return len(m.Dense) + 1 }

// quadrature returns the weights w with which a quadrature of rate q grows over a step,
//
//	ΔQ = h Σ wᵢ q(tᵢ, Yᵢ) + h (∂q/∂y) Σ wᵢUᵢ + h² (∂q/∂t) Σ wᵢdᵢ,  wᵀ = γ bᵀ (I − γC)⁻¹.
//
// It is what the stages would give if Q were one more state: their recursion is linear in q, so it
// collapses. C is strictly lower triangular, hence the back substitution.
func (m *Table) quadrature() []float64 {
	s := len(m.B)
	w := make([]float64, s)
	for i := s - 1; i >= 0; i-- {
		w[i] = m.B[i]
		for j := i + 1; j < s; j++ {
			w[i] += m.C[j][i] * w[j]
		}
		w[i] *= m.Gamma
	}
	return w
}

// lastOnly reports whether only the last entry of a row is not zero, and it is one.
func lastOnly(row []float64) bool {
	for _, x := range row[:len(row)-1] {
		if x != 0 {
			return false
		}
	}
	return row[len(row)-1] == 1
}

// extends reports whether row is short with a one behind it.
func extends(row, short []float64) bool {
	n := len(row) - 1
	if n < 1 || len(short) != n || row[n] != 1 {
		return false
	}
	for i, x := range short {
		if row[i] != x {
			return false
		}
	}
	return true
}
