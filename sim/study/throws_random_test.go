package study_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"offplumb/sim/air"
	"offplumb/sim/flight"
	"offplumb/sim/measure"
	"offplumb/sim/model"
	"offplumb/sim/study"
)

// straightThrow follows a throw in vacuum by hand: a straight line in the
// inertial frame, turned back by the angle that the habitat turns meanwhile. It
// gives the distance to the target after a time.
type straightThrow struct{ spin, from, to, phi, z float64 } // rad/s, m, m, rad, m

func (c straightThrow) miss(speed, heading, elevation, t float64) float64 {
	level := speed * math.Cos(elevation)
	vx, vy, vz := -speed*math.Sin(elevation), level*math.Cos(heading)+c.spin*c.from, level*math.Sin(heading)
	x, y := c.from+vx*t, vy*t
	sin, cos := math.Sincos(c.spin * t)
	hx, hy := cos*x+sin*y, -sin*x+cos*y
	return math.Sqrt(sq(hx-c.to*math.Cos(c.phi)) + sq(hy-c.to*math.Sin(c.phi)) + sq(vz*t-c.z))
}

// needed is the speed of the throw that takes a time, relative to the habitat.
func (c straightThrow) needed(t float64) float64 {
	sin, cos := math.Sincos(c.phi + c.spin*t)
	vx, vy, vz := (c.to*cos-c.from)/t, c.to*sin/t, c.z/t
	return math.Sqrt(sq(vx) + sq(vy-c.spin*c.from) + sq(vz))
}

func sq(x float64) float64 { return x * x }

// randomCase is an open hall with a throw study between random places.
func randomCase(rng *rand.Rand) (model.Model, model.ThrowTo, straightThrow) {
	r := math.Exp(math.Log(5) + rng.Float64()*math.Log(40))
	c := straightThrow{spin: (0.5 + 6*rng.Float64()) * rpm * float64(1-2*rng.IntN(2)), from: r * (1 - 0.9*rng.Float64()), to: r * (1 - 0.9*rng.Float64()),
		phi: (2*rng.Float64() - 1) * math.Pi, z: (rng.Float64() - 0.5) * r}
	in := model.Model{Habitat: model.Habitat{Room: model.Room{FloorRadius: r}, Spin: c.spin}}
	throw := model.ThrowTo{From: model.Station{Height: r - c.from},
		Target: model.Target{Station: model.Station{Height: r - c.to, Spinward: model.Arc{Value: c.phi, IsAngle: true}, Axial: c.z}}}
	return in, throw, c
}

// TestThrowsInVacuum holds all throws at a speed against the straight-line
// construction: each comes to its target, and there are as many as the speed
// curve, worked out here on a far finer grid, has crossings.
func TestThrowsInVacuum(t *testing.T) {
	const seed, cases, grid = 31, 200, 40_000
	rng := rand.New(rand.NewPCG(seed, 1))
	total := 0
	for i := range cases {
		in, throw, c := randomCase(rng)
		throw.Speed = math.Abs(c.spin) * c.from * (0.3 + 2*rng.Float64())
		found := solved(t, hall(t, in, throw)).Aims[0].Throws
		for _, s := range found {
			// The time is found to a few roundings; so is where the line ends.
			if miss := c.miss(s.Speed, s.Heading, s.Elevation, s.Time); miss > 1e-9*(c.from+c.to) || math.Abs(s.Speed-throw.Speed) > 1e-9*throw.Speed {
				t.Errorf("seed %d, case %d: %g m/s of %g, misses by %g m", seed, i, s.Speed, throw.Speed, miss)
			}
			if s.Outcome != measure.ThrowArrives || s.Miss > 1e-6 {
				t.Errorf("seed %d, case %d: %s %s, off by %g m", seed, i, s.Outcome, s.Surface, s.Miss)
			}
		}
		turn := 2 * math.Pi / math.Abs(c.spin)
		crossed := 0
		last := 1.0
		for k := 1; k <= grid; k++ {
			f := c.needed(turn*float64(k)/grid) - throw.Speed
			if f*last < 0 {
				crossed++
			}
			last = f
		}
		if total += crossed; crossed != len(found) {
			t.Errorf("seed %d, case %d: %d throws, %d crossings: %+v at %g m/s", seed, i, len(found), crossed, c, throw.Speed)
		}
	}
	if total < cases/2 {
		t.Errorf("only %d throws in %d cases", total, cases)
	}
}

// pass is a nearest approach of a throw to the target.
type pass struct {
	t, miss float64 // s, m
	left    bool    // the target lies to the left of the way
}

