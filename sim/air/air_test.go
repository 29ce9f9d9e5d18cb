package air_test

import (
	"math"
	"testing"

	"offplumb/sim/air"
)

// TestStandardAtmosphere holds density and viscosity to the US Standard
// Atmosphere 1976, tables of sea level and 2 km, to half the last digit
// printed.
func TestStandardAtmosphere(t *testing.T) {
	for _, c := range []struct {
		pressure, temperature   float64
		density, densityTol     float64
		viscosity, viscosityTol float64
	}{
		{101325, 288.15, 1.225, 5e-4, 1.7894e-5, 5e-10},
		{79501, 275.15, 1.0066, 5e-5, 1.726e-5, 5e-9},
	} {
		a := air.FromPressure(c.pressure, c.temperature)
		if math.Abs(a.Density-c.density) > c.densityTol {
			t.Errorf("%g Pa, %g K: density %.6g kg/m^3, the table has %g", c.pressure, c.temperature, a.Density, c.density)
		}
		if math.Abs(a.Viscosity-c.viscosity) > c.viscosityTol {
			t.Errorf("%g Pa, %g K: viscosity %.6g Pa s, the table has %g", c.pressure, c.temperature, a.Viscosity, c.viscosity)
		}
	}
}

// TestGasConstant tries that the constant is the universal one by the molar
// mass of dry air, both of ISO 2533:1975 (from memory), to its last digit.
func TestGasConstant(t *testing.T) {
	if want := 8314.32 / 28.964420; math.Abs(air.GasConstant-want) > 5e-6 {
		t.Errorf("gas constant %.8g, want %.8g J/(kg K)", air.GasConstant, want)
	}
}

// TestVacuum tries that the zero air is none and has no drag.
func TestVacuum(t *testing.T) {
	var none air.Air
	if d := air.NewDrag(none, nil, 0.1, air.SphereArea(0.1)); !none.Vacuum() || !d.None() || d.PerVelocity(10) != 0 {
		t.Errorf("vacuum %v drags: %v, %g kg/s", none.Vacuum(), !d.None(), d.PerVelocity(10))
	}
	room := air.FromPressure(air.DefaultPressure, air.DefaultTemperature)
	if d := air.NewDrag(room, nil, 0, 0); room.Vacuum() || !d.None() {
		t.Errorf("a point drags, or a room of air is a vacuum")
	}
}
