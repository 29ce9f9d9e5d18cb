package integrator_test

import (
	"fmt"
	"math"
	"testing"

	"offplumb/integrator"
)

// tree is a rooted tree. An elementary differential of f belongs to each, and
// a method is of order p if for every tree of order up to p its weight is
// 1/density (Butcher 1963; Hairer, Norsett & Wanner, Solving Ordinary
// Differential Equations I, section II.2; from memory).
type tree struct {
	name     string
	order    int     // number of nodes
	density  float64 // the product of the orders of all its subtrees
	children []*tree
}

// treesUpTo returns all rooted trees of order 1 to most, by order.
func treesUpTo(most int) []*tree {
	var all []*tree
	for order := 1; order <= most; order++ {
		known := len(all)
		var grow func(children []*tree, first, left int)
		grow = func(children []*tree, first, left int) {
			if left == 0 {
				all = append(all, newTree(children))
				return
			}
			for i := first; i < known; i++ {
				if all[i].order <= left {
					more := append(children[:len(children):len(children)], all[i])
					grow(more, i, left-all[i].order)
				}
			}
		}
		grow(nil, 0, order-1)
	}
	return all
}

func newTree(children []*tree) *tree {
	n := &tree{name: "[", order: 1, density: 1, children: children}
	for _, c := range children {
		n.name += c.name
		n.order += c.order
		n.density *= c.density
	}
	n.name += "]"
	n.density *= float64(n.order)
	return n
}

// stages returns the weight of the tree at each stage, without that of the
// last sum, and the same with every coefficient replaced by its magnitude:
// what rounding is to be judged by.
func (n *tree) stages(tab *integrator.Tableau) (weight, size []float64) {
	s := len(tab.B)
	weight, size = make([]float64, s), make([]float64, s)
	for i := range s {
		weight[i], size[i] = 1, 1
	}
	for _, c := range n.children {
		w, m := c.stages(tab)
		for i := range s {
			sum, most := 0.0, 0.0
			for j, a := range tab.A[i] {
				sum += a * w[j]
				most += math.Abs(a) * m[j]
			}
			weight[i] *= sum
			size[i] *= most
		}
	}
	return weight, size
}

// residual returns by how much b misses the condition of the tree for a step
// of length theta, and what rounding can account for: each of at most order
// levels of sums rounds its coefficients and its terms, some ten times.
func (n *tree) residual(tab *integrator.Tableau, b []float64, theta float64) (miss, rounding float64) {
	weight, size := n.stages(tab)
	sum, most := 0.0, 0.0
	for i := range b {
		sum += b[i] * weight[i]
		most += math.Abs(b[i]) * size[i]
	}
	miss = math.Abs(sum - math.Pow(theta, float64(n.order))/n.density)
	return miss, 10 * float64(n.order) * epsilon * most
}

// TestTreeCounts tries the generator: there are 1, 1, 2, 4, 9, 20 rooted trees
// of orders 1 to 6 (Cayley), and their densities are known for the tallest and
// the bushiest.
func TestTreeCounts(t *testing.T) {
	count := map[int]int{}
	densest := map[int]float64{}
	for _, n := range treesUpTo(6) {
		count[n.order]++
		densest[n.order] = max(densest[n.order], n.density)
	}
	factorial := 1.0
	for i, want := range []int{1, 1, 2, 4, 9, 20} {
		order := i + 1
		factorial *= float64(order)
		if count[order] != want {
			t.Errorf("%d trees of order %d, want %d", count[order], order, want)
		}
		if densest[order] != factorial {
			t.Errorf("density of the tallest tree of order %d is %g, want %g", order, densest[order], factorial)
		}
	}
}

func TestTableauRowSums(t *testing.T) {
	tab := integrator.DormandPrince54()
	for i, row := range tab.A {
		sum, size := 0.0, 0.0
		for _, a := range row {
			sum += a
			size += math.Abs(a)
		}
		if miss := math.Abs(sum - tab.C[i]); miss > 10*epsilon*size {
			t.Errorf("row %d sums to %.17g, its node is %.17g", i, sum, tab.C[i])
		}
	}
}

// embedded returns the weights of the solution that the error is taken from.
func embedded(tab *integrator.Tableau) []float64 {
	b := make([]float64, len(tab.B))
	for i := range b {
		b[i] = tab.B[i] - tab.E[i]
	}
	return b
}

