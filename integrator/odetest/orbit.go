package odetest

import (
	"fmt"
	"math"
)

// Kepler is D1 to D5, for the eccentricities 0.1, 0.3, 0.5, 0.7 and 0.9: the
// orbit of period 2 pi around a fixed centre, from the nearest point. The state
// is a position and a velocity, of two components each.
func Kepler(e float64) Problem {
	return Problem{
		Name:   fmt.Sprintf("orbit of eccentricity %g", e),
		Source: detest + fmt.Sprintf("D%d", int(5*e+1)) + memory,
		Y0:     []float64{1 - e, 0, 0, math.Sqrt((1 + e) / (1 - e))}, TEnd: long,
		Growth: drift(e),
		deriv: func(_ float64, y, dy []float64) {
			r := math.Hypot(y[0], y[1])
			cube := r * r * r
			dy[0], dy[1], dy[2], dy[3] = y[2], y[3], -y[0]/cube, -y[1]/cube
		},
		exact: func(t float64, y []float64) {
			sin, cos := math.Sincos(anomaly(t, e))
			minor, rate := math.Sqrt(1-e*e), 1/(1-e*cos)
			y[0], y[1], y[2], y[3] = cos-e, minor*sin, -rate*sin, rate*minor*cos
		},
	}
}

// drift is how a change at the nearest point grows. It alters the energy, by
// 1/r^2 for the position and by v for the velocity; that alters the period, and
// the place in the orbit at the end by three times the energy and the time.
// There, at a distance of about 1, speed and acceleration are near 1, and half
// as much again covers what else there is.
func drift(e float64) float64 {
	r, v := 1-e, math.Sqrt((1+e)/(1-e))
	return 1.5 * 3 * long * (1/(r*r) + v)
}

// anomaly solves Kepler's equation E - e sin E = mean for E, by Newton's method
// from a start that always converges (Danby, Fundamentals of Celestial
// Mechanics, section 6.6; from memory).
func anomaly(mean, e float64) float64 {
	turns := 2 * math.Pi * math.Round(mean/(2*math.Pi))
	mean -= turns
	x := mean + math.Copysign(0.85*e, mean)
	for range 20 {
		x -= (x - e*math.Sin(x) - mean) / (1 - e*math.Cos(x))
	}
	return x + turns
}

// Arenstorf is a closed orbit of a small body about the earth and the moon,
// found by R. F. Arenstorf in 1963, as given by Hairer, Norsett & Wanner,
// Solving Ordinary Differential Equations I, eq. II.0.1 and II.0.2: it passes
// close by the moon and comes back to its start.
func Arenstorf() Problem {
	y0 := []float64{0.994, 0, 0, -2.00158510637908252240537862224}
	return Problem{
		Name: "closing orbit", Source: "Arenstorf 1963; Hairer, Norsett & Wanner I, section II.0" + memory,
		Y0: y0, TEnd: 17.0652165601579625588917206249,
		Growth: 3e6, // measured: it passes close by the moon
		Closes: true,
		deriv:  threeBodies,
		exact:  func(_ float64, y []float64) { copy(y, y0) },
	}
}

// moonMass is the moon's share of the masses of Arenstorf's orbit.
const moonMass = 0.012277471

// threeBodies is the restricted problem of three bodies, in the frame that
// turns with the two heavy ones.
func threeBodies(_ float64, y, dy []float64) {
	const earth = 1 - moonMass
	toEarth, toMoon := y[0]+moonMass, y[0]-earth
	d1, d2 := math.Hypot(toEarth, y[1]), math.Hypot(toMoon, y[1])
	d1, d2 = d1*d1*d1, d2*d2*d2
	dy[0], dy[1] = y[2], y[3]
	dy[2] = y[0] + 2*y[3] - earth*toEarth/d1 - moonMass*toMoon/d2
	dy[3] = y[1] - 2*y[2] - earth*y[1]/d1 - moonMass*y[1]/d2
}
