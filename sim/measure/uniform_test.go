package measure_test

import (
	"math"
	"testing"

	"offplumb/sim/model"
)

// TestUniformGravityPath tries the path of the schoolbooks: a throw at speed v
// and elevation e from the deck goes v^2 sin(2e)/g far in 2 v sin(e)/g and
// comes down as fast as it left, g being the gravity at rest on the deck.
func TestUniformGravityPath(t *testing.T) {
	const r, spin, d = 18.0, -0.5, 0.2
	g := spin * spin * r
	v, e, heading := 4.0, 0.7, 2.4
	l := land(t, ring(r, spin), sphere(1, d, model.Station{Height: d / 2}, model.Start{Kind: model.Thrown, Speed: v, Heading: heading, Elevation: e}))
	far := v * v * math.Sin(2*e) / g
	for _, c := range []struct {
		name      string
		got, want float64
	}{
		{"time", l.Uniform.Time, 2 * v * math.Sin(e) / g},
		{"offset", l.Uniform.Offset, far * math.Cos(heading)},
		{"axial offset", l.Uniform.OffsetAxial, far * math.Sin(heading)},
		{"speed", l.Uniform.Speed, v},
		{"deflection", l.Deflection, l.Offset - far*math.Cos(heading)},
		{"axial deflection", l.DeflAxial, l.OffsetAxial - far*math.Sin(heading)},
	} {
		if math.Abs(c.got-c.want) > 64*epsilon*far {
			t.Errorf("%s %.16g, want %.16g", c.name, c.got, c.want)
		}
	}
	if _, _, h := l.Uniform.At(l.Uniform.Time); math.Abs(h-d/2) > 64*epsilon*r {
		t.Errorf("ends %g m above the deck, want the radius of the body", h)
	}
}

// TestUniformGravityDrop tries that on the same path a ball falls until its
// surface is down, h - d/2, in the time of the schoolbooks.
func TestUniformGravityDrop(t *testing.T) {
	const r, spin, d, h = 18.0, -0.5, 0.2, 1.7
	l := land(t, ring(r, spin), sphere(1, d, model.Station{Height: h}, model.Start{}))
	g := spin * spin * r
	if want := math.Sqrt(2 * (h - d/2) / g); math.Abs(l.Uniform.Time-want) > 8*epsilon*want || l.Uniform.Offset != 0 {
		t.Errorf("falls for %.16g s with offset %g m, want %.16g and none", l.Uniform.Time, l.Uniform.Offset, want)
	}
	if want := math.Sqrt(2 * (h - d/2) * g); math.Abs(l.Uniform.Speed-want) > 8*epsilon*want {
		t.Errorf("comes down at %.16g m/s, want %.16g", l.Uniform.Speed, want)
	}
}

// TestDeflectionVanishesInWideHabitats tries that with the same gravity at the
// deck and ever wider habitats the landing comes to that of the uniform-gravity
// path, as one over the square root of the radius: 2 omega v, over g.
func TestDeflectionVanishesInWideHabitats(t *testing.T) {
	last := math.NaN()
	for _, r := range []float64{1e4, 1e6, 1e8} {
		l := land(t, ring(r, math.Sqrt(5/r)), model.Release{Name: "throw", At: model.Station{Height: 1.5},
			Start: model.Start{Kind: model.Thrown, Speed: 3, Heading: 0.4, Elevation: 0.8}})
		if share := l.Deflection / last; !math.IsNaN(last) && math.Abs(share-0.1) > 0.01 {
			t.Errorf("R = %g m: deflection %g m, %g of that at a hundredth, want 0.1", r, l.Deflection, share)
		}
		if math.Abs(l.Time/l.Uniform.Time-1) > 10/math.Sqrt(r) {
			t.Errorf("R = %g m: lands after %g s, on the uniform-gravity path after %g", r, l.Time, l.Uniform.Time)
		}
		last = l.Deflection
	}
}
