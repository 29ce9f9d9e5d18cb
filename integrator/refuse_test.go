package integrator_test

import (
	"math"
	"strings"
	"testing"

	"offplumb/integrator"
)

// TestNewStepperRefuses: what is wrong is said in an error, which names it.
func TestNewStepperRefuses(t *testing.T) {
	nan, inf := math.NaN(), math.Inf(1)
	abs := []float64{1e-6}
	good := drift()
	for _, c := range []struct {
		name string
		sys  integrator.System
		tol  integrator.Tol
		says string // "": accepted
	}{
		{"a sound one", good, integrator.Tol{Rel: 1e-6, Abs: abs}, ""},
		{"no relative tolerance", good, integrator.Tol{Abs: abs}, ""},
		{"least relative tolerance", good, integrator.Tol{Rel: integrator.MinRel, Abs: abs}, ""},
		{"least absolute tolerance", good, integrator.Tol{Abs: []float64{integrator.MinAbs}}, ""},
		{"one group, one tolerance", good, integrator.Tol{Abs: abs, Groups: []int{2}}, ""},
		{"two groups, two tolerances", good, integrator.Tol{Abs: []float64{1, 2}, Groups: []int{1, 1}}, ""},
		{"no system", nil, integrator.Tol{Abs: abs}, "no system"},
		{"no components", system{0, nil}, integrator.Tol{Abs: abs}, "without components"},
		{"negative dimension", system{-1, nil}, integrator.Tol{Abs: abs}, "without components"},
		{"tiny relative tolerance", good, integrator.Tol{Rel: integrator.MinRel / 2, Abs: abs}, "relative tolerance"},
		{"relative tolerance of one", good, integrator.Tol{Rel: 1, Abs: abs}, "relative tolerance"},
		{"negative relative tolerance", good, integrator.Tol{Rel: -1e-6, Abs: abs}, "relative tolerance"},
		{"relative tolerance no number", good, integrator.Tol{Rel: nan, Abs: abs}, "relative tolerance"},
		{"no absolute tolerance", good, integrator.Tol{Rel: 1e-6}, "0 absolute tolerances for 2 groups"},
		{"too many absolute tolerances", good, integrator.Tol{Abs: []float64{1, 1, 1}}, "3 absolute tolerances for 2 groups"},
		{"zero absolute tolerance", good, integrator.Tol{Rel: 1e-6, Abs: []float64{0}}, "absolute tolerance 0"},
		{"negative absolute tolerance", good, integrator.Tol{Abs: []float64{1, -1}}, "absolute tolerance 1"},
		{"infinite absolute tolerance", good, integrator.Tol{Abs: []float64{inf}}, "absolute tolerance 0"},
		{"absolute tolerance no number", good, integrator.Tol{Abs: []float64{nan}}, "absolute tolerance 0"},
		{"groups too short", good, integrator.Tol{Abs: abs, Groups: []int{1}}, "groups hold 1"},
		{"groups too long", good, integrator.Tol{Abs: abs, Groups: []int{1, 2}}, "groups hold 3"},
		{"no groups of none", good, integrator.Tol{Abs: abs, Groups: []int{}}, "groups hold 0"},
		{"an empty group", good, integrator.Tol{Abs: abs, Groups: []int{2, 0}}, "group 1"},
		{"a negative group", good, integrator.Tol{Abs: abs, Groups: []int{3, -1}}, "group 1"},
	} {
		_, err := integrator.NewStepper(integrator.DormandPrince54(), c.sys, c.tol)
		wantRefusal(t, c.name, err, c.says)
	}
}

