package main

import (
	"fmt"
	"math"
	"slices"

	"offplumb/plots"
	"offplumb/sim/flight"
	"offplumb/sim/measure"
	"offplumb/sim/model"
	"offplumb/sim/table"
)

// seriesShown bounds the releases in one chart: as many as can be told apart.
const seriesShown = 6

// sharedFigures are those that show several releases.
func (j *job) sharedFigures() []drawing {
	var out []drawing
	var shown []int
	for i := range j.results {
		if r := &j.results[i]; j.tracked(i) && r.Landing.Uniform.Lands && r.Landing.Time > 0 && r.Track.Left < 0 {
			shown = append(shown, i)
		}
	}
	for n := 0; n*seriesShown < len(shown); n++ {
		file := "deflection"
		if n > 0 {
			file = fmt.Sprintf("deflection-%d", n+1)
		}
		part := shown[n*seriesShown : min(len(shown), (n+1)*seriesShown)]
		out = append(out, drawing{file: file, of: "apparent deflection", name: "", make: func() (*plots.Figure, error) { return j.deflectionChart("", part) }})
	}
	var names table.Namer
	for _, p := range j.plans() {
		out = append(out, drawing{file: "plan-" + names.Name(p.ground.Name), of: "deck plan", name: p.ground.Name, make: func() (*plots.Figure, error) { return j.deckPlan(p.title(), p) }})
	}
	return out
}

// plan is a floor with the releases over it.
type plan struct {
	ground measure.Ground
	deck   int // of a deck about the axis
	over   []int
	paths  []int // crew paths; nil: all that start on the deck
}

// title says what a plan shows.
func (p *plan) title() string {
	if len(p.over) == 0 {
		return fmt.Sprintf("Crew paths on the plan of %q", p.ground.Name)
	}
	return fmt.Sprintf("Landings on the plan of %q", p.ground.Name)
}

// plans lists the floors that releases are over, in the order of the releases.
func (j *job) plans() []*plan {
	var out []*plan
	m := j.model()
	for i := range j.results {
		if !j.results[i].Finished() || j.inSeries(j.Lets[i].Release.Name) {
			continue
		}
		let := &j.Lets[i]
		if m.IsOutside(let.Local.Pos) {
			continue // it is over no floor
		}
		d := m.DeckBeneath(let.Place.Polar)
		g := measure.GroundAt(m, let.Place.Polar, d)
		k := slices.IndexFunc(out, func(p *plan) bool { return p.ground.Name == g.Name })
		if k < 0 {
			k = len(out)
			out = append(out, &plan{ground: g, deck: d})
		}
		out[k].over = append(out[k].over, i)
	}
	return j.pathPlans(out)
}

// deflectionChart draws what releases are off from uniform gravity; a title of its
// own may be empty.
func (j *job) deflectionChart(title string, which []int) (*plots.Figure, error) {
	spec := plots.DeflectionChartSpec{Title: title, Spin: j.model().Habitat.Spin,
		Notes: "Deck offset less that of the uniform-gravity path at the same moment, or at its landing once it has landed; spinward positive."}
	words := ""
	for _, i := range which {
		r := &j.results[i]
		spec.Series = append(spec.Series, j.deflection(r.Track, &r.Landing))
		words += " " + sentence(&r.Landing) + "."
	}
	switch {
	case title != "":
	case len(which) > 1:
		spec.Title = "Apparent deflection against height and time"
	default:
		spec.Title = j.results[which[0]].Landing.Release + ": apparent deflection against height and time"
	}
	spec.Desc = described("Apparent deflection of each release as it falls.%s", words)
	return plots.DeflectionChart(spec)
}

