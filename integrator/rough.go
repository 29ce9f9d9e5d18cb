package integrator

import "math"

// The step control needs logarithm and exponential to a per cent; the exact
// ones took a quarter of a step of six components.

const (
	fraction = 52   // bits of a float's fraction
	bias     = 1023 // of its exponent
)

// roughLog is the natural logarithm of a positive normal x to 1e-4, and about
// -709 of 0: by the exponent, and by the series ln m = 2 artanh((m-1)/(m+1)) of
// the fraction over the middle of its octave.
func roughLog(x float64) float64 {
	bits := math.Float64bits(x)
	m := math.Float64frombits(bits&(1<<fraction-1) | bias<<fraction)
	z := (m - math.Sqrt2) / (m + math.Sqrt2)
	z2 := z * z
	return (float64(int(bits>>fraction)-bias)+0.5)*math.Ln2 + z*(2+z2*(2./3+z2*(2./5)))
}

// roughExp is the exponential of x, from -700 to 700, to 1e-4: that of what is
// left of x by whole octaves, at most half of ln 2, by its series.
func roughExp(x float64) float64 {
	n := math.Floor(x*math.Log2E + 0.5)
	r := x - n*math.Ln2
	p := 1 + r*(1+r*(1./2+r*(1./6+r*(1./24))))
	return p * math.Float64frombits(uint64(int(n)+bias)<<fraction)
}
