package integrator

import (
	"fmt"
	"math"
)

// System is a set of ordinary differential equations y' = f(t, y), in
// whatever units its caller uses.
//
// Deriv fills dy, of length Dim, from t and y, and retains neither slice. It
// is pure: the same t and y give the same dy. It is called at times and
// states near the solution but not on it, up to one trial step ahead. A jump
// or a kink of f costs accuracy unless a step ends there: make it an [Event],
// and [Stepper.Reset] after it.
type System interface {
	Dim() int
	Deriv(t float64, y, dy []float64)
}

// MinRel is the least relative tolerance other than none. Below about a
// hundred units of rounding the error estimate is noise, and steps would
// shrink without gain.
const MinRel = 100 * epsilon

// MinAbs is the least absolute tolerance: its square is still a normal
// number, so that no error is lost to underflow.
const MinAbs = 1e-150

// epsilon is the distance from 1 to the next float64.
const epsilon = 0x1p-52

// Tol says how exact each step must be.
//
// The state is divided into groups of consecutive components, such as a
// position followed by a velocity. Groups holds their lengths ({3, 3}); nil
// makes every component a group of its own. Abs holds one absolute tolerance
// for each group, in the unit of its components; a single one serves all.
//
// A step from y0 to y1 whose estimated error is e is accepted if
//
//	sqrt(mean over groups of (|e_g| / (Abs_g + Rel max(|y0_g|, |y1_g|)))^2) <= 1
//
// with Euclidean norms within a group (after Hairer, Norsett & Wanner,
// Solving Ordinary Differential Equations I, 2nd ed. 1993, eq. II.4.11; from
// memory). Law: the steps do not change, but for rounding, when the problem is
// rotated within its groups. One group alone may exceed its share by the
// square root of the number of groups.
//
// The tolerances hold for each step; the error of a whole run is what the
// equations make of the errors of its steps.
type Tol struct {
	Rel    float64   // dimensionless; 0, or from MinRel to below 1
	Abs    []float64 // unit of the group; at least MinAbs
	Groups []int     // lengths of the groups, summing to Dim; nil: every component alone
}

// check returns what is wrong with the tolerances of a system of dim
// components.
func (tol Tol) check(dim int) error {
	if !(tol.Rel == 0 || tol.Rel >= MinRel && tol.Rel < 1) {
		return fmt.Errorf("integrator: relative tolerance %g is neither 0 nor in [%.2g, 1)", tol.Rel, MinRel)
	}
	groups, err := tol.count(dim)
	if err != nil {
		return err
	}
	if len(tol.Abs) != groups && len(tol.Abs) != 1 {
		return fmt.Errorf("integrator: %d absolute tolerances for %d groups", len(tol.Abs), groups)
	}
	for i, a := range tol.Abs {
		if !(a >= MinAbs && a <= math.MaxFloat64) {
			return fmt.Errorf("integrator: absolute tolerance %d is %g, not a number from %g up", i, a, MinAbs)
		}
	}
	return nil
}

// count returns the number of groups.
func (tol Tol) count(dim int) (int, error) {
	if tol.Groups == nil {
		return dim, nil
	}
	sum := 0
	for i, n := range tol.Groups {
		if n < 1 {
			return 0, fmt.Errorf("integrator: group %d has %d components", i, n)
		}
		sum += n
	}
	if sum != dim {
		return 0, fmt.Errorf("integrator: groups hold %d components of a system of %d", sum, dim)
	}
	return len(tol.Groups), nil
}
