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
	"offplumb/sim/geom"
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
	worst       float64 // error by its estimate
}

// add holds a landing to the truth, which is known to slack, a share of it.
func (c *cover) add(l *measure.Landing, want truth) {
	c.all++
	e := &l.Error
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
	if t.Logf("%s: %d of %d within, worst %.3g", c.what, c.within, c.all, c.worst); c.all == 0 || float64(c.within) < mostShare*float64(c.all) {
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
	s.flier = flight.NewFlierWith(s.m, setup)
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
	round := math.Atan2(fy, fx) - turn // a line goes less than half way round
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
//	z” = -k (z' - i omega z), so z = A e^(p t) + B e^(q t), p, q = (-k +- sqrt(k^2 + 4 i k omega))/2.
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

// TestErrorOfBeads tries the numerical error of landings after a slide: a bead
// on the antispinward wall of a spoke, beside the radius by b, with friction mu,
// from rest at x0 to the end of the wall,
//
//	x = mu b + A e^(p t) + B e^(q t), p, q = omega (-mu +- sqrt(1 + mu^2)),
//
// and from there straight to the floor.
func TestErrorOfBeads(t *testing.T) {
	for _, rel := range tolerances {
		rng := rand.New(rand.NewPCG(5, 3))
		c := cover{what: fmt.Sprintf("beads at %g (seed 5 3)", rel)}
		for range 60 {
			mu, spin, size := 0.6*rng.Float64(), 0.2+0.8*rng.Float64(), 0.0
			in := ring(18, spin, rel, model.Body{Name: "b", Mass: 1, Diameter: size, Friction: mu})
			in.Habitat.CeilingRadius, in.Habitat.Length = 15, 10
			in.Rooms = []model.Room{{Name: "hub", FloorRadius: 3, Length: 10}}
			in.Passages = []model.Passage{{Name: "spoke", FromRadius: 3, ToRadius: 15, Width: 1.6}}
			x0, beside := 5+8*rng.Float64(), 0.8-size/2
			in.Releases = []model.Release{{Name: "bead", Body: "b", Until: model.Until{Kind: model.UntilLanding},
				At: model.Station{HasRadius: true, Radius: math.Hypot(x0, beside), Spinward: model.Arc{Value: -math.Atan2(beside, x0), IsAngle: true}}}}
			_, l := flown(t, in, flight.Setup{})
			w:= beadTruth(spin, mu, beside, x0, math.Sqrt(15*15-0.8*0.8), 18, size/2)
			if c.all<5 {t.Logf("%v mu %v x0 %v: %v %v %v %v %v, want %+v err %+v",spin,mu,x0,l.Surface,l.Outcome,l.Time,l.Offset,l.Speed,w,l.Error) }
			c.add(l, beadTruth(spin, mu, beside, x0, math.Sqrt(15*15-0.8*0.8), 18, size/2))
		}
		c.hold(t)
	}
}

func beadTruth(spin, mu, beside, x0, exit, floor, a float64) truth {
	p, q := spin*(-mu+math.Sqrt(1+mu*mu)), spin*(-mu-math.Sqrt(1+mu*mu))
	start := x0 - mu*beside
	big, small := -start*q/(p-q), start*p/(p-q)
	at := func(t float64) (x, v float64) {
		return mu*beside + big*math.Exp(p*t) + small*math.Exp(q*t), big*p*math.Exp(p*t) + small*q*math.Exp(q*t)
	}
	slid := math.Log((exit-mu*beside)/big) / p // without the part that dies away
	for range 30 {
		x, v := at(slid)
		slid -= (x - exit) / v
	}
	_, v := at(slid)
	// The inertial frame that coincides with the habitat at the exit.
	pos, vel := r3.Vec{X: exit, Y: -beside}, r3.Vec{X: v + spin*beside, Y: spin * exit}
	b, rim := r3.Dot(pos, vel), floor-a
	fly := (-b + math.Sqrt(b*b+r3.Norm2(vel)*(rim*rim-r3.Norm2(pos)))) / r3.Norm2(vel)
	end := r3.Add(pos, r3.Scale(fly, vel))
	turn := spin * fly
	u := r3.Sub(vel, r3.Cross(r3.Vec{Z: spin}, end))
	phi := frame.Unwind(math.Atan2(end.Y, end.X), turn) - turn
	return truth{time: slid + fly, offset: floor * (phi - math.Atan2(-beside, x0)), speed: r3.Norm(u)}
}

// TestUnsureTouch tries a throw that grazes the edge of a box: the two
// computations touch different things, or the same with a great error.
func TestUnsureTouch(t *testing.T) {
	_ = geom.Patch{}
}
