package geom_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/geom"
)

// named is a place and the surface that is nearest to it.
type named struct {
	at   r3.Vec
	want string
}

func (n *named) check(t *testing.T, in *geom.Interior) {
	t.Helper()
	c := in.Contact(n.at)
	if got := in.Surface(c.Surface).Name; got != n.want || c.Gap < 0 {
		t.Errorf("r %.6g phi %.6g z %g: %g m from %q, want %q", math.Hypot(n.at.X, n.at.Y), math.Atan2(n.at.Y, n.at.X), n.at.Z, c.Gap, got, n.want)
	}
}

// TestNamesOfHull tries both sides of floor, ceiling and bulkheads.
func TestNamesOfHull(t *testing.T) {
	in := gallery().build()
	for _, n := range []named{
		{polar(17.9, 4, 0), "floor"},
		{polar(18.1, 4, 0), "floor underside"},
		{polar(12.9, 4, 0), "ceiling"},
		{polar(12.7, 4, 0), "ceiling outside"},
		{polar(15, 4, -6.9), "bulkhead -axial"},
		{polar(15, 4, -7.1), "bulkhead -axial"},
		{polar(15, 4, 6.9), "bulkhead +axial"},
		{polar(15, 4, 7.1), "bulkhead +axial"},
	} {
		n.check(t, in)
	}
}

// TestNamesOfDeck tries the sides of a deck that is neither whole nor as long
// as the room.
func TestNamesOfDeck(t *testing.T) {
	in := gallery().build()
	for _, n := range []named{
		{polar(15.3, 0, 4), "upper"},
		{polar(15.5, 0, 4), "upper underside"},
		{polar(15.425, -0.75, 4), "upper edge"},
		{polar(15.425, 0.95, 4), "upper edge"},
		{polar(15.425, 0, -6.1), "upper edge"},
		{polar(15.425, 0.4, -6.01), "upper edge"},
		{polar(15.3, 0.5, -3), "trap lid"},
		{polar(15.5, 0.5, -3), "trap lid underside"},
	} {
		n.check(t, in)
	}
}

// TestNamesOfRims goes round the openings of a deck and a floor, a little
// inside each of their four sides.
func TestNamesOfRims(t *testing.T) {
	in := gallery().build()
	for _, o := range []struct {
		name                string
		r, phi, z           float64 // the middle of the cut's depth
		spinward, axialSize float64
	}{
		{"hatch rim", 15.425, 0.2, 1, 0.9, 1.1},
		{"well coaming", 15.425, -0.3, -1, 1, 0.9},
		{"hold rim", 18.025, 2, 0, 1.2, 0.8},
		{"drain coaming", 18.025, 2.5, 0, 0.6, 0.8},
	} {
		side, end := math.Asin(o.spinward/2/o.r)-0.001, o.axialSize/2-0.01
		for _, u := range []float64{-1, -0.5, 0, 0.5, 1} {
			for _, sign := range []float64{-1, 1} {
				(&named{polar(o.r, o.phi+sign*side, o.z+0.9*u*end), o.name}).check(t, in)
				(&named{polar(o.r, o.phi+0.9*u*side, o.z+sign*end), o.name}).check(t, in)
			}
		}
	}
}

// TestNamesOfCoaming goes round the inner and outer sides and the top of a
// coaming 0.1 m high and 0.05 m thick.
func TestNamesOfCoaming(t *testing.T) {
	in := gallery().build()
	const r, phi, z, half = 15.35, -0.3, -1, 0.5 // at half its height
	for _, n := range []named{
		{polar(r, phi+(half+0.08)/r, z), "well coaming"},
		{polar(r, phi-(half+0.08)/r, z), "well coaming"},
		{polar(r, phi+(half-0.02)/r, z), "well coaming"},
		{polar(r, phi-(half-0.02)/r, z), "well coaming"},
		{polar(r, phi, z+0.45+0.08), "well coaming"},
		{polar(r, phi, z-0.45-0.08), "well coaming"},
		{polar(15.29, phi+0.525/15.3, z), "well coaming"},
		{polar(15.29, phi, z+0.475), "well coaming"},
		{polar(15.38, phi, z+0.45+0.15), "upper"},
	} {
		n.check(t, in)
	}
}

// TestNamesOfBlock tries the six sides of a turned block.
func TestNamesOfBlock(t *testing.T) {
	w := gallery()
	b := w.blocks[0]
	in := w.build()
	out := func(axis r3.Vec, half float64) r3.Vec { return toward(b.Centre, half+0.05, axis) }
	for _, n := range []named{
		{out(b.Along, b.Half[0]), "bench spinward side"},
		{out(b.Along, -b.Half[0]-0.1), "bench antispinward side"},
		{out(b.Across, b.Half[1]), "bench +axial side"},
		{out(b.Across, -b.Half[1]-0.1), "bench -axial side"},
		{out(b.Up, b.Half[2]), "bench top"},
	} {
		n.check(t, in)
	}
	alone := &geom.Builder{}
	alone.Add(b, blockNames(alone)...)
	(&named{out(b.Up, -b.Half[2]-0.1), "bench underside"}).check(t, alone.Build())
}

