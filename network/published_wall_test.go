package network_test

import (
	"fmt"
	"math"
	"strings"
	"testing"
)

// A plate is one half of a rubbed wall: heat comes in at x = 0, x = length is insulated by symmetry.
type plate struct {
	k, rho, c float64 // W/(m K), kg/m^3, J/(kg K)
	length    float64 // m
	flux      float64 // W/m^2 at the start of the stop
	stop      float64 // s, in which the flux falls to zero along a straight line
}

// rise is the closed form of the plate's temperature rise at a depth below the rubbed face and a time within
// the stop. The answer to a constant flux is the series of Carslaw and Jaeger, Conduction of Heat in Solids (from
// memory): (flux L/k)(Fo + (3 X^2 - 1)/6 - (2/pi^2) sum (-1)^n/n^2 exp(-n^2 pi^2 Fo) cos(n pi X)), X = 1 - x/L. That
// to a falling one is, by Duhamel, const(t) - (1/stop) integral of const from 0 to t, done term by term here.
func (p plate) rise(depth, t float64) float64 {
	x := 1 - depth/p.length
	rate := p.k / (p.rho * p.c * p.length * p.length) // of Fo, 1/s
	fo, poly := rate*t, (3*x*x-1)/6
	sum := fo + poly - (0.5*rate*t*t+poly*t)/p.stop
	for n := 1; n <= 4000; n++ {
		m := float64(n) * float64(n) * math.Pi * math.Pi
		mode := 2 / m * math.Cos(float64(n)*math.Pi*(x-1)) // (-1)^n cos(n pi x)
		decay := math.Exp(-m * fo)
		sum -= mode * (decay + math.Expm1(-m*fo)/(m*rate*p.stop))
	}
	return p.flux * p.length / p.k * sum
}

// netlist is the plate, of one square metre, in n cells; the rubbed face is a node without mass, half a cell
// from the first.
func (p plate) netlist(n int, area float64, more, pads, duty string) string {
	dx := p.length / float64(n)
	var b strings.Builder
	b.WriteString(`{"workheat": 1, "nodes": {"face": {"massless": true, "start": "0 degC"}`)
	for i := 1; i <= n; i++ {
		fmt.Fprintf(&b, `, "c%d": {"heat capacity": "%.17g J/K", "start": "0 degC"}`, i, p.rho*p.c*dx*area)
	}
	fmt.Fprintf(&b, `%s}, "conductances": {"half": {"kind": "conduction", "between": ["face", "c1"], "value": "%.17g W/K"}`, pads, 2*p.k*area/dx)
	for i := 1; i < n; i++ {
		fmt.Fprintf(&b, `, "l%d": {"kind": "conduction", "between": ["c%d", "c%d"], "value": "%.17g W/K"}`, i, i, i+1, p.k*area/dx)
	}
	fmt.Fprintf(&b, `}, %s, "duty": %s}`, more, duty)
	return b.String()
}

// stopped is the plate under a given heat.
func (p plate) stopped(n int) string {
	source := fmt.Sprintf(`"sources": {"rubbing": {"kind": "given heat", "into": "face", "power": {"table": [["0 s", "%.17g W"], ["%.17g s", "0 W"]]}}}`, p.flux, p.stop)
	return p.netlist(n, 1, source, "", rest(p.stop))
}

// extrapolated is the limit of a result of second order in the cell from n/2 and n cells.
func extrapolated(coarse, fine float64) float64 { return fine + (fine-coarse)/3 }

