package geom

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// The faces of a vault.
const (
	VaultInner        = iota // toward the middle of the tube: what is seen from the room
	VaultOuter               // away from it
	VaultTheta0              // at Theta0
	VaultTheta1              // at Theta1
	VaultAntispinward        // at Phi0
	VaultSpinward            // at Phi1
	vaultFaces
)

// Vault is a piece of the shell of a tube that is bent round the axis, or of
// that of a sphere about a point of the axis, for which Ring is 0. In the half
// plane of an angle phi it is a piece of a ring about the middle of the tube,
// at (Ring, Z): Inner <= rho <= Outer, theta from Theta0 to Theta1, counted
// from outward toward +axial.
type Vault struct {
	Ring, Z        float64 // m, the middle of the tube: distance from the axis, and axial
	Inner, Outer   float64 // m, from the middle of the tube
	Theta0, Theta1 float64 // rad, Theta0 < Theta1, both within [-pi/2, pi/2] or within [pi/2, 3/2 pi]
	Phi0, Phi1     float64 // rad, Phi0 < Phi1 <= Phi0 + 2 pi
	Whole          bool    // the whole way round; Phi0 and Phi1 do not count

	open0, open1 bool // at Phi0, Phi1 another piece goes on
}

// arc is a range of angles.
type arc struct{ from, to float64 }

// beside gives how far, in rad, an angle lies outside the range: positive
// beyond its end, negative before its start, the nearer of the two; 0 within.
func (a arc) beside(angle float64) float64 {
	half := (a.to - a.from) / 2
	off := math.Remainder(angle-(a.from+half), 2*math.Pi)
	if math.Abs(off) <= half {
		return 0
	}
	return off - math.Copysign(half, off)
}

// depth gives how far (m) a point within, at the distance r from the corner,
// lies from the nearer end of the range, and whether that is its end. Where both
// are more than a right angle off, the corner is nearer than they are.
func (a arc) depth(angle, r float64) (d float64, end bool) {
	half := (a.to - a.from) / 2
	off := math.Remainder(angle-(a.from+half), 2*math.Pi)
	if half-math.Abs(off) >= math.Pi/2 {
		return math.Inf(1), false
	}
	return r * math.Sin(half-math.Abs(off)), off > 0
}

func (v *Vault) theta() arc { return arc{v.Theta0, v.Theta1} }

// fold brings p into the half plane of the solid that holds the point nearest
// to it: x and z from the middle of the tube, how far off the plane p lies,
// and the angles of the plane and from it to p. The reason is that of
// [Sector.Dist]: at any place in the half plane the distance grows with the
// angle between.
func (v *Vault) fold(p r3.Vec) (x, z, side, phi, off float64) {
	r, phi := math.Hypot(p.X, p.Y), math.Atan2(p.Y, p.X)
	if !v.Whole {
		off = arc{v.Phi0, v.Phi1}.beside(phi)
	}
	if off == 0 {
		return r - v.Ring, p.Z - v.Z, 0, phi, 0
	}
	sin, cos := math.Sincos(off)
	return r*cos - v.Ring, p.Z - v.Z, r * sin, phi - off, off
}

// Dist implements [Solid].
func (v *Vault) Dist(p r3.Vec) float64 {
	x, z, side, _, _ := v.fold(p)
	rho := math.Hypot(x, z)
	d := math.Max(v.Inner-rho, rho-v.Outer)
	if off := v.theta().beside(math.Atan2(z, x)); off != 0 {
		sin, cos := math.Sincos(off)
		u := rho * cos
		d = math.Hypot(u-clamp(u, v.Inner, v.Outer), rho*sin)
	}
	switch {
	case side != 0:
		return math.Hypot(math.Max(0, d), side)
	case d > 0:
		return d
	}
	depth, _ := v.depth(p, x, z)
	return -depth
}

// depth gives the distance from a point within to the surface, and the face
// that it is nearest to. The axis is no edge of a whole sphere.
func (v *Vault) depth(p r3.Vec, x, z float64) (float64, int) {
	rho := math.Hypot(x, z)
	least, face := rho-v.Inner, VaultInner
	take := func(d float64, f int) {
		if d < least {
			least, face = d, f
		}
	}
	take(v.Outer-rho, VaultOuter)
	if d, end := v.theta().depth(math.Atan2(z, x), rho); !v.pole(end) {
		take(d, VaultTheta0+boolean(end))
	}
	if !v.Whole {
		d, end := arc{v.Phi0, v.Phi1}.depth(math.Atan2(p.Y, p.X), math.Hypot(p.X, p.Y))
		take(d, VaultAntispinward+boolean(end))
	}
	return math.Max(0, least), face
}

// pole says whether an end of the range of theta lies on the axis, where the
// whole way round there is no face.
func (v *Vault) pole(end bool) bool {
	if !v.Whole || v.Ring != 0 {
		return false
	}
	if end {
		return v.Theta1 >= math.Pi/2
	}
	return v.Theta0 <= -math.Pi/2
}

func boolean(b bool) int {
	if b {
		return 1
	}
	return 0
}

