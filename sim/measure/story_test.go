package measure_test

import (
	"fmt"
	"math"
	"strings"
	"testing"

	"offplumb/sim/flight"
	"offplumb/sim/measure"
	"offplumb/sim/model"
	"offplumb/sim/table"
)

// three writes a number as stories do.
func three(x float64) string { return table.Round(x, 3) }

// TestStoryOfDrop tries the story of a drop in vacuum by its closed form: the
// touch after tan(theta)/omega with omega times the tangent's length.
func TestStoryOfDrop(t *testing.T) {
	const r, spin, h = 18.0, 0.5, 1.6
	from, at := r-h, r-0.1
	way := math.Sqrt(at*at - from*from)
	time, speed := way/from/spin, spin*way
	for _, c := range []struct {
		mass   float64
		energy string
	}{{2, ", " + three(speed*speed) + " J"}, {0, ""}} {
		b := ball(0, 0.4)
		b.Mass = c.mass
		m, track := follow(t, ring(r, spin), model.Release{Name: "r", Own: b, At: model.Station{Height: h}, Until: model.Until{Kind: model.UntilLanding}})
		want := fmt.Sprintf("touches floor at %s s with %s m/s%s", three(time), three(speed), c.energy)
		if got := measure.EndOf(m, track).Story; got != want {
			t.Errorf("got  %s\nwant %s", got, want)
		}
	}
}

// TestStoryOfSlide tries that of a body set down sliding spinward, by the closed
// form of TestSlideOnFloor; it stops after (q/mu)(1/U - 1/u).
func TestStoryOfSlide(t *testing.T) {
	const r, spin, mu, v = 18.0, 0.5, 0.3, 3.0
	q := r - 0.1
	floor, u := spin*q, spin*q+v
	m, track := follow(t, ring(r, spin), model.Release{Name: "r", Own: ball(0.3, mu), At: model.Station{Height: 0.1}, Start: model.Start{Kind: model.Velocity, VSpinward: v}})
	want := fmt.Sprintf("touches floor at 0 s with 3.00 m/s, 9.00 J; slides %s m on floor; rests at %s s",
		three(q/mu*(math.Log(u/floor)-1+floor/u)), three(q/mu*(1/floor-1/u)))
	if got := measure.EndOf(m, track).Story; got != want {
		t.Errorf("got  %s\nwant %s", got, want)
	}
}

// TestStoryCountsBounces tries that the bounces on one surface are counted, not
// told each, and counted anew on the next; and the words of each end.
func TestStoryCountsBounces(t *testing.T) {
	b := ball(0.5, 0.3)
	m, track := follow(t, ring(18, 0.5), model.Release{Name: "r", Own: b, At: model.Station{Height: 2}})
	story := measure.EndOf(m, track).Story
	n := 0
	for _, e := range measure.Events(m, track) {
		if e.NormalSpeed > 1e-3 {
			n++
		}
	}
	parts := strings.Split(story, "; ")
	if n < 3 || track.Outcome != flight.Rested || parts[1] != fmt.Sprintf("bounces there %d times more", n-1) || strings.Count(story, "touches") != 1 {
		t.Errorf("%d impacts: %s", n, story)
	}
	if last := parts[len(parts)-1]; last != "rests at "+three(track.End)+" s" {
		t.Errorf("ends with %q", last)
	}
}

// TestStoriesEnd tries the words of other ends.
func TestStoriesEnd(t *testing.T) {
	hatch := model.Deck{Name: "floor", Friction: model.None, Restitution: model.None,
		Openings: []model.Opening{{Name: "outer hatch", Size: [2]float64{1, 1}}}}
	for _, c := range []struct {
		decks []model.Deck
		r     model.Release
		want  string
	}{
		{nil, model.Release{At: model.Station{Height: 2}, Until: model.Until{Kind: model.UntilDuration, Duration: 0.4}}, "still moves at 0.400 s"},
		{[]model.Deck{hatch}, model.Release{At: model.Station{Height: 0.3}}, "is lost at "},
	} {
		c.r.Name, c.r.Own = "r", ball(0.2, 0.4)
		m, track := follow(t, ring(18, 0.5, c.decks...), c.r)
		if got := measure.EndOf(m, track).Story; !strings.HasPrefix(got, c.want) {
			t.Errorf("got %q, want %q", got, c.want)
		}
	}
}

// TestStoryOfPassage tries that a story tells by which passage a body arrives,
// and then names a surface again that it has touched before.
func TestStoryOfPassage(t *testing.T) {
	m, track := follow(t, spokes(0.5, false), model.Release{Name: "r", Own: ball(0.2, 0.3), At: model.Station{HasRadius: true, Radius: 8, Axial: 0.5}})
	story := measure.EndOf(m, track).Story
	at := 0
	for _, word := range []string{"touches spoke A antispinward wall at ", "; slides ", " m on spoke A antispinward wall; ", "leaves spoke A at ", "; touches floor at ", "; rests at "} {
		i := strings.Index(story[at:], word)
		if i < 0 {
			t.Fatalf("%q does not follow in: %s", word, story)
		}
		at += i + len(word)
	}
	if strings.Count(story, "leaves") != 1 {
		t.Error(story)
	}
}
