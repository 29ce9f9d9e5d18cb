package main

import (
	"context"
	"fmt"
	"io"
	"math"
	"strings"

	"offplumb/sim/measure"
	"offplumb/sim/model"
	"offplumb/sim/study"
	"offplumb/sim/table"
)

// mapResult is a landing map and what it gave.
type mapResult struct {
	of   *model.LandingMap
	land *measure.LandMap // nil: not asked for, or not finished
	feet []measure.Footprint
}

// runMaps runs the landing maps that are asked for.
func (j *job) runMaps(ctx context.Context, p *progress) error {
	m := j.model()
	j.maps = make([]mapResult, len(m.Maps))
	for i := range m.Maps {
		l := &m.Maps[i]
		j.maps[i].of = l
		if !j.wanted(l.Name) {
			continue
		}
		land, err := j.LandingMap(ctx, l, study.MapOptions{Workers: j.flags.jobs, Done: func(done, of int) { p.tell("flights of "+l.Name, done, of) }})
		if ctx.Err() != nil {
			return context.Cause(ctx)
		}
		if err != nil {
			return fmt.Errorf("landing map %q: %w", l.Name, err)
		}
		j.maps[i].land, j.maps[i].feet = land, land.Footprints()
	}
	return nil
}

// landMap gives what a landing map came to, if it ran.
func (j *job) landMap(i int) (*measure.LandMap, bool) {
	if i >= len(j.maps) || j.maps[i].land == nil {
		return nil, false
	}
	return j.maps[i].land, true
}

// mapTables are the tables of the landing maps.
func mapTables(j *job) []task {
	var out []task
	var names table.Namer
	for i := range j.maps {
		s := &j.maps[i]
		file := "maps/" + names.Name(s.of.Name)
		if s.land == nil {
			continue
		}
		name := s.of.Name
		out = append(out, task{entry: entry{File: file + ".csv", Of: "landing map", Name: name}, table: measure.CellColumns(),
			title: name + ": A row for each cell of a landing map that something touched.",
			write: func(w io.Writer) error { return table.StreamCSV(w, measure.CellColumns(), s.land.Rows()) }})
		out = append(out, tableTask(file+"-summary.csv", "landing map summary", name, "What the flights of a landing map come to.", measure.MapTable(s.land)))
		if len(s.feet) > 0 {
			out = append(out, tableTask(file+"-footprint.csv", "landing map footprint", name, "Corners of the outline of all landings.", measure.FootprintTable(s.feet)))
		}
		if len(s.of.Goals) > 0 {
			columns := s.land.ReachColumns()
			out = append(out, task{entry: entry{File: file + "-reach.csv", Of: "landing map reach", Name: name}, table: columns,
				title: name + ": A row for each place and height: the share of the directions that reach something.",
				write: func(w io.Writer) error { return table.StreamCSV(w, columns, s.land.ReachRows()) }})
		}
	}
	return out
}

// sumMaps tells each landing map in a few sentences.
func sumMaps(j *job, b *strings.Builder) {
	head := false
	for i := range j.maps {
		s := &j.maps[i]
		if s.land == nil {
			continue
		}
		if !head {
			b.WriteString("\nLanding maps\n")
			head = true
		}
		b.WriteString(wrapped("  "+s.sentence(), "    "))
	}
}

func (s *mapResult) sentence() string {
	c := s.land
	var b strings.Builder
	fmt.Fprintf(&b, "%s: %s, %s. ", s.of.Name, count(c.Flights, "flight"), s.ways())
	if n := c.SkippedPlaces(); n > 0 {
		fmt.Fprintf(&b, "%s of %d left out, without room for the body. ", count(n, "place"), c.Places)
	}
	b.WriteString(plainShares("First touch", surfaceShares(c)))
	b.WriteString(plainShares("Fallen through", c.Openings))
	if c.Landed < c.Flights {
		fmt.Fprintf(&b, "Not landed: %d in time, %d lost. ", c.Late, c.Gone)
	}
	if c.From >= 0 {
		b.WriteString("Worst: " + s.worst() + ". ")
	}
	for i := range s.feet {
		fmt.Fprintf(&b, "Footprint on %s: %s m^2 in %s. ", s.feet[i].Deck, sigfig(s.feet[i].Area, 3), count(len(s.feet[i].Loops), "outline"))
	}
	for i := range c.Goals {
		fmt.Fprintf(&b, "%s. ", s.reach(i))
	}
	return strings.TrimSpace(b.String())
}

// ways says how things are let go.
func (s *mapResult) ways() string {
	body := "a point"
	if s.of.Body != "" {
		body = fmt.Sprintf("%q", s.of.Body)
	}
	words := fmt.Sprintf("%s let go at %s", body, count(s.land.Places, "place"))
	if n := len(s.of.Heights); n > 1 {
		words = fmt.Sprintf("%s let go at %s, each at %d heights", body, count(s.land.Places/n, "place"), n)
	}
	if s.of.Speed == 0 {
		return words + ", at rest"
	}
	return fmt.Sprintf("%s, with %s m/s in %d directions", words, given(s.of.Speed), s.of.Directions)
}

