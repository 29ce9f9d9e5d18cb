package plots

import (
	"math"
	"strconv"
	"strings"

	"gonum.org/v1/plot/vg"
)

// loads is a stack of panels at work.
type loads struct {
	sheet
	spin   string // what is said of it
	axis   string
	panels []*panel
	legs   []legMark
}

// legMark is a leg with the place of its name.
type legMark struct {
	from, to float64 // pt along the page
	words    string
	at       vg.Point // middle of the words' baseline
}

const (
	legRow      = 11.0 // pt
	mostLegRows = 3
	mostLoads   = 115.0 // pt, height of a panel where few are stacked
	uprightFrom = 4     // panels
)

func newLoads(spec StackChartSpec, panels []*panel) *loads {
	c := &loads{spin: spec.spin(), axis: spec.Axis, panels: panels}
	plan := sheetPlan{title: spec.Title, notes: spec.Notes, strip: true, upright: len(panels) >= uprightFrom}
	numbered := false
	rows := 0
	for range 2 {
		w, h := plan.room()
		top := legRow * float64(rows)
		pitch := math.Min(mostLoads+titleAbove, (h-axisBelow-top)/float64(len(panels)))
		c.sheet = plan.lay(w, pitch*float64(len(panels))+axisBelow+top)
		c.stack(spec, top, pitch)
		var fits bool
		if rows, fits = c.nameLegs(spec.Legs, numbered); !fits {
			numbered = true
			rows, _ = c.nameLegs(spec.Legs, numbered)
			plan.notes = strings.TrimSpace(spec.Notes + " " + legList(spec.Legs))
		}
	}
	return c
}

// spin is what is said of the spin.
func (s StackChartSpec) spin() string {
	if s.Spins != "" {
		return clean(s.Spins)
	}
	return spinStatement(s.Spin)
}

// stack sets the panels below each other, all right of the widest number.
func (c *loads) stack(spec StackChartSpec, top, pitch float64) {
	t0, t1 := spec.X[0], spec.X[len(spec.X)-1]
	left := 0.0
	place := func() {
		for i, q := range c.panels {
			y := c.win.Max.Y.Points() - top - float64(i)*pitch
			q.set(vg.Rectangle{Min: xy(c.win.Min.X.Points()+left, y-pitch), Max: xy(c.win.Max.X.Points()-8, y-titleAbove)}, t0, t1)
		}
	}
	place()
	for _, q := range c.panels {
		left = math.Max(left, q.leftNeed()+6)
	}
	place()
	for _, q := range c.panels {
		q.name(len(q.curves) > 1)
	}
}

// nameLegs gives each leg's name a row and a place above the panels. Numbers stand in
// for names that have no room.
func (c *loads) nameLegs(legs []LegSpan, numbered bool) (rows int, fits bool) {
	const most, gap = 110, 6
	c.legs = nil
	q := c.panels[0]
	lo, hi := q.win.Min.X.Points(), q.win.Max.X.Points()
	var ends [mostLegRows]float64
	for i, l := range legs {
		m := legMark{from: q.pt(l.From, 0).X.Points(), to: q.pt(l.To, 0).X.Points()}
		if m.to < lo || m.from > hi {
			continue
		}
		m.words = clip(clean(l.Name), most, sizeNote, false)
		if numbered {
			m.words = strconv.Itoa(i + 1)
		}
		w := textWidth(m.words, sizeNote, false)
		mid := (math.Max(lo, m.from) + math.Min(hi, m.to)) / 2
		mid = math.Max(lo+w/2, math.Min(hi-w/2, mid))
		row := 0
		for row < mostLegRows && ends[row] > mid-w/2-gap {
			row++
		}
		if row == mostLegRows {
			if !numbered {
				return 0, false
			}
			m.words, row = "", 0
		} else {
			ends[row] = mid + w/2
		}
		m.at = xy(mid, c.win.Max.Y.Points()-sizeNote)
		m.at.Y -= vg.Length(legRow * float64(row))
		rows = max(rows, row+1)
		c.legs = append(c.legs, m)
	}
	return rows, true
}

// legList names the legs by their numbers.
func legList(legs []LegSpan) string {
	names := make([]string, len(legs))
	for i, l := range legs {
		names[i] = strconv.Itoa(i+1) + " " + clean(l.Name)
	}
	return "Legs: " + strings.Join(names, ", ") + "."
}

func (c *loads) paint(p *pad) {
	last := c.panels[len(c.panels)-1]
	c.paintLegs(p, last)
	for _, q := range c.panels {
		q.paint(p, q == last)
	}
	at := xy((last.win.Min.X+last.win.Max.X).Points()/2, last.win.Min.Y.Points()-axisBelow+3)
	p.text(text{s: clean(c.axis), at: at, along: 0.5, size: sizeLabel, ink: inkText})
	c.say(p, c.spin, c.strip.Min.X.Points()-12, c.strip.Max.X.Points())
	c.sheet.draw(p)
}

// paintLegs draws thin verticals at the ends of legs, and the names.
func (c *loads) paintLegs(p *pad, last *panel) {
	lo, hi := last.win.Min.X.Points(), last.win.Max.X.Points()
	drawn := math.Inf(-1)
	for _, m := range c.legs {
		for _, x := range []float64{m.from, m.to} {
			if x <= lo || x >= hi || math.Abs(x-drawn) < 0.5 {
				continue
			}
			for _, q := range c.panels {
				p.line(penExt, xy(x, q.win.Min.Y.Points()), xy(x, q.win.Max.Y.Points()))
			}
			drawn = x
		}
	}
	for _, m := range c.legs {
		p.text(text{s: m.words, at: m.at, along: 0.5, size: sizeNote, ink: inkSoft})
	}
}
