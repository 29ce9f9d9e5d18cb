package air

import "math"

// pair is a number kept as the unrounded sum of two floats, to about 2^-100
// (Dekker 1971; from memory). Products are converted before they are added, so
// that no compiler fuses them and the bits are the same everywhere.
type pair struct{ hi, lo float64 }

// exactly is the sum of two floats without rounding (Knuth's two-sum; from
// memory).
func exactly(a, b float64) pair {
	s := a + b
	t := s - a
	return pair{s, (a - (s - t)) + (b - t)}
}

func (p pair) plus(q pair) pair {
	s := exactly(p.hi, q.hi)
	return exactly(s.hi, s.lo+(p.lo+q.lo))
}

func (p pair) times(q pair) pair {
	h := float64(p.hi * q.hi)
	rest := math.FMA(p.hi, q.hi, -h)
	return exactly(h, rest+(float64(p.hi*q.lo)+float64(p.lo*q.hi)))
}

func (p pair) scaled(f float64) pair { return p.times(pair{hi: f}) }

func (p pair) over(q pair) pair {
	first := pair{hi: p.hi / q.hi}
	rest := p.plus(q.times(pair{hi: -first.hi}))
	second := pair{hi: rest.hi / q.hi}
	rest = rest.plus(q.times(pair{hi: -second.hi}))
	return first.plus(second).plus(pair{hi: rest.hi / q.hi})
}

// ratio is a decimal constant, which a float would round.
func ratio(num, den float64) pair { return pair{hi: num}.over(pair{hi: den}) }

// beyond is what the next term of a series must stay below for the series to
// end: under the rounding of a pair.
const beyond = 0x1p-110

// logRatio gives ln(a/b) of floats whose ratio is near 1, as 2 artanh of
// (a-b)/(a+b).
func logRatio(a, b float64) pair {
	z := exactly(a, -b).over(exactly(a, b))
	square := z.times(z)
	sum, power := z, z
	for k := 3.0; math.Abs(power.hi) > beyond; k += 2 {
		power = power.times(square)
		sum = sum.plus(power.over(pair{hi: k}))
	}
	return sum.scaled(2)
}

// logTwo is ln 2.
var logTwo = logRatio(2, 1)

// raised gives x^a, for a normal x > 0.
func raised(x float64, a pair) pair {
	m, e := math.Frexp(x)
	if m < math.Sqrt2/2 {
		m, e = 2*m, e-1
	}
	y := a.times(logRatio(m, 1).plus(logTwo.scaled(float64(e))))
	n := math.Round(y.hi / logTwo.hi)
	y = y.plus(logTwo.scaled(-n))
	sum, term := pair{hi: 1}, pair{hi: 1}
	for k := 1.0; math.Abs(term.hi) > beyond; k++ {
		term = term.times(y).over(pair{hi: k})
		sum = sum.plus(term)
	}
	return pair{math.Ldexp(sum.hi, int(n)), math.Ldexp(sum.lo, int(n))}
}
