package measure_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"offplumb/sim/air"
	"offplumb/sim/measure"
	"offplumb/sim/model"
)

// slack bounds the roundings of a landing's lengths as a share of the floor's
// radius, where the habitat turns by the angle turned during the flight: its
// time is found to 100 epsilon of itself, and a radius, of an epsilon or so,
// counts by up to the square of it.
func slack(turned float64) float64 { return 500 * epsilon * (1 + turned*turned) }

// TestDropOffsetsAreInvolutes tries Land's offset of a drop against the closed
// form, over habitats from a booth to a city, up to 97 % of the way to the
// axis, at both signs of spin.
func TestDropOffsetsAreInvolutes(t *testing.T) {
	rng := random(t, 1)
	for range 200 {
		r, share := 3*math.Exp(between(rng, 0, 6)), math.Exp(between(rng, math.Log(1e-4), math.Log(0.97)))
		spin := between(rng, 0.1, 2) * float64(1-2*rng.IntN(2))
		l := land(t, ring(r, spin), model.Release{Name: "drop", At: model.Station{Height: share * r, Axial: between(rng, -9, 9)}})
		turned := math.Abs(spin) * l.Time
		if want := measure.DropOffset(r, share*r, spin); math.Abs(l.Offset-want) > slack(turned)*r {
			t.Fatalf("R = %g m, height %g m, spin %g: offset %.17g m, want %.17g", r, share*r, spin, l.Offset, want)
		}
		if want := math.Tan(math.Acos(1 - share)); math.Abs(turned-want) > 1e-9*want {
			t.Fatalf("R = %g m, height %g m, spin %g: turned by %.12g rad, want %.12g", r, share*r, spin, turned, want)
		}
		if l.Deflection != l.Offset || l.OffsetAxial != 0 || l.DeflAxial != 0 || l.Surface != "floor" {
			t.Fatalf("a drop lands with %+v", l)
		}
	}
}

// toss is a throw in a habitat with air: what the landing of it must keep when
// something else changes.
type toss struct {
	r, spin            float64
	air                air.Air
	mass, diameter     float64
	height             float64
	spinward, axial, u float64 // m/s
	begin              float64 // s
}

func newToss(rng *rand.Rand) toss {
	v := toss{r: between(rng, 6, 200), spin: between(rng, 0.1, 1), mass: between(rng, 0.02, 2), diameter: between(rng, 0.01, 0.3)}
	v.air = air.FromPressure(between(rng, 3e4, 1e5), between(rng, 280, 300))
	v.height = between(rng, 0.5, 3)
	rim := v.r * v.spin
	v.spinward, v.axial, v.u = between(rng, -0.7, 0.7)*rim, between(rng, -0.5, 0.5)*rim, between(rng, -0.5, 0.7)*rim
	return v
}

// lands lets it go from a place.
func (v *toss) lands(t *testing.T, at model.Station) measure.Landing {
	t.Helper()
	in := ring(v.r, v.spin)
	in.Air = v.air
	at.Height = v.height
	r := sphere(v.mass, v.diameter, at, model.Start{Kind: model.Velocity, VSpinward: v.spinward, VAxial: v.axial, VUp: v.u})
	r.Time = v.begin
	return land(t, in, r)
}

// near says whether two landings agree but for the place where they are. Steps
// that differ by roundings alone differ by far less than their own tolerance
// of 1e-9: a hundredth of it leaves room for how they grow in a long flight.
func near(a, b measure.Landing, r float64) bool {
	const share = 1e-11
	same := func(x, y, scale float64) bool { return math.Abs(x-y) <= share*scale }
	return same(a.Time, b.Time, a.Time) && same(a.Offset, b.Offset, r) && same(a.Deflection, b.Deflection, r) &&
		same(a.OffsetAxial, b.OffsetAxial, r) && same(a.Speed, b.Speed, a.Speed) && same(a.NormalSpeed, b.NormalSpeed, a.Speed) &&
		same(a.Energy, b.Energy, a.Energy)
}

// TestLandingsTheSameEverywhere tries that a landing is the same from any place
// round the circle and along the axis, and at any time.
func TestLandingsTheSameEverywhere(t *testing.T) {
	rng := random(t, 2)
	for range 60 {
		v := newToss(rng)
		here := v.lands(t, model.Station{})
		v.begin = between(rng, 0, 1000)
		there := v.lands(t, model.Station{Spinward: model.Arc{Value: between(rng, -math.Pi, math.Pi), IsAngle: true}, Axial: between(rng, -20, 20)})
		if !near(here, there, v.r) {
			t.Fatalf("%+v:\nhere  %+v\nthere %+v", v, here, there)
		}
	}
}

// TestNegativeSpinMirrors tries that turning the spin round, and the throw's
// spinward part, turns the landing round and nothing else.
func TestNegativeSpinMirrors(t *testing.T) {
	rng := random(t, 3)
	for range 60 {
		v := newToss(rng)
		a := v.lands(t, model.Station{})
		v.spin, v.spinward = -v.spin, -v.spinward
		b := v.lands(t, model.Station{})
		b.Offset, b.Deflection = -b.Offset, -b.Deflection
		if !near(a, b, v.r) {
			t.Fatalf("%+v:\nspin + %+v\nspin - %+v", v, a, b)
		}
		if math.Abs(a.Arc+b.Arc) > 1e-11*v.r {
			t.Fatalf("%+v: arcs %g m and %g m are not mirrored", v, a.Arc, b.Arc)
		}
	}
}

// TestVacuumLandingsScale tries that without air a habitat so many times as
// large, turning so many times as fast, with speeds to match, has the same
// landings in its own measure: for drops the same h/R gives the same offset/R.
func TestVacuumLandingsScale(t *testing.T) {
	rng := random(t, 4)
	for i := range 80 {
		v := newToss(rng)
		v.air, v.diameter = air.Air{}, 0
		if i%2 == 0 {
			v.spinward, v.axial, v.u = 0, 0, 0
		}
		a := v.lands(t, model.Station{})
		size, quick := between(rng, 0.1, 10), between(rng, 0.2, 5)
		w := v
		w.r, w.height, w.spin = size*v.r, size*v.height, quick*v.spin
		w.spinward, w.axial, w.u = size*quick*v.spinward, size*quick*v.axial, size*quick*v.u
		b := w.lands(t, model.Station{})
		b.Time *= quick
		for _, l := range []*float64{&b.Offset, &b.Deflection, &b.OffsetAxial} {
			*l /= size
		}
		for _, s := range []*float64{&b.Speed, &b.NormalSpeed} {
			*s /= size * quick
		}
		b.Energy /= size * size * quick * quick
		if !near(a, b, v.r) {
			t.Fatalf("%+v, %g times as large and %g times as fast:\nhere  %+v\nthere %+v", v, size, quick, a, b)
		}
	}
}
