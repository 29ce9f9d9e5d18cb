package air

import "math"

// Law is a drag law of a sphere.
type Law interface {
	// CdRe gives drag coefficient times Reynolds number, which has a finite
	// limit (24, Stokes) where the speed vanishes. re >= 0, dimensionless.
	CdRe(re float64) float64
}

// CliftGauvin is the standard drag curve of a smooth sphere (Clift & Gauvin
// 1970; from memory):
//
//	Cd = 24/Re (1 + 0.15 Re^0.687) + 0.42/(1 + 42500 Re^-1.16)
//
// It holds to about 6 % for Re < 3e5, below the drag crisis.
type CliftGauvin struct{}

// Constants of the law, by Cd Re.
const (
	stokes     = 24    // at rest
	formFactor = 42500 // of the fall of form drag at low speeds
)

// CdRe implements [Law].
func (CliftGauvin) CdRe(re float64) float64 {
	if re == 0 {
		return stokes
	}
	log := math.Log(re)
	// Products are rounded before they are added, lest a compiler fuses them.
	skin := float64(stokes * (1 + float64(0.15*math.Exp(0.687*log))))
	return skin + 0.42*re/(1+float64(formFactor*math.Exp(-1.16*log)))
}

// Constant is a drag coefficient that does not depend on the speed: for a
// sheet or a body of a known one.
type Constant float64

// CdRe implements [Law].
func (c Constant) CdRe(re float64) float64 { return float64(c) * re }

// Drag is the drag of one body in one air, worked out as far as it goes
// without the speed.
type Drag struct {
	law Law
	// force = -(viscous) CdRe(reynolds |v|) v, with viscous = rho A nu/(2 D) =
	// mu A/(2 D) and reynolds = rho D/mu.
	viscous  float64 // kg/s
	reynolds float64 // s/m
	// The curve of the law, nil for another, and reynolds^2.
	curve     *curve
	reynolds2 float64 // s^2/m^2
}

// NewDrag gives the drag of a body of the given diameter (m), which sets the
// Reynolds number, and area across the motion (m^2). A nil law is that of a
// sphere. In a vacuum, or without area, there is none.
func NewDrag(a Air, law Law, diameter, area float64) Drag {
	if law == nil {
		law = CliftGauvin{}
	}
	if a.Vacuum() || area == 0 || diameter == 0 {
		return Drag{}
	}
	d := Drag{law: law, viscous: a.Viscosity * area / (2 * diameter), reynolds: a.Density * diameter / a.Viscosity}
	d.reynolds2 = d.reynolds * d.reynolds
	// An infinite square would make rest a NaN.
	if law == (CliftGauvin{}) && !math.IsInf(d.reynolds2, 0) {
		d.curve = sphere()
	}
	return d
}

// None says whether there is no drag at any speed.
func (d *Drag) None() bool { return d.law == nil }

// PerVelocity gives the drag force divided by the velocity relative to the
// air, kg/s, at a speed (m/s): rho Cd A |v|/2. The force is its negative times
// that velocity.
func (d *Drag) PerVelocity(speed float64) float64 {
	if d.law == nil {
		return 0
	}
	return d.viscous * d.law.CdRe(d.reynolds*speed)
}

// PerVelocity2 is [Drag.PerVelocity] by the square of the speed, m^2/s^2. For
// the law of a sphere it is several times faster, and within 1e-15 of the law
// as printed: closer than the formula in floats comes.
func (d *Drag) PerVelocity2(speedSquared float64) float64 {
	if d.curve != nil {
		x := d.reynolds2 * speedSquared
		bits := math.Float64bits(x)
		if i := bits>>pieceShift - firstPiece; i < pieceCount { // curve.at, but for the call
			return d.viscous * d.curve.pieces[i].at(x-middle(bits))
		}
		return d.viscous * d.curve.outside(x)
	}
	return d.PerVelocity(math.Sqrt(speedSquared))
}

// SphereArea is the area of a sphere across the motion, m^2.
func SphereArea(diameter float64) float64 { return math.Pi / 4 * diameter * diameter }
