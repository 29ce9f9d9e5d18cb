package motion

import (
	"fmt"
	"html"
	"io"
	"math"
	"strings"

	"offplumb/plots"
)

// A loop holds still before the release and longer at the end, s.
const (
	holdBefore = 0.4
	holdAfter  = 2.0
)

const fontStack = "'Liberation Sans', Arial, Helvetica, sans-serif"

// Animation writes a film as an SVG that moves by itself, without script, wherever an image
// is shown: both frames in step, again and again. Viewers that do not animate show the end
// of the film with the whole path. The bytes are the same on each run.
func Animation(w io.Writer, f *Film) error {
	s, err := newShow(f)
	if err != nil {
		return fmt.Errorf("moving picture of %q: %w", f.Name, err)
	}
	a := newLoop(s)
	_, err = io.WriteString(w, a.document())
	return err
}

// loop is an animation in the making.
type loop struct {
	*show
	rate, dur float64 // dur in s, of a whole loop
}

func newLoop(s *show) *loop {
	a := &loop{show: s, rate: rate(s.reel.end)}
	a.dur = holdBefore + s.reel.end/a.rate + holdAfter
	return a
}

// key is the fraction of the loop at which a moment (s since the release) is shown.
func (a *loop) key(t float64) float64 { return (holdBefore + t/a.rate) / a.dur }

// frames are what an attribute takes at moments, between which it changes evenly.
type frames struct {
	t      []float64
	values []string
}

// timing gives the attributes of an animation of the frames.
func (a *loop) timing(f frames, mode string) string {
	var keys, values strings.Builder
	put := func(k float64, v string) {
		if keys.Len() > 0 {
			keys.WriteByte(';')
			values.WriteByte(';')
		}
		keys.WriteString(trimmed(k))
		values.WriteString(v)
	}
	put(0, f.values[0])
	for i := range f.t {
		put(a.key(f.t[i]), f.values[i])
	}
	if mode != "discrete" {
		put(1, f.values[len(f.values)-1])
	}
	return fmt.Sprintf(` dur="%ss" repeatCount="indefinite" calcMode="%s" keyTimes="%s" values="%s"`, trimmed(a.dur), mode, keys.String(), values.String())
}

// trimmed prints a time or a fraction with six decimals: a loop of a minute is then within
// a thirtieth of a frame.
func trimmed(v float64) string {
	return strings.TrimSuffix(strings.TrimRight(fmt.Sprintf("%.6f", v), "0"), ".")
}

// follow chooses the moments at which a path must be given for it to be met within a
// quarter of a unit at every time between.
func follow(t []float64, pts [][2]float64) []int {
	const tolerance = 0.25
	out := []int{0}
	var split func(lo, hi int)
	split = func(lo, hi int) {
		worst, far := lo, 0.0
		for i := lo + 1; i < hi; i++ {
			w := 0.5
			if t[hi] > t[lo] {
				w = (t[i] - t[lo]) / (t[hi] - t[lo])
			}
			d := math.Hypot(pts[i][0]-pts[lo][0]-w*(pts[hi][0]-pts[lo][0]), pts[i][1]-pts[lo][1]-w*(pts[hi][1]-pts[lo][1]))
			if d > far {
				worst, far = i, d
			}
		}
		if far <= tolerance {
			out = append(out, hi)
			return
		}
		split(lo, worst)
		split(worst, hi)
	}
	if len(pts) > 1 {
		split(0, len(pts)-1)
	}
	return out
}

// carry gives the animation that carries something along a path, and the one that uncovers
// the path behind it.
func (a *loop) carry(t []float64, pts [][2]float64) (motion, mask string) {
	var place, left frames
	var d path
	var sums []float64
	sum := 0.0
	keys := follow(t, pts)
	for i, k := range keys {
		if i > 0 {
			sum += math.Hypot(pts[k][0]-pts[keys[i-1]][0], pts[k][1]-pts[keys[i-1]][1])
		}
		d.op("ML"[min(i, 1)], pts[k][0], pts[k][1])
		sums = append(sums, sum)
		place.t, place.values = append(place.t, t[k]), append(place.values, num(pts[k][0])+" "+num(pts[k][1]))
	}
	left.t = place.t
	for _, gone := range sums {
		left.values = append(left.values, num(sum-gone))
	}
	motion = `<animateTransform attributeName="transform" type="translate"` + a.timing(place, "linear") + `/>`
	mask = fmt.Sprintf(`<path d="%s" fill="none" stroke="#fff" stroke-width="4"><set attributeName="stroke-dasharray" to="%s"/><animate attributeName="stroke-dashoffset"%s/></path>`,
		d.String(), num(sum+0.01), a.timing(left, "linear"))
	return motion, mask
}

