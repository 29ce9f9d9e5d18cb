package geom_test

import (
	"math"
	"math/rand/v2"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/geom"
)

// randomCapsule gives a post of a kind: 0 along the axis, 1 across it, 2 any,
// 3 nearly across it, 4 nearly along it, 5 a ball.
func randomCapsule(rng *rand.Rand, kind int) *geom.Capsule {
	c := &geom.Capsule{A: r3.Scale(between(rng, 0, 20), direction(rng)), Radius: decades(rng, 0.01, 1)}
	along := r3.Scale(decades(rng, 0.02, 8), direction(rng))
	switch kind {
	case 0:
		along.X, along.Y = 0, 0
	case 1:
		along.Z = 0
	case 3:
		along.Z *= decades(rng, 1e-12, 1e-2)
	case 4:
		f := decades(rng, 1e-12, 1e-2)
		along.X, along.Y = f*along.X, f*along.Y
	case 5:
		along = r3.Vec{}
	}
	c.B = r3.Add(c.A, along)
	return c
}

const capsuleKinds = 6

// randomVault gives a piece of a vault of a kind: 0 a whole sphere, 1 the
// outer and 2 the inner half of a torus, 3 a piece of a sphere, 4 of the outer
// and 5 of the inner half of a torus, 6 a sphere but for a slit.
func randomVault(rng *rand.Rand, kind int) *geom.Vault {
	v := &geom.Vault{Z: between(rng, -5, 5), Inner: between(rng, 0.5, 6)}
	v.Outer = v.Inner * between(rng, 1.01, 1.3)
	v.Theta0, v.Theta1 = -math.Pi/2, math.Pi/2
	v.Phi0 = between(rng, -math.Pi, math.Pi)
	v.Phi1 = v.Phi0 + between(rng, 0.02, 6)
	v.Whole = kind < 3
	if kind == 1 || kind == 2 || kind == 4 || kind == 5 {
		v.Ring = v.Outer + between(rng, 0.1, 12)
	}
	if kind > 2 {
		v.Theta0 += between(rng, 0, 3)
		v.Theta1 -= between(rng, 0, 0.99) * (v.Theta1 - v.Theta0)
	}
	if kind == 2 || kind == 5 {
		v.Theta0, v.Theta1 = math.Pi-v.Theta1, math.Pi-v.Theta0
	}
	if kind == 6 {
		v.Theta0, v.Theta1 = -math.Pi/2, math.Pi/2
		v.Phi1 = v.Phi0 + 2*math.Pi - decades(rng, 0.001, 0.5)
	}
	return v
}

const vaultKinds = 7

func randomPipe(rng *rand.Rand) *geom.Pipe {
	p := &geom.Pipe{Shaft: geom.ShaftAt(between(rng, -math.Pi, math.Pi), between(rng, -5, 5)), Bore: decades(rng, 0.1, 2),
		From: between(rng, 0, 10), Spinward: rng.IntN(2) == 0}
	p.Outer, p.To = p.Bore+decades(rng, 0.02, 0.5), p.From+decades(rng, 0.1, 10)
	return p
}

func randomCollar(rng *rand.Rand) *geom.Collar {
	p := randomPipe(rng)
	return &geom.Collar{Shaft: p.Shaft, Bore: p.Bore, Half: p.Outer, From: p.From, To: p.From + decades(rng, 0.05, 1), Spinward: p.Spinward}
}

// coverCapsule samples the surface of a capsule.
func coverCapsule(c *geom.Capsule, step float64) cover {
	var out cover
	d := r3.Sub(c.B, c.A)
	length := r3.Norm(d)
	u := r3.Vec{Z: 1}
	if length > 0 {
		u = r3.Scale(1/length, d)
	}
	e := r3.Unit(r3.Cross(u, r3.Vec{X: 0.3, Y: 0.5 - u.X, Z: 0.7 - u.Y}))
	f := r3.Cross(u, e)
	round := func(i float64) r3.Vec {
		return r3.Add(r3.Scale(math.Cos(2*math.Pi*i), e), r3.Scale(math.Sin(2*math.Pi*i), f))
	}
	if length > 0 {
		out.patch(2*math.Pi*c.Radius, length, step, func(i, j float64) r3.Vec {
			return toward(toward(c.A, j*length, u), c.Radius, round(i))
		})
	}
	for k, m := range []r3.Vec{c.A, c.B} {
		up := r3.Scale(float64(2*k-1), u)
		out.patch(2*math.Pi*c.Radius, math.Pi/2*c.Radius, step, func(i, j float64) r3.Vec {
			sin, cos := math.Sincos(math.Pi / 2 * j)
			return toward(toward(m, c.Radius*cos, round(i)), c.Radius*sin, up)
		})
	}
	return out
}

