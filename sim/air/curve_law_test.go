package air_test

import (
	"math"
	"math/big"
)

// precise are the bits of the reference.
const precise = 140

func number(x float64) *big.Float { return new(big.Float).SetPrec(precise).SetFloat64(x) }

func decimal(num, den int64) *big.Float {
	return new(big.Float).SetPrec(precise).SetRat(big.NewRat(num, den))
}

func sum(a, b *big.Float) *big.Float      { return new(big.Float).Add(a, b) }
func product(a, b *big.Float) *big.Float  { return new(big.Float).Mul(a, b) }
func quotient(a, b *big.Float) *big.Float { return new(big.Float).Quo(a, b) }

// bigLog is ln x for 1 <= x <= 2, by the series of artanh.
func bigLog(x *big.Float) *big.Float {
	z := quotient(sum(x, number(-1)), sum(x, number(1)))
	square, total, power := product(z, z), number(0), z
	for k := 1.0; k < 100; k += 2 {
		total = sum(total, quotient(power, number(k)))
		power = product(power, square)
	}
	return product(total, number(2))
}

// bigExp is e^y for |y| < 200, by its series for y/1024 and ten squarings.
func bigExp(y *big.Float) *big.Float {
	y = quotient(y, number(1024))
	total, term := number(1), number(1)
	for k := 1.0; k < 30; k++ {
		term = quotient(product(term, y), number(k))
		total = sum(total, term)
	}
	for range 10 {
		total = product(total, total)
	}
	return total
}

// anchor is the law where it is known to many digits, at c = Re^2, and its
// terms for the way to the points beside it.
type anchor struct {
	value, rest float64 // of CdRe: the nearest float, and what it leaves
	skin, form  float64 // the two terms that vary
	share       float64 // of 42500 Re^-1.16 in the denominator
}

// exactLaw is the law of Clift and Gauvin as printed, by x = Re^2, to about
// 3e-17: at floats of a few bits by math/big, beside them by the ratio to the
// nearest, within 1/32 of 1, whose roundings count as little.
type exactLaw struct {
	two     *big.Float
	anchors map[float64]anchor
}

func newExactLaw() *exactLaw {
	return &exactLaw{two: bigLog(number(2)), anchors: map[float64]anchor{}}
}

// at gives CdRe at a normal x as an unrounded sum.
func (l *exactLaw) at(x float64) (value, rest float64) {
	c := nearestEdge(x)
	a, ok := l.anchors[c]
	if !ok {
		a = l.anchor(c)
		l.anchors[c] = a
	}
	u := math.Log1p((x - c) / c)
	root, below := math.Expm1(u/2), a.share*math.Expm1(-0.58*u)
	return a.value, a.rest + a.skin*math.Expm1(0.3435*u) + a.form*(root-below)/(1+below)
}

// error gives the relative error of a value of CdRe.
func (l *exactLaw) error(x, got float64) float64 {
	value, rest := l.at(x)
	return ((got - value) - rest) / value
}

func (l *exactLaw) anchor(c float64) anchor {
	m, e := math.Frexp(c)
	log := sum(bigLog(number(2*m)), product(l.two, number(float64(e-1))))
	raised := func(num, den int64) *big.Float { return bigExp(product(log, decimal(num, den))) }
	skin := product(decimal(36, 10), raised(687, 2000))
	slow := product(number(42500), raised(-116, 200))
	below := sum(number(1), slow)
	form := quotient(product(decimal(42, 100), raised(1, 2)), below)
	total := sum(sum(number(24), skin), form)
	var a anchor
	a.value, _ = total.Float64()
	a.rest, _ = sum(total, number(-a.value)).Float64()
	a.skin, _ = skin.Float64()
	a.form, _ = form.Float64()
	a.share, _ = quotient(slow, below).Float64()
	return a
}

// nearestEdge is the nearest float with four bits of fraction.
func nearestEdge(x float64) float64 {
	const half = 1 << 47
	return math.Float64frombits((math.Float64bits(x) + half) &^ (2*half - 1))
}
