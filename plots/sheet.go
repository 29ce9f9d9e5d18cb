package plots

import (
	"math"
	"strings"

	"gonum.org/v1/plot/vg"
)

// sheet is the page of a figure: title, window and side column, strip, notes.
type sheet struct {
	w, h             float64 // pt
	title, notes     []string
	win, side, strip vg.Rectangle
}

const (
	stripHeight = 34.0
	sideGap     = 10.0
	maxNotes    = 7 // lines of notes
	maxTitle    = 2 // lines of title
)

// sheetPlan is what a sheet must hold before the size of its window is known.
type sheetPlan struct {
	title, notes string
	side         float64 // width of the column beside the window, pt; 0 for none
	strip        bool
	upright      bool
	part         *part // the sheet is a part of another one
}

// part is the room for a view on a sheet that holds several, pt.
type part struct {
	wide, high float64 // at most, of the window
	foot       float64 // of the strip above the foot of the sheet
}

func (s sheetPlan) limits() (w, h float64) {
	if s.upright {
		return sheetShort, sheetLong
	}
	return sheetLong, sheetShort
}

func (s sheetPlan) texts(w float64) (title, notes []string) {
	return balanced(clean(s.title), w, sizeTitle, true, maxTitle), wrap(clean(s.notes), w, sizeNote, false, maxNotes)
}

func (s sheetPlan) extras(title, notes []string) (w, h float64) {
	w, h = 2*margin, 2*margin+float64(len(title))*sizeTitle*lineHeight+4
	if s.side > 0 {
		w += s.side + sideGap
	}
	if s.strip {
		h += stripHeight
	}
	if len(notes) > 0 {
		h += 5 + float64(len(notes))*sizeNote*lineHeight
	}
	return w, h
}

// room is the largest window that the sheet can hold, pt.
func (s sheetPlan) room() (w, h float64) {
	if s.part != nil {
		return s.part.wide, s.part.high
	}
	fullW, fullH := s.limits()
	ew, eh := s.extras(s.texts(fullW - 2*margin))
	return fullW - ew, fullH - eh
}

// lay makes the sheet around a window of the given size.
func (s sheetPlan) lay(winW, winH float64) sheet {
	w := winW + 2*margin
	if s.side > 0 {
		w += s.side + sideGap
	}
	title, notes := s.texts(w - 2*margin)
	_, eh := s.extras(title, notes)
	out := sheet{w: w, h: winH + eh, title: title, notes: notes}
	top := out.h - margin - float64(len(title))*sizeTitle*lineHeight - 4
	if s.part != nil {
		top = s.part.foot + stripHeight + winH
	}
	out.win = vg.Rectangle{Min: xy(margin, top-winH), Max: xy(margin+winW, top)}
	if s.side > 0 {
		out.side = vg.Rectangle{Min: xy(margin+winW+sideGap, top-winH), Max: xy(w-margin, top)}
	}
	if s.strip {
		out.strip = vg.Rectangle{Min: xy(margin, top-winH-stripHeight), Max: xy(w-margin, top-winH)}
	}
	return out
}

// draw draws the title and the notes.
func (s sheet) draw(p *pad) {
	y := s.h - margin - sizeTitle*0.8
	for _, l := range s.title {
		p.text(text{s: l, at: xy(margin, y), size: sizeTitle, bold: true, ink: inkText})
		y -= sizeTitle * lineHeight
	}
	for i, l := range s.notes {
		y := margin + 1.5 + float64(len(s.notes)-1-i)*sizeNote*lineHeight
		p.text(text{s: l, at: xy(margin, y), size: sizeNote, ink: inkSoft})
	}
}

// cue draws the two directions of a view at the left of the strip and returns the page
// x at its right. down turns the second arrow toward the bottom of the page.
func (s sheet) cue(p *pad, right, other string, down bool) float64 {
	const long, short = 30.0, 17.0
	x, y := s.strip.Min.X.Points()+3, s.strip.Min.Y.Points()+8
	turn, textY := math.Pi/2, y+short-4
	if down {
		y += short - 2
		turn, textY = -math.Pi/2, y-short
	}
	o := xy(x, y)
	tip := o.Add(heading(turn).Scale(short))
	p.line(penDim, o.Add(xy(long, 0)), o, tip)
	p.arrow(inkText, o.Add(xy(long, 0)), 0, 6)
	p.arrow(inkText, tip, turn, 6)
	p.text(text{s: right, at: o.Add(xy(long+3, -2.6)), size: sizeNote, ink: inkText})
	p.text(text{s: other, at: xy(x+4, textY), size: sizeNote, ink: inkText})
	return x + long + 3 + math.Max(textWidth(right, sizeNote, false), textWidth(other, sizeNote, false)-long)
}

// scale draws the scale bar at the right of the strip and returns the page x at its left.
func (s sheet) scale(p *pad, v view) float64 {
	const most = 110.0
	w := scaleBarLength(v.perM, most) * v.perM
	label := roundLength(scaleBarLength(v.perM, most))
	over := textWidth(label, sizeNote, false) / 2
	x := s.strip.Max.X.Points() - w - over
	v.scaleBar(p, xy(x, s.strip.Min.Y.Points()+10), most)
	return x - 4
}

// say writes a statement into the strip between the pages x from and to, on up to three lines.
func (s sheet) say(p *pad, statement string, from, to float64) {
	const gap = 12
	lines, size := wrap(statement, to-from-2*gap, sizeLabel, false, 2), sizeLabel
	if n := len(lines); n == 2 && strings.HasSuffix(lines[1], "…") {
		lines, size = wrap(statement, to-from-2*gap, sizeNote, false, 3), sizeNote
	}
	pitch := size * lineHeight
	y := s.strip.Min.Y.Points() + 10 + pitch/2*float64(len(lines)-1)
	for i, l := range lines {
		p.text(text{s: l, at: xy(from+gap, y-float64(i)*pitch), size: size, ink: inkText})
	}
}

// spinStatement says which way the floor moves: the drawn directions never flip.
func spinStatement(spin float64) string {
	switch {
	case spin > 0:
		return "Spin " + rpm(spin) + ": the floor moves spinward."
	case spin < 0:
		return "Spin " + minus + rpm(spin) + ": the floor moves antispinward. Spinward, as drawn, is against the rotation."
	}
	return "No spin."
}
