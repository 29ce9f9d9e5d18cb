package study

import (
	"fmt"
	"math"
	"math/big"
	"math/cmplx"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/air"
	"offplumb/sim/flight"
	"offplumb/sim/frame"
	"offplumb/sim/measure"
	"offplumb/sim/model"
)

// truth is a landing by a closed form.
type truth struct {
	time, offset, axial, speed float64
}

// cover counts how many landings lie within their numerical error of the truth.
type cover struct {
	what        string
	all, within int
	unsure      int     // of which it is said that they are unsure
	worst       float64 // error by its estimate
}

// add holds a landing to the truth.
func (c *cover) add(l *measure.Landing, want truth) {
	e := &l.Error
	if e.Unsure != "" {
		c.unsure++
		return
	}
	c.all++
	share := math.Max(math.Hypot(l.Offset-want.offset, l.OffsetAxial-want.axial)/e.Place,
		math.Max(math.Abs(l.Time-want.time)/e.Time, math.Abs(l.Speed-want.speed)/e.Speed))
	if share <= 1 {
		c.within++
	}
	if !(share <= c.worst) {
		c.worst = share
	}
}

// mostShare is how many of the landings must be covered at the least.
const mostShare = 0.99

func (c *cover) hold(t *testing.T) {
	t.Helper()
	if t.Logf("%s: %d of %d within, worst %.3g; %d unsure", c.what, c.within, c.all, c.worst, c.unsure); c.all <= 4*c.unsure || float64(c.within) < mostShare*float64(c.all) {
		t.Errorf("%s: %d of %d landings within their numerical error, the worst %.3g times it", c.what, c.within, c.all, c.worst)
	}
}

var tolerances = []float64{1e-5, 1e-6, 1e-7, 1e-8, 1e-9, 1e-10}

func solver(rel float64) model.Solver {
	return model.Solver{RelTol: rel, PosTol: 1e-12, VelTol: 1e-12, MaxTime: 600}
}

// flown flies the one release of a scenario, with the numerical error of its
// landing.
func flown(t *testing.T, in model.Model, setup flight.Setup) (*flight.Let, *measure.Landing) {
	t.Helper()
	m, problems := model.New(in)
	if problems != nil {
		t.Fatal(problems)
	}
	p, problems := Prepare(m)
	if problems != nil {
		t.Fatal(problems)
	}
	track, err := flight.NewFlierWith(m, setup).Fly(&p.Lets[0])
	if err != nil {
		t.Fatal(err)
	}
	s := newSurer(m)
	s.flier = flight.NewFlierWith(s.loose, setup)
	l := measure.Land(m, track)
	s.sure(&p.Lets[0], track, &l)
	return &p.Lets[0], &l
}

func ring(radius, spin, rel float64, b model.Body) model.Model {
	return model.Model{Habitat: model.Habitat{Room: model.Room{FloorRadius: radius}, Spin: spin},
		Solver: solver(rel), Output: model.Output{Step: 0.01}, Bodies: []model.Body{b}}
}

// thrown adds a release from spinward zero.
func thrown(in *model.Model, height float64, v r3.Vec) {
	in.Releases = []model.Release{{Name: "throw", Body: in.Bodies[0].Name, At: model.Station{Height: height},
		Start: model.Start{Kind: model.Velocity, VSpinward: v.X, VAxial: v.Y, VUp: v.Z}, Until: model.Until{Kind: model.UntilLanding}}}
}

// TestErrorOfStraightFlights tries the formula of roundings on drops and throws
// in vacuum, in habitats from a turntable to a world. The truth is the straight
// line from the start to the circle, in 200 bits.
func TestErrorOfStraightFlights(t *testing.T) {
	rng := rand.New(rand.NewPCG(5, 1))
	c := cover{what: "straight flights (seed 5 1)"}
	for i := range 400 {
		radius := math.Pow(10, -0.5+6.5*rng.Float64())
		g := 0.5 + 10*rng.Float64()
		spin := math.Copysign(math.Sqrt(g/radius), rng.Float64()-0.3)
		b := model.Body{Name: "b", Mass: 1, Diameter: 0.01 * rng.Float64() * math.Min(radius, 1)}
		in := ring(radius, spin, 1e-9, b)
		height := b.Diameter/2 + (0.01+0.6*rng.Float64())*math.Min(radius, 5)
		v := r3.Vec{}
		if i%2 == 1 {
			v = r3.Scale(math.Sqrt(2*g*height), r3.Vec{X: rng.NormFloat64(), Y: rng.NormFloat64(), Z: rng.NormFloat64()})
		}
		thrown(&in, height, v)
		let, l := flown(t, in, flight.Setup{})
		c.add(l, straightTruth(let, radius, spin))
	}
	c.hold(t)
}

