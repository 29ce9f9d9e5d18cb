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
	// aheadTurn is how far ahead, in rad of the habitat's turning, it is asked
	// whether a contact without force is about to get one: a force that grows as
	// the Coriolis one does, from 0 to g in about a rad, is then 1e-5 g.
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
	// forceSlop is the acceleration, in m/s^2, that counts as none beside one of
	// about 1: thousands of roundings.
	forceSlop = 1e-12
	// turnNoise is the same of a normal's turning, in 1/m.
	turnNoise = 1e-10
)

// stance is how a body touches its surroundings: it is pressed on some
// surfaces, and grazes others, which neither press it nor move off.
type stance struct{ on, grazed []geom.Touch }

// stand works out on what a body is pressed, of what it touches and neither
// leaves nor has just parted from.
func (f *Flier) stand(t *Track, now *moving, touches []geom.Touch, last ending) stance {
	var s stance
	var slow []geom.Touch
	for _, c := range f.staysWith(t.Begin+now.t, now, touches) {
		if hasPatch(last.parted, c.Patch) {
			s.grazed = append(s.grazed, c)
		} else {
			slow = append(slow, c)
		}
	}
	on := f.pressedOn(t, now, slow)
	on = f.leansOn(t, now, slow, on, last.leant)
	for i := range slow {
		if in(on, i) {
			s.on = append(s.on, slow[i])
		} else {
			s.grazed = append(s.grazed, slow[i])
		}
	}
	return s
}

// staysWith gives the touches that a body does not move off, or from which it
// would rise by no more than what a search for contacts tells, and takes the
// motion along their normals away. Standing on one may keep it on another.
func (f *Flier) staysWith(t float64, now *moving, touches []geom.Touch) []geom.Touch {
	var out []geom.Touch
	var across []r3.Vec
	left := append([]geom.Touch(nil), touches...)
	slow := parting
	if f.rolls(1) && len(touches) > 1 {
		slow = 2 * creep // slower, its friction on one may yet drive it into another
	}
	for more := true; more; {
		more = false
		for i := 0; i < len(left); i++ {
			up := r3.Dot(now.v, left[i].Normal)
			if up > slow && !f.fallsBack(t, now, touches, left[i], 2*thin) {
				continue
			}
			out = append(out, left[i])
			across = orthogonal(across, left[i].Normal)
			left = append(left[:i], left[i+1:]...)
			i, more = i-1, true
		}
		for _, n := range across {
			now.v = r3.Sub(now.v, r3.Scale(r3.Dot(now.v, n), n))
		}
	}
	return out
}

// fallsBack says whether a touch has a body back that leaves it before it rose
// by the height least (m).
func (f *Flier) fallsBack(t float64, now *moving, touches []geom.Touch, c geom.Touch, least float64) bool {
	n := c.Normal
	up := r3.Dot(now.v, n)
	v := r3.Sub(now.v, r3.Scale(up, n))
	return up*up <= 2*least*f.presses(t, moving{now.t, now.q, v, now.w}, touches, c)
}

// orthogonal adds to vectors at right angles the part of n that is across them
// all, if there is one.
func orthogonal(list []r3.Vec, n r3.Vec) []r3.Vec {
	for _, e := range list {
		n = r3.Sub(n, r3.Scale(r3.Dot(n, e), e))
	}
	if l := r3.Norm(n); l*l > singular {
		return append(list, r3.Scale(1/l, n))
	}
	return list
}

// pressedOn gives the contacts that the body is pressed on. Friction has no
// part in it: that of a sliding body is across the normals of all contacts
// that it stays on, and where a rolling body's drives it into another, that
// one is a wall (see rub).
func (f *Flier) pressedOn(t *Track, now *moving, slow []geom.Touch) []int {
	if len(slow) == 0 {
		return nil
	}
	a := f.m.Motion.At(t.Begin + now.t)
	all, pull := f.pushes(&a, t.Begin+now.t, now, slow)
	return pressed(all, pull)
}

// pushes gives the contacts as the equations want them, and the acceleration
// without them.
func (f *Flier) pushes(a *frame.Attitude, t float64, now *moving, list []geom.Touch) ([]push, r3.Vec) {
	pull := f.pull(a, t, frame.State{Pos: now.q, Vel: now.v})
	all := make([]push, len(list))
	for i := range list {
		_, mu := f.gripOf(list[i].Surface)
		all[i], _ = f.pushOf(now.q, now.v, list[i].Patch, mu)
		all[i].noise = noise(pull, now.v)
	}
	return all, pull
}

// pushOf describes the contact with a group, and gives its distance (m).
func (f *Flier) pushOf(q, v r3.Vec, g geom.Patch, mu float64) (push, float64) {
	c, rate := f.bend(q, v, g)
	return push{normal: c.Normal, answer: c.Normal, turn: rate, closing: r3.Dot(v, rate), mu: mu}, c.Gap
}

// leansOn adds to the contacts that a body is pressed on one that it is about
// to be pressed on: the force there is none yet, but grows. leant are those of
// which an event of the last phase has told so.
func (f *Flier) leansOn(t *Track, now *moving, slow []geom.Touch, on []int, leant []geom.Patch) []int {
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
		} else if lean < 0 && hasPatch(leant, slow[i].Patch) {
			lean = i
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
	g := f.gapAccel(now.q, now.v, acc.drive, slow[i].Patch)
	least := noise(acc.drive, now.v)
	if math.Abs(g) > 1e3*least {
		return 0
	}
	spin, _ := f.m.Motion.Bounds(t.Begin+now.t, t.Begin+now.t)
	dt := aheadTurn / math.Max(spin, slowest)
	soon := *now
	soon.t += dt
	soon.q = r3.Add(now.q, r3.Add(r3.Scale(dt, now.v), r3.Scale(dt*dt/2, acc.acc)))
	soon.v = r3.Add(now.v, r3.Scale(dt, acc.acc))
	later := f.gapAccel(soon.q, soon.v, f.accelOn(t, &soon, slow, on).drive, slow[i].Patch) - g
	if later > -least {
		return 0
	}
	return later
}

// accelOn is what accelerates a body on some of its contacts.
func (f *Flier) accelOn(t *Track, now *moving, slow []geom.Touch, on []int) rubbing {
	a := f.m.Motion.At(t.Begin + now.t)
	all, pull := f.pushes(&a, t.Begin+now.t, now, slow)
	sub := subset(all, on)
	balance(sub, pull)
	return f.rub(&a, sub, nil, pull, now.v, now.w, true)
}

// gapAccel is the acceleration (m/s^2) of the gap to a group, of a body with
// the acceleration acc.
func (f *Flier) gapAccel(q, v, acc r3.Vec, g geom.Patch) float64 {
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
