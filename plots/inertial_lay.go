package plots

import (
	"errors"
	"math"

	"gonum.org/v1/plot/vg"
)

// inertial is an inertial view at work. It keeps its places from the foot of the plumb
// line at release, as a side view does.
type inertial struct {
	scene
	spec   InertialViewSpec
	before []Outline // the structure at release
	turned float64   // rad, from release to landing
	detail *detail   // of a landing whose offset is a hair; nil: it is not
}

func newInertial(spec InertialViewSpec) (*inertial, error) {
	head := headline{spec.Title, spec.Desc, spec.Notes, spec.Spin}
	tr, trErr := newTrack(spec.Path)
	if err := errors.Join(head.check(), spec.check(), trErr); err != nil {
		return nil, err
	}
	r := spec.Foot.norm()
	turn := -math.Pi/2 - math.Atan2(spec.Foot.Y, spec.Foot.X) - spec.ReleaseAngle
	up := Point{0, r}
	s := &inertial{spec: spec, turned: spec.LandingAngle - spec.ReleaseAngle}
	s.scene = scene{head: head, radius: r, body: spec.Body, every: spec.TickEvery, surface: spec.Surface}
	if spec.Flat {
		s.normal = &spec.Height
	}
	s.track = track{t: tr.t, ph: tr.ph}
	for _, p := range tr.at {
		s.track.at = append(s.track.at, p.turned(turn).add(up))
	}
	if spec.Landing != nil {
		p := spec.Landing.turned(turn).add(up)
		s.landing = &p
	}
	for _, o := range spec.Outlines {
		s.before = append(s.before, o.turned(turn+spec.ReleaseAngle).moved(up))
		s.outlines = append(s.outlines, o.turned(turn+spec.LandingAngle).moved(up))
	}
	if len(spec.Outlines) == 0 {
		s.outlines = []Outline{{Kind: Deck, Path: Circle(up, r)}}
	}
	return s, nil
}

// foot is where the foot of the plumb line at release has moved to.
func (s *inertial) foot() Point { return deckLine{radius: s.radius}.place(s.turned * s.radius) }

// start is where the place of release has moved to: fixed in the habitat, h above the foot.
func (s *inertial) start() Point {
	return polar(Point{0, s.radius}, s.radius-s.track.at[0].Y, s.turned-math.Pi/2)
}

func (s *inertial) arrange() {
	must := s.flight()
	must.add(s.foot())
	must.grow(s.body)
	s.whole = math.Abs(s.turned) > wholeFrom || s.gone(must) > wholeFrom
	if s.part == nil || s.whole { // a part has no paper to spare
		axis := must
		axis.add(Point{0, s.radius})
		const worth = 0.65 // of the scale: it is good to see, but not what is asked for
		if fit(axis.size(), 1.4, 1) >= worth*fit(must.size(), 1.4, 1) {
			must = axis
		}
	}
	wanted := s.wanted()
	s.lay(must, 0, wanted)
	hairy := s.hair()
	if hairy {
		wanted = wanted[:1]
		s.lay(must, detailWidth, wanted)
	}
	var words []string
	for _, d := range wanted {
		if !s.dimension(d) {
			words = append(words, d.text)
		}
	}
	if hairy {
		s.detail = newDetail(&s.scene, s.v.pt(*s.landing), s.closeUp(), []string{"deck offset " + signedLength(s.spec.Offset)})
		s.pl.polyline(priceThin, s.detail.pointer()...)
	} else if finite(s.spec.Offset) && !s.offsetDrawn() {
		words = append(words, "deck offset "+signedLength(s.spec.Offset))
	}
	s.label(words)
}

func (s *inertial) label(words []string) {
	s.obstacles()
	s.pl.polyline(pricePlumb, s.v.pts([]Point{s.start(), s.foot()})...)
	s.names()
	for _, w := range words {
		s.name(s.foot(), 4, toDown, w)
	}
	s.nameLine(s.v.pts([]Point{{}, s.track.at[0]}), "plumb line at release")
	s.nameLine(s.v.pts([]Point{s.foot(), s.start()}), "plumb line at "+s.end())
	s.lost = s.pl.solve()
}

