package crew

import (
	"fmt"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/frame"
	"offplumb/sim/model"
)

// levelSlack is how near to a deck, in m, a climb must end to join it: a
// millimetre, less than any rung is true by.
const levelSlack = 1e-3

// Plan is a crew path worked out: where the person's feet are at each time.
type Plan struct {
	Path *model.Path
	Crew model.Crew
	Deck int         // index of the deck beneath the start
	Arc0 float64     // m, arc of the start on that deck, or straight length from the middle of a flat floor
	Flat *model.Flat // the flat floor of the cabin that the path starts in; nil for decks about the axis

	legs []leg
}

// leg is one leg of a plan.
type leg struct {
	start  float64 // s from the start of the path
	from   spot
	deck   int     // the deck that it is on or begins at
	low    float64 // m, by which the person is lower than standing at its start
	way    profile
	course course // nil: the feet stay
	spec   *model.Leg
}

// length is the way of the feet, m.
func (l *leg) length() float64 {
	if l.course == nil {
		return 0
	}
	return l.course.length()
}

// spot is where feet are: radius (m), angle (rad, not wrapped), axial (m).
type spot struct{ r, phi, z float64 }

// longestPath bounds a path, s: eleven days. Its work is added up over a quarter
// of a second at a time, which takes some 20 s of processor time then.
const longestPath = 1e6

// NewPlan works a path out. The problems are those of its legs, their keys
// relative to the path ("legs[1].climb").
func NewPlan(m *model.Model, p *model.Path) (*Plan, []model.Problem) {
	start, err := m.Resolve(p.Start)
	if err != nil {
		return nil, []model.Problem{{Key: "start", Msg: err.Error()}}
	}
	b := builder{m: m, plan: &Plan{Path: p, Crew: m.CrewOf(p), Deck: start.Deck}, deck: start.Deck}
	b.at = spot{r: start.R, phi: start.Phi, z: start.Z}
	b.plan.Arc0 = m.Decks[start.Deck].Radius * start.Phi
	if f := m.FlatBeneath(start.Vec()); f != nil {
		b.plan.Flat = f
		b.plan.Arc0, _, _ = f.Place(start.Vec())
	}
	for i := range p.Legs {
		b.add(i, &p.Legs[i])
	}
	if len(b.plan.legs) == 0 && len(b.problems) == 0 {
		b.fault("legs", "wants at least one leg")
	}
	if lasts := b.plan.Duration(); lasts > longestPath {
		b.fault("legs", "take %.4g s together, want at most %g s: the work is added up along all of it", lasts, float64(longestPath))
	}
	if len(b.problems) == 0 {
		b.problems = b.plan.clear(m)
	}
	if len(b.problems) > 0 {
		return nil, b.problems
	}
	return b.plan, nil
}

// builder strings legs together.
type builder struct {
	m        *model.Model
	plan     *Plan
	at       spot
	deck     int     // -1 between decks
	low      float64 // m, by which the person is lower than standing
	lowest   float64 // m, the most of it so far
	time     float64
	problems []model.Problem
}

func (b *builder) fault(key, format string, args ...any) {
	b.problems = append(b.problems, model.Problem{Key: key, Msg: fmt.Sprintf(format, args...)})
}

func (b *builder) add(i int, spec *model.Leg) {
	key := fmt.Sprintf("legs[%d]", i)
	l := leg{start: b.time, from: b.at, deck: b.deck, low: b.low, spec: spec}
	switch spec.Kind {
	case model.Walk:
		b.walk(key, &l)
	case model.Climb, model.Descend:
		b.climb(key, &l)
	case model.Ride:
		b.ride(key, &l)
	case model.TurnHead, model.Turn:
		l.way = swing{angle: spec.Angle, over: spec.Duration}
	case model.StandUp, model.SitDown:
		b.rise(key, &l)
	default:
		l.way = pause(spec.Duration)
	}
	if l.way == nil {
		return
	}
	b.time += l.way.lasts()
	b.plan.legs = append(b.plan.legs, l)
}

