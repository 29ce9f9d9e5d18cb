package geom

import (
	"gonum.org/v1/gonum/spatial/r3"
)

// stayer is a space that knows more of how soon it may be left than the
// distance to its hull's outer face.
type stayer interface {
	// stays gives a time (s, at most limit) during which a point at p with the
	// velocity v (m/s), and an acceleration of at most acc (m/s^2), surely does
	// not pass the outer face of the hull, from inside, by more than thin (m).
	stays(p, v r3.Vec, acc, limit, thin float64) float64
}

// TimeWithin gives a time (s, at most limit) during which a point at p with the
// velocity v (m/s), and an acceleration that never exceeds acc (m/s^2), surely
// stays within the outer face of the whole hull, but for thin (m).
func (in *Interior) TimeWithin(p, v r3.Vec, acc, limit, thin float64) float64 {
	best := 0.0
	for _, s := range in.spaces {
		time := 0.0
		if c, ok := s.(stayer); ok {
			time = c.stays(p, v, acc, limit, thin)
		} else {
			time = within(max(-s.Beyond(p), thin), norm(v), acc)
		}
		if best = max(best, time); best >= limit {
			return limit
		}
	}
	return best
}

// stays implements stayer: the end planes and a ceiling are seen from their
// convex side, the outer face from its hollow one.
func (c *cylinderSpace) stays(p, v r3.Vec, acc, limit, thin float64) float64 {
	best := min(limit, within(max(-c.Beyond(p), thin), norm(v), acc))
	if best == limit || c.Beyond(p) > 0 {
		return best
	}
	best = min(limit, closes(p.Z-c.z0+c.wall+thin, v.Z, acc, limit), closes(c.z1+c.wall-p.Z+thin, -v.Z, acc, limit))
	r := fromAxis(p)
	if r == 0 {
		return min(best, within(max(-c.Beyond(p), thin), norm(v), acc))
	}
	out, speed := (p.X*v.X+p.Y*v.Y)/r, norm(v)
	best = min(best, hollowCloses(c.outer-r+thin, -out, speed, acc, r/2, r, best))
	if c.r0 > 0 {
		best = min(best, closes(r-c.r0+c.wall+thin, out, acc, best))
	}
	return best
}

// hollowCloses is closes for the gap to a hollow face, whose middle line of
// curvature is hollow (m) away, within the distance around (m).
func hollowCloses(gap, rate, speed, acc, around, hollow, most float64) float64 {
	most = min(most, within(around, speed, acc))
	// The curvature counts by the square of the speed: first by that at p, which
	// gives a time that is too long, then by that at the end of this time.
	most = closes(gap, rate, acc+speed*speed/hollow, most)
	fast, far := speed+acc*most, (speed+acc*most/2)*most
	return closes(gap, rate, acc+fast*fast/(hollow-min(far, around)), most)
}