// deflection follows one release: the arc gone round, less that of the
// uniform-gravity path at the same time and, after that has landed, at its
// landing.
func (j *job) deflection(t *flight.Track, l *measure.Landing) plots.DeflectionSeries {
	g := measure.GroundOf(j.model(), t)
	out := plots.DeflectionSeries{Name: l.Release}
	for _, s := range j.seenFrom(t, l.Time) {
		u, _, _ := l.Uniform.At(math.Min(s.t, l.Uniform.Time))
		out.Time = append(out.Time, s.t)
		_, _, h := g.Place(s.pos, s.place.Phi)
		out.Height = append(out.Height, h)
		out.Deflection = append(out.Deflection, g.Offset(s.place.Phi)-u)
	}
	// A landing that comes at another time than that of the uniform-gravity path is
	// compared with a place that no moment of the chart shows.
	if last := out.Deflection[len(out.Deflection)-1]; plots.SignedLength(last) == plots.SignedLength(l.Deflection) {
		out.AtLanding = l.Deflection
	}
	return out
}

// pathPlans adds the decks and flat floors that crew paths start on.
func (j *job) pathPlans(out []*plan) []*plan {
	for i := range j.paths {
		g := j.groundOfPath(i)
		if j.paths[i].skipped || !j.paths[i].roams() || slices.ContainsFunc(out, func(p *plan) bool { return p.ground.Name == g.Name }) {
			continue
		}
		out = append(out, &plan{ground: g, deck: j.paths[i].plan.Deck})
	}
	return out
}

func (j *job) deckPlan(title string, p *plan) (*plots.Figure, error) {
	m := j.model()
	spec := plots.DeckPlanSpec{Title: title, Spin: m.Habitat.Spin,
		Notes: fromAbove(p.ground.Flat) + " Open mark: plumb under the release. Numbered mark: plumb under the landing."}
	if f := p.ground.Flat; f != nil {
		j.flatSheet(&spec, f)
		spec.Paths = j.planPaths(p.deck, f)
	} else {
		j.deckSheet(&spec, &m.Decks[p.deck], p.deck)
	}
	if p.paths != nil {
		spec.Paths = j.waysOf(p.paths)
	}
	words := ""
	for _, i := range p.over {
		spec.Releases = append(spec.Releases, j.planRelease(i, p))
		words += " " + sentence(&j.results[i].Landing) + "."
	}
	if len(p.over) > rowsShown {
		words = fmt.Sprintf(" %d releases.", len(p.over))
	}
	spec.Desc = described("Plan of %q with the landings.%s", p.ground.Name, words)
	return plots.DeckPlan(spec)
}

// deckSheet fills in a deck about the axis: its extent, openings and fixtures.
func (j *job) deckSheet(spec *plots.DeckPlanSpec, deck *model.Deck, d int) {
	spec.Radius, spec.Round = deck.Radius, deck.Whole
	if !math.IsInf(deck.Axial[0], 0) {
		spec.From.Y, spec.To.Y = deck.Axial[0], deck.Axial[1]
	}
	if !deck.Whole {
		spec.From.X, spec.To.X = deck.Radius*deck.From.Angle(deck.Radius), deck.Radius*deck.To.Angle(deck.Radius)
	}
	for i := range deck.Openings {
		o := &deck.Openings[i]
		spec.Openings = append(spec.Openings, plots.PlanOpening{Name: o.Name, Centre: plots.Point{X: deck.Radius * o.Spinward.Angle(deck.Radius), Y: o.Axial},
			Size: plots.Point{X: o.Size[0], Y: o.Size[1]}, Coaming: o.Coaming > 0, Closed: o.Closed})
	}
	spec.Fixtures = j.footprints(d)
	spec.Paths = j.planPaths(d, nil)
}

func (j *job) planRelease(i int, p *plan) plots.PlanRelease {
	let, l := &j.Lets[i], &j.results[i].Landing
	g := measure.GroundAt(j.model(), let.Place.Polar, p.deck)
	out := plots.PlanRelease{Name: l.Release, Surface: l.Surface, At: plots.Point{X: g.Radius * let.Place.Phi, Y: let.Place.Z}}
	if f := g.Flat; f != nil {
		out.At = plots.Point{X: f.Radius * math.Tan(let.Place.Phi-f.Phi), Y: let.Place.Z - f.Z}
	}
	if l.Outcome == flight.Landed && !math.IsNaN(l.Offset) {
		out.Landing = &plots.Point{X: out.At.X + l.Offset, Y: out.At.Y + l.OffsetAxial}
	}
	return out
}

