package study_test

import (
	"bytes"
	"context"
	"errors"
	"fmt"
	"math"
	"strings"
	"testing"

	"gonum.org/v1/gonum/stat"
	"offplumb/sim/measure"
	"offplumb/sim/model"
	"offplumb/sim/study"
	"offplumb/sim/table"
)

// ring is the habitat of these tests, a vacuum, with one release and one
// scatter of it.
func ring(t testing.TB, r model.Release, s model.Scatter, decks ...model.Deck) *study.Prepared {
	t.Helper()
	r.Name, r.Body, r.Until = "r", "b", model.Until{Kind: model.UntilLanding}
	s.Of = r.Name
	m, problems := model.New(model.Model{
		Habitat:  model.Habitat{Room: model.Room{FloorRadius: ringRadius, Length: 14}, Spin: ringSpin},
		Decks:    decks,
		Solver:   model.Solver{RelTol: 1e-9, PosTol: 1e-12, VelTol: 1e-12, MaxTime: 60},
		Output:   model.Output{Step: 0.01},
		Bodies:   []model.Body{{Name: "b", Mass: 1.4, Restitution: 0.4, Friction: 0.3}}, // a point
		Releases: []model.Release{r},
		Scatters: []model.Scatter{s},
	})
	if problems != nil {
		t.Fatal(problems)
	}
	p, problems := study.Prepare(m)
	if problems != nil {
		t.Fatal(problems)
	}
	return p
}

const (
	ringRadius = 18.0 // m
	ringSpin   = 0.5  // rad/s
)

func scattered(t testing.TB, p *study.Prepared, seed uint64) *measure.Cloud {
	t.Helper()
	c, err := p.Scatter(context.Background(), &p.Model.Scatters[0], study.ScatterOptions{Workers: 2, Seed: seed})
	if err != nil {
		t.Fatal(err)
	}
	return c
}

func normal(key string, mean, dev float64) model.Spread {
	return model.Spread{Key: key, Kind: model.Normal, P: [3]float64{mean, dev}}
}

// straight is the landing of a point in vacuum: in the inertial frame it flies
// a straight line to the floor. v is the height, then the velocity spinward,
// axial and up.
func straight(v [4]float64) (offset, axial, time float64) {
	r0 := ringRadius - v[0]
	vx, vy := -v[3], ringSpin*r0+v[1]
	a, b, c := vx*vx+vy*vy, r0*vx, r0*r0-ringRadius*ringRadius
	time = (-b + math.Sqrt(b*b-a*c)) / a
	gone := math.Atan2(vy*time, r0+vx*time) - ringSpin*time
	return ringRadius * gone, v[2] * time, time
}

// jacobian differentiates straight by central differences.
func jacobian(at [4]float64) (j [3][4]float64) {
	const h = 1e-5
	for k := range at {
		up, down := at, at
		up[k], down[k] = at[k]+h, at[k]-h
		o1, a1, t1 := straight(up)
		o0, a0, t0 := straight(down)
		j[0][k], j[1][k], j[2][k] = (o1-o0)/(2*h), (a1-a0)/(2*h), (t1-t0)/(2*h)
	}
	return j
}

// TestLinearisedCovariance: spreads so small that the landing is linear in them
// have the covariance J S J' of linear error propagation, J being that of the
// closed form.
func TestLinearisedCovariance(t *testing.T) {
	nominal := [4]float64{1.9, 0.4, 0.7, 1.1}
	dev := [4]float64{2e-3, 3e-3, 1e-3, 2e-3}
	const seed, n = 11, 8000
	p := ring(t, model.Release{At: model.Station{Height: nominal[0]}, Start: model.Start{Kind: model.Velocity, VSpinward: nominal[1], VAxial: nominal[2], VUp: nominal[3]}},
		model.Scatter{Name: "small", Samples: n, Vary: []model.Spread{normal("at.height", nominal[0], dev[0]), normal("velocity.spinward", nominal[1], dev[1]),
			normal("velocity.axial", nominal[2], dev[2]), normal("velocity.up", nominal[3], dev[3])}})
	c := scattered(t, p, seed)
	j := jacobian(nominal)
	got := [3][]float64{c.Offset, c.OffsetAxial, c.Time}
	var want [3][3]float64
	for a := range 3 {
		for b := range 3 {
			for k := range 4 {
				want[a][b] += j[a][k] * j[b][k] * dev[k] * dev[k]
			}
		}
	}
	o, a, time := straight(nominal)
	for i, mean := range []float64{o, a, time} {
		// The second derivatives move the mean by about the square of a
		// deviation, a part in a hundred of the standard error at most.
		if d := stat.Mean(got[i], nil) - mean; math.Abs(d) > 5*math.Sqrt(want[i][i]/n) {
			t.Errorf("seed %d: mean %d is off by %g", seed, i, d)
		}
		for k := range 3 {
			// The estimate of a covariance of n normal samples has the variance
			// (Cii Ckk + Cik^2)/(n-1) (Wishart 1928).
			slack := 5 * math.Sqrt((want[i][i]*want[k][k]+want[i][k]*want[i][k])/(n-1))
			if cov := stat.Covariance(got[i], got[k], nil); math.Abs(cov-want[i][k]) > slack {
				t.Errorf("seed %d: covariance %d, %d is %g, want %g within %g", seed, i, k, cov, want[i][k], slack)
			}
		}
	}
}

