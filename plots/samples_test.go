package plots

import (
	"fmt"
	"math"
	"slices"
)

// fall is a release in vacuum by its closed form, in both frames: the straight inertial
// path, turned back. The release is h above a deck of radius r at spin w, with
// velocity (vs, vu) spinward and up relative to the habitat.
type fall struct {
	side, inertial []TrackPoint
	land, landI    Point
	offset, time   float64
}

func newFall(r, h, w, vs, vu, body float64) fall {
	const steps = 300
	r0 := r - h
	vx, vy := w*r0+vs, vu
	a, b, c := vx*vx+vy*vy, -2*r0*vy, r0*r0-(r-body)*(r-body)
	f := fall{time: (-b + math.Sqrt(b*b-4*a*c)) / (2 * a)}
	angle, before := 0.0, -math.Pi/2
	for i := 0; i <= steps; i++ {
		t := f.time * float64(i) / steps
		p := Point{vx * t, vy*t - r0}
		q := p.turned(-w * t)
		now := math.Atan2(q.Y, q.X)
		angle += math.Remainder(now-before, 2*math.Pi)
		before = now
		f.inertial = append(f.inertial, TrackPoint{T: t, X: p.X, Y: p.Y})
		f.side = append(f.side, TrackPoint{T: t, X: q.X, Y: q.Y + r})
		f.landI, f.land = p, Point{q.X, q.Y + r}
	}
	f.offset = angle * r
	return f
}

const sampleSpin = 0.5445 // rad/s, 5.2 rpm

// ringOutlines is a ring with a hull, a ceiling and a bench; lift moves its axis to (0, lift).
func ringOutlines(r, lift float64) []Outline {
	c := Point{0, lift}
	bench := Polygon(Point{-2, lift - r}, Point{-1, lift - r}, Point{-1, lift - r + 0.9}, Point{-2, lift - r + 0.9})
	return []Outline{
		{Kind: Hull, Name: "hull", Path: []Segment{Arc(c, r, -1.5*math.Pi, 0.5*math.Pi)}},
		{Kind: Deck, Name: "ceiling", Path: Circle(c, 0.7*r)},
		{Kind: Fixture, Name: "bench", Path: bench, Closed: true},
	}
}

func sideSpec(r, h, w, vs, vu, body float64) SideViewSpec {
	f := newFall(r, h, w, vs, vu, body)
	return SideViewSpec{
		Title: "Side view of a sample", Desc: "A release in vacuum.", Notes: "Vacuum. Every body is a sphere here.",
		Spin: w, Deck: r, Outlines: ringOutlines(r, r), Track: f.side, Body: body,
		Uniform: []Point{{0, h}, {0, body}}, Landing: &f.land, Surface: "floor",
		Offset: f.offset, Deflection: f.offset,
	}
}

func inertialSpec(r, h, w, vs, vu, body float64) InertialViewSpec {
	f := newFall(r, h, w, vs, vu, body)
	return InertialViewSpec{
		Title: "Inertial view of a sample", Desc: "A release in vacuum.", Notes: "Vacuum.",
		Spin: w, Outlines: ringOutlines(r, 0), Foot: Point{0, -r}, LandingAngle: w * f.time,
		Path: f.inertial, Body: body, Landing: &f.landI, Surface: "floor", Offset: f.offset,
	}
}

// slidSpec goes on after its landing: it slides, and rests.
func slidSpec() SideViewSpec {
	s := sideSpec(18, 1.9, sampleSpin, 0, 0, 0.03)
	end := s.Track[len(s.Track)-1]
	from := math.Atan2(end.X, 18-end.Y)
	for i := range 21 {
		a := from - 0.05*float64(i)/20
		q := polar(Point{0, 18}, 17.97, a-math.Pi/2)
		s.Track = append(s.Track, TrackPoint{T: end.T + 0.04*float64(i), X: q.X, Y: q.Y, Phase: "slide"})
	}
	s.Track[len(s.Track)-1].Phase = "rest"
	q := s.Track[len(s.Track)-1]
	s.Rest = &Point{q.X, q.Y}
	return s
}

// thrownSpec has an offset and a deflection that differ.
func thrownSpec() SideViewSpec {
	s := sideSpec(18, 1.5, sampleSpin, 3, 3, 0.1)
	s.Uniform = nil
	for i := range 41 {
		u := float64(i) / 40
		q := polar(Point{0, 18}, 18-(1.5*(1-u)+6*u*(1-u)+0.1*u), 4.4*u/18-math.Pi/2)
		s.Uniform = append(s.Uniform, q)
	}
	s.Deflection = s.Offset - 4.4
	return s
}

