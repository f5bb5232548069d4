package library_test

import (
	"math"
	"testing"

	"workheat/library"
	"workheat/network/element"
)

// one returns the flow of one element between two temperatures in degC at a speed of vehicle and wind.
func one(t *testing.T, kind string, fields map[string]string, a, b, v float64) float64 {
	t.Helper()
	k, d, found := declare(t, library.Catalogue(), sample{element.Conductances, kind, fields, []int{0, 1}, nil})
	if len(*found) != 0 {
		t.Fatalf("%s: %v", kind, *found)
	}
	batch := k.Batch()
	batch.Add(d)
	s := &element.State{T: []float64{a + 273.15, b + 273.15}, Signal: make([]float64, signals), Rate: make([]float64, signals)}
	s.Signal[speed], s.Signal[wind] = v, v
	q := []float64{math.NaN()}
	batch.Flows(q, s)
	return q[0]
}

func near(t *testing.T, what string, got, want, tol float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tol) {
		t.Errorf("%s: got %.8g, want %.8g within %g", what, got, want, tol)
	}
}

// Radiation coefficients against surroundings at 20 degC, W/(m^2 K), from h = eps sigma (T^2+Ta^2)(T+Ta) by
// hand calculator; to two decimals.
func TestRadiationCoefficients(t *testing.T) {
	rows := []struct {
		emissivity string
		h          [8]float64 // at 100, 200 ... 800 degC
	}{
		{"0.55", [8]float64{4.68, 7.40, 11.20, 16.25, 22.74, 30.86, 40.79, 52.73}},
		{"0.8", [8]float64{6.81, 10.77, 16.29, 23.63, 33.07, 44.88, 59.34, 76.71}},
	}
	for _, row := range rows {
		for i, want := range row.h {
			hot := 100 * float64(i+1)
			q := one(t, "radiation", map[string]string{"emissivity": row.emissivity, "area": "1 m^2"}, hot, 20, 0)
			near(t, "coefficient of radiation", q/(hot-20), want, 0.005+1e-9)
		}
	}
}

// Kreith, Manglik and Bohn, Principles of Heat Transfer, example 1.10: emissivity 0.9, 500 K against 300 K,
// coefficient of radiation 13.88 W/(m^2 K).
func TestRadiationOfAPipe(t *testing.T) {
	q := one(t, "radiation", map[string]string{"emissivity": "0.9", "area": "1 m^2"}, 500-273.15, 300-273.15, 0)
	near(t, "coefficient", q/200, 13.880, 0.005)
}

// Incropera, DeWitt, Bergman and Lavine, example 5.2: a thermocouple junction with h = 400 W/(m^2 K) in gas at
// 200 degC and emissivity 0.9 in a duct at 400 degC settles at 218.7 degC.
func TestThermocoupleJunctionSettles(t *testing.T) {
	net := func(junction float64) float64 {
		gas := one(t, "convection", map[string]string{"coefficient": "400 W/(m^2 K)", "area": "1 m^2"}, junction, 200, 0)
		duct := one(t, "radiation", map[string]string{"emissivity": "0.9", "area": "1 m^2"}, 400, junction, 0)
		return duct - gas
	}
	low, high := 200.0, 400.0
	for range 60 {
		if mid := (low + high) / 2; net(mid) > 0 {
			low = mid
		} else {
			high = mid
		}
	}
	near(t, "junction", low, 218.7, 0.05)
}

// Lienhard, A Heat Transfer Textbook, example 1.1: slab with k 35 W/(m K), 0.03 m, 0.4 m^2, 110 and 50 degC: 28 kW.
func TestSlabConducts(t *testing.T) {
	q := one(t, "conduction", map[string]string{"area": "0.4 m^2", "length": "0.03 m", "conductivity": "35 W/(m K)"}, 110, 50, 0)
	near(t, "heat", q, 28e3, 1e-8)
}

