package main

import (
	"fmt"
	"math"
	"strings"

	"offplumb/sim/measure"
	"offplumb/sim/model"
	"offplumb/sim/study"
	"offplumb/sim/table"
)

// throwAsked says what a study looks for.
func throwAsked(s *study.Throws) string {
	words := throwsOf(s.Of.Body)
	switch {
	case s.Of.Time > 0:
		words += " that take " + withUnit(s.Of.Time, "s")
	case s.Of.Least:
		words += ", the slowest that reach"
	default:
		words += " at " + withUnit(s.Of.Speed, "m/s")
	}
	if s.Of.Time == 0 {
		words += ", up to " + withUnit(s.Longest, "s") + " in flight"
	}
	if s.Of.Leaves > 0 {
		words += ", thrown at " + withUnit(s.Of.Leaves, "s")
	}
	if s.Of.Target.Path != "" {
		words += fmt.Sprintf(", to a point of the person on %q", s.Of.Target.Path)
	}
	return words
}

func throwsOf(body string) string {
	if body == "" {
		return "throws of a point"
	}
	return fmt.Sprintf("throws of %q", body)
}

func throwLines(s *study.Throws) []string {
	var out []string
	for i := range s.Aims {
		a := &s.Aims[i]
		lead := ""
		if s.Of.Table() {
			lead = distanceWords(s.Of, a.Distance) + ": "
		}
		if len(a.Throws) == 0 {
			out = append(out, lead+noThrowWords(s, a))
		}
		for k := range a.Throws {
			if s.Of.Table() {
				out = append(out, lead+shortThrow(&a.Throws[k].Throw))
			} else {
				out = append(out, throwWords(&a.Throws[k].Throw))
			}
		}
	}
	return out
}

// distanceWords says how far off a target of a table is, and which way.
func distanceWords(t *model.ThrowTo, d float64) string {
	switch {
	case t.Along == model.Spinward:
		return way(d)
	case d < 0:
		return withUnit(-d, "m") + " toward -axial"
	}
	return withUnit(d, "m") + " toward +axial"
}

// noThrowWords says that nothing reaches, and what would.
func noThrowWords(s *study.Throws, a *study.Aimed) string {
	if math.IsNaN(a.Least) || math.IsInf(a.Least, 0) {
		words := "no throw was found that gets there"
		if a.Most > 0 {
			words += ", of up to " + withUnit(a.Most, "m/s") + " and within " + withUnit(math.Max(s.Longest, s.Of.Time), "s")
		}
		return words + "."
	}
	if s.Of.Least {
		return fmt.Sprintf("no throw is slower than those that take a little more time, up to %s; one of that time takes %s.", withUnit(s.Longest, "s"), withUnit(a.Least, "m/s"))
	}
	if a.Least < s.Of.Speed {
		return fmt.Sprintf("no throw at that speed gets there within %s; slower ones do, the slowest at %s, in flight for %s.",
			withUnit(s.Longest, "s"), withUnit(a.Least, "m/s"), withUnit(a.LeastTime, "s"))
	}
	return fmt.Sprintf("out of reach at %s within %s; the least speed that gets there is %s, in flight for %s.",
		withUnit(s.Of.Speed, "m/s"), withUnit(s.Longest, "s"), withUnit(a.Least, "m/s"), withUnit(a.LeastTime, "s"))
}

// throwWords tells a throw so that someone can make it.
func throwWords(t *measure.Throw) string {
	words := fmt.Sprintf("%d %s: at %s point %s", t.Solution, t.Style, withUnit(t.Speed, "m/s"), pointWords(t.Heading, t.Elevation))
	if lead := leadWords(t); lead != "" {
		words += ", " + lead
	}
	words += "; " + endWords(t)
	words += fmt.Sprintf(". Highest %s. It passes %s off for each degree of heading, %s of elevation, %s for each 0.1 m/s.", withUnit(t.Height, "m"),
		withUnit(t.PerHeading*math.Pi/180, "m"), withUnit(t.PerElev*math.Pi/180, "m"), withUnit(t.PerSpeed*0.1, "m"))
	return words
}

