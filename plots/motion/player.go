package motion

import (
	_ "embed" // the player's script and style
	"encoding/json"
	"fmt"
	"html"
	"html/template"
	"math"
	"strings"
)

//go:embed player.js
var script string

//go:embed player.css
var style string

// Script is what plays every film of a page: to stand once in it, after or before the
// players. It makes no use of eval, of inline handlers or of style attributes, so that a
// page's Content-Security-Policy may let it pass by its hash alone.
func Script() template.JS { return template.JS(script) }

// Style is the look of every film of a page: to stand once in it. Colours are custom
// properties, --film-*, with a second set for dark screens.
func Style() template.CSS {
	vars := func(value func(hue) string, edge, focus string) string {
		var b strings.Builder
		for _, h := range hues {
			b.WriteString("--film-" + h.name + ":" + value(h) + ";")
		}
		return ".film{" + b.String() + "--film-edge:" + edge + ";--film-focus:" + focus + "}"
	}
	light := vars(func(h hue) string { return h.light }, "#767676", "#D55E00")
	dark := vars(func(h hue) string { return h.dark }, "#8A9199", "#F58A45")
	drawn := rules(func(h hue) string { return "var(--film-" + h.name + ")" })
	return template.CSS(light + "\n@media screen and (prefers-color-scheme:dark){" + dark + "}\n" + scoped(drawn) + "\n" + style)
}

// scoped puts each rule under the class of films, so that none touches the rest of a page.
func scoped(css string) string {
	var b strings.Builder
	for _, rule := range strings.SplitAfter(css, "}") {
		selectors, body, ok := strings.Cut(strings.TrimSpace(rule), "{")
		if !ok {
			continue
		}
		for i, s := range strings.Split(selectors, ",") {
			if i > 0 {
				b.WriteByte(',')
			}
			b.WriteString(".film " + s)
		}
		b.WriteString("{" + body + "\n")
	}
	return b.String()
}

// data is what the script gets of a film.
type data struct {
	Spin    float64      `json:"spin"`   // rad/s
	End     float64      `json:"end"`    // s
	Step    float64      `json:"step"`   // s
	Radius  float64      `json:"radius"` // m
	Flat    bool         `json:"flat"`
	Lean    float64      `json:"lean"`   // rad
	Axial   float64      `json:"axial"`  // m
	Rate    float64      `json:"rate"`   // times real
	Board   [5]float64   `json:"board"`  // units a metre, m and m in the middle, units of the middle
	Beyond  [5]float64   `json:"beyond"` // the same
	Strip   [2]float64   `json:"strip"`  // per cent of the strip's width, its ends
	Marks   []*float64   `json:"marks"`  // s, of release, landing, rest
	Events  []float64    `json:"events"` // s
	Uniform *uniformData `json:"uniform,omitempty"`
	Reel    string       `json:"reel"`
}

type uniformData struct {
	G      float64 `json:"g"`
	Height float64 `json:"height"`
	Along  float64 `json:"along"`
	Up     float64 `json:"up"`
	Time   float64 `json:"time"`
}

// stripEnds are where the ruler of time begins and ends, per cent of its width.
var stripEnds = [2]float64{3, 97}

// Player gives the element of a page that plays a film. Without the script it shows a still
// drawing, the whole path in both frames, and says that it moves with scripts. It never
// begins to play by itself. The bytes are the same on each run.
func Player(f *Film) (template.HTML, error) {
	s, err := newShow(f)
	if err != nil {
		return "", fmt.Errorf("player of %q: %w", f.Name, err)
	}
	d, err := s.data()
	if err != nil {
		return "", fmt.Errorf("player of %q: %w", f.Name, err)
	}
	return template.HTML(s.element(d)), nil
}

