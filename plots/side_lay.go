package plots

import "math"

// side is a side view at work: what it shows, and where all of it goes.
type side struct {
	scene
	spec    SideViewSpec
	detail  *detail
	hairy   bool // the offset is too small for the view, and drawn as a detail
	uniform bool // the uniform-gravity path is a line of its own
}

// hairWidth is the offset on the page, pt, below which it is drawn again as a detail.
const hairWidth = 4.0

// arrange chooses what is shown, and finds places for all of it.
func (s *side) arrange() {
	must, wanted := s.shown(), s.wanted()
	s.whole = s.gone(must) > wholeFrom
	s.lay(must, 0, wanted)
	if s.hairy = s.part == nil && s.hair(); s.hairy {
		s.lay(must, detailWidth, wanted)
	}
	for _, p := range s.spec.Uniform {
		const apart = 1.0 // pt
		s.uniform = s.uniform || math.Abs(p.X)*s.v.perM > apart
	}
	var words []string
	for _, d := range wanted {
		if !s.dimension(d) {
			words = append(words, d.text)
		}
	}
	if s.hairy {
		near := closeUp{landing: *s.landing, top: s.track.at[0], offset: s.spec.Offset, body: s.body, outlines: s.outlines, track: s.track}
		s.detail, words = newDetail(&s.scene, s.v.pt(*s.landing), near, words), nil
		s.pl.polyline(priceThin, s.detail.pointer()...)
	}
	s.obstacles()
	s.pl.polyline(pricePlumb, s.v.pts(s.spec.Uniform)...)
	s.names()
	for _, w := range words {
		s.name(Point{}, 4, toDown, w)
	}
	s.lineNames()
	s.lost = s.pl.solve()
}

// shown is what the view must show: the flight, and as much of the rest as does not
// spoil the scale.
func (s *side) shown() area {
	must := s.flight()
	full := must
	full.add(s.track.at...)
	if s.rest != nil {
		full.add(*s.rest)
	}
	must = better(must, full)
	path := must
	path.add(s.spec.Uniform...)
	must = better(must, path)
	must.grow(s.body)
	return must
}

// hair reports whether the offset is too small for the view but not for a detail.
func (s *side) hair() bool {
	const finest = 1e-9 // of the height: below, the track's own digits end
	if s.landing == nil || s.whole {
		return false
	}
	off := math.Abs(s.spec.Offset)
	x := math.Abs(s.landing.X)
	return off*s.v.perM < hairWidth && x > off/2 && x > finest*math.Max(s.track.at[0].norm(), s.radius*1e-6)
}

// wanted lists the dimensions that the view gives.
func (s *side) wanted() []dimension {
	off, def := s.spec.Offset, s.spec.Deflection
	deck := deckLine{radius: s.radius}
	same := finite(off) && finite(def) && signedLength(off) == signedLength(def)
	var out []dimension
	end := deck.place(off)
	if s.landing != nil {
		end = *s.landing
	}
	if finite(off) {
		words := "deck offset "
		if same {
			words = "deck offset = apparent deflection "
		}
		out = append(out, dimension{s1: off, text: words + signedLength(off), ink: inkText, tops: [2]Point{{}, end}})
	}
	if finite(def) && !same {
		from := 0.0
		if finite(off) {
			from = off - def
		}
		start := deck.place(from)
		if n := len(s.spec.Uniform); n > 0 {
			start = s.spec.Uniform[n-1]
		}
		out = append(out, dimension{s0: from, s1: from + def, text: "apparent deflection " + signedLength(def), ink: inkText, tops: [2]Point{start, end}})
	}
	return out
}

// lineNames names the plumb line and the uniform-gravity path, which are one for a drop.
func (s *side) lineNames() {
	plumb := s.v.pts([]Point{s.track.at[0], {}})
	s.nameLine(plumb, "plumb line")
	switch {
	case s.uniform:
		s.nameLine(s.v.pts(s.spec.Uniform), "uniform-gravity path")
	case len(s.spec.Uniform) > 1:
		s.nameLine(plumb, "uniform-gravity path")
	}
}

func (s *side) paint(p *pad) {
	s.paintView(p)
	s.drawStrip(p, "spinward", "up", s.statement(""))
	if s.detail != nil {
		s.detail.paint(p)
	}
	s.sheet.draw(p)
}

func (s *side) paintView(p *pad) {
	v, spec := s.v, s.spec
	v.structure(p, spec.Outlines)
	if len(spec.Outlines) == 0 {
		s.bareDeck(p)
	}
	p.rect(s.win, penFrame)
	v.strokeLine(p, penPlumb, v.pts([]Point{s.track.at[0], {}}))
	if s.uniform {
		v.strokeLine(p, penUniform, v.pts(spec.Uniform))
	}
	s.paintMotion(p)
}

// bareDeck draws the deck where the caller gives no structure.
func (s *side) bareDeck(p *pad) {
	if s.radius == 0 {
		a := s.v.shown()
		s.v.strokeLine(p, penDeck, s.v.pts([]Point{{a.min.X, 0}, {a.max.X, 0}}))
		return
	}
	s.v.strokeArc(p, penDeck, s.v.arc(Point{0, s.radius}, s.radius, -1.5*math.Pi, 0.5*math.Pi))
}
