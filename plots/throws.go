package plots

import (
	"errors"
	"fmt"
	"math"

	"gonum.org/v1/plot/vg"
)

// ThrowViewSpec is what ThrowView draws: the throws that reach a target, in the habitat
// frame, seen from the +axial end and turned so that the plumb line of the thrower's hand
// is vertical. All places are in m, with x spinward and y up from the foot of that plumb
// line on the deck beneath: a deck of radius R is the arc about (0, R).
type ThrowViewSpec struct {
	Title, Desc, Notes string // Desc is for readers who cannot see the figure; Notes may be empty

	Spin     float64     // rad/s; negative: the floor moves antispinward
	Deck     float64     // m, radius of the deck beneath; 0 for a flat deck
	Outlines []Outline   // section of the structure at the thrower's axial place
	From     Point       // where they are thrown
	Targets  []ThrowMark // what is to be reached, where it is then
	Throws   []ThrowLine // at least one
}

// ThrowMark is a named place.
type ThrowMark struct {
	At   Point // m
	Name string
}

// ThrowLine is one throw.
type ThrowLine struct {
	Name  string
	Track []TrackPoint
	Hits  string // what it ends at before it arrives; empty: it arrives
}

// MostThrows is how many throws can be told apart in one view.
const MostThrows = 12

func (s ThrowViewSpec) check() error {
	if s.Deck < 0 || len(s.Throws) == 0 || len(s.Throws) > MostThrows {
		return fmt.Errorf("deck of radius %g m, %d throws", s.Deck, len(s.Throws))
	}
	places := []Point{s.From}
	for _, t := range s.Targets {
		places = append(places, t.At)
	}
	return errors.Join(checkSizes(s.Deck), checkPlaces(places), checkOutlines(s.Outlines))
}

// ThrowView draws the throws of a study together, at true scale: a line each, named
// where it stands. One that hits something ends there, at a cross.
func ThrowView(spec ThrowViewSpec) (*Figure, error) {
	head := headline{spec.Title, spec.Desc, spec.Notes, spec.Spin}
	err := errors.Join(head.check(), spec.check())
	s := throwView{scene: scene{head: head, radius: spec.Deck, outlines: spec.Outlines}, spec: spec}
	for _, t := range spec.Throws {
		tr, trErr := newTrack(t.Track)
		s.tracks, err = append(s.tracks, tr), errors.Join(err, trErr)
	}
	if err != nil {
		return nil, fmt.Errorf("view of throws: %w", err)
	}
	s.arrange()
	return newFigure(spec.Title, spec.Desc, s.w, s.h, s.paint)
}

// throwView is a view of throws at work.
type throwView struct {
	scene
	spec   ThrowViewSpec
	tracks []track
	marks  [][]timeMark // of each track
	tick   float64      // s between time marks
}

func (s *throwView) arrange() {
	var must area
	deck := deckLine{radius: s.radius}
	must.add(Point{}, s.spec.From)
	for _, t := range s.spec.Targets {
		must.add(t.At, deck.place(deck.foot(t.At)))
	}
	for _, tr := range s.tracks {
		must.add(tr.at...)
	}
	for _, tr := range s.tracks {
		s.track = tr
		s.whole = s.whole || s.gone(must) > wholeFrom
	}
	const edge = 30 // pt, for names
	f := frame{left: edge, right: edge, top: edge, bottom: edge}
	if s.whole {
		must.addArc(Point{0, s.radius}, s.radius, 0, 2*math.Pi)
	}
	s.stage = newStage(sheetPlan{title: s.head.title, notes: s.head.notes, strip: true}, must, f)
	s.timing()
	s.keepOff()
	s.label()
	s.lost = s.pl.solve()
}

// timing puts marks of one step on all throws.
func (s *throwView) timing() {
	longest := 0.0
	for _, tr := range s.tracks {
		longest = math.Max(longest, tr.t[len(tr.t)-1])
	}
	s.tick = stepFor(longest, 10)
	for _, tr := range s.tracks {
		marks, step := tr.timeMarks(s.v, s.tick)
		if step != s.tick {
			marks = nil
		}
		s.marks = append(s.marks, marks)
	}
}

