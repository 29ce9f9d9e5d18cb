package flight

import (
	"math"
	"math/bits"

	"gonum.org/v1/gonum/spatial/r3"
)

// mostContacts is how many surfaces a sphere may be pressed on at a time:
// three that differ hold it fast.
const mostContacts = 3

// singular is the determinant of the matrix of normals below which two or
// three of them count as lying in one plane or line.
const singular = 1e-8

// push is what one contact does, per kg of body.
type push struct {
	normal  r3.Vec  // unit, away from the surface
	answer  r3.Vec  // what acceleration a unit of normal force gives, with the friction that it makes
	turn    r3.Vec  // 1/s, dn/dt as the body moves
	closing float64 // m/s^2, by which the gap's acceleration exceeds normal.(acceleration): v.(dn/dt)
	mu      float64 // friction
	noise   float64 // m/s^2, what an acceleration along the normal may be by rounding
	force   float64 // m/s^2, normal force by mass
}

// balance sets the normal forces that keep a body on all of its contacts
// while the acceleration pull (m/s^2) acts on it: the gaps' accelerations
// vanish,
//
//	n_i . (pull + sum_j N_j a_j) + v . dn_i/dt = 0
//
// a_j, the answer, is n_j where friction has no part in it: that of a sliding
// body is across the normals of all contacts. It reports whether there is a
// solution.
func balance(p []push, pull r3.Vec) bool {
	var m [mostContacts][mostContacts + 1]float64
	n := len(p)
	for i := range p {
		for j := range p {
			m[i][j] = r3.Dot(p[i].normal, p[j].answer)
		}
		m[i][n] = -r3.Dot(p[i].normal, pull) - p[i].closing
	}
	for i := range n {
		if m[i][i] < singular {
			return false
		}
		for k := i + 1; k < n; k++ {
			f := m[k][i] / m[i][i]
			for j := i; j <= n; j++ {
				m[k][j] -= f * m[i][j]
			}
		}
	}
	for i := n - 1; i >= 0; i-- {
		x := m[i][n]
		for j := i + 1; j < n; j++ {
			x -= m[i][j] * p[j].force
		}
		p[i].force = x / m[i][i]
	}
	return true
}

// pressed gives the subset of contacts on which a body stays: the normal
// forces do not pull, and the body does not sink into the others. It is the
// linear complementarity problem of rigid contact (Lotstedt 1982; from
// memory), small enough to try all subsets, the smaller first.
func pressed(all []push, pull r3.Vec) []int {
	for size := 0; size <= min(len(all), mostContacts); size++ {
		for set := 0; set < 1<<len(all); set++ {
			if bits.OnesCount(uint(set)) != size {
				continue
			}
			if idx := members(set, len(all)); stays(all, idx, pull) {
				return idx
			}
		}
	}
	return nil
}

func members(set, n int) []int {
	var idx []int
	for i := range n {
		if set&(1<<i) != 0 {
			idx = append(idx, i)
		}
	}
	return idx
}

// stays tries one subset.
func stays(all []push, idx []int, pull r3.Vec) bool {
	sub := subset(all, idx)
	if !balance(sub, pull) {
		return false
	}
	acc := pull
	for i := range sub {
		if sub[i].force <= 0 {
			return false
		}
		acc = r3.Add(acc, r3.Scale(sub[i].force, sub[i].normal))
	}
	for i := range all {
		// A gap that would close, by more than what may be rounding.
		if !in(idx, i) && r3.Dot(all[i].normal, acc)+all[i].closing < -all[i].noise {
			return false
		}
	}
	return true
}

func in(idx []int, i int) bool {
	for _, k := range idx {
		if k == i {
			return true
		}
	}
	return false
}

// holds says whether friction can hold a body at rest on some of its contacts
// against the acceleration pull: what the normal forces leave of it must not
// exceed the sum of mu N. That sum is on the safe side where contacts wedge the
// body: it may then slide a little although it could be held. It gives those
// contacts.
func holds(all []push, pull r3.Vec) []int {
	for size := 1; size <= min(len(all), mostContacts); size++ {
		for set := 0; set < 1<<len(all); set++ {
			if bits.OnesCount(uint(set)) != size {
				continue
			}
			if idx := members(set, len(all)); held(subset(all, idx), pull) {
				return idx
			}
		}
	}
	return nil
}

func held(sub []push, pull r3.Vec) bool {
	if !balance(sub, pull) {
		return false
	}
	left, grip := pull, 0.0
	for i := range sub {
		if sub[i].force <= 0 {
			return false
		}
		left = r3.Add(left, r3.Scale(sub[i].force, sub[i].normal))
		grip += sub[i].mu * sub[i].force
	}
	return r3.Norm(left) <= grip+1e-12*r3.Norm(pull)
}

// faced says whether two of the contacts face each other: the body is wedged.
func faced(all []push, idx []int) bool {
	least := 0.0
	for _, i := range idx {
		for _, k := range idx {
			least = math.Min(least, r3.Dot(all[i].normal, all[k].normal))
		}
	}
	return least < -wedge
}

// wedge is the cosine beyond which two surfaces that hold a body at rest wedge
// it: they lean over each other by more than 6 deg.
const wedge = 0.1