// The series against values computed on their own from the same published formulas, printed to three or six
// decimals: a check of the closed form that the runs below are held against.
func TestSeriesOfTheStop(t *testing.T) {
	s1 := plate{53.3, 7150, 490, 6e-3, 1847222.2, 3.472222}
	thick := s1
	thick.length = 12e-3
	s2 := plate{51, 7100, 51 / 7100. / 1.44e-5, 5.5e-3, 1e6, 3.96}
	s3 := plate{48, 7200, 500, 11e-3, 2e6, 4}
	cases := []struct {
		name           string
		p              plate
		depth, t, want float64
		tol            float64
	}{
		{"6 mm, a quarter of the stop", s1, 0, 0.25 * s1.stop, 120.674, 1e-3},
		{"6 mm, half of the stop", s1, 0, 0.5 * s1.stop, 152.195, 1e-3},
		{"6 mm, end of the stop", s1, 0, s1.stop, 155.710, 1e-3},
		{"6 mm, its highest", s1, 0, 2.684, 163.583, 1e-3},
		{"6 mm, middle of the disc", s1, 6e-3, 0.5 * s1.stop, 94.369, 1e-3},
		{"12 mm, its highest", thick, 0, 1.750, 134.108, 1e-3},
		{"5.5 mm, 0.1 s", s2, 0, 0.1, 26.103, 1e-3},
		{"5.5 mm, 3 s", s2, 0, 3, 105.659, 1e-3},
		{"5.5 mm, middle, 2 s", s2, 5.5e-3, 2, 66.739, 1e-3},
		{"11 mm, end of the stop", s3, 0, 4, 122.643775, 2e-6},
		{"11 mm, back, 3 s", s3, 11e-3, 3, 59.753800, 2e-6},
		{"11 mm, half way, 1 s", s3, 5.5e-3, 1, 28.922139, 2e-6},
	}
	for _, c := range cases {
		near(t, c.name, c.p.rise(c.depth, c.t), c.want, c.tol)
	}
	// Before the back feels the heat, the face follows the half-space: (2 flux/k) sqrt(a t/pi) (1 - 2 t/(3 stop)).
	for _, x := range []float64{0.05, 0.1, 0.2} {
		half := 2 * s3.flux / s3.k * math.Sqrt(s3.k/(s3.rho*s3.c)*x/math.Pi) * (1 - 2*x/(3*s3.stop))
		near(t, fmt.Sprintf("half-space at %g s", x), s3.rise(0, x), half, 1e-7)
	}
}

// A single stop of a car from 100 km/h at 8 m/s^2 on a disc of two halves of 6 mm: 1500 kg, 0.35 of the braking at this
// disc, 0.95 of that in the disc, 0.060 m^2 for both faces, iron k 53.3, rho 7150, c 490. The flux into the face
// falls along a straight line from 1 847 222 W/m^2. The wall in cells comes to the series at second order, at the face
// and in the middle of the disc, and the highest rise to 163.583 K at 2.684 s (computed from the series).
func TestStopOnAWallInCells(t *testing.T) {
	v := 100 / 3.6
	p := plate{53.3, 7150, 490, 6e-3, 1500 * 8 * v * 0.35 * 0.95 / 0.060, v / 8}
	near(t, "flux", p.flux, 1847222.2, 0.1)
	var faceErr, backErr, peak []float64
	cells := []int{8, 16, 32, 64}
	for _, n := range cells {
		o := run(t, p.netlist(n, 0.060,
			`"bodies": {"car": {"kind": "road vehicle", "mass": "1500 kg"}},
			"dissipators": {"brake": {"kind": "friction pad", "slows": "car", "part of braking": 0.35, "heats": {"face": 0.95, "pads": 0.05}}}`,
			`, "pads": {"heat capacity": "600 J/K", "start": "0 degC"}`,
			`[{"brake": {"from": "100 km/h", "to": "0 km/h", "deceleration": "8 m/s^2"}}]`), 1e-9)
		near(t, "end", o.End, p.stop, 1e-12)
		near(t, "heat in the disc", o.flow("half")*o.End, 192418.98, 0.005)
		faceErr = append(faceErr, math.Abs(o.at("face", 2.684)-celsius(p.rise(0, 2.684))))
		last := fmt.Sprintf("c%d", n)
		backErr = append(backErr, math.Abs(o.at(last, 2.684)-celsius(p.rise(p.length, 2.684))))
		highest, when := o.peak("face")
		peak = append(peak, highest-celsius(0))
		if n == 64 {
			near(t, "time of the highest", when, 2.684, 1e-3)
		}
	}
	for k := 1; k < len(cells); k++ {
		for _, e := range [2]struct {
			where string
			err   []float64
		}{{"face", faceErr}, {"middle", backErr}} {
			if order := math.Log2(e.err[k-1] / e.err[k]); math.Abs(order-2) > 0.1 {
				t.Errorf("%s, %d to %d cells: observed order %.3f, want 2 (errors %g and %g K)", e.where, cells[k-1], cells[k], order, e.err[k-1], e.err[k])
			}
		}
	}
	near(t, "highest rise in the limit", extrapolated(peak[2], peak[3]), 163.583, 1e-3)
}

