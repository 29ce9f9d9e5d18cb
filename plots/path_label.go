package plots

import (
	"math"
	"slices"
	"strings"

	"gonum.org/v1/plot/vg"
)

// samePlace is the distance on the page, pt, below which labels are joined.
const samePlace = 4.0

// obstacles tells the placer what the labels keep off.
func (s *crewPath) obstacles() {
	v, pl := s.v, s.pl
	v.shy(pl, s.outlines)
	pl.polyline(priceStrong, v.pts(s.spec.Way)...)
	pl.polyline(pricePlumb, s.plumb()...)
	pl.mark(v.pt(s.spec.Way[0]), diamondHalf)
	for _, st := range s.spec.Stations {
		feet, head := v.pt(st.Feet), v.pt(st.Head)
		pl.polyline(pricePlumb, feet, head)
		pl.mark(head, s.headRadius())
		pl.polyline(priceStrong, feet, feet.Add(s.arrow(st)))
	}
	if s.spec.Near != nil {
		pl.mark(v.pt(s.spec.Near.At), crossHalf)
	}
	if s.axisShown() {
		pl.mark(v.pt(Point{0, s.radius}), spinArrowRadius)
	}
}

// names asks for the labels, those first that matter most.
func (s *crewPath) names() {
	s.nearName()
	for _, l := range s.legs() {
		s.pl.add(l)
	}
	s.endNames()
	for _, l := range s.pushNames() {
		s.pl.add(l)
	}
	for _, l := range s.times() {
		s.pl.add(l)
	}
	if s.axisShown() {
		s.pl.add(label{s: "spin axis", size: sizeNote, ink: inkSoft, at: s.v.pt(Point{0, s.radius}), clear: spinArrowRadius + 2, want: toRight})
	}
	if s.leavesPlumb() {
		s.nameLine(s.plumb(), "plumb line of the start")
	}
	s.outlineNames(s.outlines)
}

// leavesPlumb reports whether the plumb line of the start is a line of its own.
func (s *crewPath) leavesPlumb() bool {
	return slices.ContainsFunc(s.spec.Way, func(p Point) bool { return math.Abs(p.X)*s.v.perM > samePlace })
}

func (s *crewPath) nearName() {
	n := s.spec.Near
	if n == nil || !within(s.win, s.v.pt(n.At)) {
		return
	}
	words, link := "least clearance "+length(n.Gap), " to "
	if n.Gap < 0 {
		words, link = "overlap of "+length(-n.Gap), " with "
	}
	if to := clean(n.Surface); to != "" {
		const most = 120 // pt
		words += link + clip(to, most, sizeLabel, false)
	}
	s.name(n.At, crossHalf+1.5, anyWay, words+" at "+shortSeconds(n.T))
}

// endNames says where the way begins and ends.
func (s *crewPath) endNames() {
	from, to := s.v.pt(s.spec.Way[0]), s.v.pt(s.spec.Way[len(s.spec.Way)-1])
	ask := func(at vg.Point, words string) {
		s.pl.add(label{s: words, size: sizeNote, ink: inkText, at: at, clear: diamondHalf + 1.5})
	}
	if together(from, to) {
		ask(from, "start and end")
		return
	}
	ask(from, "start")
	ask(to, "end")
}

// legs are the names of what the person does, each along its piece of the way. Legs
// without a length, at one place, share a label.
func (s *crewPath) legs() (out []label) {
	const least = 12.0 // pt; a shorter piece has one place
	all := s.spec.Stations
	onWay := 0.0
	for lo, hi := 0, 0; lo < len(all); lo = hi {
		for hi = lo + 1; hi < len(all) && all[hi].Leg == all[lo].Leg; hi++ {
		}
		var line []vg.Point
		line, onWay = s.piece(all[lo:hi], onWay)
		l := label{s: clean(all[lo].Leg), size: sizeNote, ink: penWay.ink, at: line[0], clear: 3}
		if l.s == "" {
			continue
		}
		if long := pageLength(line); long >= least {
			at := func(u float64) vg.Point { return alongLine(line, u*long) }
			l.at, l.or = at(0.5), []vg.Point{at(0.35), at(0.65), at(0.2), at(0.8)}
		} else if joinLabel(out, l) {
			continue
		}
		out = append(out, l)
	}
	return out
}

