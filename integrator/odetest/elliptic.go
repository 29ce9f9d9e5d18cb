package odetest

import "math"

// jacobi returns the elliptic functions sn, cn and dn of the argument u and
// the parameter m in [0, 1), by the arithmetic-geometric mean (Abramowitz &
// Stegun, Handbook of Mathematical Functions, section 16.4; from memory). dn
// comes from sn, as m is never so near 1 here that it would lose figures.
func jacobi(u, m float64) (sn, cn, dn float64) {
	const levels = 8 // the mean converges quadratically: to rounding in five
	var a, c [levels + 1]float64
	a[0], c[0] = 1, math.Sqrt(m)
	b := math.Sqrt(1 - m)
	for i := range levels {
		a[i+1], c[i+1] = (a[i]+b)/2, (a[i]-b)/2
		b = math.Sqrt(a[i] * b)
	}
	phi := math.Ldexp(a[levels]*u, levels)
	for i := levels; i > 0; i-- {
		phi = (phi + math.Asin(c[i]/a[i]*math.Sin(phi))) / 2
	}
	sn, cn = math.Sincos(phi)
	return sn, cn, math.Sqrt(1 - m*sn*sn)
}
