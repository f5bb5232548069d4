package energy

import (
	"math"

	"workheat/network/element"
)

const (
	slopeSlack = 1e-4 // share of the largest slope at that place that one may be off
	nudge      = 0.05 // K, for the differences by temperature
	shift      = 0.02 // of the step, for the differences by time
	slowest    = 1e-3 // of a path's flow, now or on the mean, over the step: rates below it do not matter
)

// checkSlopes compares the slopes that the run's equations used with differences of the laws: a wrong
// slope costs accuracy, and the ledger cannot see it.
func (s *survey) checkSlopes(w *witness, found *count) Check {
	c := Check{Layer: 2, Name: "slopes", Allowed: slopeSlack,
		About: "slopes of all flows by temperature and time against differences of their laws, as a share of the largest"}
	r := w.run
	y := make([]float64, r.Tape.States())
	around := newAround(r)
	for _, k := range s.steps {
		start, h, segment, coef := r.Tape.Step(k)
		t := start + 0.5*h
		for i := range y {
			y[i] = r.Tape.Value(coef, i, 0.5)
		}
		dep, rate := r.Slopes(segment, t, y)
		w.at(t, 0.5, segment, coef)
		around.set(w, t, h, segment)
		for p := range r.Paths {
			noise := w.compareWarmth(&c, p, dep[p])
			around.compare(&c, r, p, rate[p], noise, found.paths[p].size/r.Tape.End())
		}
	}
	c.close()
	return c
}

// compareWarmth compares the slopes of one path by temperature at the witness's state, and returns the
// round-off of its flow [W].
func (w *witness) compareWarmth(c *Check, p int, dep []float64) (noise float64) {
	r := w.run
	largest, noise := 0.0, 4*epsilon*abs(r.Flow(p, &w.state))
	for i, d := range dep {
		largest = math.Max(largest, abs(d))
		noise += 4 * epsilon * abs(d) * w.state.T[r.Paths[p].Deps[i]]
	}
	for i, node := range r.Paths[p].Deps {
		old := w.state.T[node]
		flow := func(dt float64) float64 {
			w.state.T[node] = old + dt
			return r.Flow(p, &w.state)
		}
		wide, narrow := (flow(nudge)-flow(-nudge))/(2*nudge), (flow(nudge/2)-flow(-nudge/2))/nudge
		w.state.T[node] = old
		c.compare(dep[i], narrow, largest, 2*noise/nudge+abs(wide-narrow), r.Paths[p].Element)
	}
	return noise
}

// around is a state at four times about the middle of a step, all temperatures but the held ones standing
// still.
type around struct {
	h     float64
	time  [4]float64 // the outer pair, then the inner
	state [4]element.State
	here  *element.State
}

func newAround(r *Run) *around {
	a := &around{}
	for j := range a.state {
		a.state[j] = element.State{
			T: make([]float64, len(r.Nodes)), Signal: make([]float64, r.NumSignals), Rate: make([]float64, r.NumSignals),
		}
	}
	return a
}

// set takes the states around time t, the witness being at it.
func (a *around) set(w *witness, t, h float64, segment int) {
	a.h, a.here = h, &w.state
	for j, part := range [4]float64{-shift, shift, -shift / 2, shift / 2} {
		a.time[j] = t + part*h
		w.signals(a.time[j], segment)
		copy(a.state[j].T, w.state.T)
		copy(a.state[j].Signal, w.state.Signal)
	}
	w.signals(t, segment)
}

// compare compares the slope of one path by time. noise is the round-off of its flow, and mean the size of the
// flow over the run [W].
func (a *around) compare(c *Check, r *Run, p int, rate, noise, mean float64) {
	if a.time[2] == a.time[3] {
		return // the step is as short as the clock can tell
	}
	difference := func(j int) float64 {
		return (r.Flow(p, &a.state[j+1]) - r.Flow(p, &a.state[j])) / (a.time[j+1] - a.time[j]) // what the shift came to beside t
	}
	narrow := difference(2)
	if narrow == rate {
		return // most often both are zero
	}
	wide := difference(0)
	want := narrow + (narrow-wide)/3 // Richardson: the cubes drop out
	scale := slowest * math.Max(abs(r.Flow(p, a.here)), mean) / a.h
	c.compare(rate, want, scale, 4*noise/(shift*a.h)+abs(wide-narrow), r.Paths[p].Element)
}

// compare takes in one slope.
func (c *Check) compare(got, want, scale, noise float64, where string) {
	c.worst(offset(got, want, scale, noise), where)
}

// offset returns how far a slope is off as a share of the largest of itself, what it should be and the scale.
// noise is what the differences may be off by round-off.
func offset(got, want, scale, noise float64) float64 {
	off := abs(got-want) - noise
	if off <= 0 {
		return 0
	}
	return off / math.Max(scale, math.Max(abs(got), abs(want)))
}