// Duration is how long the path takes, s.
func (p *Plan) Duration() float64 {
	if len(p.legs) == 0 {
		return 0
	}
	last := &p.legs[len(p.legs)-1]
	return last.start + last.way.lasts()
}

// Length is the way of the feet over the whole path, m.
func (p *Plan) Length() float64 { return p.before(len(p.legs)) }

// TimeAlong gives the first time (s) at which the feet have gone a way (m).
func (p *Plan) TimeAlong(way float64) float64 {
	lo, hi := 0.0, p.Duration()
	if way <= 0 {
		return 0
	}
	for {
		mid := lo + (hi-lo)/2
		if mid <= lo || mid >= hi {
			return hi
		}
		if p.At(mid).Along >= way {
			hi = mid
		} else {
			lo = mid
		}
	}
}

// legAt gives the leg under way at a time, the earlier one at a joint.
func (p *Plan) legAt(t float64) int {
	for i := range p.legs {
		if l := &p.legs[i]; t <= l.start+l.way.lasts() {
			return i
		}
	}
	return len(p.legs) - 1
}

// Joints gives the times at which legs begin, and that of the end, s.
func (p *Plan) Joints() []float64 {
	var at []float64
	for i := range p.legs {
		at = append(at, p.legs[i].start)
	}
	return append(at, p.Duration())
}

// LegName names the i-th leg.
func (p *Plan) LegName(i int) string {
	names := map[model.LegKind]string{model.Walk: "walk", model.Stand: "stand", model.Climb: "climb",
		model.Descend: "descend", model.Turn: "turn", model.Ride: "ride", model.TurnHead: "turn head", model.StandUp: "stand up", model.SitDown: "sit down"}
	return fmt.Sprintf("%d %s", i+1, names[p.legs[i].spec.Kind])
}

// Legs is the number of legs.
func (p *Plan) Legs() int { return len(p.legs) }

// Feet is the motion of a person's feet in cylindrical habitat coordinates.
type Feet struct {
	R, Phi, Z    float64 // m, rad (not wrapped), m
	VR, VPhi, VZ float64 // m/s, rad/s, m/s
	AR, APhi, AZ float64 // m/s^2, rad/s^2, m/s^2
	Leg          int
	Along        float64     // m since the start of the path
	HeadTurn     r3.Vec      // rad/s, rate of the head relative to the body, habitat components
	HeadFirst    bool        // the head is outward of the feet
	flat         *model.Flat // stood on along its normal; nil: along the radius
	low          motion      // m, by which waist and head are lower than standing
}

// At gives the feet at a time (s from the start of the path), held at its ends.
func (p *Plan) At(t float64) Feet {
	i := p.legAt(t)
	l := &p.legs[i]
	s := l.way.at(t - l.start)
	f := Feet{R: l.from.r, Phi: l.from.phi, Z: l.from.z, Leg: i, Along: p.before(i), HeadFirst: l.spec.HeadFirst, flat: p.Flat}
	f.low.x = l.low
	switch l.spec.Kind {
	case model.StandUp:
		f.low = motion{l.low - s.x, -s.v, -s.a}
	case model.SitDown:
		f.low = motion{l.low + s.x, s.v, s.a}
	}
	switch {
	case l.spec.Kind == model.TurnHead:
		f.HeadTurn = r3.Scale(s.v, headAxis(l.spec.About, f.Local()))
	case l.spec.Kind == model.Turn:
		f.HeadTurn = r3.Scale(s.v, f.Local().Up)
	case l.course != nil:
		l.course.put(&f, s)
		f.Along += s.x
		if f.flat == nil { // a body that goes round the axis turns with it
			f.HeadTurn = r3.Vec{Z: f.VPhi}
		}
	}
	return f
}

func (p *Plan) before(i int) float64 {
	sum := 0.0
	for k := range p.legs[:i] {
		sum += p.legs[k].length()
	}
	return sum
}

func headAxis(about model.Axis, l frame.Local) r3.Vec {
	switch about {
	case model.AboutSpinward:
		return l.Spinward
	case model.AboutAxial:
		return l.Axial
	}
	return l.Up
}
