package crew_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/crew"
	"offplumb/sim/frame"
	"offplumb/sim/model"
)

// unsteady makes a person's path in a ring whose spin changes and cones.
func unsteady(t *testing.T, changes []frame.Change, coning frame.Coning, legs ...model.Leg) (*model.Model, *crew.Plan) {
	t.Helper()
	in := model.Model{
		Habitat: model.Habitat{Room: model.Room{FloorRadius: 16}, Spin: 0.3, Changes: changes, Coning: coning},
		Crews:   []model.Crew{rigger()},
		Paths:   []model.Path{{Name: "path", Crew: "rigger", Time: 1, Legs: legs}},
	}
	m, problems := model.New(in)
	if len(problems) > 0 {
		t.Fatal(problems)
	}
	p, problems := crew.NewPlan(m, &m.Paths[0])
	if len(problems) > 0 {
		t.Fatal(problems)
	}
	return m, p
}

// TestSupportInUnsteadyTurning holds the specific force at the waist, in a
// spin-up and in a coning, to Newton's law from outside: it is the second
// derivative of the waist's inertial place, differenced twice.
func TestSupportInUnsteadyTurning(t *testing.T) {
	up := []frame.Change{{Start: 2, Over: 9, To: 0.8}}
	down := []frame.Change{{Start: 2, Over: 6, To: -0.2, Linear: true}}
	cone := frame.Coning{HalfAngle: 0.2, Period: 9, Phase: 1}
	for i, c := range []struct {
		changes []frame.Change
		coning  frame.Coning
	}{{up, frame.Coning{}}, {nil, cone}, {down, cone}} {
		m, p := unsteady(t, c.changes, c.coning, walk(6, 1.3, 0.8, false), model.Leg{Kind: model.Climb, Distance: 2, Speed: 0.5, Ramp: 0.5})
		reach := model.Reach{Height: model.WaistShare * 1.78}
		for _, at := range []float64{0.37, 1.9, 2.6, 4.1, 6.3, 7.4} {
			const h = 2e-4
			before, _ := p.State(m, at-h, reach)
			now, _ := p.State(m, at, reach)
			after, _ := p.State(m, at+h, reach)
			want := r3.Scale(1/(h*h), r3.Add(r3.Sub(after, now), r3.Sub(before, now)))
			a := m.Motion.At(p.Path.Time + at)
			f := p.At(at)
			// h^2/12 of the fourth derivative, some tens of m/s^4, and three
			// roundings of 4e-15 m over h^2.
			if got := a.Out(crew.Support(&a, f.Point(reach))); off(got, want) > 1e-6 {
				t.Errorf("case %d, %g s: %v m/s^2, by differences %v", i, at, got, want)
			}
		}
	}
}

// TestSpinUpPushesBack tries who stands through a linear spin-up: pressed
// antispinward by the Euler force m q domega/dt; in a spin-down spinward, and
// with negative spin the other way.
func TestSpinUpPushesBack(t *testing.T) {
	for _, to := range []float64{0.9, 0, -0.9} {
		m, p := unsteady(t, []frame.Change{{Start: 0, Over: 12, To: to, Linear: true}}, frame.Coning{}, model.Leg{Kind: model.Stand, Duration: 8})
		for _, at := range []float64{0, 3, 8} {
			l, q, grows := p.Loads(m, at), waistRadius(16), (to-0.3)/12
			spin := 0.3 + grows*(1+at)
			if math.Abs(l.SideSpinward+84*q*grows) > some*84*q || math.Abs(l.Euler-q*math.Abs(grows)) > some*q || math.Abs(l.Weight-84*q*spin*spin) > some*84*q {
				t.Errorf("to %g rad/s, %g s: side %g N, Euler %g m/s^2, weight %g N", to, at, l.SideSpinward, l.Euler, l.Weight)
			}
		}
	}
}

// TestTiltInConing holds the swing of the plumb line in a coning to its closed
// form: of a point at r outward at the angle phi the axial pull is -p sin r (s + q)
// cos(c), q = s - p cos, c = phase - q t - phi (Euler's equations of kinematics for a
// steady precession; derived in sim/flight too).
func TestTiltInConing(t *testing.T) {
	k := frame.Coning{HalfAngle: 0.05, Period: -14, Phase: 2}
	m, p := unsteady(t, nil, k, model.Leg{Kind: model.Stand, Duration: 30})
	rate := 2 * math.Pi / k.Period
	side, q, r := rate*math.Sin(k.HalfAngle), 0.3-rate*math.Cos(k.HalfAngle), waistRadius(16)
	most := 0.0
	for at := 0.0; at < 30; at += 1.7 {
		l := p.Loads(m, at)
		sin, cos := math.Sincos(k.Phase - q*(1+at))
		axial, spinward, weight := -side*r*(0.3+q)*cos, -side*side*r*cos*sin, r*(0.09+side*side*sin*sin)
		_ = spinward
		if math.Abs(l.SideAxial-84*axial) > 1e-11 || math.Abs(l.Weight-84*weight) > 1e-11 || math.Abs(math.Abs(l.SideSpinward)-84*math.Abs(spinward)) > 1e-11 {
			t.Errorf("%g s: axial %g N, weight %g N, spinward %g N; want %g, %g, %g", at, l.SideAxial, l.Weight, l.SideSpinward, 84*axial, 84*weight, 84*spinward)
		}
		if want := math.Atan2(axial, weight); math.Abs(l.TiltAxial-want) > 1e-13 {
			t.Errorf("%g s: tilt %g, want %g", at, l.TiltAxial, want)
		}
		most = math.Max(most, math.Abs(l.TiltAxial))
	}
	if most < 0.2 {
		t.Errorf("the tilt reaches %g rad only", most)
	}
}
