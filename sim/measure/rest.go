package measure

import (
	"math"

	"gonum.org/v1/gonum/integrate/quad"
	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/flight"
	"offplumb/sim/frame"
	"offplumb/sim/model"
)

// Rest is where a release ends. Lengths in m, times in s.
type Rest struct {
	Release string
	Outcome flight.Outcome
	Surface string // what it rests on, or landed on
	Time    float64
	Place   model.Place
	Deck    string
	Arc     float64
	Speed   float64 // m/s, relative to the habitat
	Impacts int
	Path    float64 // way of the centre relative to the habitat
	Slid    float64 // the part of it slid or rolled
	Story   string
}

// EndOf measures how a track ends.
func EndOf(m *model.Model, t *flight.Track) Rest {
	a := m.Motion.At(t.Begin + t.End)
	local := a.ToHabitat(t.Last)
	out := Rest{Release: t.Release.Name, Outcome: t.Outcome, Time: t.End,
		Speed: r3.Norm(local.Vel), Impacts: len(t.Impacts), Surface: endSurface(t)}
	out.Place, out.Deck, out.Arc = stand(m, local.Pos)
	if t.Outcome == flight.Rested || t.Outcome == flight.Stuck {
		out.Speed = 0
	}
	for i := range t.Phases {
		way := wayOf(m, t, &t.Phases[i])
		out.Path += way
		if k := t.Phases[i].Kind; k == flight.Slide || k == flight.Roll {
			out.Slid += way
		}
	}
	out.Story = Story(m, t)
	return out
}

func endSurface(t *flight.Track) string {
	if n := len(t.Phases); n > 0 && t.Outcome != flight.Landed && t.Outcome != flight.Lost {
		return t.Phases[n-1].Surface
	}
	if hit := t.Landing(); hit != nil && t.Outcome == flight.Landed {
		return hit.Surface
	}
	return ""
}

const (
	// wayNodes is the order of the quadrature of a way. It is exact to degree 9.
	wayNodes = 5
	// waySpread is the ratio of the greatest to the least speed up to which a
	// stretch is taken at once: the next term of the series of a speed that
	// changes by so much is below 1e-9 of it. Else it is halved.
	waySpread = 1.3
	// wayHalves is how often, at most: of a body that turns back, some 1e-5 of
	// the way of one integration step is left to chance.
	wayHalves = 8
)

// wayAt and wayWeight are the nodes on [0, 1] and the weights of the rule of
// Gauss and Legendre.
var wayAt, wayWeight = func() (at, weight [wayNodes]float64) {
	quad.Legendre{}.FixedLocations(at[:], weight[:], 0, 1)
	return at, weight
}()

// wayOf integrates the speed relative to the habitat over a phase.
func wayOf(m *model.Model, t *flight.Track, p *flight.Phase) float64 {
	sum := 0.0
	for k := range p.Steps() {
		t0, t1 := p.Step(k)
		n := wayParts(m, t.Begin+t0, t1-t0)
		for i := range n {
			from, to := t0+(t1-t0)*float64(i)/float64(n), t0+(t1-t0)*float64(i+1)/float64(n)
			sum += wayIn(t, p, k, from, to, wayHalves)
		}
	}
	return sum
}

// mostWayParts bounds the stretches of one step.
const mostWayParts = 10_000

// wayParts is in how many stretches a step from a habitat time on is taken at
// least, lest the habitat turns to and fro unseen between two nodes.
func wayParts(m *model.Model, from, over float64) int {
	s := m.Motion.Stretch(from + over/2) // the middle: no rounding counts
	return 1 + int(math.Min(over/s.Pace, mostWayParts))
}

// wayIn is the way from t0 to t1 (s) in an integration step.
func wayIn(t *flight.Track, p *flight.Phase, k int, t0, t1 float64, halves int) float64 {
	part, least, most := 0.0, math.Inf(1), 0.0
	for i, x := range wayAt {
		v := t.SpeedSeen(p, k, t0+(t1-t0)*x)
		part += wayWeight[i] * v
		least, most = min(least, v), max(most, v)
	}
	if most <= waySpread*least || halves == 0 {
		return (t1 - t0) * part
	}
	mid := t0 + (t1-t0)/2
	return wayIn(t, p, k, t0, mid, halves-1) + wayIn(t, p, k, mid, t1, halves-1)
}

