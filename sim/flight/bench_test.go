package flight

import (
	"math"
	"testing"

	"offplumb/integrator"
	"offplumb/sim/air"
	"offplumb/sim/model"
)

// benched is a drop of a wrench through 1.9 m in a ring of 18 m at 5.2 rpm.
func benched(tb testing.TB, a air.Air) (*Flier, *Let) {
	tb.Helper()
	m, problems := model.New(model.Model{
		Habitat:  model.Habitat{Room: model.Room{FloorRadius: 18, Length: 14}, Spin: 0.5445},
		Air:      a,
		Bodies:   []model.Body{{Name: "wrench", Mass: 1.4, Diameter: 0.06}},
		Releases: []model.Release{{Name: "drop", Body: "wrench", At: model.Station{Height: 1.9}, Until: model.Until{Kind: model.UntilLanding}}},
		Solver: model.Solver{RelTol: model.DefaultRelTol, PosTol: model.DefaultPosTol, VelTol: model.DefaultVelTol,
			MaxTime: model.DefaultMaxTime},
	})
	if len(problems) > 0 {
		tb.Fatal(problems)
	}
	let, problem := Release(m, &m.Releases[0], nil)
	if problem.Msg != "" {
		tb.Fatal(problem)
	}
	return NewFlier(m), &let
}

func room() air.Air { return air.FromPressure(air.DefaultPressure, air.DefaultTemperature) }

// underway gives the system and the stepper of a flight.
func underway(tb testing.TB) (*free, *integrator.Stepper) {
	tb.Helper()
	f, let := benched(tb, room())
	if _, err := f.Fly(let); err != nil {
		tb.Fatal(err)
	}
	return f.free, f.st
}

// BenchmarkDerivative is one evaluation of the equations, with drag.
func BenchmarkDerivative(b *testing.B) {
	sys, _ := underway(b)
	y := []float64{0.1, 0.2, 0.3, 0.4, 0.5, 0.6}
	dy := make([]float64, len(y))
	b.ReportAllocs()
	for b.Loop() {
		sys.Deriv(0.5, y, dy)
	}
}

// BenchmarkStep is one step of the integration, with drag.
func BenchmarkStep(b *testing.B) {
	_, st := underway(b)
	start := make([]float64, 6)
	st.Reset(0, start)
	b.ReportAllocs()
	for b.Loop() {
		s, err := st.Step(math.Inf(1))
		if err != nil {
			b.Fatal(err)
		}
		if s.T1 > 1 {
			st.Reset(0, start)
		}
	}
}

// BenchmarkDropVacuum is a whole drop up to its landing, without air.
func BenchmarkDropVacuum(b *testing.B) { benchmarkDrop(b, air.Air{}) }

// BenchmarkDropAir is the same with drag.
func BenchmarkDropAir(b *testing.B) { benchmarkDrop(b, room()) }

func benchmarkDrop(b *testing.B, a air.Air) {
	f, let := benched(b, a)
	b.ReportAllocs()
	for b.Loop() {
		track, err := f.Fly(let)
		if err != nil {
			b.Fatal(err)
		}
		if track.Outcome != Landed {
			b.Fatal(track.Outcome)
		}
	}
}

// TestStepAllocatesNothing tries that neither the equations nor a step of them
// allocate.
func TestStepAllocatesNothing(t *testing.T) {
	sys, st := underway(t)
	y, dy := make([]float64, 6), make([]float64, 6)
	if n := testing.AllocsPerRun(100, func() { sys.Deriv(0.5, y, dy) }); n != 0 {
		t.Errorf("the equations allocate %g times", n)
	}
	st.Reset(0, y)
	if n := testing.AllocsPerRun(100, func() {
		if _, err := st.Step(math.Inf(1)); err != nil {
			t.Fatal(err)
		}
	}); n != 0 {
		t.Errorf("a step allocates %g times", n)
	}
}
