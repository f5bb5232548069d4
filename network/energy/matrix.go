package energy

import (
	"math"

	"workheat/network/element"
)

// checkMatrix compares the integrator's matrix, and its slopes of the balances by time, with what the slopes
// of all paths together make of them: an entry in a wrong place costs accuracy or closure.
func (s *survey) checkMatrix(w *witness) Check {
	c := Check{Layer: 2, Name: "matrix", Allowed: matrixSlack,
		About: "slopes of the balances as the integrator has them against those of their paths, as a share of the largest"}
	r := w.run
	states := r.Tape.States()
	y, v := make([]float64, states), make([]float64, states)
	for i := range v { // unlike numbers, so that no two entries can stand for each other
		v[i] = 1 + math.Mod(float64(i+1)*math.Phi, 1)
	}
	want, size := make([]float64, states), make([]float64, states)
	for _, k := range s.steps {
		start, h, segment, coef := r.Tape.Step(k)
		for i := range y {
			y[i] = r.Tape.Value(coef, i, 0.5)
		}
		dep, pace := r.Slopes(segment, start+0.5*h, y)
		av, rate := r.Matrix(v)
		r.balance(want, size, func(p int) (x, most float64) {
			for j, i := range r.Paths[p].Deps {
				if i < states {
					x += dep[p][j] * v[i]
					most += abs(dep[p][j] * v[i])
				}
			}
			return x, most
		})
		c.compareRows(r, av, want, size)
		r.balance(want, size, func(p int) (x, most float64) { return pace[p], abs(pace[p]) })
		c.compareRows(r, rate, want, size)
	}
	c.close()
	return c
}

// matrixSlack is round-off in sums of a row, with room for rows of a thousand paths.
const matrixSlack = 1e-11

// balance sums what each path brings to the nodes with a state, and the sizes of the terms.
func (r *Run) balance(sum, size []float64, of func(path int) (x, most float64)) {
	clear(sum)
	clear(size)
	for p := range r.Paths {
		x, most := of(p)
		if i := r.Paths[p].From; i != element.Outside && i < len(sum) {
			sum[i] -= x
			size[i] += most
		}
		if i := r.Paths[p].To; i != element.Outside && i < len(sum) {
			sum[i] += x
			size[i] += most
		}
	}
}

// compareRows compares rows of the balances.
func (c *Check) compareRows(r *Run, got, want, size []float64) {
	for i := range want {
		c.compare(got[i], want[i], size[i], 0, r.Nodes[i].Name)
	}
}
