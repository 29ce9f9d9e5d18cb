package integrator_test

import (
	"math"
	"testing"

	"offplumb/integrator"
)

// BenchmarkStep is one step of a free flight in six dimensions.
func BenchmarkStep(b *testing.B) {
	for _, c := range []struct {
		name string
		tol  integrator.Tol
	}{
		{"groups", afloatTol},
		{"components", integrator.Tol{Rel: afloatTol.Rel, Abs: []float64{1e-9}}},
	} {
		b.Run(c.name, func(b *testing.B) {
			st := newStepper(b, afloat(), c.tol)
			st.Reset(0, afloatStart, integrator.MaxSteps(math.MaxInt32), integrator.MaxStep(1))
			b.ReportAllocs()
			for b.Loop() {
				if _, err := st.Step(math.Inf(1)); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}

// BenchmarkSolve is a flight to the hull, with the contact sought by a bounded
// event or without it.
func BenchmarkSolve(b *testing.B) {
	for _, c := range []struct {
		name   string
		events []integrator.EventSpec
	}{
		{"bounded", []integrator.EventSpec{{Event: &hull{60}, Slop: 1e-9, Terminal: true}}},
		{"without", nil},
	} {
		b.Run(c.name, func(b *testing.B) {
			st := newStepper(b, afloat(), afloatTol)
			st.Reset(0, afloatStart)
			end := mustSolve(b, st, 1000, []integrator.EventSpec{{Event: &hull{60}, Terminal: true}}, nil)
			if !end.Stopped {
				b.Fatal("never meets the hull")
			}
			tEnd := end.T
			if c.events != nil {
				tEnd *= 1.5
			}
			b.ReportAllocs()
			for b.Loop() {
				st.Reset(0, afloatStart)
				if _, err := integrator.Solve(st, tEnd, c.events, nil); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}

// BenchmarkDense is one sample of a step, and one bound.
func BenchmarkDense(b *testing.B) {
	st := newStepper(b, afloat(), afloatTol)
	st.Reset(0, afloatStart)
	s, err := st.Step(math.Inf(1))
	if err != nil {
		b.Fatal(err)
	}
	mid, y := (s.T0+s.T1)/2, make([]float64, 6)
	b.Run("At", func(b *testing.B) {
		for b.Loop() {
			s.At(mid, y)
		}
	})
	b.Run("MaxAccel", func(b *testing.B) {
		for b.Loop() {
			_ = s.MaxAccel(0, 3)
		}
	})
}
