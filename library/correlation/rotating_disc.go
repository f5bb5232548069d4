package correlation

import "math"

// RotatingDisc is the flat face of a disc that spins about its axis in still air.
type RotatingDisc struct {
	Radius float64 // m, outer radius r
	Air    Air
}

// Numbers of the rotating disc. Kreith, Principles of Heat Transfer, section on rotating discs, from
// memory: laminar 0.36, local turbulent 0.0195, transition at 2.5e5. The laminar constant lies 10 % above
// the similarity solution for an isothermal disc in air (von Karman's equations, 0.326 at Pr 0.71), as
// measurements do (Cobb and Saunders 1956, from memory); the turbulent constant lies within 1 % of what
// von Karman's turbulent disc and the analogy of heat and momentum give for air (0.0194).
const (
	discLaminar    = 0.36             // Nu = 0.36 Re^(1/2), mean
	discTurbulent  = 0.0195 * 2 / 2.6 // mean factor of the local 0.0195 Re_r^0.8
	discTransition = 2.5e5            // Re where the outer part begins to be turbulent

	// Chosen by trial: the slope grows by a factor of 3.5 here, and this is the widest band of round
	// figures whose departure from the source stays under 3 %.
	discBridgeLow  = 0.8 * discTransition
	discBridgeHigh = 1.2 * discTransition

	discRest = 1e3 // Re below which the law is led to zero; 7 rpm for a radius of 0.15 m
	discMost = 1e7 // Re, our bound: power laws of 1/7 hold to about there
)

// discCore is 0.36 Rec - 0.015 Rec^1.3 with Rec the transition: what the laminar core of radius rc does
// to the mean beside the all-turbulent law, times Re^(1/2).
const discCore = discLaminar*discTransition - discTurbulent*10406915.09252342

// Coefficient returns the mean heat-transfer coefficient [W/(m^2 K)] over the whole face at angular speed
// omega [rad/s, of either sign] and film temperature tFilm [K], with its slopes over both.
//
// With Re = omega r^2/nu and rc/r = (2.5e5/Re)^(1/2), the mean Nusselt number h r/k is
//
//	0.36 Re^(1/2)                                              Re <= 2e5
//	0.36 Re^(1/2) (rc/r)^2 + 0.015 Re^0.8 (1 - (rc/r)^2.6)     Re >= 3e5
//
// The source changes at 2.5e5, where the values meet and the slopes do not; between 2e5 and 3e5 this goes
// over smoothly and departs from the source by at most 2.4 %. Below Re 1e3 it falls to zero at rest.
// Valid for air (Pr about 0.7), Re <= 1e7; see Covers.
//
// Source: Kreith, Principles of Heat Transfer, rotating disc in still air, from memory.
func (d RotatingDisc) Coefficient(omega, tFilm float64) (h, dhdT, dhdOmega float64) {
	film := d.Air.At(tFilm)
	spread := d.Radius * d.Radius / film.Viscosity // Re per rad/s
	re := math.Abs(omega) * spread
	nu, slope := discNusselt(re)
	k := film.Conductivity / d.Radius
	dReTimes := -re * film.ViscositySlope / film.Viscosity
	return nu * k, nu*film.ConductivitySlope/d.Radius + slope*dReTimes*k, math.Copysign(slope*spread*k, omega)
}

// Covers reports whether the law holds at omega [rad/s] and tFilm [K]. Rest and creeping count as covered.
func (d RotatingDisc) Covers(omega, tFilm float64) bool {
	return d.Air.Covers(tFilm) && math.Abs(omega)*d.Radius*d.Radius/d.Air.At(tFilm).Viscosity <= discMost
}

// discNusselt returns the mean Nusselt number and its slope over Re.
func discNusselt(re float64) (nu, slope float64) {
	if re <= discBridgeLow {
		y, dy := power(re, discRest, 0.5)
		return discLaminar * y, discLaminar * dy
	}
	root := math.Sqrt(re)
	turbulent := discTurbulent * raise(re, 0.8)
	core := discCore / root
	mixed, dMixed := turbulent+core, (0.8*turbulent-0.5*core)/re
	if re >= discBridgeHigh {
		return mixed, dMixed
	}
	laminar := discLaminar * root
	dLaminar := 0.5 * laminar / re
	w, dw := step(re, discBridgeLow, discBridgeHigh)
	return laminar + w*(mixed-laminar), dLaminar + w*(dMixed-dLaminar) + dw*(mixed-laminar)
}
