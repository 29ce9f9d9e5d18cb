package flight

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/frame"
	"offplumb/sim/geom"
)

const (
	// parting is the speed along a surface's normal, in m/s, below which a body
	// neither meets nor leaves it: slower, it would stay within a nanometre for
	// a second.
	parting = 1e-9
	// aheadTurn is how far, in rad of the habitat's turning, that question looks:
	// an acceleration that is to grow as the Coriolis one does, from 0 to g in
	// about a rad, is then 1e-5 g.
	aheadTurn = 1e-5
	// slowest is the spin, in rad/s, of a habitat that as good as stands.
	slowest = 1e-3
)

// noise is what rounding leaves of an acceleration along a normal, m/s^2, with
// much room: of the sum of accelerations, and of the normal's turning, which is
// differenced (1e-16 over probe, in units of v^2 over a metre).
func noise(pull, v r3.Vec) float64 {
	return forceSlop*(1+r3.Norm(pull)) + turnNoise*r3.Dot(v, v)
}

const (
	forceSlop = 1e-12
	turnNoise = 1e-10 // 1/m
)

// stance is how a body touches its surroundings: it is pressed on some
// surfaces, and grazes others, which neither press it nor move off.
type stance struct{ on, grazed []geom.Touch }

// stand works out on what a body is pressed, of what it touches and neither
// leaves nor has just parted from.
func (f *Flier) stand(t *Track, now *moving, touches []geom.Touch, parted []geom.Group) stance {
	var s stance
	var slow []geom.Touch
	for i := range touches {
		c := &touches[i]
		away := r3.Dot(now.v, c.Normal)
		if away > parting {
			continue
		}
		now.v = r3.Sub(now.v, r3.Scale(away, c.Normal))
		if hasGroup(parted, c.Group) {
			s.grazed = append(s.grazed, *c)
		} else {
			slow = append(slow, *c)
		}
	}
	on := f.pressedOn(t, now, slow)
	on = f.leansOn(t, now, slow, on)
	for i := range slow {
		if in(on, i) {
			s.on = append(s.on, slow[i])
		} else {
			s.grazed = append(s.grazed, slow[i])
		}
	}
	return s
}

// pressedOn gives the contacts that the body is pressed on. A rolling body
// whose spin drives it from one into another loses that spin: there friction
// of both stops it.
func (f *Flier) pressedOn(t *Track, now *moving, slow []geom.Touch) []int {
	if len(slow) == 0 {
		return nil
	}
	a := f.m.Motion.At(t.Begin + now.t)
	all, pull := f.pushes(&a, t.Begin+now.t, now, slow)
	try := func() ([]int, bool) {
		return pressed(all, pull, func(p []push) r3.Vec { return f.rub(&a, p, pull, now.v, now.w, true).acc })
	}
	idx, ok := try()
	for i := 0; !ok && i < len(slow); i++ {
		for j := range slow {
			f.unspin(now, slow[i].Normal, slow[j].Normal)
		}
		idx, ok = try()
	}
	if !ok {
		now.w = r3.Vec{}
		idx, _ = try()
	}
	return idx
}

// unspin takes away the spin that drives a body which rolls on a surface of
// normal n into one of normal m.
func (f *Flier) unspin(now *moving, n, m r3.Vec) {
	e := r3.Cross(n, m)
	if l := r3.Norm(e); l > singular {
		e = r3.Scale(1/l, e)
		if s := r3.Dot(now.w, e); s > 0 {
			now.w = r3.Sub(now.w, r3.Scale(s, e))
		}
	}
}

// pushes gives the contacts as the equations want them, and the acceleration
// without them.
func (f *Flier) pushes(a *frame.Attitude, t float64, now *moving, list []geom.Touch) ([]push, r3.Vec) {
	pull := f.pull(a, t, frame.State{Pos: now.q, Vel: now.v})
	all := make([]push, len(list))
	for i := range list {
		_, mu := f.gripOf(list[i].Surface)
		all[i], _ = f.pushOf(now.q, now.v, list[i].Group, mu)
		all[i].noise = noise(pull, now.v)
	}
	return all, pull
}

// pushOf describes the contact with a group, and gives its distance (m).
func (f *Flier) pushOf(q, v r3.Vec, g geom.Group, mu float64) (push, float64) {
	c, rate := f.bend(q, v, g)
	return push{normal: c.Normal, turn: rate, closing: r3.Dot(v, rate), mu: mu}, c.Gap
}

// leansOn adds to the contacts that a body is pressed on one that it is about
// to be pressed on: the force there is none yet, but grows.
func (f *Flier) leansOn(t *Track, now *moving, slow []geom.Touch, on []int) []int {
	if len(on) == len(slow) || len(on) >= mostContacts || r3.Norm(now.v) == 0 && len(on) > 0 {
		return on
	}
	least, lean := 0.0, -1
	for i := range slow {
		if in(on, i) {
			continue
		}
		if later := f.leans(t, now, slow, on, i); later < least {
			least, lean = later, i
		}
	}
	if lean < 0 {
		return on
	}
	more := append(append([]int(nil), on...), lean)
	a := f.m.Motion.At(t.Begin + now.t)
	all, pull := f.pushes(&a, t.Begin+now.t, now, slow)
	sub := subset(all, more)
	if !balance(sub, pull) {
		return on
	}
	for i := range on {
		if sub[i].force <= 0 {
			return on
		}
	}
	return more
}

// leans gives by how much the acceleration of the gap to contact i changes in
// a moment, if it is none now.
func (f *Flier) leans(t *Track, now *moving, slow []geom.Touch, on []int, i int) float64 {
	acc := f.accelOn(t, now, slow, on)
	g := f.gapAccel(now.q, now.v, acc, slow[i].Group)
	least := noise(acc, now.v)
	if math.Abs(g) > 1e3*least {
		return 0
	}
	spin, _ := f.m.Motion.Bounds(t.Begin+now.t, t.Begin+now.t)
	dt := aheadTurn / math.Max(spin, slowest)
	soon := *now
	soon.t += dt
	soon.q = r3.Add(now.q, r3.Add(r3.Scale(dt, now.v), r3.Scale(dt*dt/2, acc)))
	soon.v = r3.Add(now.v, r3.Scale(dt, acc))
	later := f.gapAccel(soon.q, soon.v, f.accelOn(t, &soon, slow, on), slow[i].Group) - g
	if later > -least {
		return 0
	}
	return later
}

// accelOn is the acceleration (m/s^2) of a body on some of its contacts.
func (f *Flier) accelOn(t *Track, now *moving, slow []geom.Touch, on []int) r3.Vec {
	a := f.m.Motion.At(t.Begin + now.t)
	all, pull := f.pushes(&a, t.Begin+now.t, now, slow)
	sub := subset(all, on)
	balance(sub, pull)
	return f.rub(&a, sub, pull, now.v, now.w, true).acc
}

// gapAccel is the acceleration (m/s^2) of the gap to a group, of a body with
// the acceleration acc.
func (f *Flier) gapAccel(q, v, acc r3.Vec, g geom.Group) float64 {
	c, rate := f.bend(q, v, g)
	return r3.Dot(c.Normal, acc) + r3.Dot(v, rate)
}

func subset(all []push, idx []int) []push {
	sub := make([]push, len(idx))
	for k, i := range idx {
		sub[k] = all[i]
	}
	return sub
}
