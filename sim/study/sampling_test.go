package study

import (
	"fmt"
	"math"
	"slices"
	"testing"

	"gonum.org/v1/gonum/stat"
	"gonum.org/v1/gonum/stat/distuv"
	"offplumb/sim/model"
)

// cube is a scatter of uniform spreads of 0 to 1.
func cube(kind model.Sampling, samples, sides int) *model.Scatter {
	s := &model.Scatter{Name: "cube", Samples: samples, Sampling: kind}
	for i := range sides {
		s.Vary = append(s.Vary, model.Spread{Key: fmt.Sprint("k", i), Kind: model.Uniform, P: [3]float64{0, 1}})
	}
	return s
}

// TestRadicalInverse holds the points against the definition: the digits of
// the index, mirrored at the point. The first of base 2 and 3 are those of the
// literature (Halton 1960).
func TestRadicalInverse(t *testing.T) {
	for _, c := range []struct {
		base uint64
		want []float64 // of the indices from 0
	}{
		{2, []float64{0, 1. / 2, 1. / 4, 3. / 4, 1. / 8, 5. / 8, 3. / 8, 7. / 8, 1. / 16}},
		{3, []float64{0, 1. / 3, 2. / 3, 1. / 9, 4. / 9, 7. / 9, 2. / 9, 5. / 9, 8. / 9, 1. / 27}},
	} {
		for i, want := range c.want {
			if got := radicalInverse(c.base, uint64(i)); math.Abs(got-want) > 1e-15 {
				t.Errorf("base %d, index %d: %v, want %v", c.base, i, got, want)
			}
		}
	}
	for _, base := range []uint64{2, 3, 5, 7, 61} {
		for _, i := range []uint64{1, 12, 345, 67891, 99999999} {
			if got, want := radicalInverse(base, i), mirrored(base, i); math.Abs(got-want) > 1e-15 {
				t.Errorf("base %d, index %d: %v, want %v", base, i, got, want)
			}
		}
	}
}

// mirrored reads the digits of i from the last to the first, as a whole number
// over a power of the base: whole numbers all the way.
func mirrored(base, i uint64) float64 {
	num, den := uint64(0), uint64(1)
	for ; i > 0; i /= base {
		num, den = num*base+i%base, den*base
	}
	return float64(num) / float64(den)
}

// TestHaltonSides: side k of sample i is the radical inverse of i in prime k,
// the first sample being of index 1, whatever the seed.
func TestHaltonSides(t *testing.T) {
	for _, seed := range []uint64{1, 2} {
		s, _ := newSampler(cube(model.Halton, 100, 4), seed)
		for k, base := range []uint64{2, 3, 5, 7} {
			for i := range 100 {
				if got := s.at(i, k); got != radicalInverse(base, uint64(i)+1) {
					t.Fatalf("seed %d, side %d, sample %d: %v", seed, k, i, got)
				}
			}
		}
	}
}

// TestLatinHypercube: each of n equal parts of each side holds one sample, and
// sides are not sorted alike.
func TestLatinHypercube(t *testing.T) {
	const seed = 5
	for _, n := range []int{1, 2, 3, 16, 17, 1000, 4097} {
		s, _ := newSampler(cube(model.LatinHypercube, n, 2), seed)
		var sides [2][]float64
		for k := range sides {
			taken := make([]bool, n)
			for i := range n {
				u := s.at(i, k)
				if part := int(u * float64(n)); taken[part] {
					t.Fatalf("seed %d, %d samples: two in part %d of side %d", seed, n, part, k)
				} else {
					taken[part] = true
				}
				sides[k] = append(sides[k], u)
			}
		}
		// The correlation of n independent pairs has the deviation 1/sqrt(n-1);
		// a sampler off by six of them is broken.
		if r := stat.Correlation(sides[0], sides[1], nil); n > 10 && math.Abs(r) > 6/math.Sqrt(float64(n-1)) {
			t.Errorf("seed %d, %d samples: the sides correlate by %g", seed, n, r)
		}
	}
}

// TestShuffledIsPermutation tries every count up to beyond two powers of 4, and
// a large one in part.
func TestShuffledIsPermutation(t *testing.T) {
	for n := uint64(1); n < 300; n++ {
		seen := make([]bool, n)
		for i := range n {
			at := shuffled(i, n, 42)
			if at >= n || seen[at] {
				t.Fatalf("%d of %d goes to %d, taken or too high", i, n, at)
			}
			seen[at] = true
		}
	}
	const many = 100_000_007
	taken := map[uint64]bool{}
	for i := range uint64(10_000) {
		at := shuffled(i, many, 42)
		if at >= many || taken[at] {
			t.Fatalf("%d of %d goes to %d, taken or too high", i, many, at)
		}
		taken[at] = true
	}
}

