package flight

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/frame"
	"offplumb/sim/geom"
	"offplumb/sim/model"
)

// moving is a body at an instant, in the habitat frame.
type moving struct {
	t       float64 // s since the release
	q, v, w r3.Vec  // m, m/s, rad/s relative to the habitat
}

// slop is how far a body may be from a surface that it touches, m: some times
// what a release may be, or a slide drifts.
func slop(q r3.Vec) float64 { return 4 * model.TouchSlack * math.Max(1, r3.Norm(q)*1e-5) }

// hover is how far a body in contact is kept off its surface, m: a point, which
// a rounding would bring into the matter, where all faces are near, the seams
// of its pieces too.
func (f *Flier) hover(q r3.Vec) float64 {
	if f.wide > thin {
		return 0
	}
	return slop(q) / 8
}

// mostShoves bounds the tries to bring a body out of what it reaches into, in
// a corner.
const mostShoves = 8

// touches lists the surfaces that the body touches, each direction once. A
// body that reaches into one by more than a quarter of the slop, or a point
// that reaches into one at all, is brought out of it first: an event of its gap
// would else count it as being on the far side.
func (f *Flier) touches(now *moving) []geom.Touch {
	s, out := slop(now.q), f.hover(now.q)
	least := f.wide - s/4
	if out > 0 {
		least = f.wide + out/2
	}
	if f.m.Interior.Dist(now.q) > f.wide+s {
		return nil
	}
	all := f.near
	for range mostShoves {
		all = f.m.Interior.Touching(now.q, f.wide+s, all[:0])
		if len(all) == 0 || all[0].Gap >= least {
			break
		}
		now.q = r3.Add(now.q, r3.Scale(f.wide+out-all[0].Gap, all[0].Normal))
	}
	f.near = all
	return eachWay(all)
}

// eachWay drops contacts of a direction that an earlier one has.
func eachWay(all []geom.Touch) []geom.Touch {
	out := all[:0]
	for _, c := range all {
		if !hasNormal(out, c.Normal) {
			out = append(out, c)
		}
	}
	return out
}

// alike is the cosine above which two normals are one contact.
const alike = 1 - 1e-6

func hasNormal(list []geom.Touch, n r3.Vec) bool {
	for i := range list {
		if r3.Dot(list[i].Normal, n) > alike {
			return true
		}
	}
	return false
}

func patchesOf(list []geom.Touch) []geom.Patch {
	var out []geom.Patch
	for i := range list {
		out = append(out, list[i].Patch)
	}
	return out
}

func hasPatch(list []geom.Patch, p geom.Patch) bool {
	for _, x := range list {
		if p.Within(x) || x.Within(p) {
			return true
		}
	}
	return false
}

// hasGroup says whether one of the patches belongs to a group.
func hasGroup(list []geom.Patch, g geom.Group) bool {
	for _, x := range list {
		if x.Group == g {
			return true
		}
	}
	return false
}

// rolls says whether the body rolls on n contacts: in a corner it slides like
// any other.
func (f *Flier) rolls(n int) bool { return f.body.Rolls && f.wide > 0 && n == 1 }

// slipOf is the velocity (m/s) of the body's point in contact.
func (f *Flier) slipOf(v, w, n r3.Vec) r3.Vec {
	u := r3.Sub(v, r3.Scale(f.wide, r3.Cross(w, n)))
	return r3.Sub(u, r3.Scale(r3.Dot(u, n), n))
}

// pull is the acceleration, m/s^2 in habitat components, that a body free of
// contact has there.
func (f *Flier) pull(a *frame.Attitude, t float64, s frame.State) r3.Vec {
	return r3.Add(a.Apparent(s).Sum(), a.In(f.free.forces.Accel(t, a.ToInertial(s))))
}

const (
	// probe is the way, in m, over which a surface's normal is differenced for
	// its curvature: a hundred thousandth of a body's size, where rounding
	// (1e-16 of the habitat's size, over probe) and truncation are both far
	// below what contact models are good for.
	probe = 1e-5
	// probeShare is the probe of a small body, as a share of its radius, about
	// which its normal turns on an edge; leastProbe is that of a point.
	probeShare = 0.01
	leastProbe = 1e-7
	// sharpest is how fast, in rad for each radius of way, the normal of a
	// sphere turns at most: 1, on a sharp edge. Beyond, another face is nearest.
	sharpest = 1.5
)

// bend gives the contact of a group at q, and the rate at which its normal
// turns as the body moves with the velocity v. A side on which the normal
// jumps does not count.
func (f *Flier) bend(q, v r3.Vec, g geom.Patch) (geom.Contact, r3.Vec) {
	in := f.m.Interior
	c := in.ContactOn(q, g)
	speed := r3.Norm(v)
	if speed == 0 {
		return c, r3.Vec{}
	}
	way := math.Min(probe, math.Max(leastProbe, probeShare*f.wide))
	step := r3.Scale(way/speed, v)
	fore, aft := in.ContactOn(r3.Add(q, step), g).Normal, in.ContactOn(r3.Sub(q, step), g).Normal
	most := sharpest * way / math.Max(f.wide, probe)
	switch ahead, behind := r3.Norm(r3.Sub(fore, c.Normal)) > most, r3.Norm(r3.Sub(c.Normal, aft)) > most; {
	case ahead && behind:
		return c, r3.Vec{}
	case ahead:
		return c, r3.Scale(speed/way, r3.Sub(c.Normal, aft))
	case behind:
		return c, r3.Scale(speed/way, r3.Sub(fore, c.Normal))
	}
	return c, r3.Scale(speed/(2*way), r3.Sub(fore, aft))
}
