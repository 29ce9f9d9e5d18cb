package geom

import (
	"cmp"
	"math"
	"slices"

	"gonum.org/v1/gonum/spatial/r3"
)

// The faces of a block.
const (
	BlockTop          = iota // along +Up
	BlockUnderside           // along -Up
	BlockSpinward            // along +Along
	BlockAntispinward        // along -Along
	BlockPlusAxial           // along +Across
	BlockMinusAxial          // along -Across
	blockFaces
)

// Block is a box in any attitude.
type Block struct {
	Centre            r3.Vec     // m
	Along, Across, Up r3.Vec     // unit vectors at right angles
	Half              [3]float64 // m, half its sizes along them
}

// local gives the coordinates of p from the middle along the block's axes.
func (b *Block) local(p r3.Vec) [3]float64 {
	d := r3.Sub(p, b.Centre)
	return [3]float64{r3.Dot(d, b.Along), r3.Dot(d, b.Across), r3.Dot(d, b.Up)}
}

func (b *Block) point(q [3]float64) r3.Vec {
	v := r3.Add(r3.Scale(q[0], b.Along), r3.Scale(q[1], b.Across))
	return r3.Add(b.Centre, r3.Add(v, r3.Scale(q[2], b.Up)))
}

// Dist implements [Solid].
func (b *Block) Dist(p r3.Vec) float64 {
	q := b.local(p)
	sum, deep := 0.0, math.Inf(-1)
	for i := range q {
		d := math.Abs(q[i]) - b.Half[i]
		deep = math.Max(deep, d)
		if d > 0 {
			sum += d * d
		}
	}
	if deep <= 0 {
		return deep
	}
	return math.Sqrt(sum)
}

// blockFace is the face at the + end of each axis; that at the - end is the
// next.
var blockFace = [3]int{BlockSpinward, BlockPlusAxial, BlockTop}

// Nearest implements [Solid].
func (b *Block) Nearest(p r3.Vec) (point, normal r3.Vec, face int) {
	q := b.local(p)
	axis, out, deep := 0, 0, math.Inf(-1)
	for i := range q {
		d := math.Abs(q[i]) - b.Half[i]
		if d > deep {
			axis, deep = i, d
		}
		if d > 0 {
			out++
		}
	}
	face = blockFace[axis]
	sign := 1.0
	if q[axis] < 0 {
		face, sign = face+1, -1
	}
	flat := r3.Scale(sign, [3]r3.Vec{b.Along, b.Across, b.Up}[axis])
	near := q
	for i := range near {
		near[i] = clamp(q[i], -b.Half[i], b.Half[i])
	}
	if deep <= 0 {
		near[axis] = sign * b.Half[axis]
	}
	point, normal = nearestOf(p, b.point(near), flat, out <= 1)
	return point, normal, face
}

// Bounds implements [Solid].
func (b *Block) Bounds() Box {
	var out Box
	for i, c := range b.corners() {
		one := Box{Min: c, Max: c}
		if i == 0 {
			out = one
		}
		out = out.Union(one)
	}
	return out
}

func (b *Block) corners() [8]r3.Vec {
	var out [8]r3.Vec
	for i := range out {
		q := b.Half
		for axis := range q {
			if i>>axis&1 == 0 {
				q[axis] = -q[axis]
			}
		}
		out[i] = b.point(q)
	}
	return out
}

// Section implements [Solid]: the corners of the outline are where edges of
// the block cross the plane, taken in turn round their middle.
func (b *Block) Section(z float64) []Seg {
	var at [][2]float64
	var mid [2]float64
	c := b.corners()
	for i := range c {
		for axis := range 3 {
			j := i | 1<<axis
			if lo, hi := math.Min(c[i].Z, c[j].Z), math.Max(c[i].Z, c[j].Z); i == j || lo == hi || z < lo || z > hi {
				continue
			}
			v := r3.Add(c[i], r3.Scale((z-c[i].Z)/(c[j].Z-c[i].Z), r3.Sub(c[j], c[i])))
			at = append(at, [2]float64{v.X, v.Y})
			mid[0], mid[1] = mid[0]+v.X, mid[1]+v.Y
		}
	}
	if len(at) < 3 {
		return nil
	}
	n := float64(len(at))
	slices.SortStableFunc(at, func(a, b [2]float64) int {
		return cmp.Compare(math.Atan2(a[1]-mid[1]/n, a[0]-mid[0]/n), math.Atan2(b[1]-mid[1]/n, b[0]-mid[0]/n))
	})
	segs := make([]Seg, len(at))
	for i := range at {
		segs[i] = line(at[i], at[(i+1)%len(at)])
	}
	return segs
}
