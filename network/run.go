package network

import (
	"context"
	"fmt"
	"math"

	"workheat/integrators/ode"
	"workheat/network/duty"
	"workheat/network/element"
	"workheat/network/energy"
	"workheat/network/record"
)

// A runner carries one run through its duty.
type runner struct {
	model   *Model
	result  *Result
	system  ode.System
	integ   *ode.Integrator
	cursor  *duty.Cursor
	y       []float64
	t       float64
	first   map[uint64]float64 // accepted first steps by what the drive is at the start of a segment
	legs    []energy.Leg
	account duty.Account
	observe ode.Observer
	jumpers []jumper // nodes whose heat capacity jumps
	seen    float64  // K, for the book's Leg.Seen
	delays  []delay

	// What tests may break on purpose; false in every real run.
	dropEvents bool
	dropBreaks bool
}

// Run runs the duty. It always returns a result: an interrupted or failed run keeps what it had.
func (m *Model) Run(ctx context.Context, opt Options) *Result {
	r := newRunner(m, opt, nil)
	return r.run(ctx, opt)
}

// newRunner prepares a run. wrap, if not nil, stands between the integrator and the system.
func newRunner(m *Model, opt Options, wrap func(ode.System) ode.System) *runner {
	rel, abs := opt.Rel, opt.Abs
	if rel == 0 {
		rel = m.Net.Rel
	}
	if abs == 0 {
		if abs = m.Net.Abs; opt.Rel != 0 {
			abs = opt.Rel
		}
	}
	p := m.system.Problem()
	if wrap != nil {
		p.System = wrap(p.System)
	}
	r := &runner{
		model: m, system: p.System, first: map[uint64]float64{}, cursor: duty.NewCursor(&m.Net.Duty),
		integ: ode.New(p, method, ode.Tolerance{Rel: rel, Abs: abs}), y: make([]float64, p.N),
	}
	r.result = &Result{
		Model: m, Method: method.Name(), Rel: rel, Abs: abs, Nodes: m.recordNodes(),
		Tape: record.NewTape(p.N, method.Degree()),
	}
	r.observe = func(s *ode.Step, dense func([]float64)) {
		dense(r.result.Tape.Add(s.T, s.H, len(r.result.Segments)-1))
	}
	m.system.Start(r.y)
	r.jumpers = m.jumpers()
	return r
}

// run goes through the legs and closes the result.
func (r *runner) run(ctx context.Context, opt Options) *Result {
	for {
		leg, ok := r.cursor.Next()
		if !ok {
			break
		}
		if leg.Late > 0 {
			r.late(leg)
		}
		end, done := r.leg(ctx, leg)
		r.cursor.Done(end)
		if opt.Progress != nil {
			opt.Progress(r.t, leg.Label)
		}
		if !done {
			break
		}
	}
	res := r.result
	res.End = r.t
	res.Stats = r.integ.Stats()
	r.summarise()
	r.lateWarnings()
	r.rangeWarnings()
	if opt.Audit && res.Tape.Steps() > 0 {
		res.Book = energy.Make(r.evidence())
	}
	if opt.Tolerance && res.Book != nil && res.Failure == nil && !res.Interrupted {
		r.toleranceCheck(ctx)
	}
	return res
}

func (r *runner) warn(format string, args ...any) {
	text := fmt.Sprintf(format, args...)
	for _, w := range r.result.Warnings {
		if w == text {
			return
		}
	}
	r.result.Warnings = append(r.result.Warnings, text)
}

// leg runs one leg and returns when it ended; done is false when the run must stop.
func (r *runner) leg(ctx context.Context, leg *duty.Leg) (end float64, done bool) {
	record := energy.Leg{Label: leg.Label, Start: leg.Start, End: leg.Start, Node: -1}
	r.seen = math.NaN()
	var events []ode.Event
	if u := leg.Until; u != nil {
		record.Node, record.Falls, record.Target = u.Node, u.Falls, u.Temperature
		if !r.dropEvents {
			events = []ode.Event{r.event(u)}
		}
	}
	braked := r.account.Brake
	reason := r.motions(ctx, leg, events)
	record.End, record.Ended, record.Seen = r.t, reason == ode.Passed, r.seen
	for i := range leg.Motions {
		if x := leg.Motions[i].T1; x <= r.t {
			record.Corners = append(record.Corners, x)
		}
	}
	r.legs = append(r.legs, record)
	r.legWarnings(leg, reason, r.account.Brake-braked)
	return r.t, reason == ode.Reached || reason == ode.Passed
}

// event returns the event that a node's temperature passes a mark.
func (r *runner) event(u *duty.Until) ode.Event {
	sign := 1.0
	if u.Falls {
		sign = -1
	}
	value := func(t float64, y []float64) float64 {
		return sign * (r.result.temperature(u.Node, t, y) - u.Temperature)
	}
	return ode.Event{Name: r.result.Nodes[u.Node].Name, Value: value, Accuracy: math.Max(1e-9, r.result.Abs)}
}

