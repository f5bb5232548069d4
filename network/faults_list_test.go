package network

import (
	"workheat/network/assembly"
	"workheat/network/duty"
	"workheat/network/element"
	"workheat/network/energy"
)

// times spoils numbers by a factor.
func times(factor float64) func(x []float64) {
	return func(x []float64) {
		for i := range x {
			x[i] *= factor
		}
	}
}

var faultsOfElements = []fault{
	{
		name: "a share of the rubbing is lost", kind: "friction pad",
		batch: func(b *brokenBatch) {
			last := func(x []float64) { x[len(x)-1] *= 0.98 }
			b.flows = last
			b.slopes = func(dep, rate []float64) { last(rate) }
			b.recount = func(path int, q float64) float64 {
				if path == 2 {
					return 0.98 * q
				}
				return q
			}
		},
		must: []string{"1 ledger"},
	},
	{
		name: "a share of given heat is lost", kind: "given heat",
		batch: func(b *brokenBatch) {
			b.flows = func(q []float64) { q[1] = 0 }
			b.slopes = func(dep, rate []float64) { rate[1] = 0 }
			b.recount = func(path int, q float64) float64 { return float64(1-path) * q }
		},
		must: []string{"2 given"},
	},
	{
		name: "work counted twice in the flows and nowhere else", kind: "friction pad",
		batch: func(b *brokenBatch) {
			b.flows = times(2)
			b.slopes = func(dep, rate []float64) { times(2)(rate) }
		},
		must: []string{"2 recount", "2 work", "2 slopes"},
	},
	{
		name: "work counted twice in all that the element says", kind: "friction pad",
		batch: func(b *brokenBatch) {
			b.flows = times(2)
			b.slopes = func(dep, rate []float64) { times(2)(rate) }
			b.recount = func(_ int, q float64) float64 { return 2 * q }
		},
		must: []string{"2 work"},
	},
	{
		name: "a law wrong by a thousandth in the flows", kind: "convection",
		batch: func(b *brokenBatch) {
			b.flows = times(1.001)
			b.slopes = func(dep, rate []float64) { times(1.001)(dep); times(1.001)(rate) }
		},
		must: []string{"2 recount", "2 slopes"},
	},
	{
		name: "radiation slope with a cube too small", kind: "radiation",
		batch: func(b *brokenBatch) {
			b.slopes = func(dep, rate []float64) { dep[0] *= 0.75 }
		},
		must: []string{"2 slopes"},
	},
	{
		name: "radiation slope off by a thousandth", kind: "radiation",
		batch: func(b *brokenBatch) {
			b.slopes = func(dep, rate []float64) { times(1.001)(dep) }
		},
		must: []string{"2 slopes"},
	},
	{
		name: "time-slope of the rubbing missing", kind: "friction pad",
		batch: func(b *brokenBatch) {
			b.slopes = func(dep, rate []float64) { clear(rate) }
		},
		must: []string{"2 slopes"},
	},
	{
		name: "time-slope of the convection missing", kind: "convection",
		batch: func(b *brokenBatch) {
			b.slopes = func(dep, rate []float64) { clear(rate) }
		},
		must: []string{"2 slopes"},
	},
}