func hairSpec() SideViewSpec {
	s := sideSpec(2.3e6, 1.9, 0, 0, 1, 0.03)
	s.Spin, s.Outlines, s.Track = 0.00206, nil, nil
	for i := range 101 {
		u := float64(i) / 100
		s.Track = append(s.Track, TrackPoint{T: 0.618 * u, X: -1.59e-3 * u * u * u, Y: 1.9 - 1.87*u*u})
	}
	s.Landing = &Point{-1.59e-3, 0.03}
	s.Offset, s.Deflection = -1.59e-3, -1.59e-3
	return s
}

func flatSpec() SideViewSpec {
	s := sideSpec(250, 1.2, -0.2, 0, 0, 0.005)
	s.Deck = 0
	s.Outlines = []Outline{{Kind: Deck, Name: "cabin deck", Path: Box(Point{-5, -0.1}, Point{5, 0}), Closed: true}}
	return s
}

// throughSpec falls through an opening of an upper deck onto the floor below.
func throughSpec() SideViewSpec {
	const r, upper = 18, 15.4
	s := sideSpec(r, 4, sampleSpin, 0, 0, 0.03)
	s.Deck, s.Outlines = upper, nil
	for i := range s.Track {
		s.Track[i].Y -= r - upper
	}
	s.Landing.Y -= r - upper
	s.Uniform = nil
	s.Offset *= upper / r
	s.Deflection = math.NaN()
	c := Point{0, upper}
	s.Outlines = append(s.Outlines, Outline{Kind: Hull, Name: "hull", Path: Circle(c, r)},
		Outline{Kind: Deck, Name: "upper", Closed: true, Path: Sector(c, upper, upper+0.05, 0.05-math.Pi/2, 1)},
		Outline{Kind: Deck, Name: "upper", Closed: true, Path: Sector(c, upper, upper+0.05, -3, -0.1-math.Pi/2)})
	return s
}

func planSpec() DeckPlanSpec {
	return DeckPlanSpec{
		Title: "Deck plan of a sample", Desc: "A deck with landings.", Notes: "Seen from above.",
		Spin: sampleSpin, Radius: 18, Round: true, From: Point{0, -7}, To: Point{0, 7},
		Openings: []PlanOpening{
			{Name: "hatch 2", Centre: Point{3, 0}, Size: Point{0.9, 0.9}, Coaming: true},
			{Name: "hatch 3", Centre: Point{-1, -3}, Size: Point{0.9, 0.9}, Closed: true},
		},
		Fixtures: []PlanFixture{{Name: "bench", Path: []Point{{-2.6, 1.65}, {-1.4, 1.65}, {-1.4, 2.35}, {-2.6, 2.35}}}},
		Releases: []PlanRelease{
			{Name: "wrench from the locker", At: Point{0, 1.2}, Landing: &Point{-0.639, 1.2}, Surface: "floor"},
			{Name: "pen from the shelf", At: Point{1, 1.2}, Landing: &Point{0.7, 1.2}, Surface: "floor"},
			{Name: "ball to the far bench", At: Point{0, -1}, Landing: &Point{4, 2}, Surface: "bench"},
			{Name: "lost cap", At: Point{-3, -2}},
			{Name: "second pen", At: Point{1, 1.25}, Landing: &Point{0.7, 1.22}, Surface: "floor"},
		},
	}
}

func manySpec() DeckPlanSpec {
	s := planSpec()
	s.Round, s.From.X, s.To.X = false, -12, 12
	for i := range 80 {
		x, y := math.Mod(float64(i)*3.77, 20)-10, math.Mod(float64(i)*5.11, 12)-6
		s.Releases = append(s.Releases, PlanRelease{Name: fmt.Sprintf("stowed item %d", i), At: Point{x, y}, Landing: &Point{x - 0.3, y}})
	}
	return s
}

