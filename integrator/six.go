package integrator

import "math"

// Six components, a place and a velocity, by a method shaped like
// DormandPrince54 are what most runs are made of. For them the linear
// combinations of a step are written out over arrays, in the order of row.add:
// the same bits, in half the time.

// sixDim is the number of components that are written out.
const sixDim = 6

// six holds the coefficients of a method of seven stages of which the second
// counts in none but the next, first same as last; those of a1 to a6 are the
// rows of A, the last one without its zero.
type six struct {
	a1     [1]float64
	a2     [2]float64
	a3     [3]float64
	a4     [4]float64
	a5, a6 [5]float64
	e, p   [6]float64 // of the error, and of the highest power of dense output
	c      [5]float64
}

// newSix gives the coefficients, nil for a method of another shape.
func newSix(tab *Tableau, dim int) *six {
	if dim != sixDim || len(tab.B) != 7 || !tab.FSAL || len(tab.P[0]) != 4 || tab.C[5] != 1 || tab.E[1] != 0 || tab.A[6][1] != 0 || !tab.smooth() {
		return nil
	}
	z := &six{a1: [1]float64(tab.A[1]), a2: [2]float64(tab.A[2]), a3: [3]float64(tab.A[3]), a4: [4]float64(tab.A[4]), a5: [5]float64(tab.A[5])}
	copy(z.c[:], tab.C)
	for i, j := range []int{0, 2, 3, 4, 5, 6} {
		z.e[i], z.p[i] = tab.E[j], tab.P[j][3]
		if i < len(z.a6) {
			z.a6[i] = tab.A[6][j]
		}
	}
	return z
}

// smoothSlack is what the sums of smooth may be off by: the rounding of a few
// coefficients of about ten.
const smoothSlack = 1e-12

// smooth says whether the dense output, of degree 4, meets value and derivative
// at both ends of a step, and leaves the second stage out: then the coefficients
// of theta^4 settle the others.
func (tab *Tableau) smooth() bool {
	s := len(tab.P)
	near := func(x, want float64) bool { return x-want <= smoothSlack && want-x <= smoothSlack }
	for i, p := range tab.P {
		start, end := 0.0, 0.0
		if i == 0 {
			start = 1
		}
		if i == s-1 {
			end = 1
		}
		if p[0] != start || !near(p[0]+p[1]+p[2]+p[3], tab.B[i]) || !near(p[0]+2*p[1]+3*p[2]+4*p[3], end) {
			return false
		}
	}
	return tab.P[1][3] == 0
}

