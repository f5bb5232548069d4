package correlation

import (
	"math"
	"testing"
)

// Incropera Table A.4 once more: T [K], density [kg/m^3], cp [J/(kg K)], dynamic viscosity [1e-7 Pa s]. The
// columns of the package must follow from these by nu = mu/rho and Pr = mu cp/k to the printed digits.
var airRowsPrinted = [][4]float64{
	{200, 1.7458, 1007, 132.5}, {250, 1.3947, 1006, 159.6}, {300, 1.1614, 1007, 184.6}, {350, 0.9950, 1009, 208.2},
	{400, 0.8711, 1014, 230.1}, {450, 0.7740, 1021, 250.7}, {500, 0.6964, 1030, 270.1}, {550, 0.6329, 1040, 288.4},
	{600, 0.5804, 1051, 305.8}, {650, 0.5356, 1063, 322.5}, {700, 0.4975, 1075, 338.8}, {750, 0.4643, 1087, 354.6},
	{800, 0.4354, 1099, 369.8}, {850, 0.4097, 1110, 384.3}, {900, 0.3868, 1121, 398.1}, {950, 0.3666, 1131, 411.3},
	{1000, 0.3482, 1141, 424.4},
}

func TestAirMeetsTheTable(t *testing.T) {
	a := Air{Pressure: 1e5}
	for i, r := range airRowsPrinted {
		f := a.At(r[0])
		if f.Conductivity != airConductivity[i] || f.Viscosity != airViscosity[i] || f.Prandtl != airPrandtl[i] {
			t.Errorf("at %g K: %+v is not the row of the table", r[0], f)
		}
		if nu := r[3] * 1e-7 / r[1]; off(f.Viscosity, nu) > 1e-3 {
			t.Errorf("at %g K: nu %g, mu/rho %g", r[0], f.Viscosity, nu)
		}
		if pr := r[3] * 1e-7 * r[2] / f.Conductivity; off(f.Prandtl, pr) > 4e-3 { // k has three digits
			t.Errorf("at %g K: Pr %g, mu cp/k %g", r[0], f.Prandtl, pr)
		}
	}
}

// Cengel Table A-15, air at 1 atm, another reduction of the data: degC, k, nu, Pr. The books differ by up
// to 3.2 % in k and Pr, and less than 1 % in nu.
func TestAirBesideAnotherBook(t *testing.T) {
	for _, r := range [][4]float64{{0, 0.02364, 1.338e-5, 0.7362}, {20, 0.02514, 1.516e-5, 0.7309}, {100, 0.03095, 2.306e-5, 0.7111}} {
		f := Air{}.At(r[0] + 273.15)
		if off(f.Conductivity, r[1]) > 0.032 || off(f.Viscosity, r[2]) > 0.01 || off(f.Prandtl, r[3]) > 0.032 {
			t.Errorf("at %g degC: %+v, Cengel has %v", r[0], f, r[1:])
		}
	}
	for _, r := range [][2]float64{{200, 0.03779}, {500, 0.05572}} {
		if got := (Air{}).At(r[0] + 273.15).Conductivity; off(got, r[1]) > 0.03 {
			t.Errorf("at %g degC: k %g, Cengel has %g", r[0], got, r[1])
		}
	}
}

func TestAirBetweenTheRows(t *testing.T) {
	a := Air{Pressure: 1e5}
	last, turns := a.At(200), 0
	for T := 200.5; T <= 1000; T += 0.5 {
		f := a.At(T)
		if f.Conductivity <= last.Conductivity || f.Viscosity <= last.Viscosity || f.ConductivitySlope <= 0 || f.ViscositySlope <= 0 {
			t.Fatalf("k or nu does not rise at %g K", T)
		}
		if (f.PrandtlSlope > 0) != (last.PrandtlSlope > 0) {
			turns++
		}
		i := int((T - airLow) / airStep)
		if j := min(i+1, airRows-1); f.Prandtl > math.Max(airPrandtl[i], airPrandtl[j])+1e-4 || f.Prandtl < math.Min(airPrandtl[i], airPrandtl[j])-1e-4 {
			t.Errorf("Pr(%g K) = %g overshoots its rows", T, f.Prandtl)
		}
		last = f
	}
	if turns != 1 {
		t.Errorf("Pr turns %d times, the table has one turn at 550 K", turns)
	}
}

func TestAirOutsideTheTable(t *testing.T) {
	for _, T := range []float64{-5, 0, 100, 150, 1050, 1e4, math.Inf(1)} {
		f := Air{}.At(T)
		if !(f.Conductivity > 0 && f.Viscosity > 0 && f.Prandtl > 0) {
			t.Errorf("at %g K: %+v", T, f)
		}
		if f.ConductivitySlope != 0 || f.ViscositySlope != 0 || f.PrandtlSlope != 0 {
			t.Errorf("at %g K the properties have not levelled off: %+v", T, f)
		}
		if (Air{}).Covers(T) {
			t.Errorf("%g K is said to be covered", T)
		}
	}
	if !(Air{}).Covers(200) || !(Air{}).Covers(1000) {
		t.Error("the ends of the table are not covered")
	}
}

func TestAirPressure(t *testing.T) {
	one, half := Air{Pressure: 1e5}.At(333), Air{Pressure: 5e4}.At(333)
	if off(half.Viscosity, 2*one.Viscosity) > 1e-15 || off(half.ViscositySlope, 2*one.ViscositySlope) > 1e-15 ||
		half.Conductivity != one.Conductivity || half.Prandtl != one.Prandtl {
		t.Errorf("at half the pressure: %+v beside %+v", half, one)
	}
	if (Air{}).At(333) != (Air{Pressure: 101325}).At(333) {
		t.Error("the zero value is not air at one standard atmosphere")
	}
}

func TestAirPlainAndSlopes(t *testing.T) {
	a := Air{Pressure: 9e4}
	for T := 131.3; T < 1100; T += 3.7 {
		f := a.At(T)
		k, nu, pr := a.Plain(T)
		if off(f.Conductivity, k) > 1e-14 || off(f.Viscosity, nu) > 1e-14 || off(f.Prandtl, pr) > 1e-14 {
			t.Errorf("at %g K: %+v, plain %g, %g, %g", T, f, k, nu, pr)
		}
		const e = 1e-3
		up, down := a.At(T+e), a.At(T-e)
		for _, c := range [][3]float64{
			{up.Conductivity - down.Conductivity, f.ConductivitySlope, f.Conductivity},
			{up.Viscosity - down.Viscosity, f.ViscositySlope, f.Viscosity},
			{up.Prandtl - down.Prandtl, f.PrandtlSlope, f.Prandtl},
		} {
			if math.Abs(c[0]/(2*e)-c[1]) > 1e-6*c[2]/T*50 {
				t.Errorf("at %g K: slope %g, difference %g", T, c[1], c[0]/(2*e))
			}
		}
	}
}

func BenchmarkAir(b *testing.B) {
	a, t := Air{}, 333.3
	for b.Loop() {
		a.At(t)
	}
}