// worst tells the worst touch and where it came from.
func (s *mapResult) worst() string {
	w := &s.land.Worst
	words := withUnit(w.Speed, "m/s")
	if w.Energy == w.Energy {
		words = withUnit(w.Energy, "J") + " at " + words
	}
	at, height, _ := s.land.Start(s.land.From)
	return fmt.Sprintf("%s on %s at %s, let go at %s, height %s above %s", words, w.Surface, s.placeWords(w.Spinward, w.Axial),
		s.placeWords(at.Spinward, at.Axial), withUnit(height, "m"), at.Deck)
}

// placeWords says where something is on a deck, to a tenth of a cell.
func (s *mapResult) placeWords(spinward, axial float64) string {
	decimals := int(math.Max(0, math.Ceil(1-math.Log10(s.of.Cell)-1e-9)))
	return fmt.Sprintf("spinward %s m, axial %s m", table.Fixed(spinward, decimals), table.Fixed(axial, decimals))
}

// reach tells from how many places a goal is reached.
func (s *mapResult) reach(goal int) string {
	free, from, surely := 0, 0, 0
	for n := range s.land.Places {
		switch x := s.land.Reached(goal, n); {
		case x != x:
			continue
		case x == 1:
			surely++
			from++
		case x > 0:
			from++
		}
		free++
	}
	words := fmt.Sprintf("%s is reached from %d of %s", s.land.Goals[goal].Name, from, count(free, "place"))
	if s.of.Speed > 0 && from > 0 {
		words += fmt.Sprintf(" (in every direction from %d)", surely)
	}
	if from > 0 {
		words += fmt.Sprintf(", by %s of all flights", percent(s.land.Goals[goal].Share))
	}
	return words
}

func surfaceShares(c *measure.LandMap) (out []measure.Share) {
	for i := range c.Surfaces {
		if c.Surfaces[i].Count > 0 {
			out = append(out, c.Surfaces[i].Share)
		}
	}
	return out
}

// plainShares lists shares without intervals: flights of a map are no sample.
func plainShares(what string, list []measure.Share) string {
	if len(list) == 0 {
		return ""
	}
	words := make([]string, 0, namesTold)
	for i := range list {
		if i == namesTold {
			words = append(words, fmt.Sprintf("and %d more", len(list)-i))
			break
		}
		words = append(words, list[i].Name+" "+percent(list[i].Share))
	}
	return what + ": " + strings.Join(words, ", ") + ". "
}

// warnMaps notes what the reader of a landing map must know.
func warnMaps(j *job) {
	for i := range j.maps {
		s := &j.maps[i]
		if s.land == nil {
			continue
		}
		of := "study." + s.of.Name
		for _, why := range s.land.Skipped {
			j.note(of, "%s of %d left out: %s", count(why.Count, "place"), s.land.Places, why.Name)
		}
		if n := s.land.Failed; n > 0 {
			j.note(of, "%s could not be computed: %s", count(n, "flight"), s.land.Why)
		}
		if n := s.land.Late; n > 0 {
			j.note(of, "%s still move after the longest time, %s s", count(n, "flight"), table.Round(j.model().Solver.MaxTime, 4))
		}
		if s.of.Cell < s.of.Step*(1-1e-9) {
			j.note(of, "its cells are smaller than its step: the counts of cells show the pattern of the places where things are let go")
		}
	}
}

// mapRecord is a landing map in run.json.
type mapRecord struct {
	Study      string     `json:"study"`
	Places     int        `json:"places"`
	Skipped    int        `json:"skipped_places"`
	Directions int        `json:"directions"`
	Flights    int        `json:"flights"`
	Landed     int        `json:"landed"`
	Energy     number     `json:"worst_energy_J"`
	Speed      number     `json:"worst_speed_m_s"`
	Footprint  number     `json:"footprint_m2"`
	Surfaces   []mapShare `json:"surfaces"`
	Openings   []mapShare `json:"openings"`
	Reached    []mapShare `json:"reached"`
}

type mapShare struct {
	Name  string `json:"name"`
	Count int    `json:"count"`
	Share number `json:"share"`
}

// mapRecords are the landing maps for run.json.
func (j *job) mapRecords() (out []mapRecord) {
	shares := func(list []measure.Share) []mapShare {
		out := []mapShare{}
		for _, s := range list {
			out = append(out, mapShare{s.Name, s.Count, number(s.Share)})
		}
		return out
	}
	for i := range j.maps {
		c := j.maps[i].land
		if c == nil {
			continue
		}
		out = append(out, mapRecord{j.maps[i].of.Name, c.Places, c.SkippedPlaces(), len(c.Directions), c.Flights, c.Landed,
			number(c.Worst.Energy), number(c.Worst.Speed), number(c.FootprintArea()), shares(surfaceShares(c)), shares(c.Openings), shares(c.Goals)})
	}
	return out
}