// track gives the moments and places of the body on a drawing.
func (a *loop) track(v view, of func(spot) plots.Point) (t []float64, pts [][2]float64) {
	for _, p := range a.spots {
		t = append(t, p.t)
	}
	return t, a.dense(v, of)
}

// boardMoves are those of the habitat frame.
func (a *loop) boardMoves() (m moves) {
	m.body, m.mask = a.carry(a.track(a.board, onBoard))
	m.reveal = a.reveal
	if len(a.uniform) > 0 {
		var t []float64
		var pts [][2]float64
		for i, p := range a.uniform {
			x, y := a.board.at(p)
			t, pts = append(t, a.film.Uniform.Time*float64(i)/float64(len(a.uniform)-1)), append(pts, [2]float64{x, y})
		}
		t, pts = within(t, pts, a.reel.end)
		m.ghost, _ = a.carry(t, pts)
	}
	return m
}

// within cuts a path off at a time.
func within(t []float64, pts [][2]float64, end float64) ([]float64, [][2]float64) {
	n := 1
	for n < len(t) && t[n] <= end {
		n++
	}
	return t[:n], pts[:n]
}

// reveal makes a mark appear when it happens.
func (a *loop) reveal(e *Event) string {
	if e.T <= 0 {
		return ""
	}
	return `<animate attributeName="opacity"` + a.timing(frames{[]float64{e.T}, []string{"0"}}, "discrete") + `/>`
}

// beyondMoves are those of the inertial frame.
func (a *loop) beyondMoves() (m moves) {
	m.body, m.mask = a.carry(a.track(a.beyond, outside))
	m.reveal = a.reveal
	degrees := -a.film.Spin * a.reel.end * 180 / math.Pi
	ax, ay := a.beyond.at(plots.Point{})
	const far = 1e5 // units: beyond it renderers' 32 bits would show
	if math.Hypot(ax, ay) <= far {
		about := fmt.Sprintf(" %s %s", num(ax), num(ay))
		m.spin = a.rotation("0"+about, trimmed(degrees)+about)
		return m
	}
	// Turned about the foot of the plumb line, which goes along its arc.
	foot := a.film.plumb(a.film.foot())
	fx, fy := a.beyond.at(foot)
	about := fmt.Sprintf(" %s %s", num(fx), num(fy))
	m.spin = a.rotation("0"+about, trimmed(degrees)+about)
	var f frames
	const parts = 16
	for k := 0.0; k <= parts; k++ {
		t := a.reel.end * k / parts
		x, y := a.beyond.at(spun(foot, a.film.Spin*t))
		f.t, f.values = append(f.t, t), append(f.values, num(x-fx)+" "+num(y-fy))
	}
	m.spinOuter = `<animateTransform attributeName="transform" type="translate"` + a.timing(f, "linear") + `/>`
	return m
}

func (a *loop) rotation(from, to string) string {
	return `<animateTransform attributeName="transform" type="rotate"` +
		a.timing(frames{[]float64{0, a.reel.end}, []string{from, to}}, "linear") + `/>`
}

// Layout of the picture, units.
const (
	edge      = 14.0
	between   = 14.0
	headLine  = 20.0
	nameLine  = 20.0
	stripTall = 58.0
	noteLine  = 15.0
)

func (a *loop) document() string {
	notes := a.notes()
	w := 2*viewWidth + 2*edge + between
	top := edge + headLine + nameLine
	h := top + viewHeight + stripTall + noteLine*float64(len(notes)) + edge
	var b sheet
	b.put(`<?xml version="1.0" encoding="UTF-8"?>`+"\n"+`<svg xmlns="http://www.w3.org/2000/svg" width="%s" height="%s" viewBox="0 0 %s %s" role="img" aria-labelledby="%s-title %s-desc" font-family="%s">`,
		num(w), num(h), num(w), num(h), a.id, a.id, fontStack)
	b.put("\n<title id=\"%s-title\">%s</title>\n<desc id=\"%s-desc\">%s</desc>\n", a.id, html.EscapeString(a.film.Title), a.id, html.EscapeString(a.film.Desc))
	b.put("<style>%s</style>\n", alone())
	b.put(`<rect class="f-ground" width="%s" height="%s"/>`, num(w), num(h))
	b.text("f-title", edge, edge+14, a.film.Title)
	b.text("f-name", edge, top-6, "On board: the habitat frame")
	b.text("f-name", edge+viewWidth+between, top-6, "From outside: "+a.turningWords())
	b.put("\n<g transform=\"translate(%s %s)\">", num(edge), num(top))
	a.drawBoard(&b, a.boardMoves())
	b.put("</g>\n<g transform=\"translate(%s %s)\">", num(edge+viewWidth+between), num(top))
	a.drawBeyond(&b, a.beyondMoves())
	b.put("</g>\n<g transform=\"translate(%s %s)\">", num(edge), num(top+viewHeight))
	a.strip(&b, w-2*edge)
	b.put("</g>\n")
	for i, n := range notes {
		b.text("f-note", edge, top+viewHeight+stripTall+noteLine*(float64(i)+0.4), n)
	}
	b.put("</svg>\n")
	return b.String()
}

