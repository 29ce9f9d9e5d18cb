package flight_test

import (
	"fmt"
	"math"
	"math/rand/v2"

	"offplumb/sim/air"
	"offplumb/sim/frame"
	"offplumb/sim/model"
)

// longestRandom is how long a random release may take, s.
const longestRandom = 60

// world makes a random habitat: a cylinder that may have bulkheads, a ceiling,
// further decks with openings and coamings, boxes, walls with doorways, posts, a
// hub and spokes; or a room of another shape. Some of it may not fit: see
// [worlds].
func world(rng *rand.Rand) model.Model {
	r := math.Exp(between(rng, math.Log(4), math.Log(80)))
	gravity := math.Exp(between(rng, math.Log(0.2), math.Log(12)))
	in := ring(r, sign(rng)*math.Sqrt(gravity/r))
	in.Solver.MaxTime = longestRandom
	if rng.IntN(4) == 0 {
		otherShape(rng, &in)
		return in
	}
	h := &in.Habitat
	if rng.IntN(4) > 0 {
		h.Length = between(rng, 2, 12)
	}
	if rng.IntN(3) == 0 {
		h.CeilingRadius = between(rng, 0.5, 0.9) * r
	}
	if rng.IntN(2) == 0 {
		in.Air = air.FromPressure(between(rng, 2e4, 1.2e5), 293)
	}
	for i := range rng.IntN(3) {
		in.Decks = append(in.Decks, randomDeck(rng, &in, i))
	}
	if rng.IntN(3) == 0 { // hatches in the floor itself
		d := model.Deck{Name: model.FloorName, Friction: model.None, Restitution: model.None}
		d.Openings = randomOpenings(rng, "floor", r, h.Length)
		in.Decks = append(in.Decks, d)
	}
	for i := range rng.IntN(5) {
		in.Fixtures = append(in.Fixtures, randomFixture(rng, &in, i))
	}
	if h.CeilingRadius > 0 && rng.IntN(2) == 0 {
		hub := h.CeilingRadius * between(rng, 0.3, 0.6)
		in.Rooms = []model.Room{{Name: "hub", FloorRadius: hub, Length: between(rng, 1, 5)}}
		for i := range 1 + rng.IntN(2) {
			in.Passages = append(in.Passages, model.Passage{Name: fmt.Sprint("spoke ", i),
				Spinward:   model.Arc{Value: between(rng, -0.5, 0.5) + 2*float64(i), IsAngle: true},
				FromRadius: hub, ToRadius: h.CeilingRadius, Width: between(rng, 0.2, 0.6) * hub})
			if p := &in.Passages[i]; rng.IntN(3) == 0 {
				p.Width, p.Diameter = 0, p.Width
			}
		}
	}
	return in
}

// otherShape makes the habitat a torus, a sphere or a cabin, with fixtures and
// perhaps a hub and a spoke.
func otherShape(rng *rand.Rand, in *model.Model) {
	h := &in.Habitat
	r := h.FloorRadius
	top := r * between(rng, 0.6, 0.9)
	switch h.Shape = []model.Shape{model.Torus, model.Sphere, model.Cabin}[rng.IntN(3)]; h.Shape {
	case model.Torus:
		h.TubeRadius, h.FlatFloor = between(rng, 0.1, 0.3)*r, rng.IntN(2) == 0
		top = r - 2*h.TubeRadius
	case model.Cabin:
		h.Size = [3]float64{between(rng, 1, 6), between(rng, 1, 6), r - top}
	}
	for i := range rng.IntN(3) {
		in.Fixtures = append(in.Fixtures, randomFixture(rng, in, i))
	}
	if rng.IntN(2) == 0 {
		hub := top * between(rng, 0.2, 0.5)
		in.Rooms = []model.Room{{Name: "hub", FloorRadius: hub, Length: between(rng, 1, 5)}}
		in.Passages = []model.Passage{{Name: "spoke", FromRadius: hub, ToRadius: top + between(rng, 0, 0.1), Spinward: model.Arc{Value: between(rng, -0.1, 0.1), IsAngle: true}}}
		if w := between(rng, 0.1, 0.6) * hub; rng.IntN(2) == 0 {
			in.Passages[0].Width = w
		} else {
			in.Passages[0].Diameter = w
		}
	}
}

