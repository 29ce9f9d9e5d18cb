package crew_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/crew"
	"offplumb/sim/frame"
	"offplumb/sim/model"
)

// journey draws a path of legs of all kinds: with rides, pitched ladders,
// turns, sitting, a load in the hands, all of it at some time of the habitat.
type journey struct {
	r, spin float64
	legs    []model.Leg
	carry   model.Carry
	begin   float64
	low     float64 // m, by which the person sits lower
}

func newJourney(rng *rand.Rand) *journey {
	j := &journey{r: between(rng, leastRing, mostRing), spin: between(rng, -mostSpin, mostSpin), begin: between(rng, 0, 50)}
	if rng.IntN(3) > 0 {
		j.carry = model.Carry{Mass: between(rng, 1, 30), At: model.Reach{Spinward: between(rng, -0.6, 0.6), Axial: between(rng, -0.6, 0.6), Height: between(rng, 0.3, 1.6)}}
	}
	for range 3 + rng.IntN(4) {
		j.some(rng)
	}
	return j
}

// moving adds a leg with a speed, smooth or steady at its ends.
func (j *journey) moving(rng *rand.Rand, l model.Leg) {
	l.Speed, l.Ramp, l.Trapezoid = between(rng, 0.2, mostSpeed), between(rng, leastRamp, 1), rng.IntN(2) == 0
	j.legs = append(j.legs, l)
}

// some adds a leg, or a way there and back.
func (j *journey) some(rng *rand.Rand) {
	switch rng.IntN(7) {
	case 0:
		z := between(rng, -6, 6)
		j.moving(rng, model.Leg{Kind: model.Walk, Laps: between(rng, -0.2, 0.2), Axial: &z})
	case 1:
		j.ladder(rng)
	case 2:
		up := between(rng, 0.1, 5)
		j.moving(rng, model.Leg{Kind: model.Ride, Up: up})
		j.moving(rng, model.Leg{Kind: model.Ride, Round: &model.Arc{Value: between(rng, -2, 2), IsAngle: true}})
		j.moving(rng, model.Leg{Kind: model.Ride, Up: -up})
	case 3:
		j.legs = append(j.legs, model.Leg{Kind: model.Turn, Angle: between(rng, -3, 3), Duration: between(rng, 0.5, 2)},
			model.Leg{Kind: model.TurnHead, Angle: between(rng, -2, 2), Duration: between(rng, 0.5, 2), About: model.Axis(rng.IntN(3))})
	case 4:
		j.sit(rng, between(rng, 0.05, 0.7))
	case 5:
		j.legs = append(j.legs, model.Leg{Kind: model.Stand, Duration: between(rng, 0.1, 1)})
	default:
		j.ladder(rng)
	}
}

// ladder goes up and down again, on a radial or a pitched ladder, or two.
func (j *journey) ladder(rng *rand.Rand) {
	l := model.Leg{Kind: model.Climb, Distance: between(rng, 0.1, 4), Facing: model.Direction(rng.IntN(4))}
	if rng.IntN(2) == 0 {
		l.Pitch = between(rng, 0.2, 1.5)
	}
	j.moving(rng, l)
	if l.Pitch > 0 && l.Facing <= model.Antispinward {
		// The way back, by a lift, is as far as the ladder is high there.
		high := l.Distance * math.Sin(l.Pitch)
		side := l.Distance * math.Cos(l.Pitch)
		j.moving(rng, model.Leg{Kind: model.Ride, Up: math.Hypot(j.r-high, side) - j.r})
		return
	}
	if l.Pitch > 0 {
		j.moving(rng, model.Leg{Kind: model.Ride, Up: -l.Distance * math.Sin(l.Pitch)})
		return
	}
	l.Kind = model.Descend
	j.moving(rng, l)
}

// sit sinks down and, perhaps later, rises.
func (j *journey) sit(rng *rand.Rand, by float64) {
	kind := model.SitDown
	if j.low > 0 {
		kind, by, j.low = model.StandUp, j.low, 0
	} else {
		j.low = by
	}
	j.moving(rng, model.Leg{Kind: kind, Distance: by})
}

