package plots

import (
	"errors"
	"fmt"
	"math"
)

// TrackPoint is one moment of a track.
type TrackPoint struct {
	T     float64 // s since the release
	X, Y  float64 // m, of the body's centre
	Phase string  // flight (or empty), slide, roll, rest: of the piece that begins here
}

// SideViewSpec is what SideView draws: one release in the habitat frame, seen from the
// +axial end and turned so that its plumb line is vertical. All places are in m, with x
// spinward and y up from the foot of the plumb line on the deck beneath: a deck of
// radius R is the arc about (0, R).
type SideViewSpec struct {
	Title, Desc, Notes string // Desc is for readers who cannot see the figure; Notes may be empty

	Spin       float64      // rad/s; negative: the floor moves antispinward
	Deck       float64      // m, radius of the deck beneath; 0 for a flat deck
	Outlines   []Outline    // section of the structure at the release's axial place; without any, the deck alone is drawn
	Track      []TrackPoint // at least the release; T never decreases
	TickEvery  float64      // s between time marks on the track; 0 picks 1, 2 or 5 times a power of ten
	Body       float64      // m, radius of the body; 0 for a point
	Uniform    []Point      // uniform-gravity path, from the release to its landing, height over arc wrapped onto the deck; nil for none
	Landing    *Point       // the body's centre at the landing; nil for none
	Surface    string       // what it lands on
	Rest       *Point       // the body's centre where it ends; nil for none
	Offset     float64      // m, deck offset, spinward positive; NaN for none
	Deflection float64      // m, apparent deflection, spinward positive; NaN for none
}

func (s SideViewSpec) check() error {
	if s.Deck < 0 || s.Body < 0 {
		return fmt.Errorf("deck radius %g m or body radius %g m is negative", s.Deck, s.Body)
	}
	if err := checkSizes(s.Deck, s.Body, orZero(s.Offset), orZero(s.Deflection)); err != nil {
		return err
	}
	if err := checkPlaces(s.Uniform, s.Landing, s.Rest); err != nil {
		return err
	}
	return checkOutlines(s.Outlines)
}

// orZero is v, or 0 for a NaN, which stands for none.
func orZero(v float64) float64 {
	if math.IsNaN(v) {
		return 0
	}
	return v
}

// SideView draws one release as the people on board see it. It is an error if a number
// cannot be drawn or the track is empty. A dimension that has no room is said in words.
func SideView(spec SideViewSpec) (*Figure, error) {
	s, err := newSide(spec)
	if err != nil {
		return nil, fmt.Errorf("side view: %w", err)
	}
	s.arrange()
	return newFigure(spec.Title, spec.Desc, s.w, s.h, s.paint)
}

func newSide(spec SideViewSpec) (*side, error) {
	head := headline{spec.Title, spec.Desc, spec.Notes, spec.Spin}
	tr, trErr := newTrack(spec.Track)
	if err := errors.Join(head.check(), spec.check(), trErr); err != nil {
		return nil, err
	}
	return &side{spec: spec, scene: scene{
		head: head, radius: spec.Deck, body: spec.Body, outlines: spec.Outlines,
		track: tr, every: spec.TickEvery, landing: spec.Landing, rest: spec.Rest, surface: spec.Surface,
	}}, nil
}