// halfPlane is a deck with an edge at spinward zero, over the floor. A release
// above it, its place spread along the deck, lands on it where it comes down
// antispinward of the edge: the probability is that of a normal distribution
// below a bound.
func halfPlane(t testing.TB, s model.Scatter, place, dev float64) (p *study.Prepared, want float64) {
	t.Helper()
	const deck, height = 14.0, 1.5
	r0 := deck - height
	fall := math.Sqrt(deck*deck/(r0*r0)-1) / ringSpin // tan(theta)/omega
	offset := deck * (math.Acos(r0/deck) - ringSpin*fall)
	s.Vary = []model.Spread{normal("at.spinward", place, dev)}
	p = ring(t, model.Release{At: model.Station{Deck: "half", Height: height}}, s,
		model.Deck{Name: "half", Radius: deck, Thickness: 0.01, From: model.Arc{Value: -10}, To: model.Arc{},
			Friction: model.None, Restitution: model.None})
	return p, math.Erfc((place+offset)/(dev*math.Sqrt2)) / 2
}

func shareOf(t testing.TB, p *study.Prepared, c *measure.Cloud, surface string) measure.Share {
	t.Helper()
	for _, s := range measure.Scatter(p.Model, c).Surfaces {
		if s.Name == surface {
			return s
		}
	}
	return measure.Share{}
}

// TestHalfPlane holds the probability of a surface against the normal integral:
// random samples within six deviations of the binomial distribution, Halton
// points within their star discrepancy, for base 2 at most (log2 n + 2)/n.
func TestHalfPlane(t *testing.T) {
	for _, c := range []struct {
		kind       model.Sampling
		place, dev float64
		n          int
	}{
		{model.Random, 0.5, 0.1, 4000}, {model.Random, 0.3, 0.2, 4000}, {model.Random, 0.2, 0.1, 4000},
		{model.LatinHypercube, 0.5, 0.1, 1000}, {model.Halton, 0.5, 0.1, 1023}, {model.Halton, 0.3, 0.2, 1023},
	} {
		p, want := halfPlane(t, model.Scatter{Name: "edge", Samples: c.n, Sampling: c.kind}, c.place, c.dev)
		got := shareOf(t, p, scattered(t, p, 3), "half")
		slack := 6 * math.Sqrt(want*(1-want)/float64(c.n))
		switch c.kind {
		case model.Halton:
			slack = (math.Log2(float64(c.n)) + 2) / float64(c.n)
		case model.LatinHypercube:
			slack = 1.5 / float64(c.n) // the parts below the bound, and half of the one that it cuts
		}
		if math.Abs(got.Share-want) > slack {
			t.Errorf("%v of %d at %g: %g, want %g within %g", c.kind, c.n, c.place, got.Share, want, slack)
		}
	}
}

// TestScatterWorkersChangeNothing: the same bytes for any number of workers.
func TestScatterWorkersChangeNothing(t *testing.T) {
	p := ring(t, model.Release{At: model.Station{Height: 1.9}}, model.Scatter{Name: "s", Samples: 500, Vary: []model.Spread{
		normal("at.height", 1.9, 0.1), {Key: "velocity.spinward", Kind: model.Uniform, P: [3]float64{-0.5, 0.5}},
		normal("body.mass", 0.1, 0.1), normal("habitat.spin", ringSpin, 0.01)}})
	var first []byte
	for _, workers := range []int{1, 2, 7} {
		told := 0
		c, err := p.Scatter(context.Background(), &p.Model.Scatters[0], study.ScatterOptions{Workers: workers, Seed: 4,
			Done: func(done, of int) { told = max(told, done) }})
		if err != nil {
			t.Fatal(err)
		}
		var b bytes.Buffer
		if err := errors.Join(table.StreamCSV(&b, measure.CloudColumns(c.Scatter), c.Rows()), measure.ScatterTable(measure.Scatter(p.Model, c)).WriteCSV(&b)); err != nil {
			t.Fatal(err)
		}
		fmt.Fprint(&b, c.Work)
		if first == nil {
			first = b.Bytes()
		}
		if !bytes.Equal(b.Bytes(), first) {
			t.Errorf("%d workers give other bytes than 1", workers)
		}
		if told != 500 {
			t.Errorf("%d workers told of %d samples", workers, told)
		}
	}
	if other := scattered(t, p, 5); other.Offset[0] == scattered(t, p, 4).Offset[0] {
		t.Error("another seed gives the same first sample")
	}
}

