package correlation

import (
	"math"
	"testing"
)

// The laws whose constants are from memory are held against theory here, each worked out anew.

// karman integrates von Karman's equations for the laminar flow on a rotating disc, from the disc outwards,
// with the energy equation for an isothermal disc. With F, G, H the radial, tangential and axial speed and
// D the slope across the layer: DDF = F^2 - G^2 + H DF, DDG = 2 F G + H DG, DH = -2 F. It returns F and G
// far out, and the integral of exp(Pr int H), whose inverse is Nu_r/Re^(1/2).
func karman(slopeF, slopeG, pr float64) (far, farG, thickness float64) {
	const end, n = 12.0, 2400
	y := [7]float64{0, slopeF, 1, slopeG, 0, 0, 0} // F, DF, G, DG, H, int H, int exp(Pr int H)
	rate := func(y [7]float64) [7]float64 {
		return [7]float64{y[1], y[0]*y[0] - y[2]*y[2] + y[4]*y[1], y[3], 2*y[0]*y[2] + y[4]*y[3], -2 * y[0], y[4], math.Exp(pr * y[5])}
	}
	along := func(y, k [7]float64, h float64) [7]float64 {
		for i := range y {
			y[i] += h * k[i]
		}
		return y
	}
	for range n {
		const h = end / n
		k1 := rate(y)
		k2 := rate(along(y, k1, h/2))
		k3 := rate(along(y, k2, h/2))
		k4 := rate(along(y, k3, h))
		for i := range y {
			y[i] += h / 6 * (k1[i] + 2*k2[i] + 2*k3[i] + k4[i])
		}
	}
	return y[0], y[2], y[6]
}

// The similarity solution (von Karman 1921; Cochran 1934 gives the slopes 0.510 and -0.616 at the disc, from
// memory; they choose this one among the solutions that a layer of finite height admits) has
// Nu/Re^(1/2) near 0.33 in air. The 0.36 in use must lie above it, as measurements do, by about 10 %.
func TestLaminarDiscBesideSimilaritySolution(t *testing.T) {
	a, b := 0.51, -0.616
	for range 30 { // Newton's method on the two slopes at the disc
		const e = 1e-7
		f, g, _ := karman(a, b, 0.71)
		fa, ga, _ := karman(a+e, b, 0.71)
		fb, gb, _ := karman(a, b+e, 0.71)
		aa, ab, ba, bb := (fa-f)/e, (fb-f)/e, (ga-g)/e, (gb-g)/e
		det := aa*bb - ab*ba
		da, db := (f*bb-g*ab)/det, (g*aa-f*ba)/det
		cut := math.Min(1, 0.02/math.Max(math.Abs(da), math.Abs(db)))
		a, b = a-cut*da, b-cut*db
	}
	f, g, thickness := karman(a, b, 0.71)
	if math.Abs(f) > 1e-6 || math.Abs(g) > 1e-6 || math.Abs(a-0.510) > 1e-3 || math.Abs(b+0.616) > 1e-3 {
		t.Fatalf("similarity solution did not settle: slopes %g, %g, far values %g, %g", a, b, f, g)
	}
	theory := 1 / thickness
	t.Logf("Nu/Re^(1/2) = %.4f by similarity at Pr 0.71, %.2f in use", theory, discLaminar)
	if theory < 0.32 || theory > 0.335 {
		t.Errorf("similarity solution gives %g, want about 0.33", theory)
	}
	if high := discLaminar/theory - 1; high < 0 || high > 0.11 {
		t.Errorf("the constant in use lies %.3f above theory, 0.10 is stated", high)
	}
}