// temperature returns the temperature [K] of a node at a time and state.
func (res *Result) temperature(node int, t float64, y []float64) float64 {
	n := &res.Nodes[node]
	if n.State < 0 {
		return n.Given.At(t)
	}
	return n.Temperature(y[n.State])
}

// motions runs the motions of a leg, each cut at the breaks of the tables.
func (r *runner) motions(ctx context.Context, leg *duty.Leg, events []ode.Event) ode.Reason {
	if len(leg.Motions) == 0 {
		return r.stretch(ctx, leg, nil, leg.End, events)
	}
	for i := range leg.Motions {
		m := leg.Motions[i] // a copy: the leg is used again
		end := m.T1
		if i == len(leg.Motions)-1 {
			end = leg.End
		}
		from := r.t
		reason := r.stretch(ctx, leg, &m, end, events)
		r.account.Add(m.Account(from, r.t))
		if reason != ode.Reached {
			return reason
		}
	}
	return ode.Reached
}

// stretch runs one motion to its end, with a restart at every break of a table.
func (r *runner) stretch(ctx context.Context, leg *duty.Leg, m *duty.Motion, end float64, events []ode.Event) ode.Reason {
	for r.t < end {
		stop := end
		if !r.dropBreaks {
			stop = r.model.signals.NextBreak(r.t, end)
		}
		if reason := r.segment(ctx, leg, m, stop, events); reason != ode.Reached {
			return reason
		}
	}
	return ode.Reached
}

// segment runs to the next break, within which everything is smooth.
func (r *runner) segment(ctx context.Context, leg *duty.Leg, m *duty.Motion, end float64, events []ode.Event) ode.Reason {
	res, start := r.result, r.t
	r.model.signals.Enter(start, end, m)
	r.model.system.Restart()
	failure := r.integ.Restart(start, r.y)
	if failure == nil && passed(events, start, r.integ.State()) {
		copy(r.y, r.integ.State()) // nodes without mass may have jumped
		r.seen = r.result.temperature(leg.Until.Node, start, r.y)
		return ode.Passed
	}
	res.Segments = append(res.Segments, record.Segment{
		Start: start, End: end, Label: leg.Label, Round: r.cursor.Round(), First: start == leg.Start,
	})
	res.motions = append(res.motions, motion{start, end, m})
	if failure != nil {
		r.explain(failure, r.y)
		res.Failure = failure
		return ode.Failed
	}
	drive := r.model.signals.Fingerprint(start)
	stop := r.advance(ctx, end, r.first[drive], events)
	r.t = stop.T
	copy(r.y, r.integ.State())
	res.Segments[len(res.Segments)-1].End = r.t
	if stop.First > 0 {
		r.first[drive] = stop.First
	}
	switch stop.Reason {
	case ode.Failed:
		r.explain(stop.Failure, r.y)
		res.Failure = stop.Failure
	case ode.Interrupted:
		res.Interrupted = true
	}
	return stop.Reason
}

// passed reports whether the value of an event is not below zero: its mark was passed before the phase began, or
// a node without mass jumped over it at a break.
func passed(events []ode.Event, t float64, y []float64) bool {
	for i := range events {
		if events[i].Value(t, y) >= 0 {
			return true
		}
	}
	return false
}

// summarise reads the summaries in the order of the netlist.
func (r *runner) summarise() {
	for _, i := range r.model.Net.Order {
		r.result.Summary = append(r.result.Summary, record.Summarise(r.result.Tape, r.result.Nodes[i]))
	}
}

// enter sets the signals to those of a recorded segment.
func (res *Result) enter(segment int) {
	m := res.motions[segment]
	res.Model.signals.Enter(m.start, m.end, m.plan)
	res.Model.system.Restart()
}

// toleranceCheck runs again at a tenth of the tolerance and books the change of the peaks.
func (r *runner) toleranceCheck(ctx context.Context) {
	res := r.result
	finer := r.model.Run(ctx, Options{Rel: res.Rel / 10, Abs: res.Abs / 10})
	if finer.Failure != nil || finer.Interrupted {
		r.warn("the run at a tenth of the tolerance did not come to its end")
		res.Interrupted = finer.Interrupted
		return
	}
	var names []string
	var highest, fine []float64
	rise := 0.0
	for i, s := range res.Summary {
		names = append(names, s.Name)
		highest, fine = append(highest, s.Highest), append(fine, finer.Summary[i].Highest)
		rise = math.Max(rise, s.Highest-s.Start)
	}
	res.Book.AddTolerance(names, highest, fine, 100*(res.Abs+res.Rel*rise))
}

// meter reports whether a path only measures a dissipator's work.
func meter(p element.Path) bool { return p.A == element.Outside && p.B == element.Outside }