// dense returns the weights of the solution at theta.
func dense(tab *integrator.Tableau, theta float64) []float64 {
	b := make([]float64, len(tab.P))
	for i, row := range tab.P {
		for j := len(row) - 1; j >= 0; j-- {
			b[i] = theta * (b[i] + row[j])
		}
	}
	return b
}

func TestTableauOrderConditions(t *testing.T) {
	tab := integrator.DormandPrince54()
	type formula struct {
		name  string
		b     []float64
		theta float64
		order int
	}
	formulas := []formula{
		{"B", tab.B, 1, 5},
		{"embedded", embedded(tab), 1, 4},
	}
	for _, theta := range []float64{0.01, 0.1, 0.25, 1. / 3, 0.5, 0.7, 0.9, 1} {
		formulas = append(formulas, formula{fmt.Sprintf("dense at %.3g", theta), dense(tab, theta), theta, 4})
	}
	for _, f := range formulas {
		for _, n := range treesUpTo(f.order) {
			miss, rounding := n.residual(tab, f.b, f.theta)
			if miss > rounding {
				t.Errorf("%s: tree %s of order %d missed by %g, of which rounding is %g",
					f.name, n.name, n.order, miss, rounding)
			}
		}
	}
}

// TestTableauOrdersAreExact shows that no formula is of a higher order than
// it says, without which the difference of the two would estimate nothing.
func TestTableauOrdersAreExact(t *testing.T) {
	tab := integrator.DormandPrince54()
	for _, f := range []struct {
		name  string
		b     []float64
		theta float64
		order int
	}{
		{"B", tab.B, 1, tab.Order},
		{"embedded", embedded(tab), 1, tab.ErrOrder},
		{"dense", dense(tab, 0.4), 0.4, 4},
	} {
		missed := 0
		for _, n := range treesUpTo(f.order + 1) {
			if miss, rounding := n.residual(tab, f.b, f.theta); miss > 1e6*rounding {
				missed++
			}
		}
		if missed == 0 {
			t.Errorf("%s: every tree of order %d is met", f.name, f.order+1)
		}
	}
}

// TestTableauDenseEnds shows that the interpolant is the step's end at theta
// = 1, and that its slopes are the first and the last stage: that it is once
// continuously differentiable from step to step.
func TestTableauDenseEnds(t *testing.T) {
	tab := integrator.DormandPrince54()
	last := len(tab.B) - 1
	end := dense(tab, 1)
	for i, row := range tab.P {
		slope, size, wantStart, wantEnd := 0.0, 0.0, 0.0, 0.0
		for j, p := range row {
			slope += float64(j+1) * p
			size += float64(j+1) * math.Abs(p)
		}
		if i == 0 {
			wantStart = 1
		}
		if i == last {
			wantEnd = 1
		}
		if row[0] != wantStart {
			t.Errorf("stage %d: slope %g at the start, want %g", i, row[0], wantStart)
		}
		if miss := math.Abs(slope - wantEnd); miss > 10*epsilon*size {
			t.Errorf("stage %d: slope %.17g at the end, want %g", i, slope, wantEnd)
		}
		if miss := math.Abs(end[i] - tab.B[i]); miss > 10*epsilon*size {
			t.Errorf("stage %d: dense weight %.17g at the end, B is %.17g", i, end[i], tab.B[i])
		}
	}
}

// TestTableauErrorSumsToZero: a constant derivative has no error.
func TestTableauErrorSumsToZero(t *testing.T) {
	tab := integrator.DormandPrince54()
	sum, size := 0.0, 0.0
	for _, e := range tab.E {
		sum += e
		size += math.Abs(e)
	}
	if math.Abs(sum) > 10*epsilon*size {
		t.Errorf("E sums to %g", sum)
	}
}

// TestTableauIsFresh: a caller who changes one tableau spoils no other.
func TestTableauIsFresh(t *testing.T) {
	a := integrator.DormandPrince54()
	a.A[1][0], a.B[0], a.P[0][0] = 7, 7, 7
	b := integrator.DormandPrince54()
	if b.A[1][0] != 1./5 || b.B[0] != 35./384 || b.P[0][0] != 1 {
		t.Error("two tableaus share their coefficients")
	}
}
