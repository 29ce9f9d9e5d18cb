package study_test

import (
	"context"
	"math"
	"testing"

	"offplumb/sim/measure"
	"offplumb/sim/model"
	"offplumb/sim/study"
)

const rpm = 2 * math.Pi / 60

// hall is an empty habitat with a throw study; in says more of it.
func hall(t testing.TB, in model.Model, throw model.ThrowTo) *study.Prepared {
	t.Helper()
	if in.Solver == (model.Solver{}) {
		in.Solver = model.Solver{RelTol: 1e-9, PosTol: 1e-12, VelTol: 1e-12, MaxTime: 3600}
	}
	in.Output = model.Output{Step: 0.01}
	throw.Name = "t"
	in.Throws = []model.ThrowTo{throw}
	m, problems := model.New(in)
	if problems != nil {
		t.Fatal(problems)
	}
	p, problems := study.Prepare(m)
	if problems != nil {
		t.Fatal(problems)
	}
	return p
}

func solved(t testing.TB, p *study.Prepared) *study.Throws {
	t.Helper()
	out, err := p.ThrowTo(context.Background(), &p.Model.Throws[0], study.Options{Workers: 2})
	if err != nil {
		t.Fatal(err)
	}
	return out
}

// TestHalfTurnCatch is the throw of a university problem set on rotating frames
// (author unnamed; statement read, answer derived): a platform 60 m across at
// 1 rpm, a ball thrown along a diameter, caught half a turn later by who threw
// it: 2.000 m/s outside, (-2, -pi) m/s for the thrower, 3.724 m/s.
func TestHalfTurnCatch(t *testing.T) {
	in := model.Model{Habitat: model.Habitat{Room: model.Room{FloorRadius: 30}, Spin: rpm}}
	ends := model.Station{Height: 0}
	for _, throw := range []model.ThrowTo{
		{From: ends, Target: model.Target{Station: ends}, Time: 30},
		{From: ends, Target: model.Target{Station: ends}, Speed: math.Hypot(2, math.Pi)},
	} {
		found := 0
		for _, s := range solved(t, hall(t, in, throw)).Aims[0].Throws {
			if math.Abs(s.Time-30) > 1e-9*30 {
				continue
			}
			found++
			// Up is inward, from spinward zero: -x; spinward is y.
			if math.Abs(s.V[2]-2) > 1e-9 || math.Abs(s.V[0]+math.Pi) > 1e-9 || math.Abs(s.Speed-3.724) > 0.5e-3 || s.Outcome != measure.ThrowArrives {
				t.Errorf("time %g, speed %g: %+v", throw.Time, throw.Speed, s.Throw)
			}
		}
		if found != 1 {
			t.Errorf("time %g, speed %g: found %d times", throw.Time, throw.Speed, found)
		}
	}
}

// TestThrowInHugeHabitat: in a habitat of thousands of km a throw over a few
// metres is solved as well as in a small one: it is the parabola of the
// schoolbook, under a gravity of omega^2 R.
func TestThrowInHugeHabitat(t *testing.T) {
	const r, far, speed, gravity = 2.3e6, 3.0, 3.0, 2.5
	spin := math.Sqrt(gravity / r)
	in := model.Model{Habitat: model.Habitat{Room: model.Room{FloorRadius: r}, Spin: spin}}
	out := solved(t, hall(t, in, model.ThrowTo{From: model.Station{Height: 1}, Speed: speed, Longest: 60,
		Target: model.Target{Station: model.Station{Height: 1, Spinward: model.Arc{Value: far}}}}))
	if out.Slack > 1e-5 || len(out.Aims[0].Throws) != 2 {
		t.Fatalf("%d throws, slack %g m", len(out.Aims[0].Throws), out.Slack)
	}
	low := math.Asin(gravity*far/speed/speed) / 2
	for i, s := range out.Aims[0].Throws {
		want := [2]float64{low, math.Pi/2 - low}[i]
		// The Coriolis acceleration is 2 omega v, 0.3 % of the gravity.
		if math.Abs(s.Elevation-want) > 0.01 || s.Outcome != measure.ThrowArrives {
			t.Errorf("throw %d: %g rad up, the parabola's is %g; %s", i, s.Elevation, want, s.Outcome)
		}
	}
}
