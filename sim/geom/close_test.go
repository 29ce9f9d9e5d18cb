package geom_test

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"

	"offplumb/sim/geom"
)

// TestNormalCloseToFaces tries that a normal holds right down to the surface,
// where points touch: a difference of places would be all rounding there.
func TestNormalCloseToFaces(t *testing.T) {
	sector := &geom.Sector{R0: 17, R1: 18, Phi0: 0.3, Phi1: 1.7, Z0: -2, Z1: 3}
	block := &geom.Block{Centre: r3.Vec{X: 15, Y: 4, Z: 1}, Half: [3]float64{0.3, 0.4, 0.5}}
	block.Along, block.Across, block.Up = attitude(random(t, 7))
	cases := []struct {
		name  string
		solid geom.Solid
		on, n r3.Vec
	}{
		{"inner", sector, polar(17, 0.9, 1), polar(-1, 0.9, 0)},
		{"outer", sector, polar(18, 0.9, 1), polar(1, 0.9, 0)},
		{"antispinward", sector, polar(17.6, 0.3, 1), r3.Cross(polar(1, 0.3, 0), r3.Vec{Z: 1})},
		{"spinward", sector, polar(17.6, 1.7, 1), r3.Cross(r3.Vec{Z: 1}, polar(1, 1.7, 0))},
		{"-axial", sector, polar(17.6, 0.9, -2), r3.Vec{Z: -1}},
		{"+axial", sector, polar(17.6, 0.9, 3), r3.Vec{Z: 1}},
		{"block spinward", block, toward(block.Centre, 0.3, block.Along), block.Along},
		{"block -axial", block, toward(block.Centre, -0.4, block.Across), r3.Scale(-1, block.Across)},
		{"block top", block, toward(block.Centre, 0.5, block.Up), block.Up},
	}
	for _, c := range cases {
		for _, gap := range []float64{-1e-9, 0, 1e-14, 1e-12, 1e-9, 1e-3} {
			_, n, _ := c.solid.Nearest(toward(c.on, gap, c.n))
			if off := r3.Norm(r3.Sub(n, c.n)); off > roundings*epsilon {
				t.Errorf("%s, gap %g m: normal off by %.3g", c.name, gap, off)
			}
		}
	}
}

// TestFaceAtEdges tries places beyond the edges of a solid, each in the planes
// of both its faces: the face is that above which the place lies farther.
func TestFaceAtEdges(t *testing.T) {
	sector := &geom.Sector{R0: 17, R1: 18, Phi0: 0.3, Phi1: 1.7, Z0: -2, Z1: 3}
	// Outward, spinward from the end faces, and axial, at each end.
	at := func(out, spin, axial float64) r3.Vec {
		phi := map[bool]float64{true: 1.7, false: 0.3}[spin > 0]
		r := map[bool]float64{true: 18, false: 17}[out > 0]
		z := map[bool]float64{true: 3, false: -2}[axial > 0]
		if spin == 0 {
			phi = 1
		}
		return toward(polar(r+out, phi, z+axial), spin, polar(1, phi+math.Pi/2, 0))
	}
	for _, c := range []struct {
		p    r3.Vec
		want int
	}{
		{at(-0.2, 0, 0.1), geom.SectorInner}, {at(-0.1, 0, 0.2), geom.SectorPlusAxial}, {at(-0.1, 0, -0.2), geom.SectorMinusAxial},
		{at(0.2, 0, -0.1), geom.SectorOuter}, {at(0.1, 0, 0.2), geom.SectorPlusAxial}, {at(0.1, 0, -0.2), geom.SectorMinusAxial},
		{at(-0.2, 0.1, 0.1), geom.SectorInner}, {at(0.2, 0.1, -0.1), geom.SectorOuter}, {at(0.2, -0.1, 0.1), geom.SectorOuter}, {at(-0.2, -0.1, 0.1), geom.SectorInner},
		{at(0.1, 0.2, 0.1), geom.SectorSpinward}, {at(-0.1, 0.2, -0.1), geom.SectorSpinward},
		{at(0.1, -0.2, 0.1), geom.SectorAntispinward}, {at(-0.1, -0.2, -0.1), geom.SectorAntispinward},
		{at(0.1, -0.1, 0.2), geom.SectorPlusAxial}, {at(-0.1, 0.1, -0.2), geom.SectorMinusAxial},
	} {
		if _, _, got := sector.Nearest(c.p); got != c.want {
			t.Errorf("%v lies above face %d, want %d", c.p, got, c.want)
		}
	}
	block := &geom.Block{Along: r3.Vec{X: 1}, Across: r3.Vec{Y: 1}, Up: r3.Vec{Z: 1}, Half: [3]float64{1, 2, 3}}
	for _, c := range []struct {
		p    r3.Vec
		want int
	}{
		{r3.Vec{X: 1.2, Y: 2.1, Z: 3.1}, geom.BlockSpinward}, {r3.Vec{X: -1.2, Y: 2.1, Z: -3.1}, geom.BlockAntispinward},
		{r3.Vec{X: 1.1, Y: 2.2, Z: 3.1}, geom.BlockPlusAxial}, {r3.Vec{X: 1.1, Y: -2.2, Z: -3.1}, geom.BlockMinusAxial},
		{r3.Vec{X: 1.1, Y: 2.1, Z: 3.2}, geom.BlockTop}, {r3.Vec{X: 1.1, Y: 2.1, Z: -3.2}, geom.BlockUnderside},
	} {
		if _, _, got := block.Nearest(c.p); got != c.want {
			t.Errorf("%v lies above face %d of the block, want %d", c.p, got, c.want)
		}
	}
}
