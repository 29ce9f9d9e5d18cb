package measure

import (
	"fmt"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/flight"
	"offplumb/sim/table"
)

// glide is a stretch of slides or rolls on one surface with no touch between
// them that a story tells: it is told in one.
type glide struct {
	verb, surface string
	ways          []float64 // m, one for each stretch between turns
	chord         r3.Vec    // m, of the last phase
}

// glides takes a slide or a roll into the story.
func (s *teller) glides(p *flight.Phase) {
	verb := "slides"
	if p.Kind == flight.Roll {
		verb = "rolls"
	}
	way := wayOf(s.m, s.t, p)
	if way <= leastWay {
		return
	}
	chord := r3.Sub(localAt(s.m, s.t, p.T1).Pos, localAt(s.m, s.t, p.T0).Pos)
	if g := &s.glide; len(g.ways) == 0 || g.verb != verb || g.surface != p.Surface {
		s.flush()
		*g = glide{verb: verb, surface: p.Surface, ways: []float64{way}, chord: chord}
	} else {
		if r3.Dot(chord, g.chord) < 0 {
			g.ways = append(g.ways, 0)
		}
		g.ways[len(g.ways)-1] += way
		g.chord = chord
	}
	s.last = ""
}

// words tells a glide.
func (g *glide) words() string {
	sum := 0.0
	for _, w := range g.ways {
		sum += w
	}
	switch len(g.ways) {
	case 1:
		return fmt.Sprintf("%s %s m on %s", g.verb, table.Round(sum, 3), g.surface)
	case 2:
		return fmt.Sprintf("%s %s m on %s and %s m back", g.verb, table.Round(g.ways[0], 3), g.surface, table.Round(g.ways[1], 3))
	}
	return fmt.Sprintf("%s to and fro on %s, %s m in all", g.verb, g.surface, table.Round(sum, 3))
}