// localAt gives the state of a track in habitat components.
func localAt(m *model.Model, t *flight.Track, time float64) frame.State {
	a := m.Motion.At(t.Begin + time)
	return a.ToHabitat(t.At(time))
}

// The kinds of events.
const (
	Impact = "impact"
	Leaves = "leaves"
)

// Event is an impact, or the leaving of a passage.
type Event struct {
	Time        float64
	Kind        string // impact, or leaves
	Surface     string // of an impact; of a leaving, the passage
	Place       model.Place
	Deck        string
	Arc         float64
	Speed       float64 // m/s, of the centre relative to the surface
	NormalSpeed float64
	Incidence   float64 // rad
	Energy      float64 // J
	Normal      float64 // J, of the motion along the normal
}

// Events lists the impacts of a track and its leavings of passages outward, in
// their order.
func Events(m *model.Model, t *flight.Track) []Event {
	var out []Event
	for i := range t.Impacts {
		hit := &t.Impacts[i]
		var l Landing
		l.strike(t.Body.Mass, hit)
		e := eventAt(m, hit.State, hit.Time)
		e.Kind, e.Surface = Impact, hit.Surface
		e.Speed, e.NormalSpeed, e.Incidence, e.Energy, e.Normal = l.Speed, l.NormalSpeed, l.Incidence, l.Energy, l.NormalEnergy
		out = append(out, e)
	}
	for i := range m.Passages {
		out = append(out, leavings(m, t, &m.Passages[i])...)
	}
	for i := 1; i < len(out); i++ {
		for k := i; k > 0 && out[k].Time < out[k-1].Time; k-- {
			out[k], out[k-1] = out[k-1], out[k]
		}
	}
	return out
}

func eventAt(m *model.Model, s frame.State, time float64) Event {
	e := Event{Time: time}
	e.Place, e.Deck, e.Arc = stand(m, s.Pos)
	return e
}

// leavings finds where a track passes the outer end of a passage outward,
// within its section.
func leavings(m *model.Model, t *flight.Track, p *model.Passage) []Event {
	var out []Event
	knots := t.Knots()
	for k := 1; k < len(knots); k++ {
		before, parts := knots[k-1], partsOf(m, t, knots[k-1], knots[k])
		for part := 1.0; part <= parts; part++ {
			now := knots[k-1] + (knots[k]-knots[k-1])*part/parts
			if where(m, t, before).R <= p.ToRadius && where(m, t, now).R > p.ToRadius {
				at := crossing(m, t, p.ToRadius, before, now)
				if s := localAt(m, t, at); inSection(p, s.Pos) {
					out = append(out, leaving(m, t, p, s, at))
				}
			}
			before = now
		}
	}
	return out
}

func leaving(m *model.Model, t *flight.Track, p *model.Passage, s frame.State, at float64) Event {
	e := eventAt(m, s, at)
	e.Kind, e.Surface = Leaves, p.Name
	e.Speed, e.NormalSpeed, e.Incidence, e.Normal = r3.Norm(s.Vel), math.NaN(), math.NaN(), math.NaN()
	e.Energy = energy(t.Body.Mass, e.Speed)
	return e
}

// inSection says whether a place is within the section of a passage.
func inSection(p *model.Passage, pos r3.Vec) bool {
	l := frame.LocalAt(p.Spinward.Angle(p.FromRadius))
	across, along := math.Abs(r3.Dot(pos, l.Spinward)), math.Abs(pos.Z-p.Axial)
	if r3.Dot(pos, l.Up) > 0 {
		return false // across the axis
	}
	if p.Width > 0 {
		return across <= p.Width/2 && along <= p.Width/2
	}
	return math.Hypot(across, along) <= p.Diameter/2
}
