// Package air gives the density and viscosity of the air in the habitat, and
// the drag of a sphere in it.
//
// An [Air] is a density and a viscosity: those given, or by [FromPressure] those
// of dry air, by the ideal gas law and Sutherland's law. The zero Air is the
// vacuum. A [Law] gives the drag coefficient of a sphere times its Reynolds
// number, which is no singularity at rest: [CliftGauvin] for smooth spheres, or
// a [Constant]. A [Drag] is a law for one diameter and area in one air; package
// flight asks it in every step, so that it takes no root, logarithm or power
// there: the law stands in a table of polynomials (curve.go), made once.
//
// # Laws
//
//   - Drag acts against the motion relative to the air, and grows with its speed.
//   - The table departs from the formula by rounding alone.
//
// How the air moves is not known here: the caller gives the speed relative to it.
package air

import "math"

// Constants of dry air.
const (
	// GasConstant is that of dry air, J/(kg K): 8314.32/28.96442 of the
	// standard atmosphere of ISO 2533:1975 (from memory). The molar mass of the
	// US Standard Atmosphere 1976, rounded to 28.9644, gives 7e-7 more.
	GasConstant = 287.05287
	// Sutherland's law, US Standard Atmosphere 1976, eq. 51:
	// mu = beta T^1.5/(T + S).
	sutherlandBeta = 1.458e-6 // kg/(s m K^0.5)
	sutherlandS    = 110.4    // K
)

// The default air, of a room at sea level.
const (
	DefaultPressure    = 101325 // Pa
	DefaultTemperature = 293.15 // K
)

// Air is a still gas that turns with the habitat. The zero value is a vacuum.
type Air struct {
	Density   float64 // kg/m^3
	Viscosity float64 // Pa s, dynamic
}

// FromPressure gives dry air at a pressure (Pa) and a temperature (K): density
// by the ideal gas law, viscosity by Sutherland's law (US Standard Atmosphere
// 1976). It holds from about 100 K to 1900 K, where humidity and real-gas
// effects stay below 2 % of the density.
func FromPressure(pressure, temperature float64) Air {
	return Air{
		Density:   pressure / (GasConstant * temperature),
		Viscosity: sutherlandBeta * temperature * math.Sqrt(temperature) / (temperature + sutherlandS),
	}
}

// Vacuum says whether there is nothing to drag.
func (a Air) Vacuum() bool { return a.Density == 0 }
