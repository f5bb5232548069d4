package correlation

import (
	"fmt"
	"math"
	"strings"
	"testing"
)

// off returns how far got is from want, relative to want.
func off(got, want float64) float64 { return math.Abs(got-want) / math.Abs(want) }

// passage is an invented ventilated disc of a car.
var passage = VentPassage{Inner: 0.095, Outer: 0.152, InletWidth: 0.012, OutletWidth: 0.020, Height: 0.014}

// A law is one correlation under the general tests. Every new one gets a row in laws.
type law struct {
	name   string
	fast   func(speed, tFilm float64) (h, dhdT, dhdSpeed float64)
	plain  func(speed, tFilm float64) float64
	covers func(speed, tFilm float64) bool
	top    float64   // highest speed of the tests
	edges  []float64 // Reynolds numbers where the formula changes
	length float64   // Re is speed times length over viscosity
}

func laws() []law {
	thin := Air{Pressure: 7e4}
	disc, rotor, bent := RotatingDisc{Radius: 0.15}, VehicleRotor{Diameter: 0.28}, passage
	high := RotatingDisc{Radius: 0.2, Air: thin}
	bent.Length, bent.Air = 0.075, thin
	vent, ventThin := passage.Law(), bent.Law()
	discEdges := []float64{discRest, discBridgeLow, discBridgeHigh}
	rotorEdges := []float64{rotorRest, rotorBridgeLow, rotorBridgeHigh}
	ventEdges := []float64{ventRest, ventBridgeLow, ventBridgeHigh}
	return []law{
		{"rotating disc", disc.Coefficient, disc.Plain, disc.Covers, 1500, discEdges, 0.15 * 0.15},
		{"rotating disc, thin air", high.Coefficient, high.Plain, high.Covers, 1500, discEdges, 0.2 * 0.2},
		{"vehicle rotor", rotor.Coefficient, rotor.Plain, rotor.Covers, 80, rotorEdges, 0.28},
		{"vent passage", vent.Coefficient, passage.Plain, vent.Covers, 300, ventEdges, vent.pump * vent.diameter},
		{"vent passage, thin air", ventThin.Coefficient, bent.Plain, ventThin.Covers, 300, ventEdges, ventThin.pump * ventThin.diameter},
	}
}

// grid calls f over speeds from creeping to the top, of both signs, and film temperatures from below to
// above the table of air.
func (l law) grid(f func(speed, t float64)) {
	for _, t := range []float64{120, 171, 203, 250, 293.15, 331.7, 420, 550, 612, 777.7, 999, 1013, 1200} {
		for x := 1e-5; x < 1; x *= 1.07 {
			f(x*l.top, t)
			f(-x*l.top, t)
		}
	}
}

func TestFastAgreesWithPlain(t *testing.T) {
	for _, l := range laws() {
		worst := 0.0
		l.grid(func(v, T float64) {
			h, _, _ := l.fast(v, T)
			worst = math.Max(worst, off(h, l.plain(v, T)))
		})
		if worst > 1e-13 {
			t.Errorf("%s: the two writings differ by %.2g", l.name, worst)
		}
	}
}

func TestSlopesAgainstDifferences(t *testing.T) {
	for _, l := range laws() {
		worstT, worstV := 0.0, 0.0
		l.grid(func(v, T float64) {
			h, dT, dV := l.fast(v, T)
			at := func(v, T float64) float64 { h, _, _ := l.fast(v, T); return h }
			e := 1e-5 * math.Abs(v)
			worstV = math.Max(worstV, math.Abs((at(v+e, T)-at(v-e, T))/(2*e)-dV)*math.Abs(v)/h)
			e = 1e-5 * T
			worstT = math.Max(worstT, math.Abs((at(v, T+e)-at(v, T-e))/(2*e)-dT)*T/h)
		})
		// A difference over a change of formula sees half the jump of the second derivative times its step
		// of 1e-5: up to some tens of h/v^2 on the bridges.
		if worstT > 5e-4 || worstV > 5e-4 {
			t.Errorf("%s: slopes off by %.2g (temperature), %.2g (speed), relative to h/T and h/v", l.name, worstT, worstV)
		}
	}
}

