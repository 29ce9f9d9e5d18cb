package odetest

import "math"

// members is the length of the chains.
const members = 10

// DecayChain is C1, a radioactive chain of equal rates: a Poisson
// distribution, the last member collecting what is beyond.
func DecayChain() Problem {
	return Problem{
		Name: "decay chain", Source: detest + "C1" + memory,
		Y0: firstOnly(members), TEnd: long,
		Growth: members, // the last member collects the errors of all
		deriv: func(_ float64, y, dy []float64) {
			dy[0] = -y[0]
			for i := 1; i < members-1; i++ {
				dy[i] = y[i-1] - y[i]
			}
			dy[members-1] = y[members-2]
		},
		exact: func(t float64, y []float64) {
			term := math.Exp(-t)
			rest := 1.0
			for i := range members - 1 {
				y[i] = term
				rest -= term
				term *= t / float64(i+1)
			}
			y[members-1] = rest
		},
	}
}

// BirthChain is C2, a chain whose rates are 1, 2, 3, ...: the births of Yule,
// geometrically distributed.
func BirthChain() Problem {
	return Problem{
		Name: "birth chain", Source: detest + "C2" + memory,
		Y0: firstOnly(members), TEnd: long,
		Growth: members, // the last member collects the errors of all
		deriv: func(_ float64, y, dy []float64) {
			dy[0] = -y[0]
			for i := 1; i < members-1; i++ {
				dy[i] = float64(i)*y[i-1] - float64(i+1)*y[i]
			}
			dy[members-1] = float64(members-1) * y[members-2]
		},
		exact: func(t float64, y []float64) {
			term, grown := math.Exp(-t), -math.Expm1(-t)
			for i := range members - 1 {
				y[i] = term
				term *= grown
			}
			y[members-1] = math.Pow(grown, members-1)
		},
	}
}

// Heat is C3 and C4, for n = 10 and 51: heat in a rod cut into n pieces, its
// ends kept cold, by sine waves.
func Heat(n int) Problem {
	name, label := "heat, 51 pieces", "C4"
	if n == 10 {
		name, label = "heat, 10 pieces", "C3"
	}
	return Problem{
		Name: name, Source: detest + label + memory,
		Y0: firstOnly(n), TEnd: long,
		Growth: 1, // no piece gets hotter than the hottest
		deriv: func(_ float64, y, dy []float64) {
			for i := range n {
				dy[i] = -2 * y[i]
				if i > 0 {
					dy[i] += y[i-1]
				}
				if i < n-1 {
					dy[i] += y[i+1]
				}
			}
		},
		exact: func(t float64, y []float64) { heat(n, t, y) },
	}
}

func heat(n int, t float64, y []float64) {
	clear(y[:n])
	unit := math.Pi / float64(n+1)
	for k := 1; k <= n; k++ {
		half := math.Sin(float64(k) * unit / 2)
		wave := math.Exp(-4*half*half*t) * math.Sin(float64(k)*unit)
		for i := range n {
			y[i] += 2 / float64(n+1) * wave * math.Sin(float64((i+1)*k)*unit)
		}
	}
}

// firstOnly returns n components, the first 1 and the rest 0.
func firstOnly(n int) []float64 {
	y := make([]float64, n)
	y[0] = 1
	return y
}
