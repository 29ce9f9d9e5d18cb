package frame_test

import (
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/integrator"
	"offplumb/sim/frame"
)

// spinning is the motion of a body under no force in the habitat: it is
// accelerated by what apparent gives, and by nothing else.
type spinning struct {
	motion   frame.Motion
	apparent func(frame.Apparent) r3.Vec
}

func (s *spinning) Dim() int { return 6 }

func (s *spinning) Deriv(t float64, y, dy []float64) {
	a := s.motion.At(t)
	at := unpack(y)
	pack(dy, frame.State{Pos: at.Vel, Vel: s.apparent(a.Apparent(at))})
}

func pack(y []float64, s frame.State) {
	y[0], y[1], y[2], y[3], y[4], y[5] = s.Pos.X, s.Pos.Y, s.Pos.Z, s.Vel.X, s.Vel.Y, s.Vel.Z
}

func unpack(y []float64) frame.State {
	return frame.State{Pos: r3.Vec{X: y[0], Y: y[1], Z: y[2]}, Vel: r3.Vec{X: y[3], Y: y[4], Z: y[5]}}
}

// The flights: how long (s), how far they start from the axis (m), and how
// fast (m/s), all at most; and the tolerance of each step.
const (
	flightTime  = 12.0
	flightReach = 20.0
	flightSpeed = 4.0
	flightTol   = 1e-12
)

// flown integrates a flight in the habitat frame and gives where it ends, and
// after how many steps.
func flown(t *testing.T, m frame.Motion, apparent func(frame.Apparent) r3.Vec, from float64, start frame.State) (end frame.State, steps int) {
	t.Helper()
	tol := integrator.Tol{Rel: flightTol, Abs: []float64{flightTol, flightTol}, Groups: []int{3, 3}}
	st, err := integrator.NewStepper(integrator.DormandPrince54(), &spinning{m, apparent}, tol)
	if err != nil {
		t.Fatal(err)
	}
	y := make([]float64, 6)
	pack(y, start)
	st.Reset(from, y)
	res, err := integrator.Solve(st, from+flightTime, nil, nil)
	if err != nil {
		t.Fatal(err)
	}
	return unpack(res.Y), res.Accepted
}

// flights gives the farthest that a flight integrated in the habitat ends from
// the straight line of the inertial frame, m, and a bound on it: each step may
// be off by the tolerance times the largest state, in position and in
// velocity (m, and m/s with that of the frame), and what is off goes straight
// on from there, for the time of the flight.
func flights(t *testing.T, rng int, m frame.Motion, apparent func(frame.Apparent) r3.Vec) (worst, bound float64) {
	t.Helper()
	r := random(t, uint64(rng))
	for range 10 {
		from := 5 * r.Float64()
		l := straight{vec(r, flightReach/2), vec(r, flightSpeed/2)}
		// So that the line begins where it was meant to at that time.
		l.start = r3.Sub(l.start, r3.Scale(from, l.vel))
		a, b := m.At(from), m.At(from+flightTime)
		end, steps := flown(t, m, apparent, from, a.ToHabitat(l.at(from)))
		want := b.ToHabitat(l.at(from + flightTime))
		worst = max(worst, off(end.Pos, want.Pos))
		reach := flightReach + flightTime*flightSpeed
		bound = max(bound, float64(steps)*2*flightTol*(reach+(flightSpeed+rate*reach)*flightTime))
	}
	return worst, bound
}

// TestFlightIsStraight integrates free flight in the habitat with the apparent
// accelerations: it equals the straight line of the inertial frame.
func TestFlightIsStraight(t *testing.T) {
	for i, m := range motions() {
		t.Run(m.name, func(t *testing.T) {
			worst, bound := flights(t, 100+i, m, frame.Apparent.Sum)
			if worst > bound {
				t.Errorf("ends %g m from the straight line, bound %g m", worst, bound)
			}
		})
	}
}

// wrongBy is how far off (m) a flight with a wrong acceleration is bound to
// end: a small part of what the accelerations do in the time of a flight, and
// far beyond the bound of the right one.
const wrongBy = 0.1

// TestFlightTellsWrong tries that a wrong sign of any of the accelerations, or
// one left out, shows in the flights above.
func TestFlightTellsWrong(t *testing.T) {
	coriolis := func(by float64) func(frame.Apparent) r3.Vec {
		return func(p frame.Apparent) r3.Vec { return r3.Add(p.Sum(), r3.Scale(by, p.Coriolis)) }
	}
	centrifugal := func(by float64) func(frame.Apparent) r3.Vec {
		return func(p frame.Apparent) r3.Vec { return r3.Add(p.Sum(), r3.Scale(by, p.Centrifugal)) }
	}
	euler := func(by float64) func(frame.Apparent) r3.Vec {
		return func(p frame.Apparent) r3.Vec { return r3.Add(p.Sum(), r3.Scale(by, p.Euler)) }
	}
	for _, c := range []struct {
		name     string
		m        frame.Motion
		apparent func(frame.Apparent) r3.Vec
	}{
		{"Coriolis turned round", frame.Steady{Spin: 0.7}, coriolis(-2)},
		{"Coriolis turned round, negative spin", frame.Steady{Spin: -1.1}, coriolis(-2)},
		{"Coriolis turned round, wobble", newWobble(), coriolis(-2)},
		{"no Coriolis", frame.Steady{Spin: 0.7}, coriolis(-1)},
		{"half of Coriolis", frame.Steady{Spin: 0.7}, coriolis(-0.5)},
		{"centrifugal turned round", frame.Steady{Spin: 0.7}, centrifugal(-2)},
		{"Euler turned round", newWobble(), euler(-2)},
		{"no Euler", newWobble(), euler(-1)},
	} {
		worst, bound := flights(t, 110, c.m, c.apparent)
		if worst < wrongBy || bound > wrongBy/100 {
			t.Errorf("%s: ends %g m from the straight line, the right one within %g m", c.name, worst, bound)
		}
	}
}
