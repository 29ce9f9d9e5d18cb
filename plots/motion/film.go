package motion

import (
	"errors"
	"fmt"
	"math"

	"offplumb/plots"
)

// State is where a body is and how it moves at one moment, in the inertial frame.
type State struct {
	T   float64    // s since the release
	Pos [3]float64 // m
	Vel [3]float64 // m/s
}

// Piece is a stretch of a track in which a body does one thing. Its states are close enough
// that a smooth curve through them is the motion; the first and the last are its ends.
type Piece struct {
	Phase  string // flight, slide, roll, rest
	States []State
}

// Event is a moment that a reader wants to see.
type Event struct {
	T    float64 // s since the release
	Name string  // a few words
	Kind Kind
}

// Kind says what an event is, which decides its mark.
type Kind int

// The kinds of events.
const (
	Impact  Kind = iota // a tick on the time strip only
	Release             // an open circle
	Landing             // a full circle
	Rest                // a square
	End                 // a tick: the film ends, the motion may not
	kinds
)

// Uniform is the uniform-gravity path, a parabola over a flat deck, laid onto a curved one.
type Uniform struct {
	Gravity     float64 // m/s^2
	Height      float64 // m, of the centre at the release above the foot of the plumb line
	Along, Up   float64 // m/s at the release, relative to the habitat
	Time        float64 // s, to its landing
	WhyNotDrawn string  // where it cannot be drawn: why; else empty
}

// Film is a release to be shown moving. Its places are described at the package.
//
// Law: the places shown are within a ten millionth of the motion's extent in the habitat
// frame of the states given, and the speeds within as much of the greatest, where the film
// then takes at most its share of a page; else within what it states.
type Film struct {
	Name  string // of the release
	Title string // what the picture shows
	Desc  string // for readers who cannot see it
	Notes string // a line below it; may be empty

	Spin     float64         // rad/s; negative: the floor moves antispinward
	Radius   float64         // m, of the deck beneath, or of the middle of a flat floor
	Flat     bool            // the floor beneath is flat
	Lean     float64         // rad, on a flat floor: from its middle's radius to the plumb line, counterclockwise
	Axial    float64         // m, what the tables count axial places from
	Body     float64         // m, radius of the body; 0 for a point
	Step     float64         // s, the output step
	Outlines []plots.Outline // section of the structure at the release's axial place, as it stands at the release
	Pieces   []Piece
	Events   []Event
	Uniform  *Uniform // nil for none
}

// largest bounds lengths, m, and times, s: beyond it a number is a slip.
const largest = 1e9

func sane(vs ...float64) bool {
	for _, v := range vs {
		if !(math.Abs(v) <= largest) {
			return false
		}
	}
	return true
}

func (f *Film) check() error {
	switch {
	case f.Name == "" || f.Title == "" || f.Desc == "":
		return errors.New("a film wants a name, a title and a description")
	case len(f.Pieces) == 0:
		return errors.New("a film wants at least one piece of a track")
	case !sane(f.Spin, f.Radius, f.Lean, f.Axial, f.Body, f.Step):
		return errors.New("a film has a number that cannot be drawn")
	case f.Radius <= 0 || f.Body < 0 || f.Step <= 0:
		return fmt.Errorf("deck radius %g m, body radius %g m, step %g s", f.Radius, f.Body, f.Step)
	}
	last := 0.0
	for i := range f.Pieces {
		if err := f.Pieces[i].check(&last); err != nil {
			return fmt.Errorf("piece %d: %w", i, err)
		}
	}
	return f.checkRest()
}

func (p *Piece) check(last *float64) error {
	if phaseCode(p.Phase) < 0 {
		return fmt.Errorf("no such phase: %q (flight, slide, roll, rest)", p.Phase)
	}
	if len(p.States) == 0 {
		return errors.New("it has no states")
	}
	for _, s := range p.States {
		if !sane(s.T) || !sane(s.Pos[:]...) || !sane(s.Vel[:]...) {
			return fmt.Errorf("the state at %g s cannot be drawn", s.T)
		}
		if s.T < *last {
			return fmt.Errorf("time runs back from %g s to %g s", *last, s.T)
		}
		*last = s.T
	}
	return nil
}

func (f *Film) checkRest() error {
	for _, e := range f.Events {
		if e.Kind < 0 || e.Kind >= kinds || !sane(e.T) {
			return fmt.Errorf("event %q: kind %d at %g s", e.Name, e.Kind, e.T)
		}
	}
	for _, o := range f.Outlines {
		for _, s := range o.Path {
			if !sane(s.From.X, s.From.Y, s.To.X, s.To.Y, s.Centre.X, s.Centre.Y, s.Radius, s.Start, s.End) {
				return fmt.Errorf("outline %q cannot be drawn", o.Name)
			}
		}
	}
	if u := f.Uniform; u != nil && (!sane(u.Gravity, u.Height, u.Along, u.Up, u.Time) || u.Time < 0) {
		return errors.New("the uniform-gravity path cannot be drawn")
	}
	return nil
}

var phaseNames = []string{"flight", "slide", "roll", "rest"}

// phaseCode is the number of a phase, -1 for none.
func phaseCode(name string) int {
	for i, n := range phaseNames {
		if n == name {
			return i
		}
	}
	return -1
}

// end is the time of the last state.
func (f *Film) end() float64 {
	p := f.Pieces[len(f.Pieces)-1]
	return p.States[len(p.States)-1].T
}

// foot is the distance of the foot of the plumb line from the axis, m.
func (f *Film) foot() float64 {
	if f.Flat {
		return f.Radius / math.Cos(f.Lean)
	}
	return f.Radius
}

// plumb is the place of distance r from the axis on the release's plumb line, at the release.
func (f *Film) plumb(r float64) plots.Point {
	sin, cos := math.Sincos(f.Lean)
	return plots.Point{X: r * sin, Y: -r * cos}
}
