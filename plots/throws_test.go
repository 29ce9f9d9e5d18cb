package plots

import (
	"encoding/xml"
	"fmt"
	"math"
	"strings"
	"testing"
)

// throwSpec is three throws from one hand; the last hits a bench.
func throwSpec() ThrowViewSpec {
	s := ThrowViewSpec{Title: "Throws of a sample", Desc: "Three throws.", Notes: "Habitat frame.", Spin: sampleSpin, Deck: 18, Outlines: ringOutlines(18, 18),
		From: Point{0, 1.5}, Targets: []ThrowMark{{Point{5, 1.9}, "target"}}}
	for i, up := range []float64{0.4, 2, 5} {
		var line []TrackPoint
		for k := range 81 {
			u := float64(k) / 80
			line = append(line, TrackPoint{T: u * (1 + up/4), X: 5 * u, Y: 1.5 + 0.4*u + 4*up*u*(1-u)})
		}
		s.Throws = append(s.Throws, ThrowLine{Name: fmt.Sprintf("%d lobbed", i+1), Track: line})
	}
	s.Throws[2].Track, s.Throws[2].Hits = s.Throws[2].Track[:30], "hits bench top"
	return s
}

func cardSpec() ThrowCardSpec {
	s := ThrowCardSpec{Title: "Throw table of a sample", Desc: "Where to point.", Notes: "Throws at 6 m/s.", Spin: -sampleSpin,
		Heads: []string{"target", "throw", "above the deck", "above target", "flight", "arrives at"}}
	for i := range MostThrowRows {
		a := math.Pi * (float64(i)/MostThrowRows - 0.3)
		s.Rows = append(s.Rows, ThrowCardRow{Cells: []string{fmt.Sprintf("%d m antisp.", i/2), "lobbed", "52.9°", "-4.9°", "0.608 s", "hits the side of the long bench"}, Sight: 0.1, Point: a, Soft: i%3 == 0})
	}
	s.Rows[4] = ThrowCardRow{Cells: make([]string, 6), None: "out of reach; it takes 7 m/s", Sight: math.NaN(), Point: math.NaN(), Soft: true}
	return s
}

func throwSamples() []sampleFigure {
	round := throwSpec()
	round.Outlines = nil
	for i := range round.Throws[0].Track {
		p := &round.Throws[0].Track[i]
		a := 3 * float64(i) / 80
		p.X, p.Y = 16.5*math.Sin(a), 18-16.5*math.Cos(a)
	}
	flat := throwSpec()
	flat.Deck, flat.Outlines = 0, nil
	one := cardSpec()
	one.Rows = one.Rows[:1]
	view := func(name string, s ThrowViewSpec) sampleFigure {
		return sampleFigure{"throws " + name, func() (*Figure, error) { return ThrowView(s) }}
	}
	card := func(name string, s ThrowCardSpec) sampleFigure {
		return sampleFigure{"throw table " + name, func() (*Figure, error) { return ThrowCard(s) }}
	}
	return []sampleFigure{view("past a bench", throwSpec()), view("round the ring", round), view("on a flat floor", flat), card("full", cardSpec()), card("of one", one)}
}

func TestThrowViewRefuses(t *testing.T) {
	for name, spoil := range map[string]func(*ThrowViewSpec){
		"no title":          func(s *ThrowViewSpec) { s.Title = "" },
		"no throws":         func(s *ThrowViewSpec) { s.Throws = nil },
		"too many throws":   func(s *ThrowViewSpec) { s.Throws = make([]ThrowLine, MostThrows+1) },
		"an empty track":    func(s *ThrowViewSpec) { s.Throws[1].Track = nil },
		"a track of NaN":    func(s *ThrowViewSpec) { s.Throws[1].Track[3].X = math.NaN() },
		"a target of NaN":   func(s *ThrowViewSpec) { s.Targets[0].At.Y = math.NaN() },
		"from infinity":     func(s *ThrowViewSpec) { s.From.X = math.Inf(1) },
		"a negative deck":   func(s *ThrowViewSpec) { s.Deck = -1 },
		"a spin of NaN":     func(s *ThrowViewSpec) { s.Spin = math.NaN() },
		"an outline of NaN": func(s *ThrowViewSpec) { s.Outlines[0].Path[0].Radius = math.NaN() },
	} {
		s := throwSpec()
		spoil(&s)
		if f, err := ThrowView(s); err == nil || f != nil {
			t.Errorf("%s: drawn", name)
		}
	}
}

func TestThrowCardRefuses(t *testing.T) {
	for name, spoil := range map[string]func(*ThrowCardSpec){
		"no description": func(s *ThrowCardSpec) { s.Desc = "" },
		"no rows":        func(s *ThrowCardSpec) { s.Rows = nil },
		"too many rows":  func(s *ThrowCardSpec) { s.Rows = append(s.Rows, s.Rows[0]) },
		"a short row":    func(s *ThrowCardSpec) { s.Rows[3].Cells = s.Rows[3].Cells[:2] },
		"no direction":   func(s *ThrowCardSpec) { s.Rows[3].Point = math.Inf(1) },
	} {
		s := cardSpec()
		spoil(&s)
		if f, err := ThrowCard(s); err == nil || f != nil {
			t.Errorf("%s: drawn", name)
		}
	}
}

// TestThrowViewShowsAll: every throw, its end and every target lie in the window,
// and each throw is named.
func TestThrowViewShowsAll(t *testing.T) {
	spec := throwSpec()
	s := throwView{scene: scene{head: headline{spec.Title, spec.Desc, spec.Notes, spec.Spin}, radius: spec.Deck, outlines: spec.Outlines}, spec: spec}
	for _, l := range spec.Throws {
		tr, err := newTrack(l.Track)
		if err != nil {
			t.Fatal(err)
		}
		s.tracks = append(s.tracks, tr)
	}
	s.arrange()
	for _, tr := range s.tracks {
		for _, p := range append(tr.at, spec.From, spec.Targets[0].At) {
			if !within(s.win, s.v.pt(p)) {
				t.Fatalf("%v is not shown", p)
			}
		}
	}
	f, err := ThrowView(spec)
	svg := render(t, f, err)
	for _, want := range []string{"1 lobbed", "2 lobbed", "3 lobbed, hits bench top", "target", "thrown here"} {
		if !strings.Contains(svg, ">"+want+"<") {
			t.Errorf("%q is not named", want)
		}
	}
}

// TestThrowCardArrows: an arrow has the angle of its row; its shaft is the one blue line.
func TestThrowCardArrows(t *testing.T) {
	spec := cardSpec()
	f, err := ThrowCard(spec)
	svg := render(t, f, err)
	k := 0
	var angles []float64
	for _, r := range spec.Rows {
		if !math.IsNaN(r.Point) {
			angles = append(angles, r.Point)
		}
	}
	elements(t, svg, func(e xml.StartElement, attr func(string) string, _ string) {
		if e.Name.Local != "path" || attr("class") != "line-blue" {
			return
		}
		var x0, y0, x1, y1 float64
		if _, err := fmt.Sscanf(attr("d"), "M%g,%gL%g,%g", &x0, &y0, &x1, &y1); err != nil {
			t.Fatalf("%q: %v", attr("d"), err)
		}
		if got := math.Atan2(y1-y0, x1-x0); k >= len(angles) || math.Abs(math.Remainder(got-angles[k], 2*math.Pi)) > 0.01 {
			t.Errorf("arrow %d points at %g rad", k, got)
		}
		k++
	})
	if k != len(angles) {
		t.Errorf("%d arrows for %d throws", k, len(angles))
	}
}
