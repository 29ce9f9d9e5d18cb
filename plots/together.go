package plots

import (
	"errors"
	"fmt"
	"math"
)

// TogetherViewSpec is what TogetherView draws: several releases in one side view, seen
// from the +axial end and turned so that the plumb line of the first is vertical. All
// places are in m, with x spinward and y up from the foot of that plumb line, as in a
// SideViewSpec.
type TogetherViewSpec struct {
	Title, Desc, Notes string // Desc is for readers who cannot see the figure; Notes may be empty

	Spin     float64   // rad/s; negative: the floor moves antispinward
	Deck     float64   // m, radius of the deck beneath the first; 0 for a flat deck
	Outlines []Outline // section of the structure; without any, the deck alone is drawn
	Tracks   []TogetherTrack
}

// TogetherTrack is one release of a TogetherView.
type TogetherTrack struct {
	Name, Words string // Words stand under the name in the list, such as where it lands; may be empty
	Track       []TrackPoint
	Landing     *Point  // the body's centre at the landing; nil for none
	Rest        *Point  // the body's centre where it ends; nil for none
	Body        float64 // m, radius of the body; 0 for a point
}

func (s TogetherViewSpec) check() error {
	if s.Deck < 0 {
		return fmt.Errorf("deck radius %g m is negative", s.Deck)
	}
	if len(s.Tracks) == 0 {
		return errors.New("there are no tracks")
	}
	if err := checkSizes(s.Deck); err != nil {
		return err
	}
	for _, t := range s.Tracks {
		if t.Body < 0 {
			return fmt.Errorf("%q: the body's radius is %g m", t.Name, t.Body)
		}
		if err := errors.Join(checkSizes(t.Body), checkPlaces(nil, t.Landing, t.Rest)); err != nil {
			return fmt.Errorf("%q: %w", t.Name, err)
		}
	}
	return checkOutlines(s.Outlines)
}

// TogetherView draws several releases as the people on board see them. Each has a number
// at its end, by which a list names it. It is an error if a number cannot be drawn, or
// there is no track.
func TogetherView(spec TogetherViewSpec) (*Figure, error) {
	head := headline{spec.Title, spec.Desc, spec.Notes, spec.Spin}
	err := errors.Join(head.check(), spec.check())
	s := several{spec: spec}
	for i, t := range spec.Tracks {
		tr, trErr := newTrack(t.Track)
		if trErr != nil {
			err = errors.Join(err, fmt.Errorf("track %d, %q: %w", i, t.Name, trErr))
		}
		s.tracks = append(s.tracks, tr)
	}
	if err != nil {
		return nil, fmt.Errorf("side view of several: %w", err)
	}
	s.arrange()
	return newFigure(spec.Title, spec.Desc, s.w, s.h, s.paint)
}

// several is a side view of several releases at work.
type several struct {
	stage
	spec   TogetherViewSpec
	tracks []track
	ticks  [][]timeMark
	step   float64 // s between time marks, the same on all tracks
	list   []listEntry
	lost   []string
}

// shown is what the view must show: each track up to its end, and the plumb lines.
func (s *several) shown() (must area) {
	for i, t := range s.tracks {
		flown, body := t, s.spec.Tracks[i].Body
		if l := s.spec.Tracks[i].Landing; l != nil {
			flown = t.upTo(t.when(*l))
			must.add(*l)
		}
		var a area
		a.add(flown.at...)
		a.grow(body)
		must.add(a.min, a.max)
		must.add(s.foot(t.at[0]))
	}
	if size := must.size(); math.Max(size.X, size.Y) < 1e-9 {
		must.grow(0.5)
	}
	full := must
	for i, t := range s.tracks {
		full.add(t.at...)
		if r := s.spec.Tracks[i].Rest; r != nil {
			full.add(*r)
		}
	}
	return better(must, full)
}

// foot is the foot of the plumb line through p.
func (s *several) foot(p Point) Point {
	d := deckLine{radius: s.spec.Deck}
	return d.place(d.foot(p))
}

// gone is the largest angle, rad, that a track goes round the axis within a.
func (s *several) gone(a area) float64 {
	most := 0.0
	for _, t := range s.tracks {
		one := scene{radius: s.spec.Deck, track: t}
		most = math.Max(most, one.gone(a))
	}
	return most
}

func (s *several) arrange() {
	must := s.shown()
	if s.gone(must) > wholeFrom {
		must.addArc(Point{0, s.spec.Deck}, s.spec.Deck, 0, 2*math.Pi)
	}
	plan := sheetPlan{title: s.spec.Title, notes: s.spec.Notes, side: planColumn, strip: true}
	s.stage = newStage(plan, must, frame{left: 26, right: 26, top: 24, bottom: 26})
	s.step = s.markStep()
	for _, t := range s.tracks {
		marks, _ := t.timeMarks(s.v, s.step)
		s.ticks = append(s.ticks, marks)
	}
	s.entries()
	s.label()
}

// markStep is the time between marks, fit for the flights and not too many for the longest.
func (s *several) markStep() float64 {
	const wanted = 8 // marks
	flight, longest := 0.0, 0.0
	for i, t := range s.tracks {
		end := t.moves() - t.t[0]
		longest = math.Max(longest, end)
		if l := s.spec.Tracks[i].Landing; l != nil {
			end = t.when(*l) - t.t[0]
		}
		flight = math.Max(flight, end)
	}
	return math.Max(stepFor(flight, wanted), stepFor(longest, maxMarks))
}

func (s *several) entries() {
	for i, t := range s.spec.Tracks {
		s.list = append(s.list, listEntry{number: i + 1, words: t.Name, under: t.Words, key: trackPen(i, Flight)})
	}
}

// ends are the places at which a track has its number, the best first.
func (s *several) ends(i int) []Point {
	var out []Point
	for _, p := range []*Point{s.spec.Tracks[i].Landing, s.spec.Tracks[i].Rest} {
		if p != nil {
			out = append(out, *p)
		}
	}
	return append(out, s.tracks[i].last(), s.tracks[i].at[0])
}