var faultsOfEquations = []fault{
	{
		name: "flipped sign on one side of a link",
		wrap: func(s *assembly.System) *brokenSystem {
			p := path(s, "neck")
			return &brokenSystem{System: s, rates: func(f, q []float64) { f[s.Paths[p].B] -= 2 * q[p] }}
		},
		must: []string{"1 ledger", "2 recount"},
	},
	{
		name: "quadrature of one path dropped",
		wrap: func(s *assembly.System) *brokenSystem {
			p := path(s, "glow")
			return &brokenSystem{System: s, rates: func(f, q []float64) { q[p] = 0 }, add: func(old, dq []float64) { dq[p] = old[p] }}
		},
		must: []string{"1 ledger"}, may: []string{"2 slopes", "2 matrix"},
	},
	{
		name: "slopes of one path left out of its quadrature",
		wrap: func(s *assembly.System) *brokenSystem {
			p := path(s, "glow")
			return &brokenSystem{System: s, add: func(old, dq []float64) { dq[p] = old[p] }}
		},
		must: []string{"1 ledger"}, may: []string{"2 slopes", "2 matrix"},
	},
	{
		name: "an entry of the matrix is missing",
		wrap: func(s *assembly.System) *brokenSystem {
			p := s.Paths[path(s, "backing")]
			slot := s.Pattern().Slot(p.A, p.B)
			return &brokenSystem{System: s, jacobian: func(a, ft []float64) { a[slot] = 0 }}
		},
		must: []string{"1 ledger", "2 matrix"}, may: []string{"2 recount"},
	},
	{
		name: "time-slopes of the balances forgotten",
		wrap: func(s *assembly.System) *brokenSystem {
			return &brokenSystem{System: s, jacobian: func(a, ft []float64) { clear(ft) }}
		},
		must: []string{"2 matrix"},
	},
	{
		name: "wrong T(u): the capacity of the disc is off by a thousandth",
		model: func(m *Model) {
			nodes := append([]element.Node(nil), m.Net.Nodes...)
			nodes[node(m, "disc")].Capacity = nodes[node(m, "disc")].Capacity.Scaled(1.001)
			rebuild(m, nodes, m.signals)
		},
		must: []string{"2 temperatures", "2 recount", "2 peaks"}, may: []string{"2 ends", "2 slopes"},
	},
	{
		name: "a held table ignored",
		model: func(m *Model) {
			air := m.Net.Nodes[node(m, "air")].Signal
			rebuild(m, m.Net.Nodes, brokenDrive{m.signals, func(value, rate []float64) { value[air], rate[air] = 293.15, 0 }})
		},
		must: []string{"2 temperatures", "2 recount", "2 slopes"},
	},
	{
		name: "the rate of a held table missing",
		model: func(m *Model) {
			air := m.Net.Nodes[node(m, "air")].Signal
			rebuild(m, m.Net.Nodes, brokenDrive{m.signals, func(value, rate []float64) { rate[air] = 0 }})
		},
		must: []string{"2 slopes"},
	},
	{
		name: "work counted twice in the signals",
		model: func(m *Model) {
			rebuild(m, m.Net.Nodes, brokenDrive{m.signals, func(value, rate []float64) {
				value[duty.BrakeSignal] *= 2
				rate[duty.BrakeSignal] *= 2
			}})
		},
		must: []string{"2 work", "2 recount", "2 slopes"},
	},
}

var faultsOfRun = []fault{
	{
		name:   "kinks not split",
		runner: func(r *runner) { r.dropBreaks = true },
		must:   []string{"2 breaks"}, may: []string{"2 given", "2 recount", "2 temperatures", "2 slopes"},
	},
	{
		name:   "event missed",
		runner: func(r *runner) { r.dropEvents = true },
		must:   []string{"2 ends"},
	},
	{
		name:     "motion's account wrong by a millionth",
		progress: func(r *runner) { r.account.Brake *= 1 + 1e-6 },
		must:     []string{"2 work", "2 vehicle"},
	},
	{
		name:     "the vehicle's air drag is left out of its account",
		evidence: func(run *energy.Run) { run.Vehicle.Air = 0 },
		must:     []string{"2 vehicle"},
	},
	{
		name: "the vehicle's brakes go on where it is driven",
		evidence: func(run *energy.Run) {
			sound := run.Signals
			run.Signals = func(segment int, t float64, value, rate []float64) {
				sound(segment, t, value, rate)
				if value[duty.BrakeSignal] == 0 {
					value[duty.BrakeSignal] = 3 * value[duty.SpeedSignal]
				}
			}
		},
		must: []string{"2 vehicle", "2 recount"}, may: []string{"2 slopes"},
	},
	{
		name:     "a peak missed by a hundredth of a kelvin",
		evidence: func(run *energy.Run) { run.Nodes[1].Highest -= 0.01 },
		must:     []string{"2 peaks"},
	},
	{
		name: "a reported temperature is off, and no flow",
		evidence: func(run *energy.Run) {
			sound := run.Nodes[2].Reported
			run.Nodes[2].Reported = func(y float64) float64 { return sound(y) + 0.001 }
		},
		must: []string{"2 temperatures"},
	},
	{
		name: "a phase that waits for a temperature is left out",
		evidence: func(run *energy.Run) {
			for i, l := range run.Legs {
				if l.Node >= 0 {
					run.Legs[i].End, run.Legs[i].Ended = l.Start, false
				}
			}
		},
		must: []string{"2 ends"},
	},
	{
		name:     "a total that is not a number",
		evidence: func(run *energy.Run) { run.Paths[3].Total /= 0 * run.Paths[3].Total },
		must:     []string{"1 ledger"}, may: []string{"2 recount"},
	},
}
