package integrator_test

import (
	"fmt"
	"math"
	"slices"
	"testing"

	"offplumb/integrator"
	"offplumb/integrator/odetest"
)

// quartic is y_i' = c_i t^4. A step of length 1 from 0 ends at y0 + c/5, and
// its error is estimated as c sum E_i C_i^4, exactly.
type quartic struct{ c []float64 }

func (q quartic) Dim() int { return len(q.c) }

func (q quartic) Deriv(t float64, _, dy []float64) {
	for i, c := range q.c {
		dy[i] = c * t * t * t * t
	}
}

// estimate is the error of a step of quartic for c = 1.
func estimate() float64 {
	tab := integrator.DormandPrince54()
	sum := 0.0
	for i, e := range tab.E {
		sum += e * math.Pow(tab.C[i], 4)
	}
	return math.Abs(sum)
}

// TestTolFormula tries the formula of Tol: a step of which it gives just below
// 1 passes, and one of just above does not.
func TestTolFormula(t *testing.T) {
	for _, c := range []struct {
		name   string
		tol    integrator.Tol
		y0, c  []float64
		square func(e, y0, y1 []float64) float64 // of the norm
	}{
		{"absolute", integrator.Tol{Abs: []float64{1e-3}}, []float64{7}, []float64{1},
			func(e, _, _ []float64) float64 { return sq(e[0] / 1e-3) }},
		{"relative, grows", integrator.Tol{Rel: 1e-4, Abs: []float64{1e-6}}, []float64{0.1}, []float64{1},
			func(e, _, y1 []float64) float64 { return sq(e[0] / (1e-6 + 1e-4*y1[0])) }},
		{"relative, shrinks", integrator.Tol{Rel: 1e-4, Abs: []float64{1e-6}}, []float64{-3}, []float64{1},
			func(e, y0, _ []float64) float64 { return sq(e[0] / (1e-6 + 1e-4*-y0[0])) }},
		{"mean of components", integrator.Tol{Abs: []float64{1e-3}}, []float64{0, 0, 0}, []float64{1, 2, 0},
			func(e, _, _ []float64) float64 { return (sq(e[0]/1e-3) + sq(e[1]/1e-3)) / 3 }},
		{"one tolerance each", integrator.Tol{Abs: []float64{1e-3, 1e-5}}, []float64{0, 0}, []float64{1, 2},
			func(e, _, _ []float64) float64 { return (sq(e[0]/1e-3) + sq(e[1]/1e-5)) / 2 }},
		{"one group", integrator.Tol{Abs: []float64{1e-3}, Groups: []int{2}}, []float64{0, 0}, []float64{1, 2},
			func(e, _, _ []float64) float64 { return (e[0]*e[0] + e[1]*e[1]) / 1e-6 }},
		{"two groups, relative", integrator.Tol{Rel: 1e-4, Abs: []float64{1e-3, 1e-4}, Groups: []int{2, 1}},
			[]float64{3, 4, 0}, []float64{-1, 1, 2},
			func(e, y0, y1 []float64) float64 {
				a := 1e-3 + 1e-4*max(math.Hypot(y0[0], y0[1]), math.Hypot(y1[0], y1[1]))
				return ((e[0]*e[0]+e[1]*e[1])/sq(a) + sq(e[2]/(1e-4+1e-4*y1[2]))) / 2
			}},
		{"one group, shrinks", integrator.Tol{Rel: 1e-4, Abs: []float64{1e-6}, Groups: []int{2}},
			[]float64{3, 4}, []float64{-1, -1},
			func(e, y0, _ []float64) float64 {
				return (e[0]*e[0] + e[1]*e[1]) / sq(1e-6+1e-4*math.Hypot(y0[0], y0[1]))
			}},
	} {
		// finds the size at which the formula gives 1, and tries both sides
		scaled := func(size float64) (e, y1, rate []float64) {
			for i := range c.c {
				rate = append(rate, size*c.c[i])
				e = append(e, rate[i]*estimate())
				y1 = append(y1, c.y0[i]+rate[i]/5)
			}
			return e, y1, rate
		}
		lo, hi := 1e-9, 1e9
		for range 200 {
			mid := math.Sqrt(lo * hi)
			if e, y1, _ := scaled(mid); c.square(e, c.y0, y1) < 1 {
				lo = mid
			} else {
				hi = mid
			}
		}
		for _, side := range []float64{1 - 1e-6, 1 + 1e-6} {
			_, _, rate := scaled(side * lo)
			st := newStepper(t, quartic{rate}, c.tol)
			st.Reset(0, c.y0, integrator.FirstStep(1))
			s, err := st.Step(1)
			if err != nil {
				t.Fatal(err)
			}
			if passed := s.T1 == 1; passed != (side < 1) {
				t.Errorf("%s: at %.6f of the size that just passes: passed %v", c.name, side, passed)
			}
		}
	}
}