// footprints gives what stands on a deck.
func (j *job) footprints(d int) []plots.PlanFixture {
	m := j.model()
	deck := m.Decks[d].Radius
	var out []plots.PlanFixture
	for i := range m.Fixtures {
		f := &m.Fixtures[i]
		if f.Kind != model.Box {
			out = append(out, wallPrint(m, f, d)...)
			continue
		}
		p, err := m.Resolve(f.At)
		if err != nil || p.Deck != d {
			continue
		}
		out = append(out, plots.PlanFixture{Name: f.Name, Path: boxPrint(f, p, deck)})
	}
	return out
}

// boxPrint gives the corners of a box, seen from the axis.
func boxPrint(f *model.Fixture, p model.Place, deck float64) []plots.Point {
	sin, cos := math.Sincos(f.Turn)
	var path []plots.Point
	for _, c := range [][2]float64{{1, 1}, {-1, 1}, {-1, -1}, {1, -1}} {
		a, b := c[0]*f.Size[0]/2, c[1]*f.Size[1]/2
		s, z := a*cos-b*sin, a*sin+b*cos
		path = append(path, plots.Point{X: deck * (p.Phi + math.Atan2(s, p.R)), Y: p.Z + z})
	}
	return path
}

func wallPrint(m *model.Model, f *model.Fixture, d int) []plots.PlanFixture {
	if f.Kind != model.Wall {
		return nil
	}
	from, err := m.Resolve(f.From)
	to, err2 := m.Resolve(f.To)
	if err != nil || err2 != nil || from.Deck != d {
		return nil
	}
	deck, half := m.Decks[d].Radius, f.Thickness/2
	x0, x1 := deck*math.Min(from.Phi, to.Phi), deck*math.Max(from.Phi, to.Phi)
	z0, z1 := math.Min(from.Z, to.Z), math.Max(from.Z, to.Z)
	if x1-x0 > z1-z0 {
		z0, z1 = z0-half, z1+half
	} else {
		x0, x1 = x0-half, x1+half
	}
	return []plots.PlanFixture{{Name: f.Name, Path: []plots.Point{{X: x0, Y: z0}, {X: x1, Y: z0}, {X: x1, Y: z1}, {X: x0, Y: z1}}}}
}

func (j *job) loadsChart(i int) (*plots.Figure, error) {
	p := &j.paths[i]
	name := p.plan.Path.Name
	spec := plots.LoadsChartSpec{Title: name + ": loads on " + p.plan.Crew.Name + " along the crew path", Spin: j.model().Habitat.Spin,
		Notes: "Loads are what the person exerts on the structure, at the waist. Spinward and +axial are positive."}
	joints := p.plan.Joints()
	for k := range p.plan.Legs() {
		spec.Legs = append(spec.Legs, plots.LegSpan{Name: p.plan.LegName(k), From: joints[k], To: joints[k+1]})
	}
	for k := range p.loads {
		l := &p.loads[k]
		spec.Time = append(spec.Time, l.Time)
		spec.GravityFeet = append(spec.GravityFeet, l.GravityFeet/model.StandardGravity)
		spec.GravityWaist = append(spec.GravityWaist, l.GravityWaist/model.StandardGravity)
		spec.GravityHead = append(spec.GravityHead, l.GravityHead/model.StandardGravity)
		spec.Weight = append(spec.Weight, l.Weight)
		spec.SideSpinward = append(spec.SideSpinward, l.SideSpinward)
		spec.SideAxial = append(spec.SideAxial, l.SideAxial)
		spec.Friction = append(spec.Friction, l.FrictionDemand)
		spec.HeadCross = append(spec.HeadCross, l.HeadCross)
	}
	j.loadLimits(&spec, name)
	row := p.row()
	spec.Desc = described("Loads on %s along %s, which takes %s: gravity at the feet %s, at the head %s, weight %s, side load up to %s, friction demand up to %s.",
		row[1], row[0], row[2], row[3], row[4], row[5], row[6], row[7])
	return plots.LoadsChart(spec)
}
