package measure

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/crew"
	"offplumb/sim/flight"
	"offplumb/sim/geom"
	"offplumb/sim/model"
)

// Clearance is the closest approach of a release or a crew path to a surface.
type Clearance struct {
	Name    string
	Surface string
	Gap     float64 // m, between the body's surface and it; 0 where it was touched
	Time    float64 // s since the release
}

// A track is looked at for its closest approaches clearWay (m) of its way in
// the habitat apart, before they are refined: what stands in the way is passed
// at some distance, over which the gap falls and grows again. A very long track
// is looked at mostLooks times, and at least clearParts times an integration
// step.
const (
	clearWay   = 0.05
	clearParts = 6
	mostLooks  = 20_000
)

// clearLooks is how often a closest approach is refined: 60 thirds leave less
// than a billionth of the stretch.
const clearLooks = 60

// Clearances gives the closest approach of a track to every surface that was
// the nearest of its body of matter at some time, in the order of the
// interior's surfaces.
func Clearances(m *model.Model, t *flight.Track) []Clearance {
	best := map[geom.SurfaceID]Clearance{}
	times := looks(m, t)
	at := make([]r3.Vec, len(times))
	for i, time := range times {
		at[i] = localAt(m, t, time).Pos
	}
	for g := range m.Interior.Groups() {
		closest(m, t, geom.Group(g), times, at, best)
	}
	for i := len(t.Impacts) - 1; i >= 0; i-- {
		best[t.Impacts[i].Contact.Surface] = Clearance{Gap: 0, Time: t.Impacts[i].Time}
	}
	var out []Clearance
	for id, s := range m.Interior.Surfaces() {
		if c, ok := best[geom.SurfaceID(id)]; ok {
			c.Name, c.Surface = t.Release.Name, s.Name
			out = append(out, c)
		}
	}
	return out
}

// looks gives the times at which a track is looked at.
func looks(m *model.Model, t *flight.Track) []float64 {
	knots := t.Knots()
	ways := make([]float64, len(knots))
	all := 0.0
	for i := 1; i < len(knots); i++ {
		omega, _ := m.Motion.Bounds(t.Begin+knots[i-1], t.Begin+knots[i])
		ways[i] = (knots[i] - knots[i-1]) * math.Max(quickest(m, t, knots[i-1], omega), quickest(m, t, knots[i], omega))
		all += ways[i]
	}
	way := math.Max(clearWay, all/mostLooks)
	out := []float64{0}
	for i := 1; i < len(knots); i++ {
		n := math.Max(clearParts, math.Ceil(ways[i]/way))
		for k := 1.0; k <= n; k++ {
			if at := knots[i-1] + (knots[i]-knots[i-1])*k/n; at > out[len(out)-1] {
				out = append(out, at)
			}
		}
	}
	return out
}

// quickest bounds the speed (m/s, in the habitat) on an integration step by its
// ends: of a straight flight, the inertial speed and that of the habitat where
// it is farthest out, which turns at omega (rad/s) at most; that of a body in
// contact changes little.
func quickest(m *model.Model, t *flight.Track, time, omega float64) float64 {
	if len(t.Phases) > 0 && t.Phases[t.PhaseAt(time)].Kind != flight.Free {
		return r3.Norm(localAt(m, t, time).Vel)
	}
	s := t.At(time)
	return r3.Norm(s.Vel) + omega*r3.Norm(s.Pos)
}

// closest finds the least gap to each surface of a group. The track is at some
// places (m, habitat components) at some times.
func closest(m *model.Model, t *flight.Track, g geom.Group, times []float64, at []r3.Vec, best map[geom.SurfaceID]Clearance) {
	a := approach{gap: func(time float64) geom.Contact { return m.Interior.ContactIn(localAt(m, t, time).Pos, g) },
		times: times, at: at, near: make([]geom.Contact, len(times)), least: map[geom.SurfaceID]Clearance{}}
	for i := range times {
		a.near[i] = m.Interior.ContactIn(at[i], g)
		a.keep(a.near[i].Surface, a.near[i].Gap, times[i])
	}
	for i := range times {
		a.within(i)
		if i > 0 && a.near[i-1].Surface != a.near[i].Surface {
			a.between(i-1, i)
			a.between(i, i-1)
		}
	}
	for id, c := range a.least {
		c.Gap = math.Max(0, c.Gap-t.Body.Diameter/2)
		if old, ok := best[id]; !ok || c.Gap < old.Gap {
			best[id] = c
		}
	}
}

// approach is the search for the closest approaches to the surfaces of a group.
type approach struct {
	gap   func(time float64) geom.Contact
	times []float64
	at    []r3.Vec
	near  []geom.Contact // at the times
	least map[geom.SurfaceID]Clearance
}

func (a *approach) keep(id geom.SurfaceID, gap, time float64) {
	if old, ok := a.least[id]; !ok || gap < old.Gap {
		a.least[id] = Clearance{Gap: gap, Time: time}
	}
}

// promises says whether the gap to the surface that is near at a time may be
// less than the least known, between that time and another one: it changes by
// no more than the way.
func (a *approach) promises(i, k int) bool {
	c := &a.near[i]
	return c.Gap-r3.Norm(r3.Sub(a.at[k], a.at[i])) < a.least[c.Surface].Gap
}

// within refines an approach that is closest at the i-th time.
func (a *approach) within(i int) {
	lo, hi := max(0, i-1), min(len(a.times)-1, i+1)
	c := &a.near[i]
	if a.near[lo].Gap < c.Gap || a.near[hi].Gap < c.Gap || !a.promises(i, lo) && !a.promises(i, hi) {
		return
	}
	best := a.least[c.Surface]
	refine(a.gap, c.Surface, a.times[lo], a.times[hi], &best)
	a.least[c.Surface] = best
}

// between finds where the surface that is near at the i-th time ceases to be,
// before the k-th: the gap to it is least there, if it falls toward it.
func (a *approach) between(i, k int) {
	id := a.near[i].Surface
	if !a.promises(i, k) {
		return
	}
	in, out := a.times[i], a.times[k]
	for range clearLooks {
		mid := in + (out-in)/2
		if mid == in || mid == out {
			return
		}
		c := a.gap(mid)
		if c.Surface != id {
			out = mid
			continue
		}
		in = mid
		a.keep(id, c.Gap, mid)
	}
}

// refine narrows the stretch a to b about the least gap, by thirds, as long as
// it stays with the surface.
func refine(gap func(float64) geom.Contact, id geom.SurfaceID, a, b float64, best *Clearance) {
	for range clearLooks {
		u, v := a+(b-a)/3, b-(b-a)/3
		cu, cv := gap(u), gap(v)
		for _, c := range []struct {
			geom.Contact
			at float64
		}{{cu, u}, {cv, v}} {
			if c.Surface == id && c.Gap < best.Gap {
				best.Gap, best.Time = c.Gap, c.at
			}
		}
		if cu.Gap < cv.Gap {
			b = v
		} else {
			a = u
		}
	}
}

// PathClearances gives the closest approach of a person along a path to each
// surface.
func PathClearances(m *model.Model, p *crew.Plan) []Clearance {
	var out []Clearance
	for _, c := range p.Clearances(m) {
		out = append(out, Clearance{Name: p.Path.Name, Surface: c.Surface, Gap: c.Gap, Time: c.Time})
	}
	return out
}

// Closest gives the least clearance of some; an infinite one of none.
func Closest(list []Clearance) Clearance {
	best := Clearance{Gap: math.Inf(1), Time: math.NaN()}
	for _, c := range list {
		if c.Gap < best.Gap {
			best = c
		}
	}
	return best
}