func sq(x float64) float64 { return x * x }

// TestLocalErrorWithinTolerance: the solution that goes on is of an order
// higher than the one whose error is estimated, so that a step's true error is
// below what it was accepted for.
func TestLocalErrorWithinTolerance(t *testing.T) {
	const tol = 1e-6
	for _, p := range []odetest.Problem{odetest.Logistic(), odetest.Torus(), odetest.RigidBody(), odetest.Kepler(0.5), odetest.Bessel()} {
		st, exact := newStepper(t, p, tight(tol)), newStepper(t, p, tight(1e-13))
		st.Reset(p.T0, p.Y0)
		mustSolve(t, st, p.TEnd, nil, func(s *integrator.Step, _ []integrator.Hit) error {
			exact.Reset(s.T0, s.Y0)
			res := mustSolve(t, exact, s.T1, nil, nil)
			sum := 0.0
			for i, y := range res.Y {
				sum += sq((s.Y1[i] - y) / (tol + tol*max(math.Abs(s.Y0[i]), math.Abs(s.Y1[i]))))
			}
			if norm := math.Sqrt(sum / float64(p.Dim())); !(norm <= 1) {
				t.Errorf("%s: step from %g to %g is off by %g of its tolerance", p.Name, s.T0, s.T1, norm)
			}
			return nil
		})
	}
}

// turned is a problem of position and velocity in a plane, turned about the
// origin.
type turned struct {
	odetest.Problem
	sin, cos float64
}

func newTurned(p odetest.Problem, angle float64) turned {
	sin, cos := math.Sincos(angle)
	return turned{p, sin, cos}
}

// turn sets dst to y turned by the angle, or back.
func (r turned) turn(dst, y []float64, back bool) {
	sin := r.sin
	if back {
		sin = -sin
	}
	for i := 0; i < len(y); i += 2 {
		dst[i], dst[i+1] = r.cos*y[i]-sin*y[i+1], sin*y[i]+r.cos*y[i+1]
	}
}

func (r turned) Deriv(t float64, y, dy []float64) {
	var a, b [4]float64
	r.turn(a[:], y, true)
	r.Problem.Deriv(t, a[:], b[:])
	r.turn(dy, b[:], false)
}

// stepEnds runs p from its start, turned, and returns the ends of all steps.
func stepEnds(t *testing.T, p turned, tol integrator.Tol) (ends []float64, work integrator.Stats) {
	t.Helper()
	st := newStepper(t, p, tol)
	y0 := make([]float64, 4)
	p.turn(y0, p.Y0, false)
	st.Reset(p.T0, y0)
	res := mustSolve(t, st, p.TEnd, nil, func(s *integrator.Step, _ []integrator.Hit) error {
		ends = append(ends, s.T1)
		return nil
	})
	return ends, res.Stats
}