// Von Karman's turbulent disc, by momentum integrals: tangential speed 1 - z^(1/7), radial speed
// a z^(1/7) (1 - z), both of omega r, in a layer of thickness beta r Re_r^(-1/5), and the wall stress of
// Blasius's pipe, 0.0225 rho V^2 (nu/(V d))^(1/4). The tangential stress c rho (omega r)^2 Re_r^(-1/5)
// gives, by the analogy of heat and momentum, Nu_r = c Re_r^0.8 at Pr 1 for a wall warmer as r^2. For an
// isothermal wall in air this is times (2.6/4.6)^0.2 Pr^0.6 (Dorfman, from memory).
func TestTurbulentDiscBesideIntegralTheory(t *testing.T) {
	integral := func(f func(z float64) float64) float64 { // in s = z^(1/7), where all is a polynomial
		sum, n := 0.0, 20000
		for i := range n {
			s := (float64(i) + 0.5) / float64(n)
			sum += 7 * math.Pow(s, 6) * f(math.Pow(s, 7)) / float64(n)
		}
		return sum
	}
	seventh := func(z float64) float64 { return math.Pow(z, 1./7) }
	radial := integral(func(z float64) float64 { u := seventh(z) * (1 - z); return u * u })
	swirl := integral(func(z float64) float64 { v := 1 - seventh(z); return v * v })
	cross := integral(func(z float64) float64 { return seventh(z) * (1 - z) * (1 - seventh(z)) })
	// Layer: d(r u^2)/dr - v^2 = -r tau_r and d(r^2 u v)/dr = r^2 tau_t, powers of r 3.6 and 4.6, tau_r/tau_t = a.
	a := math.Sqrt(swirl / (3.6*radial + 4.6*cross))
	drag := 0.0225 * math.Pow(1+a*a, 3./8)
	beta := math.Pow(drag/(4.6*a*cross), 0.8)
	c := drag * math.Pow(beta, -0.25)
	if math.Abs(a-0.162) > 5e-4 || math.Abs(beta-0.526) > 2e-3 { // von Karman's own figures, from memory
		t.Errorf("layer: a %.4f, beta %.4f, published 0.162, 0.526", a, beta)
	}
	if moment := 4 * math.Pi * c * 2 / 4.6; math.Abs(moment-0.146) > 1e-3 { // both sides, from memory
		t.Errorf("moment coefficient %.4f, published 0.146", moment)
	}
	local := c * math.Pow(2.6/4.6, 0.2) * math.Pow(0.71, 0.6)
	t.Logf("local Nu/Re^0.8 = %.5f by theory, 0.0195 in use", local)
	if off(discTurbulent*2.6/2, local) > 0.01 {
		t.Errorf("theory %g, in use %g; agreement within 1 %% is stated", local, discTurbulent*2.6/2)
	}
}

// strips returns the mean Nusselt number on the diameter of a disc in a stream along its face, cut into
// strips of flat plate with Nu_L = factor Re_L^p.
func strips(factor, p, re float64) float64 {
	sum, n := 0.0, 4000
	for i := range n {
		y := (float64(i)+0.5)/float64(n)*2 - 1
		chord := math.Sqrt(1 - y*y) // of the diameter
		sum += factor * math.Pow(re*chord, p) * 2 / float64(n)
	}
	return sum * (1. / 2) / (math.Pi / 4) // width 2 radii, area pi/4 of D^2
}

// Limpert's laws beside a disc in a stream without rotation, by strips of turbulent flat plate (mean
// 0.037 Re^0.8 Pr^(1/3)): a rotor turns in a disturbed stream and must be somewhat above it.
func TestVehicleRotorBesideFlatPlate(t *testing.T) {
	for _, re := range []float64{5e4, 1e5, 1.5e5, 2e5, 3e5, 6e5, 1.2e6} {
		nu, _ := rotorNusselt(re)
		plate := strips(0.037*math.Cbrt(0.7), 0.8, re)
		t.Logf("Re %g: rotor %.0f, plate %.0f", re, nu, plate)
		if ratio := nu / plate; ratio < 0.8 || ratio > 1.4 {
			t.Errorf("Re %g: Nu %.1f, strips of turbulent plate %.1f", re, nu, plate)
		}
	}
}
