// Package integrator solves y' = f(t, y), y(t0) = y0 by an explicit
// Runge-Kutta pair with adaptive steps, gives the solution between the steps,
// and finds where functions of it cross zero. It knows no physics.
//
// The pieces, each in a file of its own:
//
//	system.go   what the caller supplies: the equations and the tolerances
//	norm.go     how an error is measured against the tolerances
//	tableau.go  the coefficients of the method
//	step.go     one trial step, and the stepper that repeats it
//	row.go      the linear combinations that a step is made of
//	control.go  first step, acceptance, length of the next step
//	dense.go    the solution within a step
//	event.go    the rules of events, in prose, and their types
//	finder.go   the search for events along a step
//	root.go     the polishing of a bracketed root
//	solve.go    the driver
//	errors.go   how it fails
//
// # Use
//
//	st, err := integrator.NewStepper(integrator.DormandPrince54(), sys, tol)
//	...
//	for each run {
//		st.Reset(t0, y0)
//		res, err := integrator.Solve(st, tEnd, events, nil)
//		...
//	}
//
// A Stepper owns all the workspace: it is made once and reused through
// [Stepper.Reset], after which stepping, sampling and searching allocate
// nothing, apart from the error of a run that fails. It serves one goroutine.
//
// # Laws
//
//   - Steps depend on the state only through the norm described at [Tol]:
//     a problem rotated within its groups takes the same steps, to rounding.
//   - A step meets its ends: At(T0) is Y0 and At(T1) is Y1, bit for bit.
//   - Equal inputs give equal bits: nothing depends on what a Stepper did
//     before its last Reset.
//   - A failed step leaves the state as it was.
//   - Time runs forward. An end before the start is refused with a
//     [StepError]; to integrate backward, substitute -t in the System.
package integrator