// TestRotationInvariance tries the law of Tol: turned within its groups, a
// problem takes the same steps, to rounding. The error of a step, 1e-6 of the
// state, is the difference of terms of the state's size: it carries a rounding
// of 1e-10 of itself, and a fifth of that gets into the length of the step.
// Each step passes on what came before it, on an orbit by some hundred times.
func TestRotationInvariance(t *testing.T) {
	const same = 1e-7
	grouped := integrator.Tol{Rel: 1e-6, Abs: []float64{1e-6, 2e-6}, Groups: []int{2, 2}}
	for _, e := range []float64{0.1, 0.5, 0.9} {
		p := odetest.Kepler(e)
		want, work := stepEnds(t, newTurned(p, 0), grouped)
		for _, angle := range []float64{0.1, math.Pi / 4, 1, math.Pi / 2, 2.5, 4} {
			t.Run(fmt.Sprintf("%s by %.3g", p.Name, angle), func(t *testing.T) {
				got, turnedWork := stepEnds(t, newTurned(p, angle), grouped)
				if turnedWork != work {
					t.Fatalf("work %+v, unturned %+v", turnedWork, work)
				}
				if miss := distance(got, want); miss > same {
					t.Errorf("the ends of steps differ by %g", miss)
				}
			})
		}
	}
}

// TestRotationVariesWithoutGroups shows that the law is due to the groups.
func TestRotationVariesWithoutGroups(t *testing.T) {
	p := odetest.Kepler(0.5)
	want, _ := stepEnds(t, newTurned(p, 0), tight(1e-6))
	got, _ := stepEnds(t, newTurned(p, math.Pi/4), tight(1e-6))
	if len(got) == len(want) && distance(got, want) < 1e-3 {
		t.Error("steps do not depend on the direction of the axes even without groups")
	}
}

// TestUnitsDoNotMatter: with the state and the absolute tolerances in another
// unit, larger by a power of two, the steps are the same, bit for bit.
func TestUnitsDoNotMatter(t *testing.T) {
	for _, groups := range [][]int{nil, {2, 2}} {
		run := func(unit float64) (ends []float64) {
			p := odetest.Kepler(0.5)
			var y0, y [4]float64
			for i, v := range p.Y0 {
				y0[i] = v * unit
			}
			sys := system{4, func(t float64, state, dy []float64) {
				for i, v := range state {
					y[i] = v / unit
				}
				p.Deriv(t, y[:], dy)
				for i := range dy {
					dy[i] *= unit
				}
			}}
			st := newStepper(t, sys, integrator.Tol{Rel: 1e-7, Abs: []float64{1e-7 * unit}, Groups: groups})
			st.Reset(0, y0[:])
			mustSolve(t, st, p.TEnd, nil, func(s *integrator.Step, _ []integrator.Hit) error {
				ends = append(ends, s.T1)
				return nil
			})
			return ends
		}
		want := run(1)
		for _, unit := range []float64{0x1p-40, 2, 0x1p30} {
			if got := run(unit); !slices.Equal(got, want) {
				t.Errorf("groups %v: in units of %g the steps differ", groups, 1/unit)
			}
		}
	}
}

// TestInfiniteScaleIsNoExcuse: a state that overflows makes every error small
// against it, but no step passes for that.
func TestInfiniteScaleIsNoExcuse(t *testing.T) {
	for _, groups := range [][]int{nil, {2}} {
		sys := system{2, func(_ float64, _, dy []float64) { dy[0], dy[1] = 1e308, 0 }}
		st := newStepper(t, sys, integrator.Tol{Rel: 1e-6, Abs: []float64{1}, Groups: groups})
		st.Reset(0, []float64{0, 1}, integrator.FirstStep(1e-6))
		res, err := integrator.Solve(st, 10, nil, nil)
		if err == nil || math.IsInf(res.Y[0], 0) {
			t.Errorf("groups %v: reached %v, error %v", groups, res.Y, err)
		}
	}
}
