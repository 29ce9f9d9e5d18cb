package integrator

import "math"

// Step is one accepted step. Its slices and its interpolant belong to the
// stepper: they are valid until its next Step or Reset, and are not to be
// changed. The interpolant is formed when first asked for.
//
// The interpolant is of order 4 for [DormandPrince54]: its local error is of
// the order of the estimated error of the step, and least at the ends.
type Step struct {
	T0, T1 float64   // start and end, in the unit of time
	Y0, Y1 []float64 // states there, Dim components each
	st     *Stepper
	h      float64 // length as computed, not as truncated
	dense  bool    // seg is filled
	seg    Segment
}

// Segment is the interpolant of a step on its own: a polynomial in time for
// each component, its coefficients in one slice. The zero value may be filled
// by [Step.CopyTo].
type Segment struct {
	T0, T1 float64 // start and end, in the unit of time
	h      float64 // the polynomial's variable is theta = (t - T0)/h
	dim    int
	coef   []float64 // Dim coefficients of theta^0, then of theta^1, ...
}

// Use gives an empty segment the space for its coefficients, five times Dim for
// DormandPrince54, of which it uses no more than the capacity.
func (g *Segment) Use(space []float64) { g.coef = space[:0] }

// At fills y with the state at t, which should lie in [T0, T1]. At(T0) is Y0
// and At(T1) is Y1, bit for bit.
func (s *Step) At(t float64, y []float64) {
	switch t {
	case s.T1:
		copy(y, s.Y1)
	case s.T0:
		copy(y, s.Y0) // the polynomial loses the sign of a zero
	default:
		s.segment().At(t, y)
	}
}

// Rate fills dy with the time derivative of the interpolant at t, per unit of
// time. It equals f only at the ends, and to rounding.
func (s *Step) Rate(t float64, dy []float64) { s.segment().Rate(t, dy) }

// MaxRate is [Segment.MaxRate] of the step.
func (s *Step) MaxRate(from, to int) float64 { return s.segment().MaxRate(from, to) }

// MaxAccel is [Segment.MaxAccel] of the step.
func (s *Step) MaxAccel(from, to int) float64 { return s.segment().MaxAccel(from, to) }

// CopyTo copies the interpolant, up to T1, into dst, whose space it reuses. It
// stays when the stepper moves on.
func (s *Step) CopyTo(dst *Segment) {
	seg := s.segment()
	coef := append(dst.coef[:0], seg.coef...)
	*dst = *seg
	dst.T1, dst.coef = s.T1, coef
}

// Clone returns the interpolant as a segment of its own.
func (s *Step) Clone() Segment {
	var seg Segment
	s.CopyTo(&seg)
	return seg
}

// Truncate ends the step at t in [T0, T1]: T1 and Y1 become t and the state
// there. The stepper goes on from there, at the cost of one call of Deriv. It
// panics if t lies outside.
func (s *Step) Truncate(t float64) {
	if !(t >= s.T0 && t <= s.T1) {
		panic("integrator: Truncate outside the step")
	}
	if t == s.T1 {
		return
	}
	s.segment() // while Y1 is the computed one
	s.At(t, s.Y1)
	s.T1 = t
	s.st.moved = true
}

// segment returns the interpolant, and forms it if need be.
func (s *Step) segment() *Segment {
	if s.dense {
		return &s.seg
	}
	s.dense = true
	g := &s.seg
	g.T0, g.T1, g.h = s.T0, s.T1, s.h
	if s.st.six != nil {
		s.st.six.dense(s.st, s.h, (*[5 * sixDim]float64)(g.coef))
		return g
	}
	copy(g.coef, s.Y0)
	for p := range s.st.poly {
		s.st.poly[p].add(g.power(p+1), s.st.zero, s.h, s.st.k)
	}
	return g
}

// power returns the coefficients of theta^p.
func (g *Segment) power(p int) []float64 { return g.coef[p*g.dim : (p+1)*g.dim] }

// degree returns the highest power.
func (g *Segment) degree() int { return len(g.coef)/g.dim - 1 }

// Dim returns the number of components.
func (g *Segment) Dim() int { return g.dim }

// At fills y, of Dim components, with the state at t. Beyond T0 and T1 the
// polynomial goes on, ever less true.
func (g *Segment) At(t float64, y []float64) {
	theta := (t - g.T0) / g.h
	n, last := g.dim, g.degree()
	y = y[:n]
	if last == 4 { // as of DormandPrince54, in one pass
		c0, c1, c2 := g.coef[:n], g.coef[n:][:n], g.coef[2*n:][:n]
		c3, c4 := g.coef[3*n:][:n], g.coef[4*n:][:n]
		for i := range y {
			y[i] = c0[i] + theta*(c1[i]+theta*(c2[i]+theta*(c3[i]+theta*c4[i])))
		}
		return
	}
	copy(y, g.power(last))
	for p := last - 1; p >= 0; p-- {
		for i, c := range g.power(p) {
			y[i] = c + theta*y[i]
		}
	}
}

