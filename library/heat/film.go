package heat

import (
	"workheat/library/correlation"
	"workheat/network/element"
	"workheat/network/unit"
)

// A filmLaw is a published law of forced convection in air.
type filmLaw interface {
	// Coefficient returns h [W/(m^2 K)] and its slopes at a speed [m/s or rad/s] and film temperature [K].
	Coefficient(speed, tFilm float64) (h, overT, overSpeed float64)
	// Covers reports whether the law was published for that speed and temperature.
	Covers(speed, tFilm float64) bool
}

// A law is what one element says of itself.
type law struct {
	film  filmLaw
	plain func(speed, tFilm float64) float64 // the coefficient from the formula once more
	turns bool                               // the law takes the angular speed of the wheel, not the road speed
}

// films holds surfaces whose coefficient follows a law at the mean of the two temperatures, plus what is
// added for still air.
type films struct {
	make     func(d *element.Declaration) law
	tooFast  string // what to say when the law is past its largest Reynolds number
	surfaces []filmSurface
	laws
}

type filmSurface struct {
	link
	signal   int32
	perSpeed float64 // the law's speed for one m/s of the vehicle
	area     float64 // m^2, with the factor
	still    float64 // W/(m^2 K)
	law      filmLaw
}

// tooWarm is what to say when the film temperature leaves the table of air.
const tooWarm = "the film temperature is outside the table of air, -73 to 727 degC"

// Add takes in one element.
func (f *films) Add(d *element.Declaration) []element.Path {
	l, law := linkOf(d), f.make(d)
	perSpeed := 1.0
	if law.turns {
		perSpeed = 1 / wheelRadius(d)
	}
	f.surfaces = append(f.surfaces, filmSurface{l, int32(d.Signal("speed of")), perSpeed,
		d.Number("factor") * d.Number("area"), d.Number("still"), law.film})
	f.again(filmAgain(d, law))
	return l.path(false)
}

// Flows writes the flows.
func (f *films) Flows(q []float64, s *element.State) {
	for i := range f.surfaces {
		p := &f.surfaces[i]
		a, b := s.T[p.a], s.T[p.b]
		h, _, _ := p.law.Coefficient(s.Signal[p.signal]*p.perSpeed, 0.5*(a+b))
		q[i] = p.area * (p.still + h) * (a - b)
	}
}

// Slopes writes the slopes. The coefficient moves with the film temperature, half with each end.
func (f *films) Slopes(dep, rate []float64, s *element.State) {
	for i := range f.surfaces {
		p := &f.surfaces[i]
		a, b := s.T[p.a], s.T[p.b]
		h, overT, overSpeed := p.law.Coefficient(s.Signal[p.signal]*p.perSpeed, 0.5*(a+b))
		drive := p.area * (a - b)
		g, bend := p.area*(p.still+h), 0.5*overT*drive
		dep[2*i], dep[2*i+1] = bend+g, bend-g
		rate[i] = drive * overSpeed * p.perSpeed * s.Rate[p.signal]
	}
}

// Range reports surfaces whose law is outside its published range.
func (f *films) Range(s *element.State, report func(path int, text string)) {
	for i := range f.surfaces {
		p := &f.surfaces[i]
		speed, film := s.Signal[p.signal]*p.perSpeed, 0.5*(s.T[p.a]+s.T[p.b])
		switch {
		case p.law.Covers(speed, film):
		case p.law.Covers(0, film):
			report(i, f.tooFast)
		default:
			report(i, tooWarm)
		}
	}
}

// filmAgain returns the flow of one surface by the plain law.
func filmAgain(d *element.Declaration, law law) func(s *element.State) float64 {
	a, b := d.Between("between")
	signal, radius := d.Signal("speed of"), 1.0
	if law.turns {
		radius = wheelRadius(d)
	}
	scale, area, still := d.Number("factor"), d.Number("area"), d.Number("still")
	return func(s *element.State) float64 {
		ta, tb := s.T[a], s.T[b]
		h := still + law.plain(s.Signal[signal]/radius, ta+(tb-ta)/2)
		return scale * (h * area) * (ta - tb)
	}
}

// air is the air of all laws here: one standard atmosphere.
var air correlation.Air

// filmFields are the fields that all film laws share, after those of the law.
func filmFields(shape ...element.Field) []element.Field {
	fields := append([]element.Field{between("the node of the surface and the node of the air")}, shape...)
	return append(fields,
		area("surface that the law stands for, all faces together").Must(),
		element.Field{Key: "speed of", About: "the vehicle on whose wheel it turns", Type: element.BodyName}.Must(),
		notNegative(element.Field{Key: "still", About: "added to the law's coefficient for free convection, which the law leaves out",
			Want: unit.HeatTransferCoefficient, Default: "0 W/(m^2 K)"}),
		factor())
}

// wheel is the field of the rolling radius.
func wheel() element.Field {
	return element.Field{Key: "wheel radius", About: "rolling radius of the wheel; left out, that of the vehicle", Want: unit.Length}.Positive()
}

// wheelRadius returns the rolling radius that the element or its vehicle gives, or zero.
func wheelRadius(d *element.Declaration) float64 {
	if d.Has("wheel radius") {
		return d.Number("wheel radius")
	}
	return d.Vehicle(d.Values["speed of"].Body).Wheel
}

// checkWheel asks for a rolling radius.
func checkWheel(d *element.Declaration) {
	if wheelRadius(d) <= 0 {
		d.Report("", "neither this element nor its vehicle gives a wheel radius",
			"add \"wheel radius\" here or to the vehicle")
	}
}
