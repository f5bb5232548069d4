package correlation

import "math"

// VentPassage is the passage between two vanes of a ventilated disc, which pumps air from its inner to its
// outer edge as it turns.
type VentPassage struct {
	Inner, Outer            float64 // m, radii between which the vanes run
	InletWidth, OutletWidth float64 // m, clear width between two vanes at the inner and outer radius
	Height                  float64 // m, clear axial gap between the two cheeks
	Length                  float64 // m, along the vane; 0: Outer - Inner
	Air                     Air
}

// Numbers of the vent passage. Laminar: Sieder and Tate, in the form for short tubes; turbulent:
// Dittus-Boelter factor with an entry correction. That this pair serves ventilated discs, with the speed
// rule below: Limpert, Brake Design and Safety, from memory.
const (
	ventLaminar           = 1.86
	ventTurbulent         = 0.023
	ventEntryExponent     = 0.67
	ventPrandtlExponent   = 0.33
	ventTurbulentExponent = 0.8

	// The source uses the laminar law below 1e4 and the turbulent law above; a factor of about 2 lies
	// between them there. We lead over from 2300, where pipe flow ceases to be surely laminar.
	ventBridgeLow  = 2300.0
	ventBridgeHigh = 1e4

	ventRest = 100   // Re below which the law is led to zero
	ventMost = 1.2e5 // Re, customary bound of the Dittus-Boelter law, from memory
)

// A VentLaw is the law of one passage made ready for inner loops. Make it with VentPassage.Law.
type VentLaw struct {
	air       Air
	pump      float64 // m, mean speed of the air per rad/s
	diameter  float64 // m, hydraulic
	laminar   float64 // factor of Re^(1/3) Pr^(1/3)
	turbulent float64 // factor of Re^0.8 Pr^0.33
}

// Law returns the law of the passage. All lengths must be positive and Outer above Inner.
func (p VentPassage) Law() VentLaw {
	width := (p.InletWidth + p.OutletWidth) / 2
	length := p.Length
	if length == 0 {
		length = p.Outer - p.Inner
	}
	d := 2 * width * p.Height / (width + p.Height)
	return VentLaw{
		air:       p.Air,
		pump:      math.Sqrt(p.Outer*p.Outer-p.Inner*p.Inner) * (1 + p.InletWidth/p.OutletWidth) / 2,
		diameter:  d,
		laminar:   ventLaminar * math.Cbrt(d/length),
		turbulent: ventTurbulent * (1 + math.Pow(d/length, ventEntryExponent)),
	}
}

// Speed returns the mean speed of the air in the passage [m/s] at angular speed omega [rad/s].
//
// Air that enters without swirl and is carried round by the vanes gains the head omega^2 (ro^2 - ri^2)/2
// against the rotor. Turned into speed without loss, that is omega (ro^2 - ri^2)^(1/2). The published rule
// takes this speed at the inlet, the speed at the outlet by the ratio of areas, and the mean of the two.
// By the ideal head alone it would stand at the outlet, where the pressure is again that of the
// surroundings; in a widening passage that makes the mean larger by the ratio of areas, and coefficients
// about 1.5 times those measured. The rule so allows for losses.
//
// Source: Limpert, Brake Design and Safety, from memory (there 0.0524 n (D^2 - d^2)^(1/2), n in 1/min).
func (l VentLaw) Speed(omega float64) float64 { return l.pump * math.Abs(omega) }

// Coefficient returns the mean heat-transfer coefficient [W/(m^2 K)] of the passage walls at angular speed
// omega [rad/s, of either sign] and film temperature tFilm [K], with its slopes over both.
//
// With Re = v d/nu on the mean speed v and the hydraulic diameter d, and l the length, the Nusselt number
// h d/k is
//
//	1.86 (Re Pr d/l)^(1/3)                       Re <= 2300
//	0.023 (1 + (d/l)^0.67) Re^0.8 Pr^0.33        Re >= 1e4
//
// and in between goes from one to the other with a weight in ln Re. There it departs from the source,
// which keeps the laminar law to 1e4 and then jumps: it lies above it by a factor that grows to the ratio
// of the two laws, 2 or so at 1e4. The measurements below are nearly linear in speed across this band and
// bear out the bridge, not the jump. Below Re 100 the law falls to zero at rest. Valid for Re <= 1.2e5; see
// Covers.
//
// Beside measured 27.0, 52.7 and 78.3 W/(m^2 K) at 342, 684 and 1025 rpm (McPhee and Johnson, Int. J.
// Therm. Sci. 47 (2008) 458, abstract; geometry not seen), plausible geometries give values within 20 %.
//
// Source: Limpert, Brake Design and Safety, from memory; the factors are those of Sieder and Tate and of
// Dittus and Boelter.
func (l VentLaw) Coefficient(omega, tFilm float64) (h, dhdT, dhdOmega float64) {
	film := l.air.At(tFilm)
	spread := l.pump * l.diameter / film.Viscosity // Re per rad/s
	re := math.Abs(omega) * spread
	nu, overRe, overPr := l.nusselt(re, film.Prandtl)
	k := film.Conductivity / l.diameter
	dNu := overPr*film.PrandtlSlope - overRe*re*film.ViscositySlope/film.Viscosity
	return nu * k, nu*film.ConductivitySlope/l.diameter + dNu*k, math.Copysign(overRe*spread*k, omega)
}

// Covers reports whether the law holds at omega [rad/s] and tFilm [K]. Rest and creeping count as covered.
func (l VentLaw) Covers(omega, tFilm float64) bool {
	return l.air.Covers(tFilm) && l.Speed(omega)*l.diameter/l.air.At(tFilm).Viscosity <= ventMost
}

// nusselt returns the Nusselt number and its slopes over Re and Pr.
func (l VentLaw) nusselt(re, pr float64) (nu, overRe, overPr float64) {
	var turbulent float64
	if re > ventBridgeLow {
		turbulent = l.turbulent * math.Exp(ventTurbulentExponent*math.Log(re)+ventPrandtlExponent*math.Log(pr))
	}
	if re >= ventBridgeHigh {
		return turbulent, ventTurbulentExponent * turbulent / re, ventPrandtlExponent * turbulent / pr
	}
	y, dy := power(re, ventRest, 1./3)
	scale := l.laminar * math.Cbrt(pr)
	laminar, dLaminar := scale*y, scale*dy
	if re <= ventBridgeLow {
		return laminar, dLaminar, laminar / (3 * pr)
	}
	w, dw := step(math.Log(re/ventBridgeLow), 0, ventBridgeSpan)
	nu = laminar + w*(turbulent-laminar)
	overRe = (1-w)*dLaminar + (w*ventTurbulentExponent*turbulent+dw*(turbulent-laminar))/re
	overPr = ((1-w)*laminar/3 + w*ventPrandtlExponent*turbulent) / pr
	return nu, overRe, overPr
}

// ventBridgeSpan is the natural logarithm of ventBridgeHigh/ventBridgeLow.
const ventBridgeSpan = 1.4696759700589417
