package duty

import (
	"math"

	"workheat/network/element"
)

// A Motion is a stretch of time over which the vehicle's speed is one smooth function and it is either
// braked or driven all the time.
type Motion struct {
	T0, T1  float64
	v0, a   float64 // speed at T0; acceleration of a ramp
	braked  bool
	inertia float64 // kg, mass with the rotating parts
	mass    float64
	still   float64 // N, grade and rolling resistance
	air     float64 // kg/m, air drag over speed squared
	grade   float64 // rise over run
	sine    float64 // of the grade's angle
	roll    float64 // N, rolling resistance alone
	coast   *coast
}

// road returns a motion with the vehicle's resistances on a grade and no speed yet.
func road(v *element.Vehicle, grade float64) Motion {
	if !Given(grade) {
		grade = v.Grade
	}
	cosine := 1 / math.Sqrt(1+grade*grade)
	m := Motion{inertia: v.Mass * v.Rotating, mass: v.Mass, grade: grade, sine: grade * cosine, air: 0.5 * v.Air * v.DragArea}
	m.roll = v.Mass * Gravity * v.Rolling * cosine
	m.still = v.Mass*Gravity*m.sine + m.roll
	return m
}

// need returns the force [N] that the drive must give at a speed and acceleration; negative: the brakes.
func (m *Motion) need(v, a float64) float64 {
	if v == 0 && a == 0 {
		return 0 // a parked vehicle does no work
	}
	return m.inertia*a + m.still + m.air*v*v
}

// ramp appends the motion from v0 at acceleration a over [t0, t1], cut where braking turns to driving.
func ramp(list []Motion, base Motion, t0, t1, v0, a float64) []Motion {
	base.T0, base.T1, base.v0, base.a = t0, t1, v0, a
	v1 := v0 + a*(t1-t0)
	if base.air > 0 && a != 0 {
		if v2 := -(base.inertia*a + base.still) / base.air; v2 > 0 {
			v := math.Sqrt(v2)
			t := t0 + (v-v0)/a
			if (v-v0)*(v-v1) < 0 && t > t0 && t < t1 {
				return append(list, base.cut(t0, t, v0), base.cut(t, t1, v))
			}
		}
	}
	return append(list, base.cut(t0, t1, v0))
}

// cut returns the part of a ramp over [t0, t1] with its mode told from its middle.
func (m Motion) cut(t0, t1, v0 float64) Motion {
	m.T0, m.T1, m.v0 = t0, t1, v0
	m.braked = m.need(v0+m.a*0.5*(t1-t0), m.a) < 0
	return m
}

// Speed returns the speed [m/s] at time t.
func (m *Motion) Speed(t float64) float64 {
	if m.coast != nil {
		return m.coast.speed(t - m.T0)
	}
	return m.v0 + m.a*(t-m.T0)
}

// Grade returns the slope of the road, rise over run.
func (m *Motion) Grade() float64 { return m.grade }

// Signals returns the speed and the braking power of all brakes together at time t, with their rates.
func (m *Motion) Signals(t float64) (v, dv, power, dpower float64) {
	if m.coast != nil {
		v = m.coast.speed(t - m.T0)
		dv = -(m.coast.brake + m.still + m.air*v*v) / m.inertia
		return v, dv, m.coast.brake * v, m.coast.brake * dv
	}
	v = m.v0 + m.a*(t-m.T0)
	if !m.braked {
		return v, m.a, 0, 0
	}
	force := -m.need(v, m.a)
	return v, m.a, force * v, force*m.a - 2*m.air*v*m.a*v
}

// An Account is the mechanical side of a stretch of motion, in joules, and its length in metres.
type Account struct {
	Distance float64
	Kinetic  float64 // gain of kinetic energy
	Climb    float64 // work against gravity
	Rolling  float64 // work against rolling resistance
	Air      float64 // work against air drag
	Brake    float64 // work taken by all brakes
	Torqued  float64 // of this, what was taken under a constant torque
	Drive    float64 // work given by the engine
}