func (s *show) data() (string, error) {
	f := s.film
	d := data{Spin: f.Spin, End: s.reel.end, Step: f.Step, Radius: f.Radius, Flat: f.Flat, Lean: f.Lean, Axial: f.Axial,
		Rate: rate(s.reel.end), Board: s.board.spec(), Beyond: s.beyond.spec(), Strip: stripEnds, Events: []float64{}, Reel: s.reel.encode()}
	for _, k := range marked {
		var at *float64
		if e := s.shown(k); e != nil {
			at = &e.T
		}
		d.Marks = append(d.Marks, at)
	}
	for i := range f.Events {
		if e := &f.Events[i]; e.T <= s.reel.end && i < mostEvents {
			d.Events = append(d.Events, e.time())
		}
	}
	if u := f.Uniform; u != nil && u.WhyNotDrawn == "" {
		d.Uniform = &uniformData{u.Gravity, u.Height, u.Along, u.Up, u.Time}
	}
	text, err := json.Marshal(d)
	return string(text), err
}

// mostEvents bounds the events that the keys stop at.
const mostEvents = 120

// time is an event's, exact where it has a mark, else to a microsecond.
func (e *Event) time() float64 {
	if e.Kind == Impact {
		return math.Round(e.T*1e6) / 1e6
	}
	return e.T
}

func (v view) spec() [5]float64 {
	return [5]float64{v.perM, v.cx, v.cy, viewWidth / 2, (viewHeight - viewFoot + viewEdge) / 2}
}

// element writes the player.
func (s *show) element(data string) string {
	f := s.film
	var b sheet
	b.put(`<figure class="film" id="%s" role="group" aria-label="%s" data-film="%s">`, s.id, html.EscapeString("Moving picture: "+f.Name), html.EscapeString(data))
	b.put("\n<figcaption class=\"film-caption\"><strong>%s</strong> <span>%s</span></figcaption>\n<div class=\"film-views\">", html.EscapeString(f.Title), html.EscapeString(spinWords(f.Spin)+" Both seen from the +axial end."))
	s.framed(&b, "board", "On board", "the habitat frame", func() { s.drawBoard(&b, moves{}) })
	s.framed(&b, "beyond", "From outside", s.turningWords(), func() { s.drawBeyond(&b, moves{}) })
	b.put("</div>\n<p class=\"film-notes\" data-film-still>A still drawing: the whole motion, and where it ends. With scripts allowed it moves.</p>\n")
	s.stripPart(&b)
	s.desk(&b)
	s.numbersPart(&b)
	if n := s.notes(); n != "" {
		b.put("<p class=\"film-notes\">%s</p>\n", html.EscapeString(n))
	}
	b.put("</figure>\n")
	return b.String()
}

func (s *show) framed(b *sheet, class, name, frame string, draw func()) {
	b.put("\n<div class=\"film-view\"><p>%s <span>%s</span></p>", name, frame)
	b.put(`<svg class="film-%s" viewBox="0 0 %s %s" role="img" aria-label="%s">`, class, num(viewWidth), num(viewHeight),
		html.EscapeString(name+", "+frame+". "+s.film.Title))
	draw()
	b.put("</svg></div>")
}

