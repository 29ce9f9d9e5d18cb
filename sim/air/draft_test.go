package air_test

import (
	"math"
	"math/rand/v2"
	"strings"
	"testing"

	"gonum.org/v1/gonum/diff/fd"

	"offplumb/sim/air"
)

// TestLayersAreInBalance holds the density by height to the balance of pressure
// and centrifugal force, dp/dr = rho omega^2 r with p = rho R T, by numeric
// differentiation, and to the formula by hand: at 1000 m and 1 g air of 293.15 K
// has exp(-9.80665*1000/(2*287.05287*293.15)) of its density at the axis.
func TestLayersAreInBalance(t *testing.T) {
	const temperature = 293.15
	for _, c := range []struct{ floor, spin float64 }{{18, 0.5}, {1000, math.Sqrt(9.80665 / 1000)}, {5e4, 0.014}} {
		l := air.LayersOf(c.floor, c.spin, temperature)
		density := func(r float64) float64 { return 1.2 * l.Share(r) }
		for share := 0.1; share < 1; share += 0.2 {
			r := share * c.floor
			pressure := func(r float64) float64 { return density(r) * air.GasConstant * temperature }
			// Central differences of step 1e-4 of the size: (1e-4)^2 and 1e-16 of
			// the pressure over the step, which is much of a small change.
			slope := fd.Derivative(pressure, r, &fd.Settings{Formula: fd.Central, Step: 1e-4 * c.floor})
			want := density(r) * c.spin * c.spin * r
			if math.Abs(slope-want) > 1e-6*want+1e-11*pressure(r)/c.floor {
				t.Errorf("%+v: at %g m dp/dr = %.9g, want %.9g Pa/m", c, r, slope, want)
			}
		}
	}
	l := air.LayersOf(1000, math.Sqrt(9.80665/1000), temperature)
	if got, want := l.Share(0), math.Exp(-9.80665*1000/(2*287.05287*293.15)); math.Abs(got/want-1) > 1e-12 || l.Share(1000) != 1 {
		t.Errorf("on the axis %g, want %g of that at the floor", got, want)
	}
}

// TestSoundAndFreePath holds the speed of sound and the mean free path to the
// US Standard Atmosphere 1976 at sea level (from memory): 340.29 m/s and 6.6332e-8
// m; the path there is by the cross section of a molecule, and differs by 4 % from
// that by viscosity, and so do slip corrections.
func TestSoundAndFreePath(t *testing.T) {
	if got := air.SoundSpeed(288.15); math.Abs(got-340.294) > 5e-3 {
		t.Errorf("speed of sound %g m/s", got)
	}
	a := air.FromPressure(101325, 288.15)
	if got := a.MeanFreePath(288.15); math.Abs(got/6.6332e-8-1) > 0.05 {
		t.Errorf("mean free path %g m", got)
	}
	// Hinds' table of slip corrections has 1.017 at 10 um and 1.17 at 1 um (from memory).
	for d, want := range map[float64]float64{10e-6: 0.017, 1e-6: 0.17} {
		if got := a.SlipShare(288.15, d); math.Abs(got/want-1) > 0.07 {
			t.Errorf("slip of %g m: %g, want %g", d, got, want)
		}
	}
}

// TestDraftGoesThroughItsTable tries random tables: a draft has the speeds given,
// overshoots none, keeps those at the ends beyond them, has the slope that it
// tells, and its bounds.
func TestDraftGoesThroughItsTable(t *testing.T) {
	const seed = 11
	rng := rand.New(rand.NewPCG(seed, 0))
	for range 200 {
		n := 2 + rng.IntN(8)
		heights, speeds := make([]float64, n), [3][]float64{make([]float64, n), nil, make([]float64, n)}
		for i := range heights {
			heights[i] = rng.Float64() + 0.01
			if i > 0 {
				heights[i] += heights[i-1]
			}
			speeds[0][i], speeds[2][i] = rng.NormFloat64(), rng.NormFloat64()
		}
		d, err := air.NewDraft(heights, speeds)
		if err != nil {
			t.Fatal(err)
		}
		for i, h := range heights {
			v, _ := d.At(h)
			if math.Abs(v[air.Spinward]-speeds[0][i]) > 1e-14 || v[air.Axial] != 0 || math.Abs(v[air.Up]-speeds[2][i]) > 1e-14 {
				t.Fatalf("seed %d: at %g m %v", seed, h, v)
			}
		}
		for range 50 {
			i := rng.IntN(n - 1)
			h := heights[i] + rng.Float64()*(heights[i+1]-heights[i])
			v, rate := d.At(h)
			low, high := math.Min(speeds[0][i], speeds[0][i+1]), math.Max(speeds[0][i], speeds[0][i+1])
			if v[0] < low-1e-14 || v[0] > high+1e-14 {
				t.Fatalf("seed %d: %g m/s between %g and %g", seed, v[0], low, high)
			}
			if math.Hypot(v[0], v[2]) > d.Fastest()+1e-14 || math.Hypot(rate[0], rate[2]) > d.Steepest()*(1+1e-12) {
				t.Fatalf("seed %d: %v, %v beyond %g, %g", seed, v, rate, d.Fastest(), d.Steepest())
			}
			slope := fd.Derivative(func(h float64) float64 { v, _ := d.At(h); return v[0] }, h, &fd.Settings{Formula: fd.Central, Step: 1e-7})
			if h-heights[i] > 1e-6 && heights[i+1]-h > 1e-6 && math.Abs(slope-rate[0]) > 1e-6*(1+d.Steepest()*100) {
				t.Fatalf("seed %d: slope %g, told %g", seed, slope, rate[0])
			}
		}
		for _, h := range []float64{heights[0] - 1, heights[n-1] + 7} {
			v, rate := d.At(h)
			end := speeds[0][0]
			if h > heights[0] {
				end = speeds[0][n-1]
			}
			if v[0] != end || rate != [3]float64{} {
				t.Fatalf("seed %d: beyond the ends %v, %v", seed, v, rate)
			}
		}
	}
}

// TestDraftRefuses tries tables that are none.
func TestDraftRefuses(t *testing.T) {
	one := []float64{1, 2}
	for want, heights := range map[string][]float64{
		"two heights":       {0},
		"have to grow":      {1, 1},
		"a speed for each":  {0, 1, 2},
		"heights have to g": {0, math.NaN()},
	} {
		if _, err := air.NewDraft(heights, [3][]float64{one, nil, nil}); err == nil || !strings.Contains(err.Error(), want) {
			t.Errorf("%v: %v, want %q", heights, err, want)
		}
	}
	if d := air.UniformDraft(1, 2, 2); d.Fastest() != 3 || d.Steepest() != 0 || len(d.Heights()) != 0 {
		t.Errorf("a uniform draft: %g m/s, %g 1/s", d.Fastest(), d.Steepest())
	}
}