// straightTruth follows a straight line from the circle's x axis.
func straightTruth(let *flight.Let, radius, spin float64) truth {
	num := func(x float64) *big.Float { return new(big.Float).SetPrec(200).SetFloat64(x) }
	add := func(a, b *big.Float) *big.Float { return new(big.Float).SetPrec(200).Add(a, b) }
	mul := func(a, b *big.Float) *big.Float { return new(big.Float).SetPrec(200).Mul(a, b) }
	x, vx := num(let.Local.Pos.X), num(let.Local.Vel.X)
	vy := add(num(let.Local.Vel.Y), mul(num(spin), x))
	rim := add(num(radius), mul(num(-0.5), num(let.Body.Diameter)))
	a := add(mul(vx, vx), mul(vy, vy))
	b := mul(x, vx)
	gap := add(mul(rim, rim), mul(num(-1), mul(x, x)))
	root := new(big.Float).SetPrec(200).Sqrt(add(mul(b, b), mul(a, gap)))
	time := new(big.Float).SetPrec(200).Quo(add(root, mul(num(-1), b)), a)
	px, py := add(x, mul(vx, time)), mul(vy, time)
	// Gone round: the angle of the line less that of the habitat.
	fx, _ := px.Float64()
	fy, _ := py.Float64()
	turn, _ := mul(num(spin), time).Float64()
	round := math.Atan2(fy, fx) - turn                  // a line goes less than half way round
	if math.Abs(round) < 1e-3 && math.Abs(turn) < 0.1 { // the cancellation, by a series in 200 bits
		round = tinyAngle(py, px, mul(num(spin), time))
	}
	ux, _ := add(vx, mul(num(spin), py)).Float64()
	uy, _ := add(vy, mul(num(-spin), px)).Float64()
	out := truth{offset: radius * round, speed: math.Hypot(math.Hypot(ux, uy), let.Local.Vel.Z)}
	out.time, _ = time.Float64()
	out.axial = let.Local.Vel.Z * out.time
	return out
}

// tinyAngle is atan(y/x) - turn for small angles, by the series of the arc
// tangent.
func tinyAngle(y, x, turn *big.Float) float64 {
	f := func() *big.Float { return new(big.Float).SetPrec(200) }
	q := f().Quo(y, x)
	q2, term, sum := f().Mul(q, q), f().Set(q), f().Set(q)
	for k := 3; k < 80; k += 2 {
		term = f().Neg(f().Mul(term, q2))
		sum = f().Add(sum, f().Quo(term, f().SetInt64(int64(k))))
	}
	out, _ := f().Sub(sum, turn).Float64()
	return out
}

// stokesLaw is Stokes' law (1851).
type stokesLaw struct{}

func (stokesLaw) CdRe(float64) float64 { return 24 }

// TestErrorUnderStokes tries the numerical error on falls and throws of slow
// small spheres, whose drag is proportional to the speed: with z = x + iy in
// the inertial frame and k the drag for each mass and speed,
//
//	z'' = -k (z' - i omega z), so z = A e^(p t) + B e^(q t), p, q = (-k +- sqrt(k^2 + 4 i k omega))/2.
func TestErrorUnderStokes(t *testing.T) {
	for _, rel := range tolerances {
		rng := rand.New(rand.NewPCG(5, 2))
		c := cover{what: fmt.Sprintf("Stokes falls at %g (seed 5 2)", rel)}
		for range 200 {
			radius, spin := 5+30*rng.Float64(), 0.3+0.5*rng.Float64()
			b := model.Body{Name: "b", Diameter: 1e-4 + 4e-4*rng.Float64()}
			b.Mass = 1000 * math.Pi / 6 * math.Pow(b.Diameter, 3)
			in := ring(radius, spin, rel, b)
			in.Air = air.Air{Density: 1.2, Viscosity: 1.8e-5}
			thrown(&in, 0.2+2*rng.Float64(), r3.Vec{X: rng.NormFloat64(), Y: rng.NormFloat64(), Z: rng.NormFloat64()})
			let, l := flown(t, in, flight.Setup{Law: stokesLaw{}})
			c.add(l, stokesTruth(let, radius, spin, 3*math.Pi*in.Air.Viscosity*b.Diameter/b.Mass, l.Time))
		}
		c.hold(t)
	}
}

// stokesTruth finds the touch near a time by Newton's method.
func stokesTruth(let *flight.Let, radius, spin, k, near float64) truth {
	z0 := complex(let.Local.Pos.X, let.Local.Pos.Y)
	v0 := complex(let.Local.Vel.X, let.Local.Vel.Y) + complex(0, spin)*z0
	root := cmplx.Sqrt(complex(k*k, 4*k*spin))
	p := (complex(-k, 0) + root) / 2
	q := (complex(-k, 0) - root) / 2
	a := (v0 - q*z0) / (p - q)
	b := z0 - a
	rim := radius - let.Body.Diameter/2
	time := near
	var z, v complex128
	for range 20 {
		ep, eq := cmplx.Exp(p*complex(time, 0)), cmplx.Exp(q*complex(time, 0))
		z, v = a*ep+b*eq, a*p*ep+b*q*eq
		r := cmplx.Abs(z)
		rate := real(v*cmplx.Conj(z)) / r
		time -= (r - rim) / rate
	}
	turn := spin * time
	u := v - complex(0, spin)*z
	vz := let.Local.Vel.Z * math.Exp(-k*time)
	return truth{time: time, offset: radius * (frame.Unwind(cmplx.Phase(z), turn) - turn),
		axial: -let.Local.Vel.Z * math.Expm1(-k*time) / k, speed: math.Hypot(cmplx.Abs(u), vz)}
}

