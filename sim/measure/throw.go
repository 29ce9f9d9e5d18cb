package measure

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/flight"
	"offplumb/sim/frame"
	"offplumb/sim/model"
	"offplumb/sim/table"
)

// throwStudy is the kind of a limit's target that is a throw study. A scenario
// names it as study.NAME.
const throwStudy = "throw study"

// The outcomes of a throw.
const (
	ThrowArrives = "arrives"      // at its target, having touched nothing
	ThrowHits    = "hits"         // something on the way
	ThrowLost    = "lost"         // it leaves the habitat on the way
	ThrowNone    = "out of reach" // there is no such throw
)

// The styles of throws.
const (
	Direct  = "direct"  // the quick way: thrown harder, it would take less time, down to none
	Lobbed  = "lobbed"  // any other
	Slowest = "slowest" // of all
	Slow    = "slow"    // slower than those of a little more or less time
)

// Throw is one solution of a throw study, or a target that no throw reaches.
// SI units; NaN: none. Headings count from spinward toward +axial, elevations
// from the deck up, where the body is; over a flat floor they are those of the
// floor.
type Throw struct {
	Solution    int     // counts from 1 at each target; 0: none
	Distance    float64 // m, of a throw table
	Style       string
	Speed       float64 // m/s, relative to the habitat
	Heading     float64 // rad
	Elevation   float64 // rad
	V           [3]float64
	Time        float64 // s, of the flight
	Outcome     string
	Surface     string  // that it hits
	HitTime     float64 // s
	Miss        float64 // m
	ArriveSpeed float64 // m/s, relative to the target
	ArriveHead  float64 // rad
	ArriveElev  float64 // rad
	SightHead   float64 // rad, where the thrower sees the target
	SightElev   float64 // rad
	Lead        float64 // rad, between that line and where to point
	LeadHeading float64 // rad
	LeadUp      float64 // rad
	Height      float64 // m
	Round       float64 // rad
	PerHeading  float64 // m per rad
	PerElev     float64 // m per rad
	PerSpeed    float64 // m per m/s
	Least       float64 // m/s
	LeastTime   float64 // s
	To, Hit     ThrowPlace
}

// ThrowPlace is a place that a throw comes to.
type ThrowPlace struct {
	Deck                    string
	Spinward, Axial, Height float64 // m
}

// noThrowPlace is no place.
var noThrowPlace = ThrowPlace{Spinward: math.NaN(), Axial: math.NaN(), Height: math.NaN()}

func throwPlace(m *model.Model, pos r3.Vec) ThrowPlace {
	p, name, arc := stand(m, pos)
	return ThrowPlace{name, arc, p.Z, p.Height}
}

// NoThrow is the row of a target at a distance (m; NaN: of no table) that no
// throw reaches.
func NoThrow(distance, least, leastTime float64) Throw {
	nan := math.NaN()
	return Throw{Distance: distance, Outcome: ThrowNone, Least: least, LeastTime: leastTime, To: noThrowPlace, Hit: noThrowPlace,
		Speed: nan, Heading: nan, Elevation: nan, V: [3]float64{nan, nan, nan}, Time: nan, HitTime: nan, Miss: nan, ArriveSpeed: nan, ArriveHead: nan,
		ArriveElev: nan, SightHead: nan, SightElev: nan, Lead: nan, LeadHeading: nan, LeadUp: nan, Height: nan, Round: nan, PerHeading: nan, PerElev: nan, PerSpeed: nan}
}

// direction gives speed (m/s), heading and elevation (rad) of a velocity in
// habitat components along the directions of a floor.
func direction(v r3.Vec, l frame.Local) (speed, heading, elevation float64) {
	s, a, u := l.Split(v)
	return r3.Norm(v), math.Atan2(a, s), math.Atan2(u, math.Hypot(s, a))
}

// AimOf gives speed (m/s), heading and elevation (rad) of a velocity (m/s,
// habitat components) at a place, as a throw of a release has them.
func AimOf(m *model.Model, v r3.Vec, at frame.Polar) (speed, heading, elevation float64) {
	return direction(v, m.LocalAt(at))
}