// TestNamesOfPassage tries the four walls of each shaft from within, and the
// rooms at its ends.
func TestNamesOfPassage(t *testing.T) {
	w := wheel(3)
	in := w.build()
	for _, p := range w.passages {
		mid, spin := polar(8, p.Phi, p.Z), polar(1, p.Phi+math.Pi/2, 0)
		for _, n := range []named{
			{toward(mid, 0.7, spin), p.Name + " spinward wall"},
			{toward(mid, -0.7, spin), p.Name + " antispinward wall"},
			{toward(mid, 0.7, r3.Vec{Z: 1}), p.Name + " +axial wall"},
			{toward(mid, -0.7, r3.Vec{Z: 1}), p.Name + " -axial wall"},
		} {
			n.check(t, in)
		}
	}
	for _, n := range []named{
		{polar(2.9, 0.4+math.Pi/3, 1), "hub floor"},
		{polar(1, 0, -4.9), "hub bulkhead -axial"},
		{polar(1, 0, 4.9), "hub bulkhead +axial"},
		{polar(17.9, 0.4, 0.5), "floor"},
		{polar(12.9, 0.4+math.Pi/3, 1), "ceiling"},
	} {
		n.check(t, in)
	}
}

// TestNamesOfHatchesAbreast tries that each of several openings that begin and
// end at the same axial places gives its own name to its four sides.
func TestNamesOfHatchesAbreast(t *testing.T) {
	for _, complete := range []bool{true, false} {
		d := part("floor", 18, 0.5, 6, -7, 7)
		d.Whole = complete
		names := []string{"first", "second", "third"}
		for i, name := range names {
			d.Openings = append(d.Openings, geom.Opening{Name: name, Phi: 1 + 0.3*float64(i), Z: 1, Spinward: 1, Axial: 1})
		}
		b := &geom.Builder{}
		b.AddDeck(d)
		in := b.Build()
		for i, name := range names {
			mid := 1 + 0.3*float64(i)
			for _, n := range []named{
				{polar(18.025, mid, 0.55), name + " rim"},
				{polar(18.025, mid+0.02, 1.45), name + " rim"},
				{polar(18.025, mid-0.025, 1), name + " rim"},
				{polar(18.025, mid+0.025, 1), name + " rim"},
				{polar(17.9, mid+0.15, 1.8), "floor"},
			} {
				n.check(t, in)
			}
		}
	}
}

// TestHoleSeveralTurnsRound tries that a place given as many turns round, to
// either side, is the place that it comes to.
func TestHoleSeveralTurnsRound(t *testing.T) {
	for _, turns := range []float64{-7, -3, -1, 0, 1, 2, 3, 9} {
		for _, complete := range []bool{true, false} {
			d := part("floor", 18, 0.5, 6, -7, 7)
			d.Whole = complete
			d.Openings = []geom.Opening{
				{Name: "near", Phi: 1, Z: 1, Spinward: 1, Axial: 1},
				{Name: "far", Phi: 3 + 2*math.Pi*turns, Z: 1, Spinward: 1, Axial: 1},
			}
			b := &geom.Builder{}
			b.AddDeck(d)
			in := b.Build()
			for _, phi := range []float64{1, 3} {
				// The nearest is the rim, half a metre away at least.
				if gap := in.Dist(polar(18, phi, 1)); math.Abs(gap-0.5) > slack(18*(1+math.Abs(turns))) {
					t.Errorf("%g turns, whole %t: %g m from the middle of the opening at %g to its rim", turns, complete, gap, phi)
				}
			}
		}
	}
}

// TestHolesOverlap tries an opening across the place where the division of a
// whole deck begins, wider than the one there and beside it.
func TestHolesOverlap(t *testing.T) {
	d := whole("floor", 18, -7, 7)
	d.Openings = []geom.Opening{
		{Name: "narrow", Phi: 1, Z: 1, Spinward: 1, Axial: 1},
		{Name: "broad", Phi: 1.05, Z: 1, Spinward: 3, Axial: 1},
	}
	b := &geom.Builder{}
	b.AddDeck(d)
	in := b.Build()
	half := geom.HalfAngle(3, 18)
	for i := -9; i <= 9; i++ {
		phi := 1.05 + half*float64(i)/10
		// At the deck's surface the nearest is the upper edge of a side.
		want := math.Min(0.5, 2*18*math.Sin(half*(1-math.Abs(float64(i))/10)/2))
		if gap := in.Dist(polar(18, phi, 1)); math.Abs(gap-want) > slack(18) {
			t.Errorf("%g rad from the middle: %g m to the rim, want %g", phi-1.05, gap, want)
		}
	}
}
