package measure

import (
	"math"
	"slices"
	"strings"

	"gonum.org/v1/gonum/stat"
	"gonum.org/v1/gonum/stat/distuv"
	"offplumb/sim/model"
)

// landingShare is the share of the landings that the ellipse and the contour
// are to hold, and the confidence of the intervals of shares and means.
const landingShare = 0.95

// levels are the shares below the quantiles that are told.
var levels = [...]float64{0.01, 0.05, 0.25, 0.5, 0.75, 0.95, 0.99}

// Spreading is how one measure spreads over the samples that landed. SI units.
type Spreading struct {
	Key       string
	Count     int
	Mean, Std float64
	Error     float64 // half of the 95 % confidence interval of the mean; that of independent samples
	Min, Max  float64
	Quantiles [len(levels)]float64
	unit      unit
	values    []float64 // NaN where there is none, of each sample that landed
}

// Median is the value below which half of the samples lie.
func (s *Spreading) Median() float64 { return s.Quantiles[3] }

// High is the value below which 95 % of the samples lie.
func (s *Spreading) High() float64 { return s.Quantiles[5] }

// Share is how often something happened.
type Share struct {
	Name      string
	Count     int
	Share     float64
	Low, High float64 // its 95 % confidence interval
}

// Scattered sums up a scatter.
type Scattered struct {
	Name       string
	Samples    int
	Flown      int     // those that are possible and could be computed
	LeftOut    []Share // why others were left out
	Landed     int
	Outcomes   []Share // of those flown, that did not land
	Spreads    []Spreading
	Covariance []Covariance // of pairs of them
	Surfaces   []Share      // first touched, of those flown
	Openings   []Share      // fallen through, of those flown
	Through    Share        // fallen through any opening
	Ellipse    *Ellipse     // nil: too few landed
	Contour    *Contour     // nil: too few landed
	Median     [2]float64   // m, spinward and axial, of the landings; NaN without one
}

// Covariance is that of two measures.
type Covariance struct {
	A, B  string
	Value float64 // SI
	unit  string
}

// Scatter sums up what the samples of a scatter did.
func Scatter(m *model.Model, c *Cloud) *Scattered {
	s := &Scattered{Name: c.Scatter.Name, Samples: len(c.Fates)}
	var landed []int
	var count [fates]int
	for i, f := range c.Fates {
		count[f]++
		if f == ShotLanded {
			landed = append(landed, i)
		}
	}
	s.Flown = count[ShotLanded] + count[ShotTime] + count[ShotLost]
	s.Landed = len(landed)
	for _, f := range []Fate{ShotTime, ShotLost} {
		if count[f] > 0 {
			s.Outcomes = append(s.Outcomes, shareOf(f.String(), count[f], s.Flown))
		}
	}
	s.leftOut(c)
	s.hits(m, c)
	s.spreads(c, landed)
	s.landings()
	return s
}

// Settled says whether the first samples give the figures as closely as their
// scatter asks for.
func (c *Cloud) Settled(m *model.Model, n int) bool {
	part := *c
	part.Keep(n)
	s := &Scattered{}
	var offsets []float64
	for i, f := range part.Fates {
		if f == ShotLanded {
			offsets = append(offsets, part.Offset[i])
		}
		if f == ShotLanded || f == ShotTime || f == ShotLost {
			s.Flown++
		}
	}
	if want := c.Scatter.Precision; want > 0 && !(spreadingOf("offset", metre, offsets).Error <= want) {
		return false
	}
	if c.Scatter.SharePrecision == 0 {
		return true
	}
	s.hits(m, &part)
	return !slices.ContainsFunc(append(s.Surfaces, s.Openings...), func(h Share) bool { return !(h.High-h.Low <= 2*c.Scatter.SharePrecision) })
}

// leftOut counts the samples that were left out, by reason.
func (s *Scattered) leftOut(c *Cloud) {
	count := make([]int, len(c.words.texts)+1)
	for i, f := range c.Fates {
		if f == ShotImpossible || f == ShotFailed {
			count[c.why[i]]++
		}
	}
	for n, k := range count {
		if k > 0 {
			s.LeftOut = append(s.LeftOut, Share{Name: c.words.text(uint32(n)), Count: k, Share: float64(k) / float64(s.Samples), Low: math.NaN(), High: math.NaN()})
		}
	}
	slices.SortFunc(s.LeftOut, byCount) // the numbers of words depend on who came first
}

func byCount(a, b Share) int {
	switch {
	case a.Count != b.Count:
		return b.Count - a.Count
	case a.Name < b.Name:
		return -1
	}
	return 1
}

// hits counts the surfaces touched and the openings fallen through, in the
// order of the model.
func (s *Scattered) hits(m *model.Model, c *Cloud) {
	bySurface, byOpenings := make([]int, len(c.words.texts)+1), make([]int, len(c.words.texts)+1)
	for i, f := range c.Fates {
		if f == ShotLanded || f == ShotTime || f == ShotLost {
			bySurface[c.surface[i]]++
			byOpenings[c.through[i]]++
		}
	}
	n := 0
	for w := 1; w < len(c.words.texts); w++ {
		n += byOpenings[w]
	}
	s.Through = shareOf("any opening", n, s.Flown)
	touched, passed := map[string]int{}, map[string]int{}
	for n := 1; n < len(c.words.texts); n++ {
		touched[c.words.text(uint32(n))] += bySurface[n]
		for _, name := range openingsOf(c.words.text(uint32(n))) {
			passed[name] += byOpenings[n]
		}
	}
	for _, f := range m.Interior.Surfaces() {
		if k := touched[f.Name]; k > 0 {
			s.Surfaces = append(s.Surfaces, shareOf(f.Name, k, s.Flown))
			delete(touched, f.Name) // a name that several surfaces have counts once
		}
	}
	for i := range m.Decks {
		for _, o := range m.Decks[i].Openings {
			if !o.Closed {
				s.Openings = append(s.Openings, shareOf(o.Name, passed[o.Name], s.Flown))
			}
		}
	}
}

