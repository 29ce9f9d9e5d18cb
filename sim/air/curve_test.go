package air_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"offplumb/sim/air"
)

// The curve that the flight uses against the law that it stands for.
const (
	// curveTol: half a unit of the last place, 2^-53, for the leading
	// coefficient and as much for the last sum; 7e-17 for the part of the
	// Taylor series that the economised polynomial leaves, 0.012/33^8/2^7;
	// 4e-17 for roundings of the terms which are below 1/30 of the sum; 3e-17
	// for the reference.
	curveTol = 2*0x1p-53 + 7e-17 + 4e-17 + 3e-17
	// seamTol is twice that, and a step from a float to the next.
	seamTol = 2*curveTol + 0x1p-52
	// formulaTol is that of the formula in floats to Re = 1e8: its exponents,
	// to 21.4 in size, come from a rounded constant, a logarithm to a unit of
	// the last place and a rounded product; 4 roundings more beside them.
	formulaTol = (4*21.4 + 4) * 0x1p-53
)

// reaches is the curve's: it begins to leave 24 at 2^-149 and hands over to the
// formula at 2^47 = (1.19e7)^2.
const (
	lowest  = 0x1p-160
	highest = 0x1p47
)

// unit is a drag whose PerVelocity2 is CdRe by Re^2, and PerVelocity CdRe by
// Re.
func unit(law air.Law) air.Drag {
	return air.NewDrag(air.Air{Density: 1, Viscosity: 1}, law, 1, 2)
}

// edges calls f with every float of four bits of fraction in the curve's range.
func edges(f func(x float64)) {
	for octave := lowest; octave < highest; octave *= 2 {
		for k := range 16 {
			f(octave * (1 + float64(k)/16))
		}
	}
}

// TestCurveIsTheLaw holds the curve to the law at the ends and middles of its
// intervals, their neighbours, and a million random points.
func TestCurveIsTheLaw(t *testing.T) {
	const seed = 4
	random := rand.New(rand.NewPCG(seed, 0))
	drag, law := unit(nil), newExactLaw()
	worst, at := 0.0, 0.0
	try := func(x float64) {
		if e := math.Abs(law.error(x, drag.PerVelocity2(x))); !(e <= worst) {
			worst, at = e, x
		}
	}
	edges(func(x float64) {
		try(x)
		try(math.Nextafter(x, 0))
		try(math.Nextafter(x, math.Inf(1)))
		try(x + 0x1p-5*math.Exp2(math.Floor(math.Log2(x))))
	})
	from, all, busy := math.Log2(lowest), math.Log2(highest/lowest), math.Log2(highest/1e-8)
	for range 500_000 {
		try(math.Exp2(from + all*random.Float64()))
		try(1e-8 * math.Exp2(busy*random.Float64()))
	}
	if !(worst <= curveTol) {
		t.Errorf("seed %d: CdRe is off by %.3g at Re^2 = %g, want at most %.3g", seed, worst, at, curveTol)
	}
	t.Logf("worst error %.3g at Re^2 = %g", worst, at)
}

// TestCurveHasNoSeams tries that CdRe neither jumps nor falls where intervals
// meet.
func TestCurveHasNoSeams(t *testing.T) {
	drag := unit(nil)
	edges(func(x float64) {
		before, after := drag.PerVelocity2(math.Nextafter(x, 0)), drag.PerVelocity2(x)
		if math.Abs(after/before-1) > seamTol {
			t.Errorf("Re^2 = %g: CdRe goes from %.17g to %.17g", x, before, after)
		}
	})
	before, after := drag.PerVelocity2(math.Nextafter(highest, 0)), drag.PerVelocity2(highest)
	if math.Abs(after/before-1) > seamTol+formulaTol {
		t.Errorf("CdRe goes from %.17g to %.17g where the formula begins", before, after)
	}
}

// TestCurveRises tries that CdRe rises with the speed over steps of 2^-40,
// which raise it by more than rounding.
func TestCurveRises(t *testing.T) {
	drag := unit(nil)
	edges(func(x float64) {
		if x < 0x1p-17 { // rises by less than a unit of the last place of 24
			return
		}
		if low, high := drag.PerVelocity2(x*(1-0x1p-40)), drag.PerVelocity2(x); high <= low {
			t.Errorf("CdRe falls from %.17g to %.17g before Re^2 = %g", low, high, x)
		}
	})
}

