package integrator_test

import (
	"math"
	"testing"

	"offplumb/integrator"
)

// torus is problem B4 of Hull, Enright, Fellen & Sedgwick, Comparing numerical
// methods for ordinary differential equations, SIAM J. Numer. Anal. 9 (1972)
// 603-637 (from memory): a curve on a torus, and nonlinear in all components.
// The clock, a fourth component, is replaced by t itself, so that the nodes of
// the method matter too.
func torus() system {
	return system{3, func(t float64, y, dy []float64) {
		r := 2 + math.Cos(t)
		dy[0] = -y[1] - y[0]*y[2]/r
		dy[1] = y[0] - y[1]*y[2]/r
		dy[2] = y[0] / math.Hypot(y[0], y[1])
	}}
}

func onTorus(t float64) []float64 {
	r := 2 + math.Cos(t)
	return []float64{r * math.Cos(t), r * math.Sin(t), math.Sin(t)}
}

func torusRate(t float64) []float64 {
	dy := make([]float64, 3)
	torus().f(t, onTorus(t), dy)
	return dy
}

// fixed runs st from t0 to t0+span in n equal steps.
func fixed(t *testing.T, st *integrator.Stepper, t0, span float64, n int, onStep func(*integrator.Step)) []float64 {
	t.Helper()
	h := span / float64(n)
	st.Reset(t0, onTorus(t0), integrator.FirstStep(h), integrator.MaxStep(h))
	res := mustSolve(t, st, t0+span, nil, func(s *integrator.Step, _ []integrator.Hit) error {
		if onStep != nil {
			onStep(s)
		}
		return nil
	})
	if res.Accepted != n || res.Rejected != 0 {
		t.Fatalf("%d steps and %d rejected, want %d equal ones", res.Accepted, res.Rejected, n)
	}
	return res.Y
}

// checkOrder halves the step, and demands that the slopes of the logarithm of
// the error come to want. Where an error is C h^p (1 + c h + ...), one more
// halving halves the distance of the slope from p, so the two last slopes give
// p but for terms of h^2. (The pair is made to have a small C: the slopes
// themselves begin nearer to p+1.)
func checkOrder(t *testing.T, name string, want float64, err func(n int) float64, ns ...int) {
	t.Helper()
	var e []float64
	for _, n := range ns {
		e = append(e, err(n))
	}
	last := len(e) - 1
	s0, s1 := math.Log2(e[last-2]/e[last-1]), math.Log2(e[last-1]/e[last])
	if order := 2*s1 - s0; !(math.Abs(order-want) <= 0.2) {
		t.Errorf("%s: order %.3f (slopes %.3f, %.3f), want %g; errors %g", name, order, s0, s1, want, e)
	}
}

func TestConvergenceOfSteps(t *testing.T) {
	st := newStepper(t, torus(), loose())
	const span = 2
	global := func(n int) float64 {
		return distance(fixed(t, st, 0.5, span, n, nil), onTorus(0.5+span))
	}
	checkOrder(t, "end of the run", 5, global, 32, 64, 128)
	local := func(n int) float64 {
		return distance(fixed(t, st, 0.5, 1/float64(n), 1, nil), onTorus(0.5+1/float64(n)))
	}
	checkOrder(t, "end of one step", 6, local, 8, 16, 32)
}

// TestConvergenceOfDense: an interpolant of order 4 is wrong by h^5 within one
// step, and its rate by h^4.
func TestConvergenceOfDense(t *testing.T) {
	st := newStepper(t, torus(), loose())
	for _, theta := range []float64{0.2, 0.5, 0.75} {
		at := func(sample func(s *integrator.Step, t float64, y []float64), exact func(float64) []float64) func(int) float64 {
			return func(n int) (miss float64) {
				y := make([]float64, 3)
				fixed(t, st, 0.5, 1/float64(n), 1, func(s *integrator.Step) {
					when := s.T0 + theta*(s.T1-s.T0)
					sample(s, when, y)
					miss = distance(y, exact(when))
				})
				return miss
			}
		}
		checkOrder(t, "state within a step", 5, at((*integrator.Step).At, onTorus), 16, 32, 64)
		checkOrder(t, "rate within a step", 4, at((*integrator.Step).Rate, torusRate), 16, 32, 64)
	}
}

// TestConvergenceOfDenseAlongRun: over a run the interpolant is as exact as the
// steps, of order 5, since its own error does not add up.
func TestConvergenceOfDenseAlongRun(t *testing.T) {
	st := newStepper(t, torus(), loose())
	worst := func(n int) (most float64) {
		y := make([]float64, 3)
		fixed(t, st, 0.5, 4, n, func(s *integrator.Step) {
			for i := range 8 {
				when := s.T0 + (s.T1-s.T0)*float64(i)/8
				s.At(when, y)
				most = max(most, distance(y, onTorus(when)))
			}
		})
		return most
	}
	checkOrder(t, "worst along the run", 5, worst, 64, 128, 256)
}

// TestExactForQuintics: a quadrature of order 5 is exact where y' is a
// polynomial in t of degree 4, and the interpolant where it is of degree 3.
func TestExactForQuintics(t *testing.T) {
	for degree := range 7 {
		p := float64(degree)
		st := newStepper(t, system{1, func(t float64, _, dy []float64) { dy[0] = math.Pow(t, p) }}, loose())
		st.Reset(0, []float64{0}, integrator.FirstStep(1))
		s, err := st.Step(1)
		if err != nil {
			t.Fatal(err)
		}
		var half [1]float64
		s.At(0.5, half[:])
		// a dozen roundings of terms of size up to 6, the sum of |P|
		const rounding = 12 * 6 * epsilon
		missEnd := math.Abs(s.Y1[0] - 1/(p+1))
		missHalf := math.Abs(half[0] - math.Pow(0.5, p+1)/(p+1))
		if (missEnd <= rounding) != (degree <= 4) {
			t.Errorf("degree %d: the end misses by %g", degree, missEnd)
		}
		if (missHalf <= rounding) != (degree <= 3) {
			t.Errorf("degree %d: the middle misses by %g", degree, missHalf)
		}
	}
}

// TestErrorEstimateIsOfOrder5: the estimate is the difference from a solution
// of order 4, so a step half as long estimates 2^-5 of the error. It is seen
// through the tolerance at which a step just passes.
func TestErrorEstimateIsOfOrder5(t *testing.T) {
	estimate := func(n int) float64 {
		lo, hi := 1e-16, 1e6 // a step of 1/n is rejected with lo, passes with hi
		for hi/lo > 1.0001 {
			mid := math.Sqrt(lo * hi)
			st := newStepper(t, torus(), integrator.Tol{Abs: []float64{mid}})
			st.Reset(0.5, onTorus(0.5), integrator.FirstStep(1/float64(n)))
			s, err := st.Step(0.5 + 1/float64(n))
			if err != nil {
				t.Fatal(err)
			}
			if s.T1 == 0.5+1/float64(n) {
				hi = mid
			} else {
				lo = mid
			}
		}
		return hi
	}
	checkOrder(t, "estimate", 5, estimate, 16, 32, 64)
}
