package plots

import (
	"errors"
	"fmt"
	"math"

	"gonum.org/v1/plot/vg"
)

// ThrowCardSpec is what ThrowCard draws: a throw table to print, a row for each throw.
type ThrowCardSpec struct {
	Title, Desc, Notes string // Desc is for readers who cannot see the figure; Notes may be empty

	Spin  float64 // rad/s; negative: the floor moves antispinward
	Heads []string
	Rows  []ThrowCardRow // 1 to MostThrowRows
}

// ThrowCardRow is a throw: a cell for each head, and where to point.
type ThrowCardRow struct {
	Cells []string
	None  string  // in place of the cells but the first: why there is no throw
	Sight float64 // rad above the deck, of the line to the target; NaN: no throw
	Point float64 // rad, where to point, in the upright plane of that line: above the deck, beyond a right angle backward
	Soft  bool    // something is in the way
}

// MostThrowRows is how many throws a sheet has room for.
const MostThrowRows = 20

func (s ThrowCardSpec) check() error {
	if len(s.Rows) == 0 || len(s.Rows) > MostThrowRows || len(s.Heads) < 2 {
		return fmt.Errorf("a card of %d rows and %d columns cannot be drawn", len(s.Rows), len(s.Heads))
	}
	for i, r := range s.Rows {
		if len(r.Cells) != len(s.Heads) {
			return fmt.Errorf("row %d has %d cells, wants %d", i, len(r.Cells), len(s.Heads))
		}
		if math.IsInf(r.Sight, 0) || math.IsInf(r.Point, 0) {
			return fmt.Errorf("row %d points nowhere", i)
		}
	}
	return nil
}

// ThrowCard draws a throw table on an upright sheet: in each row the line to the target,
// dashed, and an arrow where to point, both at their true angles.
func ThrowCard(spec ThrowCardSpec) (*Figure, error) {
	head := headline{spec.Title, spec.Desc, spec.Notes, spec.Spin}
	if err := errors.Join(head.check(), spec.check()); err != nil {
		return nil, fmt.Errorf("throw table: %w", err)
	}
	c := throwCard{spec: spec}
	c.arrange()
	return newFigure(spec.Title, spec.Desc, c.w, c.h, c.paint)
}

const (
	cardPitch = 19.0 // pt, of rows
	cardHead  = 25.0 // of the heads: two lines
	cardArrow = 14.0 // length of an arrow
	cardWide  = 34.0 // of the column of arrows
	cardGap   = 5.0  // between columns
)

// throwCard is a throw table at work.
type throwCard struct {
	sheet
	spec  ThrowCardSpec
	right []float64 // pt, right edge of each column
	heads [][]string
}

func (c *throwCard) arrange() {
	plan := sheetPlan{title: c.spec.Title, notes: c.spec.Notes + " " + spinStatement(c.spec.Spin), upright: true}
	w, _ := plan.room()
	c.sheet = plan.lay(w, cardHead+cardPitch*float64(len(c.spec.Rows)))
	wide := c.widths(w)
	sum := cardWide
	for _, x := range wide {
		sum += x
	}
	gap := (w - sum) / float64(len(wide)) // what is left over stands between columns
	x := c.win.Min.X.Points()
	for i, col := range wide {
		if i == 2 {
			x += cardWide
		}
		x += col + gap
		c.right = append(c.right, x-gap/2)
	}
}

// widths are those of the columns: of their cells, the widest less where they do not fit
// into the width w, pt.
func (c *throwCard) widths(w float64) []float64 {
	wide := make([]float64, len(c.spec.Heads))
	c.heads = make([][]string, len(wide))
	const least, lines = 26.0, 2
	sum := cardWide
	for i := range wide {
		for _, r := range c.spec.Rows {
			wide[i] = math.Max(wide[i], textWidth(clean(r.Cells[i]), sizeTick, false))
		}
		wide[i] = math.Max(wide[i], least)
		sum += wide[i] + cardGap
	}
	for ; sum > w; sum-- {
		widest := 0
		for i := range wide {
			if wide[i] > wide[widest] {
				widest = i
			}
		}
		wide[widest]--
	}
	for i, h := range c.spec.Heads {
		c.heads[i] = wrap(clean(h), wide[i]+cardGap-2, sizeNote, false, lines)
	}
	return wide
}

func (c *throwCard) paint(p *pad) {
	top := c.win.Max.Y.Points()
	left, right := c.win.Min.X, c.win.Max.X
	for i, lines := range c.heads {
		for k, l := range lines {
			y := top - cardHead + 5 + float64(len(lines)-1-k)*sizeNote*lineHeight
			c.cell(p, i, y, l, sizeNote, inkSoft)
		}
	}
	y := top - cardHead
	p.line(penAxis, vg.Point{X: left, Y: vg.Length(y)}, vg.Point{X: right, Y: vg.Length(y)})
	for k, r := range c.spec.Rows {
		ink := inkText
		if r.Soft {
			ink = inkSoft
		}
		base := y - cardPitch*float64(k+1) + 6
		for i, s := range r.Cells {
			if i == 0 && k > 0 && s == c.spec.Rows[k-1].Cells[0] {
				continue // the same target
			}
			c.cell(p, i, base, clip(clean(s), c.room(i), sizeTick, false), sizeTick, ink)
		}
		if r.None != "" {
			p.text(text{s: clip(clean(r.None), (right-left).Points()-c.right[0], sizeTick, false), at: xy(c.right[0]+cardGap, base), size: sizeTick, ink: inkSoft})
		}
		c.arrow(p, r, y-cardPitch*(float64(k)+0.5))
		if k+1 == len(c.spec.Rows) || r.Cells[0] != c.spec.Rows[k+1].Cells[0] {
			low := vg.Length(base - 6)
			p.line(penGrid, vg.Point{X: left, Y: low}, vg.Point{X: right, Y: low})
		}
	}
	c.sheet.draw(p)
}

// room is how wide a cell of a column may be, pt.
func (c *throwCard) room(i int) float64 {
	from := c.win.Min.X.Points()
	if i > 0 {
		from = c.right[i-1]
	}
	if i == 2 {
		from += cardWide
	}
	return c.right[i] - from - 1
}

// cell writes a text to the right of its column; the first two stand left.
func (c *throwCard) cell(p *pad, i int, y float64, s string, size float64, ink ink) {
	if i == 1 {
		p.text(text{s: s, at: xy(c.right[0]+cardGap, y), size: size, ink: ink})
		return
	}
	p.text(text{s: s, at: xy(c.right[i], y), along: 1, size: size, ink: ink})
}

// arrow draws where to point, about the middle of a row.
func (c *throwCard) arrow(p *pad, r ThrowCardRow, middle float64) {
	if math.IsNaN(r.Sight) || math.IsNaN(r.Point) {
		return
	}
	up, down := math.Sin(r.Point), math.Sin(r.Sight)
	rise := math.Max(math.Max(up, down), 0) + math.Min(math.Min(up, down), 0)
	o := xy(c.right[1]+cardWide/2, middle-cardArrow*rise/2)
	tip := o.Add(heading(r.Point).Scale(cardArrow))
	p.line(pen{ink: inkText, width: 0.6, dashes: []vg.Length{2, 1.5}}, o, o.Add(heading(r.Sight).Scale(cardArrow)))
	p.line(pen{ink: seriesInk(0), width: 1.2}, o, o.Add(heading(r.Point).Scale(cardArrow-3)))
	p.arrow(seriesInk(0), tip, r.Point, 6)
	p.fill(inkText, p.circlePath(o, 1.2))
}