// ThrowOf measures a throw that was flown until it first touches something, or
// until it arrives. end is the target's motion at the arrival and sight its
// place at the throw, in habitat components; slack (m) is how far off it may
// pass and still count as having arrived.
func ThrowOf(m *model.Model, t *flight.Track, end frame.State, sight r3.Vec, time, slack float64) Throw {
	out := NoThrow(math.NaN(), math.NaN(), math.NaN())
	out.Time, out.Outcome, out.To = time, ThrowArrives, throwPlace(m, end.Pos)
	l := m.LocalAt(t.Start.Polar)
	out.Speed, out.Heading, out.Elevation = direction(t.Local.Vel, l)
	out.V[0], out.V[1], out.V[2] = l.Split(t.Local.Vel)
	out.look(t, l, sight)
	out.Height, out.Round = throwTop(m, t)
	a := m.Motion.At(t.Begin + t.End)
	last := a.ToHabitat(t.Last)
	if hit := t.Landing(); hit != nil {
		last = hit.State
		out.HitTime, out.Surface, out.Hit = hit.Time, hit.Surface, throwPlace(m, hit.State.Pos)
	}
	out.Miss = r3.Norm(r3.Sub(last.Pos, end.Pos))
	if t.Outcome != flight.TimeUp && out.Miss > slack { // a touch at the target itself is the arrival
		out.Miss, out.Outcome = math.NaN(), ThrowHits
		if t.Outcome == flight.Lost {
			out.Outcome, out.HitTime, out.Hit = ThrowLost, t.End, throwPlace(m, last.Pos)
		}
		return out
	}
	out.HitTime, out.Surface, out.Hit = math.NaN(), "", noThrowPlace
	out.ArriveSpeed, out.ArriveHead, out.ArriveElev = direction(r3.Sub(last.Vel, end.Vel), m.LocalAt(frame.PolarOf(end.Pos)))
	return out
}

// look tells where to point from where the target is seen.
func (o *Throw) look(t *flight.Track, l frame.Local, sight r3.Vec) {
	line := r3.Sub(sight, t.Local.Pos)
	if r3.Norm(line) < model.TouchSlack || o.Speed == 0 {
		return
	}
	_, o.SightHead, o.SightElev = direction(line, l)
	o.Lead = math.Atan2(r3.Norm(r3.Cross(line, t.Local.Vel)), r3.Dot(line, t.Local.Vel))
	o.LeadHeading, o.LeadUp = frame.WrapAngle(o.Heading-o.SightHead), o.Elevation-o.SightElev
}

// throwTop gives the greatest height (m) above the floor beneath the thrower
// and the angle gone round (rad) of a track up to its end or first touch.
func throwTop(m *model.Model, t *flight.Track) (top, round float64) {
	end := t.End
	if hit := t.Landing(); hit != nil {
		end = hit.Time
	}
	g, w := GroundOf(m, t), NewWinding(m, t)
	height := func(time float64) float64 {
		a := m.Motion.At(t.Begin + time)
		_, _, h := g.Place(a.In(t.At(time).Pos), 0)
		return h
	}
	for _, knot := range throwKnots(t, end) {
		round = w.To(knot)
	}
	const pieces = 400 // of the way: the top lies within one of the highest of their ends
	best := 0
	for k := range pieces + 1 {
		if h := height(end * float64(k) / pieces); k == 0 || h > top {
			top, best = h, k
		}
	}
	lo, hi := end*math.Max(0, float64(best)-1)/pieces, end*math.Min(pieces, float64(best)+1)/pieces
	top = math.Max(top, highest(height, lo, hi))
	return top, round
}

func throwKnots(t *flight.Track, end float64) []float64 {
	var out []float64
	for _, k := range t.Knots() {
		if k < end {
			out = append(out, k)
		}
	}
	return append(out, end)
}

// highest is the greatest value of a function with one top between two
// arguments, by golden section (Kiefer 1953; from memory).
func highest(f func(float64) float64, lo, hi float64) float64 {
	const golden = 0.6180339887498949
	const rounds = 40 // to a part in 1e8 of the way, where the height is level
	a, b := hi-golden*(hi-lo), lo+golden*(hi-lo)
	fa, fb := f(a), f(b)
	best := math.Max(math.Max(fa, fb), math.Max(f(lo), f(hi)))
	for range rounds {
		if fa > fb {
			hi, b, fb = b, a, fa
			a = hi - golden*(hi-lo)
			fa = f(a)
		} else {
			lo, a, fa = a, b, fb
			b = lo + golden*(hi-lo)
			fb = f(b)
		}
		best = math.Max(best, math.Max(fa, fb))
	}
	return best
}

// Each of these is for one degree or for 1 m/s.
const oneDegree = math.Pi / 180