// Other stops at several times, in the limit of fine cells: within 2e-3 K of the series, which leaves the fourth order
// of the coarser wall and, at the first times, a heated layer only a few cells deep.
func TestStopsInTheLimitOfFineCells(t *testing.T) {
	cases := []struct {
		name  string
		p     plate
		times []float64
	}{
		{"iron 5.5 mm, unit flux", plate{51, 7100, 51 / 7100. / 1.44e-5, 5.5e-3, 1e6, 3.96}, []float64{0.5, 1, 2, 3, 3.96}},
		{"iron 11 mm, 2 MW/m^2", plate{48, 7200, 500, 11e-3, 2e6, 4}, []float64{0.5, 1, 1.5, 2, 2.5, 3, 4}},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			coarse, fine := run(t, c.p.stopped(32), 1e-9), run(t, c.p.stopped(64), 1e-9)
			for _, x := range c.times {
				near(t, fmt.Sprintf("face at %g s", x), extrapolated(coarse.at("face", x), fine.at("face", x)), celsius(c.p.rise(0, x)), 2e-3)
				near(t, fmt.Sprintf("back at %g s", x), extrapolated(coarse.at("c32", x), fine.at("c64", x)), celsius(c.p.rise(c.p.length, x)), 2e-3)
			}
		})
	}
}

// A wall cooled through half a cell at its face: the slowest rate of n cells is (4 n^2 k/(rho c L^2)) sin^2(pi/(4 n)), and
// the mean of a wall at 1 degree above falls, for Fo = 0.1 and 0.5, to what an eigenvalue solver gave for the same
// cells and what the exact series gives for the wall (0.643176600 and 0.236049669). Computed; order 2 in the cell.
func TestCooledWall(t *testing.T) {
	want := map[int][2]float64{4: {.65821589, .24291184}, 8: {.64671716, .23774932}, 16: {.64405146, .23647360}, 32: {.64339470, .23615559}, 64: {.64323109, .23607615}}
	exact := [2]float64{.643176600, .236049669}
	last := [2]float64{math.NaN(), math.NaN()}
	for _, n := range []int{4, 8, 16, 32, 64} {
		// 1 J/K in all and 1 W/K through the whole wall: Fo is the time in s.
		var nodes, links strings.Builder
		for i := 1; i <= n; i++ {
			fmt.Fprintf(&nodes, `"c%d": {"heat capacity": "%.17g J/K", "start": "1 degC"}, `, i, 1/float64(n))
		}
		for i := 1; i < n; i++ {
			fmt.Fprintf(&links, `, "l%d": {"kind": "conduction", "between": ["c%d", "c%d"], "value": "%d W/K"}`, i, i, i+1, n)
		}
		o := run(t, fmt.Sprintf(`{"workheat": 1, "nodes": {%s "cold": {"held": "0 degC"}},
		"conductances": {"half": {"kind": "conduction", "between": ["cold", "c1"], "value": "%d W/K"}%s}, "duty": %s}`,
			nodes.String(), 2*n, links.String(), rest(0.5)), 1e-11)
		for k, fo := range [2]float64{0.1, 0.5} {
			mean := 0.0
			for i := 1; i <= n; i++ {
				mean += (o.at(fmt.Sprintf("c%d", i), fo) - celsius(0)) / float64(n)
			}
			near(t, fmt.Sprintf("%d cells, mean at Fo %g", n, fo), mean, want[n][k], 1e-8)
			err := mean - exact[k]
			if order := math.Log2(last[k] / err); math.Abs(order-2) > 0.1 { // false for the first, which has no coarser one
				t.Errorf("%d cells, Fo %g: observed order %.3f, want 2", n, fo, order)
			}
			last[k] = err
		}
	}
}
