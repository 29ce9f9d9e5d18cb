package air

import "math"

// heatRatio is that of the specific heats of air, a gas of two-atom molecules.
const heatRatio = 1.4

// SoundSpeed is the speed of sound in dry air of a temperature (K), m/s, as an
// ideal gas (US Standard Atmosphere 1976, eq. 50; from memory).
func SoundSpeed(temperature float64) float64 {
	return math.Sqrt(heatRatio * GasConstant * temperature)
}

// MeanFreePath is the way of a molecule between two hits, m, at a temperature
// (K): (mu/rho) sqrt(pi/(2 R T)) (Hinds, Aerosol Technology, chapter 2; from
// memory).
func (a Air) MeanFreePath(temperature float64) float64 {
	return a.Viscosity / a.Density * math.Sqrt(math.Pi/(2*GasConstant*temperature))
}

// SlipShare is by what share the drag of a small sphere of a diameter (m) lies
// below the law, which takes the air as a continuum: Cunningham's correction
// less one, 1.257 Kn with Kn = 2 lambda/d, to first order (Hinds, Aerosol
// Technology, chapter 3; from memory).
func (a Air) SlipShare(temperature, diameter float64) float64 {
	return 1.257 * 2 * a.MeanFreePath(temperature) / diameter
}

// Layers is how the density of air of one temperature falls toward the axis
// of a habitat with which it turns like a solid (Landau & Lifshitz, Statistical
// Physics, on rotating bodies; from memory):
//
//	rho(r) = rho(R) exp(m omega^2 (r^2 - R^2)/(2 k T)),  k/m the gas constant
//
// Law: dp/dr = rho omega^2 r with p = rho k T/m.
type Layers struct {
	Floor float64 // m, the radius R at which the density is that of the air
	Rate  float64 // 1/m^2: omega^2/(2 R T)
}

// LayersOf are those of a spin (rad/s) and a temperature (K).
func LayersOf(floor, spin, temperature float64) Layers {
	return Layers{Floor: floor, Rate: spin * spin / (2 * GasConstant * temperature)}
}

// Share is the density at a distance from the axis (m) by that at the floor.
func (l Layers) Share(r float64) float64 {
	return math.Exp(l.Rate * (r - l.Floor) * (r + l.Floor))
}