func (a *loop) notes() []string {
	return wrap(spinWords(a.film.Spin)+" "+rateWords(a.rate)+" Both seen from the +axial end. "+a.show.notes(), 170)
}

// strip draws the ruler of time with its marker, and the clock.
func (a *loop) strip(b *sheet, w float64) {
	const y, clock = 24.0, 84.0
	x0, x1 := clock, w-24
	at := func(t float64) float64 {
		if a.reel.end == 0 {
			return x0
		}
		return x0 + (x1-x0)*t/a.reel.end
	}
	b.put(`<path class="f-strip" d="M%s %sH%s"/>`, num(x0), num(y), num(x1))
	step := tickStep(a.reel.end, 10)
	for i := 0.0; step > 0 && i*step <= a.reel.end*(1+1e-9); i++ {
		b.put(`<path class="f-strip" d="M%s %sv6"/>`, num(at(i*step)), num(y))
		b.text("f-note f-mid", at(i*step), y+19, plain(i*step, 4))
	}
	b.text("f-note", x1+8, y+4, "s")
	for _, t := range a.impacts() {
		b.put(`<path class="f-strip" d="M%s %sv-7"/>`, num(at(t)), num(y))
	}
	for _, k := range marked {
		switch e := a.shown(k); {
		case e == nil:
		case k == Rest:
			b.put(`<rect class="f-ring" x="%s" y="%s" width="8" height="8"/>`, num(at(e.T)-4), num(y-4))
		default:
			b.circle(map[Kind]string{Release: "f-ring", Landing: "f-dot"}[k], at(e.T), y, 4.5)
		}
	}
	move := `<animateTransform attributeName="transform" type="translate"` + a.timing(frames{[]float64{0, a.reel.end}, []string{num(x0) + " 24", num(x1) + " 24"}}, "linear") + `/>`
	b.put(`<g transform="translate(%s 24)">%s<circle class="f-thumb" r="6"/></g>`, num(at(a.reel.end)), move)
	a.clock(b)
}

// clock is a column of times behind a slit, moved line by line.
func (a *loop) clock(b *sheet) {
	const pitch, lines = 40.0, 100.0
	step := tickStep(a.reel.end, lines)
	n := 0
	if step > 0 {
		n = int(math.Floor(a.reel.end/step + 1e-9))
	}
	decimals := max(0, -int(math.Floor(math.Log10(math.Max(step, 1e-9))+1e-9)))
	var f frames
	var column strings.Builder
	for i := range n + 1 {
		f.t, f.values = append(f.t, float64(i)*step), append(f.values, "0 "+num(-pitch*float64(i)))
		fmt.Fprintf(&column, `<tspan x="70" y="%s">%.*f s</tspan>`, num(29+pitch*float64(i)), decimals, float64(i)*step)
	}
	b.put(`<clipPath id="%s-c"><rect y="8" width="76" height="32"/></clipPath><g clip-path="url(#%s-c)">`, a.id, a.id)
	b.put(`<text class="f-clock" text-anchor="end" transform="translate(0 %s)"><animateTransform attributeName="transform" type="translate"%s/>%s</text></g>`,
		num(-pitch*float64(n)), a.timing(f, "discrete"), column.String())
}

// tickStep is the least of 1, 2, 5 times a power of ten that gives at most so many steps.
func tickStep(span, most float64) float64 {
	if span <= 0 {
		return 0
	}
	r := nice(span / most)
	for span/r > most*(1+1e-9) {
		r = nice(r * 2.5)
	}
	return r
}

// wrap breaks words into lines of about so many characters.
func wrap(s string, most int) (lines []string) {
	line := ""
	for _, w := range strings.Fields(s) {
		if line != "" && len([]rune(line))+1+len([]rune(w)) > most {
			lines, line = append(lines, line), ""
		}
		line = strings.TrimSpace(line + " " + w)
	}
	if line != "" {
		lines = append(lines, line)
	}
	return lines
}
