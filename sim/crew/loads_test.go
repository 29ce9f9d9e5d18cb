package crew_test

import (
	"math"
	"testing"

	"offplumb/sim/crew"
	"offplumb/sim/model"
)

// TestFlightRotator is published check C12: on a rotator at 2.077 rad/s the
// ears, 0.5 m from the axis on one side, feel 0.22 g, and the feet, on the
// other side, 0.36 g (Benson, Guedry, Parker & Reschke, J. Vestib. Res. 7
// (1997) 453-457; seen; the radius of the feet, 0.818 m, derived).
func TestFlightRotator(t *testing.T) {
	const feet, ears = 0.818, 0.5
	who := rigger()
	who.Stature = 1.75
	who.Head = (feet + ears) / who.Stature
	m, p := plan(t, 3, 2.077, who, model.Station{HasRadius: true, Radius: feet}, model.Leg{Kind: model.Stand, Duration: 1})
	l := p.Loads(m, 0.5)
	if got := l.GravityFeet / model.StandardGravity; math.Abs(got-0.36) > 0.005 {
		t.Errorf("the feet feel %.4g g, want 0.36", got)
	}
	if got := l.GravityHead / model.StandardGravity; math.Abs(got-0.22) > 0.005 {
		t.Errorf("the ears feel %.4g g, want 0.22", got)
	}
	// The waist too has passed the axis: it presses toward the ears' side.
	if waist := feet - who.Waist*who.Stature; waist > 0 || l.Weight > 0 {
		t.Errorf("a waist at %.3g m weighs %.3g N on the deck, want both negative", waist, l.Weight)
	}
}

// middle gives the loads half way through the only leg of a path.
func middle(t *testing.T, r, spin float64, leg model.Leg) crew.Loads {
	t.Helper()
	m, p := plan(t, r, spin, rigger(), model.Station{}, leg)
	return p.Loads(m, p.Duration()/2)
}

// waistRadius is where the waist of the rigger is when the feet are at r, m.
func waistRadius(r float64) float64 { return r - model.WaistShare*1.78 }

// some bounds the roundings of a load: some sums and products of terms of its
// size.
const some = 64 * epsilon

// TestWalkingWeight tries weights against their closed form: whoever walks
// round at v turns with omega + v/R, so that the waist, at q from the axis,
// weighs m (omega R + v)^2 q/R^2, v counted spinward: heavier spinward at
// positive spin, lighter at negative spin.
func TestWalkingWeight(t *testing.T) {
	const r = 18.0
	for _, spin := range []float64{0.55, -0.55, 0.2} {
		for _, v := range []float64{1.3, -1.3, 4, -4, 0.2} {
			l := middle(t, r, spin, walk(math.Copysign(30, v), math.Abs(v), 0.5, false))
			q, rim := waistRadius(r), spin*r+v
			want := 84 * rim * rim * q / (r * r)
			// Near the rim's speed two large terms cancel: those of rest and of the walk.
			round := some * 84 * (spin*spin*r + v*v/r)
			if math.Abs(l.Weight-want) > round {
				t.Errorf("spin %g, walking at %g m/s: weight %.15g N, want %.15g", spin, v, l.Weight, want)
			}
			if math.Abs(l.GravityFeet-rim*rim/r) > round/84 {
				t.Errorf("spin %g, walking at %g m/s: %.15g m/s^2 at the feet, want %.15g", spin, v, l.GravityFeet, rim*rim/r)
			}
			if math.Abs(l.SideSpinward)+math.Abs(l.SideAxial) > round || l.FrictionDemand > round/want || math.Abs(l.TiltSpinward) > round/want {
				t.Errorf("spin %g, walking steadily at %g m/s has side loads: %+v", spin, v, l)
			}
		}
	}
}

// TestAntispinwardAtRimSpeed tries that whoever walks against the spin as fast
// as the floor weighs nothing, and that friction demand and tilt have no value
// then, though roundings leave a trace of it.
func TestAntispinwardAtRimSpeed(t *testing.T) {
	rng := random(t, 5)
	for range 15 {
		r, spin := between(rng, 5, 15), between(rng, 0.1, 0.6)*float64(1-2*rng.IntN(2))
		rim := spin * r
		l := middle(t, r, spin, walk(math.Copysign(20, -rim), math.Abs(rim), 0.5, false))
		if full := 84 * rim * rim / r; math.Abs(l.Weight) > some*full {
			t.Fatalf("R = %g m, spin %g: weight %g N of %g at rest", r, spin, l.Weight, full)
		}
		for _, x := range []float64{l.FrictionDemand, l.TiltSpinward, l.TiltAxial} {
			if !math.IsNaN(x) {
				t.Fatalf("R = %g m, spin %g: friction demand %g, tilt %g and %g, want none", r, spin, l.FrictionDemand, l.TiltSpinward, l.TiltAxial)
			}
		}
	}
}

