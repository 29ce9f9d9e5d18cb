package flight

import (
	"fmt"
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/crew"
	"offplumb/sim/frame"
	"offplumb/sim/model"
)

// Let is a release worked out: where and how fast it starts.
type Let struct {
	Release *model.Release
	Body    model.Body
	Place   model.Place
	Begin   float64     // s, habitat time
	Local   frame.State // habitat components
}

// Release works out where and how fast a release starts. The problem's key
// is relative to the release; it is empty when there is none. plan is that of
// the crew path for a release that is carried, else nil.
func Release(m *model.Model, r *model.Release, plan *crew.Plan) (Let, model.Problem) {
	let := Let{Release: r, Body: m.BodyOf(r), Begin: r.Time}
	if r.Carried != nil {
		return carried(m, let, plan)
	}
	p, err := m.Resolve(r.At)
	if err != nil {
		return let, model.Problem{Key: "at", Msg: err.Error()}
	}
	let.Place = p
	let.Local = frame.State{Pos: p.Vec(), Vel: startVelocity(m, r, r.Time, p.Polar, r3.Vec{})}
	return let, model.Problem{}
}

// carried starts a release from the moving hand: it has the velocity of that
// point of the body, and its own motion on top.
func carried(m *model.Model, let Let, plan *crew.Plan) (Let, model.Problem) {
	c := let.Release.Carried
	if c.Time < 0 || c.Time > plan.Duration() {
		return let, model.Problem{Key: "carried.time", Msg: fmt.Sprintf("wants a time within the path, which takes %.6g s", plan.Duration())}
	}
	feet := plan.At(c.Time)
	hand := feet.Point(c.Reach)
	let.Begin = plan.Path.Time + c.Time
	let.Place = m.PlaceOf(hand.Pos)
	if msg := m.Obstructed(let.Place, let.Body.Diameter/2); msg != "" {
		return let, model.Problem{Key: "carried", Msg: msg}
	}
	let.Local = frame.State{Pos: hand.Pos, Vel: startVelocity(m, let.Release, let.Begin, let.Place.Polar, hand.Vel)}
	return let, model.Problem{}
}

// startVelocity gives the velocity relative to the habitat, in habitat
// components, of a release at p from a support that moves with the velocity
// base (m/s). Heading counts from spinward toward +axial, elevation from the
// deck up: on a flat floor these are its own directions, wherever over it p is.
func startVelocity(m *model.Model, r *model.Release, begin float64, p frame.Polar, base r3.Vec) r3.Vec {
	l := m.LocalAt(p)
	s := &r.Start
	switch s.Kind {
	case model.Thrown:
		level := s.Speed * math.Cos(s.Elevation)
		return r3.Add(base, l.Vec(level*math.Cos(s.Heading), level*math.Sin(s.Heading), s.Speed*math.Sin(s.Elevation)))
	case model.Velocity:
		return r3.Add(base, l.Vec(s.VSpinward, s.VAxial, s.VUp))
	case model.Still:
		a := m.Motion.At(begin)
		return a.ToHabitat(frame.State{Pos: a.Out(p.Vec())}).Vel
	}
	return base
}
