package plots

import (
	"math"

	"gonum.org/v1/plot/vg"
)

// penPlanPath is dashed: the landings are what is solid on a plan.
var penPlanPath = pen{ink: inkVermillion, width: 1.1, dashes: []vg.Length{4.5, 2.2}}

// way is path i, moved by whole laps so that it starts on the deck as it is drawn.
func (s *plan) way(i int) []Point {
	pts, c := s.spec.Paths[i].Points, s.spec.circumference()
	if c == 0 {
		return pts
	}
	by := Point{-c * math.Round(pts[0].X/c), 0}
	out := make([]Point, len(pts))
	for k, p := range pts {
		out[k] = p.add(by)
	}
	return out
}

// addWays adds to a what matters of the paths: all of one that goes no farther than half
// a lap, and of others where they start. It reports whether there is one of the former.
func (s *plan) addWays(a *area) (near bool) {
	c := s.spec.circumference()
	for i := range s.spec.Paths {
		var b area
		b.add(s.way(i)...)
		if c == 0 || b.size().X <= c/2 {
			near = true
			a.add(b.min, b.max)
			continue
		}
		a.add(s.way(i)[0])
	}
	return near
}

// planWay is a visible piece of a crew path, on the page.
type planWay struct {
	line []vg.Point
	tip  vg.Point // where it ends, less what an arrowhead wants
	dir  float64  // rad, there
	long bool     // long enough for an arrowhead
}

// pieces are the visible pieces of path i, with its copies beyond the seam.
func (s *plan) pieces(i int) (out []planWay) {
	const least = 8.0 // pt
	way := s.way(i)
	var a area
	a.add(way...)
	for _, dx := range s.shifts(a.min.X, a.max.X) {
		pts := make([]Point, len(way))
		for k, p := range way {
			pts[k] = p.add(Point{dx, 0})
		}
		for _, line := range clipLine(s.field(), s.v.pts(pts)) {
			dir, ok := lastWay(line)
			out = append(out, planWay{line: line, tip: line[len(line)-1], dir: dir, long: ok && pageLength(line) >= least})
		}
	}
	return out
}

// labelPaths asks for the names of the paths, each at its longest visible piece.
func (s *plan) labelPaths() {
	for i, path := range s.spec.Paths {
		l := label{s: path.Name, size: sizeLabel, ink: inkText, clear: 3, need: true}
		most, shown := -1.0, false
		for _, w := range s.pieces(i) {
			s.pl.polyline(pricePlumb, w.line...)
			if long := pageLength(w.line); long > most {
				at := func(u float64) vg.Point { return alongLine(w.line, u*long) }
				most, shown = long, true
				l.at, l.or = at(0.5), []vg.Point{at(0.35), at(0.65), at(0.2), at(0.8)}
			}
		}
		s.each(s.way(i)[0], func(q vg.Point) {
			s.pl.mark(q, diamondHalf)
			if most < 2*diamondHalf {
				l.at, l.or, l.clear, shown = q, nil, diamondHalf+1.5, true
			}
		})
		if shown {
			s.pl.add(l)
		}
	}
}

// paintPaths draws the crew paths under the releases.
func (s *plan) paintPaths(p *pad) {
	for i := range s.spec.Paths {
		for _, w := range s.pieces(i) {
			p.line(penPlanPath, thinPage(w.line)...)
			if w.long {
				p.wayHead(penPlanPath.ink, w.tip, w.dir)
			}
		}
		s.each(s.way(i)[0], func(q vg.Point) { p.diamond(q, penPlanPath.ink) })
	}
}

// lastWay is the direction in which a line on the page ends, rad; false for one that is
// too short to have one.
func lastWay(line []vg.Point) (dir float64, ok bool) {
	const back = 4.0 // pt
	tip := line[len(line)-1]
	for i := len(line) - 2; i >= 0; i-- {
		d := tip.Sub(line[i])
		if math.Hypot(d.X.Points(), d.Y.Points()) >= back {
			return math.Atan2(d.Y.Points(), d.X.Points()), true
		}
	}
	return 0, false
}
