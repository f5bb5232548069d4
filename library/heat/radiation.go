package heat

import (
	"workheat/network/element"
	"workheat/network/unit"
)

// stefanBoltzmann is the constant of radiation, W/(m^2 K^4): exact since 2019, here to the ten digits that
// CODATA 2018 lists.
const stefanBoltzmann = 5.670374419e-8

// Radiation returns the kind of a grey surface that radiates to another node.
func Radiation() *element.Kind {
	return &element.Kind{
		Section: element.Conductances,
		Name:    "radiation",
		About:   "Heat radiated by a grey surface to surroundings that are large or black, or to a facing surface.",
		Formula: "q = factor * emissivity * sigma * area * view factor * (T_A^4 - T_B^4), T in K, sigma = 5.670374419e-8 W/(m^2 K^4)",
		Source: "law of Stefan and Boltzmann, sigma from CODATA 2018; for two facing plates set the emissivity to " +
			"1/(1/e1 + 1/e2 - 1). Cast iron: 0.21 polished, 0.63 to 0.78 oxidised (emissivity tables of an infrared camera's manual)",
		Fields: []element.Field{
			between("the radiating node, and the surroundings or the facing node"),
			element.Field{Key: "emissivity", About: "total emissivity of the surface", Type: element.Number, Want: unit.Number}.From(0, 1).Must(),
			area("radiating surface of the first node").Must(),
			element.Field{Key: "view factor", About: "part of the radiation that reaches the second node", Type: element.Number,
				Want: unit.Number, Default: "1"}.From(0, 1),
			factor(),
		},
		Batch: func() element.Batch { return new(radiation) },
	}
}

// radiation holds radiating surfaces.
type radiation struct {
	surfaces []surface
	laws
}

type surface struct {
	link
	e float64 // W/K^4
}

// Add takes in one element.
func (r *radiation) Add(d *element.Declaration) []element.Path {
	l := linkOf(d)
	emissivity, area := d.Number("emissivity"), d.Number("area")
	view, scale := d.Number("view factor"), d.Number("factor")
	r.surfaces = append(r.surfaces, surface{l, scale * stefanBoltzmann * emissivity * area * view})
	r.again(func(s *element.State) float64 {
		return scale * view * area * emissivity * (black(s.T[l.a]) - black(s.T[l.b]))
	})
	return l.path(false)
}

// Flows writes the flows, with the difference of fourth powers in factors so that it loses no digits when
// the temperatures are close.
func (r *radiation) Flows(q []float64, s *element.State) {
	for i := range r.surfaces {
		f := &r.surfaces[i]
		a, b := s.T[f.a], s.T[f.b]
		q[i] = f.e * (a*a + b*b) * (a + b) * (a - b)
	}
}

// Slopes writes the slopes; nothing depends on a signal.
func (r *radiation) Slopes(dep, rate []float64, s *element.State) {
	clear(rate)
	for i := range r.surfaces {
		f := &r.surfaces[i]
		a, b := s.T[f.a], s.T[f.b]
		dep[2*i], dep[2*i+1] = 4*f.e*a*a*a, -4*f.e*b*b*b
	}
}

// black returns what a black surface radiates [W/m^2] at a temperature in K, on the engineer's scale of
// hundreds of kelvin.
func black(t float64) float64 {
	h := t / 100
	return 5.670374419 * h * h * h * h
}
