package air

// The law's terms are powers of x = Re^2, whose Taylor series about the middle
// of an interval are known. Series of a few terms more than a piece has are
// economised (Lanczos 1938; from memory): what a Chebyshev polynomial takes
// from the last term is spread evenly over the interval.

// taylorTerms leaves out less than 33^-12, the ratio of half the widest
// interval to its middle, times a binomial coefficient below 0.01: 1e-20.
const taylorTerms = 12

// series is a Taylor series about c, in (x-c)/c.
type series [taylorTerms]float64

// power is the series of a power of x, given its value at c.
func power(value, exponent float64) series {
	var s series
	s[0] = value
	for j := 1; j < taylorTerms; j++ {
		s[j] = s[j-1] * (exponent - float64(j-1)) / float64(j)
	}
	return s
}

func (s series) plus(q series) series {
	for j := range s {
		s[j] += q[j]
	}
	return s
}

// over is the quotient of two series.
func (s series) over(q series) series {
	for j := range s {
		for i := 1; i <= j; i++ {
			s[j] -= float64(q[i] * s[j-i])
		}
		s[j] /= q[0]
	}
	return s
}

// chebyshev are the coefficients of the Chebyshev polynomials of the degrees
// that a piece lacks, over that of the highest power.
var chebyshev = func() [taylorTerms]series {
	var t [taylorTerms]series
	t[0][0], t[1][1] = 1, 1
	for n := 2; n < taylorTerms; n++ {
		for j := range n + 1 {
			t[n][j] = -t[n-2][j]
			if j > 0 {
				t[n][j] += 2 * t[n-1][j-1]
			}
		}
	}
	for n := range t {
		lead := t[n][n]
		for j := range t[n] {
			t[n][j] /= lead
		}
	}
	return t
}()

// economised is the piece of a series about c on the interval that reaches half
// to either side. The value at c is given to more than a float.
func (s series) economised(c, half float64, value pair) piece {
	s[0] = value.lo
	reach := 1.0
	for j := 1; j < taylorTerms; j++ {
		reach *= half / c
		s[j] *= reach
	}
	var p piece
	for n := taylorTerms - 1; n >= len(p); n-- {
		for j := range n {
			s[j] -= float64(s[n] * chebyshev[n][j])
		}
	}
	s[0] += value.hi
	reach = 1
	for j := range p {
		p[j] = s[j] / reach
		reach *= half
	}
	return p
}

// powers are a number's powers that the law is made of: of skin drag, and of
// form drag at high speed and in its fall at low speed.
type powers struct{ skin, root, form pair }

func (p powers) times(q powers) powers {
	return powers{p.skin.times(q.skin), p.root.times(q.root), p.form.times(q.form)}
}

// exponents are those of x = Re^2.
var exponents = powers{skin: ratio(687, 2000), root: ratio(1, 2), form: ratio(-116, 200)}

// skinFactor and newtonFactor are 24 * 0.15 and 0.42.
var (
	skinFactor   = ratio(36, 10)
	newtonFactor = ratio(42, 100)
)

// newPowers gives the powers of x.
func newPowers(x float64) powers {
	e := exponents
	return powers{raised(x, e.skin), raised(x, e.root), raised(x, e.form)}
}

// newCurve builds the curve.
func newCurve() *curve {
	c := new(curve)
	next := newPowers(2)
	for k := range perOctave {
		x := middle(uint64(firstPiece+k) << pieceShift)
		at := newPowers(x)
		for i := k; i < pieceCount; i += perOctave {
			c.pieces[i] = lawPiece(x, halfWidth(x, k), at)
			x, at = 2*x, at.times(next)
		}
	}
	c.faint = newFaint()
	return c
}

// halfWidth is half the width of the interval of the given number in its
// octave, from its middle.
func halfWidth(middle float64, k int) float64 { return middle / float64(2*(perOctave+k)+1) }

// lawPiece is the law on the interval about x, given the powers of x.
func lawPiece(x, half float64, at powers) piece {
	e := exponents
	skin := at.skin.times(skinFactor)
	root := at.root.times(newtonFactor)
	form := at.form.scaled(formFactor)
	below := form.plus(pair{hi: 1})
	value := skin.plus(root.over(below)).plus(pair{hi: stokes})

	d := power(form.hi, e.form.hi)
	d[0] = below.hi
	s := power(root.hi, e.root.hi).over(d).plus(power(skin.hi, e.skin.hi))
	return s.economised(x, half, value)
}

// newFaint builds the curve below the pieces.
func newFaint() faint {
	var f faint
	e := exponents
	form := e.root.plus(e.form.scaled(-1))
	for k := range perOctave {
		x := middle(uint64(exponentBias<<pieceBits+k) << pieceShift)
		half := halfWidth(x, k)
		value := raised(x, e.skin).times(skinFactor)
		f.skin[k] = power(value.hi, e.skin.hi).economised(x, half, value)
		value = raised(x, form).times(newtonFactor).over(pair{hi: formFactor})
		f.form[k] = power(value.hi, form.hi).economised(x, half, value)
	}
	at := powers{skin: raised(firstFaintAt, e.skin), form: raised(firstFaintAt, form)}
	next := powers{skin: raised(2, e.skin), form: raised(2, form)}
	for i := range f.skins {
		f.skins[i], f.forms[i] = at.skin.hi, at.form.hi
		at = at.times(next)
	}
	return f
}