// TestSamplesStandAlone: sample i does not depend on how many there are.
func TestSamplesStandAlone(t *testing.T) {
	for _, kind := range []model.Sampling{model.Random, model.Halton} {
		s := model.Scatter{Name: "s", Samples: 20, Sampling: kind, Vary: []model.Spread{normal("at.height", 1.9, 0.1)}}
		few := scattered(t, ring(t, model.Release{At: model.Station{Height: 1.9}}, s), 1)
		s.Samples = 90
		many := scattered(t, ring(t, model.Release{At: model.Station{Height: 1.9}}, s), 1)
		for i, x := range few.Offset {
			if many.Offset[i] != x {
				t.Errorf("%v: sample %d: %v of 20, %v of 90", kind, i, x, many.Offset[i])
			}
		}
	}
}

// TestImpossibleSamples: what cannot be is left out, counted by its reason, and
// the others are as if alone.
func TestImpossibleSamples(t *testing.T) {
	const n = 2000
	for _, c := range []struct {
		vary model.Spread
		why  string
		want float64 // probability
	}{
		{normal("body.mass", 0.1, 0.1), "body.mass not more than 0", math.Erfc(1/math.Sqrt2) / 2},
		{normal("body.restitution", 1, 0.1), "body.restitution more than 1", 0.5},
		{normal("body.friction", 0.2, 0.1), "body.friction less than 0", math.Erfc(2/math.Sqrt2) / 2},
		{normal("at.axial", 7, 1), "is let go outside the rooms", 0.5},
		{model.Spread{Key: "at.height", Kind: model.Uniform, P: [3]float64{-0.04, 0.04}}, "is let go inside a solid", 0.5},  // the hull is 0.05 m thick
		{model.Spread{Key: "body.diameter", Kind: model.Uniform, P: [3]float64{0, 8}}, `has no room beside "floor"`, 0.525}, // its centre is at 1.9 m
	} {
		p := ring(t, model.Release{At: model.Station{Height: 1.9}}, model.Scatter{Name: "s", Samples: n, Sampling: model.LatinHypercube, Vary: []model.Spread{c.vary}})
		s := measure.Scatter(p.Model, scattered(t, p, 1))
		if len(s.LeftOut) != 1 || s.LeftOut[0].Name != c.why || math.Abs(s.LeftOut[0].Share-c.want) > 1.5/n {
			t.Errorf("%s: left out %+v, want a share %g for %q", c.vary.Key, s.LeftOut, c.want, c.why)
			continue
		}
		if s.Flown+s.LeftOut[0].Count != n || s.Flown != s.Landed || s.Spreads[0].Count != s.Landed {
			t.Errorf("%s: %d flown, %d landed, %d measured, %d left out", c.vary.Key, s.Flown, s.Landed, s.Spreads[0].Count, s.LeftOut[0].Count)
		}
	}
}