// Values and slopes must run on through every change of formula, through rest and through the rows of air.
func TestContinuity(t *testing.T) {
	const tiny = 1e-9
	for _, l := range laws() {
		at := func(what string, v1, t1, v2, t2 float64) {
			t.Helper()
			h1, dT1, dV1 := l.fast(v1, t1)
			h2, dT2, dV2 := l.fast(v2, t2)
			scaleT, scaleV := h1/t1, h1/math.Abs(v1)
			if off(h2, h1) > 1e-7 || math.Abs(dT2-dT1) > 1e-6*scaleT || math.Abs(dV2-dV1) > 1e-6*scaleV {
				t.Errorf("%s, %s: (%g, %g, %g) beside (%g, %g, %g)", l.name, what, h1, dT1, dV1, h2, dT2, dV2)
			}
		}
		air := Air{}
		if strings.HasSuffix(l.name, "air") {
			air.Pressure = 7e4
		}
		for _, re := range l.edges {
			v := re * air.At(400).Viscosity / l.length
			at(fmt.Sprintf("Re %g", re), v*(1-tiny), 400, v*(1+tiny), 400)
		}
		for _, T := range []float64{150, 200, 300, 850, 1000, 1050} {
			at(fmt.Sprintf("%g K", T), l.top/2, T*(1-tiny), l.top/2, T*(1+tiny))
		}
		if h, dT, dV := l.fast(0, 400); h != 0 || dT != 0 || dV != 0 {
			t.Errorf("%s at rest: (%g, %g, %g), want zeros", l.name, h, dT, dV)
		}
	}
}

func TestRisesWithSpeed(t *testing.T) {
	for _, l := range laws() {
		last := 0.0
		for v := l.top * 1e-5; v < l.top; v *= 1.003 {
			h, _, dV := l.fast(v, 350)
			if h <= last || dV <= 0 {
				t.Fatalf("%s falls at speed %g: %g after %g, slope %g", l.name, v, h, last, dV)
			}
			last = h
		}
		back, _, dBack := l.fast(-l.top/3, 350)
		forth, _, dForth := l.fast(l.top/3, 350)
		if back != forth || dBack != -dForth {
			t.Errorf("%s backwards: %g, %g, forwards %g, %g", l.name, back, dBack, forth, dForth)
		}
	}
}

func TestCovers(t *testing.T) {
	for _, l := range laws() {
		for _, c := range []struct {
			v, T float64
			want bool
		}{{0, 300, true}, {l.top / 4, 300, true}, {-l.top / 4, 300, true}, {l.top / 4, 199, false}, {l.top / 4, 1001, false},
			{1e3 * l.top, 300, false}, {-1e3 * l.top, 300, false}, {l.top / 4, math.NaN(), false}} {
			if got := l.covers(c.v, c.T); got != c.want {
				t.Errorf("%s at speed %g, %g K: covered %t, want %t", l.name, c.v, c.T, got, c.want)
			}
		}
	}
}

// Bad numbers of a failing step must come out as such and not stop the program.
func TestNotANumberGoesThrough(t *testing.T) {
	for _, l := range laws() {
		for _, c := range [][2]float64{{math.NaN(), 300}, {1, math.NaN()}} {
			if h, _, _ := l.fast(c[0], c[1]); !math.IsNaN(h) {
				t.Errorf("%s at (%g, %g): got %g", l.name, c[0], c[1], h)
			}
		}
		for _, T := range []float64{-1e300, math.Inf(-1), math.Inf(1), 0} {
			if h, _, _ := l.fast(l.top/2, T); !(h > 0) || math.IsInf(h, 0) {
				t.Errorf("%s at %g K: got %g, want the levelled value", l.name, T, h)
			}
		}
	}
}

func TestNothingIsAllocated(t *testing.T) {
	for _, l := range laws() {
		if n := testing.AllocsPerRun(100, func() { l.fast(l.top/3, 350) }); n != 0 {
			t.Errorf("%s: %g allocations", l.name, n)
		}
	}
}

func BenchmarkCoefficient(b *testing.B) {
	for _, l := range laws() {
		if strings.HasSuffix(l.name, "air") {
			continue
		}
		for _, part := range []struct {
			name string
			re   float64
		}{{"laminar", 0.9 * l.edges[1]}, {"bridge", (l.edges[1] + l.edges[2]) / 2}, {"turbulent", 2 * l.edges[2]}} {
			v := part.re * 2.6e-5 / l.length
			b.Run(l.name+"/"+part.name, func(b *testing.B) {
				b.ReportAllocs()
				for b.Loop() {
					l.fast(v, 400)
				}
			})
		}
	}
}
