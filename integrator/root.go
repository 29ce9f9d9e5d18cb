package integrator

import "math"

// Constants of the ITP method, as its authors recommend them.
const (
	itpShift = 0.2 // of the bracket's first width: truncation, for a bracket as wide
	itpSlack = 1   // looks that may be spent beyond those of bisection
)

// polish narrows a bracket, a.g > 0 >= b.g, to the resolution of time and
// returns its ends. Method: interpolate, truncate, project (Oliveira &
// Takahashi, An enhancement of the bisection method average performance
// preserving minmax optimality, ACM Trans. Math. Softw. 47 (2020) 5; from
// memory), with kappa2 = 2. It takes the secant's point, moves it toward the
// middle so that both ends close in, and keeps it so near the middle that no g,
// however kinked, costs more than one look over bisection.
func (f *Finder) polish(w *watch, a, b look) (look, look, error) {
	width := b.t - a.t
	left := math.Ceil(math.Log2(max(width/f.res, 1))) + itpSlack
	shift := itpShift / width
	reach := 0.5 * f.res * math.Exp2(left) // half of the width that is allowed
	for ; b.t-a.t > f.res; reach /= 2 {
		t := itpPoint(a, b, shift, reach, f.res)
		if !(t > a.t && t < b.t) {
			break // no number lies between
		}
		x, err := f.look(w, t)
		if err != nil {
			return a, b, err
		}
		if x.g > 0 {
			a = x
		} else {
			b = x
		}
	}
	if b.g == 0 {
		a = b
	}
	return a, b, nil
}

const (
	secants   = 5    // looks that may be spent on the secant's points
	nearRoots = 1e-3 // a secant's step below this share of the last one is the last
	astride   = 0.4  // of the resolution: how far aside of the root the looks are that bracket it
)

// secant narrows a bracket by the secant through the last two looks, which of a
// smooth g doubles the digits at all but every third look, and in the end looks
// to both sides of the root. It leaves the bracket to polish where that is no
// use.
func (f *Finder) secant(w *watch, a, b look) (look, look, error) {
	last, now := a, b
	take := func(t float64) (err error) {
		if !(t > a.t && t < b.t) {
			return nil
		}
		last = now
		if now, err = f.look(w, t); now.g > 0 {
			a = now
		} else {
			b = now
		}
		return err
	}
	for k := 0; k < secants && b.t-a.t > f.res; k++ {
		move := now.g * (now.t - last.t) / (now.g - last.g)
		t := now.t - move
		if !(t > a.t && t < b.t) {
			break
		}
		if math.Abs(move) < math.Sqrt(f.res)*nearRoots {
			if err := take(t - astride*f.res); err != nil {
				return a, b, err
			}
			return a, b, take(a.t + 2*astride*f.res)
		}
		if err := take(t); err != nil {
			return a, b, err
		}
	}
	return a, b, nil
}

// itpPoint returns the next time to look at. It moves the secant's point by
// half of res at the least: where one end is already at the root, a move lost
// in rounding would leave the other end where it is.
func itpPoint(a, b look, shift, reach, res float64) float64 {
	width := b.t - a.t
	mid := a.t + width/2
	t := a.t + width*(a.g/(a.g-b.g)) // the secant's root
	toMid := math.Copysign(1, mid-t)
	if move := max(shift*width*width, res/2); move <= math.Abs(mid-t) {
		t += toMid * move
	} else {
		t = mid
	}
	if r := max(reach-width/2, 0); math.Abs(t-mid) > r {
		t = mid - toMid*r
	}
	return t
}