// joinLabel puts the words of l to a label that stands at the same one place, if there is any.
func joinLabel(labels []label, l label) bool {
	for i, o := range labels {
		if len(o.or) == 0 && together(o.at, l.at) {
			if !slices.Contains(strings.Split(o.s, ", "), l.s) {
				labels[i].s += ", " + l.s
			}
			return true
		}
	}
	return false
}

// piece is the part of the way between the first and the last of some stations, on the
// page, looked for from a point of the way on, and where it ends.
func (s *crewPath) piece(stations []PathStation, from float64) ([]vg.Point, float64) {
	k := int(from)
	rest := track{t: s.track.t[k:], at: s.track.at[k:]}
	feet, last := stations[0].Feet, stations[len(stations)-1].Feet
	begin := math.Max(from, rest.when(feet))
	rest = track{t: s.track.t[int(begin):], at: s.track.at[int(begin):]}
	end := math.Max(begin, rest.when(last))
	pts := []Point{feet}
	for i := int(begin) + 1; float64(i) < end; i++ {
		pts = append(pts, s.spec.Way[i])
	}
	if len(stations) > 1 {
		pts = append(pts, last)
	}
	return s.v.pts(pts), end
}

// together reports whether two labels would stand at one place.
func together(a, b vg.Point) bool {
	d := a.Sub(b)
	return math.Hypot(d.X.Points(), d.Y.Points()) < samePlace
}

// times are the labels at the heads. Stations with their heads at one place share one.
func (s *crewPath) times() (out []label) {
	clear := s.headRadius() + 1.5
stations:
	for _, st := range s.spec.Stations {
		l := label{s: shortSeconds(st.T), size: sizeNote, ink: inkText, at: s.v.pt(st.Head), clear: clear}
		l.want = l.at.Sub(s.v.pt(st.Feet))
		for i, o := range out {
			if together(o.at, l.at) {
				if strings.HasSuffix(", "+o.s, ", "+l.s) {
					continue stations // one leg ends when the next begins
				}
				out[i].s = strings.TrimSuffix(o.s, " s") + ", " + l.s
				continue stations
			}
		}
		out = append(out, l)
	}
	return out
}

// pushNames are the magnitudes at the arrows. Arrows that lie on each other share one.
func (s *crewPath) pushNames() (out []label) {
	type push struct {
		feet, tip vg.Point
		lo, hi    float64 // N
	}
	var groups []push
stations:
	for _, st := range s.spec.Stations {
		n, feet, arrow := st.Force.norm(), s.v.pt(st.Feet), s.arrow(st)
		if n*s.perN < shortPush {
			continue
		}
		tip := feet.Add(arrow)
		for i, g := range groups {
			if together(g.feet, feet) && together(g.tip, tip) {
				groups[i].lo, groups[i].hi = math.Min(g.lo, n), math.Max(g.hi, n)
				continue stations
			}
		}
		groups = append(groups, push{feet, tip, n, n})
	}
	for _, g := range groups {
		words := newtons(g.hi)
		if lo := newtons(g.lo); lo != words {
			words = strings.TrimSuffix(lo, " N") + " to " + words
		}
		out = append(out, label{s: words, size: sizeNote, ink: inkText, at: g.tip, clear: 2.5, want: g.tip.Sub(g.feet)})
	}
	return out
}

// newtons prints a force given in N, to three significant digits.
func newtons(v float64) string { return signif(v, dimDigits) + " N" }

// shortSeconds prints a time given in s to three significant digits, without idle zeros.
func shortSeconds(v float64) string {
	s := signif(v, dimDigits)
	if strings.Contains(s, ".") && !strings.Contains(s, "e") {
		s = strings.TrimRight(strings.TrimRight(s, "0"), ".")
	}
	return s + " s"
}
