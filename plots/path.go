package plots

import (
	"errors"
	"fmt"
	"math"
)

// PathViewSpec is what PathView draws: a crew path in the habitat frame, seen from the
// +axial end and turned so that the plumb line of its start is vertical. All places are
// in m, with x spinward and y up from the foot of the start on the deck beneath: a deck
// of radius R is the arc about (0, R).
type PathViewSpec struct {
	Title, Desc, Notes string // Desc is for readers who cannot see the figure; Notes may be empty

	Spin     float64       // rad/s; negative: the floor moves antispinward
	Deck     float64       // m, radius of the deck beneath the start; 0 for a flat deck
	Outlines []Outline     // section of the structure at the start's axial place; without any, the deck alone is drawn
	Way      []Point       // m, of the feet, in order of time; at least the start
	Stations []PathStation // moments at which the person is drawn, in order of time; may be empty
	Near     *PathNear     // where the path comes nearest to something; nil for none
}

// PathStation is the person at one moment of a crew path.
type PathStation struct {
	T          float64 // s since the start of the path
	Feet, Head Point   // m
	Force      Point   // N, of the person on the structure, in the fixed directions of the page; (0, 0) for none
	Leg        string  // what the person does; stations in a row with one name share a label; may be empty
}

// PathNear is where a crew path comes nearest to a surface.
type PathNear struct {
	T       float64 // s since the start of the path
	At      Point   // m, where the person is
	Gap     float64 // m, the clearance; negative for an overlap
	Surface string
}

// maxForce bounds forces, N: a person's are far below, and squares of it stay far from
// overflow.
const maxForce = 1e9

func (s PathViewSpec) check() error {
	if s.Deck < 0 {
		return fmt.Errorf("the deck's radius is %g m", s.Deck)
	}
	if len(s.Way) == 0 {
		return errors.New("a way wants at least one point")
	}
	if err := errors.Join(checkSizes(s.Deck), checkPlaces(s.Way), checkOutlines(s.Outlines)); err != nil {
		return err
	}
	for i, st := range s.Stations {
		if err := st.check(); err != nil {
			return fmt.Errorf("station %d: %w", i, err)
		}
		if i > 0 && st.T < s.Stations[i-1].T {
			return fmt.Errorf("station %d: the time runs back, to %g s", i, st.T)
		}
	}
	return s.Near.check()
}

func (s PathStation) check() error {
	if !finite(s.T) {
		return fmt.Errorf("the time is %g s", s.T)
	}
	if !s.Force.finite() || s.Force.norm() > maxForce {
		return fmt.Errorf("a force of (%g N, %g N) cannot be drawn", s.Force.X, s.Force.Y)
	}
	return checkPlaces([]Point{s.Feet, s.Head})
}

func (n *PathNear) check() error {
	if n == nil {
		return nil
	}
	if !finite(n.T) {
		return fmt.Errorf("the least clearance is at %g s", n.T)
	}
	return errors.Join(checkSizes(n.Gap), checkPlaces([]Point{n.At}))
}

// PathView draws a crew path as the people on board see it: the way of the feet, the
// person at the stations, and there the force on the structure, at a scale of its own
// that stands below. A path that goes far round the ring is shown on the whole ring. It
// is an error if a number cannot be drawn or the way is empty.
func PathView(spec PathViewSpec) (*Figure, error) {
	head := headline{spec.Title, spec.Desc, spec.Notes, spec.Spin}
	if err := errors.Join(head.check(), spec.check()); err != nil {
		return nil, fmt.Errorf("path view: %w", err)
	}
	p := crewPath{spec: spec, scene: scene{head: head, radius: spec.Deck, outlines: spec.Outlines, track: wayTrack(spec.Way)}}
	p.arrange()
	return newFigure(spec.Title, spec.Desc, p.w, p.h, p.paint)
}

// wayTrack is a way as a track, with its points for times: of a way the times are not known.
func wayTrack(way []Point) track {
	t := track{at: way, t: make([]float64, len(way)), ph: make([]Phase, len(way))}
	for i := range t.t {
		t.t[i] = float64(i)
	}
	return t
}

// tallest is the greatest length of the person on the page's plane, m.
func (s PathViewSpec) tallest() float64 {
	most := 0.0
	for _, st := range s.Stations {
		most = math.Max(most, st.Head.dist(st.Feet))
	}
	return most
}