// Rate fills dy, of Dim components, with the derivative of At at t, per unit
// of time.
func (g *Segment) Rate(t float64, dy []float64) {
	theta := (t - g.T0) / g.h
	n := g.dim
	dy = dy[:n]
	if g.degree() == 4 { // as of DormandPrince54, in one pass
		c1, c2, c3, c4 := g.coef[n:][:n], g.coef[2*n:][:n], g.coef[3*n:][:n], g.coef[4*n:][:n]
		w := 1 / g.h
		w2, w3, w4 := 2*w, 3*w, 4*w
		for i := range dy {
			dy[i] = w*c1[i] + theta*(w2*c2[i]+theta*(w3*c3[i]+theta*(w4*c4[i])))
		}
		return
	}
	clear(dy)
	for p := g.degree(); p >= 1; p-- {
		w := float64(p) / g.h
		for i, c := range g.power(p) {
			dy[i] = w*c + theta*dy[i]
		}
	}
}

// MaxRate bounds the Euclidean norm of the components [from, to) of Rate, per
// unit of time, over the step as computed (before any truncation). Law: no
// Rate within the step exceeds it, but for rounding.
func (g *Segment) MaxRate(from, to int) float64 { return g.bound(from, to, 1) }

// MaxAccel bounds the second derivative as MaxRate does the first, per unit of
// time squared.
func (g *Segment) MaxAccel(from, to int) float64 { return g.bound(from, to, 2) }

// maxDegree is the highest degree of dense output: bound's space on the stack.
const maxDegree = 8

// bound returns the largest norm of the Bernstein coefficients of the
// derivative of the given order: a polynomial on [0, 1] lies in the convex hull
// of these (Farin, Curves and Surfaces for CAGD; from memory). With
// coefficients q_m of theta^m, up to m = d, they are
//
//	b_i = sum_{m<=i} binom(i, m)/binom(d, m) q_m
func (g *Segment) bound(from, to, order int) float64 {
	d := g.degree() - order
	if d == 2 && to-from == 3 {
		return math.Sqrt(g.bound3(from)) / (g.h * g.h)
	}
	most := 0.0
	for i := 0; i <= d; i++ {
		w := &bernstein[order-1][d][i]
		sum := 0.0
		for c := from; c < to; c++ {
			b := 0.0
			for m := 0; m <= i; m++ {
				b += w[m] * g.coef[(m+order)*g.dim+c]
			}
			sum += b * b
		}
		most = max(most, sum)
	}
	if order == 2 {
		return math.Sqrt(most) / (g.h * g.h)
	}
	return math.Sqrt(most) / g.h
}

// bound3 is the square of bound, times h^4, for the second derivative of three
// components of degree 4, written out.
func (g *Segment) bound3(from int) float64 {
	n := g.dim
	c2, c3, c4 := g.coef[2*n+from:][:3], g.coef[3*n+from:][:3], g.coef[4*n+from:][:3]
	var s0, s1, s2 float64
	for i := range c2 {
		b0 := 2 * c2[i]
		b1 := b0 + 3*c3[i]
		b2 := b1 + 3*c3[i] + 12*c4[i]
		s0, s1, s2 = s0+b0*b0, s1+b1*b1, s2+b2*b2
	}
	return max(s0, s1, s2)
}

// bernstein holds the weights of bound: by order less 1, by the degree d of the
// derivative, by i and m. They are those above times what differentiating
// theta^(m+order) brings down.
var bernstein = func() (w [2][maxDegree][maxDegree][maxDegree]float64) {
	for order := 1; order <= 2; order++ {
		for d := 0; d <= maxDegree-order; d++ {
			for i := 0; i <= d; i++ {
				part := 1.0
				for m := 0; m <= i; m++ {
					w[order-1][d][i][m] = part * falling(m+order, order)
					part *= float64(i-m) / float64(max(d-m, 1))
				}
			}
		}
	}
	return w
}()

// falling returns p for order 1 and p (p-1) for order 2: what differentiating
// theta^p brings down.
func falling(p, order int) float64 {
	if order == 1 {
		return float64(p)
	}
	return float64(p * (p - 1))
}
