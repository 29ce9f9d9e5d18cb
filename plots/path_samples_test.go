package plots

import (
	"fmt"
	"math"
)

// sampleCrew is a person in a ring of radius r (m) about (0, r) at spin w (rad/s).
type sampleCrew struct{ r, w float64 }

const (
	sampleMass    = 84.0 // kg
	sampleStature = 1.78 // m
	sampleHead    = 0.93 // of the stature
	sampleWaist   = 0.55
)

// station is the person upright at height h and arc angle phi, moving at v (m/s); tall is
// the height of the head. The force is that which holds a mass at the waist: design
// section 7, item 6, in the plane.
func (c sampleCrew) station(t, phi, h, tall float64, v Point, leg string) PathStation {
	axis := Point{0, c.r}
	at := func(up float64) Point { return polar(axis, c.r-h-up, phi-math.Pi/2) }
	out := at(sampleWaist * sampleStature).sub(axis)
	coriolis := Point{-v.Y, v.X}.scale(2 * c.w)
	force := out.scale(c.w * c.w).sub(coriolis).scale(sampleMass)
	return PathStation{T: t, Feet: at(0), Head: at(tall), Force: force, Leg: leg}
}

const sampleTall = sampleHead * sampleStature

// spokePath goes down 25 m of a spoke, from near the hub to the floor.
func spokePath(w float64) PathViewSpec {
	const r, from, speed = 30.0, 25.0, 0.4
	c := sampleCrew{r, w}
	axis := Point{0, r}
	wall := func(x float64) Outline {
		return Outline{Kind: Hull, Name: "spoke B", Path: []Segment{Line(Point{x, 3}, Point{x, r - 4})}}
	}
	s := PathViewSpec{
		Title: "Down spoke B", Desc: "A descent.", Notes: "The person is a line from the feet to the head.", Spin: w, Deck: r,
		Outlines: []Outline{
			{Kind: Hull, Name: "floor", Path: Circle(axis, r)}, {Kind: Deck, Name: "ceiling", Path: Circle(axis, r-3)},
			{Kind: Hull, Name: "hub", Path: Circle(axis, 4)}, wall(-0.8), wall(0.8),
		},
		Near: &PathNear{T: 30, At: Point{0, 13}, Gap: 0.32, Surface: "spoke B"},
	}
	for i := range 101 {
		s.Way = append(s.Way, Point{0, from * (1 - float64(i)/100)})
	}
	for i := range 8 {
		u, v, leg := float64(i)/7, Point{0, -speed}, "descend"
		if i == 0 || i == 7 {
			v = Point{}
		}
		s.Stations = append(s.Stations, c.station(u*from/speed, 0, from*(1-u), sampleTall, v, leg))
	}
	return s
}

// ringPath walks round a ring by an angle.
func ringPath(w, angle float64) PathViewSpec {
	const r, speed = 18.0, 1.2
	c := sampleCrew{r, w}
	s := PathViewSpec{Title: "Round the galley ring", Desc: "A walk.", Spin: w, Deck: r, Outlines: ringOutlines(r, r)}
	for i := range 201 {
		s.Way = append(s.Way, c.station(0, angle*float64(i)/200, 0, 0, Point{}, "").Feet)
	}
	for i := range 9 {
		phi := angle * float64(i) / 8
		v := Point{math.Cos(phi), math.Sin(phi)}.scale(math.Copysign(speed, angle))
		s.Stations = append(s.Stations, c.station(math.Abs(phi)*r/speed, phi, 0, sampleTall, v, "walk"))
	}
	return s
}

