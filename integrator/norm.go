package integrator

import "math"

// norm measures errors against tolerances, as [Tol] states.
type norm struct {
	rel float64
	abs []float64 // one for each group
	end []int     // index past the last component of each group; nil: one component a group
}

// newNorm expects tolerances that passed their check.
func newNorm(tol Tol, dim int) norm {
	m := norm{rel: tol.Rel}
	sum := 0
	for _, n := range tol.Groups {
		sum += n
		m.end = append(m.end, sum)
	}
	groups, _ := tol.count(dim)
	m.abs = make([]float64, groups)
	for g := range m.abs {
		m.abs[g] = tol.Abs[min(g, len(tol.Abs)-1)]
	}
	return m
}

// squared returns the square of the norm of e, scaled by the larger of the
// states a and b. It is NaN if anything is not finite, a scale included: an
// infinite state would otherwise make every error look small.
func (m *norm) squared(e, a, b []float64) float64 {
	var sum, scales float64
	if m.end == nil {
		sum, scales = m.components(e, a, b)
	} else {
		sum, scales = m.groups(e, a, b)
	}
	if !(scales <= math.MaxFloat64) {
		return math.NaN()
	}
	return sum / float64(len(m.abs))
}

// components sums the squares where every component is a group.
func (m *norm) components(e, a, b []float64) (sum, scales float64) {
	abs := m.abs
	e, a, b = e[:len(abs)], a[:len(abs)], b[:len(abs)]
	for i, tol := range abs {
		scale := tol + m.rel*max(math.Abs(a[i]), math.Abs(b[i]))
		r := e[i] / scale
		sum += r * r
		scales += scale
	}
	return sum, scales
}

// groups sums the squares over groups of components.
func (m *norm) groups(e, a, b []float64) (sum, scales float64) {
	i := 0
	for g, end := range m.end {
		var ee, aa, bb float64
		for ; i < end; i++ {
			ee += e[i] * e[i]
			aa += a[i] * a[i]
			bb += b[i] * b[i]
		}
		scale := m.abs[g] + m.rel*math.Sqrt(max(aa, bb))
		sum += ee / (scale * scale)
		scales += scale
	}
	return sum, scales
}
