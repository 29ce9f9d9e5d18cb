package odetest

// Problem is y' = f(t, y), y(T0) = Y0 to TEnd, with its solution. It has the
// methods of a system of equations.
type Problem struct {
	Name   string
	Source string    // where it was published
	Y0     []float64 // state at the start; not to be changed
	T0     float64   // start
	TEnd   float64   // end
	// Growth bounds how much errors grow: changes at any one time on the way, of
	// up to 1 in each component, move no component of the end by more, where
	// they are small. Where it is said to be measured, it was, by changes of some
	// hundred states on the way, and rounded up.
	Growth float64
	// Closes says that the solution is known at T0 and TEnd only.
	Closes bool

	deriv func(t float64, y, dy []float64)
	exact func(t float64, y []float64)
}

// Dim returns the number of components.
func (p Problem) Dim() int { return len(p.Y0) }

// Deriv fills dy, of Dim components, with f(t, y).
func (p Problem) Deriv(t float64, y, dy []float64) { p.deriv(t, y, dy) }

// Exact fills y, of Dim components, with the solution at t in [T0, TEnd], to
// some units of rounding.
func (p Problem) Exact(t float64, y []float64) { p.exact(t, y) }

// All returns every problem, simple ones first.
func All() []Problem {
	return []Problem{
		Decay(), Cubic(), Wave(), Logistic(), Spiral(),
		Oscillator(), Reaction(), Torus(), RigidBody(),
		DecayChain(), BirthChain(), Heat(10), Heat(51),
		Kepler(0.1), Kepler(0.5), Kepler(0.9), Arenstorf(),
		Bessel(), Fall(), Pursuit(),
	}
}

const (
	detest = "Hull, Enright, Fellen & Sedgwick 1972, problem " // from memory
	memory = " (from memory)"
	long   = 20 // end of the problems of DETEST
)
