package motion

import (
	"fmt"
	"hash/fnv"
	"math"

	"offplumb/plots"
)

// show is a film at work: packed, laid out, and drawn.
type show struct {
	film          *Film
	reel          *reel
	spots         []spot
	uniform       []plots.Point // m about the axis, at the release
	gone          float64       // rad, the greatest angle gone round in the habitat frame
	board, beyond view
	id            string // prefix of ids, one for each film of a page
}

func newShow(f *Film) (*show, error) {
	if err := f.check(); err != nil {
		return nil, err
	}
	r, err := pack(f)
	if err != nil {
		return nil, err
	}
	s := &show{film: f, reel: r, spots: r.spots()}
	s.uniform = f.uniformPath()
	s.board, s.beyond = s.boardView(), s.beyondView()
	h := fnv.New64a()
	fmt.Fprintf(h, "%s\x00%s\x00%s\x00%v", f.Name, f.Title, f.Desc, r.pieces[0].base)
	s.id = fmt.Sprintf("film-%016x", h.Sum64())
	return s, nil
}

// uniformPath gives the uniform-gravity path, nil if there is none to draw.
func (f *Film) uniformPath() (out []plots.Point) {
	u := f.Uniform
	if u == nil || u.WhyNotDrawn != "" {
		return nil
	}
	const parts = 96
	for k := 0.0; k <= parts; k++ {
		out = append(out, f.uniformAt(u.Time*k/parts))
	}
	return out
}

// uniformAt is the place on the uniform-gravity path at a time, s.
func (f *Film) uniformAt(t float64) plots.Point {
	u := f.Uniform
	t = math.Min(t, u.Time)
	along, h := u.Along*t, u.Height+u.Up*t-u.Gravity*t*t/2
	if !f.Flat {
		sin, cos := math.Sincos(along / f.Radius)
		return plots.Point{X: (f.Radius - h) * sin, Y: -(f.Radius - h) * cos}
	}
	// On a flat floor it falls along the plumb line, which leans.
	foot := f.plumb(f.foot())
	sin, cos := math.Sincos(f.Lean)
	return plots.Point{X: foot.X + cos*along - sin*h, Y: foot.Y + sin*along + cos*h}
}

// differs says whether the uniform-gravity path is a line of its own on the drawing.
func (s *show) differs() bool {
	const apart = 1.0 // unit
	x0, y0 := s.board.at(s.film.plumb(0))
	x1, y1 := s.board.at(s.film.plumb(s.film.foot()))
	for _, p := range s.uniform {
		x, y := s.board.at(p)
		if math.Abs((x1-x0)*(y-y0)-(y1-y0)*(x-x0)) > apart*math.Hypot(x1-x0, y1-y0) {
			return true
		}
	}
	return false
}

// event finds the first event of a kind, nil for none.
func (f *Film) event(k Kind) *Event {
	for i := range f.Events {
		if f.Events[i].Kind == k {
			return &f.Events[i]
		}
	}
	return nil
}

// shown is the event of a kind, if it is within the film.
func (s *show) shown(k Kind) *Event {
	if e := s.film.event(k); e != nil && e.T <= s.reel.end {
		return e
	}
	return nil
}

// runs are the drawn paths by phase, in units: what went on in flight, sliding, rolling. They
// are thinned to finest, and further where they would take more than runsBudget: the still
// drawing of many laps, which covers the ring anyway.
func (s *show) runs(v view, of func(spot) plots.Point) (out [4]path) {
	const finest, coarsest, runsBudget = 0.15, 5.0, 2500 // units, units, bytes
	for tolerance := finest; ; tolerance *= 1.5 {
		var size int
		if out, size = s.runsTo(tolerance, v, of); size <= runsBudget || tolerance > coarsest {
			return out
		}
	}
}

func (s *show) runsTo(tolerance float64, v view, of func(spot) plots.Point) (out [4]path, size int) {
	for lo := 0; lo < len(s.spots)-1; {
		hi, phase := lo+1, s.spots[lo+1].phase
		for hi < len(s.spots)-1 && s.spots[hi+1].phase == phase {
			hi++
		}
		var pts []plots.Point
		for _, p := range s.spots[lo : hi+1] {
			x, y := v.at(of(p))
			pts = append(pts, plots.Point{X: x, Y: y})
		}
		for i, p := range plots.Thin(pts, tolerance) {
			out[phase].op("ML"[min(i, 1)], p.X, p.Y)
		}
		lo = hi
	}
	for k := range out {
		size += out[k].Len()
	}
	return out, size
}

func onBoard(p spot) plots.Point { return p.board }
func outside(p spot) plots.Point { return p.beyond }
