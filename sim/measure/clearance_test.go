package measure_test

import (
	"math"
	"testing"

	"offplumb/sim/flight"
	"offplumb/sim/measure"
	"offplumb/sim/model"
)

// nearest finds the clearance to a surface.
func nearest(t *testing.T, list []measure.Clearance, surface string) measure.Clearance {
	t.Helper()
	for _, c := range list {
		if c.Surface == surface {
			return c
		}
	}
	t.Fatalf("no clearance to %q in %+v", surface, list)
	return measure.Clearance{}
}

// check holds a closest approach against its value. The gap is found to
// rounding; its time, where it hardly changes, to the root of that times the
// size of the habitat over the curvature of the way: to a microsecond or so.
func checkNear(t *testing.T, name string, got measure.Clearance, gap, time float64) {
	t.Helper()
	if math.Abs(got.Gap-gap) > 1e-9 || math.Abs(got.Time-time) > 1e-5 {
		t.Errorf("%s: %.12g m from %q after %.9g s, want %.12g after %.9g", name, got.Gap, got.Surface, got.Time, gap, time)
	}
}

// TestPastTheCeiling tries the closest approach of throws in vacuum, straight
// in the inertial frame, to a ceiling: where the line is nearest to the axis.
func TestPastTheCeiling(t *testing.T) {
	const r, ceiling = 20.0, 9.0
	rng := random(t, 40)
	for range 60 {
		spin := between(rng, 0.2, 0.8) * float64(1-2*rng.IntN(2))
		in := ring(r, spin)
		in.Habitat.CeilingRadius = ceiling
		from := between(rng, 12, 19)
		// Aimed past the axis at a distance that leaves room, u m/s fast.
		past, u := between(rng, ceiling+0.2, from-0.1), between(rng, 1, 12)
		sin := past / from
		across, up := u*sin, u*math.Sqrt(1-sin*sin)
		m, track := follow(t, in, model.Release{Name: "r", Own: ball(0.2, 0.4), At: model.Station{HasRadius: true, Radius: from},
			Start: model.Start{Kind: model.Velocity, VSpinward: across - spin*from, VUp: up, VAxial: between(rng, -2, 2)}, Until: model.Until{Kind: model.UntilLanding}})
		list := measure.Clearances(m, track)
		checkNear(t, "a throw", nearest(t, list, "ceiling"), past-ceiling-0.1, from*up/(u*u))
		if c := nearest(t, list, "floor"); c.Gap != 0 || c.Time != track.End {
			t.Errorf("it lands after %g s, but is %g m from the floor after %g s", track.End, c.Gap, c.Time)
		}
	}
}

