package measure

import (
	"math"

	"gonum.org/v1/gonum/mat"
	"gonum.org/v1/gonum/stat"
)

// Ellipse is the landing ellipse: the one that would hold 95 % of landings
// spread by a normal distribution of their mean and covariance. m and rad.
type Ellipse struct {
	Spinward, Axial float64 // of its centre, from plumb under the nominal release
	Major, Minor    float64 // semi-axes
	Angle           float64 // of the major axis, from spinward toward +axial, in (-pi/2, pi/2]
	Inside          float64 // share of the landings that it holds
}

// leastForEllipse is how many landings an ellipse wants: with fewer its
// covariance has no inverse.
const leastForEllipse = 3

// LandingEllipse gives the 95 % landing ellipse of landings at x and y, m; nil
// where they are too few. Of a normal distribution of two dimensions a share p
// lies within the square of the distance -2 ln(1-p), in standard deviations:
// the quantile of chi-square of two degrees of freedom, 5.991 for 95 %.
func LandingEllipse(x, y []float64) *Ellipse {
	if len(x) < leastForEllipse {
		return nil
	}
	cov := mat.NewSymDense(2, []float64{stat.Variance(x, nil), stat.Covariance(x, y, nil), 0, stat.Variance(y, nil)})
	var eig mat.EigenSym
	if !eig.Factorize(cov, true) {
		return nil
	}
	size := eig.Values(nil) // ascending; of a line one is 0, or below it by rounding
	var axes mat.Dense
	eig.VectorsTo(&axes)
	k := -2 * math.Log(1-landingShare)
	e := &Ellipse{Spinward: stat.Mean(x, nil), Axial: stat.Mean(y, nil),
		Major: math.Sqrt(k * math.Max(0, size[1])), Minor: math.Sqrt(k * math.Max(0, size[0]))}
	e.Angle = math.Atan(axes.At(1, 1) / axes.At(0, 1))
	if e.Angle == -math.Pi/2 {
		e.Angle = math.Pi / 2
	}
	for i := range x {
		if e.holds(x[i], y[i]) {
			e.Inside++
		}
	}
	e.Inside /= float64(len(x))
	return e
}

// edge is how far outside an ellipse, in m, a landing counts as in it: the
// roundings of landings that lie on a line, or all at one place.
const edge = 1e-9

func (e *Ellipse) holds(x, y float64) bool {
	sin, cos := math.Sincos(e.Angle)
	along, across := (x-e.Spinward)*cos+(y-e.Axial)*sin, (y-e.Axial)*cos-(x-e.Spinward)*sin
	return math.Hypot(along/(e.Major+edge), across/(e.Minor+edge)) <= 1
}