// throwColumns are the columns of throws/NAME.csv.
var throwColumns = []column[Throw]{
	{key: "solution", meaning: "which of the throws that reach this target, by the time that they take; empty: there is none", num: func(t *Throw) float64 {
		if t.Solution == 0 {
			return math.NaN()
		}
		return float64(t.Solution)
	}},
	{key: "distance", unit: metre, partly: true, meaning: "of a throw table: of the target, along its deck from plumb under the thrower", num: func(t *Throw) float64 { return t.Distance }},
	{key: "style", meaning: "direct: the quick way, thrown harder it would take less time, down to none; lobbed: any other; slow: the slowest of those that take about as long; slowest: of all looked at", text: func(t *Throw) string { return t.Style }},
	{key: "outcome", meaning: "arrives, hits something first, lost (it leaves the habitat first), or out of reach: there is no such throw", text: func(t *Throw) string { return t.Outcome }},
	{key: "speed", unit: speedUnit, meaning: "of the throw, relative to the habitat", num: func(t *Throw) float64 { return t.Speed }},
	{key: "heading", unit: degree, meaning: "of the throw: 0 spinward, 90 toward +axial", num: func(t *Throw) float64 { return t.Heading }},
	{key: "elevation", unit: degree, meaning: "of the throw, above the deck", num: func(t *Throw) float64 { return t.Elevation }},
	{key: "v_spinward", unit: speedUnit, meaning: "the same velocity, its part spinward", num: func(t *Throw) float64 { return t.V[0] }},
	{key: "v_axial", unit: speedUnit, meaning: "its part toward +axial", num: func(t *Throw) float64 { return t.V[1] }},
	{key: "v_up", unit: speedUnit, meaning: "its part up", num: func(t *Throw) float64 { return t.V[2] }},
	{key: "time", unit: second, meaning: "of the flight to the target", num: func(t *Throw) float64 { return t.Time }},
	{key: "miss", unit: metre, partly: true, meaning: "how far from the target the throw is, flown among the surfaces, when it should be there", num: func(t *Throw) float64 { return t.Miss }},
	{key: "arrival_speed", unit: speedUnit, partly: true, meaning: "at the target, relative to it", num: func(t *Throw) float64 { return t.ArriveSpeed }},
	{key: "arrival_heading", unit: degree, partly: true, meaning: "which way it flies there, relative to the target", num: func(t *Throw) float64 { return t.ArriveHead }},
	{key: "arrival_elevation", unit: degree, partly: true, meaning: "of that way above the deck", num: func(t *Throw) float64 { return t.ArriveElev }},
	{key: "sight_heading", unit: degree, meaning: "where the thrower sees the target at the throw", num: func(t *Throw) float64 { return t.SightHead }},
	{key: "sight_elevation", unit: degree, meaning: "of that line above the deck", num: func(t *Throw) float64 { return t.SightElev }},
	{key: "lead", unit: degree, meaning: "angle between that line and where to point", num: func(t *Throw) float64 { return t.Lead }},
	{key: "lead_heading", unit: degree, meaning: "heading of the throw less that of the line", num: func(t *Throw) float64 { return t.LeadHeading }},
	{key: "lead_up", unit: degree, meaning: "elevation of the throw less that of the line", num: func(t *Throw) float64 { return t.LeadUp }},
	{key: "top", unit: metre, meaning: "greatest height on the way, above the floor beneath the thrower", num: func(t *Throw) float64 { return t.Height }},
	{key: "round", unit: degree, meaning: "angle gone round on the way, spinward positive", num: func(t *Throw) float64 { return t.Round }},
	{key: "miss_1deg_heading", unit: metre, meaning: "how far it passes the target for each degree that the heading is off, to first order", num: func(t *Throw) float64 { return t.PerHeading * oneDegree }},
	{key: "miss_1deg_elevation", unit: metre, meaning: "the same for each degree that the elevation is off", num: func(t *Throw) float64 { return t.PerElev * oneDegree }},
	{key: "miss_1m_s_speed", unit: metre, meaning: "the same for each m/s that the speed is off", num: func(t *Throw) float64 { return t.PerSpeed }},
	{key: "least_speed", unit: speedUnit, partly: true, meaning: "of the slowest throw that reaches this target, whatever is in the way; empty: not looked for", num: func(t *Throw) float64 { return t.Least }},
	{key: "least_speed_time", unit: second, partly: true, meaning: "of the flight of that throw", num: func(t *Throw) float64 { return t.LeastTime }},
	{key: "to_deck", meaning: "deck beneath the target at the arrival", text: func(t *Throw) string { return t.To.Deck }},
	{key: "to_spinward", unit: metre, meaning: "arc of the target on that deck", num: func(t *Throw) float64 { return t.To.Spinward }},
	{key: "to_axial", unit: metre, meaning: "axial place of the target", num: func(t *Throw) float64 { return t.To.Axial }},
	{key: "to_height", unit: metre, meaning: "height of the target above that deck", num: func(t *Throw) float64 { return t.To.Height }},
	{key: "surface", meaning: "what it hits first", text: func(t *Throw) string { return t.Surface }},
	{key: "hit_time", unit: second, partly: true, meaning: "when it hits that, or leaves the habitat", num: func(t *Throw) float64 { return t.HitTime }},
	{key: "hit_deck", meaning: "deck beneath the body then", text: func(t *Throw) string { return t.Hit.Deck }},
	{key: "hit_spinward", unit: metre, partly: true, meaning: "arc of the body on that deck then", num: func(t *Throw) float64 { return t.Hit.Spinward }},
	{key: "hit_axial", unit: metre, partly: true, meaning: "axial place of the body then", num: func(t *Throw) float64 { return t.Hit.Axial }},
	{key: "hit_height", unit: metre, partly: true, meaning: "height of the body above that deck then", num: func(t *Throw) float64 { return t.Hit.Height }},
}

// ThrowTable is throws/NAME.csv.
func ThrowTable(rows []Throw) *table.Table { return fill(throwColumns, rows) }