// TestPastABox tries the closest approach of a straight throw, in a habitat
// that stands still, to a box: to its top, to an edge and to a corner.
func TestPastABox(t *testing.T) {
	const r, a = 20.0, 0.1
	in := ring(r, 0)
	in.Fixtures = []model.Fixture{{Name: "box", At: model.Station{}, Size: [3]float64{2, 1, 1.5}, Friction: model.None, Restitution: model.None}}
	// x is up from the box's underside, y spinward, z axial; the box reaches
	// from -1 to 1 and from -0.5 to 0.5.
	for _, c := range []struct {
		name      string
		h, y, z   float64 // m, where it starts
		vh, vy    float64 // m/s
		vz        float64
		gap, time float64
		surfaces  []string // one of which is nearest
	}{
		{"over the top", 2, -3, 0.2, 0, 1.5, 0, 0.5 - a, -1, []string{"box top"}},
		{"beside the edge of the top", 2.5, 0, -2.5, 0, 0, 1, 1 - a, -1, []string{"box top"}},
		{"beside a side", 0.7, -3, 1.5, 0, 2, 0, 1 - a, -1, []string{"box +axial side"}},
		// Falling outward past the edge at (1.5, y, 0.5): 45 deg, half a metre off it.
		{"past an edge", 3, 0.3, 0.5 + math.Sqrt2/2 - 1.5 + 0, -1, 0, 1, math.NaN(), math.NaN(), nil},
		{"past a corner", 1.5, -3, 0.9, 0, 1, 0, 0.4 - a, -1, []string{"box +axial side", "box top"}},
	} {
		if math.IsNaN(c.gap) {
			c.gap, c.time = pastEdge(c.h, c.z, c.vh, c.vz, 1.5, 0.5)
			c.gap -= a
			c.surfaces = []string{"box top", "box +axial side"}
		}
		m, track := follow(t, in, model.Release{Name: "r", Own: ball(0.2, 0.4), At: model.Station{HasRadius: true, Radius: math.Hypot(r-c.h, c.y), Axial: c.z,
			Spinward: model.Arc{Value: math.Atan2(c.y, r-c.h), IsAngle: true}}, Start: straightStart(r-c.h, c.y, -c.vh, c.vy, c.vz),
			Until: model.Until{Kind: model.UntilDuration, Duration: 2}})
		least := measure.Clearance{Gap: math.Inf(1)}
		for _, k := range measure.Clearances(m, track) {
			for _, s := range c.surfaces {
				if k.Surface == s && k.Gap < least.Gap {
					least = k
				}
			}
		}
		if c.time < 0 { // the gap stays for a while: any time of it will do
			c.time = least.Time
		}
		checkNear(t, c.name, least, c.gap, c.time)
	}
}

// pastEdge is the closest approach of a straight line in a plane to a point.
func pastEdge(x, y, vx, vy, px, py float64) (gap, time float64) {
	dx, dy, v := px-x, py-y, math.Hypot(vx, vy)
	return math.Abs(dx*vy-dy*vx) / v, (dx*vx + dy*vy) / (v * v)
}

// straightStart gives the start of a body at x, y in a habitat that stands
// still, with a velocity in those directions.
func straightStart(x, y, vx, vy, vz float64) model.Start {
	r := math.Hypot(x, y)
	out, round := (vx*x+vy*y)/r, (vy*x-vx*y)/r
	return model.Start{Kind: model.Velocity, VSpinward: round, VAxial: vz, VUp: -out}
}

// TestPastATurningBox tries a body at rest in the inertial frame: the habitat
// turns a box and a post past it, which are nearest when they are beneath it.
func TestPastATurningBox(t *testing.T) {
	const r, from, a = 20.0, 17.0, 0.1
	for _, spin := range []float64{0.5, -0.5} {
		in := ring(r, spin)
		in.Fixtures = []model.Fixture{
			{Name: "box", At: model.Station{Spinward: deg(-40)}, Size: [3]float64{1, 1, 2}, Friction: model.None, Restitution: model.None},
			{Name: "post", Kind: model.Post, From: model.Station{Spinward: deg(30)}, To: model.Station{Spinward: deg(30), Height: 2.2}, Diameter: 0.3,
				Friction: model.None, Restitution: model.None},
		}
		m, track := follow(t, in, model.Release{Name: "r", Own: ball(0.2, 0.4), At: model.Station{HasRadius: true, Radius: from}, Start: model.Start{Kind: model.Still},
			Until: model.Until{Kind: model.UntilDuration, Duration: 4 * math.Pi}})
		list := measure.Clearances(m, track)
		passes := func(angle float64) float64 { // s, when it has gone round so far
			turn := math.Mod(-angle/spin+4*math.Pi/math.Abs(spin), 2*math.Pi/math.Abs(spin))
			return turn
		}
		checkNear(t, "a box", nearest(t, list, "box top"), r-2-from-a, passes(deg(-40).Value))
		checkNear(t, "a post", nearest(t, list, "post"), r-2.2-0.15-from-a, passes(deg(30).Value))
		if c := nearest(t, list, "floor"); math.Abs(c.Gap-(r-from-a)) > 1e-9 {
			t.Errorf("%g m from the floor all the time, want %g", c.Gap, r-from-a)
		}
	}
}