// climbPath walks to a hatch, and climbs through it to the deck above.
func climbPath() PathViewSpec {
	const r, upper, to, up = 18.0, 15.4, 3.0, 2.6
	c := sampleCrew{r, sampleSpin}
	axis, hatch := Point{0, r}, to/r-math.Pi/2
	s := PathViewSpec{
		Title: "To the upper deck", Desc: "A walk and a climb.", Spin: sampleSpin, Deck: r,
		Outlines: []Outline{
			{Kind: Hull, Name: "hull", Path: Circle(axis, r)},
			{Kind: Deck, Name: "upper deck", Closed: true, Path: Sector(axis, upper, upper+0.05, hatch+0.03, 0)},
			{Kind: Deck, Name: "upper deck", Closed: true, Path: Sector(axis, upper, upper+0.05, -math.Pi, hatch-0.03)},
		},
		Near: &PathNear{T: 6.4, At: polar(axis, upper, hatch), Gap: -0.04, Surface: "upper deck"},
	}
	add := func(t, along, h float64, v Point, leg string) {
		s.Stations = append(s.Stations, c.station(t, along/r, h, sampleTall, v, leg))
	}
	for i := range 31 {
		s.Way = append(s.Way, c.station(0, to/r*float64(i)/30, 0, 0, Point{}, "").Feet)
	}
	s.Way = append(s.Way, c.station(0, to/r, up, 0, Point{}, "").Feet)
	add(0, 0, 0, Point{}, "walk")
	add(1.5, 1.5, 0, Point{1.2, 0.1}, "walk")
	add(3, 3, 0, Point{}, "walk")
	add(3, 3, 0, Point{}, "turn head")
	add(4, 3, 0, Point{}, "turn head")
	add(7, 3, 1.2, Point{-0.06, 0.35}, "climb")
	add(11, 3, up, Point{}, "stand")
	return s
}

// standingPath gets up from a seat, and stays where it is.
func standingPath() PathViewSpec {
	c := sampleCrew{18, sampleSpin}
	s := PathViewSpec{Title: "Standing up", Desc: "A person gets up.", Spin: sampleSpin, Deck: 18, Outlines: ringOutlines(18, 18), Way: []Point{{}}}
	for i, tall := range []float64{0.9, 1.1, 1.4, sampleTall, sampleTall} {
		leg := "stand up"
		if i == 4 {
			leg = "stand"
		}
		st := c.station(0.5*float64(i), 0, 0, tall, Point{0, 0.3}, leg)
		st.Force = st.Force.scale(1 + 0.1*float64(i%3))
		s.Stations = append(s.Stations, st)
	}
	return s
}

// flatPath walks in a cabin with a flat floor, to and fro.
func flatPath() PathViewSpec {
	s := PathViewSpec{Title: "Across the cabin", Desc: "A walk.", Spin: -0.2, Way: []Point{{0, 0}, {4, 0}, {0, 0}}}
	for i := range 5 {
		x := 4 - 2*math.Abs(float64(i)-2)
		s.Stations = append(s.Stations, PathStation{T: 2.5 * float64(i), Feet: Point{x, 0}, Head: Point{x, 1.66}, Force: Point{30 * float64(2-i), -700}, Leg: "walk " + fmt.Sprint(i/3)})
	}
	return s
}

// hubPath has no station with weight, far above its deck.
func hubPath() PathViewSpec {
	s := PathViewSpec{Title: "Across the hub", Desc: "A crossing.", Spin: 0.2, Deck: 250, Way: []Point{{0, 247}, {3, 250}, {0, 253}}}
	s.Stations = []PathStation{{T: 2, Feet: Point{3, 250}, Head: Point{1.4, 250}, Force: Point{1e-14, 0}, Leg: "float"}}
	return s
}

func pathSamples() []sampleFigure {
	path := func(name string, s PathViewSpec) sampleFigure {
		return sampleFigure{"path " + name, func() (*Figure, error) { return PathView(s) }}
	}
	bare := ringPath(sampleSpin, 0.5)
	bare.Outlines, bare.Stations = nil, nil
	walked := planSpec()
	walked.Paths = []PlanPath{
		{Name: "to the upper deck", Points: []Point{{-6, 0}, {-3, 2.8}, {3, 0.9}}},
		{Name: "up the ladder", Points: []Point{{5, -4}}},
	}
	round := DeckPlanSpec{Title: "Walks", Desc: "Walks on a deck.", Spin: sampleSpin, Radius: 18, Round: true, From: Point{0, -7}, To: Point{0, 7},
		Paths: []PlanPath{{Name: "night round", Points: []Point{{10, 1}, {40, 3}, {160, -3}}}}}
	return []sampleFigure{
		path("down a spoke", spokePath(0.4)), path("down a spoke, negative spin", spokePath(-0.4)),
		path("half round", ringPath(sampleSpin, -math.Pi)), path("lap and a half", ringPath(sampleSpin, 3*math.Pi)),
		path("climb", climbPath()), path("standing up", standingPath()), path("flat", flatPath()), path("hub", hubPath()), path("bare", bare),
		{"plan with paths", func() (*Figure, error) { return DeckPlan(walked) }},
		{"plan of a long walk", func() (*Figure, error) { return DeckPlan(round) }},
	}
}
