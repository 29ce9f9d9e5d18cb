package plots

import (
	"math"

	"gonum.org/v1/plot/vg"
)

// mapPlan is a map of a deck at work. The text beside it is that of a scatter's plan.
type mapPlan struct {
	scatterPlan
	of  MapPlanSpec
	bar vg.Rectangle // the bar of shades, with what it shows above it
}

var (
	penFootprint = pen{ink: inkText, width: 1.5}
	penRegion    = pen{ink: inkVermillion, width: 1.1, dashes: []vg.Length{5, 2.5}}
	penStep      = pen{ink: inkText, width: 0.35}
)

// shade is the ink of layer i: the shades in use are spread over all of them.
func (s *mapPlan) shade(i int) ink {
	n := len(s.of.Layers)
	if n == 1 {
		return inkHeat3
	}
	return inkHeat1 + ink(math.Round(float64(i)*float64(MostLayers-1)/float64(n-1)))
}

func (s *mapPlan) arrange() {
	must := s.must()
	if c := s.spec.circumference(); c > 0 && must.size().X > c {
		must.min.X, must.max.X = -c/2, c/2
	}
	s.deck = s.bounds()
	if s.spec.From.Y == s.spec.To.Y { // no bulkheads: as far as there is something
		all := must
		all.grow(0.2 * all.size().norm())
		s.deck.add(Point{s.deck.min.X, all.min.Y}, Point{s.deck.max.X, all.max.Y})
	}
	must = s.choose(must, s.padded(must))
	f := frame{left: 12, right: 12, top: 12, bottom: 12, numbersLeft: 34, numbersLow: 13, down: true}
	for range 2 { // the second time with room for the numbers at the left
		s.stage = newStage(sheetPlan{title: s.spec.Title, notes: s.spec.Notes, side: planColumn, strip: true}, must, f)
		s.number()
		for _, t := range s.yTicks {
			f.numbersLeft = math.Max(f.numbersLeft, textWidth(t.Label+" m", sizeTick, false)+8)
		}
	}
	s.layBar()
	s.write()
	s.label()
}

const (
	barWide = 22.0 // pt, of a shade in the bar
	barHigh = 12.0
)

// layBar keeps the top of the side column for the bar.
func (s *mapPlan) layBar() {
	lines := len(s.barWords())
	high := float64(lines)*entryPitch + 3 + barHigh*float64(len(s.of.Layers)) + 6
	s.bar = s.side
	s.bar.Min.Y = s.bar.Max.Y - vg.Length(high)
	s.side.Max.Y = s.bar.Min.Y
	s.side.Min.X -= numberWide - 4 // no marks stand before its lines
}

func (s *mapPlan) barWords() []string { return wrap(clean(s.of.Of), planColumn-4, sizeLabel, false, 3) }

// paintBar draws the shades with their values, the greatest on top.
func (s *mapPlan) paintBar(p *pad) {
	x, y := s.bar.Min.X.Points()+4, s.bar.Max.Y.Points()
	for _, l := range s.barWords() {
		y -= entryPitch
		p.text(text{s: l, at: xy(x, y+2), size: sizeLabel, ink: inkText})
	}
	y -= 3
	for i := len(s.of.Layers) - 1; i >= 0; i-- {
		y -= barHigh
		box := vg.Rectangle{Min: xy(x, y), Max: xy(x+barWide, y+barHigh)}
		p.fillRect(box, s.shade(i))
		p.rect(box, penStep)
		p.text(text{s: clean(s.of.Layers[i].Label), at: xy(x+barWide+6, y+barHigh/2-sizeLabel*capHeight/2), size: sizeLabel, ink: inkText})
	}
}

// label finds places for the names: of steps, of the region, of what stands out.
func (s *mapPlan) label() {
	if s.of.Mark != nil {
		s.each(*s.of.Mark, func(q vg.Point) {
			s.pl.mark(q, crossArm)
			s.pl.add(label{s: clean(s.of.MarkWords), size: sizeLabel, bold: true, ink: inkText, at: q, clear: crossArm + 1, need: true})
		})
	}
	region := "let go over this"
	for _, l := range s.of.Region {
		region = s.nameOnce(closedLoop(l), region, pricePlumb)
	}
	foot := "footprint"
	if s.of.Strong != "" {
		foot = clean(s.of.Strong)
	}
	for _, l := range longestFirst(s.of.Footprint) {
		foot = s.nameOnce(closedLoop(l), foot, priceStrong)
	}
	for _, layer := range s.of.Layers[1:] {
		name := clean(layer.Short)
		for _, l := range longestFirst(layer.Outlines) {
			if name == "" {
				break
			}
			name = s.nameOnce(closedLoop(l), name, priceThin)
		}
	}
	s.plan.label()
}

// longestFirst gives the longest loop alone, the one worth a name.
func longestFirst(loops [][]Point) [][]Point {
	best, long := -1, 0.0
	for i, l := range loops {
		sum := 0.0
		for k := range l {
			sum += l[k].sub(l[(k+1)%len(l)]).norm()
		}
		if sum > long {
			best, long = i, sum
		}
	}
	if best < 0 {
		return nil
	}
	return loops[best : best+1]
}

// closedLoop repeats the first corner of an outline.
func closedLoop(c []Point) []Point {
	if len(c) == 0 {
		return c
	}
	return append(c[:len(c):len(c)], c[0])
}

// paintLayer fills the outlines of a layer, as one path: those around holes run the
// other way round and leave them free.
func (s *mapPlan) paintLayer(p *pad, i int) {
	var path vg.Path
	for _, loop := range s.of.Layers[i].Outlines {
		s.laps(closedLoop(loop), func(page []vg.Point) {
			path = append(path, linePath(clipPolygon(s.field(), page), true)...)
		})
	}
	p.fill(s.shade(i), path)
}

// strokes draws closed outlines.
func (s *mapPlan) strokes(p *pad, n pen, loops [][]Point) {
	for _, loop := range loops {
		s.laps(closedLoop(loop), func(page []vg.Point) { s.line(p, n, page) })
	}
}

func (s *mapPlan) paint(p *pad) {
	s.paintGrid(p)
	s.paintDeck(p)
	shapes := s.shapes()
	for _, shape := range shapes {
		s.paintShape(p, shape)
	}
	for i := range s.of.Layers {
		s.paintLayer(p, i)
	}
	for i := range s.of.Layers[1:] {
		s.strokes(p, penStep, s.of.Layers[i+1].Outlines)
	}
	for _, shape := range shapes { // once more, over the shades
		s.line(p, penFixture, shape.path)
		if shape.opening && !shape.closed {
			s.line(p, penExt, []vg.Point{shape.path[0], shape.path[2]})
			s.line(p, penExt, []vg.Point{shape.path[1], shape.path[3]})
		}
	}
	s.strokes(p, penFootprint, s.of.Footprint)
	s.strokes(p, penRegion, s.of.Region)
	p.rect(s.win, penFrame)
	if s.of.Mark != nil {
		s.each(*s.of.Mark, p.plus)
	}
	s.pl.draw(p)
	s.paintBar(p)
	s.paintLines(p)
	s.drawStrip(p, "spinward", "+axial", spinStatement(s.spec.Spin)+s.cropStatement())
	s.sheet.draw(p)
}
