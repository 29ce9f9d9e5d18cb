package integrator_test

import (
	"math"
	"testing"

	"offplumb/integrator"
)

// epsilon is the distance from 1 to the next float64.
const epsilon = 0x1p-52

// system makes a System of a function.
type system struct {
	dim int
	f   func(t float64, y, dy []float64)
}

func (s system) Dim() int                         { return s.dim }
func (s system) Deriv(t float64, y, dy []float64) { s.f(t, y, dy) }

// clock is y' = 1: with y(t0) = t0 it tells the time, and its steps are as
// long as they are allowed to be.
func clock() system {
	return system{1, func(_ float64, _, dy []float64) { dy[0] = 1 }}
}

// drift is uniform motion, (x, v)' = (v, 0).
func drift() system {
	return system{2, func(_ float64, y, dy []float64) { dy[0], dy[1] = y[1], 0 }}
}

// loose lets a step have any length: its error never matters.
func loose() integrator.Tol { return integrator.Tol{Abs: []float64{1e9}} }

// tight is a usual tolerance, for every component.
func tight(tol float64) integrator.Tol {
	return integrator.Tol{Rel: tol, Abs: []float64{tol}}
}

// newStepper fails the test if there is none.
func newStepper(t testing.TB, sys integrator.System, tol integrator.Tol) *integrator.Stepper {
	t.Helper()
	st, err := integrator.NewStepper(integrator.DormandPrince54(), sys, tol)
	if err != nil {
		t.Fatal(err)
	}
	return st
}

// mustSolve fails the test on an error.
func mustSolve(t testing.TB, st *integrator.Stepper, tEnd float64, events []integrator.EventSpec,
	onStep func(*integrator.Step, []integrator.Hit) error) integrator.Result {
	t.Helper()
	res, err := integrator.Solve(st, tEnd, events, onStep)
	if err != nil {
		t.Fatal(err)
	}
	return res
}

// sameBits reports whether a and b are equal bit for bit.
func sameBits(a, b []float64) bool {
	if len(a) != len(b) {
		return false
	}
	for i := range a {
		if math.Float64bits(a[i]) != math.Float64bits(b[i]) {
			return false
		}
	}
	return true
}

// distance is the largest difference of two states.
func distance(a, b []float64) float64 {
	most := 0.0
	for i := range a {
		most = max(most, math.Abs(a[i]-b[i]))
	}
	return most
}
