package measure

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/flight"
	"offplumb/sim/frame"
	"offplumb/sim/model"
)

// turnStep bounds how far, in rad, the habitat turns between two of the
// instants at which the angle gone round is added up: an eighth of a turn,
// well below the half turn at which an angle would be ambiguous.
const turnStep = math.Pi / 4

// stepParts is into how many parts, at the least, each integration step is
// cut for adding up angles.
const stepParts = 4

// Winding follows the angle that a body has gone round in the habitat frame
// since its release, without a jump.
type Winding struct {
	m   *model.Model
	t   *flight.Track
	at  float64 // s
	att frame.Attitude
	pos r3.Vec // inertial
	sum float64
	gap float64 // s, the longest stretch taken at once
}

// NewWinding begins at the release.
func NewWinding(m *model.Model, t *flight.Track) *Winding {
	omega, _ := m.Motion.Bounds(t.Begin, t.Begin+t.End)
	w := &Winding{m: m, t: t, att: m.Motion.At(t.Begin), pos: t.First.Pos, gap: math.Inf(1)}
	if omega > 0 {
		w.gap = turnStep / omega
	}
	return w
}

// To moves on to a later time (s since the release) and gives the angle gone
// round, rad, spinward positive. The way between this time and the last must
// be smooth and short of half a turn seen in the inertial frame, which is so
// within an integration step.
func (w *Winding) To(time float64) float64 {
	n := math.Max(1, math.Ceil((time-w.at)/w.gap))
	from := w.at
	for k := 1.0; k <= n; k++ {
		w.hop(from + (time-from)*k/n)
	}
	return w.sum
}

// hop adds the angle of the inertial way, seen in the habitat as it stood at
// its start, less the angle that the habitat has turned by meanwhile.
func (w *Winding) hop(time float64) {
	att, pos := w.m.Motion.At(w.t.Begin+time), w.t.At(time).Pos
	q0, q1, now := w.att.In(w.pos), w.att.In(pos), att.In(pos)
	w.sum += math.Atan2(q0.X*q1.Y-q0.Y*q1.X, q0.X*q1.X+q0.Y*q1.Y)
	w.sum += math.Atan2(q1.X*now.Y-q1.Y*now.X, q1.X*now.X+q1.Y*now.Y)
	w.at, w.att, w.pos = time, att, pos
}

// GoneRound gives the angle, rad, that a body has gone round in the habitat
// frame from its release to a time (s since the release).
func GoneRound(m *model.Model, t *flight.Track, time float64) float64 {
	if angle, ok := nearby(m, t, time); ok {
		return angle
	}
	w := NewWinding(m, t)
	knots := t.Knots()
	for i := 1; i < len(knots); i++ {
		from, to := knots[i-1], math.Min(knots[i], time)
		for k := 1; k <= stepParts && to > from; k++ {
			w.To(from + (to-from)*float64(k)/stepParts)
		}
	}
	return w.sum
}

// roomy is the factor by which the way of a step may exceed that at the greater
// speed of its ends: a step is short enough for the speed to change little.
const roomy = 2

// nearby gives the angle that a body has gone round, where it has surely not
// come farther than half its distance from the axis: then there is but one. What
// its speed is within a step is known of a steady spin alone.
func nearby(m *model.Model, t *flight.Track, time float64) (float64, bool) {
	if !m.Motion.Stretch(t.Begin).Steady() {
		return 0, false
	}
	from := t.Local.Pos
	left, speed := math.Hypot(from.X, from.Y)/2, r3.Norm(t.Local.Vel)
	var last *flight.Phase // the last step seen
	step, until := 0, 0.0
	for i := range t.Phases {
		p := &t.Phases[i]
		for k := range p.Steps() {
			t0, t1 := p.Step(k)
			if t0 >= time {
				break
			}
			now := t.SpeedSeen(p, k, math.Min(t1, time))
			left -= roomy * math.Max(speed, now) * (t1 - t0)
			if left < 0 {
				return 0, false
			}
			last, step, until, speed = p, k, math.Min(t1, time), now
		}
		speed = math.Inf(1) // an impact changes it: not less than at its start
		if k := i + 1; k < len(t.Phases) && t.Phases[k].Steps() > 0 {
			t0, _ := t.Phases[k].Step(0)
			speed = t.SpeedSeen(&t.Phases[k], 0, t0)
		}
	}
	at := from
	if last != nil {
		at = t.Seen(last, step, until).Pos
	}
	return math.Atan2(from.X*at.Y-from.Y*at.X, from.X*at.X+from.Y*at.Y), true
}
