package plots

import (
	"fmt"
	"math"

	"gonum.org/v1/plot/vg"
)

// scene is a view of one release: what is common to the two frames. Its places are in
// m from the foot of the plumb line, y up along it, so that the spin axis is at (0, radius).
type scene struct {
	stage
	head     headline
	radius   float64 // m, of the ring about the axis; 0 if no axis is known
	body     float64 // m
	outlines []Outline
	track    track
	every    float64 // s
	landing  *Point
	rest     *Point
	surface  string
	normal   *float64 // m, height of the release along the normal of a flat deck, where the view is along a plumb line
	part     *part    // of a sheet with several views; nil: the view has the sheet for itself

	whole bool // the whole ring is shown
	deck  deckLine
	dims  dimensioner
	drawn []placedDim
	ticks []timeMark
	step  float64  // s between ticks
	lost  []string // labels without a place: they are said below the view
}

// headline is what every figure is given.
type headline struct {
	title, desc, notes string
	spin               float64 // rad/s
}

func (h headline) check() error {
	if clean(h.title) == "" || clean(h.desc) == "" {
		return fmt.Errorf("a figure wants a title and a description")
	}
	if !finite(h.spin) {
		return fmt.Errorf("spin is %g rad/s", h.spin)
	}
	return nil
}

type placedDim struct {
	dimension
	dimPlace
}

const (
	wholeFrom = 1.3 // rad gone round from which the whole ring is shown
	worthLoss = 0.4 // what can be done without may shrink the rest to this
	mostLaps  = 6.0 // laps that a dimension line can show
)

// checkSizes refuses lengths that cannot be drawn. A NaN stands for none where that is
// allowed, and is not handed in.
func checkSizes(lengths ...float64) error {
	for _, l := range lengths {
		if !(math.Abs(l) <= maxCoordinate) {
			return fmt.Errorf("a length of %g m cannot be drawn", l)
		}
	}
	return nil
}

func checkPlaces(path []Point, places ...*Point) error {
	for _, p := range places {
		if p != nil {
			path = append(path[:len(path):len(path)], *p)
		}
	}
	for _, p := range path {
		if !sane(p) {
			return fmt.Errorf("the place (%g m, %g m) cannot be drawn", p.X, p.Y)
		}
	}
	return nil
}

// better is wide if that costs little scale, else tight.
func better(tight, wide area) area {
	const w, h = 1.4, 1.0 // the shape of a sheet
	if fit(wide.size(), w, h) >= worthLoss*fit(tight.size(), w, h) {
		return wide
	}
	return tight
}

// flight is the part of the plane with the plumb line at release, the flight to the
// landing, and the deck beneath them.
func (s *scene) flight() area {
	var a area
	a.add(Point{}, s.track.at[0])
	free := s.track
	if s.landing != nil {
		free = s.track.upTo(s.track.when(*s.landing))
		a.add(*s.landing)
	}
	a.add(free.at...)
	deck := deckLine{radius: s.radius}
	for _, p := range free.at {
		a.add(deck.place(deck.foot(p)))
	}
	if size := a.size(); math.Max(size.X, size.Y) < 1e-9 {
		a.grow(math.Max(10*s.body, 0.5))
	}
	return a
}

// gone is the largest angle, rad, that the part of the track within a goes round the axis.
func (s *scene) gone(a area) float64 {
	if s.radius == 0 {
		return 0
	}
	axis, angle, most := Point{0, s.radius}, 0.0, 0.0
	for i := 1; i < len(s.track.at); i++ {
		p, q := s.track.at[i-1].sub(axis), s.track.at[i].sub(axis)
		if a.contains(s.track.at[i]) {
			angle += math.Atan2(p.X*q.Y-p.Y*q.X, p.X*q.X+p.Y*q.Y)
			most = math.Max(most, math.Abs(angle))
		}
	}
	return most
}

// lay makes the sheet on which must is shown with dimension lines below the deck, and
// below the solid that the deck is the top of.
func (s *scene) lay(must area, column float64, wanted []dimension) {
	s.layWith(must, column, wanted, 0)
	if deep := s.solid(); deep > 0 {
		s.layWith(must, column, wanted, deep)
	}
	s.deck = deckLine{v: s.v, radius: s.radius}
	s.dims = dimensioner{deck: s.deck, win: s.win, below: math.Max(s.depth(), s.solid())}
	s.ticks, s.step = s.track.timeMarks(s.v, s.every)
}