func deflectionSpec() DeflectionChartSpec {
	s := DeflectionChartSpec{Title: "Deflection of samples", Desc: "Drops.", Spin: sampleSpin}
	for _, h := range []float64{1.2, 1.9, 3} {
		d := DeflectionSeries{Name: "drop from " + length(h)}
		for _, p := range newFall(18, h, sampleSpin, 0, 0, 0.03).side {
			d.Time = append(d.Time, p.T)
			d.Height = append(d.Height, 18-math.Hypot(p.X, 18-p.Y))
			d.Deflection = append(d.Deflection, 18*math.Atan2(p.X, 18-p.Y))
		}
		d.Deflection[40] = math.NaN()
		s.Series = append(s.Series, d)
	}
	return s
}

func loadsSpec() LoadsChartSpec {
	s := LoadsChartSpec{
		Title: "Loads of a sample", Desc: "A walk and a climb.", Spin: sampleSpin,
		Legs: []LegSpan{{"walk spinward", 0, 6}, {"stand", 6, 7}, {"turn head", 7, 7.5}, {"stand", 7.5, 9}, {"climb", 9, 18}},
	}
	for i := range 181 {
		t := float64(i) / 10
		g := 0.55 - 0.01*math.Max(0, t-9)
		side := 32 * math.Max(0, math.Min(1, t-9))
		s.Time = append(s.Time, t)
		s.GravityFeet = append(s.GravityFeet, g)
		s.GravityWaist = append(s.GravityWaist, 0.95*g)
		s.GravityHead = append(s.GravityHead, 0.9*g)
		s.Weight = append(s.Weight, 800*g)
		s.SideSpinward = append(s.SideSpinward, side)
		s.SideAxial = append(s.SideAxial, 0)
		s.Friction = append(s.Friction, side/800/g)
		s.HeadCross = append(s.HeadCross, math.Max(0, math.Sin((t-7)*2*math.Pi))*0.5)
	}
	s.Weight[50] = math.NaN()
	return s
}

// sampleFigure is one of the figures that the tests look at.
type sampleFigure struct {
	name string
	make func() (*Figure, error)
}

func samples() []sampleFigure {
	side := func(name string, s SideViewSpec) sampleFigure {
		return sampleFigure{"side " + name, func() (*Figure, error) { return SideView(s) }}
	}
	inertial := func(name string, s InertialViewSpec) sampleFigure {
		return sampleFigure{"inertial " + name, func() (*Figure, error) { return InertialView(s) }}
	}
	deck := func(name string, s DeckPlanSpec) sampleFigure {
		return sampleFigure{"plan " + name, func() (*Figure, error) { return DeckPlan(s) }}
	}
	lapped := planSpec()
	lapped.Releases = append(lapped.Releases, PlanRelease{Name: "hub bolt", At: Point{10, 3}, Landing: &Point{-286, 3}})
	empty := planSpec()
	empty.Releases = nil
	long := loadsSpec()
	long.Legs = nil
	for i := range 18 {
		long.Legs = append(long.Legs, LegSpan{fmt.Sprintf("climb ladder %d of the spoke", i), float64(i), float64(i + 1)})
	}
	return append(slices.Concat(pathSamples(), scatterSamples(), mapSamples(), throwSamples(), contourSamples()), []sampleFigure{
		side("drop", sideSpec(18, 1.9, sampleSpin, 0, 0, 0.03)), side("slid", slidSpec()), side("thrown", thrownSpec()),
		side("half round", sideSpec(18, 1.5, sampleSpin, -7, 3.5, 0.1)), side("near axis", sideSpec(18, 17, sampleSpin, 0, 0, 0.01)),
		side("hair", hairSpec()), side("flat", flatSpec()), side("through", throughSpec()), side("negative spin", sideSpec(18, 1.9, -sampleSpin, 0, 0, 0)),
		inertial("drop", inertialSpec(18, 1.9, sampleSpin, 0, 0, 0.03)), inertial("half round", inertialSpec(18, 1.5, sampleSpin, -7, 3.5, 0.1)),
		inertial("near axis", inertialSpec(18, 17, sampleSpin, 0, 0, 0.01)), inertial("negative spin", inertialSpec(18, 1.5, -sampleSpin, -3, 2.5, 0.1)),
		deck("cropped", planSpec()), deck("lapped", lapped), deck("empty", empty), deck("many", manySpec()),
		{"deflection", func() (*Figure, error) { return DeflectionChart(deflectionSpec()) }},
		{"loads", func() (*Figure, error) { return LoadsChart(loadsSpec()) }},
		{"loads of many legs", func() (*Figure, error) { return LoadsChart(long) }},
	}...)
}
