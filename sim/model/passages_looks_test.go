package model

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/geom"
)

// eachLook is obstacle with nothing left out.
func eachLook(in *geom.Interior, p *geom.Passage) geom.SurfaceID {
	w, h, at := p.Ends(), p.Width/2, geom.ShaftAt(p.Phi, p.Z)
	n := int(math.Min(mostLooks, math.Ceil(looksPerWidth*(w.To-w.From)/p.Width))) + 1
	for _, look := range looks {
		if p.Round && look[0]*look[1] != 0 {
			continue
		}
		aside := r3.Add(r3.Scale(look[0]*h, at.Spin), r3.Vec{Z: look[1] * h})
		for k := range n + 1 {
			near := in.Contact(r3.Add(p.Point(w.From+(w.To-w.From)*float64(k)/float64(n)), aside))
			if near.Gap < h && p.Holds(near.Point, TouchSlack) {
				return near.Surface
			}
		}
	}
	return -1
}

// TestObstacleSeesWhatEachLookSees puts blocks beside and into passages, and
// holds what is found against all looks.
func TestObstacleSeesWhatEachLookSees(t *testing.T) {
	const seed, n = 5, 400
	rng := rand.New(rand.NewPCG(seed, 0))
	blocked := 0
	for i := range n {
		p := geom.Passage{Name: "p", Phi: rng.Float64() * 6, Z: rng.Float64(), From: 3, To: 10 + 20*rng.Float64(), Width: 0.5 + 2*rng.Float64(),
			Round: i%2 == 0, Wall: 0.05}
		b := &geom.Builder{}
		b.AddPassage(p)
		own := wallRange{0, b.Len()}
		id := b.Surface("block", math.NaN(), math.NaN())
		for range 3 {
			at := p.Point(p.From + rng.Float64()*(p.To-p.From))
			at = r3.Add(at, r3.Vec{X: 2 * rng.NormFloat64(), Y: 2 * rng.NormFloat64(), Z: 2 * rng.NormFloat64()})
			b.Add(&geom.Block{Centre: at, Along: r3.Vec{X: 1}, Across: r3.Vec{Y: 1}, Up: r3.Vec{Z: 1},
				Half: [3]float64{0.4 * rng.Float64(), 0.4 * rng.Float64(), 0.4 * rng.Float64()}}, id, id, id, id, id, id)
		}
		in := b.Build()
		want, got := eachLook(in, &p), obstacle(in, &p, own)
		if want != got {
			t.Fatalf("seed %d, case %d: sees %d, want %d", seed, i, got, want)
		}
		if want >= 0 {
			blocked++
		}
	}
	if blocked < n/10 || blocked > n*9/10 {
		t.Errorf("%d of %d are blocked: the test tells little", blocked, n)
	}
}
