package study

import "math"

// A sample is a flight time looked at, and how fast the throw that takes it is
// (m/s); +Inf where none was found, or only one beyond all reason.
type sample struct{ time, speed float64 }

const (
	// rootWidth is how narrow, as a share of the time, a root is closed in: the
	// roundings of the time itself.
	rootWidth = 4e-16
	// rootSpeed is how near to the speed, as a share of it, is near enough.
	rootSpeed = 1e-13
	// trueSpeed is how near it must come to be a root at all, and not the edge of
	// where there are throws.
	trueSpeed = 1e-6
)

// root closes in on the change of sign of f between two times of which it is
// known to have one, by false position with the weight of a stale end halved
// (the Illinois method; Dowell & Jarratt 1971, from memory), every fourth time
// by halving. An infinite or missing value counts as positive.
func root(f func(float64) float64, a, fa, b, fb, enough float64) float64 {
	const most = 200 // halving alone needs 53, every fourth time
	side := 0
	for i := range most {
		if math.Abs(fa) <= enough {
			return a
		}
		if math.Abs(fb) <= enough || b-a <= rootWidth*math.Abs(b) {
			return b
		}
		mid := a + (b-a)/2
		if x := (a*fb - b*fa) / (fb - fa); i%4 != 3 && x > a && x < b {
			mid = x
		}
		fm := f(mid)
		if positive(fm) == positive(fb) {
			if b, fb = mid, fm; side == 1 {
				fa /= 2
			}
			side = 1
		} else {
			if a, fa = mid, fm; side == -1 {
				fb /= 2
			}
			side = -1
		}
	}
	return b
}

func positive(x float64) bool { return !(x <= 0) }

// golden is the share of a golden section.
const golden = 0.6180339887498949

// lowest finds the least value of f, which has one valley between two times,
// and its time, by golden section (Kiefer 1953; from memory).
func lowest(f func(float64) float64, lo, hi float64) (time, least float64) {
	const most = 120
	a, b := hi-golden*(hi-lo), lo+golden*(hi-lo)
	fa, fb := f(a), f(b)
	for i := 0; i < most && hi-lo > valleyWidth*hi; i++ {
		if fa < fb || math.IsNaN(fb) {
			hi, b, fb = b, a, fa
			a = hi - golden*(hi-lo)
			fa = f(a)
		} else {
			lo, a, fa = a, b, fb
			b = lo + golden*(hi-lo)
			fb = f(b)
		}
	}
	if fa < fb {
		return a, fa
	}
	return b, fb
}

// valleyWidth is how narrow, as a share of the time, the bottom of a valley is
// closed in: there the value is level to its square, which is rounding.
const valleyWidth = 1e-9

// crossings gives the times, in order, at which the speed is the one given. Of
// a curve sampled at some times they are all but those of two that lie between
// samples without a sample beyond the speed, unless the valley or hill between
// them shows in three samples.
func crossings(curve []sample, speed float64, at func(float64) float64) []float64 {
	f := func(t float64) float64 { return at(t) - speed }
	var out []float64
	add := func(a, fa, b, fb float64) {
		if positive(fa) == positive(fb) {
			return
		}
		if t := root(f, a, fa, b, fb, rootSpeed*speed); math.Abs(f(t)) <= trueSpeed*speed {
			out = append(out, t)
		}
	}
	for i := 1; i < len(curve); i++ {
		p, q := curve[i-1], curve[i]
		add(p.time, p.speed-speed, q.time, q.speed-speed)
		if i+1 == len(curve) {
			break
		}
		// A valley or a hill may cross the speed between samples on one side of it.
		r := curve[i+1]
		if side := q.speed > speed; side == (p.speed > speed) && side == (r.speed > speed) && bends(p, q, r, side) {
			sign := 1.0
			if !side {
				sign = -1
			}
			t, v := lowest(func(t float64) float64 { return sign * f(t) }, p.time, r.time)
			if v < 0 {
				add(p.time, p.speed-speed, t, sign*v)
				add(t, sign*v, r.time, r.speed-speed)
			} else if v <= touching*speed {
				out = append(out, t)
			}
		}
	}
	return apartTimes(out)
}

// touching is how near to the speed, as a share of it, a valley counts as
// reaching it: rounding.
const touching = 1e-14

// bends says whether the middle of three samples is the lowest, or the highest.
func bends(p, q, r sample, low bool) bool {
	if low {
		return q.speed < p.speed && q.speed <= r.speed
	}
	return q.speed > p.speed && q.speed >= r.speed
}

// apartTimes puts times in order, and those that are one to rounding together.
func apartTimes(times []float64) []float64 {
	out := times[:0]
	for _, t := range sorted(times) {
		if n := len(out); n == 0 || t-out[n-1] > sameTime*t {
			out = append(out, t)
		}
	}
	return out
}

// sameTime is how near, as a share of the time, two solutions are one.
const sameTime = 1e-9

// valleys gives the times, in order, at which the speed is less than a little
// before and after, and the speeds.
func valleys(curve []sample, at func(float64) float64) (out []sample) {
	for i := 1; i+1 < len(curve); i++ {
		p, q, r := curve[i-1], curve[i], curve[i+1]
		if q.speed < p.speed && q.speed <= r.speed {
			// The square has no kink where the speed is 0.
			t, v := lowest(func(t float64) float64 { x := at(t); return x * x }, p.time, r.time)
			out = append(out, sample{t, math.Sqrt(v)})
		}
	}
	return out
}
