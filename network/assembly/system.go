package assembly

import (
	"math"

	"workheat/network/element"
)

// Restart forgets what was kept of the drive at the latest time. It must be called when the drive enters
// another segment.
func (s *System) Restart() { s.time = math.NaN() }

// Rates writes the balance of every state into f and the flow of every path into q. The balance of a node at or
// below absolute zero is not a number: the laws mean nothing there, and no step may go there.
func (s *System) Rates(f, q []float64, t float64, y []float64) {
	s.place(t, y)
	for i := range s.batches {
		b := &s.batches[i]
		b.Flows(q[b.first:b.end], &s.state)
	}
	net := s.net
	for i := range net {
		net[i] = 0
	}
	a, b := s.a[:len(q)], s.b[:len(q)]
	for p, flow := range q {
		net[a[p]] -= flow
		net[b[p]] += flow
	}
	copy(f, net[:s.states])
	for i, t := range s.state.T[:s.states] {
		if !(t > 0) {
			f[i] = math.NaN()
		}
	}
}

// place sets signals and temperatures.
func (s *System) place(t float64, y []float64) {
	if t != s.time {
		s.time = t
		s.drive.At(t, s.state.Signal, s.state.Rate)
		for i := s.states; i < len(s.Nodes); i++ {
			s.state.T[i] = s.state.Signal[s.Nodes[i].Signal]
		}
	}
	s.caps.temperatures(s.state.T, y)
}

// Jacobian writes the slopes of the balances: A by temperature, D the capacities, ft by time.
func (s *System) Jacobian(a, d, ft []float64, t float64, y []float64) {
	s.caps.scales(d, y)
	for i := range s.batches {
		b := &s.batches[i]
		b.Slopes(s.slopes[b.deps:b.depsEnd], s.rates[b.first:b.end], &s.state)
	}
	s.addHeldRates()
	v := s.values
	for i := range v {
		v[i] = 0
	}
	slotA, slotB := s.slotA[:len(s.slopes)], s.slotB[:len(s.slopes)]
	for k, slope := range s.slopes {
		v[slotA[k]] -= slope
		v[slotB[k]] += slope
	}
	copy(a, v[:len(v)-1])
	s.timeSlopes(ft)
}

// addHeldRates adds to the paths' rates what comes through held nodes whose temperature changes.
func (s *System) addHeldRates() {
	for i := range s.batches {
		b := &s.batches[i]
		k := b.deps
		for p := b.first; p < b.end; p++ {
			for range b.stride {
				if j := int(s.dep[k]); j >= s.states {
					s.rates[p] += s.slopes[k] * s.state.Rate[s.Nodes[j].Signal]
				}
				k++
			}
		}
	}
}

// timeSlopes gathers the paths' rates into the balances.
func (s *System) timeSlopes(ft []float64) {
	s.moving = false
	for _, r := range s.rates {
		if r != 0 {
			s.moving = true
			break
		}
	}
	for i := range ft {
		ft[i] = 0
	}
	if !s.moving {
		return
	}
	n := int32(s.states)
	for p, r := range s.rates {
		if i := s.a[p]; i < n {
			ft[i] -= r
		}
		if i := s.b[p]; i < n {
			ft[i] += r
		}
	}
}

// AddSlopes adds the slopes of the flows along a change v of the temperatures, and c times their rates.
func (s *System) AddSlopes(dq []float64, h float64, v []float64, c float64) {
	copy(s.wide, v)
	for i := range s.batches {
		b := &s.batches[i]
		if b.stride == 2 {
			s.addPairs(dq, h, b)
			continue
		}
		k := b.deps
		for p := b.first; p < b.end; p++ {
			sum := 0.0
			for range b.stride {
				sum += s.slopes[k] * s.wide[s.dep[k]]
				k++
			}
			dq[p] += h * sum
		}
	}
	if s.moving {
		for p, r := range s.rates {
			dq[p] += c * r
		}
	}
}

// addPairs is the common case of AddSlopes: each flow depends on two temperatures.
func (s *System) addPairs(dq []float64, h float64, b *batch) {
	slopes, dep := s.slopes[b.deps:b.depsEnd], s.dep[b.deps:b.depsEnd]
	dq = dq[b.first:b.end]
	for p := range dq {
		dq[p] += h * (slopes[2*p]*s.wide[dep[2*p]] + slopes[2*p+1]*s.wide[dep[2*p+1]])
	}
}

// State returns the network's state at time t with the given state vector, for reports; it is valid
// until the next call of any method. flows may be nil.
func (s *System) State(t float64, y, flows []float64) *element.State {
	s.place(t, y)
	for i := range s.batches {
		if b := &s.batches[i]; flows != nil {
			b.Flows(flows[b.first:b.end], &s.state)
		}
	}
	return &s.state
}

// Recount returns the flow of a path at a state of the caller's, by its element's law alone.
func (s *System) Recount(path int, state *element.State) float64 {
	p := &s.Paths[path]
	return s.batches[p.Group].Recount(p.Local, state)
}

// Watch returns a function that asks every batch with a valid range whether a state is outside it, and
// reports the paths that are; nil if no batch has a range.
func (s *System) Watch(report func(path int, text string)) func(*element.State) {
	var watches []func(*element.State)
	for i := range s.batches {
		b := &s.batches[i]
		if r, ok := b.Batch.(element.Ranger); ok {
			local := func(path int, text string) { report(b.first+path, text) }
			watches = append(watches, func(state *element.State) { r.Range(state, local) })
		}
	}
	if watches == nil {
		return nil
	}
	return func(state *element.State) {
		for _, watch := range watches {
			watch(state)
		}
	}
}

// PathSlopes returns, at time t and a state vector, the slopes of each path by its Deps and by time alone
// (held temperatures included), as the equations use them. The slices are the system's own and valid until the
// next call of any method; it is for checks.
func (s *System) PathSlopes(t float64, y []float64) (dep [][]float64, rate []float64) {
	s.place(t, y)
	for i := range s.batches {
		b := &s.batches[i]
		b.Slopes(s.slopes[b.deps:b.depsEnd], s.rates[b.first:b.end], &s.state)
	}
	s.addHeldRates()
	dep = make([][]float64, 0, len(s.Paths))
	for i := range s.batches {
		b := &s.batches[i]
		for p := b.first; p < b.end; p++ {
			k := b.deps + (p-b.first)*b.stride
			dep = append(dep, s.slopes[k:k+b.stride])
		}
	}
	return dep, s.rates
}
