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
	to     spot
	deck   int     // the deck that it is on or begins at
	low    float64 // m, by which the person is lower than standing at its start
	way    profile
	length float64 // m
	spec   *model.Leg
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
	time     float64
	problems []model.Problem
}

func (b *builder) fault(key, format string, args ...any) {
	b.problems = append(b.problems, model.Problem{Key: key, Msg: fmt.Sprintf(format, args...)})
}

func (b *builder) add(i int, spec *model.Leg) {
	key := fmt.Sprintf("legs[%d]", i)
	l := leg{start: b.time, from: b.at, to: b.at, deck: b.deck, low: b.low, spec: spec}
	switch spec.Kind {
	case model.Walk:
		b.walk(key, &l)
	case model.Climb, model.Descend:
		b.climb(key, &l)
	case model.TurnHead:
		l.way = swing{angle: spec.Angle, over: spec.Duration}
	case model.StandUp, model.SitDown:
		b.rise(key, &l)
	default:
		l.way = pause(spec.Duration)
	}
	if l.way == nil {
		return
	}
	b.at, b.time = l.to, b.time+l.way.lasts()
	b.plan.legs = append(b.plan.legs, l)
}

func (b *builder) walk(key string, l *leg) {
	if b.deck < 0 || math.Abs(b.at.r-b.m.Decks[b.deck].Radius) > levelSlack {
		b.fault(key+".walk", "no deck underfoot: the feet are %.4g m from the axis", b.at.r)
		return
	}
	deck := &b.m.Decks[b.deck]
	l.to.phi = walkTo(l.spec, b.at.phi, deck.Radius)
	if l.spec.Axial != nil {
		l.to.z = *l.spec.Axial
	}
	if !b.onDeck(l) {
		b.fault(key+".walk", "leads off deck %q", deck.Name)
		return
	}
	l.length = math.Hypot(deck.Radius*(l.to.phi-l.from.phi), l.to.z-l.from.z)
	if l.length == 0 {
		b.fault(key+".walk", "a leg of no length: the person is there already")
		return
	}
	l.way = newRamped(l.length, l.spec.Speed, l.spec.Ramp)
}

// walkTo gives the angle (rad, not wrapped) that a walk ends at.
func walkTo(spec *model.Leg, phi, radius float64) float64 {
	if spec.Spinward != nil {
		phi = spec.Spinward.Angle(radius)
	}
	return phi + 2*math.Pi*spec.Laps
}

// onDeck tries the way at points half a foot's width apart at most.
func (b *builder) onDeck(l *leg) bool {
	deck := &b.m.Decks[l.deck]
	if deck.Whole {
		return l.to.z >= deck.Axial[0] && l.to.z <= deck.Axial[1]
	}
	turn := math.Abs(l.to.phi - l.from.phi)
	n := 2 + int(math.Min(1e6, deck.Radius*turn/0.05))
	for k := 0; k <= n; k++ {
		u := float64(k) / float64(n)
		if !deck.Covers(l.from.phi+u*(l.to.phi-l.from.phi), l.from.z+u*(l.to.z-l.from.z)) {
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
		if b.low < 0 {
			for i := range b.plan.legs {
				b.plan.legs[i].low -= b.low
			}
			l.low -= b.low
			b.low = 0
		}
	} else {
		b.low += by
	}
	if most := b.plan.Crew.Waist * b.plan.Crew.Stature; l.low > most || b.low > most {
		b.fault(key, "the waist, at %.3g m, would be lower than the feet", most)
		return
	}
	l.way = newRamped(by, l.spec.Speed, l.spec.Ramp)
}

func (b *builder) climb(key string, l *leg) {
	way := -l.spec.Distance
	name := ".climb"
	if l.spec.Kind == model.Descend {
		way, name = -way, ".descend"
	}
	l.to.r += way
	l.length = math.Abs(way)
	l.way = newRamped(l.length, l.spec.Speed, l.spec.Ramp)
	if l.to.r > b.m.Decks[0].Radius+levelSlack {
		b.fault(key+name, "leads below the reference floor")
	}
	b.deck = b.levelDeck(&l.to)
}

// levelDeck joins the end of a climb to the deck that it is level with; -1
// where there is none. The spot is put on it exactly.
func (b *builder) levelDeck(at *spot) int {
	for i := range b.m.Decks {
		d := &b.m.Decks[i]
		if math.Abs(d.Radius-at.r) <= levelSlack && b.besides(d, *at) {
			at.r = d.Radius
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
		model.Descend: "descend", model.TurnHead: "turn head", model.StandUp: "stand up", model.SitDown: "sit down"}
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
	low          motion  // m, by which waist and head are lower than standing
}

// At gives the feet at a time (s from the start of the path), held at its ends.
func (p *Plan) At(t float64) Feet {
	i := p.legAt(t)
	l := &p.legs[i]
	s := l.way.at(t - l.start)
	f := Feet{R: l.from.r, Phi: l.from.phi, Z: l.from.z, Leg: i, Along: p.before(i)}
	f.low.x = l.low
	switch l.spec.Kind {
	case model.StandUp:
		f.low = motion{l.low - s.x, -s.v, -s.a}
	case model.SitDown:
		f.low = motion{l.low + s.x, s.v, s.a}
	}
	if l.spec.Kind == model.TurnHead {
		f.HeadTurn = r3.Scale(s.v, headAxis(l.spec.About, f.Phi))
		return f
	}
	if l.length == 0 {
		return f
	}
	dr, dphi, dz := (l.to.r-l.from.r)/l.length, (l.to.phi-l.from.phi)/l.length, (l.to.z-l.from.z)/l.length
	f.R, f.Phi, f.Z = f.R+dr*s.x, f.Phi+dphi*s.x, f.Z+dz*s.x
	f.VR, f.VPhi, f.VZ = dr*s.v, dphi*s.v, dz*s.v
	f.AR, f.APhi, f.AZ = dr*s.a, dphi*s.a, dz*s.a
	f.Along += s.x
	return f
}

func (p *Plan) before(i int) float64 {
	sum := 0.0
	for k := range p.legs[:i] {
		sum += p.legs[k].length
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
