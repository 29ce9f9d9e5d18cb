package plots

import (
	"encoding/xml"
	"math"
	"strings"
	"testing"
)

func loopOf(x, y, half float64) []Point {
	return []Point{{x - half, y - half}, {x + half, y - half}, {x + half, y + half}, {x - half, y + half}}
}

// hole is a loop the other way round.
func hole(x, y, half float64) []Point {
	s := loopOf(x, y, half)
	return []Point{s[3], s[2], s[1], s[0]}
}

// mapSpec is a map of n nested shades about the hatch of planSpec.
func mapSpec(n int) MapPlanSpec {
	s := MapPlanSpec{Deck: planSpec(), Of: "worst impact energy, J", Mark: &Point{3.2, 0.2}, MarkWords: "worst: 21.0 J",
		Region: [][]Point{loopOf(3.5, 0, 0.8)}, Words: []string{"worst: 21.0 J at 6.17 m/s, on floor", "\"pan\" let go at 98 places, with 0.5 m/s in 42 directions"}}
	for i := range n {
		half := 1.5 - 0.2*float64(i)
		s.Layers = append(s.Layers, MapLayer{Label: "10 to 15 J", Short: "10 J", Outlines: [][]Point{loopOf(3.2, 0, half), hole(3.2, 0, 0.1+0.02*float64(i))}})
	}
	s.Footprint = s.Layers[0].Outlines
	return s
}

func mapSamples() []sampleFigure {
	of := func(name string, s MapPlanSpec) sampleFigure {
		return sampleFigure{"map " + name, func() (*Figure, error) { return MapPlan(s) }}
	}
	far := mapSpec(3)
	for i := range far.Layers {
		for k := range far.Layers[i].Outlines {
			for p := range far.Layers[i].Outlines[k] {
				far.Layers[i].Outlines[k][p].X += 50
			}
		}
	}
	open := mapSpec(4)
	open.Deck.From.Y, open.Deck.To.Y = 0, 0
	wordy := mapSpec(6)
	for range 30 {
		wordy.Words = append(wordy.Words, "first on one more of the many surfaces 3.3 %")
	}
	bare := mapSpec(1)
	bare.Footprint, bare.Region, bare.Mark, bare.Words = nil, nil, nil, nil
	return []sampleFigure{of("of six shades", mapSpec(6)), of("of one", bare), of("over the seam", far), of("without bulkheads", open), of("with many words", wordy)}
}

func TestMapPlanRefuses(t *testing.T) {
	nan := math.NaN()
	for name, spoil := range map[string]func(*MapPlanSpec){
		"no title":         func(s *MapPlanSpec) { s.Deck.Title = "" },
		"no shades":        func(s *MapPlanSpec) { s.Layers = nil },
		"too many shades":  func(s *MapPlanSpec) { s.Layers = mapSpec(MostLayers + 1).Layers },
		"a corner of NaN":  func(s *MapPlanSpec) { s.Layers[1].Outlines[0][2].X = nan },
		"footprint of NaN": func(s *MapPlanSpec) { s.Footprint = [][]Point{{{0, nan}}} },
		"huge region":      func(s *MapPlanSpec) { s.Region[0][0].X = 1e12 },
		"mark of NaN":      func(s *MapPlanSpec) { s.Mark.Y = nan },
	} {
		s := mapSpec(4)
		spoil(&s)
		if f, err := MapPlan(s); err == nil || f != nil {
			t.Errorf("%s: drawn", name)
		}
	}
}

// luminance is how bright a colour prints in grey (ITU-R BT.709 weights, from memory).
func luminance(c ink) float64 {
	v := inks[c].light
	return 0.2126*float64(v.R) + 0.7152*float64(v.G) + 0.0722*float64(v.B)
}

// TestShadesDarken: each shade in use is darker than the one before, in grey too, by a
// step that is seen (common practice, no source), and so is the first on paper.
func TestShadesDarken(t *testing.T) {
	const least = 18 // of 255
	for n := 1; n <= MostLayers; n++ {
		s := mapPlan{of: mapSpec(n)}
		before := inkPaper
		for i := range n {
			if d := luminance(before) - luminance(s.shade(i)); d < least {
				t.Errorf("shade %d of %d is %g darker than the one before", i, n, d)
			}
			before = s.shade(i)
		}
	}
}

// TestMapPlanFillsItsLayers: a path with both outlines for each layer, and a box in the
// bar; holes run the other way round, so that they stay free.
func TestMapPlanFillsItsLayers(t *testing.T) {
	const n = 5
	f, err := MapPlan(mapSpec(n))
	svg := render(t, f, err)
	layers, boxes := 0, 0
	elements(t, svg, func(e xml.StartElement, attr func(string) string, _ string) {
		if e.Name.Local != "path" || !strings.HasPrefix(attr("class"), "fill-heat") {
			return
		}
		switch strings.Count(attr("d"), "M") {
		case 2:
			layers++
		case 1:
			boxes++
		}
	})
	if layers != n || boxes != n {
		t.Errorf("%d layers, %d boxes, want %d", layers, boxes, n)
	}
	for _, words := range []string{"worst: 21.0 J", "footprint", "let go over this", "10 J", "worst impact energy, J"} {
		if !strings.Contains(svg, words) {
			t.Errorf("%q is not written", words)
		}
	}
}
