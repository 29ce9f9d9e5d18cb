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

// The bounds of the legs drawn at random below.
const (
	leastRing = 8.0  // m
	mostRing  = 40.0 // m
	mostSpin  = 0.6  // rad/s
	mostSpeed = 1.6  // m/s
	leastRamp = 0.4  // s
)

// wander draws a path: walks with a climb up and down between them, and where
// it ends.
type wander struct {
	r, spin float64
	legs    []model.Leg
	end     frame.Polar
}

func newWander(rng *rand.Rand) *wander {
	w := &wander{r: between(rng, leastRing, mostRing), spin: between(rng, -mostSpin, mostSpin)}
	w.end.R = w.r
	for range 2 + rng.IntN(3) {
		w.walk(rng)
		if rng.IntN(2) == 0 {
			w.ladder(rng)
		}
	}
	return w
}

func (w *wander) add(rng *rand.Rand, l model.Leg) {
	l.Speed, l.Ramp = between(rng, 0.2, mostSpeed), between(rng, leastRamp, 1)
	w.legs = append(w.legs, l)
}

// walk goes somewhere on the floor, by an arc, an angle or laps, aslant or not.
func (w *wander) walk(rng *rand.Rand) {
	l := model.Leg{Kind: model.Walk}
	switch rng.IntN(3) {
	case 0:
		l.Laps = between(rng, -1.5, 1.5)
		w.end.Phi += 2 * math.Pi * l.Laps
	case 1:
		l.Spinward = &model.Arc{Value: between(rng, -30, 30)}
		w.end.Phi = l.Spinward.Value / w.r
	default:
		l.Spinward = &model.Arc{Value: between(rng, -4, 4), IsAngle: true}
		w.end.Phi = l.Spinward.Value
	}
	if rng.IntN(2) == 0 {
		z := between(rng, -6, 6)
		l.Axial, w.end.Z = &z, z
	}
	w.add(rng, l)
}

// ladder goes up and, after a look round, down again.
func (w *wander) ladder(rng *rand.Rand) {
	h := between(rng, 0.05, 5) // the lowest ones are shorter than their ramps
	w.add(rng, model.Leg{Kind: model.Climb, Distance: h})
	w.add(rng, model.Leg{Kind: model.Stand, Duration: between(rng, 0.1, 2)})
	w.add(rng, model.Leg{Kind: model.TurnHead, Angle: between(rng, -2, 2), Duration: between(rng, 0.3, 1), About: model.Axis(rng.IntN(3))})
	w.add(rng, model.Leg{Kind: model.Descend, Distance: h})
}

func (w *wander) plan(t *testing.T) (*model.Model, *crew.Plan) {
	return plan(t, w.r, w.spin, rigger(), model.Station{}, w.legs...)
}

// TestPathsJoin tries that the feet begin at rest at the start, end at rest
// where the last leg leads, and have the same place at both sides of each
// joint, at rest.
func TestPathsJoin(t *testing.T) {
	rng := random(t, 1)
	for range 30 {
		w := newWander(rng)
		_, p := w.plan(t)
		joints := p.Joints()
		if len(joints) != len(w.legs)+1 || p.Legs() != len(w.legs) {
			t.Fatalf("%d joints and %d legs of %d legs", len(joints), p.Legs(), len(w.legs))
		}
		for i, at := range joints {
			before, after := p.At(at), p.At(math.Nextafter(at, math.Inf(1)))
			// After a rounding of time the rise of a ramp is nothing yet.
			if gap := apart(before, after); gap > 16*epsilon*w.r {
				t.Fatalf("joint %d at %g s: the feet jump by %g m", i, at, gap)
			}
			if v := speed(before) + speed(after); v > 1e-12 {
				t.Fatalf("joint %d at %g s: the feet move at %g m/s", i, at, v)
			}
		}
		end := p.At(p.Duration())
		if gap := apart(end, crew.Feet{R: w.end.R, Phi: w.end.Phi, Z: w.end.Z}); gap > 256*epsilon*w.r {
			t.Fatalf("the path ends at %g m, %g rad, %g m, want %+v", end.R, end.Phi, end.Z, w.end)
		}
	}
}

func apart(a, b crew.Feet) float64 {
	return math.Hypot(math.Hypot(a.R-b.R, a.R*(a.Phi-b.Phi)), a.Z-b.Z)
}

func speed(f crew.Feet) float64 { return math.Hypot(math.Hypot(f.VR, f.R*f.VPhi), f.VZ) }

