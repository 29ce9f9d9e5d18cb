package integrator_test

import (
	"testing"

	"offplumb/integrator"
	"offplumb/integrator/odetest"
)

// TestWithoutFSAL: the same coefficients not declared as first same as last
// give the same bits, at the cost of one call more for each step but the last.
func TestWithoutFSAL(t *testing.T) {
	p := odetest.Kepler(0.5)
	tab := integrator.DormandPrince54()
	tab.FSAL = false
	plain, err := integrator.NewStepper(tab, p, tight(1e-7))
	if err != nil {
		t.Fatal(err)
	}
	got, want := runRecorded(t, plain, p), runRecorded(t, newStepper(t, p, tight(1e-7)), p)
	for i := range want.bits {
		if len(got.bits) != len(want.bits) || got.bits[i] != want.bits[i] {
			t.Fatalf("number %d differs in its bits", i)
		}
	}
	if more := got.work.Derivs - want.work.Derivs; more != want.work.Accepted-1 {
		t.Errorf("%d calls more for %d steps", more, want.work.Accepted)
	}
}

// classic is the method of Kutta 1901 (from memory) with an Euler step for an
// estimate and a cubic of order 3 (Hairer, Norsett & Wanner I, section II.6;
// from memory) for dense output. It has another number of stages, is not first
// same as last, and takes eight terms to a row when its weights are split.
func classic(split bool) *integrator.Tableau {
	tab := &integrator.Tableau{
		Name: "Kutta", Source: "Kutta 1901 (from memory)", Order: 4, ErrOrder: 1,
		C: []float64{0, 0.5, 0.5, 1},
		B: []float64{1. / 6, 1. / 3, 1. / 3, 1. / 6},
		E: []float64{1./6 - 1, 1. / 3, 1. / 3, 1. / 6},
		A: [][]float64{{}, {0.5}, {0, 0.5}, {0, 0, 1}},
		P: [][]float64{{1, -1.5, 2. / 3}, {0, 1, -2. / 3}, {0, 1, -2. / 3}, {0, -0.5, 2. / 3}},
	}
	if !split {
		return tab
	}
	// every stage twice, each with half of the weight
	twice := &integrator.Tableau{Name: "Kutta, split", Order: 4, ErrOrder: 1}
	for i := range tab.B {
		for copy := range 2 {
			row := make([]float64, 2*i+copy)
			for j, a := range tab.A[i] {
				row[2*j], row[2*j+1] = a/2, a/2
			}
			half := make([]float64, 3)
			for j, p := range tab.P[i] {
				half[j] = p / 2
			}
			twice.C = append(twice.C, tab.C[i])
			twice.B = append(twice.B, tab.B[i]/2)
			twice.E = append(twice.E, tab.E[i]/2)
			twice.A = append(twice.A, row)
			twice.P = append(twice.P, half)
		}
	}
	return twice
}

// TestOtherTableau: the stepper knows nothing of a method but its tableau.
func TestOtherTableau(t *testing.T) {
	for _, split := range []bool{false, true} {
		st, err := integrator.NewStepper(classic(split), torus(), loose())
		if err != nil {
			t.Fatal(err)
		}
		global := func(n int) float64 {
			return distance(fixed(t, st, 0.5, 2, n, nil), onTorus(2.5))
		}
		checkOrder(t, "Kutta's method", 4, global, 64, 128, 256)
		within := func(n int) (miss float64) {
			y := make([]float64, 3)
			fixed(t, st, 0.5, 1/float64(n), 1, func(s *integrator.Step) {
				when := s.T0 + 0.3*(s.T1-s.T0)
				s.At(when, y)
				miss = distance(y, onTorus(when))
			})
			return miss
		}
		checkOrder(t, "its dense output", 4, within, 64, 128, 256)
	}
}