// vaultPoint gives the point of a vault's tube.
func vaultPoint(v *geom.Vault, rho, theta, phi float64) r3.Vec {
	return polar(v.Ring+rho*math.Cos(theta), phi, v.Z+rho*math.Sin(theta))
}

func coverVault(v *geom.Vault, step float64) cover {
	var c cover
	p0, p1 := v.Phi0, v.Phi1
	if v.Whole {
		p0, p1 = 0, 2*math.Pi
	}
	phi := func(i float64) float64 { return p0 + i*(p1-p0) }
	theta := func(i float64) float64 { return v.Theta0 + i*(v.Theta1-v.Theta0) }
	rho := func(i float64) float64 { return v.Inner + i*(v.Outer-v.Inner) }
	round, tube := (v.Ring+v.Outer)*(p1-p0), v.Outer*(v.Theta1-v.Theta0)
	for _, r := range []float64{v.Inner, v.Outer} {
		c.patch(round, tube, step, func(i, j float64) r3.Vec { return vaultPoint(v, r, theta(j), phi(i)) })
	}
	for _, end := range []float64{v.Theta0, v.Theta1} {
		if !v.Whole || v.Ring > 0 {
			c.patch(round, v.Outer-v.Inner, step, func(i, j float64) r3.Vec { return vaultPoint(v, rho(j), end, phi(i)) })
		}
	}
	if !v.Whole {
		for _, end := range []float64{p0, p1} {
			c.patch(tube, v.Outer-v.Inner, step, func(i, j float64) r3.Vec { return vaultPoint(v, rho(j), theta(i), end) })
		}
	}
	return c
}

// shaftPoint gives the point at (u, v, w) about a shaft.
func shaftPoint(s *geom.Shaft, u, v, w float64) r3.Vec {
	return r3.Add(r3.Add(r3.Scale(u, s.Spin), r3.Scale(w, s.Out)), r3.Vec{Z: s.Z + v})
}

// sign is 1 for the spinward half of a thing and -1 for the other.
func sign(spinward bool) float64 {
	if spinward {
		return 1
	}
	return -1
}

func coverPipe(p *geom.Pipe, step float64) cover {
	s := &geom.Sector{R0: p.Bore, R1: p.Outer, Phi0: -math.Pi / 2, Phi1: math.Pi / 2, Z0: p.From, Z1: p.To}
	c := coverSector(s, step)
	for _, list := range [][]r3.Vec{c.points, c.edges} {
		for i, q := range list {
			list[i] = shaftPoint(&p.Shaft, sign(p.Spinward)*q.X, q.Y, q.Z)
		}
	}
	return c
}

func coverCollar(k *geom.Collar, step float64) cover {
	var c cover
	at := func(u, v, w float64) r3.Vec { return shaftPoint(&k.Shaft, sign(k.Spinward)*u, v, w) }
	w := func(j float64) float64 { return k.From + j*(k.To-k.From) }
	depth, h := k.To-k.From, k.Half
	ray := func(i float64) (cos, sin, rim float64) {
		sin, cos = math.Sincos(math.Pi * (i - 0.5))
		return cos, sin, h / math.Max(cos, math.Abs(sin))
	}
	c.patch(math.Pi*k.Bore, depth, step, func(i, j float64) r3.Vec {
		cos, sin, _ := ray(i)
		return at(k.Bore*cos, k.Bore*sin, w(j))
	})
	// Round the square at the steepest it goes by twice its half side a radian.
	for _, end := range []float64{k.From, k.To} {
		c.patch(2*math.Pi*h, math.Sqrt2*h-k.Bore, step, func(i, j float64) r3.Vec {
			cos, sin, rim := ray(i)
			r := k.Bore + j*(rim-k.Bore)
			return at(r*cos, r*sin, end)
		})
	}
	c.patch(2*h, depth, step, func(i, j float64) r3.Vec { return at(h, h*(2*i-1), w(j)) })
	for _, side := range []float64{-1, 1} {
		c.patch(h, depth, step, func(i, j float64) r3.Vec { return at(i*h, side*h, w(j)) })
		c.patch(h-k.Bore, depth, step, func(i, j float64) r3.Vec { return at(0, side*(k.Bore+i*(h-k.Bore)), w(j)) })
	}
	return c
}

