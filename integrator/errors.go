package integrator

import "fmt"

// Reason says why an integration could not go on.
type Reason string

// The reasons of a [StepError].
const (
	// TooSmall: no step that time can still resolve meets the tolerances.
	// f jumps or is singular there, or Rel is asking for more than rounding
	// gives.
	TooSmall Reason = "step too small"
	// TooMany: the limit set by [MaxSteps] was reached.
	TooMany Reason = "too many steps"
	// NonFinite: the derivative or the state is infinite or not a number,
	// however short the step.
	NonFinite Reason = "derivative is not finite"
	// Backward: the end lies before the start, or is not a number.
	Backward Reason = "end is not after the start"
	// BadEvent: an event's value or bound is not a number, or a bound is
	// negative.
	BadEvent Reason = "event value or bound is not a number"
	// Stalled: the search for an event made maxLooks looks within one step.
	// Its bound is far too large, or its thin far too small.
	Stalled Reason = "event search makes no headway"
)

// StepError says that an integration stopped short. It comes as a pointer:
//
//	var fail *integrator.StepError
//	if errors.As(err, &fail) { ... }
type StepError struct {
	T      float64 // time reached, in the unit of the caller's time
	H      float64 // step that failed, in the same unit
	Reason Reason
}

// Error names the reason, the time and the step.
func (e *StepError) Error() string {
	return fmt.Sprintf("integrator: %s at t = %g, step %g", string(e.Reason), e.T, e.H)
}
