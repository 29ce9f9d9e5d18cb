package plots

import (
	"math"
	"strings"

	"gonum.org/v1/plot/vg"
)

// obstacles tells the placer what the labels keep off.
func (s *scene) obstacles() {
	v, pl, ghost := s.v, s.pl, s.ghost()
	for _, t := range s.dims.texts {
		pl.text(t)
	}
	for _, d := range s.drawn {
		pl.polyline(priceStrong, s.deck.run(d.s0, d.s1, d.off)...)
	}
	v.shy(pl, s.outlines)
	pl.polyline(priceStrong, v.pts(s.track.at)...)
	pl.polyline(pricePlumb, v.pt(s.track.at[0]), v.pt(Point{}))
	for _, m := range s.ticks {
		pl.polyline(priceThin, m.at.Sub(xy(ghost, 0)), m.at.Add(xy(ghost, 0)))
	}
	for _, p := range s.places() {
		pl.mark(v.pt(p), math.Max(ringRadius, ghost))
	}
	if s.radius > 0 {
		pl.mark(v.pt(Point{0, s.radius}), spinArrowRadius)
	}
}

// names asks for the labels of what both frames show.
func (s *scene) names() {
	clear := math.Max(ringRadius, s.ghost()) + 1.5
	show := func(p *Point, want vg.Point, words string) {
		if p != nil && within(s.win, s.v.pt(*p)) {
			s.name(*p, clear, want, words)
		}
	}
	show(&s.track.at[0], toUp, "release, height "+length(s.height()))
	show(s.landing, s.away(), s.landingWords())
	show(s.rest, anyWay, "rests after "+seconds(s.track.moves()))
	for _, r := range s.track.runs() {
		if r.ph[0] == Slide || r.ph[0] == Roll {
			s.nameLine(s.v.pts(r.at), phaseNames[r.ph[0]])
		}
	}
	s.timeLabels(s.ticks, s.step, s.ghost())
	if s.axisShown() {
		s.pl.add(label{s: "spin axis", size: sizeNote, ink: inkSoft, at: s.v.pt(Point{0, s.radius}), clear: spinArrowRadius + 2, want: toRight})
	}
	s.outlineNames(s.outlines)
}

// height is that of the release above the deck, m.
func (s *scene) height() float64 {
	if s.normal != nil {
		return *s.normal
	}
	return s.track.at[0].Y
}

// away is the direction in which the landing lies from the plumb line.
func (s *scene) away() vg.Point {
	if s.landing != nil && s.landing.X < 0 {
		return xy(-1, 0.4)
	}
	return xy(1, 0.4)
}

func (s *scene) landingWords() string {
	const most = 120 // pt
	if s.landing == nil {
		return ""
	}
	words := "landing"
	if on := clean(s.surface); on != "" {
		words += " on " + clip(on, most, sizeLabel, false)
	}
	return words + " after " + seconds(s.track.when(*s.landing))
}

func (s *scene) axisShown() bool {
	return s.radius > 0 && within(grow(s.win, -spinArrowRadius), s.v.pt(Point{0, s.radius}))
}

// statement is what stands below the view, with the labels that found no place in it.
func (s *scene) statement(more string) string {
	return spinStatement(s.head.spin) + more + notNamed(s.lost)
}

// notNamed says which labels found no place.
func notNamed(lost []string) string {
	if len(lost) == 0 {
		return ""
	}
	return " Not named above: " + strings.Join(lost, "; ") + "."
}
