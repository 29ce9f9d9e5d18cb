package crew_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/crew"
	"offplumb/sim/frame"
	"offplumb/sim/model"
)

// TestGravityAlongTheBody tries the apparent gravity up the body of someone
// who stands still: spin^2 times the distance from the axis, on either side of
// it, as on the flight rotator of published check C12. Beyond the axis the
// waist presses away from the floor.
func TestGravityAlongTheBody(t *testing.T) {
	const spin = -1.1
	who := rigger()
	for _, r := range []float64{0.5, 0.9, 0.979, 1.2, 1.6554, 1.7, 3, 40} {
		m, p := plan(t, 60, spin, who, model.Station{HasRadius: true, Radius: r}, model.Leg{Kind: model.Stand, Duration: 1})
		l := p.Loads(m, 0.5)
		at := func(share float64) float64 { return r - share*who.Stature }
		for _, c := range []struct {
			name      string
			got, want float64
		}{
			{"feet", l.GravityFeet, r},
			{"waist", l.GravityWaist, math.Abs(at(who.Waist))},
			{"head", l.GravityHead, math.Abs(at(who.Head))},
			{"feet less head", l.GravityDifference, r - math.Abs(at(who.Head))},
			{"weight", l.Weight / who.Mass, at(who.Waist)},
		} {
			if math.Abs(c.got-spin*spin*c.want) > some*spin*spin*(r+who.Stature) {
				t.Errorf("feet %g m from the axis: %s %.15g m/s^2, want %.15g", r, c.name, c.got, spin*spin*c.want)
			}
		}
		if (at(who.Waist) > 0) == math.IsNaN(l.FrictionDemand) {
			t.Errorf("feet %g m from the axis, waist at %g m: friction demand %g", r, at(who.Waist), l.FrictionDemand)
		}
	}
}

// TestHeadFirst tries that whoever goes head first has waist and head outward
// of the feet, on the way down as on the way up.
func TestHeadFirst(t *testing.T) {
	const spin, v = 0.5, 0.4
	for _, kind := range []model.LegKind{model.Climb, model.Descend} {
		leg := model.Leg{Kind: kind, Distance: 4, Speed: v, Ramp: 0.5, HeadFirst: true}
		m, p := plan(t, 30, spin, rigger(), model.Station{HasRadius: true, Radius: 12}, leg)
		l := p.Loads(m, p.Duration()/2)
		head, waist := l.Feet.R+model.HeadShare*1.78, l.Feet.R+model.WaistShare*1.78
		if want := math.Hypot(spin*spin*head, 2*spin*v); math.Abs(l.GravityHead-want) > some*want {
			t.Errorf("leg %d: the head feels %.15g m/s^2, want %.15g", kind, l.GravityHead, want)
		}
		side := 2 * 84 * spin * v
		if kind == model.Descend {
			side = -side
		}
		if want := 84 * spin * spin * waist; math.Abs(l.Weight-want) > some*want || math.Abs(l.SideSpinward-side) > some*want {
			t.Errorf("leg %d: weight %.15g N and side load %.15g N, want %.15g and %.15g", kind, l.Weight, l.SideSpinward, want, side)
		}
	}
}

