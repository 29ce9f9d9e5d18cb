package plots

import (
	"errors"
	"fmt"
	"math"
)

// Point is a place in the plane of a figure, m.
type Point struct{ X, Y float64 }

func (p Point) add(q Point) Point       { return Point{p.X + q.X, p.Y + q.Y} }
func (p Point) sub(q Point) Point       { return Point{p.X - q.X, p.Y - q.Y} }
func (p Point) scale(k float64) Point   { return Point{p.X * k, p.Y * k} }
func (p Point) norm() float64           { return math.Hypot(p.X, p.Y) }
func (p Point) finite() bool            { return finite(p.X) && finite(p.Y) }
func (p Point) dist(q Point) float64    { return p.sub(q).norm() }
func polar(c Point, r, a float64) Point { return Point{c.X + r*math.Cos(a), c.Y + r*math.Sin(a)} }

// turned rotates p about the origin by a rad.
func (p Point) turned(a float64) Point {
	s, c := math.Sincos(a)
	return Point{c*p.X - s*p.Y, s*p.X + c*p.Y}
}

// Segment is a straight line, or, when Radius is above 0, a circular arc that runs
// from angle Start to angle End (counterclockwise when End is greater).
type Segment struct {
	From, To   Point   // m, ends of a straight segment
	Centre     Point   // m
	Radius     float64 // m; 0 for a straight segment
	Start, End float64 // rad, from +x counterclockwise
	Bare       bool    // bounds the fill but is not drawn, as the seam of a ring
}

// Line is the straight segment from a to b, m.
func Line(a, b Point) Segment { return Segment{From: a, To: b} }

// Arc is the arc about c (m) of radius r (m) from angle start to angle end (rad).
func Arc(c Point, r, start, end float64) Segment {
	return Segment{Centre: c, Radius: r, Start: start, End: end}
}

func (s Segment) check() error {
	if !s.From.finite() || !s.To.finite() || !s.Centre.finite() || !finite(s.Start) || !finite(s.End) {
		return errors.New("a segment has a coordinate that is not finite")
	}
	if !finite(s.Radius) || s.Radius < 0 {
		return fmt.Errorf("an arc has radius %g m", s.Radius)
	}
	return nil
}

// turned rotates s about the origin by a rad.
func (s Segment) turned(a float64) Segment {
	s.From, s.To, s.Centre = s.From.turned(a), s.To.turned(a), s.Centre.turned(a)
	s.Start, s.End = s.Start+a, s.End+a
	return s
}

// Kind says what an outline is, which decides its pen.
type Kind int

const (
	Hull    Kind = iota // pressure hull, bulkhead, spoke wall
	Deck                // decks and ceilings
	Fixture             // benches, racks, posts
	kindCount
)

// Outline is a piece of structure.
type Outline struct {
	Kind   Kind
	Name   string
	Path   []Segment // in order, each beginning where the last ended
	Closed bool      // a solid, tinted inside; an open hull arc is hatched on its outside
}

// Polygon is the closed path through the points, m.
func Polygon(pts ...Point) []Segment {
	path := make([]Segment, len(pts))
	for i, p := range pts {
		path[i] = Line(p, pts[(i+1)%len(pts)])
	}
	return path
}

// Box is the closed path round the rectangle with the corners a and b, m.
func Box(a, b Point) []Segment {
	return Polygon(a, Point{b.X, a.Y}, b, Point{a.X, b.Y})
}

// Circle is the closed path round c, radius r, m.
func Circle(c Point, r float64) []Segment { return []Segment{Arc(c, r, 0, 2*math.Pi)} }

// Sector is the closed path round a piece of a ring about c, from radius inner to
// outer (m) and from angle start to end (rad). A whole turn gives a ring, whose seam
// is bare.
func Sector(c Point, inner, outer, start, end float64) []Segment {
	whole := math.Abs(end-start) >= 2*math.Pi
	out := Line(polar(c, outer, end), polar(c, inner, end))
	back := Line(polar(c, inner, start), polar(c, outer, start))
	out.Bare, back.Bare = whole, whole
	return []Segment{Arc(c, outer, start, end), out, Arc(c, inner, end, start), back}
}

func (o Outline) check() error {
	if o.Kind < 0 || o.Kind >= kindCount {
		return fmt.Errorf("outline %q: no such kind: %d", o.Name, o.Kind)
	}
	for _, s := range o.Path {
		if err := s.check(); err != nil {
			return fmt.Errorf("outline %q: %w", o.Name, err)
		}
	}
	return nil
}

// turned rotates o about the origin by a rad.
func (o Outline) turned(a float64) Outline {
	path := make([]Segment, len(o.Path))
	for i, s := range o.Path {
		path[i] = s.turned(a)
	}
	o.Path = path
	return o
}

// moved shifts o by d.
func (o Outline) moved(d Point) Outline {
	path := make([]Segment, len(o.Path))
	for i, s := range o.Path {
		s.From, s.To, s.Centre = s.From.add(d), s.To.add(d), s.Centre.add(d)
		path[i] = s
	}
	o.Path = path
	return o
}

func checkOutlines(outlines []Outline) error {
	for _, o := range outlines {
		if err := o.check(); err != nil {
			return err
		}
	}
	return nil
}

// area is an axis-parallel rectangle, m. The zero value is empty.
type area struct {
	min, max Point
	some     bool
}

func (a *area) add(pts ...Point) {
	for _, p := range pts {
		if !a.some {
			a.min, a.max, a.some = p, p, true
			continue
		}
		a.min = Point{math.Min(a.min.X, p.X), math.Min(a.min.Y, p.Y)}
		a.max = Point{math.Max(a.max.X, p.X), math.Max(a.max.Y, p.Y)}
	}
}

// addArc adds an arc, by samples closer than 3 degrees: to 0.04 % of its radius.
func (a *area) addArc(c Point, r, start, end float64) {
	const step = 3 * math.Pi / 180
	n := min(120, 1+int(math.Abs(end-start)/step))
	if math.Abs(end-start) > 2*math.Pi {
		end = start + 2*math.Pi
	}
	for i := 0; i <= n; i++ {
		a.add(polar(c, r, start+(end-start)*float64(i)/float64(n)))
	}
}

func (a *area) grow(d float64) {
	a.min, a.max = a.min.sub(Point{d, d}), a.max.add(Point{d, d})
}

func (a area) size() Point   { return a.max.sub(a.min) }
func (a area) centre() Point { return a.min.add(a.max).scale(0.5) }
func (a area) contains(p Point) bool {
	return a.some && p.X >= a.min.X && p.X <= a.max.X && p.Y >= a.min.Y && p.Y <= a.max.Y
}
