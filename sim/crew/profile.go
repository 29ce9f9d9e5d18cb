package crew

import "math"

// motion is a quantity with its first two derivatives by time.
type motion struct{ x, v, a float64 }

// profile is how far along a leg a person is at a time.
type profile interface {
	// at gives the way (in the unit of the leg), its rate and the rate of that,
	// t seconds after the start of the leg.
	at(t float64) motion
	// lasts gives the duration, s.
	lasts() float64
	// ramps gives how long the rate grows at the start, and falls at the end, s.
	ramps() float64
}

// Breaks gives the times (s from the start of the path) between which the
// motion is smooth, in order: where legs and their ramps begin and end.
func (p *Plan) Breaks() []float64 {
	var out []float64
	for i := range p.legs {
		l := &p.legs[i]
		end, ramp := l.start+l.way.lasts(), l.way.ramps()
		out = append(out, l.start, l.start+ramp, math.Max(l.start+ramp, end-ramp), end)
	}
	return out
}

// ramped is a way at a steady speed with smooth ramps at both ends: the speed
// follows 3u^2 - 2u^3 of the share u of the ramp that has gone by, so that
// acceleration is continuous and each ramp covers half of what the full speed
// would. A way too short for its ramps lowers the peak speed.
type ramped struct {
	way   float64 // >= 0
	speed float64 // > 0, as reached
	ramp  float64 // s
	total float64 // s
}

func newRamped(way, speed, ramp float64) ramped {
	if ramp > 0 && way < speed*ramp {
		speed = way / ramp
	}
	if way == 0 {
		return ramped{}
	}
	return ramped{way: way, speed: speed, ramp: ramp, total: way/speed + ramp}
}

func (r ramped) lasts() float64 { return r.total }
func (r ramped) ramps() float64 { return r.ramp }

func (r ramped) at(t float64) motion {
	switch {
	case t <= 0:
		return motion{}
	case t >= r.total:
		return motion{x: r.way}
	case t < r.ramp:
		return r.rise(t)
	case t > r.total-r.ramp:
		back := r.rise(r.total - t)
		return motion{x: r.way - back.x, v: back.v, a: -back.a}
	}
	return motion{x: r.speed * (t - r.ramp/2), v: r.speed}
}

// rise is the first ramp: the integral of 3u^2 - 2u^3 is u^3 - u^4/2.
func (r ramped) rise(t float64) motion {
	u := t / r.ramp
	return motion{
		x: r.speed * r.ramp * (u*u*u - u*u*u*u/2),
		v: r.speed * u * u * (3 - 2*u),
		a: r.speed / r.ramp * 6 * u * (1 - u),
	}
}

// trapezoid is a way whose speed grows steadily, stays and falls steadily, as
// that of a lift does.
type trapezoid struct{ ramped }

func newTrapezoid(way, speed, ramp float64) trapezoid { return trapezoid{newRamped(way, speed, ramp)} }

func (r trapezoid) at(t float64) motion {
	switch {
	case t <= 0 || t >= r.total || t > r.ramp && t < r.total-r.ramp:
		return r.ramped.at(t)
	case t <= r.ramp:
		return r.rise(t)
	}
	back := r.rise(r.total - t)
	return motion{x: r.way - back.x, v: back.v, a: -back.a}
}

func (r trapezoid) rise(t float64) motion {
	a := r.speed / r.ramp
	return motion{x: a * t * t / 2, v: a * t, a: a}
}

// swing is a turn by an angle that follows 3u^2 - 2u^3 over its duration.
type swing struct {
	angle float64 // rad
	over  float64 // s
}

func (s swing) lasts() float64 { return s.over }
func (s swing) ramps() float64 { return 0 }

func (s swing) at(t float64) motion {
	u := math.Min(1, math.Max(0, t/s.over))
	return motion{
		x: s.angle * u * u * (3 - 2*u),
		v: s.angle / s.over * 6 * u * (1 - u),
		a: s.angle / (s.over * s.over) * 6 * (1 - 2*u),
	}
}

// pause is a leg without way.
type pause float64

func (p pause) lasts() float64    { return float64(p) }
func (p pause) ramps() float64    { return 0 }
func (p pause) at(float64) motion { return motion{} }
