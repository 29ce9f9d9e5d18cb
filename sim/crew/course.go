package crew

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/frame"
	"offplumb/sim/model"
)

// course is the line that the feet follow on a leg.
type course interface {
	// put sets the place and its motion from the way along the line.
	put(f *Feet, s motion)
	// end gives where the line ends, after its length (m).
	end() spot
	length() float64
}

// crossing gives the first place at which a course that goes inward or outward
// all the way meets a radius (m); its nearer end where it does not.
func crossing(c course, r float64) spot {
	at := func(way float64) spot {
		var f Feet
		c.put(&f, motion{x: way})
		return spot{r: f.R, phi: f.Phi, z: f.Z}
	}
	lo, hi := 0.0, c.length()
	outer := at(lo).r > r
	if first, last := at(lo), at(hi); outer == (last.r > r) && math.Abs(first.r-r) < math.Abs(last.r-r) {
		return first
	}
	for {
		mid := lo + (hi-lo)/2
		if mid <= lo || mid >= hi {
			return at(hi)
		}
		if at(mid).r > r == outer {
			lo = mid
		} else {
			hi = mid
		}
	}
}

// arc is a course on which radius, angle and axial place change evenly: a walk
// on a deck, a radial ladder, a ride.
type arc struct {
	from, to spot
	long     float64
}

func newArc(from, to spot, long float64) arc { return arc{from, to, long} }

func (c arc) end() spot       { return c.to }
func (c arc) length() float64 { return c.long }

func (c arc) put(f *Feet, s motion) {
	dr, dphi, dz := (c.to.r-c.from.r)/c.long, (c.to.phi-c.from.phi)/c.long, (c.to.z-c.from.z)/c.long
	f.R, f.Phi, f.Z = c.from.r+dr*s.x, c.from.phi+dphi*s.x, c.from.z+dz*s.x
	f.VR, f.VPhi, f.VZ = dr*s.v, dphi*s.v, dz*s.v
	f.AR, f.APhi, f.AZ = dr*s.a, dphi*s.a, dz*s.a
}

// line is a straight course: a pitched ladder, a stair, or any on a flat floor.
type line struct {
	from spot
	way  r3.Vec // unit, habitat components
	rise r3.Vec // unit, up the ladder
	into r3.Vec // unit, across the ladder, away from the person on it
	long float64
}

// newLine starts at a spot and rises at the pitch (rad) above the deck there,
// toward the way that the person faces; down it goes back the same way. The
// deck's directions are l.
func newLine(from spot, l frame.Local, pitch float64, toward model.Direction, long float64, down bool) line {
	ahead := facing(toward, l)
	sin, cos := math.Sincos(pitch)
	rise := r3.Add(r3.Scale(cos, ahead), r3.Scale(sin, l.Up))
	c := line{from: from, way: rise, rise: rise, into: r3.Sub(r3.Scale(sin, ahead), r3.Scale(cos, l.Up)), long: long}
	if down {
		c.way = r3.Scale(-1, rise)
	}
	return c
}

func (c line) length() float64 { return c.long }

func (c line) end() spot {
	var f Feet
	c.put(&f, motion{x: c.long})
	return spot{r: f.R, phi: f.Phi, z: f.Z}
}

// put takes the straight motion apart into cylindrical components: with e_r and
// e_phi the directions there, r' = v.e_r, phi' = v.e_phi/r,
// r” = a.e_r + r phi'^2, phi” = (a.e_phi - 2 r' phi')/r.
func (c line) put(f *Feet, s motion) {
	pos := r3.Add(frame.Polar{R: c.from.r, Phi: c.from.phi, Z: c.from.z}.Vec(), r3.Scale(s.x, c.way))
	p := frame.PolarOf(pos)
	p.Phi = frame.Unwind(p.Phi, c.from.phi)
	l := frame.LocalAt(p.Phi)
	round, axial, up := l.Split(c.way)
	f.R, f.Phi, f.Z = p.R, p.Phi, p.Z
	f.VR, f.VPhi, f.VZ = -up*s.v, round*s.v/p.R, axial*s.v
	f.AR = -up*s.a + p.R*f.VPhi*f.VPhi
	f.APhi = (round*s.a - 2*f.VR*f.VPhi) / p.R
	f.AZ = axial * s.a
}
