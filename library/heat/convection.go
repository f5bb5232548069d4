package heat

import (
	"fmt"
	"math"

	"workheat/network/element"
	"workheat/network/unit"
)

// creep is the speed [m/s] below which speed^n is led to zero along a cubic with matching value and slope
// at creep and zero slope at rest. For n < 1 the slope of the power itself has no bound there. It changes
// the coefficient by less than creep^n, 0.4 % of the speed coefficient for n = 0.8.
const creep = 1e-3

// Convection returns the kind of a surface in a fluid, its coefficient a constant and a power of speed.
func Convection() *element.Kind {
	return &element.Kind{
		Section: element.Conductances,
		Name:    "convection",
		About:   "Heat from a surface to the air or another fluid, with a coefficient that may rise with a speed.",
		Formula: "q = factor * area * (coefficient + speed coefficient * (v / (1 m/s))^speed exponent) * (T_A - T_B); " +
			"below 1e-3 m/s the power is led smoothly to zero",
		Source: "Newton's law of cooling; the coefficients are the author's, from a test or a handbook. " +
			"Exponents: about 0.5 for laminar, 0.8 for turbulent flow (any text on heat transfer)",
		Fields: []element.Field{
			between("the body node and the fluid node"),
			area("surface in contact with the fluid").Must(),
			notNegative(element.Field{Key: "coefficient", About: "heat transfer coefficient at rest", Want: unit.HeatTransferCoefficient}).Must(),
			notNegative(element.Field{Key: "speed coefficient", About: "what a speed of 1 m/s adds to the coefficient", Want: unit.HeatTransferCoefficient}),
			exponent(),
			{Key: "speed of", About: "the vehicle whose speed counts", Type: element.BodyName},
			{Key: "speed", About: "the speed when it is not a vehicle's: constant or a table in time; negative counts as rest", Type: element.Signal, Want: unit.Speed},
			factor(),
		},
		Check: checkConvection,
		Batch: func() element.Batch { return &convection{powers: make([]power, 1)} },
	}
}

// exponent is the field of the power of speed.
func exponent() element.Field {
	f := element.Field{Key: "speed exponent", About: "power of the speed", Type: element.Number, Want: unit.Number, Default: "0.8"}.From(0, 3)
	f.Open = true
	return f
}

// checkConvection asks for one speed if there is a speed coefficient, and for none if not.
func checkConvection(d *element.Declaration) {
	wants, of, given := d.Has("speed coefficient"), d.Has("speed of"), d.Has("speed")
	switch {
	case of && given:
		d.Report("speed", "\"speed\" and \"speed of\" both set the speed", "keep one of them")
	case wants && !of && !given:
		d.Report("speed coefficient", "no speed is given for the speed coefficient",
			"add \"speed of\" with the name of a body, or \"speed\" with a value or a table")
	case !wants && (of || given):
		key := "speed"
		if of {
			key = "speed of"
		}
		d.Report(key, fmt.Sprintf("%q has no effect without a speed coefficient", key), "add \"speed coefficient\" in W/(m^2 K), or leave the speed out")
	}
}

// convection holds surfaces. The first power is zero for ever and serves surfaces without a speed.
type convection struct {
	wetted []wetted
	powers []power
	laws
}

type wetted struct {
	link
	power  int32
	g0, g1 float64 // W/K
}

// A power is one signal to one exponent, kept while the speed stays the same.
type power struct {
	signal   int32
	n        float64
	v        float64 // the speed for which y and slope hold
	y, slope float64
	rate     float64 // of y by time
}

// Add takes in one element.
func (c *convection) Add(d *element.Declaration) []element.Path {
	l, scale := linkOf(d), d.Number("factor")*d.Number("area")
	w := wetted{link: l, g0: scale * d.Number("coefficient"), g1: scale * d.Number("speed coefficient")}
	if w.g1 != 0 {
		w.power = c.power(speedSignal(d), d.Number("speed exponent"))
	}
	c.wetted = append(c.wetted, w)
	c.again(convectionLaw(d))
	return l.path(true)
}

// speedSignal returns the signal of the speed that a declaration names or gives.
func speedSignal(d *element.Declaration) int {
	if d.Has("speed of") {
		return d.Signal("speed of")
	}
	return d.Signal("speed")
}

// power returns the index of the power of a signal.
func (c *convection) power(signal int, n float64) int32 {
	for i, p := range c.powers[1:] {
		if int(p.signal) == signal && p.n == n {
			return int32(i + 1)
		}
	}
	c.powers = append(c.powers, power{signal: int32(signal), n: n, v: math.NaN()})
	return int32(len(c.powers) - 1)
}

// raise brings the powers up to date.
func (c *convection) raise(s *element.State) {
	for i := 1; i < len(c.powers); i++ {
		p := &c.powers[i]
		if v := s.Signal[p.signal]; v != p.v {
			p.v = v
			p.y, p.slope = raised(v, p.n)
		}
	}
}

// raised returns v^n and its slope, led to zero below creep.
func raised(v, n float64) (y, slope float64) {
	switch {
	case v <= 0:
		return 0, 0
	case v < creep:
		r, top := v/creep, math.Pow(creep, n)
		return top * r * r * (3 - n + (n-2)*r), top * r * (2*(3-n) + 3*(n-2)*r) / creep
	}
	y = math.Pow(v, n)
	return y, n * y / v
}

// Flows writes the flows.
func (c *convection) Flows(q []float64, s *element.State) {
	c.raise(s)
	for i := range c.wetted {
		w := &c.wetted[i]
		q[i] = (w.g0 + w.g1*c.powers[w.power].y) * (s.T[w.a] - s.T[w.b])
	}
}

// Slopes writes the slopes.
func (c *convection) Slopes(dep, rate []float64, s *element.State) {
	c.raise(s)
	for i := 1; i < len(c.powers); i++ {
		c.powers[i].rate = c.powers[i].slope * s.Rate[c.powers[i].signal]
	}
	for i := range c.wetted {
		w := &c.wetted[i]
		p := &c.powers[w.power]
		g := w.g0 + w.g1*p.y
		dep[2*i], dep[2*i+1] = g, -g
		rate[i] = w.g1 * p.rate * (s.T[w.a] - s.T[w.b])
	}
}

// convectionLaw returns the law of one surface.
func convectionLaw(d *element.Declaration) func(s *element.State) float64 {
	a, b := d.Between("between")
	scale, area, h0, h1 := d.Number("factor"), d.Number("area"), d.Number("coefficient"), d.Number("speed coefficient")
	if h1 == 0 {
		return func(s *element.State) float64 { return scale * h0 * area * (s.T[a] - s.T[b]) }
	}
	signal, n := speedSignal(d), d.Number("speed exponent")
	return func(s *element.State) float64 {
		h, v := h0, max(s.Signal[signal], 0)
		if v >= creep {
			h += h1 * math.Exp(n*math.Log(v))
		} else {
			x := v / creep
			h += h1 * math.Exp(n*math.Log(creep)) * ((3-n)*x*x - (2-n)*x*x*x)
		}
		return scale * h * area * (s.T[a] - s.T[b])
	}
}
