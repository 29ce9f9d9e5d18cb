package measure_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/integrate/quad"

	"offplumb/sim/measure"
	"offplumb/sim/model"
)

// figures gives the figures of the floor of a habitat.
func figures(t *testing.T, r, spin float64) measure.DeckFigure {
	t.Helper()
	return measure.DeckFigures(valid(t, ring(r, spin)))[0]
}

const rpm = math.Pi / 30 // rad/s

// TestGravityOfTextbooks is published checks C8 to C10: the spin that a
// textbook prints, half a unit of its last digit up and down, must give
// gravities on both sides of the one that it is to give.
func TestGravityOfTextbooks(t *testing.T) {
	for _, c := range []struct {
		source          string
		radius, gravity float64
		spin, half      float64
	}{
		{"Taylor, Classical Mechanics, problem 9.2 (seen)", 40, 10, 0.5, 1e-12},
		{"Serway, Physics for Scientists and Engineers: 120 m across (seen)", 60, 3.00, 2.14 * rpm, 0.005 * rpm},
		{"the same, 110 m across (seen)", 55, 3.00, 2.23 * rpm, 0.005 * rpm},
		{"OpenStax, University Physics: 200 m across (statement seen, answer from memory)", 100, 9.80, 2.99 * rpm, 0.005 * rpm},
		{"textbook problem, 21 m across, g (seen)", 10.5, 9.80, 0.966, 0.0005},
	} {
		low, high := figures(t, c.radius, c.spin-c.half).Gravity, figures(t, c.radius, c.spin+c.half).Gravity
		if !(low <= c.gravity && c.gravity <= high) {
			t.Errorf("%s: gravity from %.6g to %.6g m/s^2, want %g between", c.source, low, high, c.gravity)
		}
	}
}

// TestRadiiForOneG holds the radii of 1 g in the abstract of Globus & Hall,
// Space Settlement Population Rotation Tolerance, 2017 (seen; rounded to 1 m).
func TestRadiiForOneG(t *testing.T) {
	for _, c := range []struct{ rpm, radius float64 }{{1, 894}, {2, 224}, {4, 56}, {6, 25}, {10, 9}} {
		low, high := figures(t, c.radius-0.5, c.rpm*rpm).Gravity, figures(t, c.radius+0.5, c.rpm*rpm).Gravity
		if !(low <= model.StandardGravity && model.StandardGravity <= high) {
			t.Errorf("%g rpm, %g m: gravity from %.6g to %.6g m/s^2, want 1 g between", c.rpm, c.radius, low, high)
		}
	}
}

// TestFiguresOfDecks tries the other columns: a head 2 m up in Taylor's
// habitat feels 5 % less (problem 9.2; seen), the rim of OpenStax's moves at
// 31.3 m/s (statement seen, answer from memory), and the Coriolis figure is
// twice the spin rate whatever its sign.
func TestFiguresOfDecks(t *testing.T) {
	decks := measure.DeckFigures(valid(t, ring(40, 0.5, model.Deck{Name: "head", Radius: 38, Thickness: 0.01, Whole: true})))
	if len(decks) != 2 || decks[0].Deck != "floor" || decks[1].Deck != "head" {
		t.Fatalf("decks %+v, want the floor and the head", decks)
	}
	if share := decks[1].Gravity / decks[0].Gravity; math.Abs(share-0.95) > 4*epsilon {
		t.Errorf("the head feels %g of the floor's gravity, want 0.95", share)
	}
	spin := math.Sqrt(9.80 / 100)
	if got := figures(t, 100, spin).Speed; math.Abs(got-31.3) > 0.05 {
		t.Errorf("rim speed %.5g m/s, want 31.3", got)
	}
	back := figures(t, 100, -spin)
	if back.Speed >= 0 || back.Coriolis != 2*spin || back.Gravity != figures(t, 100, spin).Gravity {
		t.Errorf("at negative spin %+v", back)
	}
	if got, want := back.Drop, measure.DropOffset(100, 1, -spin); got != want || got <= 0 {
		t.Errorf("a drop from 1 m at negative spin goes %g m, want %g, spinward", got, want)
	}
}

// TestInvoluteTables holds the involute function to printed tables, at the
// angle whose cosine is 1 - x.
func TestInvoluteTables(t *testing.T) {
	for _, c := range []struct {
		deg, want, tol float64
		source         string
	}{
		{21.2990642859, 0.0181260949, 1e-10, "ISO 21771:2007, worked gear sheet (seen)"},
		{23.8707609654, 0.0259052382, 1e-10, "ISO 21771:2007, worked gear sheet (seen)"},
		{20, 0.014904, 5e-7, "general gear tables (seen)"},
		{14.5, 0.0055448, 5e-8, "Machinery's Handbook (from memory)"},
		{15, 0.0061498, 5e-8, "Machinery's Handbook (from memory)"},
		{25, 0.0299753, 5e-8, "Machinery's Handbook (from memory)"},
		{30, 0.0537515, 5e-8, "Machinery's Handbook (from memory)"},
		{45, 1 - math.Pi/4, 1e-15, "exact"},
	} {
		if got := measure.Involute(1 - math.Cos(c.deg*math.Pi/180)); math.Abs(got-c.want) > c.tol {
			t.Errorf("%s: inv(%g deg) = %.12g, want %.10g", c.source, c.deg, got, c.want)
		}
	}
	if got := measure.Involute(0); got != 0 {
		t.Errorf("inv(0) = %g", got)
	}
}

// TestInvoluteIsIntegral tries the involute function, to relative accuracy and
// on both sides of the crossover of its two forms, as the integral of the
// square of the tangent: with u the tangent, the integral of u^2/(1 + u^2).
// A loss of ten digits by cancellation would show.
func TestInvoluteIsIntegral(t *testing.T) {
	for _, tangent := range []float64{1e-8, 1e-5, 1e-3, 0.03, 0.2, 0.299, 0.2999999, 0.3000001, 0.301, 0.5, 1, 3} {
		// 1 - 1/sqrt(1 + u^2) without cancellation.
		root := math.Sqrt(1 + tangent*tangent)
		x := tangent * tangent / (root * (root + 1))
		want := quad.Fixed(func(u float64) float64 { return u * u / (1 + u*u) }, 0, tangent, 60, quad.Legendre{}, 0)
		// At the crossover the closed form has lost a factor of 33; x, of a few
		// roundings, counts one and a half times.
		if got := measure.Involute(x); math.Abs(got/want-1) > 200*epsilon {
			t.Errorf("tangent %g: %.17g, the integral is %.17g", tangent, got, want)
		}
	}
}

// TestDropOffsetWhereThereIsNone tries that there is no drop without spin nor
// from the axis or beyond.
func TestDropOffsetWhereThereIsNone(t *testing.T) {
	for _, c := range [][3]float64{{10, 1, 0}, {10, 10, 0.5}, {10, 11, 0.5}, {0.8, 1, -2}} {
		if got := measure.DropOffset(c[0], c[1], c[2]); !math.IsNaN(got) {
			t.Errorf("R = %g m, height %g m, spin %g: %g m, want none", c[0], c[1], c[2], got)
		}
	}
	if got := figures(t, 0.8, 2).Drop; !math.IsNaN(got) {
		t.Errorf("a floor of 0.8 m has a drop from 1 m: %g m", got)
	}
}