// shareOf gives a share with the interval of Wilson, J. Am. Stat. Assoc. 22
// (1927) 209-212 (from memory), which holds near 0 and 1 too. It is that of
// independent samples; those of a Latin hypercube or of Halton points spread
// less.
func shareOf(name string, k, n int) Share {
	out := Share{Name: name, Count: k, Share: float64(k) / float64(n), Low: math.NaN(), High: math.NaN()}
	if n == 0 {
		out.Share = math.NaN()
		return out
	}
	z := distuv.UnitNormal.Quantile((1 + landingShare) / 2)
	p, over := out.Share, z*z/float64(n)
	mid := (p + over/2) / (1 + over)
	half := z / (1 + over) * math.Sqrt(p*(1-p)/float64(n)+over/(4*float64(n)))
	out.Low, out.High = math.Max(0, mid-half), math.Min(1, mid+half)
	if k == 0 {
		out.Low = 0 // but for rounding
	}
	if k == n {
		out.High = 1
	}
	return out
}

// spreads works out the distribution of each measure over the landings.
func (s *Scattered) spreads(c *Cloud, landed []int) {
	of := func(values []float64) []float64 {
		if len(landed) == len(values) {
			return values
		}
		out := make([]float64, len(landed))
		for k, i := range landed {
			out[k] = values[i]
		}
		return out
	}
	for _, m := range []struct {
		key    string
		unit   unit
		values []float64
	}{
		{"offset", metre, c.Offset}, {"offset_axial", metre, c.OffsetAxial}, {"deflection", metre, c.Deflection},
		{"time", second, c.Time}, {"speed", speedUnit, c.Speed}, {"energy", joule, c.Energy},
		{"plan_spinward", metre, c.Spinward}, {"plan_axial", metre, c.Axial},
	} {
		s.Spreads = append(s.Spreads, spreadingOf(m.key, m.unit, of(m.values)))
	}
	for i := range s.Spreads {
		for k := i; k < len(s.Spreads); k++ {
			a, b := &s.Spreads[i], &s.Spreads[k]
			if a.Count == s.Landed && b.Count == s.Landed && s.Landed > 1 {
				s.Covariance = append(s.Covariance, Covariance{A: a.Key, B: b.Key, Value: stat.Covariance(a.values, b.values, nil), unit: productOf(a.unit, b.unit)})
			}
		}
	}
}

func productOf(a, b unit) string {
	switch {
	case a != b:
		return a.name + " " + b.name
	case strings.Contains(a.name, "/"):
		return "(" + a.name + ")^2"
	}
	return a.name + "^2"
}

func spreadingOf(key string, u unit, values []float64) Spreading {
	nan := math.NaN()
	s := Spreading{Key: key, unit: u, values: values, Mean: nan, Std: nan, Error: nan, Min: nan, Max: nan}
	sorted := make([]float64, 0, len(values))
	for _, x := range values {
		if !math.IsNaN(x) {
			sorted = append(sorted, x)
		}
	}
	slices.Sort(sorted)
	s.Count = len(sorted)
	for k, p := range levels {
		s.Quantiles[k] = quantile(sorted, p)
	}
	if s.Count == 0 {
		return s
	}
	s.Min, s.Max = sorted[0], sorted[s.Count-1]
	s.Mean = stat.Mean(sorted, nil)
	if s.Count > 1 {
		s.Std = stat.StdDev(sorted, nil)
		s.Error = distuv.UnitNormal.Quantile((1+landingShare)/2) * s.Std / math.Sqrt(float64(s.Count))
	}
	return s
}

// quantile is that of sorted values below which a share p of them lies, with a
// straight line between neighbours: definition 7 of Hyndman & Fan, The American
// Statistician 50 (1996) 361-365 (from memory), which spreadsheets have too.
func quantile(sorted []float64, p float64) float64 {
	if len(sorted) == 0 {
		return math.NaN()
	}
	at := p * float64(len(sorted)-1)
	low := int(at)
	high := min(low+1, len(sorted)-1)
	return sorted[low] + (at-float64(low))*(sorted[high]-sorted[low])
}

// landings works out where on the deck the landings are.
func (s *Scattered) landings() {
	x, y := s.Spread("plan_spinward"), s.Spread("plan_axial")
	s.Median = [2]float64{x.Median(), y.Median()}
	s.Ellipse = LandingEllipse(x.values, y.values)
	s.Contour = DensityContour(x.values, y.values, landingShare)
}

// Spread is that of a measure, such as energy.
func (s *Scattered) Spread(key string) *Spreading {
	for i := range s.Spreads {
		if s.Spreads[i].Key == key {
			return &s.Spreads[i]
		}
	}
	return &Spreading{}
}
