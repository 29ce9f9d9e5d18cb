package geom

import (
	"math"
	"slices"
)

// vaultShell is the hull of a torus or sphere, or a half of it: a vault with
// the mouths of passages cut through it.
type vaultShell struct {
	Vault
	restitution, friction float64 // of its surfaces; NaN: the body's
	inner, outer, edge    string  // names of its faces
	holes                 []vaultHole
}

// vaultHole is a cut through a vault between planes of constant angle and
// cones of constant theta.
type vaultHole struct {
	Hole                   // its Z0 and Z1 do not count
	theta0, theta1 float64 // rad
}

// addVault adds the pieces that are left of a vault around its holes: bands
// between the thetas at which holes begin or end, each cut at the angles of
// its holes.
func (b *Builder) addVault(s *vaultShell) {
	ts := []float64{s.Theta0, s.Theta1}
	for _, h := range s.holes {
		ts = append(ts, clamp(h.theta0, s.Theta0, s.Theta1), clamp(h.theta1, s.Theta0, s.Theta1))
	}
	slices.Sort(ts)
	ts = slices.Compact(ts)
	for i := 1; i < len(ts); i++ {
		b.addVaultBand(s, ts[i-1], ts[i])
	}
}

func (b *Builder) addVaultBand(s *vaultShell, t0, t1 float64) {
	var cuts []Hole
	for _, h := range s.holes {
		if h.theta0 < t1 && h.theta1 > t0 {
			cuts = append(cuts, h.Hole)
		}
	}
	piece := s.Vault
	piece.Theta0, piece.Theta1 = t0, t1
	if len(cuts) == 0 {
		b.addVaultPiece(s, piece, span{})
		return
	}
	for _, left := range remaining(&Shell{Whole: true}, cuts) {
		piece.Whole, piece.Phi0, piece.Phi1 = false, left.from, left.to
		piece.open0, piece.open1 = left.atFrom == "", left.atTo == ""
		b.addVaultPiece(s, piece, left)
	}
}

func (b *Builder) addVaultPiece(s *vaultShell, piece Vault, at span) {
	name := func(n string) SurfaceID {
		if n == "" {
			n = s.edge
		}
		return b.Surface(n, s.restitution, s.friction)
	}
	faces := make([]SurfaceID, vaultFaces)
	faces[VaultInner], faces[VaultOuter] = name(s.inner), name(s.outer)
	faces[VaultTheta0], faces[VaultTheta1] = name(s.edge), name(s.edge)
	faces[VaultAntispinward], faces[VaultSpinward] = name(at.atFrom), name(at.atTo)
	b.Add(&piece, faces...)
	added := &b.in.pieces[len(b.in.pieces)-1]
	for _, h := range s.holes {
		if h.theta1 == piece.Theta0 {
			added.rims = append(added.rims, rim{face: VaultTheta0, phi: h.Phi, half: h.Half, id: name(h.Name)})
		}
		if h.theta0 == piece.Theta1 {
			added.rims = append(added.rims, rim{face: VaultTheta1, phi: h.Phi, half: h.Half, id: name(h.Name)})
		}
	}
}

// mostBands bounds the bands of a mouth.
const mostBands = 64

// pierce cuts the mouth of a passage into a vault where its middle line
// crosses it. Each face of the cut keeps out of the shaft, and in its walls: a
// face of constant theta is dz (m) aside of the middle of the tube at the inner
// or outer side, at most dz thickness/inner farther at the other, and dz <
// inner; one of constant angle gains h (r1/r0 - 1) between the least and
// greatest distance from the axis, h being half the shaft's width, and so the
// mouth is divided into bands of theta until they gain less than the wall. For
// a round shaft it gives the stretch over which collars must fill the corners.
func (s *vaultShell) pierce(p *Passage) (Span, bool) {
	h, z := p.Width/2, p.Z-s.Z
	sign := 1.0
	if s.Theta0 >= math.Pi/2 {
		sign = -1
	}
	if math.Abs(z)+h >= s.Inner || !p.crosses(s.Ring+sign*chord(s.Inner, z)) {
		return Span{}, false
	}
	from, to := s.sine(z-h, -1), s.sine(z+h, 1)
	if sign > 0 && (to <= s.Theta0 || from >= s.Theta1) {
		return Span{}, false
	}
	n := 1
	for ; n < mostBands; n *= 2 {
		if s.gain(h, sign, from, to, n) <= p.Wall {
			break
		}
	}
	out := Span{math.Inf(1), 0}
	for i := range n {
		hole := vaultHole{theta0: part(from, to, i, n), theta1: part(from, to, i+1, n)}
		r0, r1 := s.radii(sign, hole.theta0, hole.theta1)
		out.From, out.To = math.Min(out.From, chord(r0, h)), math.Max(out.To, r1)
		if sign < 0 {
			hole.theta0, hole.theta1 = math.Pi-hole.theta1, math.Pi-hole.theta0
		}
		hole.Hole = p.mouth(HalfAngle(p.Width, r0))
		s.holes = append(s.holes, hole)
	}
	return out, true
}

func part(from, to float64, i, n int) float64 {
	if i == n {
		return to
	}
	return from + (to-from)*float64(i)/float64(n)
}

// sine gives the theta of an edge at the height z (m), on the side of the
// sign, such that the shell within lies all on the other side of the height.
func (s *vaultShell) sine(z, sign float64) float64 {
	if z*sign > 0 {
		return math.Asin(z / s.Inner)
	}
	return math.Asin(z / s.Outer)
}

// radii gives the least and greatest distance from the axis of a band of the
// outer half (sign 1), or of its mirror image in the inner half (sign -1).
func (s *vaultShell) radii(sign, t0, t1 float64) (r0, r1 float64) {
	low := math.Cos(math.Max(math.Abs(t0), math.Abs(t1)))
	high := math.Max(math.Cos(t0), math.Cos(t1))
	if t0 < 0 && t1 > 0 {
		high = 1
	}
	if sign < 0 {
		return s.Ring - s.Outer*high, s.Ring - s.Inner*low
	}
	return s.Ring + s.Inner*low, s.Ring + s.Outer*high
}

// gain is by how much (m) the widest of n bands opens beyond half the width h.
func (s *vaultShell) gain(h, sign, from, to float64, n int) float64 {
	var most float64
	for i := range n {
		r0, r1 := s.radii(sign, part(from, to, i, n), part(from, to, i+1, n))
		most = math.Max(most, h*(r1/r0-1))
	}
	return most
}
