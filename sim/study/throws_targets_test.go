package study_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"offplumb/sim/measure"
	"offplumb/sim/model"
)

// TestThrowToWalker: a throw meets a hand where it is when it arrives. The place
// is worked out here: of a walk of a steady speed after a ramp, which costs half
// of its time.
func TestThrowToWalker(t *testing.T) {
	const r, spin, walk, ramp, starts, leaves, hand = 16.0, -0.5, 1.25, 0.6, 1.0, 3.0, 1.2
	from, to := -4.0, 9.0
	in := model.Model{Habitat: model.Habitat{Room: model.Room{FloorRadius: r}, Spin: spin},
		Crews: []model.Crew{{Name: "c", Mass: 70, Stature: 1.7, Breadth: 0.5, Waist: 0.55, Head: 0.93}},
		Paths: []model.Path{{Name: "p", Crew: "c", Start: model.Station{Spinward: model.Arc{Value: from}, Axial: 2}, Time: starts,
			Legs: []model.Leg{{Kind: model.Walk, Spinward: &model.Arc{Value: to}, Speed: walk, Ramp: ramp}}}}}
	throw := model.ThrowTo{From: model.Station{Height: 1.5}, Leaves: leaves, Speed: 7, Longest: 5,
		Target: model.Target{Path: "p", Reach: model.Reach{Height: hand}}}
	found := solved(t, hall(t, in, throw)).Aims[0].Throws
	if len(found) == 0 {
		t.Fatal("no throw")
	}
	for _, s := range found {
		at := from + walk*(leaves+s.Time-starts-ramp/2)
		c := straightThrow{spin: spin, from: r - 1.5, to: r - hand, phi: at / r, z: 2}
		if miss := c.miss(s.Speed, s.Heading, s.Elevation, s.Time); miss > 1e-9*r {
			t.Errorf("after %g s the throw is %g m off the hand", s.Time, miss)
		}
		if math.Abs(s.To.Spinward-at) > 1e-9 || math.Abs(s.To.Height-hand) > 1e-9 || s.Outcome != measure.ThrowArrives {
			t.Errorf("arrives at %+v, the hand is at %g m", s.To, at)
		}
		// It is pointed from where the hand was seen.
		seen := from + walk*(leaves-starts-ramp/2)
		line := [3]float64{(r - hand) * math.Sin(seen/r), 2, (r - 1.5) - (r-hand)*math.Cos(seen/r)}
		if want := math.Atan2(line[1], line[0]); math.Abs(s.SightHead-want) > 1e-9 {
			t.Errorf("seen along %g rad, want %g", s.SightHead, want)
		}
		norm := math.Sqrt(sq(line[0]) + sq(line[1]) + sq(line[2]))
		if want := math.Acos((line[0]*s.V[0] + line[1]*s.V[1] + line[2]*s.V[2]) / norm / s.Speed); math.Abs(s.Lead-want) > 1e-7 {
			t.Errorf("leads by %g rad, want %g", s.Lead, want)
		}
	}
}

// TestThrowTable: the targets of a table stand at their distances from plumb
// under the thrower, and each has the throws of a study of its own.
func TestThrowTable(t *testing.T) {
	in := model.Model{Habitat: model.Habitat{Room: model.Room{FloorRadius: 18, Length: 40}, Spin: 0.5}}
	from := model.Station{Spinward: model.Arc{Value: 3}, Axial: -2, Height: 1.5}
	for _, along := range []model.Direction{model.Spinward, model.PlusAxial} {
		distances := []float64{-4, 2, 15}
		table := solved(t, hall(t, in, model.ThrowTo{From: from, Speed: 6, Along: along, Distances: distances, Target: model.Target{Station: model.Station{Height: 1}}}))
		for i, d := range distances {
			at := model.Station{Spinward: model.Arc{Value: 3 + d}, Axial: -2, Height: 1}
			if along == model.PlusAxial {
				at = model.Station{Spinward: model.Arc{Value: 3}, Axial: -2 + d, Height: 1}
			}
			one := solved(t, hall(t, in, model.ThrowTo{From: from, Speed: 6, Target: model.Target{Station: at}})).Aims[0]
			got := table.Aims[i]
			if len(got.Throws) != len(one.Throws) || math.Abs(got.Least-one.Least) > 1e-9 || got.Distance != d {
				t.Errorf("distance %g: %d throws, alone %d; least %g, alone %g", d, len(got.Throws), len(one.Throws), got.Least, one.Least)
				continue
			}
			for k := range one.Throws {
				if math.Abs(got.Throws[k].Time-one.Throws[k].Time) > 1e-9 || math.Abs(got.Throws[k].Elevation-one.Throws[k].Elevation) > 1e-9 {
					t.Errorf("distance %g, throw %d: %+v, alone %+v", d, k, got.Throws[k].Throw, one.Throws[k].Throw)
				}
			}
		}
		if far := table.Aims[2]; len(far.Throws) != 0 || !(far.Least > 6) || table.Rows()[len(table.Rows())-1].Outcome != measure.ThrowNone {
			t.Errorf("at 15 m: %d throws, least %g m/s", len(far.Throws), far.Least)
		}
	}
}