// Holman, Heat Transfer, example 2-11: two steel bars (k 16.3 W/(m K), 30 mm across, 100 mm long) in contact, 100 K
// from end to end; contact resistance 5.28e-4 m^2 K/W. The heat is 5.52 W, the drop in the joint 4.13 K.
func TestBarsInContact(t *testing.T) {
	bar := map[string]string{"area": "pi / 4 * (30 mm)^2", "length": "100 mm", "conductivity": "16.3 W/(m K)"}
	joint := map[string]string{"coefficient": "1 / (5.28e-4 m^2 K/W)", "area": "pi / 4 * (30 mm)^2"}
	series := 2/one(t, "conduction", bar, 1, 0, 0) + 1/one(t, "contact", joint, 1, 0, 0)
	q := 100 / series
	near(t, "heat", q, 5.52, 0.005)
	near(t, "drop", q/one(t, "contact", joint, 1, 0, 0), 4.13, 0.005)
}

// EN 1993-1-2, 3.4.1.3: k = 54 - 0.0333 t W/(m K) between 20 and 800 degC and 27.3 from there on. From 20 to 520 degC the
// integral is 54*500 - 0.0333*(520^2 - 20^2)/2 = 22504.5 W/m; on to 900 degC it gains 54*280 - 0.0333*(800^2 - 520^2)/2
// + 27.3*100.
func TestCarbonSteelConducts(t *testing.T) {
	steel := map[string]string{"area": "1 m^2", "length": "1 m", "material": "carbon steel"}
	near(t, "20 to 520 degC", one(t, "conduction", steel, 520, 20, 0), 22504.5, 1e-6)
	further := 280*54 - 0.0333*(800*800-520*520)/2 + 100*27.3
	near(t, "520 to 900 degC", one(t, "conduction", steel, 900, 520, 0), further, 1e-6)
}

// The power of speed: exact above a creep of 1 mm/s, smooth and rising below it, nothing at or behind rest.
func TestConvectionBySpeed(t *testing.T) {
	for _, n := range []string{"0.3", "0.5", "0.8", "1", "1.7", "2", "3"} {
		fields := map[string]string{"coefficient": "8 W/(m^2 K)", "area": "0.1 m^2", "speed coefficient": "5 W/(m^2 K)",
			"speed exponent": n, "speed": "wind"}
		h := func(v float64) float64 { return one(t, "convection", fields, 21, 20, v) / 0.1 }
		exponent := map[string]float64{"0.3": 0.3, "0.5": 0.5, "0.8": 0.8, "1": 1, "1.7": 1.7, "2": 2, "3": 3}[n]
		for _, v := range []float64{1e-3, 0.7, 1, 30} {
			near(t, "v^"+n, h(v), 8+5*math.Pow(v, exponent), 1e-10)
		}
		near(t, "rest", h(0), 8, 1e-12)
		near(t, "behind rest", h(-3), 8, 1e-12)
		last := h(0)
		for v := 1e-5; v < 1.2e-3; v += 1e-5 {
			next := h(v)
			if next < last {
				t.Errorf("exponent %s: the coefficient falls to %.17g at %g m/s", n, next, v)
			}
			if next-last > 5*math.Pow(1e-3, exponent)*0.05 {
				t.Errorf("exponent %s: the coefficient jumps by %g at %g m/s", n, next-last, v)
			}
			last = next
		}
	}
}

// The wheel radius of the element goes before that of the vehicle: a smaller wheel turns faster.
func TestWheelRadius(t *testing.T) {
	disc := map[string]string{"diameter": "280 mm", "area": "0.1 m^2", "speed of": "van"}
	vehicle := one(t, "rotating-disc convection", disc, 300, 20, 20)
	disc["wheel radius"] = "0.31 m" // as the vehicle's
	near(t, "the same radius", one(t, "rotating-disc convection", disc, 300, 20, 20), vehicle, 0)
	disc["wheel radius"] = "0.155 m"
	near(t, "half of it, half as fast", one(t, "rotating-disc convection", disc, 300, 20, 10), vehicle, 1e-12*vehicle)
}