// hair reports whether the offset is too small for the view but not for a detail.
func (s *inertial) hair() bool {
	const finest = 1e-13 // of the radius: below, the digits of places end
	if s.part != nil || s.whole || !s.offsetDrawn() {
		return false
	}
	off, x := math.Abs(s.spec.Offset), math.Abs(s.closeUp().landing.X)
	return off*s.v.perM < hairWidth && x > off/2 && x > finest*s.radius
}

// closeUp turns the landing back, so that its plumb line is upright.
func (s *inertial) closeUp() closeUp {
	axis := Point{0, s.radius}
	back := func(p Point) Point { return p.sub(axis).turned(-s.turned).add(axis) }
	out := closeUp{landing: back(*s.landing), top: back(s.start()), offset: s.spec.Offset, body: s.body, turned: true}
	out.track = track{t: s.track.t, ph: s.track.ph}
	for _, p := range s.track.at {
		out.track.at = append(out.track.at, back(p))
	}
	for _, o := range s.outlines {
		out.outlines = append(out.outlines, o.moved(Point{}.sub(axis)).turned(-s.turned).moved(axis))
	}
	return out
}

func (s *inertial) end() string {
	if s.landing == nil {
		return "the end"
	}
	return "landing"
}

// wanted lists the turning of the habitat, and the offset that it leaves.
func (s *inertial) wanted() []dimension {
	at := s.turned * s.radius
	out := []dimension{{s1: at, text: "the habitat turns " + degrees(math.Abs(s.turned)), ink: inkText, tops: [2]Point{{}, s.foot()}, oneWay: true}}
	if s.offsetDrawn() {
		out = append(out, dimension{s0: at, s1: at + s.spec.Offset, text: "deck offset " + signedLength(s.spec.Offset), ink: inkText,
			tops: [2]Point{s.foot(), *s.landing}})
	}
	return out
}

// offsetDrawn reports whether the offset gets a dimension line: laps of it beside laps
// of turning would be a thicket, and a side view shows them.
func (s *inertial) offsetDrawn() bool {
	return s.landing != nil && !s.spec.Flat && math.Abs(s.spec.Offset) <= 2*math.Pi*s.radius
}

func (s *inertial) paint(p *pad) {
	s.paintView(p)
	s.drawStrip(p, "spinward", "up", s.statement(s.dashed()))
	if s.detail != nil {
		s.detail.paint(p)
	}
	s.sheet.draw(p)
}

// dashed says what the dashed outlines are.
func (s *inertial) dashed() string {
	if len(s.before) == 0 {
		return ""
	}
	return " Dashed: the structure at release."
}

func (s *inertial) paintView(p *pad) {
	for _, o := range s.before {
		s.v.edges(p, penGhost, o)
	}
	s.v.structure(p, s.outlines)
	p.rect(s.win, penFrame)
	s.v.strokeLine(p, penPlumb, s.v.pts([]Point{s.track.at[0], {}}))
	s.v.strokeLine(p, penPlumb, s.v.pts([]Point{s.start(), s.foot()}))
	s.paintMotion(p)
	s.footMark(p, Point{})
	s.footMark(p, s.foot())
}

// footMark is a small triangle that stands on the deck, point down on the plumb foot.
func (s *inertial) footMark(p *pad, at Point) {
	q := s.v.pt(at)
	if !within(s.win, q) {
		return
	}
	const size = 5.5
	out := math.Atan2(at.Y-s.radius, at.X)
	a, b := q.Sub(heading(out-0.45).Scale(size)), q.Sub(heading(out+0.45).Scale(size))
	p.fill(inkText, linePath([]vg.Point{q, a, b}, true))
}