// TestStandingUp is published check C11: a head that rises at 1 m/s when its
// owner stands up (common practice, no source) feels the Coriolis acceleration
// 2 omega v, across its gravity; the trunk presses spinward, the feet feel
// nothing of it. Sitting down it is the other way.
func TestStandingUp(t *testing.T) {
	const r, spin, v, by = 18.0, 0.55, 1.0, 0.6
	who := rigger()
	for _, way := range []float64{1, -1} {
		leg := model.Leg{Kind: model.StandUp, Distance: by, Speed: v, Ramp: model.DefaultRiseRamp}
		if way < 0 {
			leg.Kind = model.SitDown
		}
		m, p := plan(t, r, spin, who, model.Station{}, leg)
		l := p.Loads(m, p.Duration()/2) // half way, at full speed
		if want := 2 * spin * v; math.Abs(l.Coriolis-want) > some*want || math.Abs(l.SpeedWaist-v) > some {
			t.Errorf("Coriolis acceleration %.15g m/s^2 at %.15g m/s, want %.15g at %g", l.Coriolis, l.SpeedWaist, want, v)
		}
		head, waist := r-who.Head*who.Stature+by/2, r-who.Waist*who.Stature+by/2
		if want := math.Hypot(spin*spin*head, 2*spin*v); math.Abs(l.GravityHead-want) > some*want {
			t.Errorf("the head feels %.15g m/s^2, want %.15g", l.GravityHead, want)
		}
		if want := spin * spin * r; math.Abs(l.GravityFeet-want) > some*want {
			t.Errorf("the feet feel %.15g m/s^2, want %.15g as at rest", l.GravityFeet, want)
		}
		weight := who.Mass * spin * spin * waist
		if want := way * 2 * who.Mass * spin * v; math.Abs(l.SideSpinward-want) > some*weight || math.Abs(l.Weight-weight) > some*weight {
			t.Errorf("side load %.15g N and weight %.15g N, want %.15g and %.15g", l.SideSpinward, l.Weight, want, weight)
		}
	}
}

// TestSittersSitLower tries how low the waist is over a path: one who first
// stands up was sitting from the start, and one who has sat down stays so.
func TestSittersSitLower(t *testing.T) {
	up := func(by float64) model.Leg {
		return model.Leg{Kind: model.StandUp, Distance: by, Speed: 1, Ramp: 0.45}
	}
	down := func(by float64) model.Leg {
		l := up(by)
		l.Kind = model.SitDown
		return l
	}
	stand := model.Leg{Kind: model.Stand, Duration: 1}
	for _, c := range []struct {
		name string
		legs []model.Leg
		low  []float64 // m, at each joint
	}{
		{"up", []model.Leg{stand, up(0.5), stand}, []float64{0.5, 0.5, 0, 0}},
		{"down", []model.Leg{stand, down(0.4), stand}, []float64{0, 0, 0.4, 0.4}},
		{"down and up", []model.Leg{down(0.4), stand, up(0.4)}, []float64{0, 0.4, 0.4, 0}},
		{"up twice", []model.Leg{up(0.2), up(0.3), stand}, []float64{0.5, 0.3, 0, 0}},
		{"down, farther up, down", []model.Leg{down(0.3), up(0.5), down(0.1)}, []float64{0.2, 0.5, 0, 0.1}},
	} {
		_, p := plan(t, 18, 0.5, rigger(), model.Station{}, c.legs...)
		for i, at := range p.Joints() {
			f := p.At(at)
			if got := 1 - (18 - frame.PolarOf(f.Body(1).Pos).R); math.Abs(got-c.low[i]) > 64*epsilon {
				t.Errorf("%s: at joint %d the waist is %.15g m lower, want %g", c.name, i, got, c.low[i])
			}
			if f.R != 18 {
				t.Errorf("%s: at joint %d the feet are at %g m", c.name, i, f.R)
			}
		}
	}
}