// turning gives a habitat up to three changes of its spin, or a coning, or both.
// Releases begin at the start, so that some changes find the bodies in flight,
// some in contact and some at rest.
func turning(rng *rand.Rand, in *model.Model) {
	h := &in.Habitat
	kind := rng.IntN(3)
	if kind != 1 {
		at := 0.0
		for range 1 + rng.IntN(3) {
			c := frame.Change{Start: at + between(rng, 0, 12), Over: math.Exp(between(rng, math.Log(0.05), math.Log(20))), Linear: rng.IntN(2) == 0}
			c.To = h.Spin * []float64{0, 1, -1, between(rng, -1.5, 1.5), between(rng, 0.8, 1.2)}[rng.IntN(5)]
			h.Changes = append(h.Changes, c)
			at = c.End() * float64(rng.IntN(2)) // overlaps are refused
			if at == 0 {
				break
			}
		}
	}
	if kind != 0 {
		swing := 2 * math.Pi / math.Abs(h.Spin)
		h.Coning = frame.Coning{HalfAngle: math.Exp(between(rng, -6, 0)), Phase: between(rng, -3, 3), Period: sign(rng) * swing * math.Exp(between(rng, -1, 3))}
	}
}

// sign gives 1 or -1.
func sign(rng *rand.Rand) float64 { return float64(2*rng.IntN(2) - 1) }

// maybe gives a number from lo to hi, or now and then none.
func maybe(rng *rand.Rand, lo, hi float64) float64 {
	if rng.IntN(2) == 0 {
		return model.None
	}
	return between(rng, lo, hi)
}

// along is an axial place within a habitat of a length (m; 0: endless).
func along(rng *rand.Rand, length float64) float64 {
	if length == 0 {
		length = 8
	}
	return between(rng, -0.5, 0.5) * length
}

func randomDeck(rng *rand.Rand, in *model.Model, i int) model.Deck {
	r := in.Habitat.FloorRadius
	d := model.Deck{Name: fmt.Sprint("deck ", i), Radius: r * between(rng, 0.6, 0.93), Whole: rng.IntN(2) == 0,
		Thickness: between(rng, 0.01, 0.1), Friction: maybe(rng, 0, 1), Restitution: maybe(rng, 0, 1)}
	if !d.Whole {
		d.From = model.Arc{Value: between(rng, -2, 0), IsAngle: true}
		d.To = model.Arc{Value: d.From.Value + between(rng, 0.3, 4), IsAngle: true}
	}
	if rng.IntN(3) == 0 {
		half := in.Habitat.Length / 2
		if half == 0 {
			half = 4
		}
		d.HasAxial, d.Axial = true, [2]float64{-half * rng.Float64(), half * rng.Float64()}
	}
	d.Openings = randomOpenings(rng, d.Name, d.Radius, in.Habitat.Length)
	return d
}

func randomOpenings(rng *rand.Rand, deck string, r, length float64) (out []model.Opening) {
	for i := range rng.IntN(3) {
		o := model.Opening{Name: fmt.Sprint(deck, " hatch ", i), Spinward: model.Arc{Value: between(rng, -0.5, 0.5) + float64(i), IsAngle: true},
			Axial: along(rng, length) / 2, Size: [2]float64{between(rng, 0.2, 1), between(rng, 0.2, 1)}, Closed: rng.IntN(4) == 0}
		if rng.IntN(2) == 0 {
			o.Coaming = between(rng, 0.02, 0.3)
		}
		out = append(out, o)
	}
	return out
}