// TestThrowSensitivity: how far a throw passes its target for what it is off, to
// first order: flown anew off by little, by hand.
func TestThrowSensitivity(t *testing.T) {
	in := model.Model{Habitat: model.Habitat{Room: model.Room{FloorRadius: 18}, Spin: 0.5}}
	c := straightThrow{spin: 0.5, from: 16.5, to: 16.8, phi: 0.3, z: 1.5}
	found := solved(t, hall(t, in, model.ThrowTo{From: model.Station{Height: 1.5}, Speed: 6.5,
		Target: model.Target{Station: model.Station{Height: 1.2, Axial: 1.5, Spinward: model.Arc{Value: 0.3, IsAngle: true}}}})).Aims[0].Throws
	const h = 1e-4
	for i, s := range found {
		nearest := func(speed, heading, elevation float64) float64 {
			lo, hi := s.Time*0.9, s.Time*1.1
			for range 200 {
				a, b := lo+(hi-lo)/3, hi-(hi-lo)/3
				if c.miss(speed, heading, elevation, a) < c.miss(speed, heading, elevation, b) {
					hi = b
				} else {
					lo = a
				}
			}
			return c.miss(speed, heading, elevation, lo)
		}
		for what, pair := range map[string][2]float64{
			"heading":   {s.PerHeading, nearest(s.Speed, s.Heading+h, s.Elevation) / h},
			"elevation": {s.PerElev, nearest(s.Speed, s.Heading, s.Elevation+h) / h},
			"speed":     {s.PerSpeed, nearest(s.Speed+h, s.Heading, s.Elevation) / h},
		} {
			// One-sided: off by h times the curvature, some ten metres.
			if math.Abs(pair[0]-pair[1]) > 100*h {
				t.Errorf("throw %d, %s: %g, by hand %g", i, what, pair[0], pair[1])
			}
		}
	}
	if len(found) < 2 {
		t.Errorf("%d throws", len(found))
	}
}

// TestThrowsJustFastEnough: a little above the least speed two throws reach, one
// before and one after the slowest, however close together; a little below it
// none does near that time.
func TestThrowsJustFastEnough(t *testing.T) {
	const seed, cases = 36, 60
	rng := rand.New(rand.NewPCG(seed, 1))
	tried := 0
	for i := range cases {
		in, throw, c := randomCase(rng)
		throw.Least = true
		least := solved(t, hall(t, in, throw)).Aims[0]
		turn := 2 * math.Pi / math.Abs(c.spin)
		if least.LeastTime > 0.99*turn || least.Least < 1e-3 {
			continue
		}
		tried++
		throw.Least = false
		for _, more := range []float64{1e-4, 1e-6, 1e-8, -1e-8} {
			throw.Speed = least.Least * (1 + more)
			near := []float64{}
			for _, s := range solved(t, hall(t, in, throw)).Aims[0].Throws {
				// The times part as the square root of the speed's excess.
				if math.Abs(s.Time-least.LeastTime) < 10*turn*math.Sqrt(math.Abs(more)) {
					near = append(near, s.Time)
				}
			}
			switch {
			case more < 0 && len(near) > 0:
				t.Errorf("seed %d, case %d: below the least speed %g m/s throws take %g s", seed, i, least.Least, near)
			case more > 0 && (len(near) != 2 || near[0] > least.LeastTime || near[1] < least.LeastTime):
				t.Errorf("seed %d, case %d: %g above the least speed throws take %g s, the slowest %g s", seed, i, more, near, least.LeastTime)
			}
		}
	}
	if tried < cases/3 {
		t.Errorf("only %d cases tried", tried)
	}
}