// TestStartingToWalk tries the side load of the ramp: whoever speeds up
// spinward pushes the deck antispinward, by the mass times the waist's
// acceleration. The peak of the ramp 3u^2 - 2u^3 is 3/2 of speed by ramp.
func TestStartingToWalk(t *testing.T) {
	const r, spin, v, ramp = 18.0, 0.5, 1.2, 0.8
	m, p := plan(t, r, spin, rigger(), model.Station{}, walk(10, v, ramp, false))
	l := p.Loads(m, ramp/2)
	q, turn := waistRadius(r), spin+v/2/r
	side, weight := -84*1.5*v/ramp*q/r, 84*turn*turn*q
	if math.Abs(l.SideSpinward-side) > some*weight || math.Abs(l.Weight-weight) > some*weight {
		t.Errorf("side load %.15g N and weight %.15g N, want %.15g and %.15g", l.SideSpinward, l.Weight, side, weight)
	}
	if want := -side / weight; math.Abs(l.FrictionDemand-want) > some*want {
		t.Errorf("friction demand %.15g, want %.15g", l.FrictionDemand, want)
	}
	if want := math.Atan2(side, weight); math.Abs(l.TiltSpinward-want) > some || l.TiltAxial != 0 {
		t.Errorf("tilt %.15g rad spinward and %g axial, want %.15g and none", l.TiltSpinward, l.TiltAxial, want)
	}
}

// TestClimbingSideLoad tries the Coriolis load on a ladder: a climber is
// pressed spinward by 2 m omega v at positive spin, one who descends
// antispinward, whatever the height; the weight is that at rest there.
func TestClimbingSideLoad(t *testing.T) {
	const r, v = 18.0, 0.35
	for _, spin := range []float64{0.55, -0.55} {
		up := model.Leg{Kind: model.Climb, Distance: 6, Speed: v, Ramp: 0.5}
		down := model.Leg{Kind: model.Descend, Distance: 4, Speed: v, Ramp: 0.5}
		m, p := plan(t, r, spin, rigger(), model.Station{}, up, down)
		joints := p.Joints()
		for i, way := range []float64{1, -1} {
			for _, share := range []float64{0.3, 0.5, 0.7} {
				l := p.Loads(m, joints[i]+share*(joints[i+1]-joints[i]))
				weight := 84 * spin * spin * waistRadius(l.Feet.R)
				if want := way * 2 * 84 * spin * v; math.Abs(l.SideSpinward-want) > some*weight {
					t.Errorf("spin %g, leg %d: side load %.15g N spinward, want %.15g", spin, i, l.SideSpinward, want)
				}
				if math.Abs(l.Weight-weight) > some*weight || l.SideAxial != 0 {
					t.Errorf("spin %g, leg %d: weight %.15g N and %g N axially, want %.15g and none", spin, i, l.Weight, l.SideAxial, weight)
				}
			}
		}
	}
}

// TestAxialWalkHasNoCoriolis tries that walking along the axis changes
// nothing: the velocity is along the spin.
func TestAxialWalkHasNoCoriolis(t *testing.T) {
	const r, spin = 18.0, 0.55
	to := 8.0
	l := middle(t, r, spin, model.Leg{Kind: model.Walk, Axial: &to, Speed: 1.4, Ramp: 0.5})
	if want := 84 * spin * spin * waistRadius(r); math.Abs(l.Weight-want) > some*want || l.SideSpinward != 0 || l.SideAxial != 0 {
		t.Errorf("weight %.15g N, side %g N and %g N, want %.15g and none", l.Weight, l.SideSpinward, l.SideAxial, want)
	}
}

// TestHeadCrossCoupling tries the cross-coupled angular acceleration, omega
// times the rate of the head across it: all of it about the vertical and the
// spinward direction, none about the axis. A turn by an angle over a time
// peaks at 3/2 of their quotient.
func TestHeadCrossCoupling(t *testing.T) {
	const r, spin, angle, over = 18.0, -0.55, 1.4, 0.5
	for _, c := range []struct {
		about model.Axis
		share float64
	}{{model.AboutVertical, 1}, {model.AboutSpinward, 1}, {model.AboutAxial, 0}} {
		start := model.Station{Spinward: model.Arc{Value: 1.1, IsAngle: true}}
		m, p := plan(t, r, spin, rigger(), start, model.Leg{Kind: model.TurnHead, Angle: angle, Duration: over, About: c.about})
		peak := c.share * -spin * 1.5 * angle / over
		if got := p.Loads(m, over/2).HeadCross; math.Abs(got-peak) > some {
			t.Errorf("about axis %d: peak %.15g rad/s^2, want %.15g", c.about, got, peak)
		}
		if from, to := p.Loads(m, 0).HeadCross, p.Loads(m, over).HeadCross; from != 0 || to != 0 {
			t.Errorf("about axis %d: the head starts with %g and ends with %g rad/s^2, want none", c.about, from, to)
		}
	}
}