// plan works the journey out; the ring has no end and no ceiling.
func (j *journey) plan(t *testing.T) (*model.Model, *crew.Plan) {
	t.Helper()
	who := rigger()
	in := model.Model{
		Habitat: model.Habitat{Room: model.Room{FloorRadius: j.r}, Spin: j.spin},
		Crews:   []model.Crew{who},
		Paths:   []model.Path{{Name: "path", Crew: who.Name, Legs: j.legs, Carry: j.carry, Time: j.begin}},
	}
	m, problems := model.New(in)
	if len(problems) > 0 {
		t.Fatalf("%+v", problems)
	}
	p, problems := crew.NewPlan(m, &m.Paths[0])
	if len(problems) > 0 {
		t.Fatalf("%+v: %+v", j.legs, problems)
	}
	return m, p
}

// eachMoment tries some instants of some journeys, not nearer to a joint than
// a differencing step.
func eachMoment(t *testing.T, rng *rand.Rand, test func(m *model.Model, p *crew.Plan, at float64)) {
	for range 40 {
		m, p := newJourney(rng).plan(t)
		for range 40 {
			at := between(rng, diffStep, p.Duration()-diffStep)
			if !nearKink(p, at) {
				test(m, p, at)
			}
		}
	}
}

// nearKink says whether an acceleration may jump within a differencing step of
// an instant: where a steady ramp begins or ends.
func nearKink(p *crew.Plan, at float64) bool {
	joints := p.Joints()
	for i := range p.Legs() {
		ramp := p.Path.Legs[i].Ramp
		if span := joints[i+1] - joints[i]; ramp > span/2 {
			ramp = span / 2
		}
		for _, k := range []float64{joints[i], joints[i] + ramp, joints[i+1] - ramp, joints[i+1]} {
			if math.Abs(at-k) < 2*diffStep {
				return true
			}
		}
	}
	return false
}

// accel is the inertial acceleration, m/s^2 in habitat components, of a point
// of the body, from differences of its inertial velocity, which is tried above.
func accel(m *model.Model, p *crew.Plan, at float64, point func(*crew.Feet) crew.Point) r3.Vec {
	vel := func(time float64) r3.Vec {
		f := p.At(time)
		s := point(&f)
		a := m.Motion.At(p.Path.Time + time)
		return a.ToInertial(s.State).Vel
	}
	a := m.Motion.At(p.Path.Time + at)
	return a.In(r3.Scale(0.5/diffStep, r3.Sub(vel(at+diffStep), vel(at-diffStep))))
}

// TestVelocityOfJourneys tries the velocity of points of the body, in the
// inertial frame, against differences of their places there.
func TestVelocityOfJourneys(t *testing.T) {
	rng := random(t, 20)
	eachMoment(t, rng, func(m *model.Model, p *crew.Plan, at float64) {
		for _, h := range []float64{0, 0.98, 1.65} {
			state := func(time float64) frame.State {
				f := p.At(time)
				a := m.Motion.At(p.Path.Time + time)
				return a.ToInertial(f.Body(h).State)
			}
			v := r3.Scale(0.5/diffStep, r3.Sub(state(at+diffStep).Pos, state(at-diffStep).Pos))
			if got := state(at).Vel; off(got, v) > slope {
				t.Fatalf("%s, after %g s, %g m up: velocity %v, the place changes by %v", p.LegName(p.At(at).Leg), at, h, got, v)
			}
		}
	})
}