// TestVariedNumbersAct: each number that can be varied changes the landing as a
// scenario with that number does.
func TestVariedNumbersAct(t *testing.T) {
	drop := model.Release{At: model.Station{Height: 1.9}}
	high := model.Release{At: model.Station{Radius: 16, HasRadius: true}}
	thrown := model.Release{At: model.Station{Height: 1.9}, Start: model.Start{Kind: model.Thrown, Speed: 2, Heading: 0.3, Elevation: 0.5}}
	for _, c := range []struct {
		of   model.Release
		key  string
		x    float64
		like func(m *model.Model)
	}{
		{drop, "at.height", 2.5, func(m *model.Model) { m.Releases[0].At.Height = 2.5 }},
		{drop, "at.axial", 1.5, func(m *model.Model) { m.Releases[0].At.Axial = 1.5 }},
		{drop, "at.spinward", 1.5, func(m *model.Model) { m.Releases[0].At.Spinward.Value = 1.5 }},
		{high, "at.radius", 15, func(m *model.Model) { m.Releases[0].At.Radius = 15 }},
		{drop, "velocity.up", 1, func(m *model.Model) { m.Releases[0].Start = model.Start{Kind: model.Velocity, VUp: 1} }},
		{drop, "velocity.axial", 1, func(m *model.Model) { m.Releases[0].Start = model.Start{Kind: model.Velocity, VAxial: 1} }},
		{thrown, "throw.speed", 3, func(m *model.Model) { m.Releases[0].Start.Speed = 3 }},
		{thrown, "throw.heading", 1, func(m *model.Model) { m.Releases[0].Start.Heading = 1 }},
		{thrown, "throw.elevation", 1, func(m *model.Model) { m.Releases[0].Start.Elevation = 1 }},
		{drop, "body.mass", 3, func(m *model.Model) { m.Bodies[0].Mass = 3 }},
		{drop, "body.diameter", 0.3, func(m *model.Model) { m.Bodies[0].Diameter = 0.3 }},
		{drop, "habitat.spin", 0.6, func(m *model.Model) { m.Habitat.Spin = 0.6 }},
		{drop, "habitat.spin", -0.6, func(m *model.Model) { m.Habitat.Spin = -0.6 }},
	} {
		p := ring(t, c.of, model.Scatter{Name: "s", Samples: 1, Vary: []model.Spread{{Key: c.key, Kind: model.Empirical, Data: []float64{c.x}}}})
		got := scattered(t, p, 1)
		in := *p.Model
		in.Decks, in.Scatters = nil, nil
		in.Releases, in.Bodies = append([]model.Release(nil), in.Releases...), append([]model.Body(nil), in.Bodies...)
		c.like(&in)
		m, problems := model.New(in)
		if problems != nil {
			t.Fatal(problems)
		}
		q, problems := study.Prepare(m)
		if problems != nil {
			t.Fatal(problems)
		}
		results, err := q.Run(context.Background(), study.Options{Workers: 1})
		if err != nil {
			t.Fatal(err)
		}
		if l := &results[0].Landing; got.Offset[0] != l.Offset || got.OffsetAxial[0] != l.OffsetAxial || got.Time[0] != l.Time || got.Speed[0] != l.Speed || got.Energy[0] != l.Energy {
			t.Errorf("%s = %g: offset %g, %g, time %g, speed %g, energy %g; alone %g, %g, %g, %g, %g", c.key, c.x,
				got.Offset[0], got.OffsetAxial[0], got.Time[0], got.Speed[0], got.Energy[0], l.Offset, l.OffsetAxial, l.Time, l.Speed, l.Energy)
		}
	}
}

// TestPlanPlaces: landings on the plan count from plumb under the nominal
// release: a release moved along the deck and axially lands moved by as much.
func TestPlanPlaces(t *testing.T) {
	p := ring(t, model.Release{At: model.Station{Height: 1.9, Axial: 1}}, model.Scatter{Name: "s", Samples: 50,
		Vary: []model.Spread{normal("at.spinward", 0, 1), normal("at.axial", 1, 0.5)}})
	c := scattered(t, p, 1)
	drawn := make([]float64, 2)
	o, _, _ := straight([4]float64{1.9, 0, 0, 0})
	for i := range c.Offset {
		c.Draw(i, drawn)
		if math.Abs(c.Spinward[i]-drawn[0]-o) > 1e-9 || math.Abs(c.Axial[i]-(drawn[1]-1)) > 1e-12 {
			t.Errorf("sample %d let go at (%g, %g) lands at (%g, %g)", i, drawn[0], drawn[1]-1, c.Spinward[i], c.Axial[i])
		}
	}
}

// TestSamplingGain: for a landing that is nearly a sum of functions of one
// number each, the means of Latin hypercubes spread at least five times less
// than those of random samples (Stein, Technometrics 29, 1987), and the mean of
// Halton points is off by less than half the deviation of as many random ones.
func TestSamplingGain(t *testing.T) {
	const n, repeats, more = 100, 25, 1000
	nominal := [4]float64{1.9, 0.4, 0.7, 1.1}
	mean := func(kind model.Sampling, n int, seed uint64) float64 {
		p := ring(t, model.Release{At: model.Station{Height: nominal[0]}, Start: model.Start{Kind: model.Velocity, VSpinward: nominal[1], VAxial: nominal[2], VUp: nominal[3]}},
			model.Scatter{Name: "gain", Samples: n, Sampling: kind, Vary: []model.Spread{normal("at.height", nominal[0], 0.1), normal("velocity.spinward", nominal[1], 0.2), normal("velocity.up", nominal[3], 0.1)}})
		return stat.Mean(scattered(t, p, seed).Offset, nil)
	}
	var random, latin []float64
	for seed := range uint64(repeats) {
		random, latin = append(random, mean(model.Random, n, seed)), append(latin, mean(model.LatinHypercube, n, seed))
	}
	dev, off := stat.StdDev(random, nil), math.Abs(mean(model.Halton, more, 0)-stat.Mean(latin, nil))
	t.Logf("means of %d samples spread by %.3g m, of a Latin hypercube by %.3g m; that of %d Halton points is off by %.3g m", n, dev, stat.StdDev(latin, nil), more, off)
	if stat.StdDev(latin, nil) > dev/5 {
		t.Error("a Latin hypercube gains too little")
	}
	if off > dev*math.Sqrt(n)/math.Sqrt(more)/2 {
		t.Error("Halton points gain too little")
	}
}

