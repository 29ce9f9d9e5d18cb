package flight_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/flight"
	"offplumb/sim/frame"
	"offplumb/sim/model"
)

// mirrored is a habitat with its releases seen in a mirror along the axis:
// spinward turns into antispinward.
func mirrored(in model.Model) model.Model {
	out := in
	out.Habitat.Spin = -in.Habitat.Spin
	out.Habitat.Changes = append([]frame.Change(nil), in.Habitat.Changes...)
	for i := range out.Habitat.Changes {
		out.Habitat.Changes[i].To *= -1
	}
	out.Habitat.Coning.Period *= -1
	out.Habitat.Coning.Phase *= -1
	out.Decks = append([]model.Deck(nil), in.Decks...)
	for i := range out.Decks {
		d := &out.Decks[i]
		d.From.Value, d.To.Value = -in.Decks[i].To.Value, -in.Decks[i].From.Value
		d.Openings = append([]model.Opening(nil), d.Openings...)
		for k := range d.Openings {
			d.Openings[k].Spinward.Value *= -1
		}
	}
	out.Passages = append([]model.Passage(nil), in.Passages...)
	for i := range out.Passages {
		out.Passages[i].Spinward.Value *= -1
	}
	out.Fixtures = append([]model.Fixture(nil), in.Fixtures...)
	for i := range out.Fixtures {
		f := &out.Fixtures[i]
		f.At.Spinward.Value, f.Turn = -f.At.Spinward.Value, -f.Turn
		f.From.Spinward.Value, f.To.Spinward.Value = -f.From.Spinward.Value, -f.To.Spinward.Value
	}
	out.Releases = append([]model.Release(nil), in.Releases...)
	for i := range out.Releases {
		out.Releases[i].At.Spinward.Value *= -1
		out.Releases[i].Start.VSpinward *= -1
	}
	return out
}

// inMirror gives the mirror image of a place or velocity.
func inMirror(v r3.Vec) r3.Vec { return r3.Vec{X: v.X, Y: -v.Y, Z: v.Z} }

// mostMirrored is how many phases of a track are compared: each bounce on
// something round makes the roundings grow some times.
const mostMirrored = 6

// TestMirroredStory tries that with negative spin a habitat and a release that
// are mirrored give the mirrored story: the same phases, on mirrored ways.
func TestMirroredStory(t *testing.T) { mirrorStories(t, 11, 150, nil) }

// TestMirroredStoryOfUnsteadyTurning tries it where the spin changes and the
// axis cones.
func TestMirroredStoryOfUnsteadyTurning(t *testing.T) { mirrorStories(t, 12, 60, turning) }

func mirrorStories(t *testing.T, stream uint64, n int, turn func(*rand.Rand, *model.Model)) {
	t.Helper()
	compared, moved := 0, 0
	for i := uint64(0); compared < n; i++ {
		rng := rand.New(rand.NewPCG(stream, i))
		in := worldOf(rng)
		if turn != nil {
			turn(rng, &in)
		}
		m, problems := model.New(in)
		other, more := model.New(mirrored(in))
		if len(problems) > 0 || len(more) > 0 || len(in.Releases) == 0 {
			continue
		}
		for k := range m.Releases {
			a, b := flyNth(t, m, k), flyNth(t, other, k)
			compared++
			if !sameStory(t, m, other, a, b) {
				t.Fatalf("world of PCG(%d, %d), %s of %+v:\n%s\n%s", stream, i, m.Releases[k].Name, m.BodyOf(&m.Releases[k]), kinds(a), kinds(b))
			}
			if len(a.Phases) > 1 {
				moved++
			}
		}
	}
	if moved < compared/2 {
		t.Errorf("only %d of %d moved", moved, compared)
	}
}

// worldOf is a random habitat with releases in it.
func worldOf(rng *rand.Rand) model.Model {
	in := world(rng)
	for i := range 3 {
		in.Bodies = append(in.Bodies, randomBody(rng, i))
	}
	m, problems := model.New(in)
	for try := 0; len(problems) == 0 && len(in.Releases) < 3 && try < 60; try++ {
		r := randomRelease(rng, &in, len(in.Releases))
		if p, err := m.Resolve(r.At); err == nil && m.Obstructed(p, m.BodyOf(&r).Diameter/2) == "" {
			in.Releases = append(in.Releases, r)
		}
	}
	return in
}

func flyNth(t *testing.T, m *model.Model, k int) *flight.Track {
	t.Helper()
	let, problem := flight.Release(m, &m.Releases[k], nil)
	if problem.Msg != "" {
		t.Fatal(problem)
	}
	track, err := flight.NewFlier(m).Fly(&let)
	if err != nil {
		t.Fatal(err)
	}
	return track
}

// sameStory compares the first phases of two tracks.
func sameStory(t *testing.T, m, n *model.Model, a, b *flight.Track) bool {
	t.Helper()
	if len(a.Phases) <= mostMirrored && (len(a.Phases) != len(b.Phases) || a.Outcome != b.Outcome) {
		t.Errorf("outcomes %v and %v of %d and %d phases", a.Outcome, b.Outcome, len(a.Phases), len(b.Phases))
		return false
	}
	for i := range min(len(a.Phases), len(b.Phases), mostMirrored) {
		p, q := &a.Phases[i], &b.Phases[i]
		if p.Kind != q.Kind || math.Abs(p.T1-q.T1) > 1e-5*(1+p.T1) {
			t.Errorf("phase %d: %v until %.12g s, and %v until %.12g s", i, p.Kind, p.T1, q.Kind, q.T1)
			return false
		}
		time := (p.T0 + p.T1) / 2
		s, r := local(m, a, time), local(n, b, time)
		if off := r3.Norm(r3.Sub(inMirror(s.Pos), r.Pos)); off > 1e-4*(1+p.T1) {
			t.Errorf("phase %d, %v: %.3g m off the mirror image after %g s", i, p.Kind, off, time)
			return false
		}
	}
	return true
}