// TestLoadsOfJourneys tries all loads against the inertial accelerations of
// waist, head, feet and load, whatever the legs: the structure gives each mass
// its acceleration, and is pushed back.
func TestLoadsOfJourneys(t *testing.T) {
	rng := random(t, 21)
	eachMoment(t, rng, func(m *model.Model, p *crew.Plan, at float64) {
		l := p.Loads(m, at)
		body := func(share float64) r3.Vec {
			return accel(m, p, at, func(f *crew.Feet) crew.Point { return f.Body(share * p.Crew.Stature) })
		}
		feet := accel(m, p, at, func(f *crew.Feet) crew.Point { return f.Point(model.Reach{}) })
		held := accel(m, p, at, func(f *crew.Feet) crew.Point { return f.Point(p.Path.Carry.At) })
		waist, head, load := body(p.Crew.Waist), body(p.Crew.Head), p.Path.Carry.Mass
		force := r3.Scale(-1, r3.Add(r3.Scale(p.Crew.Mass, waist), r3.Scale(load, held)))
		spinward, axial, up := frame.LocalAt(l.Feet.Phi).Split(force)
		tol := (p.Crew.Mass + load) * slope
		for _, c := range []struct {
			name           string
			got, want, tol float64
		}{
			{"spinward side load", l.SideSpinward, spinward, tol},
			{"axial side load", l.SideAxial, axial, tol},
			{"weight", l.Weight, -up, tol},
			{"gravity at the feet", l.GravityFeet, r3.Norm(feet), slope},
			{"gravity at the waist", l.GravityWaist, r3.Norm(waist), slope},
			{"gravity at the head", l.GravityHead, r3.Norm(head), slope},
			{"difference of gravity", l.GravityDifference, r3.Norm(feet) - r3.Norm(head), 2 * slope},
		} {
			if math.Abs(c.got-c.want) > c.tol {
				t.Fatalf("%s, after %g s: %s %g, want %g", p.LegName(l.Feet.Leg), at, c.name, c.got, c.want)
			}
		}
		if load == 0 {
			if !math.IsNaN(l.GravityCarried) || !math.IsNaN(l.ForceCarried) {
				t.Fatalf("nothing is carried, and weighs %g N under %g m/s^2", l.ForceCarried, l.GravityCarried)
			}
			return
		}
		if math.Abs(l.GravityCarried-r3.Norm(held)) > slope || math.Abs(l.ForceCarried-load*r3.Norm(held)) > load*slope {
			t.Fatalf("after %g s the load feels %g m/s^2 and weighs %g N, want %g and %g", at, l.GravityCarried, l.ForceCarried, r3.Norm(held), load*r3.Norm(held))
		}
	})
}

// TestJourneysJoin tries that over each joint the place of the feet, waist,
// head and load does not jump, and that all stand still there.
func TestJourneysJoin(t *testing.T) {
	rng := random(t, 22)
	for range 60 {
		m, p := newJourney(rng).plan(t)
		joints := p.Joints()
		if len(joints) != p.Legs()+1 {
			t.Fatalf("%d joints of %d legs", len(joints), p.Legs())
		}
		for i, at := range joints {
			for _, h := range []float64{0, p.Crew.Waist * p.Crew.Stature, p.Crew.Head * p.Crew.Stature} {
				before, after := p.At(at), p.At(math.Nextafter(at, math.Inf(1)))
				a, b := before.Body(h), after.Body(h)
				// A leg's end is rounded some times, and a rounding of time moves nothing yet.
				if off(a.Pos, b.Pos) > 64*epsilon*mostRing {
					t.Fatalf("joint %d at %g s, after %+v: a point %g m up jumps by %g m", i, at, p.Path.Legs[max(0, i-1)], h, off(a.Pos, b.Pos))
				}
				if v := r3.Norm(a.Vel) + r3.Norm(b.Vel); v > 1e-12 {
					t.Fatalf("joint %d at %g s: a point %g m up moves at %g m/s", i, at, h, v)
				}
			}
			// A steady ramp begins with an acceleration: after a rounding of time
			// the speed is nothing yet.
			if l := p.Loads(m, at); l.SpeedWaist > 1e-12 || math.Abs(l.Power) > 1e-9 {
				t.Fatalf("joint %d: speed %g m/s, power %g W", i, l.SpeedWaist, l.Power)
			}
		}
	}
}

// TestAlongAddsUp tries that the way along the path never falls, is that of
// its legs at their joints, and that TimeAlong gives the first time of a way.
func TestAlongAddsUp(t *testing.T) {
	rng := random(t, 23)
	for range 30 {
		_, p := newJourney(rng).plan(t)
		last := 0.0
		for k := 0.0; k <= 200; k++ {
			way := p.At(p.Duration() * k / 200).Along
			if way < last {
				t.Fatalf("the way falls from %g m to %g m", last, way)
			}
			last = way
		}
		if math.Abs(last-p.Length()) > 64*epsilon*p.Length() {
			t.Fatalf("the path goes %.17g m, is %.17g m long", last, p.Length())
		}
		for range 20 {
			way := between(rng, 0, p.Length())
			at := p.TimeAlong(way)
			if got := p.At(at).Along; got < way || got > way+mostSpeed*1e-9+64*epsilon*p.Length() {
				t.Fatalf("%.17g m along at %g s, which is %.17g m along", way, at, got)
			}
			if before := p.At(at * (1 - 1e-12)).Along; before > way {
				t.Fatalf("%.17g m along at %g s, and already before", way, at)
			}
		}
		if p.TimeAlong(0) != 0 || p.TimeAlong(-1) != 0 {
			t.Fatalf("no way takes %g s", p.TimeAlong(0))
		}
	}
}