// diffStep (s) is the step of the central differences below. jerk bounds how
// fast an acceleration changes, m/s^3: within a ramp by 6 speed/ramp^2, by the
// turning of the habitat and of the path, at up to 0.8 rad/s, by two or three
// times the speed or the acceleration seen. A central difference averages over
// the step, so that the change within it bounds the error, kinks included.
const (
	diffStep = 1e-6
	jerk     = 6*mostSpeed/(leastRamp*leastRamp) + 40
	slope    = jerk*diffStep + 64*epsilon*mostRing/diffStep
)

// TestMotionIsDerivative tries velocity and acceleration of a point of the
// body against differences of its place and its velocity.
func TestMotionIsDerivative(t *testing.T) {
	rng := random(t, 2)
	eachInstant(t, rng, func(m *model.Model, p *crew.Plan, at float64, reach model.Reach) {
		point := func(time float64) crew.Point { f := p.At(time); return f.Point(reach) }
		now, back, ahead := point(at), point(at-diffStep), point(at+diffStep)
		if v := r3.Scale(0.5/diffStep, r3.Sub(ahead.Pos, back.Pos)); off(v, now.Vel) > slope {
			t.Fatalf("after %g s velocity %v m/s, the place changes by %v", at, now.Vel, v)
		}
		if a := r3.Scale(0.5/diffStep, r3.Sub(ahead.Vel, back.Vel)); off(a, now.Acc) > slope {
			t.Fatalf("after %g s acceleration %v m/s^2, the velocity changes by %v", at, now.Acc, a)
		}
	})
}

// TestPointOfAnyMotion tries the same for feet that rise, go round and go along
// at once, faster and faster, which no leg does.
func TestPointOfAnyMotion(t *testing.T) {
	rng := random(t, 6)
	for range 200 {
		r, phi, z := newCubic(rng, 10), newCubic(rng, 1), newCubic(rng, 4)
		reach := model.Reach{Spinward: between(rng, -1, 1), Axial: between(rng, -1, 1), Height: between(rng, -1, 14)}
		point := func(time float64) crew.Point {
			f := crew.Feet{}
			f.R, f.VR, f.AR = r.at(time)
			f.Phi, f.VPhi, f.APhi = phi.at(time)
			f.Z, f.VZ, f.AZ = z.at(time)
			return f.Point(reach)
		}
		at := between(rng, -1, 1)
		now, back, ahead := point(at), point(at-cubicStep), point(at+cubicStep)
		if v := r3.Scale(0.5/cubicStep, r3.Sub(ahead.Pos, back.Pos)); off(v, now.Vel) > cubicSlack {
			t.Fatalf("velocity %v m/s, the place changes by %v", now.Vel, v)
		}
		if a := r3.Scale(0.5/cubicStep, r3.Sub(ahead.Vel, back.Vel)); off(a, now.Acc) > cubicSlack {
			t.Fatalf("acceleration %v m/s^2, the velocity changes by %v", now.Acc, a)
		}
	}
}

// cubicStep (s) is the step of the differences of smooth motions. Their fourth
// derivatives stay below 1e5 m/s^4 (radius 40 m, rates of 6 rad/s), of which
// a sixth of the step squared counts; velocities of 300 m/s are rounded.
const (
	cubicStep  = 1e-5
	cubicSlack = 1e5*cubicStep*cubicStep/6 + 4*epsilon*300/cubicStep
)

// cubic is a smooth quantity of time.
type cubic [4]float64

func newCubic(rng *rand.Rand, size float64) cubic {
	var c cubic
	for i := range c {
		c[i] = between(rng, -size, size)
	}
	return c
}

// at gives the quantity and its first two derivatives.
func (c cubic) at(t float64) (x, v, a float64) {
	return c[0] + t*(c[1]+t*(c[2]+t*c[3])), c[1] + t*(2*c[2]+t*3*c[3]), 2*c[2] + 6*t*c[3]
}

// eachInstant tries some instants of some paths, with a reach.
func eachInstant(t *testing.T, rng *rand.Rand, test func(m *model.Model, p *crew.Plan, at float64, reach model.Reach)) {
	for range 20 {
		m, p := newWander(rng).plan(t)
		for range 40 {
			at := between(rng, diffStep, p.Duration()-diffStep)
			reach := model.Reach{Spinward: between(rng, -0.6, 0.6), Axial: between(rng, -0.6, 0.6), Height: between(rng, 0, 2)}
			test(m, p, at, reach)
		}
	}
}