// passes lists the nearest approaches of a throw in the plane of the ring,
// within one turn.
func (c straightThrow) passes(speed, angle float64) (out []pass) {
	const steps = 1500
	turn := 2 * math.Pi / math.Abs(c.spin)
	at := func(n int) (x, y float64) {
		t := turn * float64(n) / steps
		px, py := c.from-speed*math.Sin(angle)*t, (speed*math.Cos(angle)+c.spin*c.from)*t
		sin, cos := math.Sincos(c.spin * t)
		return cos*px + sin*py - c.to*math.Cos(c.phi), -sin*px + cos*py - c.to*math.Sin(c.phi)
	}
	d := func(n int) float64 { return math.Hypot(at(n)) }
	for n := 1; n < steps; n++ {
		if d(n) < d(n-1) && d(n) <= d(n+1) {
			x0, y0 := at(n - 1)
			x1, y1 := at(n + 1)
			out = append(out, pass{turn * float64(n) / steps, d(n), (x1-x0)*y0-(y1-y0)*x0 > 0})
		}
	}
	return out
}

// TestThrowsByDirections looks for throws the other way round: of a fan of
// directions at the speed, in the plane of the ring. Where the target lies to
// the left of one path and to the right of the next, a throw between them
// arrives, and must be among those found.
func TestThrowsByDirections(t *testing.T) {
	const seed, cases, fan = 32, 25, 360
	const step = 2 * math.Pi / fan
	rng := rand.New(rand.NewPCG(seed, 1))
	seen := 0
	for i := range cases {
		in, throw, c := randomCase(rng)
		c.z, throw.Target.Axial = 0, 0
		throw.Speed = math.Abs(c.spin) * c.from * (0.6 + rng.Float64())
		found := solved(t, hall(t, in, throw)).Aims[0].Throws
		turn := 2 * math.Pi / math.Abs(c.spin)
		before := c.passes(throw.Speed, -step)
		for k := range fan {
			a := step * float64(k)
			now := c.passes(throw.Speed, a)
			for _, p := range now {
				for _, q := range before {
					if p.left == q.left || math.Abs(p.t-q.t) > 0.02*turn || p.miss+q.miss > 0.1*(c.from+c.to) {
						continue
					}
					seen++
					near := false
					for _, s := range found {
						off := math.Remainder(math.Atan2(s.V[2], s.V[0])-a+step/2, 2*math.Pi)
						near = near || math.Abs(off) < 0.75*step && math.Abs(s.Time-p.t) < 0.03*turn
					}
					if !near {
						t.Errorf("seed %d, case %d: a throw near %g deg, after about %g s, is not found: %+v", seed, i, a*180/math.Pi, p.t, c)
					}
				}
			}
			before = now
		}
	}
	if seen < cases/2 {
		t.Errorf("the fan saw %d throws only", seen)
	}
}

// TestSlowestThrow holds the slowest throws against a scan of the times.
func TestSlowestThrow(t *testing.T) {
	const seed, cases, grid = 33, 60, 50_000
	rng := rand.New(rand.NewPCG(seed, 1))
	for i := range cases {
		in, throw, c := randomCase(rng)
		throw.Least = true
		a := solved(t, hall(t, in, throw)).Aims[0]
		least, turn := math.Inf(1), 2*math.Pi/math.Abs(c.spin)
		for k := 1; k <= grid; k++ {
			least = math.Min(least, c.needed(turn*float64(k)/grid))
		}
		// The scan stands at most half a step off the bottom, where the curve is
		// level: a share (2 pi/grid)^2 of its bend, which is a few times the rim's speed.
		slack := 20 * sq(2*math.Pi/grid) * (math.Abs(c.spin)*(c.from+c.to) + least)
		if math.Abs(a.Least-least) > slack {
			t.Errorf("seed %d, case %d: least speed %.12g, by the scan %.12g", seed, i, a.Least, least)
		}
		for _, s := range a.Throws {
			if s.Speed < a.Least*(1-1e-9) || (s.Style == measure.Slowest) != (s.Speed <= a.Least*(1+1e-9)) {
				t.Errorf("seed %d, case %d: %s at %g m/s, least %g", seed, i, s.Style, s.Speed, a.Least)
			}
		}
	}
}