// trial is [Stepper.trial] for six components.
func (z *six) trial(st *Stepper, h, t1 float64) float64 {
	y, y1, arg, err := (*[sixDim]float64)(st.y0), (*[sixDim]float64)(st.y1), (*[sixDim]float64)(st.arg), (*[sixDim]float64)(st.err)
	k0, k1, k2 := (*[sixDim]float64)(st.k[0]), (*[sixDim]float64)(st.k[1]), (*[sixDim]float64)(st.k[2])
	k3, k4, k5 := (*[sixDim]float64)(st.k[3]), (*[sixDim]float64)(st.k[4]), (*[sixDim]float64)(st.k[5])
	k6 := (*[sixDim]float64)(st.k[6])
	sys, t := st.sys, st.t
	st.stats.Derivs += 6
	for i := range arg {
		arg[i] = y[i] + h*(z.a1[0]*k0[i])
	}
	sys.Deriv(t+z.c[1]*h, arg[:], k1[:])
	a0, a1 := h*z.a2[0], h*z.a2[1]
	for i := range arg {
		arg[i] = y[i] + (a0*k0[i] + a1*k1[i])
	}
	sys.Deriv(t+z.c[2]*h, arg[:], k2[:])
	a0, a1, a2 := h*z.a3[0], h*z.a3[1], h*z.a3[2]
	for i := range arg {
		arg[i] = y[i] + (a0*k0[i] + a1*k1[i] + a2*k2[i])
	}
	sys.Deriv(t+z.c[3]*h, arg[:], k3[:])
	a0, a1, a2, a3 := h*z.a4[0], h*z.a4[1], h*z.a4[2], h*z.a4[3]
	for i := range arg {
		arg[i] = y[i] + (a0*k0[i] + a1*k1[i] + a2*k2[i] + a3*k3[i])
	}
	sys.Deriv(t+z.c[4]*h, arg[:], k4[:])
	a0, a1, a2, a3, a4 := h*z.a5[0], h*z.a5[1], h*z.a5[2], h*z.a5[3], h*z.a5[4]
	for i := range arg {
		arg[i] = y[i] + (a0*k0[i] + a1*k1[i] + a2*k2[i] + a3*k3[i] + a4*k4[i])
	}
	sys.Deriv(t1, arg[:], k5[:])
	a0, a1, a2, a3, a4 = h*z.a6[0], h*z.a6[1], h*z.a6[2], h*z.a6[3], h*z.a6[4]
	for i := range y1 {
		y1[i] = y[i] + (a0*k0[i] + a1*k2[i] + a2*k3[i] + a3*k4[i] + a4*k5[i])
	}
	sys.Deriv(t1, y1[:], k6[:])
	a0, a1, a2, a3, a4, a5 := h*z.e[0], h*z.e[1], h*z.e[2], h*z.e[3], h*z.e[4], h*z.e[5]
	for i := range err {
		err[i] = a0*k0[i] + a1*k2[i] + a2*k3[i] + a3*k4[i] + a4*k5[i] + a5*k6[i]
	}
	if len(st.norm.end) == 2 && st.norm.end[0] == 3 {
		return st.norm.halves(err, y, y1)
	}
	return st.norm.squared(st.err, st.y0, st.y1)
}

// halves is squared for a group of the first three components and one of the
// others, written out.
func (m *norm) halves(e, a, b *[sixDim]float64) float64 {
	s0 := m.abs[0] + m.rel*math.Sqrt(max(a[0]*a[0]+a[1]*a[1]+a[2]*a[2], b[0]*b[0]+b[1]*b[1]+b[2]*b[2]))
	s1 := m.abs[1] + m.rel*math.Sqrt(max(a[3]*a[3]+a[4]*a[4]+a[5]*a[5], b[3]*b[3]+b[4]*b[4]+b[5]*b[5]))
	if !(s0+s1 <= math.MaxFloat64) {
		return math.NaN()
	}
	return ((e[0]*e[0]+e[1]*e[1]+e[2]*e[2])/(s0*s0) + (e[3]*e[3]+e[4]*e[4]+e[5]*e[5])/(s1*s1)) / 2
}

// dense fills the coefficients of the interpolant after an accepted step, by
// rising powers of theta. With those of theta^4, c, by the tableau, the others
// follow from the values and derivatives at the ends:
//
//	c2 = 3 u - w + c,  c3 = w - 2 u - 2 c,  u = y1 - y0 - h y0',  w = h (y1' - y0')
func (z *six) dense(st *Stepper, h float64, coef *[5 * sixDim]float64) {
	y, y1 := (*[sixDim]float64)(st.y0), (*[sixDim]float64)(st.y1)
	k0, k2, k3 := (*[sixDim]float64)(st.k[0]), (*[sixDim]float64)(st.k[2]), (*[sixDim]float64)(st.k[3])
	k4, k5, k6 := (*[sixDim]float64)(st.k[4]), (*[sixDim]float64)(st.k[5]), (*[sixDim]float64)(st.k[6])
	p0, p1, p2, p3, p4, p5 := h*z.p[0], h*z.p[1], h*z.p[2], h*z.p[3], h*z.p[4], h*z.p[5]
	for i := range y {
		first := h * k0[i]
		u, w := y1[i]-y[i]-first, h*k6[i]-first
		c := p0*k0[i] + p1*k2[i] + p2*k3[i] + p3*k4[i] + p4*k5[i] + p5*k6[i]
		coef[i], coef[sixDim+i] = y[i], first
		coef[2*sixDim+i], coef[3*sixDim+i], coef[4*sixDim+i] = 3*u-w+c, w-2*u-2*c, c
	}
}