// stripPart is the time strip: a slider.
func (s *show) stripPart(b *sheet) {
	end := s.reel.end
	b.put(`<div class="film-strip" role="slider" tabindex="0" aria-label="Time since the release, seconds" aria-valuemin="0" aria-valuemax="%s" aria-valuenow="0" data-film-live hidden>`, trimmed(end))
	b.put(`<svg aria-hidden="true" focusable="false"><line class="f-strip" x1="%g%%" x2="%g%%" y1="20" y2="20"/>`, stripEnds[0], stripEnds[1])
	at := func(t float64) string {
		if end == 0 {
			return trimmed(stripEnds[0])
		}
		return num(stripEnds[0] + (stripEnds[1]-stripEnds[0])*t/end)
	}
	step := tickStep(end, 8)
	for i := 0.0; step > 0 && i*step <= end*(1+1e-9); i++ {
		unit := ""
		if (i+1)*step > end*(1+1e-9) {
			unit = " s"
		}
		b.put(`<line class="f-strip" x1="%s%%" x2="%s%%" y1="20" y2="27"/><text class="f-note f-mid" x="%s%%" y="40">%s</text>`, at(i*step), at(i*step), at(i*step), plain(i*step, 4)+unit)
	}
	for _, t := range s.impacts() {
		b.put(`<line class="f-strip" x1="%s%%" x2="%s%%" y1="13" y2="20"/>`, at(t), at(t))
	}
	b.put(`<line class="f-gone" x1="%g%%" x2="%g%%" y1="20" y2="20"/>`, stripEnds[0], stripEnds[0])
	for _, k := range marked {
		switch e := s.shown(k); {
		case e == nil:
		case k == Rest:
			b.put(`<svg x="%s%%" overflow="visible"><rect class="f-ring" x="-4" y="16" width="8" height="8"/></svg>`, at(e.T))
		default:
			b.put(`<circle class="%s" cx="%s%%" cy="20" r="4.5"/>`, map[Kind]string{Release: "f-ring", Landing: "f-dot"}[k], at(e.T))
		}
	}
	b.put(`<circle class="f-thumb" cx="%g%%" cy="20" r="8.5"/></svg></div>`+"\n", stripEnds[0])
}

// speeds are what the reader may choose, times real.
func speeds(rate float64) []float64 {
	out := []float64{0.1, 0.2, 0.5, 1, 2, 5, 10}
	for k := 20.0; rate > 10 && k <= rate*5; k = nice(k * 2.5) {
		out = append(out, k)
	}
	if rate < 0.1 {
		var slow []float64
		for k := nice(rate); k < 0.1*(1-1e-9); k = nice(k * 2.5) {
			slow = append(slow, k)
		}
		out = append(slow, out...)
	}
	return out
}

// desk are the controls.
func (s *show) desk(b *sheet) {
	b.put(`<div class="film-desk" role="group" aria-label="Playing" data-film-live hidden><button type="button" class="film-play">`)
	b.put(`<svg viewBox="0 0 12 12" aria-hidden="true"><path class="film-triangle" d="M2 1l9 5l-9 5z"/><path class="film-bars" d="M2 1h3v10h-3zM7 1h3v10h-3z"/></svg><span>Play</span></button>`)
	b.put(`<button type="button" class="film-back" aria-label="One step back">&#8592; step</button><button type="button" class="film-forth" aria-label="One step forward">step &#8594;</button>`)
	b.put(`<label>Speed <select class="film-speed">`)
	now := rate(s.reel.end)
	for _, k := range speeds(now) {
		chosen, words := "", plain(k, 3)+" ×"
		if math.Abs(k-now) < 1e-9*now {
			chosen = " selected"
		}
		if k == 1 {
			words = "real time"
		}
		b.put(`<option value="%g"%s>%s</option>`, k, chosen, words)
	}
	b.put(`</select></label><span class="film-grow"></span>`)
	for i := range s.film.Events {
		if e := &s.film.Events[i]; e.Kind != Impact && e.T <= s.reel.end {
			b.put(`<button type="button" class="film-jump" data-t="%v">%s</button>`, e.T, html.EscapeString(jumpWords(e)))
		}
	}
	b.put("</div>\n")
	s.boxes(b)
}

func jumpWords(e *Event) string {
	switch e.Kind {
	case Release:
		return "Release"
	case Landing:
		return "Landing, " + plain(e.T, 4) + " s"
	case Rest:
		return "Rest, " + plain(e.T, 4) + " s"
	}
	return "End, " + plain(e.T, 4) + " s"
}

