package model

import (
	"fmt"
	"math"
	"strings"
)

// landingMaps checks that landing maps have places, and that they are not too
// many.
func (c *checker) landingMaps() {
	for i := range c.m.Maps {
		c.landingMap(fmt.Sprintf("landing_map[%d]", i), &c.m.Maps[i])
	}
}

func (c *checker) landingMap(key string, l *LandingMap) {
	m := c.m
	before := len(c.problems)
	if _, ok := m.bodyIndex[l.Body]; l.Body != "" && !ok {
		c.fault(key+".body", "", "no body named %q", l.Body)
	}
	patches, problems := m.Patches(l)
	for _, p := range problems {
		c.fault(key+"."+p.Key, p.Hint, "%s", p.Msg)
	}
	c.goals(key, l)
	if len(c.problems) > before {
		return
	}
	c.mapHeights(key, l)
	c.mapSteps(key, l, patches)
	if len(c.problems) == before {
		c.mapPlaces(key, l, patches)
	}
}

// mapHeights refuses heights at which the body would reach into what it is let
// go over.
func (c *checker) mapHeights(key string, l *LandingMap) {
	a := c.m.BodyOf(&Release{Body: l.Body}).Diameter / 2
	for i, h := range l.Heights {
		if h < a-TouchSlack {
			c.fault(fmt.Sprintf("%s.heights[%d]", key, i), "height is that of the body's centre above the deck, or above the top of the fixture",
				"wants at least the body's radius, %.6g m, got %.6g m", a, h)
		}
		for k := range i {
			if l.Heights[k] == h {
				c.fault(fmt.Sprintf("%s.heights[%d]", key, i), "", "%.6g m is given twice", h)
				break
			}
		}
	}
}

// leastCell is the least cell as a share of the floor's circumference, or of the
// span of a flat one: cells are numbered in whole numbers, and finer ones than
// these hold one landing each.
const leastCell = 1e-6

func (c *checker) mapSteps(key string, l *LandingMap, patches []Patch) {
	wide := 0.0
	for i := range patches {
		wide = math.Max(wide, math.Max(patches[i].Size[0], patches[i].Size[1]))
	}
	if wide > 0 && l.Step > wide*(1+gridSlack) {
		c.fault(key+".step", "", "wants no more than the region is wide, %.6g m, got %.6g m", wide, l.Step)
		return
	}
	if least := leastCell * 2 * math.Pi * c.m.Habitat.FloorRadius; l.Cell < least {
		c.fault(key+".cell", "", "wants at least a millionth of the way round the floor, %.3g m, got %.3g m", least, l.Cell)
	}
	if n := l.Flights(patches); n > MostFlights {
		c.fault(key+".step", fmt.Sprintf("make step greater than %.3g m, or take fewer heights or directions", l.Step*math.Sqrt(n/MostFlights)),
			"wants at most %d flights, got %.4g: places of the region x %d heights x %d directions", MostFlights, n, len(l.Heights), l.Directions)
	}
}

// mostLooked bounds the places that are looked at for a free one.
const mostLooked = 20_000

// mapPlaces refuses a map of which no place is free.
func (c *checker) mapPlaces(key string, l *LandingMap, patches []Patch) {
	a := c.m.BodyOf(&Release{Body: l.Body}).Diameter / 2
	first, looked := "", 0
	for i := range patches {
		for k := range patches[i].Count() {
			for _, h := range l.Heights {
				why := c.m.Obstructed(patches[i].Place(c.m, k, h), a)
				if looked++; why == "" || looked > mostLooked {
					return
				}
				if first == "" {
					first = why
				}
			}
		}
	}
	c.fault(key+".over", "", "the body has room at none of the places; the first %s", strings.TrimPrefix(first, "a body "))
}

// mostGoals bounds what a map may ask for: each takes two bytes for each place
// and height.
const mostGoals = 8

func (c *checker) goals(key string, l *LandingMap) {
	if len(l.Goals) > mostGoals {
		c.fault(key+".reaches", "a second map of the same places can hold the others", "wants at most %d, got %d", mostGoals, len(l.Goals))
	}
	surfaces := map[string]bool{}
	for _, s := range c.m.Interior.Surfaces() {
		surfaces[s.Name] = true
	}
	names := map[string]bool{}
	for i := range l.Goals {
		g := &l.Goals[i]
		at := fmt.Sprintf("%s.reaches[%d]", key, i)
		if names[g.Name] {
			c.fault(at, "give it a name of its own", "two things to be reached are named %q", g.Name)
		}
		names[g.Name] = true
		if o := c.m.OpeningNamed(g.Opening); g.Opening != "" && o == nil {
			c.fault(at+".opening", "", "no opening named %q", g.Opening)
		} else if o != nil && o.Closed {
			c.fault(at+".opening", "", "the opening %q is closed", g.Opening)
		}
		for k, s := range g.Surfaces {
			if !surfaces[s] {
				c.fault(fmt.Sprintf("%s.surface[%d]", at, k), "", "no surface named %q", s)
			}
		}
		if g.Zone != nil {
			if _, p := c.m.zone(g.Zone); p.Msg != "" {
				c.fault(at+p.Key, p.Hint, "%s", p.Msg)
			}
		}
	}
}

// OpeningNamed finds an opening, nil where there is none.
func (m *Model) OpeningNamed(name string) *Opening {
	for i := range m.Decks {
		for k := range m.Decks[i].Openings {
			if o := &m.Decks[i].Openings[k]; o.Name == name {
				return o
			}
		}
	}
	return nil
}