// keepOff tells the placer what the labels keep off.
func (s *throwView) keepOff() {
	s.v.shy(s.pl, s.spec.Outlines)
	s.pl.polyline(pricePlumb, s.v.pt(s.spec.From), s.v.pt(Point{}))
	s.pl.mark(s.v.pt(s.spec.From), ringRadius)
	for _, t := range s.spec.Targets {
		s.pl.mark(s.v.pt(t.At), targetRadius)
	}
	for _, tr := range s.tracks {
		s.pl.polyline(priceStrong, s.v.pts(tr.at)...)
	}
	if s.axisShown() {
		s.pl.mark(s.v.pt(Point{0, s.radius}), spinArrowRadius)
	}
}

func (s *throwView) label() {
	lines := make([][]vg.Point, len(s.tracks))
	for i, tr := range s.tracks {
		lines[i] = s.v.pts(tr.at)
	}
	for i, tr := range s.tracks {
		at := apart(lines, i)
		name := clean(s.spec.Throws[i].Name)
		if hits := clean(s.spec.Throws[i].Hits); hits != "" {
			name += ", " + hits
		}
		s.pl.add(label{s: name, size: sizeLabel, ink: inkText, clear: 3, need: true, at: at[0], or: at[1:], key: throwPen(i)})
		if s.spec.Throws[i].Hits != "" {
			s.pl.mark(s.v.pt(tr.last()), crossHalf)
		}
	}
	s.name(s.spec.From, ringRadius+1.5, anyWay, "thrown here")
	for _, t := range s.spec.Targets {
		s.name(t.At, targetRadius+1.5, anyWay, t.Name)
	}
	if s.axisShown() {
		s.pl.add(label{s: "spin axis", size: sizeNote, ink: inkSoft, at: s.v.pt(Point{0, s.radius}), clear: spinArrowRadius + 2, want: toRight})
	}
	s.outlineNames(s.spec.Outlines)
}

// targetRadius is that of the mark of a target, pt: two rings.
const targetRadius = 5.0

// throwPen draws throw i: strong, as what moves is.
func throwPen(i int) pen {
	n := seriesPen(i)
	n.width = 1.7
	return n
}

func (s *throwView) paint(p *pad) {
	v := s.v
	v.structure(p, s.spec.Outlines)
	if len(s.spec.Outlines) == 0 && s.radius > 0 {
		v.strokeArc(p, penDeck, v.arc(Point{0, s.radius}, s.radius, -1.5*math.Pi, 0.5*math.Pi))
	}
	p.rect(s.win, penFrame)
	v.strokeLine(p, penPlumb, v.pts([]Point{s.spec.From, {}}))
	if s.axisShown() {
		at := v.pt(Point{0, s.radius})
		p.axisMark(at)
		p.spinArrow(at, spinArrowRadius, s.head.spin)
	}
	for i, tr := range s.tracks {
		v.strokeLine(p, throwPen(i), v.pts(tr.at))
		p.timeMarks(s.marks[i])
	}
	for i, tr := range s.tracks {
		if s.spec.Throws[i].Hits != "" {
			p.cross(v.pt(tr.last()))
		}
	}
	for _, t := range s.spec.Targets {
		p.target(v.pt(t.At))
	}
	p.ring(v.pt(s.spec.From), inkText)
	s.pl.draw(p)
	s.drawStrip(p, "spinward", "up", s.statement(" Marks across the lines stand "+seconds(s.tick)+" apart."))
	s.sheet.draw(p)
}

// target is the mark of what is to be reached.
func (p *pad) target(at vg.Point) {
	p.fill(inkPaper, p.circlePath(at, targetRadius))
	p.stroke(pen{ink: inkText, width: 1}, p.circlePath(at, targetRadius))
	p.fill(inkText, p.circlePath(at, 1.8))
}