func randomFixture(rng *rand.Rand, in *model.Model, i int) model.Fixture {
	r, length := in.Habitat.FloorRadius, in.Habitat.Length
	f := model.Fixture{Name: fmt.Sprint("fixture ", i), Friction: maybe(rng, 0, 1), Restitution: maybe(rng, 0, 1)}
	at := model.Station{Spinward: model.Arc{Value: between(rng, -0.6, 0.6), IsAngle: true}, Axial: along(rng, length)}
	if rng.IntN(2) == 0 {
		f.Kind, f.At = model.Box, at
		f.At.Height = float64(rng.IntN(2)) * between(rng, 0, 1)
		f.Size = [3]float64{between(rng, 0.2, 2), between(rng, 0.2, 2), between(rng, 0.1, 1)}
		f.Turn = float64(rng.IntN(2)) * between(rng, -2, 2)
		return f
	}
	if rng.IntN(3) == 0 {
		f.Kind, f.From, f.To, f.Diameter = model.Post, at, at, between(rng, 0.02, 0.2)
		f.To.Height, f.To.Axial = between(rng, 0.3, 2), f.To.Axial+float64(rng.IntN(2))*between(rng, -1, 1)
		return f
	}
	f.Kind, f.From, f.To, f.Height, f.Thickness = model.Wall, at, at, between(rng, 0.2, 0.9)*math.Min(2, r), between(rng, 0.02, 0.2)
	long := between(rng, 0.5, 4)
	if rng.IntN(2) == 0 {
		f.To.Axial += long
	} else {
		f.To.Spinward.Value += long / r
	}
	if rng.IntN(2) == 0 {
		f.Doorway = &model.Doorway{At: long / 2, Width: long * between(rng, 0.1, 0.9), Height: f.Height * between(rng, 0.3, 1)}
	}
	return f
}

// randomBody makes a body; one in five is of an extreme kind.
func randomBody(rng *rand.Rand, i int) model.Body {
	b := model.Body{Name: fmt.Sprint("body ", i), Mass: math.Exp(between(rng, -6, 3)), Diameter: math.Exp(between(rng, math.Log(0.004), math.Log(0.5))),
		Restitution: rng.Float64(), Friction: between(rng, 0, 1.2), Rolls: rng.IntN(3) == 0}
	switch rng.IntN(10) {
	case 0:
		b.Diameter = 0
	case 1:
		b.Restitution = float64(rng.IntN(2))
	case 2:
		b.Friction = 0
	}
	return b
}

// randomRelease lets a body go anywhere, at rest or with some speed.
func randomRelease(rng *rand.Rand, in *model.Model, i int) model.Release {
	h := &in.Habitat
	r := model.Release{Name: fmt.Sprint("release ", i), Body: in.Bodies[rng.IntN(len(in.Bodies))].Name}
	high, aside := h.FloorRadius*math.Pow(rng.Float64(), 2), 0.7
	if h.Shape == model.Cabin {
		high, aside = h.Size[2]*rng.Float64(), h.Size[0]/2/h.FloorRadius
	}
	r.At = model.Station{Spinward: model.Arc{Value: between(rng, -aside, aside), IsAngle: true}, Axial: along(rng, h.Length), Radius: h.FloorRadius - high, HasRadius: true}
	switch rng.IntN(4) {
	case 0:
		r.Start.Kind = model.Still
	case 1, 2:
		v := math.Exp(between(rng, -4, math.Log(12)))
		r.Start = model.Start{Kind: model.Velocity, VSpinward: v * between(rng, -1, 1), VAxial: v * between(rng, -1, 1), VUp: v * between(rng, -1, 1)}
	}
	return r
}

// worlds makes a checked random habitat with n releases that have room, or nil
// where it does not fit together.
// It turns as a function makes it; nil: steadily.
func worlds(rng *rand.Rand, n int, turn func(*rand.Rand, *model.Model)) *model.Model {
	in := world(rng)
	if turn != nil {
		turn(rng, &in)
	}
	for i := range 3 {
		in.Bodies = append(in.Bodies, randomBody(rng, i))
	}
	m, problems := model.New(in)
	if len(problems) > 0 {
		return nil
	}
	for try := 0; len(in.Releases) < n && try < 20*n; try++ {
		r := randomRelease(rng, &in, len(in.Releases))
		if p, err := m.Resolve(r.At); err == nil && m.Obstructed(p, m.BodyOf(&r).Diameter/2) == "" {
			in.Releases = append(in.Releases, r)
		}
	}
	m, problems = model.New(in)
	if len(problems) > 0 {
		return nil
	}
	return m
}
