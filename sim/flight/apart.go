package flight

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/integrator"
	"offplumb/sim/frame"
	"offplumb/sim/geom"
)

// thin is the depth, in m, below which a touch need not be told from a miss:
// a thousandth of a millimetre.
const thin = 1e-6

// apart is how a body in flight may end: the gap to what it may touch, how far
// its centre is from the hull's outer face, within, or the less of both. It
// depends on its place in the habitat alone, with Lipschitz constant 1. It
// promises its rate by the velocity u relative to the habitat, whatever its way
// of turning:
//
//	|gap'| <= |u|,  u = r' - omega x r,  |u|' <= a = |r''| + |domega/dt| |r| + |omega| |r'|
//
// The acceleration in the habitat, as its axes turn too, is at most a + |omega| |u|.
type apart struct {
	f           *Flier
	touch, hull bool // what counts

	omega float64 // rad/s, of a steady spin
	seen  look
	step  span
	sure  sure
	due   float64 // s, when a contact is expected
}

// look is the last place looked at.
type look struct {
	known bool
	t     float64
	y     [3]float64
	local r3.Vec
	gap   float64
}

// span holds what bounds a step's motion.
type span struct {
	t0, t1 float64
	alpha  float64
	speed  float64 // m/s, inertial
	omega  float64 // rad/s
	accel  float64 // m/s^2, the a of apart, but for alpha
}

// sure tells until when (s) the distance surely does not vanish, as long as the
// a of apart stays within accel (m/s^2), and the turning steady at omega (rad/s)
// or less.
type sure struct{ until, accel, omega float64 }

// ready begins a flight.
func (g *apart) ready() {
	g.omega = math.Abs(g.f.free.forces.spin)
	g.seen.known, g.due = false, math.Inf(-1)
	g.step, g.sure = span{t0: math.Inf(1)}, sure{until: math.Inf(-1)}
}

// Value implements [integrator.Event].
func (g *apart) Value(t float64, y []float64) float64 {
	if l := &g.seen; l.known && l.t == t && l.y == [3]float64(y) {
		return l.gap
	}
	p := g.f.free.place(t, y)
	g.seen = look{true, t, [3]float64(y), p, g.of(p)}
	return g.seen.gap
}

// of is the distance at a place in the habitat.
func (g *apart) of(p r3.Vec) float64 {
	d := math.MaxFloat32
	if g.touch {
		d = min(g.f.m.Interior.DistBeside(p, &g.f.watch), d) - g.f.wide
	}
	if g.hull {
		d = min(d, -g.f.m.Interior.Beyond(p))
	}
	return d
}

// bound fills step with what bounds the motion along s.
func (g *apart) bound(s *integrator.Step) {
	if g.step.t0 == s.T0 && g.step.t1 == s.T1 {
		return
	}
	free := g.f.free
	omega, alpha := g.omega, 0.0
	if !free.forces.steady {
		omega, alpha = free.forces.motion.Bounds(free.begin+s.T0, free.begin+s.T1)
	}
	accel := s.MaxAccel(0, 3)
	// The interpolant leaves with the velocity of the state.
	speed := norm(r3.Add(free.base.Vel, vec(s.Y0[3:]))) + accel*(s.T1-s.T0)
	g.step = span{s.T0, s.T1, alpha, speed, omega, accel + omega*speed}
}

// Clear implements [integrator.Clearing].
func (g *apart) Clear(s *integrator.Step) bool {
	if !(s.T1 <= g.sure.until) || g.grazes() {
		return false
	}
	g.bound(s)
	return g.step.alpha == 0 && g.step.accel <= g.sure.accel && g.step.omega <= g.sure.omega
}

// grazes says whether the body grazes something: that comes to count when it
// has parted from it, so that the distance jumps, and no promise holds for long.
func (g *apart) grazes() bool { return g.touch && len(g.f.watch.Grazed) > 0 }

const (
	// ahead, at the start of a step, is for how many steps' length it is asked at once that nothing is
	// touched. More asks for more of the surroundings, less more often.
	ahead = 8
	// aheadAccel is by what factor the acceleration may grow meanwhile. More
	// makes for shorter times.
	aheadAccel = 1.25
)

// Bound implements [integrator.Bounded].
func (g *apart) Bound(s *integrator.Step, t float64, y []float64) (rate, accel, least float64) {
	g.bound(s)
	gap := g.Value(t, y)
	vel, far := g.velocity(s, t, y)
	speed, left := norm(vel), s.T1-t
	acc := g.accel(far, left)
	if g.step.alpha == 0 && t == s.T0 && !g.grazes() {
		// No farther than the body seems to get, lest the speed that it might
		// gain until then counts for too much.
		acc *= aheadAccel
		left = min(ahead*left, max(left, 2*gap/max(speed, thin)))
	}
	time := g.time(vel, acc+g.step.omega*(speed+acc*left), left, &g.f.watch)
	g.sure = sure{t + time, acc, g.step.omega}
	return promise(gap, time), 0, thin
}

// accel bounds the a of apart for the time left (s), at the distance far (m)
// from the middle of the axis.
func (g *apart) accel(far, left float64) float64 {
	if g.step.alpha == 0 {
		return g.step.accel
	}
	return g.step.accel + g.step.alpha*(far+g.step.speed*left)
}

// Behind implements [integrator.Backed]: seen backward, the velocity is the
// opposite, and the acceleration the same.
func (g *apart) Behind(s *integrator.Step, t float64, y []float64) float64 {
	if g.grazes() {
		return 0
	}
	g.bound(s)
	g.Value(t, y)
	vel, far := g.velocity(s, t, y)
	left := t - s.T0
	acc := g.accel(far, left)
	back := g.f.watch
	back.Back = true
	return g.time(r3.Scale(-1, vel), acc+g.step.omega*(norm(vel)+acc*left), left, &back)
}

// velocity gives the velocity in the habitat along the interpolant of s, and
// the distance (m) from the axis' middle.
func (g *apart) velocity(s *integrator.Step, t float64, y []float64) (vel r3.Vec, far float64) {
	free := g.f.free
	var dy [6]float64
	s.Rate(t, dy[:])
	at := depart(&free.base, t, y)
	at.Vel = r3.Add(free.base.Vel, vec(dy[:]))
	return frame.Seen(free.forces.motion, free.begin+t, at).Vel, norm(at.Pos)
}

// time gives a time (s, at most limit) during which the distance surely does
// not vanish, at the place last looked at.
func (g *apart) time(vel r3.Vec, acc, limit float64, watch *geom.Beside) float64 {
	in, p := g.f.m.Interior, g.seen.local
	if g.touch {
		limit = in.TimeBeside(p, vel, acc, limit, watch)
	}
	if g.hull {
		limit = in.TimeWithin(p, vel, acc, limit, thin)
	}
	return limit
}

// norm is the length of a vector whose square is in range.
func norm(v r3.Vec) float64 { return math.Sqrt(r3.Norm2(v)) }