// TestStopsAtPrecision: a scatter with a stated precision takes as many samples
// as that needs and not many more, the same for any number of workers, and they
// are the first of those that it would take.
func TestStopsAtPrecision(t *testing.T) {
	s := model.Scatter{Name: "s", Samples: 20_000, Vary: []model.Spread{normal("velocity.spinward", 0, 0.2)}}
	r := model.Release{At: model.Station{Height: 1.9}}
	all := scattered(t, ring(t, r, model.Scatter{Name: "s", Samples: 3000, Vary: s.Vary}), 1)
	dev := stat.StdDev(all.Offset, nil)
	for _, c := range []struct {
		precision, share float64
		need             float64 // samples
	}{
		{precision: 1.96 * dev / math.Sqrt(1000), need: 1000},
		{precision: 1, need: 1},
		{share: 0.002, need: 956}, // of a share of 1: z^2/(n+z^2) wide (Wilson)
		{precision: 1e-9, need: 20_000},
	} {
		if s.Precision, s.SharePrecision = c.precision, c.share; c.precision == 1e-9 {
			s.Samples = 1000
			c.need = 1000
		}
		p := ring(t, r, s)
		var first int
		for _, workers := range []int{1, 7} {
			got, err := p.Scatter(context.Background(), &p.Model.Scatters[0], study.ScatterOptions{Workers: workers, Seed: 1})
			if err != nil {
				t.Fatal(err)
			}
			n := len(got.Fates)
			// It looks after 400 samples and then after a quarter more each; the
			// deviation itself is known to a few in a hundred.
			if least, most := 0.9*c.need, max(400, 1.4*c.need); float64(n) < least || float64(n) > most {
				t.Errorf("precision %g, of shares %g: %d samples, want about %g", c.precision, c.share, n, c.need)
			}
			if first == 0 {
				first = n
			}
			if n != first || got.Offset[n-1] != all.Offset[n-1] || len(got.Offset) != n {
				t.Errorf("precision %g, of shares %g: %d workers take %d samples, 1 takes %d, or others", c.precision, c.share, workers, n, first)
			}
		}
	}
}

func TestScatterStops(t *testing.T) {
	p := ring(t, model.Release{At: model.Station{Height: 1.9}}, model.Scatter{Name: "s", Samples: 2e5, Vary: []model.Spread{normal("at.height", 1.9, 0.1)}})
	ctx, cancel := context.WithCancel(context.Background())
	_, err := p.Scatter(ctx, &p.Model.Scatters[0], study.ScatterOptions{Workers: 2, Done: func(int, int) { cancel() }})
	if !errors.Is(err, context.Canceled) {
		t.Errorf("error %v", err)
	}
}

func TestScatterOfNothing(t *testing.T) {
	p := ring(t, model.Release{At: model.Station{Height: 1.9}}, model.Scatter{Name: "s", Samples: 1})
	_, err := p.Scatter(context.Background(), &model.Scatter{Of: "x"}, study.ScatterOptions{Workers: 1})
	if err == nil || !strings.Contains(err.Error(), `"x"`) {
		t.Errorf("error %v", err)
	}
}

func BenchmarkScatter(b *testing.B) {
	const n = 1000
	p := ring(b, model.Release{At: model.Station{Height: 1.9}}, model.Scatter{Name: "s", Samples: n, Vary: []model.Spread{normal("at.height", 1.9, 0.1), normal("velocity.spinward", 0, 0.2)}})
	b.ReportAllocs()
	for b.Loop() {
		c, err := p.Scatter(context.Background(), &p.Model.Scatters[0], study.ScatterOptions{Workers: 1})
		if err != nil || c.Fates[0] != measure.ShotLanded {
			b.Fatal(err)
		}
	}
	b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N)/n, "ns/sample")
}
