package integrator

import (
	"math"
	"testing"
)

// swing is a pendulum about one axis and a falling drift along the others: six
// components that differ.
type swing struct{}

func (swing) Dim() int { return 6 }

func (swing) Deriv(t float64, y, dy []float64) {
	dy[0], dy[1], dy[2] = y[3], y[4], y[5]
	dy[3], dy[4], dy[5] = -math.Sin(y[0]), -0.3*y[4]*math.Abs(y[4]), math.Cos(t)-0.1*y[5]
}

// TestSixIsTheSame holds the steps that are written out against the general
// ones: the same states to the bit, the same interpolants to rounding.
func TestSixIsTheSame(t *testing.T) {
	for _, groups := range [][]int{nil, {3, 3}, {1, 5}} {
		tol := Tol{Rel: 1e-8, Abs: []float64{1e-9}, Groups: groups}
		a, err := NewStepper(DormandPrince54(), swing{}, tol)
		if err != nil {
			t.Fatal(err)
		}
		b, _ := NewStepper(DormandPrince54(), swing{}, tol)
		if b.six == nil {
			t.Fatal("the method is not written out")
		}
		b.six = nil
		y := []float64{1, 2, 3, 0.1, 4, -1}
		a.Reset(0, y)
		b.Reset(0, y)
		for range 40 {
			s, err := a.Step(1e3)
			if err != nil {
				t.Fatal(err)
			}
			r, _ := b.Step(1e3)
			if s.T1 != r.T1 {
				t.Fatalf("groups %v: a step to %g, want %g", groups, s.T1, r.T1)
			}
			var p, q, dp, dq [6]float64
			for _, share := range []float64{0, 0.3, 0.7, 1} {
				at := s.T0 + share*(s.T1-s.T0)
				s.At(at, p[:])
				r.At(at, q[:])
				s.Rate(at, dp[:])
				r.Rate(at, dq[:])
				for i := range p {
					if share == 1 && p[i] != q[i] || math.Abs(p[i]-q[i]) > 1e-14*(1+math.Abs(q[i])) || math.Abs(dp[i]-dq[i]) > 1e-12*(1+math.Abs(dq[i])) {
						t.Fatalf("groups %v: at %g %v and %v, want %v and %v", groups, at, p, dp, q, dq)
					}
				}
			}
		}
	}
}

// TestRough tries the rough logarithm and exponential over what the step
// control gives them.
func TestRough(t *testing.T) {
	for x := -300.0; x <= 300; x += 0.37 {
		if got := roughLog(math.Exp(x)); math.Abs(got-x) > 1e-4 {
			t.Fatalf("log of exp(%g) is %g", x, got)
		}
		if got := roughExp(x) / math.Exp(x); math.Abs(got-1) > 1e-4 {
			t.Fatalf("exp(%g) is %g times what it is", x, got)
		}
	}
	if got := roughLog(0); !(got < -700) {
		t.Errorf("log of 0 is %g", got)
	}
}
