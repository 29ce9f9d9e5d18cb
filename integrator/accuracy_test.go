package integrator_test

import (
	"bufio"
	"math"
	"os"
	"strconv"
	"strings"
	"testing"

	"offplumb/integrator"
	"offplumb/integrator/odetest"
)

// tolerances are those of the referee's table. As small as the last one, 1e-10,
// errors of rounding are still of no account.
var tolerances = []float64{1e-4, 1e-6, 1e-8, 1e-10}

// solveProblem returns the state at the end of p, and the work.
func solveProblem(t *testing.T, p odetest.Problem, tol float64) integrator.Result {
	t.Helper()
	st := newStepper(t, p, tight(tol))
	st.Reset(p.T0, p.Y0)
	return mustSolve(t, st, p.TEnd, nil, nil)
}

// errorAtEnd returns the largest error of y at the end of p, and the largest
// component of the solution on the way.
func errorAtEnd(p odetest.Problem, y []float64) (miss, size float64) {
	exact := make([]float64, p.Dim())
	none := make([]float64, p.Dim())
	for i := range 101 {
		p.Exact(p.T0+(p.TEnd-p.T0)*float64(i)/100, exact)
		size = max(size, distance(exact, none))
	}
	p.Exact(p.TEnd, exact)
	return distance(y, exact), size
}

// TestErrorWithinTolerance holds the error at the end against the law: each
// step adds at most its tolerance, sqrt(dim) tol (1 + |y|) in one component,
// and the equations make at most Growth of it.
func TestErrorWithinTolerance(t *testing.T) {
	for _, p := range odetest.All() {
		for _, tol := range tolerances {
			res := solveProblem(t, p, tol)
			miss, size := errorAtEnd(p, res.Y)
			step := math.Sqrt(float64(p.Dim())) * tol * (1 + size)
			if most := float64(res.Accepted) * p.Growth * step; !(miss <= most) {
				t.Errorf("%s at tolerance %g: error %.3g, the %d steps account for %.3g", p.Name, tol, miss, res.Accepted, most)
			}
		}
	}
}

// TestErrorGoesWithTolerance: the steps go with the fifth root of the
// tolerance, and the error of the run with their fifth power, so the one with
// the other. As single errors may have either sign and cancel, it is the mean
// over all problems that is tried; the scatter of a mean of 20, each within a
// factor of 20 or so, is a factor of two over the six decades: 0.05 a decade.
func TestErrorGoesWithTolerance(t *testing.T) {
	sum := 0.0
	first, last := tolerances[0], tolerances[len(tolerances)-1]
	problems := odetest.All()
	for _, p := range problems {
		coarse, _ := errorAtEnd(p, solveProblem(t, p, first).Y)
		fine, _ := errorAtEnd(p, solveProblem(t, p, last).Y)
		sum += math.Log(coarse / fine)
	}
	if slope := sum / float64(len(problems)) / math.Log(first/last); !(math.Abs(slope-1) <= 0.1) {
		t.Errorf("the error goes with the power %.3f of the tolerance, want 1", slope)
	}
}

// referee reads the table of calls of the derivative that another code of the
// same pair takes; testdata/derivs.py made it.
func referee(t *testing.T) map[string]int {
	t.Helper()
	file, err := os.Open("testdata/derivs.csv")
	if err != nil {
		t.Fatal(err)
	}
	defer file.Close()
	calls := map[string]int{}
	lines := bufio.NewScanner(file)
	for lines.Scan() {
		key, value, _ := strings.Cut(strings.ReplaceAll(lines.Text(), ";", "\t"), "\t")
		tol, count, ok := strings.Cut(value, "\t")
		if n, err := strconv.Atoi(count); ok && err == nil {
			calls[key+";"+tol] = n
		}
	}
	if err := lines.Err(); err != nil {
		t.Fatal(err)
	}
	return calls
}

// TestDerivsLikeReferee caps the work. The referee steps by the same pair and
// norm, but controls its steps by the last error alone, aiming at 0.9^5 = 0.59
// of the tolerance; here the two exponents of the errors, 0.17 and -0.04,
// settle at 0.9^(1/0.13) = 0.44 of it: at steps shorter by 0.44^0.2/0.59^0.2,
// or 6 %. Rejections and the first steps differ besides: some four steps, and a
// tenth in all.
func TestDerivsLikeReferee(t *testing.T) {
	calls := referee(t)
	problems := odetest.All()
	if len(calls) != len(problems)*len(tolerances) {
		t.Errorf("the referee has %d counts, want %d", len(calls), len(problems)*len(tolerances))
	}
	for _, p := range problems {
		for _, tol := range tolerances {
			res := solveProblem(t, p, tol)
			want := float64(calls[p.Name+";"+strconv.FormatFloat(tol, 'g', -1, 64)])
			most, least := 1.1*want+4*6, want/1.1-4*6
			if n := float64(res.Derivs); n > most || n < least {
				t.Errorf("%s at tolerance %g: %g calls, the referee takes %g", p.Name, tol, n, want)
			}
			// one call at the start, one to guess the first step, six a trial
			if trials := res.Accepted + res.Rejected; res.Derivs != 2+6*trials {
				t.Errorf("%s at tolerance %g: %d calls for %d trials", p.Name, tol, res.Derivs, trials)
			}
		}
	}
}

// TestGrowthOfProblems holds the growth that a problem claims against what
// changes of its states on the way do to its end.
func TestGrowthOfProblems(t *testing.T) {
	for _, p := range odetest.All() {
		most := 1.0 // of a change at the end itself
		for _, y := range along(t, p, 12) {
			most = max(most, growth(t, p, y.t, y.y))
		}
		// a part in a thousand: that changes are not small enough
		if !(most <= p.Growth*(1+1e-3) && most >= p.Growth/3) {
			t.Errorf("%s: changes grow by %.5g, it claims %.5g", p.Name, most, p.Growth)
		}
	}
}

type moment struct {
	t float64
	y []float64
}

// along returns n states on the way of p, the first at its start.
func along(t *testing.T, p odetest.Problem, n int) []moment {
	t.Helper()
	st := newStepper(t, p, tight(1e-11))
	st.Reset(p.T0, p.Y0)
	var way []moment
	for i := range n {
		when := p.T0 + (p.TEnd-p.T0)*float64(i)/float64(n)
		res := mustSolve(t, st, when, nil, nil)
		way = append(way, moment{res.T, append([]float64(nil), res.Y...)})
	}
	return way
}

// growth returns the largest sum, over the changed components, of how much one
// component of the end changes.
func growth(t *testing.T, p odetest.Problem, t0 float64, y0 []float64) float64 {
	t.Helper()
	n := p.Dim()
	st := newStepper(t, p, tight(1e-11))
	change := min(1e-5, 1e-3/p.Growth) // so that the end changes by less than a hundredth
	sums, y, up := make([]float64, n), make([]float64, n), make([]float64, n)
	for j := range n {
		for _, sign := range []float64{1, -1} {
			copy(y, y0)
			y[j] += sign * change
			st.Reset(t0, y)
			res := mustSolve(t, st, p.TEnd, nil, nil)
			if sign > 0 {
				copy(up, res.Y)
				continue
			}
			for i := range n {
				sums[i] += math.Abs(up[i]-res.Y[i]) / (2 * change)
			}
		}
	}
	most := 0.0
	for _, s := range sums {
		most = max(most, s)
	}
	return most
}
