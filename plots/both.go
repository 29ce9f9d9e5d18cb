package plots

import (
	"errors"
	"fmt"
	"strings"

	"gonum.org/v1/plot/vg"
)

// BothViewsSpec is what BothViews draws: one release on board and from outside, above one
// another, from the release to the landing. Titles, descriptions and notes of the two
// views are not used.
type BothViewsSpec struct {
	Title, Desc, Notes string // Desc is for readers who cannot see the figure; Notes may be empty

	Side     SideViewSpec
	Inertial InertialViewSpec
}

// BothViews draws a release in both frames, with a ruler of time between the views: its
// ticks are the marks on both tracks. It is an error if either view could not be drawn.
func BothViews(spec BothViewsSpec) (*Figure, error) {
	spec.Side.Title, spec.Side.Desc = spec.Title, spec.Desc
	spec.Inertial.Title, spec.Inertial.Desc = spec.Title, spec.Desc
	spec.Side.Rest = nil
	side, err := newSide(spec.Side)
	inertial, err2 := newInertial(spec.Inertial)
	if err = errors.Join(err, err2); err != nil {
		return nil, fmt.Errorf("both views: %w", err)
	}
	if l := spec.Side.Landing; l != nil {
		side.track = side.track.upTo(side.track.when(*l))
	}
	b := both{spec: spec, side: side, inertial: inertial}
	b.arrange()
	return newFigure(spec.Title, spec.Desc, b.w, b.h, b.paint)
}

// both is a sheet with two views at work.
type both struct {
	sheet
	spec     BothViewsSpec
	side     *side
	inertial *inertial
	ruler    timeRuler
}

const (
	headHigh  = 14.0 // pt above a view, for its name
	rulerHigh = 40.0
	lowShare  = 0.42 // of the height, which the view from outside may take
)

func (b *both) arrange() {
	plan := sheetPlan{title: b.spec.Title, notes: b.spec.Notes, upright: true}
	w, h := plan.room()
	b.sheet = plan.lay(w, h)
	end := b.side.track.moves()
	step := stepFor(end-b.side.track.t[0], 10)
	b.side.every, b.inertial.every = step, step

	free := h - 2*headHigh - rulerHigh - 2*stripHeight
	foot := b.win.Min.Y.Points()
	b.inertial.part = &part{wide: w, high: free * lowShare, foot: foot}
	b.inertial.arrange()
	top := b.inertial.win.Max.Y.Points() + headHigh
	b.ruler = newRuler(b.side.track, b.spec.Side.Landing, step, vg.Rectangle{Min: xy(margin, top), Max: xy(margin+w, top+rulerHigh)})
	foot = top + rulerHigh
	b.side.part = &part{wide: w, high: b.win.Max.Y.Points() - foot - stripHeight - headHigh, foot: foot}
	b.side.arrange()
}

func (b *both) paint(p *pad) {
	b.side.paintView(p)
	b.side.drawStrip(p, "spinward", "up", b.side.statement(""))
	b.inertial.paintView(p)
	b.inertial.drawStrip(p, "spinward", "up", spinNot(b.inertial.statement(b.inertial.dashed()), b.spec.Side.Spin))
	for _, v := range []struct {
		win   vg.Rectangle
		words string
	}{{b.side.win, "On board: in the habitat frame"}, {b.inertial.win, "From outside: in the inertial frame"}} {
		p.text(text{s: v.words, at: xy(v.win.Min.X.Points(), v.win.Max.Y.Points()+4), size: sizeLabel, bold: true, ink: inkText})
	}
	b.ruler.paint(p)
	b.sheet.draw(p)
}

// spinNot leaves out of a statement what the one above it says.
func spinNot(statement string, spin float64) string {
	return clean(strings.TrimPrefix(statement, spinStatement(spin)))
}
