package air

import (
	"math"
	"sync"
)

// The law of Clift and Gauvin costs a logarithm and two exponentials, which is
// most of a derivative in air. Its curve gives the same from the square of the
// Reynolds number, x, by a polynomial in each sixteenth of an octave of it: then
// the speed needs no square root either.

// The pieces are found by the exponent and the first four bits of the fraction
// of x = Re^2.
const (
	fractionBits = 52
	pieceBits    = 4
	perOctave    = 1 << pieceBits
	pieceShift   = fractionBits - pieceBits
	exponentBias = 1023

	// Pieces go from Re = 0.011 to 1.19e7.
	firstOctave = -13
	pastOctave  = 47
	firstPiece  = (firstOctave + exponentBias) << pieceBits
	pieceCount  = (pastOctave - firstOctave) << pieceBits

	// Below this one, 0.15 Re^0.687 < 2^-54 is lost beside 1.
	faintOctave  = -150
	firstFaint   = (faintOctave + exponentBias) << pieceBits
	firstFaintAt = 0x1p-150
)

// piece is a polynomial, by rising powers of the distance from the middle of
// its interval: 64 bytes, a cache line.
type piece [8]float64

// at evaluates a piece at a distance from its middle. Everything but p[0] is
// below 1/30 of the sum, so that little more than the last rounding counts.
// Pairs are summed apart, which keeps the processor's pipeline filled.
func (p *piece) at(d float64) float64 {
	d2 := d * d
	low := float64(p[1]*d) + float64(d2*(p[2]+float64(p[3]*d)))
	high := p[4] + float64(p[5]*d) + float64(d2*(p[6]+float64(p[7]*d)))
	return p[0] + (low + float64(d2*d2*high))
}

// curve is CdRe of [CliftGauvin] by x = Re^2, 64 KiB. It is within 4e-16 of the
// law, relative, from rest to Re = 1.19e7; beyond, it is the formula.
type curve struct {
	pieces [pieceCount]piece
	faint  faint
}

// faint is the curve below the pieces, where the form drag is 2.4e-11 of the
// whole: so little that its denominator is its larger term alone, to 1.4e-7 of
// it. Then both terms are powers of x, and so products of one of the fraction
// and one of the octave.
type faint struct {
	skin, form   [perOctave]piece                   // by the fraction, in 1..2
	skins, forms [firstOctave - faintOctave]float64 // by the octave
}

// at gives CdRe by x = Re^2.
func (c *curve) at(x float64) float64 {
	bits := math.Float64bits(x)
	i := bits>>pieceShift - firstPiece
	if i >= pieceCount {
		return c.outside(x)
	}
	return c.pieces[i].at(x - middle(bits))
}

// middle is the middle of the interval of a float.
func middle(bits uint64) float64 {
	const half = 1 << (pieceShift - 1)
	return math.Float64frombits(bits&^(2*half-1) | half)
}

// outside is the curve where it has no pieces. A negative x, or none, is the
// formula's.
func (c *curve) outside(x float64) float64 {
	bits := math.Float64bits(x)
	switch i := bits >> pieceShift; {
	case i >= firstPiece:
		return CliftGauvin{}.CdRe(math.Sqrt(x))
	case i < firstFaint:
		return stokes
	default:
		return c.faint.at(bits)
	}
}

func (f *faint) at(bits uint64) float64 {
	octave := bits>>fractionBits - (faintOctave + exponentBias)
	bits = bits&(1<<fractionBits-1) | exponentBias<<fractionBits
	d := math.Float64frombits(bits) - middle(bits)
	k := bits >> pieceShift % perOctave
	return stokes + (float64(f.skins[octave]*f.skin[k].at(d)) + float64(f.forms[octave]*f.form[k].at(d)))
}

// sphere is the curve, built when first asked for, in about 1 ms.
var sphere = sync.OnceValue(newCurve)