// TestCrossCouplingParts tries the parts of the spin times the rate of the
// head, for the three axes of a turn of the head and for a turn of the body to
// the left: about the vertical it is spinward or against, about the spinward
// direction vertical, and about the axis there is none.
func TestCrossCouplingParts(t *testing.T) {
	const angle, over = 1.2, 0.5
	for _, spin := range []float64{0.55, -0.55} {
		for _, c := range []struct {
			name                string
			leg                 model.Leg
			spinward, axial, up float64
		}{
			{"head about the vertical", model.Leg{Kind: model.TurnHead, About: model.AboutVertical}, -1, 0, 0},
			{"head about spinward", model.Leg{Kind: model.TurnHead, About: model.AboutSpinward}, 0, 0, 1},
			{"head about the axis", model.Leg{Kind: model.TurnHead, About: model.AboutAxial}, 0, 0, 0},
			{"body to the left", model.Leg{Kind: model.Turn}, -1, 0, 0},
		} {
			c.leg.Angle, c.leg.Duration = angle, over
			start := model.Station{Spinward: model.Arc{Value: 2.2, IsAngle: true}}
			m, p := plan(t, 18, spin, rigger(), start, c.leg)
			l := p.Loads(m, over/2)
			rate := spin * 1.5 * angle / over // at its peak
			off := math.Abs(l.CrossSpinward-c.spinward*rate) + math.Abs(l.CrossAxial-c.axial*rate) + math.Abs(l.CrossUp-c.up*rate)
			if want := math.Abs(rate) * (math.Abs(c.spinward) + math.Abs(c.up)); off > some || math.Abs(l.HeadCross-want) > some {
				t.Errorf("spin %g, %s: %g, %g, %g and in all %g rad/s^2, want a share %g, %g, %g of %g",
					spin, c.name, l.CrossSpinward, l.CrossAxial, l.CrossUp, l.HeadCross, c.spinward, c.axial, c.up, rate)
			}
		}
	}
}

// TestWalkingTurnsTheHead tries that whoever walks round turns about the axis
// only, which the spin does not couple with.
func TestWalkingTurnsTheHead(t *testing.T) {
	l := middle(t, 18, 0.5, walk(20, 1.5, 0.5, false))
	if want := 1.5 / 18; math.Abs(l.Feet.HeadTurn.Z-want) > some || l.HeadCross != 0 {
		t.Errorf("the head turns by %v rad/s and feels %g rad/s^2, want %g about the axis and none", l.Feet.HeadTurn, l.HeadCross, want)
	}
}

// TestLadderSplitsTheForce tries the forces along and across a ladder: both
// together are what the person exerts in its plane, along the very line that
// the feet go, wherever on it. On a ladder facing along the axis they have a
// closed form.
func TestLadderSplitsTheForce(t *testing.T) {
	const r, spin, v = 18.0, 0.5, 0.4
	for _, kind := range []model.LegKind{model.Climb, model.Descend} {
		for _, c := range facings {
			for _, pitch := range []float64{0, 0.6, 1.2} {
				leg := model.Leg{Kind: kind, Distance: 3, Speed: v, Ramp: 0.5, Facing: c.facing, Pitch: pitch}
				m, p := plan(t, r, spin, rigger(), model.Station{HasRadius: true, Radius: 13}, leg)
				for _, share := range []float64{0.2, 0.5, 0.8} {
					ladderForce(t, m, p, share*p.Duration(), c.spinward, c.axial)
				}
				l := p.Loads(m, p.Duration()/2)
				if pitch > 0 && c.axial != 0 {
					weight := 84 * spin * spin * waistRadius(l.Feet.R)
					along, pull := weight*math.Sin(pitch), -weight*math.Cos(pitch)
					if math.Abs(l.AlongLadder-along) > some*weight || math.Abs(l.Pull-pull) > some*weight {
						t.Errorf("pitch %g: %.15g N along and %.15g N away from the ladder, want %.15g and %.15g", pitch, l.AlongLadder, l.Pull, along, pull)
					}
				}
			}
		}
	}
}

// ladderForce holds the split of the force against the direction in which the
// feet go.
func ladderForce(t *testing.T, m *model.Model, p *crew.Plan, at, spinward, axial float64) {
	t.Helper()
	l := p.Loads(m, at)
	rise := r3.Unit(r3.Sub(feet(p, at+0.01), feet(p, at-0.01)))
	if p.Path.Legs[0].Kind == model.Descend {
		rise = r3.Scale(-1, rise)
	}
	start := p.At(0)
	ahead := frame.LocalAt(start.Phi).Vec(spinward, axial, 0)
	into := r3.Unit(r3.Sub(ahead, r3.Scale(r3.Dot(ahead, rise), rise)))
	force := frame.LocalAt(l.Feet.Phi).Vec(l.SideSpinward, l.SideAxial, -l.Weight)
	// The feet's way is differenced over at least 5 mm, of places rounded at 18 m.
	const tol = 1e3 * 16 * epsilon * 18 / 5e-3
	if got := -r3.Dot(force, rise); math.Abs(l.AlongLadder-got) > tol {
		t.Errorf("%+v after %g s: %.12g N along the ladder, want %.12g", p.Path.Legs[0], at, l.AlongLadder, got)
	}
	if got := -r3.Dot(force, into); math.Abs(l.Pull-got) > tol {
		t.Errorf("%+v after %g s: %.12g N away from the ladder, want %.12g", p.Path.Legs[0], at, l.Pull, got)
	}
}

