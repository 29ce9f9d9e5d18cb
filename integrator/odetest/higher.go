package odetest

import "math"

// Bessel is E1, the equation of the Bessel function of order 1/2, from 1 on.
func Bessel() Problem {
	// J of order 1/2 at x is sqrt(2/(pi x)) sin x.
	exact := func(t float64, y []float64) {
		x := t + 1
		sin, cos := math.Sincos(x)
		scale := math.Sqrt(2 / (math.Pi * x))
		y[0], y[1] = scale*sin, scale*(cos-sin/(2*x))
	}
	y0 := make([]float64, 2)
	exact(0, y0)
	return Problem{
		Name: "Bessel", Source: detest + "E1" + memory,
		Y0: y0, TEnd: long,
		Growth: 1.5, // measured
		deriv: func(t float64, y, dy []float64) {
			x := t + 1
			dy[0], dy[1] = y[1], -y[1]/x-(1-0.25/(x*x))*y[0]
		},
		exact: exact,
	}
}

// Fall is E4, a fall with drag as the square of the speed.
func Fall() Problem {
	const pull, drag = 0.032, 0.4
	return Problem{
		Name: "fall", Source: detest + "E4" + memory,
		Y0: []float64{30, 0}, TEnd: long,
		Growth: 9.7, // measured: with little drag at first, a wrong speed is wrong way
		deriv:  func(_ float64, y, dy []float64) { dy[0], dy[1] = y[1], pull-drag*y[1]*y[1] },
		exact: func(t float64, y []float64) {
			rate := math.Sqrt(pull * drag)
			y[0] = 30 + math.Log(math.Cosh(rate*t))/drag
			y[1] = math.Sqrt(pull/drag) * math.Tanh(rate*t)
		},
	}
}

// Pursuit is E5, a curve of pursuit, of slope v: v' = sqrt(1 + v^2)/(25 - t).
func Pursuit() Problem {
	return Problem{
		Name: "pursuit", Source: detest + "E5" + memory,
		Y0: []float64{0, 0}, TEnd: long,
		Growth: 27.2, // measured: the end is near the singularity at 25
		deriv:  func(t float64, y, dy []float64) { dy[0], dy[1] = y[1], math.Hypot(1, y[1])/(25-t) },
		exact: func(t float64, y []float64) {
			left := 25 - t
			y[0] = (25*math.Log(25/left) - (625-left*left)/50) / 2
			y[1] = (25/left - left/25) / 2
		},
	}
}
