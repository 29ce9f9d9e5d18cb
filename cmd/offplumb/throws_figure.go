package main

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"gonum.org/v1/gonum/spatial/r3"
	"offplumb/plots"
	"offplumb/sim/frame"
	"offplumb/sim/measure"
	"offplumb/sim/model"
	"offplumb/sim/study"
	"offplumb/sim/table"
)

// throwFigures are the figures of the throw studies: their throws together, and
// the table to print.
func throwFigures(j *job) []drawing {
	var out []drawing
	var names table.Namer
	for i := range j.model().Throws {
		name := j.model().Throws[i].Name
		file := "throws-" + names.Name(name)
		s := j.throws[i]
		if s == nil {
			continue
		}
		if lines := drawnThrows(s); len(lines) > 0 {
			out = append(out, drawing{file: file, of: "throws", name: name, make: func() (*plots.Figure, error) { return j.throwView(s, lines) }})
		}
		if !s.Of.Table() {
			continue
		}
		rows := throwCardRows(s)
		for n := 0; n*plots.MostThrowRows < len(rows); n++ {
			part, card := rows[n*plots.MostThrowRows:min(len(rows), (n+1)*plots.MostThrowRows)], file+"-table"
			if n > 0 {
				card = fmt.Sprintf("%s-%d", card, n+1)
			}
			out = append(out, drawing{file: card, of: "throw table", name: name, make: func() (*plots.Figure, error) { return j.throwCard(s, part) }})
		}
	}
	return out
}

// drawnThrow is a throw that is drawn.
type drawnThrow struct {
	*study.Thrown
	aim *study.Aimed
}

// drawnThrows are the first throws, those that arrive before the others where
// there are too many: as many as can be told apart.
func drawnThrows(s *study.Throws) (out []drawnThrow) {
	total := 0
	for i := range s.Aims {
		total += len(s.Aims[i].Throws)
	}
	for i := range s.Aims {
		for k := range s.Aims[i].Throws {
			t := &s.Aims[i].Throws[k]
			if total > plots.MostThrows && t.Outcome != measure.ThrowArrives || len(out) == plots.MostThrows {
				continue
			}
			out = append(out, drawnThrow{t, &s.Aims[i]})
		}
	}
	return out
}

// throwView draws throws together.
func (j *job) throwView(s *study.Throws, lines []drawnThrow) (*plots.Figure, error) {
	m := j.model()
	on := j.sideOf(lines[0].Track)
	spec := plots.ThrowViewSpec{Title: s.Of.Name + ": " + throwTitle(s), Spin: m.Habitat.Spin, Deck: on.deck,
		Outlines: j.section(s.From.Z, on.turn, on.by), From: j.onView(&on, s.From.Vec())}
	var words []string
	for _, l := range lines {
		line := plots.ThrowLine{Name: lineName(s, l)}
		for _, at := range j.seenFrom(l.Track, l.Track.End) {
			p := on.point(at)
			line.Track = append(line.Track, plots.TrackPoint{T: at.t, X: p.X, Y: p.Y, Phase: at.phase})
		}
		switch l.Outcome {
		case measure.ThrowHits:
			line.Hits = "hits " + l.Surface
		case measure.ThrowLost:
			line.Hits = "leaves the habitat"
		}
		spec.Throws = append(spec.Throws, line)
		words = append(words, lineName(s, l)+", "+shortThrow(&l.Throw))
	}
	j.viewTargets(&spec, s, &on, lines)
	spec.Notes = throwNotes(s, lines)
	spec.Desc = described("Side view of throws in the habitat frame, seen from the +axial end. %s", strings.Join(words, " "))
	return plots.ThrowView(spec)
}

// onView gives the place on a view of a point that has not gone round.
func (j *job) onView(on *side, pos r3.Vec) plots.Point {
	p := frame.PolarOf(pos)
	p.Phi = frame.WrapAngle(p.Phi - on.Start.Phi)
	return on.point(seen{pos: pos, place: p})
}

// viewTargets marks what is to be reached: where it stands, or where the person
// is at each arrival.
func (j *job) viewTargets(spec *plots.ThrowViewSpec, s *study.Throws, on *side, lines []drawnThrow) {
	add := func(pos r3.Vec, name string) {
		spec.Targets = append(spec.Targets, plots.ThrowMark{At: j.onView(on, pos), Name: name})
	}
	switch {
	case s.Of.Target.Path != "":
		add(s.Aims[0].Target.Pos, "target at the throw")
		for _, l := range lines {
			add(l.Target.Pos, fmt.Sprintf("at the arrival of %d", l.Solution))
		}
	case !s.Of.Table():
		add(s.Aims[0].Target.Pos, "target")
	default:
		for i := range s.Aims {
			if i == 0 || s.Of.Along == model.Spinward {
				name := drawnMinus(given(s.Aims[i].Distance)) + " m"
				if s.Of.Along != model.Spinward {
					name = "targets, one behind the other"
				}
				add(s.Aims[i].Target.Pos, name)
			}
		}
	}
}

// lineName names a throw.
func lineName(s *study.Throws, l drawnThrow) string {
	if s.Of.Table() {
		return drawnMinus(given(l.aim.Distance)) + " m " + l.Style
	}
	return fmt.Sprintf("%d %s", l.Solution, l.Style)
}

// drawnMinus sets the sign of a number as figures do, as long as a plus.
func drawnMinus(s string) string { return strings.Replace(s, "-", "\u2212", 1) }

func throwTitle(s *study.Throws) string {
	switch {
	case s.Of.Time > 0:
		return "the throw that takes " + withUnit(s.Of.Time, "s")
	case s.Of.Least:
		return "the slowest throws that reach the target"
	case s.Of.Table():
		return "throws at " + given(s.Of.Speed) + " m/s"
	}
	return "throws at " + given(s.Of.Speed) + " m/s that reach the target"
}

