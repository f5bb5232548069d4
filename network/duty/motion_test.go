package duty

import (
	"fmt"
	"math"
	"testing"

	"workheat/network/element"
)

// car is a vehicle with invented data.
var car = element.Vehicle{Mass: 1500, Rotating: 1.05, Rolling: 0.011, DragArea: 0.7, Air: 1.2, Wheel: 0.3}

func near(t *testing.T, what string, got, want, tol float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tol) {
		t.Errorf("%s: got %.15g, want %.15g", what, got, want)
	}
}

// integrate returns the area under f by Simpson's rule on n pairs of intervals.
func integrate(f func(float64) float64, a, b float64, n int) float64 {
	h := (b - a) / float64(2*n)
	sum := f(a) + f(b)
	for i := 1; i < 2*n; i++ {
		sum += f(a+float64(i)*h) * float64(2+2*(i%2))
	}
	return sum * h / 3
}

// coasts are braking forces and grades with each sign of what is left of the force at standstill, and with
// and without air.
var coasts = []struct {
	name         string
	brake, grade float64
	air          bool
	to           float64 // m/s
}{
	{"level road, brakes and air", 2000, 0, true, 0},
	{"downhill, brakes hold back more than the hill", 2000, -0.05, true, 3},
	{"downhill, the air does the rest", 100, -0.06, true, 39},
	{"downhill, hill and rolling in balance", 0, -0.011, true, 12},
	{"no air, level", 1500, 0, false, 5},
	{"no air, uphill", 10, 0.08, false, 0},
	{"hardly any resistance but air", 1e-3, -0.011, true, 20},
}

// A motion under a constant force follows its differential equation: closed forms against the classical
// Runge-Kutta method of order 4 in steps so fine that its error does not count.
func TestCoastFollowsItsEquation(t *testing.T) {
	for _, c := range coasts {
		v := car
		if !c.air {
			v.DragArea = 0
		}
		m := road(&v, c.grade)
		const v0 = 40.0
		m.coast = newCoast(&m, c.brake, v0)
		if c.name == "downhill, hill and rolling in balance" {
			m.still = 0 // exactly
			m.coast = newCoast(&m, 0, v0)
		}
		m.braked = true
		end, ok := m.coast.time(c.to)
		if !ok {
			t.Errorf("%s: never slows to %g m/s", c.name, c.to)
			continue
		}
		m.T0, m.T1 = 0, end
		slope := func(v float64) float64 { return -(c.brake + m.still + m.air*v*v) / m.inertia }
		const steps = 4000
		x, way, h := v0, 0.0, end/steps
		for i := range steps {
			if i%400 == 0 {
				near(t, c.name+": speed", m.Speed(float64(i)*h), x, 1e-9)
			}
			k1 := slope(x)
			k2 := slope(x + h/2*k1)
			k3 := slope(x + h/2*k2)
			k4 := slope(x + h*k3)
			middle := x + h/2*(5*k1+4*k2+4*k3-k4)/12 // order 3 at the middle
			next := x + h/6*(k1+2*k2+2*k3+k4)
			way += h / 6 * (x + 4*middle + next)
			x = next
		}
		near(t, c.name+": speed at the end", x, c.to, 1e-9)
		near(t, c.name+": way", m.Account(0, end).Distance, way, 1e-6)
	}
}

// A speed below the one at which air, hill and brakes balance is never reached.
func TestCoastThatNeverEnds(t *testing.T) {
	m := road(&car, -0.06)
	balance := math.Sqrt(-(100 + m.still) / m.air)
	c := newCoast(&m, 100, 40)
	if _, ok := c.time(balance * 0.999); ok {
		t.Error("slows below the speed of balance")
	}
	if end, ok := c.time(balance * 1.001); !ok || math.IsNaN(end) || end <= 0 {
		t.Errorf("just above the speed of balance: %g s, %t", end, ok)
	}
}

// motions returns one of every sort: braked and driven ramps, held speeds, standstill, coasts.
func motions() map[string]Motion {
	list := map[string]Motion{}
	add := func(name string, v *element.Vehicle, grade, v0, a, end float64) {
		for i, m := range ramp(nil, road(v, grade), 2, 2+end, v0, a) {
			list[fmt.Sprintf("%s, part %d", name, i+1)] = m
		}
	}
	bare := car
	bare.DragArea = 0
	add("braking", &car, 0, 30, -3, 8)
	add("braking to a stop downhill", &car, -0.08, 20, -2, 10)
	add("slowing gently, air first", &car, 0, 45, -0.2, 150)
	add("slowing gently without air", &bare, 0, 45, -0.2, 150)
	add("speeding up", &car, 0.02, 3, 1.5, 12)
	add("speeding up downhill", &car, -0.1, 5, 0.3, 160)
	add("holding on the level", &car, 0, 25, 0, 60)
	add("holding downhill", &car, -0.07, 15, 0, 60)
	add("parked on a hill", &car, -0.07, 0, 0, 60)
	for _, c := range coasts[:3] {
		m := road(&car, c.grade)
		m.coast, m.braked, m.T0 = newCoast(&m, c.brake, 40), true, 2
		end, _ := m.coast.time(c.to)
		m.T1 = 2 + end
		list["coast "+c.name] = m
	}
	return list
}