// boxes are what the reader may show or hide.
func (s *show) boxes(b *sheet) {
	b.put(`<fieldset class="film-shows" data-film-live hidden><legend>Show</legend>`)
	box := func(class, words string, on bool) {
		checked := ""
		if on {
			checked = " checked"
		}
		b.put(`<label><input type="checkbox" class="film-%s"%s>%s</label>`, class, checked, words)
	}
	box("trail", "trail", true)
	box("path", "path ahead", false)
	if s.differs() {
		box("uniform", "uniform-gravity path", true)
	}
	box("velocity", "velocity", false)
	box("apparent", "apparent accelerations", false)
	b.put("</fieldset>\n")
}

// numbersPart is the place of the numbers at the moment shown.
func (s *show) numbersPart(b *sheet) {
	b.put(`<dl class="film-numbers" data-film-live hidden>`)
	for _, n := range [][3]string{
		{"time", "Time since the release", ""}, {"phase", "Phase", ""},
		{"offset", "Deck offset", ""}, {"height", "Height above the deck", ""},
		{"speed", "Speed relative to the habitat", ""}, {"inertial", "Inertial speed", ""},
		{"axial", "Axial place", ""}, {"accel", "Apparent acceleration", "centrifugal coriolis"},
	} {
		b.put(`<div><dt>%s</dt><dd><span class="film-n-%s"></span>`, n[1], n[0])
		for _, part := range strings.Fields(n[2]) {
			b.put(`<small class="film-n-%s"></small>`, part)
		}
		b.put(`</dd></div>`)
	}
	b.put("</dl>\n")
}

// notes say what the picture cannot show.
func (s *show) notes() string {
	out := s.film.Notes
	if l := s.shown(Landing); l != nil && l.T > 0 {
		out += fmt.Sprintf(" Until the landing the habitat turns by %s°.", signif(math.Abs(s.film.Spin*l.T)*180/math.Pi, 3))
	}
	say := func(format string, args ...any) { out = strings.TrimSpace(out + " " + fmt.Sprintf(format, args...)) }
	if u := s.film.Uniform; u != nil && u.WhyNotDrawn != "" {
		say("The uniform-gravity path is not drawn: %s.", u.WhyNotDrawn)
	} else if u != nil && !s.differs() {
		say("The uniform-gravity path is the plumb line.")
	}
	if s.reel.cut {
		say("The film ends at %s s; the motion goes on.", plain(s.reel.end, 4))
	}
	s.small(say)
	say("Places are within %s of the computed track, speeds within %s/s.", length(math.Max(s.reel.posErr, 1e-9), 1), length(math.Max(s.reel.velErr, 1e-9), 1))
	return out
}

// small says what is too small to be seen at the scale of a drawing.
func (s *show) small(say func(string, ...any)) {
	const hair = 2.0 // units
	if l := s.shown(Landing); l != nil {
		at := s.reel.spot(l.T).board
		start := s.film.plumb(1)
		if off := math.Abs(at.X*start.Y - at.Y*start.X); off > 0 && off*s.board.perM < hair && s.gone < 1 {
			say("At this scale the deck offset is narrower than the lines: read it from the numbers.")
		}
	}
	if s.shown(Landing) != nil && s.reel.extent*s.beyond.perM < 3*hair && s.reel.extent > 1e-3 {
		say("In the inertial frame the fall of %s is too small to be seen beside the way that the habitat carries it.", length(s.reel.extent, 2))
	}
}

// impacts are the times of impacts on the strip, s, those that would run together left out.
func (s *show) impacts() (out []float64) {
	apart, last := s.reel.end*0.008, math.Inf(-1)
	for i := range s.film.Events {
		if e := &s.film.Events[i]; e.Kind == Impact && e.T <= s.reel.end && e.T-last >= apart {
			out, last = append(out, e.T), e.T
		}
	}
	return out
}

// turningWords name the inertial frame, and how the habitat turns in it.
func (s *show) turningWords() string {
	switch {
	case s.film.Spin > 0:
		return "the inertial frame: the habitat turns counterclockwise"
	case s.film.Spin < 0:
		return "the inertial frame: the habitat turns clockwise"
	}
	return "the inertial frame"
}