// Nearest implements [Solid].
func (v *Vault) Nearest(p r3.Vec) (point, normal r3.Vec, face int) {
	x, z, side, phi, turn := v.fold(p)
	rho, theta := math.Hypot(x, z), math.Atan2(z, x)
	off := v.theta().beside(theta)
	if side == 0 && off == 0 && rho >= v.Inner && rho <= v.Outer {
		depth, face := v.depth(p, x, z)
		n := v.normal(face, phi, theta)
		return r3.Add(p, r3.Scale(depth, n)), n, face
	}
	u := rho * math.Cos(off)
	near := clamp(u, v.Inner, v.Outer)
	at := theta - off
	sin, cos := math.Sincos(at)
	q := onAngle(phi, v.Ring+near*cos, v.Z+near*sin)
	face, out := v.beyond(u, rho*math.Sin(off), side, turn)
	point, normal = nearestOf(p, q, v.normal(face, phi, at), out == 1)
	return point, normal, face
}

// beyond names the face above which a point lies farthest, of its distances
// along the shell's thickness, across theta, and across phi; and how many
// faces it lies above.
func (v *Vault) beyond(u, across, side, turn float64) (face, out int) {
	var most float64
	take := func(d float64, f int) {
		if d > 0 {
			out++
		}
		if d > most {
			face, most = f, d
		}
	}
	take(v.Inner-u, VaultInner)
	take(u-v.Outer, VaultOuter)
	take(math.Abs(across), VaultTheta0+boolean(across > 0))
	take(math.Abs(side), VaultAntispinward+boolean(turn > 0))
	return face, out
}

// normal is that of a face, away from the solid, at the angles phi and theta;
// that of an end face is taken at its own angle.
func (v *Vault) normal(face int, phi, theta float64) r3.Vec {
	switch face {
	case VaultInner:
		return r3.Scale(-1, onTube(phi, theta))
	case VaultOuter:
		return onTube(phi, theta)
	case VaultTheta0:
		return onTube(phi, v.Theta0-math.Pi/2)
	case VaultTheta1:
		return onTube(phi, v.Theta1+math.Pi/2)
	case VaultAntispinward:
		return onAngle(v.Phi0-math.Pi/2, 1, 0)
	}
	return onAngle(v.Phi1+math.Pi/2, 1, 0)
}

// onTube gives the direction theta in the half plane of the angle phi.
func onTube(phi, theta float64) r3.Vec {
	sin, cos := math.Sincos(theta)
	return onAngle(phi, cos, sin)
}

// Bounds implements [Solid]: those of the piece of a thick cylinder with the
// least and greatest radius, whose corners it has.
func (v *Vault) Bounds() Box {
	s := Sector{R0: math.Inf(1), Z0: math.Inf(1), Z1: math.Inf(-1), Phi0: v.Phi0, Phi1: v.Phi1, Whole: v.Whole}
	add := func(rho, theta float64) {
		sin, cos := math.Sincos(theta)
		r, z := math.Max(0, v.Ring+rho*cos), v.Z+rho*sin
		s.R0, s.R1 = math.Min(s.R0, r), math.Max(s.R1, r)
		s.Z0, s.Z1 = math.Min(s.Z0, z), math.Max(s.Z1, z)
	}
	for _, rho := range []float64{v.Inner, v.Outer} {
		add(rho, v.Theta0)
		add(rho, v.Theta1)
		for k := math.Ceil(v.Theta0 / (math.Pi / 2)); k*math.Pi/2 <= v.Theta1; k++ {
			add(rho, k*math.Pi/2)
		}
	}
	return s.Bounds()
}

// Section implements [Solid]: the plane cuts the piece of a ring in each half
// plane in one stretch of radii.
func (v *Vault) Section(z float64) []Seg {
	sign := 1.0 // the way from the middle of the tube
	lo, hi := v.Theta0, v.Theta1
	if lo+hi > math.Pi {
		sign, lo, hi = -1, math.Pi-hi, math.Pi-lo
	}
	h := z - v.Z
	if h < 0 {
		h, lo, hi = -h, -hi, -lo
	}
	near, far, ok := v.stretch(h, lo, hi)
	if !ok {
		return nil
	}
	r0, r1 := v.Ring+sign*near, v.Ring+sign*far
	ring := Sector{R0: math.Max(0, math.Min(r0, r1)), R1: math.Max(r0, r1), Phi0: v.Phi0, Phi1: v.Phi1, Whole: v.Whole, Z0: z, Z1: z,
		open0: v.open0, open1: v.open1}
	return ring.Section(z)
}

// stretch gives how far from the middle of the tube the outer half of a ring,
// theta from lo to hi, is cut at the height h, not negative, above it.
func (v *Vault) stretch(h, lo, hi float64) (near, far float64, ok bool) {
	if h > v.Outer || hi < 0 || h == 0 && lo > 0 || h > 0 && hi == 0 {
		return 0, 0, false
	}
	near, far = chord(v.Inner, h), chord(v.Outer, h)
	// x = h cot(theta): the steeper, the nearer.
	if h > 0 && hi < math.Pi/2 {
		near = math.Max(near, h*math.Cos(hi)/math.Sin(hi))
	}
	if h > 0 && lo > 0 {
		far = math.Min(far, h*math.Cos(lo)/math.Sin(lo))
	}
	return near, far, near < far
}
