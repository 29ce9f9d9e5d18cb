package measure

import (
	"fmt"
	"strings"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/sim/flight"
	"offplumb/sim/model"
	"offplumb/sim/table"
)

// Story tells a track in one line: what it touched first, what it slid on, by
// which passage it arrived, where it ended, each with its time and speed.
func Story(m *model.Model, t *flight.Track) string {
	s := teller{m: m, t: t, events: Events(m, t)}
	for i := range t.Phases {
		s.until(t.Phases[i].T0)
		switch p := &t.Phases[i]; {
		case p.T1 <= p.T0:
		case p.Kind == flight.Rest:
			s.say("rests on %s until %s", p.Surface, seconds(p.T1))
			s.last = ""
		case p.Kind != flight.Free:
			s.glides(p)
		}
	}
	s.until(t.End)
	s.ending()
	return strings.Join(shorter(s.parts), "; ")
}

// A longer story than headTold + tailTold parts leaves out what is between.
const headTold, tailTold = 9, 3

func shorter(parts []string) []string {
	over := len(parts) - headTold - tailTold
	if over < 2 {
		return parts
	}
	out := append([]string(nil), parts[:headTold]...)
	out = append(out, fmt.Sprintf("(%d more, in its impacts)", over))
	return append(out, parts[len(parts)-tailTold:]...)
}

// teller puts a story together.
type teller struct {
	m      *model.Model
	t      *flight.Track
	events []Event
	parts  []string
	last   string // surface of the last impact told
	more   int    // impacts on it since
	glide  glide  // not told yet
}

func (s *teller) say(format string, args ...any) {
	s.flush()
	s.parts = append(s.parts, fmt.Sprintf(format, args...))
}

// flush tells the slide under way and counts the impacts that were not told.
func (s *teller) flush() {
	if len(s.glide.ways) > 0 {
		s.parts = append(s.parts, s.glide.words())
		s.glide = glide{}
	}
	if s.more > 0 {
		words := "bounces there once more"
		if s.more > 1 {
			words = fmt.Sprintf("bounces there %d times more", s.more)
		}
		s.more = 0
		s.parts = append(s.parts, words)
	}
}

// until tells the events up to a time.
func (s *teller) until(time float64) {
	for len(s.events) > 0 && s.events[0].Time <= time {
		e := &s.events[0]
		s.events = s.events[1:]
		switch {
		case e.Kind == Impact && e.NormalSpeed < leastTouch && e.Time > 0:
			// A graze: it neither stops nor turns the body.
		case e.Kind == Leaves:
			s.say("leaves %s at %s with %s", e.Surface, seconds(e.Time), speeds(e.Speed, e.Energy))
			s.last = ""
		case e.Time == 0 && e.Speed == 0:
			s.say("starts on %s", e.Surface)
			s.last = ""
		case e.Surface == s.last:
			s.more++
		default:
			s.say("touches %s at %s with %s", e.Surface, seconds(e.Time), speeds(e.Speed, e.Energy))
			s.last = e.Surface
		}
	}
}

// leastTouch is the least speed along the normal, in m/s, of a touch that a
// story tells after the release: a hundredth of what the least bounce has.
const leastTouch = 1e-3

// leastWay is the least slide, in m, that a story tells.
const leastWay = 1e-3

func (s *teller) ending() {
	switch s.t.Outcome {
	case flight.Rested:
		s.say("rests at %s", seconds(s.t.End))
	case flight.Stuck:
		s.say("is stuck at %s", seconds(s.t.End))
	case flight.Lost:
		s.say("is lost at %s%s", seconds(s.t.End), s.away())
	case flight.TimeUp:
		if r3.Norm(localAt(s.m, s.t, s.t.End).Vel) == 0 {
			s.say("floats where it is at %s, held by nothing", seconds(s.t.End))
			return
		}
		s.say("still moves at %s%s", seconds(s.t.End), s.away())
	default:
		s.flush()
	}
}

func seconds(t float64) string { return table.Round(t, 3) + " s" }

func speeds(v, e float64) string {
	if e != e { // no mass, no energy
		return table.Round(v, 3) + " m/s"
	}
	return table.Round(v, 3) + " m/s, " + table.Round(e, 3) + " J"
}