// shortThrow tells a throw of a table.
func shortThrow(t *measure.Throw) string {
	words := fmt.Sprintf("%s, at %s point %s", t.Style, withUnit(t.Speed, "m/s"), pointWords(t.Heading, t.Elevation))
	if lead := leadWords(t); lead != "" {
		words += ", " + lead
	}
	return words + "; " + endWords(t) + "."
}

// endWords says how a throw ends.
func endWords(t *measure.Throw) string {
	switch t.Outcome {
	case measure.ThrowHits:
		return fmt.Sprintf("it would take %s, but hits %s first, after %s, %s high on %q at %s, axial %s", withUnit(t.Time, "s"), t.Surface, withUnit(t.HitTime, "s"),
			withUnit(t.Hit.Height, "m"), t.Hit.Deck, way(t.Hit.Spinward), withUnit(t.Hit.Axial, "m"))
	case measure.ThrowLost:
		return fmt.Sprintf("it would take %s, but leaves the habitat after %s", withUnit(t.Time, "s"), withUnit(t.HitTime, "s"))
	}
	return fmt.Sprintf("it arrives after %s at %s", withUnit(t.Time, "s"), withUnit(t.ArriveSpeed, "m/s"))
}

// levelAngle is the angle, rad, below which a direction counts as level, or
// straight along: less than a hand can hold.
const levelAngle = 0.05 * math.Pi / 180

// pointWords says where to point.
func pointWords(heading, elevation float64) string {
	up := "level"
	if math.Abs(elevation) > math.Pi/2-levelAngle {
		return upDown(elevation, "straight up", "straight down")
	}
	if math.Abs(elevation) >= levelAngle {
		up = degWords(math.Abs(elevation)) + upDown(elevation, " up", " down")
	}
	return headingWords(heading) + ", " + up
}

func upDown(x float64, up, down string) string {
	if x < 0 {
		return down
	}
	return up
}

func degWords(rad float64) string { return table.Fixed(degreesOf(rad), 1) + " deg" }

// headingWords names a heading by the nearest of the four directions, and how
// far it is turned from that.
func headingWords(h float64) string {
	axial, along := upDown(h, "+axial", "-axial"), "spinward"
	from := math.Abs(h)
	if from > math.Pi/2 {
		from, along = math.Pi-from, "antispinward"
	}
	if from > math.Pi/4 {
		from, along, axial = math.Pi/2-from, axial, along
	}
	if from < levelAngle {
		return along
	}
	return along + " turned " + degWords(from) + " toward " + axial
}

// steep is the elevation, rad, of a line to a target beyond which a turn to
// the side says little: the lead is told as one angle.
const steep = 75 * math.Pi / 180

// leadWords says how far from the line to the target to point.
func leadWords(t *measure.Throw) string {
	if math.IsNaN(t.Lead) {
		return ""
	}
	if math.Abs(t.SightElev) > steep || math.Abs(t.LeadHeading) > math.Pi/2 {
		return degWords(t.Lead) + " from where it is seen"
	}
	var words []string
	if math.Abs(t.LeadUp) >= levelAngle {
		words = append(words, degWords(math.Abs(t.LeadUp))+upDown(t.LeadUp, " above", " below"))
	}
	if math.Abs(t.LeadHeading) >= levelAngle {
		words = append(words, degWords(math.Abs(t.LeadHeading))+" "+sideWords(t.SightHead, t.LeadHeading))
	}
	switch {
	case len(words) == 0:
		return "straight at it"
	case math.Abs(t.LeadHeading) < levelAngle:
		return words[0] + " where it is seen"
	}
	return strings.Join(words, " and ") + " of where it is seen"
}

// sideWords names the side to which a turn leads someone who looks along a
// heading.
func sideWords(look, turn float64) string {
	sin, cos := math.Sincos(look)
	sign := math.Copysign(1, turn)
	if math.Abs(sin) >= math.Abs(cos) {
		return upDown(-sin*sign, "spinward", "antispinward")
	}
	return upDown(cos*sign, "+axial", "-axial")
}
