package integrator

// The rules of events.
//
// An event is a function g(t, y), continuous and pure, and it happens where g
// falls from positive to zero or below: a gap that closes. (Rising turns the
// sign of g round; all that follows is said of a falling g.) Events are sought
// on the interpolant of each step, so they are true to it and not to the exact
// solution.
//
// An event is armed, resting or spent.
//
//  1. Start. At the first Solve after a Reset an event with g > Slop is armed.
//     With |g| <= Slop it is on the surface, and rests. With g < -Slop it
//     starts on the far side, and is spent: nothing is reported, as nothing was
//     crossed. So a Slop must cover the rounding of a state put on the surface:
//     the resolution of time below, times the rate of g, with room to spare.
//  2. Armed. It is a hit when g is found at or below 0. The hit is then spent.
//     Its time is polished until it is bracketed to the resolution of time,
//     100 epsilon (|t| + |h|), and is the end of the bracket with g >= 0: the
//     state at a hit is never below the surface.
//  3. Resting. It is armed when g is found above Slop. If g is found below
//     -Slop instead, it was going in from the start: it is a hit at the last
//     look with g >= 0 (polished if that look saw g > 0), or where there is none
//     at the start of the step. One that stays within Slop goes on resting.
//     So moving away from the surface fires nothing, moving into it fires at
//     once, and lying on it fires nothing.
//  4. Spent. It is armed when g is found above Slop. So an event does not fire
//     twice at one instant: neither within a step, nor when another Solve goes
//     on from a terminal hit. Only after a Reset is it looked at afresh, by
//     rule 1; if the state then still moves in, that is a hit, at the start.
//  5. Plain event. An Event without a bound is looked at at the end of each
//     step only, so two roots within one step (a dip below zero and back, a
//     double root) are missed, and of three the one that is found need not be
//     the first. While resting it is also looked at from 2^-20 of the step on,
//     at twice the time each, so that a state that leaves the surface and falls
//     back within the step is told from one that goes in.
//  6. Bounded event. The search goes by looks so near each other that g cannot
//     reach zero between them, or where g is small, cannot change by more than
//     thin. Hence the law: every excursion to -thin or lower is found, however
//     short. An excursion that stays above -thin may be found or missed, and
//     where it is missed, the hit is located at a later one.
//  7. Graze. A touch that does not go below zero is no hit by right: a minimum
//     of g that is positive never is; one of exactly zero, a double root, is
//     if a look falls upon it. Nothing that depends on g continuously can tell
//     such a touch from a miss.
//  8. Several. Hits come in the order of time. Those within the resolution of
//     time of one another are given the time of the first, and come in the
//     order of the events.
//  9. Terminal. The first terminal hit truncates the step: T1, Y1 are its time
//     and state. Hits at the same time are reported with it, later ones are
//     not, and all events are as they stand at that time.
//
//  10. Clear. A [Clearing] event that is armed is not looked at in a step that it
//     clears. It remains armed.
//
// The work of a bounded search is at most one look for each thin that g could
// travel in the step, and near the surface about log(g/thin) rate/(slope of g)
// looks for each approach and each departure: the better the rate, the fewer.

// Event is a function whose fall through zero is sought. Value returns g, in
// any unit; y is valid only during the call.
type Event interface {
	Value(t float64, y []float64) float64
}

// Bounded is an event that can promise how fast its value changes along the
// rest of a step. With rate (unit of g per time) and accel (unit of g per time
// squared), neither negative,
//
//	|g(t + u) - g(t)| <= rate u + accel u^2/2   for t <= t + u <= s.T1
//
// along the interpolant, where y is its state at t. For a g that depends on
// position alone and has Lipschitz constant 1, rate is |dx/dt| by [Step.Rate]
// and accel is [Step.MaxAccel]; or rate is [Step.MaxRate] and accel 0.
//
// The search need not tell depths below thin (unit of g, positive) from zero:
// see the rules of events. Bound changes nothing, s included.
type Bounded interface {
	Event
	Bound(s *Step, t float64, y []float64) (rate, accel, thin float64)
}

// Clearing is a bounded event that may know beforehand that nothing happens
// during a step. Clear says whether g, armed at the start of s, surely stays
// above zero along it, but for excursions that stay above -thin. Then the step
// is not looked at. Clear may change what the event knows, but not s.
type Clearing interface {
	Bounded
	Clear(s *Step) bool
}

// Backed is a bounded event that can tell backward, too, how long its value
// surely does not vanish. Behind returns a time (not negative) such that g is
// above zero, but for excursions that stay above -thin, along s from that long
// before t on, though not before the start of s, until t; y is the state at t,
// and g is not negative there. So a first contact is proved by looking to both
// sides: forward from the start of the step, and backward from the contact.
type Backed interface {
	Bounded
	Behind(s *Step, t float64, y []float64) float64
}

// Aimed is an event that tells where it may happen, so that a step may end
// there, where its interpolant is at its best. Aim is given time and state, the
// derivative there, and the length that the next step would have. It returns
// where that step ought to end; beyond its end, or infinite: it makes no odds.
// It is a guess, of no consequence but for the length of steps.
type Aimed interface {
	Event
	Aim(t float64, y, dy []float64, next float64) float64
}

// EventSpec is an event and what is to be done about it.
type EventSpec struct {
	Event    Event   // a Bounded one is searched with its bound
	Slop     float64 // unit of g; within Slop of zero is on the surface
	Terminal bool    // stops the integration
	Rising   bool    // the value rises through zero instead of falling
}

// Hit is one occurrence of an event.
type Hit struct {
	Event    int     // index of the event
	T        float64 // time
	Terminal bool    // the event is terminal
}