// TestTouchedIsNoClearance tries that what a body touches has none, from its
// first touch on, however often it comes back.
func TestTouchedIsNoClearance(t *testing.T) {
	in := ring(12, 0.8)
	in.Habitat.Length, in.Habitat.CeilingRadius = 5, 8
	rng := random(t, 41)
	for range 20 {
		m, track := follow(t, in, model.Release{Name: "toss", Own: ball(between(rng, 0, 0.7), 0.2), At: model.Station{Height: 1},
			Start: model.Start{Kind: model.Velocity, VSpinward: between(rng, -3, 3), VAxial: between(rng, -4, 4), VUp: between(rng, -2, 6)}})
		first := map[string]float64{}
		for i := range track.Impacts {
			if hit := &track.Impacts[i]; first[hit.Surface] == 0 {
				first[hit.Surface] = hit.Time
			}
		}
		for _, c := range measure.Clearances(m, track) {
			time, touched := first[c.Surface]
			if c.Name != "toss" || touched && (c.Gap != 0 || c.Time != time) || !touched && c.Gap <= 0 {
				t.Fatalf("touches %v, but %+v", first, c)
			}
			delete(first, c.Surface)
		}
		if len(first) > 0 {
			t.Fatalf("touches %v, to which there is no clearance", first)
		}
	}
}

// TestClearancesInOrder tries that surfaces come in the order of the interior.
func TestClearancesInOrder(t *testing.T) {
	m, track := follow(t, spokes(0.5, false), model.Release{Name: "r", Own: ball(0.3, 0.4), At: model.Station{HasRadius: true, Radius: 14, Axial: 0.5}})
	if track.Outcome != flight.Rested {
		t.Fatalf("outcome %v", track.Outcome)
	}
	place := map[string]int{}
	for i, s := range m.Interior.Surfaces() {
		place[s.Name] = i
	}
	list := measure.Clearances(m, track)
	for i := range list[1:] {
		if place[list[i].Surface] >= place[list[i+1].Surface] {
			t.Errorf("%q comes before %q", list[i].Surface, list[i+1].Surface)
		}
	}
	least := measure.Closest(list)
	for _, c := range list {
		if c.Gap < least.Gap {
			t.Errorf("the least clearance is %+v, but there is %+v", least, c)
		}
	}
	if none := measure.Closest(nil); !math.IsInf(none.Gap, 1) || !math.IsNaN(none.Time) {
		t.Errorf("of none the least is %+v", none)
	}
}

// TestPersonBesideABulkhead tries the clearance of a person who walks along a
// bulkhead and past a post: half the breadth less than the distance.
func TestPersonBesideABulkhead(t *testing.T) {
	in := ring(20, 0.5)
	in.Habitat.Length = 10
	in.Fixtures = []model.Fixture{{Name: "post", Kind: model.Post, From: model.Station{Spinward: deg(40), Axial: 2.4},
		To: model.Station{Spinward: deg(40), Axial: 2.4, Height: 3}, Diameter: 0.2, Friction: model.None, Restitution: model.None}}
	z := 3.6
	m, p := planned(t, in, model.Path{Start: model.Station{Axial: z}, Legs: []model.Leg{{Kind: model.Walk, Laps: 0.25, Speed: 1, Ramp: 0.5}}})
	list := measure.PathClearances(m, p)
	if c := nearest(t, list, "bulkhead +axial"); math.Abs(c.Gap-(5-z-0.25)) > 1e-9 || c.Name != "path" {
		t.Errorf("%+v, want %g m", c, 5-z-0.25)
	}
	// Passing the post within half the step along the way, 0.05 m.
	want, slack := z-2.4-0.1-0.25, 0.05*0.05/2/(z-2.4)
	if c := nearest(t, list, "post"); c.Gap < want-1e-9 || c.Gap > want+slack || math.Abs(p.At(c.Time).Phi-deg(40).Value)*20 > 0.06 {
		t.Errorf("%+v at %g rad, want %g m", c, p.At(c.Time).Phi, want)
	}
}