// TestShuffledIsEven: over many keys every place is as likely, by chi-square.
func TestShuffledIsEven(t *testing.T) {
	const n, keys = 6, 6000
	var count [n][n]int
	for key := range uint64(keys) {
		for i := range uint64(n) {
			count[i][shuffled(i, n, splitmix(key))]++
		}
	}
	worst := 0.0
	for i := range count {
		sum := 0.0
		for _, c := range count[i] {
			sum += math.Pow(float64(c)-keys/n, 2) / (keys / n)
		}
		worst = math.Max(worst, sum)
	}
	// One of six tests exceeds this in one case of a million.
	if most := (distuv.ChiSquared{K: n - 1}).Quantile(1 - 1e-6/n); worst > most {
		t.Errorf("chi-square %g, above %g", worst, most)
	}
}

// TestUniformIsUniform: draws of one side spread evenly over 100 parts, those
// of the next sample, side, seed and study are others.
func TestUniformIsUniform(t *testing.T) {
	const seed, n, parts = 9, 100_000, 100
	s, _ := newSampler(cube(model.Random, n, 2), seed)
	var count [parts]int
	var x, y, z []float64
	for i := range n {
		u := s.at(i, 0)
		if u <= 0 || u >= 1 {
			t.Fatalf("sample %d is %v", i, u)
		}
		count[int(u*parts)]++
		x, y, z = append(x, u), append(y, s.at(i, 1)), append(z, s.at((i+1)%n, 0))
	}
	sum := 0.0
	for _, c := range count {
		sum += math.Pow(float64(c)-n/parts, 2) / (n / parts)
	}
	if most := (distuv.ChiSquared{K: parts - 1}).Quantile(1 - 1e-6); sum > most {
		t.Errorf("seed %d: chi-square %g, above %g", seed, sum, most)
	}
	for name, other := range map[string][]float64{"side": y, "sample": z} {
		if r := stat.Correlation(x, other, nil); math.Abs(r) > 5/math.Sqrt(n) {
			t.Errorf("seed %d: correlates with the next %s by %g", seed, name, r)
		}
	}
	if other, _ := newSampler(cube(model.Random, n, 2), seed+1); other.at(0, 0) == s.at(0, 0) {
		t.Error("another seed gives the same")
	}
	c := cube(model.Random, n, 2)
	c.Name = "another"
	if other, _ := newSampler(c, seed); other.at(0, 0) == s.at(0, 0) {
		t.Error("another study gives the same")
	}
}

// TestSidesGoByName: a further key leaves the draws of the others as they are,
// and keys of one file share a side.
func TestSidesGoByName(t *testing.T) {
	c := cube(model.Random, 10, 2)
	two, _ := newSampler(c, 1)
	c.Vary = append([]model.Spread{{Key: "first"}}, c.Vary...)
	three, side := newSampler(c, 1)
	if two.at(3, 1) != three.at(3, side[2]) {
		t.Error("a further key changes the draws of another")
	}
	c.Vary = []model.Spread{{Key: "a", Kind: model.Empirical, Source: "f.csv"}, {Key: "b"}, {Key: "c", Kind: model.Empirical, Source: "f.csv"}, {Key: "d", Kind: model.Empirical, Source: "g.csv"}}
	if _, side := newSampler(c, 1); !slices.Equal(side, []int{0, 1, 0, 2}) {
		t.Errorf("sides %v", side)
	}
}

// TestQuantile inverts the distribution functions that it is the inverse of.
func TestQuantile(t *testing.T) {
	for _, c := range []struct {
		s   model.Spread
		cdf func(float64) float64
	}{
		{model.Spread{Kind: model.Normal, P: [3]float64{2, 0.5}}, func(x float64) float64 { return math.Erfc((2-x)/(0.5*math.Sqrt2)) / 2 }},
		{model.Spread{Kind: model.Uniform, P: [3]float64{-1, 3}}, func(x float64) float64 { return (x + 1) / 4 }},
		{model.Spread{Kind: model.Triangular, P: [3]float64{0.2, 0.35, 0.5}}, triangle(0.2, 0.35, 0.5)},
		{model.Spread{Kind: model.Triangular, P: [3]float64{0, 0, 1}}, triangle(0, 0, 1)},
		{model.Spread{Kind: model.Triangular, P: [3]float64{0, 1, 1}}, triangle(0, 1, 1)},
	} {
		for _, u := range []float64{0x1p-54, 1e-9, 0.01, 0.3, 0.5, 0.77, 0.999, 1 - 1e-9} {
			x := quantile(&c.s, u)
			// Both ways round to some units of the last place, of u or of 1.
			if got := c.cdf(x); math.Abs(got-u) > 1e-14 {
				t.Errorf("%v %v: a share %v lies below quantile %v", c.s.Kind, c.s.P, got, u)
			}
		}
	}
	data := model.Spread{Kind: model.Empirical, Data: []float64{4, 7, 5}}
	for u, want := range map[float64]float64{0.1: 4, 0.34: 7, 0.66: 7, 0.67: 5, 1 - 0x1p-53: 5} {
		if got := quantile(&data, u); got != want {
			t.Errorf("value %v of a file at %v, want %v", got, u, want)
		}
	}
}

// triangle is the distribution function of a triangular distribution, from its
// area.
func triangle(a, mode, b float64) func(float64) float64 {
	return func(x float64) float64 {
		if x < mode {
			return (x - a) * (x - a) / ((b - a) * (mode - a))
		}
		return 1 - (b-x)*(b-x)/((b-a)*(b-mode))
	}
}
