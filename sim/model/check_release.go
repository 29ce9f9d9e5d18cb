package model

import (
	"fmt"
	"math"
	"strings"

	"gonum.org/v1/gonum/spatial/r3"
)

// TouchSlack is how far, in m, a body may reach into a surface at its release
// and still count as touching it: the roundings of a station given in
// decimals, in a habitat of up to thousands of km.
const TouchSlack = 1e-8

func (c *checker) releases() {
	m := c.m
	for i := range m.Releases {
		c.release(fmt.Sprintf("release[%d]", i), &m.Releases[i])
	}
}

// CheckRelease checks a release that is not one of the model's, such as a row of
// a long list. The keys of its problems are relative to it.
func (m *Model) CheckRelease(r *Release) []Problem {
	c := checker{m: m}
	c.release("", r)
	for i := range c.problems {
		c.problems[i].Key = strings.TrimPrefix(c.problems[i].Key, ".")
	}
	return c.problems
}

func (c *checker) release(key string, r *Release) {
	m := c.m
	if _, ok := m.bodyIndex[r.Body]; r.Own == nil && r.Body != "" && !ok {
		c.fault(key+".body", "", "no body named %q", r.Body)
	}
	if r.Carried != nil {
		c.carried(key, r)
		return
	}
	p, err := m.Resolve(r.At)
	if err != nil {
		c.fault(key+".at"+r.At.key(), "", "%v", err)
		return
	}
	c.clear(key+".at", p, m.BodyOf(r).Diameter/2)
}

func (c *checker) carried(key string, r *Release) {
	if _, ok := c.m.PathNamed(r.Carried.Path); !ok {
		c.fault(key+".carried.path", "", "no crew path named %q", r.Carried.Path)
	}
}

// clear checks that a body of the radius a (m) has room at a place.
func (c *checker) clear(key string, p Place, a float64) {
	if msg := c.m.Obstructed(p, a); msg != "" {
		c.fault(key+c.m.blame(p), "", "%s", msg)
	}
}

// blame guesses which key of a station puts it outside.
func (m *Model) blame(p Place) string {
	if z0, z1 := m.Habitat.Ends(); p.Z <= z0 || p.Z >= z1 {
		return ".axial"
	}
	if f := m.FlatDeck(p.Deck); f != nil {
		switch s, _, h := f.Place(p.Vec()); {
		case h < 0 || h > f.Size[2]:
			return ".height"
		case math.Abs(s) > f.Size[0]/2:
			return ".spinward"
		}
		return ""
	}
	if p.R <= 0 || p.R > m.Decks[p.Deck].Radius {
		return ".height"
	}
	return ""
}

// Obstructed says, in words, why a body of the radius a (m) cannot be at a
// place; it is empty where it can.
func (m *Model) Obstructed(p Place, a float64) string {
	deck := m.Decks[p.Deck].Name
	pos := p.Vec()
	switch {
	case p.R >= 0 && m.IsOutside(pos):
		return m.overlap(pos, a)
	case p.R < 0:
		return fmt.Sprintf("lies beyond the axis, which is %.6g m above deck %q", m.Decks[p.Deck].Radius, deck)
	case p.Height < 0 && (p.Height >= -m.Decks[p.Deck].Thickness || !m.Interior.Inside(pos)):
		return fmt.Sprintf("lies below deck %q: height %.6g m", deck, p.Height)
	case !m.Interior.Inside(pos):
		return m.outside(p)
	}
	return m.overlap(pos, a)
}

func (m *Model) outside(p Place) string {
	if z0, z1 := m.Habitat.Ends(); m.Habitat.Shape == Cylinder && (p.Z < z0 || p.Z > z1) {
		return fmt.Sprintf("lies outside the bulkheads at axial %g m and %g m: axial %g m", z0, z1, p.Z)
	}
	return "lies outside the rooms of the habitat"
}

func (m *Model) overlap(pos r3.Vec, a float64) string {
	near := m.Interior.Contact(pos)
	name := m.Interior.Surface(near.Surface).Name
	switch slack := TouchSlack * math.Max(1, r3.Norm(pos)*1e-5); {
	case near.Gap < -slack:
		return fmt.Sprintf("lies inside the solid whose surface is %q", name)
	case near.Gap < a-slack:
		return fmt.Sprintf("a body of diameter %.6g m has no room: its centre is %.6g m from %q", 2*a, near.Gap, name)
	}
	return ""
}

// key names what a station stands on.
func (s *Station) key() string {
	if s.Room != "" {
		return ".room"
	}
	return ".deck"
}
