package odetest

import (
	"math"
	"math/rand/v2"
	"strings"
	"testing"
)

const epsilon = 0x1p-52

func TestProblemsAreWhole(t *testing.T) {
	names := map[string]bool{}
	for _, p := range All() {
		if p.Name == "" || names[p.Name] || strings.TrimSpace(p.Source) == "" {
			t.Errorf("problem %q: without a name or a source, or twice", p.Name)
		}
		names[p.Name] = true
		if p.Dim() < 1 || !(p.TEnd > p.T0) || !(p.Growth >= 1) {
			t.Errorf("%s: dimension %d, from %g to %g, growth %g", p.Name, p.Dim(), p.T0, p.TEnd, p.Growth)
		}
	}
}

func TestExactStartsAtStart(t *testing.T) {
	for _, p := range All() {
		y := make([]float64, p.Dim())
		p.Exact(p.T0, y)
		for i := range y {
			// some ten roundings of terms of the state's size, and of as many as
			// there are sine waves
			if tol := 10 * float64(p.Dim()) * epsilon * (1 + math.Abs(p.Y0[i])); math.Abs(y[i]-p.Y0[i]) > tol {
				t.Errorf("%s: component %d starts at %.17g, the solution at %.17g", p.Name, i, p.Y0[i], y[i])
			}
		}
	}
}

// TestExactSolves differentiates each solution by central differences of the
// orders 2 and 4, whose own difference tells how exact they are.
func TestExactSolves(t *testing.T) {
	for _, p := range All() {
		if p.Closes {
			continue
		}
		n := p.Dim()
		at := func(when float64) []float64 {
			y := make([]float64, n)
			p.Exact(when, y)
			return y
		}
		dy := make([]float64, n)
		for i := range 50 {
			const h = 1e-3
			when := p.T0 + 2*h + (p.TEnd-p.T0-4*h)*float64(i)/49
			a, b, c, d, y := at(when-2*h), at(when-h), at(when+h), at(when+2*h), at(when)
			p.Deriv(when, y, dy)
			for j := range n {
				wide, near := (d[j]-a[j])/(4*h), (c[j]-b[j])/(2*h)
				slope := near + (near-wide)/3
				// the correction is off by h^2 of itself, times the growth of
				// the derivatives: less than a hundredth
				tol := 1e-2*math.Abs(near-wide) + 20*epsilon*(1+math.Abs(y[j]))/h
				if math.Abs(slope-dy[j]) > tol {
					t.Errorf("%s at %g: component %d changes by %.12g, the equations say %.12g (within %.2g)",
						p.Name, when, j, slope, dy[j], tol)
				}
			}
		}
	}
}

// TestJacobi holds the elliptic functions against their limits and identities:
// circular functions at m = 0, hyperbolic ones near 1, and the quarter period
// of m = 1/2, Gamma(1/4)^2/(4 sqrt(pi)).
func TestJacobi(t *testing.T) {
	near := func(name string, got, want float64) {
		t.Helper()
		if math.Abs(got-want) > 100*epsilon {
			t.Errorf("%s: %.17g, want %.17g", name, got, want)
		}
	}
	for _, u := range []float64{-2, 0, 0.3, 1, 4} {
		sn, cn, dn := jacobi(u, 0)
		near("sin", sn, math.Sin(u))
		near("cos", cn, math.Cos(u))
		near("one", dn, 1)
		sn, cn, dn = jacobi(u, 0.51)
		near("sn^2 + cn^2", sn*sn+cn*cn, 1)
		near("dn^2 + m sn^2", dn*dn+0.51*sn*sn, 1)
	}
	g := math.Gamma(0.25)
	quarter := g * g / (4 * math.Sqrt(math.Pi))
	sn, cn, dn := jacobi(quarter, 0.5)
	near("sn of a quarter", sn, 1)
	near("cn of a quarter", cn, 0)
	near("dn of a quarter", dn, math.Sqrt(0.5))
}

// TestThreeBodiesKeepJacobiIntegral: the equations of the closing orbit keep
// x^2 + y^2 + 2 (1-mu)/r1 + 2 mu/r2 - v^2 (Jacobi), at any state.
func TestThreeBodiesKeepJacobiIntegral(t *testing.T) {
	const seed = 31
	rng := rand.New(rand.NewPCG(seed, 0))
	integral := func(y []float64) float64 {
		r1, r2 := math.Hypot(y[0]+moonMass, y[1]), math.Hypot(y[0]-1+moonMass, y[1])
		return y[0]*y[0] + y[1]*y[1] + 2*(1-moonMass)/r1 + 2*moonMass/r2 - y[2]*y[2] - y[3]*y[3]
	}
	for range 100 {
		var y, dy, a, b [4]float64
		for i := range y {
			y[i] = 4*rng.Float64() - 2
		}
		threeBodies(0, y[:], dy[:])
		const h = 1e-6
		size := 0.0
		for i := range y {
			a[i], b[i] = y[i]-h*dy[i], y[i]+h*dy[i]
			size = max(size, math.Abs(y[i]), math.Abs(dy[i]))
		}
		change := (integral(b[:]) - integral(a[:])) / (2 * h)
		// third derivatives times h^2, and rounding over h
		if tol := 1e-7 * size * size * size * size; math.Abs(change) > tol {
			t.Errorf("seed %d: the integral changes by %g at %v", seed, change, y)
		}
	}
}