// layWith keeps deep pt more free below the deck.
func (s *scene) layWith(must area, column float64, wanted []dimension, deep float64) {
	f := frame{left: 26, right: 26, top: 24, bottom: deep + dimFirst + dimPitch*float64(len(wanted)) + 12}
	laps := 0.0
	for _, d := range wanted {
		if s.radius == 0 {
			break
		}
		a := d.s1 / s.radius
		if turns := math.Abs(d.s1-d.s0) / (2 * math.Pi * s.radius); turns <= mostLaps { // more are not drawn
			laps = math.Max(laps, turns)
		}
		f.left = math.Max(f.left, 26-math.Sin(a)*f.bottom) // up a flank, below the deck is sideways
		f.right = math.Max(f.right, 26+math.Sin(a)*f.bottom)
	}
	if s.whole {
		const least = 64.0 // pt: labels stand outside the ring
		round := math.Max(least, f.bottom+lap*laps)
		if s.part != nil { // there is no paper to spare
			round = math.Min(round, least/2)
		}
		f = frame{left: round, right: round, top: round, bottom: round}
		must.addArc(Point{0, s.radius}, s.radius, 0, 2*math.Pi)
	}
	plan := sheetPlan{title: s.head.title, notes: s.head.notes, side: column, strip: true}
	if s.part != nil {
		plan = sheetPlan{strip: true, part: s.part}
	}
	s.stage = newStage(plan, must, f)
}

// depth is how far below the deck, pt, the track gets in the window, as it does through
// an opening: the dimension lines keep off it.
func (s *scene) depth() float64 {
	const least = 4 // pt; less is a body that lies on the deck
	deep := 0.0
	for _, p := range s.track.at {
		d := -p.Y
		if s.radius > 0 {
			d = p.dist(Point{0, s.radius}) - s.radius
		}
		if within(s.win, s.v.pt(p)) {
			deep = math.Max(deep, d*s.v.perM)
		}
	}
	if deep < least {
		return 0
	}
	return deep + s.body*s.v.perM // to what it touches there
}

// dimension finds room for a dimension line, and reports whether there is any.
func (s *scene) dimension(d dimension) bool {
	said := d.text
	if s.whole {
		d.text = "" // no straight text can follow a ring: the line gets a label
	}
	if !s.drawable(d) {
		return false
	}
	at, ok := s.dims.fits(d)
	if !ok {
		return false
	}
	if s.whole {
		at.inside = false
		s.nameRun(s.deck.run(d.s0, d.s1, at.off), said)
	}
	s.drawn = append(s.drawn, placedDim{d, at})
	return true
}

// nameRun asks for the label of a dimension line round the ring.
func (s *scene) nameRun(run []vg.Point, words string) {
	l := label{s: words, size: sizeLabel, ink: inkText, need: true, clear: 3, at: run[len(run)-1]}
	out := l.at.Sub(s.v.pt(Point{0, s.radius}))
	l.want = out
	for _, u := range []float64{0.92, 0.8, 0.65, 0.5, 0.35, 0.2, 0.08} {
		l.or = append(l.or, alongLine(run, u*pageLength(run)))
	}
	s.pl.add(l)
}

func (s *scene) drawable(d dimension) bool {
	const shortest = 0.8 // pt
	span := math.Abs(d.s1 - d.s0)
	if span*s.v.perM < shortest || s.radius > 0 && span > mostLaps*2*math.Pi*s.radius {
		return false
	}
	room := grow(s.win, -4)
	return within(room, s.deck.at(d.s0, s.dims.below+dimFirst)) && within(room, s.deck.at(d.s1, s.dims.below+dimFirst))
}

// places are those with a mark.
func (s *scene) places() []Point {
	out := []Point{s.track.at[0]}
	for _, p := range []*Point{s.landing, s.rest} {
		if p != nil {
			out = append(out, *p)
		}
	}
	return out
}

// ghost is the radius of the body's outline on the page, pt; 0 if it is not drawn.
func (s *scene) ghost() float64 {
	const least, most = 4, 60 // pt; less is lost under the track
	if r := s.v.len(s.body).Points(); r >= least {
		return math.Min(r, most)
	}
	return 0
}
