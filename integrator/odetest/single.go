package odetest

import "math"

// Decay is A1, y' = -y.
func Decay() Problem {
	return Problem{
		Name: "decay", Source: detest + "A1" + memory,
		Y0: []float64{1}, TEnd: long,
		Growth: 1, // solutions approach one another
		deriv:  func(_ float64, y, dy []float64) { dy[0] = -y[0] },
		exact:  func(t float64, y []float64) { y[0] = math.Exp(-t) },
	}
}

// Cubic is A2, y' = -y^3/2.
func Cubic() Problem {
	return Problem{
		Name: "cubic", Source: detest + "A2" + memory,
		Y0: []float64{1}, TEnd: long,
		Growth: 1, // solutions approach one another
		deriv:  func(_ float64, y, dy []float64) { dy[0] = -y[0] * y[0] * y[0] / 2 },
		exact:  func(t float64, y []float64) { y[0] = 1 / math.Sqrt(1+t) },
	}
}

// Wave is A3, y' = y cos t.
func Wave() Problem {
	return Problem{
		Name: "wave", Source: detest + "A3" + memory,
		Y0: []float64{1}, TEnd: long,
		Growth: 6.8, // y(20)/y(t), most where sin t = -1
		deriv:  func(t float64, y, dy []float64) { dy[0] = y[0] * math.Cos(t) },
		exact:  func(t float64, y []float64) { y[0] = math.Exp(math.Sin(t)) },
	}
}

// Logistic is A4, y' = y/4 (1 - y/20).
func Logistic() Problem {
	return Problem{
		Name: "logistic", Source: detest + "A4" + memory,
		Y0: []float64{1}, TEnd: long,
		Growth: 2.2, // f(y(20))/f(y(t)), most at the start
		deriv:  func(_ float64, y, dy []float64) { dy[0] = y[0] / 4 * (1 - y[0]/20) },
		exact:  func(t float64, y []float64) { y[0] = 20 / (1 + 19*math.Exp(-t/4)) },
	}
}

// Spiral is A5, y' = (y - t)/(y + t): the logarithmic spiral, of which the
// radius is 4 exp(pi/2 - angle) in the plane of t and y.
func Spiral() Problem {
	return Problem{
		Name: "spiral", Source: detest + "A5" + memory,
		Y0: []float64{4}, TEnd: long,
		Growth: 5.3, // measured: the turning point is near
		deriv:  func(t float64, y, dy []float64) { dy[0] = (y[0] - t) / (y[0] + t) },
		exact:  func(t float64, y []float64) { y[0] = spiralAt(t) },
	}
}

// spiralAt bisects for the angle, in which t falls from the turning point of
// the spiral at -pi/4 on.
func spiralAt(t float64) float64 {
	radius := func(angle float64) float64 { return 4 * math.Exp(math.Pi/2-angle) }
	lo, hi := -math.Pi/4, math.Pi/2
	for {
		mid := lo + (hi-lo)/2
		if mid <= lo || mid >= hi {
			return radius(mid) * math.Sin(mid)
		}
		if radius(mid)*math.Cos(mid) > t {
			lo = mid
		} else {
			hi = mid
		}
	}
}
