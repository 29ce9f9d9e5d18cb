package odetest

import "math"

// Oscillator is the harmonic oscillator, y' = v, v' = -y.
func Oscillator() Problem {
	return Problem{
		Name: "oscillator", Source: "common practice, no source",
		Y0: []float64{1, 0}, TEnd: long,
		Growth: math.Sqrt2, // a rotation: the greatest sum of |cos| and |sin|
		deriv:  func(_ float64, y, dy []float64) { dy[0], dy[1] = y[1], -y[0] },
		exact:  func(t float64, y []float64) { y[0], y[1] = math.Cos(t), -math.Sin(t) },
	}
}

// Reaction is B2, a linear chemical reaction, whose rates are 0, 1 and 3.
func Reaction() Problem {
	return Problem{
		Name: "reaction", Source: detest + "B2" + memory,
		Y0: []float64{2, 0, 1}, TEnd: long,
		Growth: 1, // what leaves one component enters others
		deriv: func(_ float64, y, dy []float64) {
			dy[0] = -y[0] + y[1]
			dy[1] = y[0] - 2*y[1] + y[2]
			dy[2] = y[1] - y[2]
		},
		exact: func(t float64, y []float64) {
			slow, fast := math.Exp(-t)/2, math.Exp(-3*t)/2
			y[0], y[1], y[2] = 1+slow+fast, 1-2*fast, 1-slow+fast
		},
	}
}

// Torus is B4, a curve that winds along a torus.
func Torus() Problem {
	return Problem{
		Name: "torus", Source: detest + "B4" + memory,
		Y0: []float64{3, 0, 0}, TEnd: long,
		Growth: 34, // measured
		deriv: func(_ float64, y, dy []float64) {
			r := math.Hypot(y[0], y[1])
			dy[0] = -y[1] - y[0]*y[2]/r
			dy[1] = y[0] - y[1]*y[2]/r
			dy[2] = y[0] / r
		},
		exact: func(t float64, y []float64) {
			r := 2 + math.Cos(t)
			y[0], y[1], y[2] = r*math.Cos(t), r*math.Sin(t), math.Sin(t)
		},
	}
}

// RigidBody is B5, Euler's equations of a free rigid body: the elliptic
// functions sn, cn and dn of the parameter 0.51.
func RigidBody() Problem {
	const m = 0.51
	return Problem{
		Name: "rigid body", Source: detest + "B5" + memory,
		Y0: []float64{0, 1, 1}, TEnd: long,
		Growth: 29, // measured: a wrong energy puts the phase ever more wrong
		deriv: func(_ float64, y, dy []float64) {
			dy[0], dy[1], dy[2] = y[1]*y[2], -y[0]*y[2], -m*y[0]*y[1]
		},
		exact: func(t float64, y []float64) { y[0], y[1], y[2] = jacobi(t, m) },
	}
}
