package integrator

import "math"

// Constants of the step control, after the code DOPRI5 as described by Hairer,
// Norsett & Wanner I, section II.4 and the appendix (from memory). They steer
// how many steps are taken, never whether one is exact enough.
const (
	safety      = 0.9  // aim at this share of the step that would just pass
	leastChange = 0.2  // a step is at most this much shorter than the last
	mostChange  = 10.0 // and at most this much longer
	betaOfOrder = 0.2  // the weight of the last error is this over the order: 0.04 for order 5
	leastOld    = 1e-4 // errors below count as this in the memory of the controller
	stretch     = 1.01 // a step this close to the end goes to the end
	minUlps     = 16   // a step shorter than so many units of rounding of t is too small
	maxRejects  = 64   // in a row: beyond, f is no function that steps can follow
)

// controller chooses the lengths of the steps: proportional-integral control
// of the logarithm of the error (Gustafsson 1991), which damps the alternation
// of long and short steps that an integral controller alone falls into.
type controller struct {
	alpha, beta float64 // exponents of the error and of the one before
	order       float64 // of the local error that is estimated
	next, max   float64 // next step, and its limit; next 0: to be guessed
	logOld      float64 // logarithm of the last error
	rejects     int     // in a row
}

func newController(tab *Tableau) controller {
	order := float64(min(tab.Order, tab.ErrOrder) + 1)
	beta := betaOfOrder / order
	return controller{alpha: 1/order - 0.75*beta, beta: beta, order: order}
}

func (c *controller) reset() {
	c.next, c.max = 0, math.Inf(1)
	c.logOld = logLeast
	c.rejects = 0
}

// first sets the first step from the Euler step h0, and from the norms of the
// first and second derivatives. The latter may be no number, where h0 left
// the domain of f.
func (c *controller) first(h0, d1, d2 float64) {
	h := 1e-3 * h0
	if d := max(d1, d2); d > 1e-15 {
		h = math.Pow(0.01/d, 1/c.order)
	} else if d <= 1e-15 {
		h = max(1e-6, h)
	}
	c.next = max(min(100*h0, h), math.SmallestNonzeroFloat64)
}

// end returns where the next trial from t ends, and whether tEnd makes it
// shorter than it could be.
func (c *controller) end(t, tEnd float64) (t1 float64, cut bool) {
	h := max(min(c.next, c.max), minUlps*epsilon*math.Abs(t))
	if left := tEnd - t; left <= stretch*h {
		return tEnd, left < h
	}
	return t + h, false
}

// accept sets the next step after one of length h whose squared error passed.
// A step that the end cut too short to tell anything is forgotten.
func (c *controller) accept(h, sq float64, cut bool) {
	log := 0.5 * roughLog(sq)
	change := safety * roughExp(c.beta*c.logOld-c.alpha*log)
	change = min(max(change, leastChange), mostChange)
	if c.rejects > 0 {
		change = min(change, 1)
	}
	c.rejects = 0
	if cut && change == mostChange {
		c.next = max(c.next, h*change)
		return
	}
	c.next = h * change
	c.logOld = max(log, logLeast)
}

// logLeast is the logarithm of leastOld.
var logLeast = math.Log(leastOld)

// reject shortens the next step after one of length h from t that failed, or
// returns the reason to give up.
func (c *controller) reject(t, h, sq float64) Reason {
	finite := sq <= math.MaxFloat64
	change := leastChange
	if finite {
		change = max(change, safety*math.Exp(-0.5*c.alpha*math.Log(sq)))
	}
	c.next = h * change
	c.rejects++
	if c.next >= minUlps*epsilon*math.Abs(t) && c.rejects < maxRejects {
		return ""
	}
	if finite {
		return TooSmall
	}
	return NonFinite
}
