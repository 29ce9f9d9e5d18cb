package air

import (
	"math"
	"testing"
)

// BenchmarkCurve builds the curve.
func BenchmarkCurve(b *testing.B) {
	for b.Loop() {
		newCurve()
	}
}

// BenchmarkFormula is CdRe by the formula, at a Reynolds number; each call
// waits for the last.
func BenchmarkFormula(b *testing.B) {
	re := 2000.0
	for b.Loop() {
		re = 2000 + 1e-3*CliftGauvin{}.CdRe(re)
	}
	if math.IsNaN(re) {
		b.Fatal(re)
	}
}

// BenchmarkCurveAt is the same by the curve, at its square.
func BenchmarkCurveAt(b *testing.B) {
	c, x := sphere(), 4e6
	for b.Loop() {
		x = 4e6 + 1e-3*c.at(x)
	}
	if math.IsNaN(x) {
		b.Fatal(x)
	}
}
