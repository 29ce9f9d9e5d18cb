package model

import (
	"fmt"
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// Patch is a grid of places over a piece of a deck or over the top of a box.
// Place k, from 0, is in column k mod N[0] and row k / N[0].
type Patch struct {
	Name  string     // of the deck or the fixture
	Deck  int        // of a deck
	N     [2]int     // places spinward and axially, or along and across the box
	First [2]float64 // m, of place 0: arc and axial, or along and across from the middle of the top
	Step  float64    // m
	Size  [2]float64 // m, extent of the piece
	top   *boxTop    // nil: a deck
}

// boxTop is the top face of a box.
type boxTop struct {
	middle            r3.Vec // m, habitat components
	along, across, up r3.Vec // unit vectors
}

// Count is how many places there are.
func (p *Patch) Count() int { return p.N[0] * p.N[1] }

// Grid gives the place of a grid position of the patch, in steps from place 0,
// at a height (m) above the deck or the top.
func (p *Patch) Grid(m *Model, i, j, height float64) Place {
	return p.at(m, p.First[0]+i*p.Step, p.First[1]+j*p.Step, height)
}

// Place gives place k at a height (m) above the deck or the top.
func (p *Patch) Place(m *Model, k int, height float64) Place {
	return p.Grid(m, float64(k%p.N[0]), float64(k/p.N[0]), height)
}

func (p *Patch) at(m *Model, a, b, height float64) Place {
	if t := p.top; t != nil {
		pos := r3.Add(t.middle, r3.Add(r3.Scale(a, t.along), r3.Add(r3.Scale(b, t.across), r3.Scale(height, t.up))))
		return m.PlaceOf(pos)
	}
	// A deck of the model has a name, so that the station resolves.
	at, _ := m.Resolve(Station{Deck: m.Decks[p.Deck].Name, Spinward: Arc{Value: a}, Axial: b, Height: height})
	return at
}

// Edge gives the corner between the places of columns i-1 and i and of rows j-1
// and j, or the edge of the piece, on its own level.
func (p *Patch) Edge(m *Model, i, j int) Place {
	at := func(k, n int) float64 {
		mid := p.First[k] + float64(p.N[k]-1)*p.Step/2
		x := p.First[k] + (float64(n)-0.5)*p.Step
		return math.Max(mid-p.Size[k]/2, math.Min(mid+p.Size[k]/2, x))
	}
	return p.at(m, at(0, i), at(1, j), 0)
}

// Corners gives the corners of the piece, in order, on its own level.
func (p *Patch) Corners(m *Model) (out []Place) {
	a, b := p.First[0]+float64(p.N[0]-1)*p.Step/2, p.First[1]+float64(p.N[1]-1)*p.Step/2
	for _, c := range [][2]float64{{-1, -1}, {1, -1}, {1, 1}, {-1, 1}} {
		out = append(out, p.at(m, a+c[0]*p.Size[0]/2, b+c[1]*p.Size[1]/2, 0))
	}
	return out
}

// gridSlack is the share of a step by which an extent may fall short of a whole
// number of steps and still have a place at both ends: roundings.
const gridSlack = 1e-9

// mostAcross bounds the places of one row, so that their number is a number.
const mostAcross = 1 << 30

// spaced lays places a step apart on an extent (m); what is left over is shared
// out at both ends. On a whole circle the ends are one place.
func spaced(low, high, step float64, circle bool) (first float64, n int) {
	steps := math.Floor((high-low)/step + gridSlack)
	if !circle {
		steps++
	}
	n = int(math.Min(math.Max(steps, 1), mostAcross))
	return (low+high)/2 - float64(n-1)*step/2, n
}

func patchOf(x, y [2]float64, step float64, circle bool) Patch {
	p := Patch{Step: step, Size: [2]float64{x[1] - x[0], y[1] - y[0]}}
	p.First[0], p.N[0] = spaced(x[0], x[1], step, circle)
	p.First[1], p.N[1] = spaced(y[0], y[1], step, false)
	return p
}

// Patches lays out the places of a landing map. A problem's key is relative to
// the map.
func (m *Model) Patches(l *LandingMap) ([]Patch, []Problem) {
	if l.Over.HasFixtures {
		return m.topPatches(l)
	}
	z, problem := m.zone(&l.Over)
	if problem.Msg != "" {
		problem.Key = "over" + problem.Key
		return nil, []Problem{problem}
	}
	p := patchOf(z.Spinward, z.Axial, l.Step, z.Round)
	p.Name, p.Deck = m.Decks[z.Deck].Name, z.Deck
	return []Patch{p}, nil
}

// Zone is a patch of a deck: arcs or straight lengths, and axial places, m.
type Zone struct {
	Deck            int
	Spinward, Axial [2]float64 // smaller first
	Round           bool       // the whole way round
}

// Holds says whether a place (m) of the deck lies in the zone; an arc within a
// lap of it.
func (z *Zone) Holds(spinward, axial, circumference float64) bool {
	if axial < z.Axial[0] || axial > z.Axial[1] {
		return false
	}
	if z.Round {
		return true
	}
	if circumference > 0 {
		mid := (z.Spinward[0] + z.Spinward[1]) / 2
		spinward -= circumference * math.Round((spinward-mid)/circumference)
	}
	return spinward >= z.Spinward[0] && spinward <= z.Spinward[1]
}

// ZoneOf finds the zone that a region of a deck is; the region was checked.
func (m *Model) ZoneOf(r *Region) Zone {
	z, _ := m.zone(r)
	return z
}

// zone finds a patch of a deck. The problem's key begins with a point.
func (m *Model) zone(r *Region) (z Zone, problem Problem) {
	d, ok := m.DeckNamed(r.Deck)
	if !ok {
		return z, Problem{Key: ".deck", Msg: fmt.Sprintf("no deck named %q", r.Deck)}
	}
	z.Deck = d
	low, high, axial, round := m.extent(d)
	z.Spinward, z.Axial, z.Round = [2]float64{low, high}, axial, round && r.Spinward == nil
	if a := r.Spinward; a != nil {
		z.Spinward = [2]float64{m.arcOn(d, a[0]), m.arcOn(d, a[1])}
	}
	if r.Axial != nil {
		z.Axial = *r.Axial
	}
	return z, z.faults(m.Decks[d].Name, low, high, axial, round)
}

// extent gives what there is of a deck: arcs or straight lengths, axial places,
// m, and whether it goes the whole way round.
func (m *Model) extent(d int) (low, high float64, axial [2]float64, round bool) {
	deck := &m.Decks[d]
	axial = deck.Axial
	switch f := m.FlatDeck(d); {
	case f != nil:
		low, high = -f.Size[0]/2, f.Size[0]/2
		axial = [2]float64{f.Z - f.Size[1]/2, f.Z + f.Size[1]/2}
	case deck.Whole:
		half := math.Pi * deck.Radius
		low, high, round = -half, half, true
	default:
		low, high = deck.Radius*deck.From.Angle(deck.Radius), deck.Radius*deck.To.Angle(deck.Radius)
	}
	return low, high, axial, round
}

// arcOn gives an arc in m on a deck; on a flat one the straight length.
func (m *Model) arcOn(d int, a Arc) float64 {
	if f := m.FlatDeck(d); f != nil {
		return f.Along(a)
	}
	return a.Angle(m.Decks[d].Radius) * m.Decks[d].Radius
}

// faults says what is wrong with a zone of a deck of an extent.
func (z *Zone) faults(deck string, low, high float64, axial [2]float64, round bool) Problem {
	const slack = 1e-9 // m: roundings of angles
	switch {
	case math.IsInf(z.Axial[0], 0) || math.IsInf(z.Axial[1], 0):
		return Problem{Key: ".axial", Msg: fmt.Sprintf("deck %q has no ends: wants an axial extent", deck)}
	case z.Spinward[0] > z.Spinward[1]:
		return Problem{Key: ".spinward", Msg: "wants the antispinward end first"}
	case z.Axial[0] > z.Axial[1]:
		return Problem{Key: ".axial", Msg: "wants the smaller place first"}
	case z.Axial[0] < axial[0]-slack || z.Axial[1] > axial[1]+slack:
		return Problem{Key: ".axial", Msg: fmt.Sprintf("lies off deck %q, which goes from %.6g m to %.6g m axially: %.6g m to %.6g m", deck, axial[0], axial[1], z.Axial[0], z.Axial[1])}
	case round && z.Spinward[1]-z.Spinward[0] > high-low+slack:
		return Problem{Key: ".spinward", Msg: fmt.Sprintf("wants at most once round deck %q, %.6g m, got %.6g m", deck, high-low, z.Spinward[1]-z.Spinward[0]), Hint: "leave spinward out for the whole circle"}
	case !round && (z.Spinward[0] < low-slack || z.Spinward[1] > high+slack):
		return Problem{Key: ".spinward", Msg: fmt.Sprintf("lies off deck %q, which goes from %.6g m to %.6g m spinward: %.6g m to %.6g m", deck, low, high, z.Spinward[0], z.Spinward[1])}
	}
	return Problem{}
}

// topPatches lays places over the tops of boxes.
func (m *Model) topPatches(l *LandingMap) (out []Patch, problems []Problem) {
	seen := map[string]bool{}
	for i, name := range l.Over.Fixtures {
		key := fmt.Sprintf("over.fixtures[%d]", i)
		f := m.FixtureNamed(name)
		switch {
		case f == nil:
			problems = append(problems, Problem{Key: key, Msg: fmt.Sprintf("no fixture named %q", name)})
			continue
		case f.Kind != Box:
			problems = append(problems, Problem{Key: key, Msg: fmt.Sprintf("%q has no flat top to let things go over: wants a box", name), Hint: "a patch of the deck beneath it, with heights above that deck, will do"})
			continue
		case seen[name]:
			problems = append(problems, Problem{Key: key, Msg: fmt.Sprintf("%q is named twice", name)})
			continue
		}
		seen[name] = true
		s, err := m.footing(f.At)
		if err != nil {
			continue // the fixture itself is at fault
		}
		half := [2]float64{f.Size[0] / 2, f.Size[1] / 2}
		p := patchOf([2]float64{-half[0], half[0]}, [2]float64{-half[1], half[1]}, l.Step, false)
		sin, cos := math.Sincos(f.Turn)
		p.Name, p.top = name, &boxTop{middle: s.at(0, 0, f.Size[2]), along: s.local.Vec(cos, sin, 0), across: s.local.Vec(-sin, cos, 0), up: s.local.Up}
		out = append(out, p)
	}
	return out, problems
}

// FixtureNamed finds a fixture, nil where there is none.
func (m *Model) FixtureNamed(name string) *Fixture {
	for i := range m.Fixtures {
		if m.Fixtures[i].Name == name {
			return &m.Fixtures[i]
		}
	}
	return nil
}