func throwNotes(s *study.Throws, lines []drawnThrow) string {
	notes := "Habitat frame, true scale."
	far := 0.0
	for _, l := range lines {
		far = math.Max(far, math.Abs(l.Target.Pos.Z-s.From.Z))
	}
	if far > leastShown {
		notes += fmt.Sprintf(" The throws also go up to %s along the axis, which this view does not show.", withUnit(far, "m"))
	}
	total := 0
	for i := range s.Aims {
		total += len(s.Aims[i].Throws)
	}
	if total > len(lines) {
		notes += fmt.Sprintf(" %d of %d throws are drawn.", len(lines), total)
	}
	return notes
}

// throwCardHeads are the columns of a throw table to print.
var throwCardHeads = []string{"target", "throw", "above the deck", "above target", "to the side", "speed", "flight", "highest", "arrives at", "1° off misses"}

// throwCardRows are the rows of a throw table to print.
func throwCardRows(s *study.Throws) (out []plots.ThrowCardRow) {
	for i := range s.Aims {
		a := &s.Aims[i]
		name := distanceShort(s.Of, a.Distance)
		if len(a.Throws) == 0 {
			row := plots.ThrowCardRow{Cells: make([]string, len(throwCardHeads)), Sight: math.NaN(), Point: math.NaN(), Soft: true}
			row.Cells[0], row.None = name, noThrowShort(s, a)
			out = append(out, row)
		}
		for k := range a.Throws {
			out = append(out, throwCardRow(name, &a.Throws[k].Throw))
		}
	}
	return out
}

// noThrowShort says in a line why a row has no throw.
func noThrowShort(s *study.Throws, a *study.Aimed) string {
	if s.Of.Speed > 0 && a.Least > s.Of.Speed && !math.IsInf(a.Least, 0) {
		return "out of reach; it takes " + withUnit(a.Least, "m/s")
	}
	return "no throw found"
}

// distanceShort is a distance for a narrow column.
func distanceShort(t *model.ThrowTo, d float64) string {
	switch {
	case d == 0:
		return "0 m"
	case t.Along == model.Spinward && d < 0:
		return given(-d) + " m antisp."
	case t.Along == model.Spinward:
		return given(d) + " m spinward"
	case d < 0:
		return given(-d) + " m -axial"
	}
	return given(d) + " m +axial"
}

func throwCardRow(name string, t *measure.Throw) plots.ThrowCardRow {
	deg := func(rad float64) string { return drawnMinus(table.Fixed(degreesOf(rad), 1)) + "°" }
	out := plots.ThrowCardRow{Sight: t.SightElev, Soft: t.Outcome != measure.ThrowArrives}
	out.Point = math.Atan2(math.Sin(t.Elevation), math.Cos(t.Elevation)*math.Cos(t.LeadHeading))
	above, aside := deg(t.LeadUp), "-"
	if math.Abs(t.SightElev) > steep || math.Abs(t.LeadHeading) > math.Pi/2 {
		above = deg(frame.WrapAngle(out.Point - out.Sight))
	}
	if turn := math.Asin(math.Cos(t.Elevation) * math.Sin(t.LeadHeading)); math.Abs(turn) >= levelAngle {
		aside = deg(math.Abs(turn)) + " " + strings.Replace(sideWords(t.SightHead, turn), "antispinward", "antisp.", 1)
	}
	arrives := withUnit(t.ArriveSpeed, "m/s")
	if out.Soft {
		arrives = "hits " + t.Surface
	}
	off := math.Max(t.PerHeading, t.PerElev) * math.Pi / 180
	out.Cells = []string{name, t.Style, deg(t.Elevation), above, aside, withUnit(t.Speed, "m/s"), withUnit(t.Time, "s"), withUnit(t.Height, "m"), arrives, withUnit(off, "m")}
	return out
}

// telling leaves out the columns, behind the first three, that say the same in
// all rows.
func telling(rows []plots.ThrowCardRow) (heads []string, out []plots.ThrowCardRow) {
	out = slices.Clone(rows)
	for i := range out {
		out[i].Cells = nil
	}
	for k, head := range throwCardHeads {
		seen := map[string]bool{}
		for i := range rows {
			if rows[i].None == "" {
				seen[rows[i].Cells[k]] = true
			}
		}
		if k > 2 && len(seen) < 2 && len(rows) > 1 {
			continue
		}
		heads = append(heads, head)
		for i := range out {
			out[i].Cells = append(out[i].Cells, rows[i].Cells[k])
		}
	}
	return heads, out
}

func (j *job) throwCard(s *study.Throws, rows []plots.ThrowCardRow) (*plots.Figure, error) {
	m := j.model()
	spec := plots.ThrowCardSpec{Title: s.Of.Name + ": where to point, " + throwTitle(s), Spin: m.Habitat.Spin}
	spec.Heads, spec.Rows = telling(rows)
	ground := measure.GroundAt(m, s.From.Polar, m.DeckBeneath(s.From.Polar))
	spec.Notes = fmt.Sprintf("%s, from %s above %q. Distances along the deck from plumb under the thrower. Dashed: the line to the target; arrow: where to point, "+
		"in the upright plane of that line. Grey rows hit something first. The last column: the greater of one degree too high and one degree to the side.",
		capital(throwAsked(s)), withUnit(s.From.Height, "m"), ground.Name)
	var words []string
	for _, r := range rows {
		words = append(words, r.Cells[0]+", "+r.Cells[1]+": "+r.Cells[2])
	}
	spec.Desc = described("Throw table: the elevation to point at, by distance: %s.", strings.Join(words, "; "))
	return plots.ThrowCard(spec)
}
