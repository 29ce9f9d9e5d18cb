package crew

import (
	"fmt"
	"math"

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
	Deck int     // index of the deck beneath the start
	Arc0 float64 // m, arc of the start on that deck

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
	for i := range p.Legs {
		b.add(i, &p.Legs[i])
	}
	if len(b.plan.legs) == 0 && len(b.problems) == 0 {
		b.fault("legs", "wants at least one leg")
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

func (b *builder) walk(key string, l *leg) {
	if b.deck < 0 || math.Abs(b.at.r-b.m.Decks[b.deck].Radius) > levelSlack {
		b.fault(key+".walk", "no deck underfoot: the feet are %.4g m from the axis", b.at.r)
		return
	}
	deck := &b.m.Decks[b.deck]
	to := b.at
	to.phi = walkTo(l.spec, b.at.phi, deck.Radius)
	if l.spec.Axial != nil {
		to.z = *l.spec.Axial
	}
	if !b.onDeck(l.deck, b.at, to) {
		b.fault(key+".walk", "leads off deck %q", deck.Name)
		return
	}
	b.follow(key+".walk", l, newArc(b.at, to, math.Hypot(deck.Radius*(to.phi-b.at.phi), to.z-b.at.z)))
}

// follow lets a leg follow a course.
func (b *builder) follow(key string, l *leg, c course) {
	if c.length() == 0 {
		b.fault(key, "a leg of no length: the person is there already")
		return
	}
	l.course = c
	b.at = c.end()
	l.way = profileOf(l.spec, c.length())
}

// profileOf is how a leg's way of a length (m) is gone.
func profileOf(spec *model.Leg, long float64) profile {
	if spec.Trapezoid && spec.Ramp > 0 {
		return newTrapezoid(long, spec.Speed, spec.Ramp)
	}
	return newRamped(long, spec.Speed, spec.Ramp)
}

// walkTo gives the angle (rad, not wrapped) that a walk ends at.
func walkTo(spec *model.Leg, phi, radius float64) float64 {
	if spec.Spinward != nil {
		phi = spec.Spinward.Angle(radius)
	}
	return phi + 2*math.Pi*spec.Laps
}

// onDeck tries the way at points half a foot's width apart at most.
func (b *builder) onDeck(d int, from, to spot) bool {
	deck := &b.m.Decks[d]
	if deck.Whole {
		return to.z >= deck.Axial[0] && to.z <= deck.Axial[1]
	}
	turn := math.Abs(to.phi - from.phi)
	n := 2 + int(math.Min(1e6, deck.Radius*turn/0.05))
	for k := 0; k <= n; k++ {
		u := float64(k) / float64(n)
		if !deck.Covers(from.phi+u*(to.phi-from.phi), from.z+u*(to.z-from.z)) {
			return false
		}
	}
	return true
}

// rise lets the person stand up or sit down: waist and head move, the feet
// stay. A person who stands up before having sat down was sitting from the
// start of the path.
func (b *builder) rise(key string, l *leg) {
	by := l.spec.Distance
	if l.spec.Kind == model.StandUp {
		b.low -= by
	} else {
		b.low += by
	}
	if up := -b.low; up > 0 {
		for i := range b.plan.legs {
			b.plan.legs[i].low += up
		}
		l.low, b.low, b.lowest = l.low+up, 0, b.lowest+up
	}
	b.lowest = math.Max(b.lowest, math.Max(l.low, b.low))
	if most := b.plan.Crew.Waist * b.plan.Crew.Stature; b.lowest > most {
		b.fault(key, "the waist, at %.3g m, would be lower than the feet", most)
		return
	}
	l.way = profileOf(l.spec, by)
}

func (b *builder) climb(key string, l *leg) {
	name, down := key+".climb", l.spec.Kind == model.Descend
	if down {
		name = key + ".descend"
	}
	b.follow(name, l, b.ladder(l.spec, down))
	b.hatch(key+".through", l)
	b.arrive(name)
}

// ladder gives the course of a climb.
func (b *builder) ladder(spec *model.Leg, down bool) course {
	if spec.Pitch > 0 && spec.Pitch < math.Pi/2 {
		return newLine(b.at, spec.Pitch, spec.Facing, spec.Distance, down)
	}
	to := b.at
	to.r -= spec.Distance
	if down {
		to.r = b.at.r + spec.Distance
	}
	return newArc(b.at, to, spec.Distance)
}

// arrive checks the end of a climb or a ride, and joins the deck that it is
// level with.
func (b *builder) arrive(key string) {
	if b.at.r > b.m.Decks[0].Radius+levelSlack {
		b.fault(key, "leads below the reference floor")
	}
	if b.at.r <= 0 {
		b.fault(key, "leads to the axis or beyond")
	}
	b.deck = b.levelDeck(b.at)
}

// ride moves the person in a lift, radially or along the ring.
func (b *builder) ride(key string, l *leg) {
	to := b.at
	long := math.Abs(l.spec.Up)
	to.r -= l.spec.Up
	if l.spec.Round != nil {
		turn := l.spec.Round.Angle(b.at.r)
		to.phi += turn
		long = math.Abs(turn) * b.at.r
	}
	b.follow(key+".ride", l, newArc(b.at, to, long))
	b.arrive(key + ".ride")
}

// hatch checks that a climb leads through the opening that it names, and that
// the person's shoulders pass it.
func (b *builder) hatch(key string, l *leg) {
	name := l.spec.Through
	if name == "" || l.course == nil {
		return
	}
	d, o := b.opening(name)
	if o == nil {
		b.fault(key, "no opening named %q", name)
		return
	}
	lo, hi := math.Min(l.from.r, b.at.r), math.Max(l.from.r, b.at.r)
	if d.Radius < lo-levelSlack || d.Radius > hi+levelSlack {
		b.fault(key, "the way does not cross deck %q, in which %q is", d.Name, name)
		return
	}
	half := b.plan.Crew.Breadth / 2
	if room := b.roomIn(d, o, l); room < half {
		b.fault(key, "%q leaves %.3g m to its rim beside the person's middle, who needs %.3g m", name, room, half)
	}
}

// roomIn gives the least distance (m) of the person's middle from the rim of
// an opening while any part of the person is in it: on a pitched ladder, whose
// climber stands along the radius, head and feet pass it at different places.
func (b *builder) roomIn(d *model.Deck, o *model.Opening, l *leg) float64 {
	out := math.Inf(1)
	tall := b.plan.Crew.Stature
	if l.spec.HeadFirst {
		tall = -tall
	}
	for _, r := range []float64{d.Radius, d.Radius + tall} {
		at := crossing(l.course, r)
		across := d.Radius * math.Abs(frame.WrapAngle(at.phi-o.Spinward.Angle(d.Radius)))
		out = math.Min(out, math.Min(o.Size[0]/2-across, o.Size[1]/2-math.Abs(at.z-o.Axial)))
	}
	return out
}

// opening finds an opening by its name.
func (b *builder) opening(name string) (*model.Deck, *model.Opening) {
	for i := range b.m.Decks {
		d := &b.m.Decks[i]
		for k := range d.Openings {
			if d.Openings[k].Name == name {
				return d, &d.Openings[k]
			}
		}
	}
	return nil, nil
}

// levelDeck gives the deck that the end of a climb is level with; -1 where
// there is none.
func (b *builder) levelDeck(at spot) int {
	for i := range b.m.Decks {
		d := &b.m.Decks[i]
		if math.Abs(d.Radius-at.r) <= levelSlack && b.besides(d, at) {
			return i
		}
	}
	return -1
}

// besides says whether the deck is there or within a step, 1 m, of it: a
// ladder ends in the opening or at the edge of the deck that it leads to.
func (b *builder) besides(d *model.Deck, at spot) bool {
	step := 1 / d.Radius
	return d.Covers(at.phi, at.z) || d.Covers(at.phi+step, at.z) || d.Covers(at.phi-step, at.z)
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
	Along        float64 // m since the start of the path
	HeadTurn     r3.Vec  // rad/s, rate of the head relative to the body, habitat components
	HeadFirst    bool    // the head is outward of the feet
	low          motion  // m, by which waist and head are lower than standing
}

// At gives the feet at a time (s from the start of the path), held at its ends.
func (p *Plan) At(t float64) Feet {
	i := p.legAt(t)
	l := &p.legs[i]
	s := l.way.at(t - l.start)
	f := Feet{R: l.from.r, Phi: l.from.phi, Z: l.from.z, Leg: i, Along: p.before(i), HeadFirst: l.spec.HeadFirst}
	f.low.x = l.low
	switch l.spec.Kind {
	case model.StandUp:
		f.low = motion{l.low - s.x, -s.v, -s.a}
	case model.SitDown:
		f.low = motion{l.low + s.x, s.v, s.a}
	}
	switch {
	case l.spec.Kind == model.TurnHead:
		f.HeadTurn = r3.Scale(s.v, headAxis(l.spec.About, f.Phi))
	case l.spec.Kind == model.Turn:
		f.HeadTurn = r3.Scale(-s.v, frame.LocalAt(f.Phi).Up)
	case l.course != nil:
		l.course.put(&f, s)
		f.Along += s.x
		// A body that goes round turns with it.
		f.HeadTurn = r3.Vec{Z: f.VPhi}
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

func headAxis(about model.Axis, phi float64) r3.Vec {
	l := frame.LocalAt(phi)
	switch about {
	case model.AboutSpinward:
		return l.Spinward
	case model.AboutAxial:
		return l.Axial
	}
	return l.Up
}
