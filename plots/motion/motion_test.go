package motion

import (
	"math"
	"strings"
	"testing"
)

// straightFilm is a drop in vacuum from rest on board: a straight line in the inertial frame,
// exact whatever the number of states.
func straightFilm(spin, radius, height, end float64) *Film {
	p := Piece{Phase: "flight"}
	y, v := -(radius - height), spin*(radius-height)
	for k := 0.0; k <= 8; k++ {
		t := end * k / 8
		p.States = append(p.States, State{T: t, Pos: [3]float64{v * t, y, 0}, Vel: [3]float64{v, 0, 0}})
	}
	return &Film{Name: "bolt", Title: "bolt falls", Desc: "A bolt falls.", Spin: spin, Radius: radius, Step: 0.01,
		Pieces: []Piece{p}, Events: []Event{{0, "release", Release}, {end, "lands", Landing}}}
}

// TestStraightFlightNeedsNoKnots: without forces a piece is its start alone, and exact.
func TestStraightFlightNeedsNoKnots(t *testing.T) {
	for _, radius := range []float64{0.05, 20, 2.3e6} {
		for _, spin := range []float64{0.5, -0.5} {
			f := straightFilm(spin, radius, radius/10, 0.4)
			p, err := NewPrint(f)
			if err != nil {
				t.Fatal(err)
			}
			if n := len(p.reel.pieces[0].knots); n != 0 {
				t.Errorf("radius %g m: %d knots", radius, n)
			}
			s, _ := p.At(0.123)
			if d := math.Abs(s.Pos[0] - spin*radius*0.9*0.123); d > 1e-15*radius {
				t.Errorf("radius %g m: %g m off", radius, d)
			}
		}
	}
}

// TestCircleIsMet packs a motion that needs knots: round the axis at another rate than the
// habitat's. The law of the film holds at the states given, and the error stated is met.
func TestCircleIsMet(t *testing.T) {
	const spin, rate, r, end = 0.4, 0.7, 12.0, 20.0
	f := straightFilm(spin, 15, 1, end)
	f.Pieces[0].States = nil
	for k := 0.0; k <= 4000; k++ {
		at := end * k / 4000
		sin, cos := math.Sincos(rate * at)
		f.Pieces[0].States = append(f.Pieces[0].States, State{at, [3]float64{r * cos, r * sin, at}, [3]float64{-r * rate * sin, r * rate * cos, 1}})
	}
	p, err := NewPrint(f)
	if err != nil {
		t.Fatal(err)
	}
	if p.PosError > fineness*p.reel.extent*4 || p.reel.bytes() > packBudget {
		t.Errorf("error %g m of %g m in %d bytes", p.PosError, p.reel.extent, p.reel.bytes())
	}
	for _, s := range f.Pieces[0].States {
		if got, _ := p.At(s.T); dist3(got.Pos, s.Pos) > p.PosError*1.0001+1e-12 {
			t.Fatalf("at %g s: %g m off, stated are %g m", s.T, dist3(got.Pos, s.Pos), p.PosError)
		}
	}
}

// TestLongTracksAreCut: what does not fit is left out at the end, and said.
func TestLongTracksAreCut(t *testing.T) {
	f := straightFilm(0.5, 20, 2, 1)
	for k := 1.0; k < 500; k++ {
		a := State{T: k, Pos: [3]float64{k, -18, 0}, Vel: [3]float64{1, 0, 0}}
		b := State{T: k + 1, Pos: [3]float64{k + 1, -18, 0}, Vel: [3]float64{1, 0, 0}}
		f.Pieces = append(f.Pieces, Piece{"flight", []State{a, b}})
	}
	html, err := Player(f)
	if err != nil {
		t.Fatal(err)
	}
	if !strings.Contains(string(html), "the motion goes on") || len(html) > 25_000 {
		t.Errorf("%d bytes, and it does not say that it is cut", len(html))
	}
}

func TestScriptIsSmallAndPlain(t *testing.T) {
	const most = 60_000
	s := string(Script())
	if len(s) > most {
		t.Errorf("%d bytes", len(s))
	}
	for _, word := range []string{"eval(", "new Function", "innerHTML", "</script", "http://", "https://"} {
		if n := strings.Count(s, word); n > 0 && !(word == "http://" && n == 1) { // the name of SVG
			t.Errorf("the script has %q", word)
		}
	}
}

// TestBadFilmsAreRefused: each is refused with an error, none with a panic.
func TestBadFilmsAreRefused(t *testing.T) {
	for name, spoil := range map[string]func(*Film){
		"no name":         func(f *Film) { f.Name = "" },
		"no pieces":       func(f *Film) { f.Pieces = nil },
		"no states":       func(f *Film) { f.Pieces[0].States = nil },
		"no such phase":   func(f *Film) { f.Pieces[0].Phase = "swim" },
		"not a number":    func(f *Film) { f.Pieces[0].States[1].Pos[0] = math.NaN() },
		"time runs back":  func(f *Film) { f.Pieces[0].States[3].T = 0 },
		"no radius":       func(f *Film) { f.Radius = 0 },
		"no step":         func(f *Film) { f.Step = 0 },
		"endless uniform": func(f *Film) { f.Uniform = &Uniform{Time: math.Inf(1)} },
	} {
		f := straightFilm(0.5, 20, 2, 1)
		spoil(f)
		if _, err := Player(f); err == nil {
			t.Errorf("%s: a player is made", name)
		}
		if err := Animation(&strings.Builder{}, f); err == nil {
			t.Errorf("%s: a picture is made", name)
		}
	}
}

func TestRatesKeepTheirPromise(t *testing.T) {
	for _, c := range []struct{ duration, rate float64 }{{0.5, 1}, {10, 1}, {11, 2}, {27, 5}, {60, 10}, {0.2, 0.1}, {0, 1}} {
		if got := rate(c.duration); math.Abs(got-c.rate) > 1e-12 {
			t.Errorf("%g s plays %g times as fast, wants %g", c.duration, got, c.rate)
		}
	}
	for d := 10.5; d < 1e5; d *= 1.07 {
		if got := d / rate(d); got > realMost*1.001 || got < 2 {
			t.Errorf("%g s plays in %g s", d, got)
		}
	}
}