// TestPullBySideOfLadder tries who is pulled off a radial ladder: climbing at
// positive spin presses spinward, into a ladder on the spinward side and away
// from one on the antispinward side; descending is the other way. Off ladders
// there is no such force.
func TestPullBySideOfLadder(t *testing.T) {
	const spin, v = 0.5, 0.4
	for _, kind := range []model.LegKind{model.Climb, model.Descend} {
		for _, c := range facings[:2] {
			leg := model.Leg{Kind: kind, Distance: 4, Speed: v, Ramp: 0.5, Facing: c.facing}
			m, p := plan(t, 30, spin, rigger(), model.Station{HasRadius: true, Radius: 12}, leg)
			want := -c.spinward * 2 * 84 * spin * v
			if kind == model.Descend {
				want = -want
			}
			l := p.Loads(m, p.Duration()/2)
			if math.Abs(l.Pull-want) > some*l.Weight || math.Abs(l.AlongLadder-l.Weight) > some*l.Weight {
				t.Errorf("leg %d facing %d: pull %.15g N and %.15g N along, want %.15g and the weight", kind, c.facing, l.Pull, l.AlongLadder, want)
			}
		}
	}
	if l := middle(t, 30, spin, walk(10, 1, 0.5, false)); !math.IsNaN(l.Pull) || !math.IsNaN(l.AlongLadder) {
		t.Errorf("on a walk %g N away from a ladder, %g N along it", l.Pull, l.AlongLadder)
	}
}

// TestCarriedLoadAtRest tries the load of someone who stands: its weight, its
// share of the side load where it is held aside, and that of the whole.
func TestCarriedLoadAtRest(t *testing.T) {
	const r, spin, mass, aside, height = 18.0, 0.5, 9.0, 0.4, 1.1
	in := house(model.Leg{Kind: model.Stand, Duration: 1})
	in.Paths[0].Start, in.Paths[0].Carry = model.Station{}, model.Carry{Mass: mass, At: model.Reach{Spinward: aside, Axial: 0.2, Height: height}}
	m, problems := model.New(in)
	if len(problems) > 0 {
		t.Fatal(problems)
	}
	p, problems := crew.NewPlan(m, &m.Paths[0])
	if len(problems) > 0 {
		t.Fatal(problems)
	}
	l := p.Loads(m, 0.5)
	g := spin * spin * math.Hypot(r-height, aside)
	if math.Abs(l.GravityCarried-g) > some*g || math.Abs(l.ForceCarried-mass*g) > some*mass*g {
		t.Errorf("the load feels %.15g m/s^2 and weighs %.15g N, want %.15g and %.15g", l.GravityCarried, l.ForceCarried, g, mass*g)
	}
	weight := spin * spin * (84*waistRadius(r) + mass*(r-height))
	if side := mass * spin * spin * aside; math.Abs(l.Weight-weight) > some*weight || math.Abs(l.SideSpinward-side) > some*weight || math.Abs(l.FrictionDemand-side/weight) > some {
		t.Errorf("weight %.15g N, side load %.15g N, friction demand %.15g, want %.15g, %.15g and their quotient", l.Weight, l.SideSpinward, l.FrictionDemand, weight, side)
	}
	if l.TiltSpinward != 0 || l.Power != 0 {
		t.Errorf("tilt %g rad at the waist and power %g W of who stands, want none", l.TiltSpinward, l.Power)
	}
}
