package ode

import (
	"fmt"
	"math"
	"sort"
)

// A Failure says where and how the numbers failed.
type Failure struct {
	Text  string
	Help  string  // what to do about it, or empty; for the caller to fill in
	T, H  float64 // where the step began, and its length; zero at a start
	Worst []Worst // the states with the largest error over tolerance, at most three
}

// A Worst is a state that held a step back.
type Worst struct {
	Name  string
	Ratio float64 // error over tolerance; not finite if a value was not
	Rate  float64 // f of that state at the start of the step, over its scale
}

func (f *Failure) Error() string {
	text := fmt.Sprintf("at t = %.6g s with a step of %.3g s: %s", f.T, f.H, f.Text)
	for _, w := range f.Worst {
		text += fmt.Sprintf("; %s: error over tolerance %.3g, rate %.3g per s", w.Name, w.Ratio, w.Rate)
	}
	if f.Help != "" {
		text += "; cure: " + f.Help
	}
	return text
}

// failure describes what went wrong at a step of length h, with the worst states.
func (g *Integrator) failure(text string, h float64) *Failure {
	f := &Failure{Text: text, T: g.t, H: h}
	s := g.stepper.Step()
	suspect := g.stepper.Suspect()
	for i := range s.Err {
		tol := s.D[i] * (g.tol.Abs + g.tol.Rel*g.rise[i])
		w := Worst{g.problem.name(i), math.Abs(s.Err[i]) / tol, s.F[i] / s.D[i]}
		switch {
		case i == suspect:
			w.Ratio = math.NaN()
		case suspect >= 0 && math.IsNaN(w.Ratio):
			continue // it only caught the suspect's value
		}
		f.Worst = append(f.Worst, w)
	}
	rank := func(w Worst) float64 {
		if math.IsNaN(w.Ratio) || math.IsNaN(w.Rate-w.Rate) {
			return math.Inf(1)
		}
		return w.Ratio
	}
	sort.SliceStable(f.Worst, func(i, j int) bool { return rank(f.Worst[i]) > rank(f.Worst[j]) })
	f.Worst = f.Worst[:min(3, len(f.Worst))]
	return f
}
