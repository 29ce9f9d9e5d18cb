package plots

import (
	"errors"
	"fmt"
	"math"
	"sort"

	"gonum.org/v1/plot/vg"
)

// track is a track that has been checked: finite, in order of time, of known phases.
type track struct {
	t  []float64 // s
	at []Point   // m
	ph []Phase
}

// maxCoordinate bounds lengths, m: beyond the Moon's distance a habitat is a slip, and
// squares of it stay far from overflow.
const maxCoordinate = 1e9

func sane(p Point) bool {
	return p.finite() && math.Abs(p.X) <= maxCoordinate && math.Abs(p.Y) <= maxCoordinate
}

func newTrack(points []TrackPoint) (track, error) {
	if len(points) == 0 {
		return track{}, errors.New("a track wants at least one point")
	}
	var out track
	for i, p := range points {
		ph, err := phaseNamed(p.Phase)
		switch {
		case err != nil:
			return track{}, fmt.Errorf("track point %d: %w", i, err)
		case !sane(Point{p.X, p.Y}) || !finite(p.T):
			return track{}, fmt.Errorf("track point %d: (%g m, %g m) at %g s cannot be drawn", i, p.X, p.Y, p.T)
		case i > 0 && p.T < points[i-1].T:
			return track{}, fmt.Errorf("track point %d: time runs back from %g s to %g s", i, points[i-1].T, p.T)
		}
		out.t, out.at, out.ph = append(out.t, p.T), append(out.at, Point{p.X, p.Y}), append(out.ph, ph)
	}
	return out, nil
}

func (t track) last() Point { return t.at[len(t.at)-1] }

// place is where the body is at a time within the track, between its points on a straight line.
func (t track) place(at float64) Point {
	i := sort.SearchFloat64s(t.t, at)
	switch {
	case i == 0:
		return t.at[0]
	case i == len(t.t):
		return t.last()
	}
	u := (at - t.t[i-1]) / (t.t[i] - t.t[i-1])
	return t.at[i-1].add(t.at[i].sub(t.at[i-1]).scale(u))
}

// way is the direction of motion at a time, as a difference of places, m; zero at rest.
func (t track) way(at float64) Point {
	i := max(1, min(sort.SearchFloat64s(t.t, at), len(t.t)-1))
	if len(t.t) < 2 {
		return Point{}
	}
	return t.at[i].sub(t.at[i-1])
}

// when is the time at which the track is nearest to p, the first if it is so twice.
func (t track) when(p Point) float64 {
	best, dist := t.t[0], t.at[0].dist(p)
	for i := 1; i < len(t.at); i++ {
		a, b := t.at[i-1], t.at[i]
		u := 1.0
		if l := b.dist(a); l > 0 {
			u = math.Max(0, math.Min(1, (p.sub(a).X*(b.X-a.X)+p.sub(a).Y*(b.Y-a.Y))/l/l))
		}
		if d := a.add(b.sub(a).scale(u)).dist(p); d < dist*(1-1e-9) {
			best, dist = t.t[i-1]+u*(t.t[i]-t.t[i-1]), d
		}
	}
	return best
}

// moves is the time at which the body comes to rest, or the track ends.
func (t track) moves() float64 {
	for i, ph := range t.ph {
		if ph == Rest {
			return t.t[i]
		}
	}
	return t.t[len(t.t)-1]
}

// upTo is the part of the track until a time.
func (t track) upTo(end float64) track {
	n := sort.Search(len(t.t), func(i int) bool { return t.t[i] > end })
	out := track{t.t[:n:n], t.at[:n:n], t.ph[:n:n]}
	if n == 0 || n == len(t.t) || t.t[n-1] == end {
		return out
	}
	return track{append(out.t, end), append(out.at, t.place(end)), append(out.ph, t.ph[n-1])}
}

// runs splits the track into pieces of one phase; each begins where the last ended.
func (t track) runs() (runs []track) {
	for lo := 0; lo < len(t.at)-1; {
		hi := lo + 1
		for hi < len(t.at)-1 && t.ph[hi] == t.ph[lo] {
			hi++
		}
		runs = append(runs, track{t.t[lo : hi+1], t.at[lo : hi+1], t.ph[lo : hi+1]})
		lo = hi
	}
	return runs
}

// maxMarks is the number of time marks that a track can carry; more asked for are
// replaced by the automatic ones.
const maxMarks = 60

// marks are the times of the marks on the track, without its beginning, and their step.
func (t track) marks(every float64) (times []float64, step float64) {
	from, to := t.t[0], t.moves()
	if !(every > 0) || (to-from)/every > maxMarks {
		every = stepFor(to-from, 10)
	}
	if every == 0 {
		return nil, 0
	}
	for i := math.Floor(from/every) + 1; i*every <= to*(1+1e-9) && len(times) <= maxMarks; i++ {
		if i*every > from {
			times = append(times, i*every)
		}
	}
	return times, every
}

// draw draws the track of release i, each phase with its dashes.
func (t track) draw(p *pad, v view, i int) {
	for _, r := range t.runs() {
		v.strokeLine(p, trackPen(i, r.ph[0]), v.pts(r.at))
	}
}

// timeMark is a short line across a track.
type timeMark struct {
	at, across vg.Point // pt; across is half of the mark
	time       float64  // s
}

// timeMarks places the marks that show in the window of v. Marks nearer than a few
// points to the one before would run together, and are left out.
func (t track) timeMarks(v view, every float64) (marks []timeMark, step float64) {
	const half, apart = 3.2, 5.0
	times, step := t.marks(every)
	prev := v.pt(t.at[0])
	for _, s := range times {
		at, way := v.pt(t.place(s)), t.way(s)
		gap := at.Sub(prev)
		if !within(v.win, at) || way.norm() == 0 || math.Hypot(gap.X.Points(), gap.Y.Points()) < apart {
			continue
		}
		a := math.Atan2(way.Y, way.X) + math.Pi/2
		marks = append(marks, timeMark{at: at, across: heading(a).Scale(half), time: s})
		prev = at
	}
	return marks, step
}