// Accounts in closed form are the areas under forces times speed, and drive pays for all the rest.
func TestAccountsAgainstQuadrature(t *testing.T) {
	for name, m := range motions() {
		for _, part := range [][2]float64{{0, 1}, {0.2, 0.7}} {
			ta, tb := m.T0+part[0]*(m.T1-m.T0), m.T0+part[1]*(m.T1-m.T0)
			a := m.Account(ta, tb)
			area := func(f func(v, power float64) float64) float64 {
				return integrate(func(t float64) float64 {
					v, _, power, _ := m.Signals(t)
					return f(v, power)
				}, ta, tb, 400)
			}
			scale := 1e-9 * (math.Abs(a.Kinetic) + math.Abs(a.Climb) + a.Rolling + a.Air + 1)
			near(t, name+": distance", a.Distance, area(func(v, _ float64) float64 { return v }), 1e-9*(1+a.Distance))
			near(t, name+": kinetic", a.Kinetic, 0.5*car.Mass*car.Rotating*(m.Speed(tb)*m.Speed(tb)-m.Speed(ta)*m.Speed(ta)), scale)
			slope := math.Atan(m.Grade())
			near(t, name+": climb", a.Climb, car.Mass*9.80665*math.Sin(slope)*a.Distance, scale)
			near(t, name+": rolling", a.Rolling, 0.011*car.Mass*9.80665*math.Cos(slope)*a.Distance, scale)
			near(t, name+": air", a.Air, area(func(v, _ float64) float64 { return m.air * v * v * v }), scale)
			near(t, name+": brakes", a.Brake, area(func(_, power float64) float64 { return power }), scale)
			near(t, name+": sum", a.Drive, a.Kinetic+a.Climb+a.Rolling+a.Air+a.Brake, scale)
			if a.Brake < 0 || a.Drive < -scale || a.Brake > 0 && a.Drive > scale {
				t.Errorf("%s: brakes take %g J while the engine gives %g J", name, a.Brake, a.Drive)
			}
		}
	}
}

// Rates of speed and power are their slopes in time.
func TestRatesAgainstDifferences(t *testing.T) {
	const dt = 1e-4
	for name, m := range motions() {
		for _, part := range []float64{0.1, 0.5, 0.9} {
			at := m.T0 + part*(m.T1-m.T0)
			_, dv, _, dpower := m.Signals(at)
			v0, _, p0, _ := m.Signals(at - dt)
			v1, _, p1, _ := m.Signals(at + dt)
			near(t, name+": acceleration", dv, (v1-v0)/(2*dt), 1e-8)
			near(t, name+": rate of power", dpower, (p1-p0)/(2*dt), 1e-7*(1+math.Abs(dpower))+1e-11*math.Abs(p0)/dt)
		}
	}
}

// A gentle slowing is held back by air first and driven at last, or the other way about, and is cut where
// the force of the brakes passes zero.
func TestRampsAreCutWhereBrakingTurnsToDriving(t *testing.T) {
	slowing := ramp(nil, road(&car, 0), 0, 150, 45, -0.2)
	if len(slowing) != 2 || slowing[0].braked || !slowing[1].braked {
		t.Fatalf("slowing gently: %d parts, want one driven and one braked: %+v", len(slowing), slowing)
	}
	speeding := ramp(nil, road(&car, -0.1), 0, 160, 5, 0.3)
	if len(speeding) != 2 || !speeding[0].braked || speeding[1].braked {
		t.Fatalf("speeding up downhill: %d parts, want one braked and one driven", len(speeding))
	}
	for _, list := range [][]Motion{slowing, speeding} {
		cut := list[0].T1
		if list[1].T0 != cut {
			t.Errorf("the parts do not join: %g s and %g s", cut, list[1].T0)
		}
		near(t, "speed at the cut", list[1].Speed(cut), list[0].Speed(cut), 1e-12)
		near(t, "force at the cut", list[0].need(list[0].Speed(cut), list[0].a), 0, 1e-9)
	}
	for _, c := range []struct {
		name       string
		a, v0, end float64
		braked     bool
	}{{"hard braking", -4, 40, 10, true}, {"hard acceleration", 3, 0, 10, false}, {"held on the level", 0, 20, 10, false}} {
		if list := ramp(nil, road(&car, 0), 0, c.end, c.v0, c.a); len(list) != 1 || list[0].braked != c.braked {
			t.Errorf("%s: %d parts, braked %t; want one, braked %t", c.name, len(list), list[0].braked, c.braked)
		}
	}
}

// 416.67 J/kg are taken by the brakes from 120 to 60 km/h without resistances: (v1² - v2²)/2.
func TestSnubOfTheRegulation(t *testing.T) {
	bare := element.Vehicle{Mass: 1, Rotating: 1}
	list := ramp(nil, road(&bare, None), 0, 1/1.8*10, 120/3.6, -3)
	near(t, "work per mass", list[0].Account(0, list[0].T1).Brake, (math.Pow(120/3.6, 2)-math.Pow(60/3.6, 2))/2, 1e-9)
	near(t, "work per mass, by its number", list[0].Account(0, list[0].T1).Brake, 416.67, 0.005)
}
