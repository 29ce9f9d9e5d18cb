package model

// Sampling says how the samples of a scatter are spread.
type Sampling int

// The ways to spread samples.
const (
	Random Sampling = iota
	LatinHypercube
	Halton
)

// String names a sampling as scenarios do.
func (s Sampling) String() string { return [...]string{"random", "latin_hypercube", "halton"}[s] }

// Scatter asks for a release many times, some of its numbers varied.
type Scatter struct {
	Name     string
	Of       string // name of the release
	Samples  int
	Sampling Sampling
	Vary     []Spread // in the order of the file

	// It may stop before all samples, once the 95 % confidence intervals are as
	// narrow: half of that of the mean deck offset, m, and half of those of the
	// probabilities of surfaces and openings; 0: not looked at.
	Precision, SharePrecision float64
}

// Stops says whether a scatter may stop before all its samples.
func (s *Scatter) Stops() bool { return s.Precision > 0 || s.SharePrecision > 0 }

// SpreadKind names a distribution.
type SpreadKind int

// The distributions.
const (
	Normal     SpreadKind = iota // P: mean, standard deviation
	Uniform                      // P: low, high
	Triangular                   // P: low, mode, high
	Empirical                    // Data, each value as likely as the others
)

// Spread says how one number of a release varies. SI units, angles in rad.
type Spread struct {
	Key     string // such as at.height
	Kind    SpreadKind
	P       [3]float64
	Data    []float64
	Source  string // of Data: its file. Keys of one file take their values from one row
	IsAngle bool   // of an arc
}