// TestCurveAtItsEnds tries rest, speeds whose square is no normal float, and
// Reynolds numbers beyond the curve.
func TestCurveAtItsEnds(t *testing.T) {
	drag := unit(nil)
	for _, x := range []float64{0, math.Copysign(0, -1), 5e-324, 1e-310, 0x1p-1022, 1e-200, 0x1p-151} {
		if got := drag.PerVelocity2(x); got != 24 {
			t.Errorf("CdRe at Re^2 = %g is %.17g, want 24", x, got)
		}
	}
	for _, re := range []float64{math.Sqrt(highest), 1.2e7, 1e8} {
		want := air.CliftGauvin{}.CdRe(re)
		if got := drag.PerVelocity2(re * re); math.Abs(got/want-1) > formulaTol {
			t.Errorf("CdRe at Re = %g is %.17g, the formula has %.17g", re, got, want)
		}
	}
	for _, re := range []float64{1e20, 1e100, 1e154} {
		// Form drag alone counts: 0.42 Re, and 24*0.15 Re^-0.313 of it.
		if got := drag.PerVelocity2(re * re); math.Abs(got/(0.42*re)-1) > 9*math.Pow(re, -0.313)+1e-15 {
			t.Errorf("CdRe at Re = %g is %g", re, got)
		}
	}
	if got := drag.PerVelocity2(math.Inf(1)); !math.IsInf(got, 1) {
		t.Errorf("CdRe at no end of speed is %g", got)
	}
	if got := drag.PerVelocity2(math.NaN()); !math.IsNaN(got) {
		t.Errorf("CdRe without a speed is %g", got)
	}
}

// TestFormulaIsTheLaw holds the formula in floats to the same reference.
func TestFormulaIsTheLaw(t *testing.T) {
	const seed = 5
	random := rand.New(rand.NewPCG(seed, 0))
	law := newExactLaw()
	for range 20_000 {
		re := 1e-10 * math.Pow(1e17, random.Float64())
		if e := law.error(re*re, air.CliftGauvin{}.CdRe(re)); !(math.Abs(e) <= formulaTol) {
			t.Errorf("seed %d: the formula is off by %.3g at Re = %g", seed, e, re)
		}
	}
}

// linear is a law of the tests' own.
type linear struct{ slope []float64 }

// CdRe implements [air.Law].
func (l linear) CdRe(re float64) float64 { return 24 + l.slope[0]*re }

// TestPerVelocity2 tries that both forms of the drag agree, whatever the law
// and the air.
func TestPerVelocity2(t *testing.T) {
	room := air.FromPressure(air.DefaultPressure, air.DefaultTemperature)
	for _, c := range []struct {
		name string
		drag air.Drag
	}{
		{"a sphere", air.NewDrag(room, nil, 0.06, air.SphereArea(0.06))},
		{"a sphere by name", air.NewDrag(room, air.CliftGauvin{}, 0.06, air.SphereArea(0.06))},
		{"dust", air.NewDrag(room, nil, 1e-6, air.SphereArea(1e-6))},
		{"a sheet", air.NewDrag(room, air.Constant(1.2), 0.2, 0.04)},
		{"another law", air.NewDrag(room, linear{[]float64{3}}, 0.06, 0.003)},
		{"a vacuum", air.Drag{}},
		{"almost no viscosity", air.NewDrag(air.Air{Density: 1, Viscosity: 1e-200}, nil, 1, 1)},
	} {
		for _, v := range []float64{0, 1e-9, 1e-4, 0.03, 1, 12, 300} {
			got, want := c.drag.PerVelocity2(v*v), c.drag.PerVelocity(v)
			if !(math.Abs(got-want) <= formulaTol*want) {
				t.Errorf("%s at %g m/s: %.17g kg/s by the square of the speed, %.17g by the speed", c.name, v, got, want)
			}
		}
	}
}

// spread are speeds squared, m^2/s^2, of a thrown tool.
func spread() []float64 {
	random := rand.New(rand.NewPCG(6, 0))
	v := make([]float64, 256)
	for i := range v {
		v[i] = 100 * random.Float64()
	}
	return v
}

var sink float64

func benchmarkDrag(b *testing.B, f func(d *air.Drag, v2 float64) float64) {
	room := air.FromPressure(air.DefaultPressure, air.DefaultTemperature)
	d := air.NewDrag(room, nil, 0.06, air.SphereArea(0.06))
	v2 := spread()
	total, i := 0.0, 0
	for b.Loop() {
		total += f(&d, v2[i%len(v2)])
		i++
	}
	sink = total
}

// BenchmarkPerVelocity is the drag by the speed, with the square root for it.
func BenchmarkPerVelocity(b *testing.B) {
	benchmarkDrag(b, func(d *air.Drag, v2 float64) float64 { return d.PerVelocity(math.Sqrt(v2)) })
}

// BenchmarkPerVelocity2 is the drag by the square of the speed.
func BenchmarkPerVelocity2(b *testing.B) {
	benchmarkDrag(b, func(d *air.Drag, v2 float64) float64 { return d.PerVelocity2(v2) })
}