// TestSupportIsInertialAcceleration tries the formula of the turning frame
// against the inertial one, where nothing but the support acts: what it gives
// is the acceleration.
func TestSupportIsInertialAcceleration(t *testing.T) {
	rng := random(t, 3)
	eachInstant(t, rng, func(m *model.Model, p *crew.Plan, at float64, reach model.Reach) {
		_, back := p.State(m, at-diffStep, reach)
		_, ahead := p.State(m, at+diffStep, reach)
		accel := r3.Scale(0.5/diffStep, r3.Sub(ahead, back))
		f := p.At(at)
		a := m.Motion.At(at)
		if got := a.Out(crew.Support(&a, f.Point(reach))); off(got, accel) > slope {
			t.Fatalf("after %g s the support gives %v m/s^2, the inertial acceleration is %v", at, got, accel)
		}
		pos, _ := p.State(m, at, reach)
		vel := r3.Scale(0.5/diffStep, r3.Sub(statePos(m, p, at+diffStep, reach), statePos(m, p, at-diffStep, reach)))
		if _, v := p.State(m, at, reach); off(v, vel) > slope {
			t.Fatalf("after %g s at %v the inertial velocity is %v, the place changes by %v", at, pos, v, vel)
		}
	})
}

func statePos(m *model.Model, p *crew.Plan, at float64, reach model.Reach) r3.Vec {
	pos, _ := p.State(m, at, reach)
	return pos
}

// TestLoadsAreReactions tries the loads against the inertial acceleration of
// the waist: the person pushes the structure with its negative, times the mass.
func TestLoadsAreReactions(t *testing.T) {
	rng := random(t, 4)
	eachInstant(t, rng, func(m *model.Model, p *crew.Plan, at float64, _ model.Reach) {
		waist := model.Reach{Height: p.Crew.Waist * p.Crew.Stature}
		_, back := p.State(m, at-diffStep, waist)
		_, ahead := p.State(m, at+diffStep, waist)
		push := r3.Scale(-0.5*p.Crew.Mass/diffStep, r3.Sub(ahead, back))
		a := m.Motion.At(at)
		l := p.Loads(m, at)
		spinward, axial, up := frame.LocalAt(l.Feet.Phi).Split(a.In(push))
		tol := p.Crew.Mass * slope
		if math.Abs(l.SideSpinward-spinward) > tol || math.Abs(l.SideAxial-axial) > tol || math.Abs(l.Weight+up) > tol {
			t.Fatalf("after %g s the loads are %g, %g and %g N, the reaction %g, %g and %g N",
				at, l.SideSpinward, l.SideAxial, l.Weight, spinward, axial, -up)
		}
		if got := l.GravityWaist * p.Crew.Mass; math.Abs(got-r3.Norm(push)) > tol {
			t.Fatalf("after %g s the waist feels %g N, the reaction is %g N", at, got, r3.Norm(push))
		}
	})
}

// TestShortLegLowersPeak tries that a leg too short for its ramps takes two of
// them, the peak speed lower, and that a long one takes the way at its speed
// and one ramp more.
func TestShortLegLowersPeak(t *testing.T) {
	for _, c := range []struct{ way, speed, ramp, total, peak float64 }{
		{0.3, 1.2, 0.5, 1, 0.6},
		{0.6, 1.2, 0.5, 1, 1.2},
		{6, 1.2, 0.5, 5.5, 1.2},
		{6, 1.2, 0, 5, 1.2},
	} {
		_, p := plan(t, 18, 0.5, rigger(), model.Station{}, model.Leg{Kind: model.Climb, Distance: c.way, Speed: c.speed, Ramp: c.ramp})
		if got := p.Duration(); math.Abs(got-c.total) > 8*epsilon*c.total {
			t.Errorf("%g m at %g m/s with ramps of %g s takes %.17g s, want %g", c.way, c.speed, c.ramp, got, c.total)
		}
		peak := 0.0
		for k := 0.0; k <= 1000; k++ {
			peak = math.Max(peak, speed(p.At(p.Duration()*k/1000)))
		}
		if math.Abs(peak-c.peak) > 32*epsilon*c.peak {
			t.Errorf("%g m at %g m/s with ramps of %g s peaks at %.17g m/s, want %g", c.way, c.speed, c.ramp, peak, c.peak)
		}
	}
}