// TestThrowsInAir: throws in air, flown again as a release that is made of their
// speed, heading and elevation, arrive.
func TestThrowsInAir(t *testing.T) {
	const seed, cases = 34, 120
	rng := rand.New(rand.NewPCG(seed, 1))
	arrived, none := 0, 0
	for i := range cases {
		in, throw, c := randomCase(rng)
		in.Air = air.FromPressure(101325, 293.15)
		in.Bodies = []model.Body{{Name: "b", Mass: 0.2 * math.Exp(3*rng.Float64()), Diameter: 0.02 + 0.1*rng.Float64()}}
		throw.From.Height += 0.07 // room for the body
		throw.Target.Height += 0.07
		throw.Body = "b"
		throw.Longest = 0.7 * math.Pi / math.Abs(c.spin)
		switch i % 3 {
		case 0:
			throw.Speed = math.Abs(c.spin) * c.from * (0.5 + 2*rng.Float64())
		case 1:
			throw.Time, throw.Longest = throw.Longest*(0.1+0.8*rng.Float64()), 0
		case 2:
			throw.Least = true
		}
		p := hall(t, in, throw)
		out := solved(t, p)
		if len(out.Aims[0].Throws) == 0 {
			none++
		}
		for _, s := range out.Aims[0].Throws {
			if s.Outcome != measure.ThrowArrives {
				continue // a curved path may meet the floor
			}
			arrived++
			if s.Miss > out.Slack || throw.Speed > 0 && math.Abs(s.Speed-throw.Speed) > 1e-9*throw.Speed {
				t.Errorf("seed %d, case %d: off by %g m, %g allowed; %.12g m/s of %g", seed, i, s.Miss, out.Slack, s.Speed, throw.Speed)
			}
			if d := again(t, p, s.Throw); d > out.Slack {
				t.Errorf("seed %d, case %d: as a release it is off by %g m", seed, i, d)
			}
		}
	}
	t.Logf("%d arrive; %d cases without a throw", arrived, none)
	if arrived < cases/2 {
		t.Errorf("only %d arrivals", arrived)
	}
}

// again makes a release of a throw's speed, heading and elevation, and gives how
// far from the target it is when it should arrive, m.
func again(t *testing.T, p *study.Prepared, s measure.Throw) float64 {
	t.Helper()
	m, throw := p.Model, &p.Model.Throws[0]
	r := model.Release{Body: throw.Body, At: throw.From, Until: model.Until{Kind: model.UntilDuration, Duration: s.Time},
		Start: model.Start{Kind: model.Thrown, Speed: s.Speed, Heading: s.Heading, Elevation: s.Elevation}}
	let, fault := flight.Release(m, &r, nil)
	if fault.Msg != "" {
		t.Fatal(fault.Msg)
	}
	track, err := flight.NewFlier(m).Fly(&let)
	if err != nil {
		t.Fatal(err)
	}
	a := m.Motion.At(track.End)
	at := a.In(track.Last.Pos)
	to, err := m.Resolve(throw.Target.Station)
	if err != nil {
		t.Fatal(err)
	}
	v := to.Vec()
	return math.Sqrt(sq(at.X-v.X) + sq(at.Y-v.Y) + sq(at.Z-v.Z))
}

// TestThrowsMirrored: turned the other way round, with places and headings
// mirrored, a habitat has the same throws.
func TestThrowsMirrored(t *testing.T) {
	const seed, cases = 35, 20
	rng := rand.New(rand.NewPCG(seed, 1))
	for i := range cases {
		in, throw, c := randomCase(rng)
		in.Air = air.FromPressure(101325, 293.15)
		in.Bodies = []model.Body{{Name: "b", Mass: 1, Diameter: 0.05}}
		throw.From.Height += 0.03
		throw.Target.Height += 0.03
		throw.Body, throw.Speed, throw.Longest = "b", math.Abs(c.spin)*c.from*1.2+1, 2/math.Abs(c.spin)
		one := solved(t, hall(t, in, throw)).Aims[0].Throws
		in.Habitat.Spin = -c.spin
		throw.Target.Spinward.Value = -c.phi
		two := solved(t, hall(t, in, throw)).Aims[0].Throws
		if len(one) != len(two) {
			t.Errorf("seed %d, case %d: %d throws, mirrored %d", seed, i, len(one), len(two))
			continue
		}
		for k := range one {
			a, b := one[k], two[k]
			if math.Abs(a.Time-b.Time) > 1e-8*a.Time || math.Abs(a.V[0]+b.V[0])+math.Abs(a.V[1]-b.V[1])+math.Abs(a.V[2]-b.V[2]) > 1e-8*a.Speed || a.Outcome != b.Outcome {
				t.Errorf("seed %d, case %d, throw %d: %+v, mirrored %+v", seed, i, k, a.Throw, b.Throw)
			}
		}
	}
}