// TestNewStepperRefusesTableau does the same for the shape of the tableau.
func TestNewStepperRefusesTableau(t *testing.T) {
	for _, c := range []struct {
		name  string
		spoil func(tab *integrator.Tableau)
		says  string
	}{
		{"sound", func(*integrator.Tableau) {}, ""},
		{"empty", func(tab *integrator.Tableau) { *tab = integrator.Tableau{Name: "empty"} }, `"empty"`},
		{"short C", func(tab *integrator.Tableau) { tab.C = tab.C[1:] }, "differ in length"},
		{"short E", func(tab *integrator.Tableau) { tab.E = tab.E[1:] }, "differ in length"},
		{"short A", func(tab *integrator.Tableau) { tab.A = tab.A[1:] }, "differ in length"},
		{"short P", func(tab *integrator.Tableau) { tab.P = tab.P[1:] }, "differ in length"},
		{"short row of A", func(tab *integrator.Tableau) { tab.A[3] = tab.A[3][1:] }, "row 3"},
		{"short row of P", func(tab *integrator.Tableau) { tab.P[2] = tab.P[2][1:] }, "row 2"},
		{"no order", func(tab *integrator.Tableau) { tab.Order = 0 }, "no order"},
		{"no embedded order", func(tab *integrator.Tableau) { tab.ErrOrder = 0 }, "no order"},
		{"no dense output", func(tab *integrator.Tableau) { clear(tab.P) }, "no dense output"},
		{"dense output of degree 9", func(tab *integrator.Tableau) {
			for i := range tab.P {
				tab.P[i] = make([]float64, 9)
			}
		}, "degree above 8"},
		{"last stage before the end", func(tab *integrator.Tableau) { tab.C[6] = 0.9 }, "last stage"},
		{"last stage not y1", func(tab *integrator.Tableau) { tab.A[6][2] = 0 }, "last stage"},
		{"last stage in y1", func(tab *integrator.Tableau) { tab.B[6] = 0.1 }, "last stage"},
	} {
		tab := integrator.DormandPrince54()
		c.spoil(tab)
		_, err := integrator.NewStepper(tab, drift(), tight(1e-6))
		wantRefusal(t, c.name, err, c.says)
	}
	_, err := integrator.NewStepper(nil, drift(), tight(1e-6))
	wantRefusal(t, "none", err, "no tableau")
}

func wantRefusal(t *testing.T, name string, err error, says string) {
	t.Helper()
	switch {
	case says == "" && err != nil:
		t.Errorf("%s: refused: %v", name, err)
	case says != "" && err == nil:
		t.Errorf("%s: not refused", name)
	case says != "" && !strings.Contains(err.Error(), says):
		t.Errorf("%s: %q does not say %q", name, err, says)
	}
}

// TestNotReset: without a Reset, or with a wrong one, the caller is at fault.
func TestNotReset(t *testing.T) {
	fresh := func() *integrator.Stepper { return newStepper(t, drift(), tight(1e-6)) }
	y := []float64{0, 1}
	wantPanic(t, "Step before Reset", func() { _, _ = fresh().Step(1) })
	wantPanic(t, "Solve before Reset", func() { _, _ = integrator.Solve(fresh(), 1, nil, nil) })
	wantPanic(t, "Reset with a short state", func() { fresh().Reset(0, y[:1]) })
	wantPanic(t, "Reset with a long state", func() { fresh().Reset(0, []float64{0, 1, 2}) })
	wantPanic(t, "a negative FirstStep", func() { fresh().Reset(0, y, integrator.FirstStep(-1)) })
	wantPanic(t, "MaxStep no number", func() { fresh().Reset(0, y, integrator.MaxStep(math.NaN())) })
	wantPanic(t, "negative MaxSteps", func() { fresh().Reset(0, y, integrator.MaxSteps(-1)) })
	event := integrator.EventSpec{Event: gap(math.Cos)}
	wantPanic(t, "a negative slop", func() {
		st := fresh()
		st.Reset(0, y)
		event.Slop = -1
		_, _ = integrator.Solve(st, 1, []integrator.EventSpec{event}, nil)
	})
	wantPanic(t, "another number of events", func() {
		st := fresh()
		st.Reset(0, y)
		_, _ = integrator.Solve(st, 1, nil, nil)
		_, _ = integrator.Solve(st, 2, make([]integrator.EventSpec, 1), nil)
	})
}