// TestErrorOfBeads tries the numerical error of landings after a slide: a ball
// on the antispinward wall of a spoke, beside the radius by b, with friction mu,
// from rest at x0 to the top of a box that reaches into the spoke,
//
//	x = mu b + A e^(p t) + B e^(q t), p, q = omega (-mu +- sqrt(1 + mu^2)).
func TestErrorOfBeads(t *testing.T) {
	const width, top = 1.6, 14.5
	for _, rel := range tolerances {
		rng := rand.New(rand.NewPCG(5, 3))
		c := cover{what: fmt.Sprintf("beads at %g (seed 5 3)", rel)}
		for range 100 {
			mu, spin, size := 0.6*rng.Float64(), 0.2+0.8*rng.Float64(), 0.06+0.1*rng.Float64()
			in := ring(18, spin, rel, model.Body{Name: "b", Mass: 1, Diameter: size, Friction: mu})
			in.Habitat.CeilingRadius, in.Habitat.Length = 15, 10
			in.Rooms = []model.Room{{Name: "hub", FloorRadius: 3, Length: 10}}
			in.Passages = []model.Passage{{Name: "spoke", FromRadius: 3, ToRadius: 15, Width: width}}
			in.Fixtures = []model.Fixture{{Name: "box", Kind: model.Box, Size: [3]float64{width - 0.04, 1, 18 - top}, Friction: model.None, Restitution: model.None}}
			x0, beside := 5+8*rng.Float64(), (width-size)/2
			in.Releases = []model.Release{{Name: "bead", Body: "b", Until: model.Until{Kind: model.UntilLanding},
				At: model.Station{HasRadius: true, Radius: math.Hypot(x0, beside), Spinward: model.Arc{Value: -math.Atan2(beside, x0), IsAngle: true}}}}
			_, l := flown(t, in, flight.Setup{})
			if l.Surface != "box top" {
				t.Fatalf("%s: it lands on %q", c.what, l.Surface)
			}
			c.add(l, beadTruth(spin, mu, beside, x0, top-size/2, 18))
		}
		c.hold(t)
	}
}

func beadTruth(spin, mu, beside, x0, end, floor float64) truth {
	p, q := spin*(-mu+math.Sqrt(1+mu*mu)), spin*(-mu-math.Sqrt(1+mu*mu))
	start := x0 - mu*beside
	big, small := -start*q/(p-q), start*p/(p-q)
	time, v := math.Log((end-mu*beside)/big)/p, 0.0 // without the part that dies away
	for range 30 {
		grown, gone := big*math.Exp(p*time), small*math.Exp(q*time)
		v = p*grown + q*gone
		time -= (mu*beside + grown + gone - end) / v
	}
	return truth{time: time, offset: floor * (math.Atan2(beside, x0) - math.Atan2(beside, end)), speed: v}
}

// TestUnsureTouch tries a throw in air that comes down on the very edge of a
// box, found by halving: there the looser computation goes by, and both
// surfaces are named.
func TestUnsureTouch(t *testing.T) {
	throw := func(up float64) *measure.Landing {
		in := ring(18, 0.5, 1e-9, model.Body{Name: "b", Mass: 0.05, Diameter: 0.06})
		in.Air = air.Air{Density: 1.2, Viscosity: 1.8e-5}
		in.Fixtures = []model.Fixture{{Name: "box", Kind: model.Box, At: model.Station{Spinward: model.Arc{Value: -1.5}}, Size: [3]float64{1, 1, 1}, Friction: model.None, Restitution: model.None}}
		thrown(&in, 1.5, r3.Vec{X: -3, Z: up})
		_, l := flown(t, in, flight.Setup{})
		return l
	}
	low, high := 0.5, 5.0 // into the box, and over it
	beyond := throw(high).Surface
	for range 60 {
		if mid := (low + high) / 2; throw(mid).Surface == beyond {
			high = mid
		} else {
			low = mid
		}
	}
	short, over := throw(low), throw(high)
	if short.Surface == over.Surface {
		t.Fatalf("both on %s", over.Surface)
	}
	said := 0
	for _, l := range []*measure.Landing{short, over} {
		if l.Error.Unsure == "" {
			continue
		}
		if said++; l.Error.Unsure == l.Surface || !math.IsNaN(l.Error.Place) || !math.IsNaN(l.Error.Time) {
			t.Errorf("on %s: %+v", l.Surface, l.Error)
		}
	}
	if said == 0 {
		t.Errorf("on %s or %s, at %v m/s: neither is unsure", short.Surface, over.Surface, high)
	}
}