// Add adds another stretch.
func (a *Account) Add(b Account) {
	a.Distance += b.Distance
	a.Kinetic += b.Kinetic
	a.Climb += b.Climb
	a.Rolling += b.Rolling
	a.Air += b.Air
	a.Brake += b.Brake
	a.Torqued += b.Torqued
	a.Drive += b.Drive
}

// Account returns the account of the motion over [ta, tb] within it, in closed form.
func (m *Motion) Account(ta, tb float64) Account {
	va, vb, dt := m.Speed(ta), m.Speed(tb), tb-ta
	a := Account{
		Distance: 0.5 * (va + vb) * dt,
		Kinetic:  0.5 * m.inertia * (vb - va) * (vb + va),
		Air:      m.air * dt * (va*va + vb*vb) * (va + vb) / 4,
	}
	if m.coast != nil {
		a.Distance = m.coast.distance(va, vb)
	}
	a.Climb = m.mass * Gravity * m.sine * a.Distance
	a.Rolling = m.roll * a.Distance
	if m.coast != nil {
		a.Brake = m.coast.brake * a.Distance
		a.Torqued = a.Brake
		a.Air = -a.Kinetic - a.Climb - a.Rolling - a.Brake
		return a
	}
	if need := a.Kinetic + a.Climb + a.Rolling + a.Air; m.braked {
		a.Brake = -need
	} else if va != 0 || vb != 0 {
		a.Drive = need
	}
	return a
}

// A coast is a motion under a constant braking force: inertia·dv/dt = −(K + air·v²) with K = brake + still.
// With w = √(|K|/air) and τ = tan(rate·t), or tanh when K < 0, the addition theorem gives
//
//	v = (v0 ∓ w·τ)/(1 + v0·τ/w)
//
// which loses no digits when either K or the air drag is all but zero.
type coast struct {
	brake, k, air, inertia float64
	v0, rate, scale        float64 // scale: w
}

func newCoast(m *Motion, brake, v0 float64) *coast {
	c := &coast{brake: brake, k: brake + m.still, air: m.air, inertia: m.inertia, v0: v0}
	if m.air == 0 || c.k == 0 {
		return c
	}
	c.scale = math.Sqrt(math.Abs(c.k) / m.air)
	c.rate = math.Sqrt(math.Abs(c.k)*m.air) / m.inertia
	return c
}

// speed returns the speed after a time.
func (c *coast) speed(t float64) float64 {
	switch {
	case c.air == 0:
		return c.v0 - c.k/c.inertia*t
	case c.k == 0:
		return c.v0 / (1 + c.air*c.v0*t/c.inertia)
	case c.k > 0:
		tau := math.Tan(c.rate * t)
		return (c.v0 - c.scale*tau) / (1 + c.v0*tau/c.scale)
	}
	tau := math.Tanh(c.rate * t)
	return (c.v0 + c.scale*tau) / (1 + c.v0*tau/c.scale)
}

// time returns when the speed has fallen to v1, or ok = false if it never does.
func (c *coast) time(v1 float64) (t float64, ok bool) {
	if c.k+c.air*v1*v1 <= 0 {
		return 0, false
	}
	lost := c.v0 - v1
	switch {
	case c.air == 0:
		return lost * c.inertia / c.k, true
	case c.k == 0:
		return lost / v1 * c.inertia / (c.air * c.v0), true
	case c.k > 0:
		return math.Atan(c.scale*lost/(c.scale*c.scale+c.v0*v1)) / c.rate, true
	}
	return math.Atanh(c.scale*lost/(c.v0*v1-c.scale*c.scale)) / c.rate, true
}

// distance returns the way between two speeds.
func (c *coast) distance(va, vb float64) float64 {
	if c.air == 0 {
		return 0.5 * (va - vb) * (va + vb) * c.inertia / c.k
	}
	high, low := c.k+c.air*va*va, c.k+c.air*vb*vb
	return c.inertia / (2 * c.air) * math.Log1p((high-low)/low)
}
