package study

import (
	"hash/fnv"
	"math"
	"math/bits"
	"math/rand/v2"

	"gonum.org/v1/gonum/stat/distuv"
	"offplumb/sim/model"
)

// splitmix is the output function of SplitMix64 (Steele, Lea & Flood, Fast
// splittable pseudorandom number generators, OOPSLA 2014; from memory): a
// bijection of words that leaves no likeness between neighbours.
func splitmix(x uint64) uint64 {
	x += 0x9e3779b97f4a7c15
	x = (x ^ x>>30) * 0xbf58476d1ce4e5b9
	x = (x ^ x>>27) * 0x94d049bb133111eb
	return x ^ x>>31
}

// mixed brings words to one, which depends on all of them and on their order.
func mixed(words ...uint64) uint64 {
	h := uint64(0)
	for _, w := range words {
		h = splitmix(h ^ w)
	}
	return h
}

// wordOf is a word for a name.
func wordOf(name string) uint64 {
	h := fnv.New64a()
	h.Write([]byte(name))
	return h.Sum64()
}

// sampler gives the places of samples in the unit cube. Place i depends on i,
// the seed and the study alone, not on which samples were asked for before: it
// is the same in any part and for any number of workers.
type sampler struct {
	kind  model.Sampling
	count int      // of samples
	base  uint64   // of the seed and the study
	sides []uint64 // a word for each side of the cube
}

// newSampler makes the sampler of a scatter. spread k varies along side
// side[k] of the cube: those from one file share theirs.
func newSampler(s *model.Scatter, seed uint64) (out *sampler, side []int) {
	out = &sampler{kind: s.Sampling, count: s.Samples, base: mixed(seed, wordOf(s.Name))}
	known := map[string]int{}
	for i := range s.Vary {
		name := s.Vary[i].Key
		if s.Vary[i].Kind == model.Empirical {
			name = "file " + s.Vary[i].Source
		}
		at, ok := known[name]
		if !ok {
			at = len(out.sides)
			known[name] = at
			out.sides = append(out.sides, wordOf(name))
		}
		side = append(side, at)
	}
	return out, side
}

// at gives the coordinate of sample i, from 0, along a side: above 0 and below
// 1.
func (s *sampler) at(i, side int) float64 {
	switch s.kind {
	case model.LatinHypercube:
		n := uint64(s.count)
		stratum := shuffled(uint64(i), n, mixed(s.base, s.sides[side]))
		return inside01((float64(stratum) + s.uniform(i, side)) / float64(n))
	case model.Halton:
		// The point of index 0 is a corner of the cube, where a normal
		// distribution has no value.
		return inside01(radicalInverse(prime(side), uint64(i)+1))
	}
	return s.uniform(i, side)
}

// uniform is a random number of a sample and a side, above 0 and below 1.
func (s *sampler) uniform(i, side int) float64 {
	word := mixed(s.base, uint64(i), s.sides[side])
	r := rand.NewPCG(word, splitmix(word))
	return (float64(r.Uint64()>>11) + 0.5) / (1 << 53)
}

// inside01 keeps roundings off the ends, where a distribution may have no
// value.
func inside01(u float64) float64 {
	return math.Min(math.Max(u, 0x1p-54), 1-0x1p-53)
}

// radicalInverse is the number between 0 and 1 whose digits after the point, in
// a base, are those of i in reverse (Halton, Numerische Mathematik 2, 1960,
// 84-90; from memory).
func radicalInverse(base, i uint64) float64 {
	x, digit := 0.0, 1.0
	for ; i > 0; i /= base {
		digit /= float64(base)
		x += digit * float64(i%base)
	}
	return x
}

// prime gives the prime of a number, from 0: 2, 3, 5 and so on. Few are asked
// for.
func prime(n int) uint64 {
	for p := uint64(2); ; p++ {
		if isPrime(p) {
			if n == 0 {
				return p
			}
			n--
		}
	}
}

// HaltonLeast is how many Halton points the keys of a scatter want: fewer than
// the product of its two greatest primes leave the plane of those two in
// stripes.
func HaltonLeast(s *model.Scatter) int {
	_, side := newSampler(s, 0)
	n := 0
	for _, k := range side {
		n = max(n, k+1)
	}
	if n < 2 {
		return 1
	}
	return int(prime(n-1) * prime(n-2))
}

func isPrime(p uint64) bool {
	for d := uint64(2); d*d <= p; d++ {
		if p%d == 0 {
			return false
		}
	}
	return true
}

// rounds of shuffled's network; four make it hard to tell from a random
// permutation (Luby & Rackoff, SIAM J. Comput. 17, 1988), the others are for
// the few bits of small counts.
const rounds = 8

// shuffled gives the place of i in a permutation of 0 to n-1 that depends on a
// key: a Feistel network over the next even number of bits, walked until it
// falls below n (Black & Rogaway, Ciphers with arbitrary finite domains, 2002;
// from memory). No list of places is kept, however many samples there are.
func shuffled(i, n, key uint64) uint64 {
	half := (bits.Len64(n-1) + 1) / 2
	mask := uint64(1)<<half - 1
	for {
		left, right := i>>half, i&mask
		for r := range uint64(rounds) {
			left, right = right, left^mixed(key, r, right)&mask
		}
		if i = left<<half | right; i < n {
			return i
		}
	}
}

// quantile is the value of a spread below which a share u of it lies.
func quantile(s *model.Spread, u float64) float64 {
	switch s.Kind {
	case model.Normal:
		return distuv.Normal{Mu: s.P[0], Sigma: s.P[1]}.Quantile(u)
	case model.Uniform:
		return distuv.Uniform{Min: s.P[0], Max: s.P[1]}.Quantile(u)
	case model.Triangular:
		return distuv.NewTriangle(s.P[0], s.P[2], s.P[1], nil).Quantile(u)
	}
	return s.Data[int(u*float64(len(s.Data)))]
}