// coverFurther samples the boundary of a shape beside sectors and blocks.
func coverFurther(s geom.Solid, step float64) cover {
	switch s := s.(type) {
	case *geom.Capsule:
		return coverCapsule(s, step)
	case *geom.Vault:
		return coverVault(s, step)
	case *geom.Pipe:
		return coverPipe(s, step)
	}
	return coverCollar(s.(*geom.Collar), step)
}

// furtherShapes gives a number of every kind of shape beside sectors and
// blocks.
func furtherShapes(rng *rand.Rand, each int, step float64) []shape {
	var out []shape
	for range each {
		for kind := range capsuleKinds {
			c := randomCapsule(rng, kind)
			size := math.Max(r3.Norm(c.A), r3.Norm(c.B)) + c.Radius
			s := shape{solid: c, cover: coverCapsule(c, step), size: size}
			if d := r3.Sub(c.B, c.A); d.Z != 0 && math.Hypot(d.X, d.Y) != 0 {
				s.bent = (1 - math.Cos(math.Pi/96)) * math.Min(c.Radius*r3.Norm(d)/math.Abs(d.Z), c.Radius+r3.Norm(d))
			}
			out = append(out, s)
		}
		for kind := range vaultKinds {
			v := randomVault(rng, kind)
			out = append(out, shape{solid: v, cover: coverVault(v, step), size: v.Ring + v.Outer + math.Abs(v.Z)})
		}
		p, c := randomPipe(rng), randomCollar(rng)
		out = append(out, shape{solid: p, cover: coverPipe(p, step), size: p.To + p.Outer + math.Abs(p.Z)},
			shape{solid: c, cover: coverCollar(c, step), size: c.To + c.Half + math.Abs(c.Z)})
	}
	return out
}

// offFurther gives how far (m) a point lies off a face of a shape beside
// sectors and blocks.
func offFurther(s geom.Solid, face int, q r3.Vec) float64 {
	switch s := s.(type) {
	case *geom.Vault:
		return offVault(s, face, q)
	case *geom.Pipe:
		return offPipe(s, face, q)
	case *geom.Collar:
		return offCollar(s, face, q)
	}
	return math.Abs(s.Dist(q)) // the one face of a capsule
}

func offVault(v *geom.Vault, face int, q r3.Vec) float64 {
	r, z := math.Hypot(q.X, q.Y)-v.Ring, q.Z-v.Z
	line := func(theta float64) float64 { return math.Abs(z*math.Cos(theta) - r*math.Sin(theta)) }
	plane := func(phi float64) float64 { return math.Abs(q.Y*math.Cos(phi) - q.X*math.Sin(phi)) }
	switch face {
	case geom.VaultInner:
		return math.Abs(math.Hypot(r, z) - v.Inner)
	case geom.VaultOuter:
		return math.Abs(math.Hypot(r, z) - v.Outer)
	case geom.VaultTheta0:
		return line(v.Theta0)
	case geom.VaultTheta1:
		return line(v.Theta1)
	case geom.VaultAntispinward:
		return plane(v.Phi0)
	case geom.VaultSpinward:
		return plane(v.Phi1)
	}
	return math.Inf(1)
}

// about gives the place of q about a shaft.
func about(s *geom.Shaft, q r3.Vec) (u, v, w float64) {
	return r3.Dot(s.Spin, q), q.Z - s.Z, r3.Dot(s.Out, q)
}

func offPipe(p *geom.Pipe, face int, q r3.Vec) float64 {
	u, v, w := about(&p.Shaft, q)
	switch face {
	case geom.SectorInner:
		return math.Abs(math.Hypot(u, v) - p.Bore)
	case geom.SectorOuter:
		return math.Abs(math.Hypot(u, v) - p.Outer)
	case geom.SectorAntispinward, geom.SectorSpinward:
		return math.Abs(u)
	case geom.SectorMinusAxial:
		return math.Abs(w - p.From)
	case geom.SectorPlusAxial:
		return math.Abs(w - p.To)
	}
	return math.Inf(1)
}

func offCollar(c *geom.Collar, face int, q r3.Vec) float64 {
	u, v, w := about(&c.Shaft, q)
	switch face {
	case geom.CollarBore:
		return math.Abs(math.Hypot(u, v) - c.Bore)
	case geom.CollarSide:
		return math.Abs(math.Max(math.Abs(u), math.Abs(v)) - c.Half)
	case geom.CollarSeam:
		return math.Abs(u)
	case geom.CollarInner:
		return math.Abs(w - c.From)
	case geom.CollarOuter:
		return math.Abs(w - c.To)
	}
	return math.Inf(1)
}
