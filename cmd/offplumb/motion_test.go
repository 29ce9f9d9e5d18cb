package main

import (
	"encoding/xml"
	"errors"
	"io"
	"math"
	"path/filepath"
	"strings"
	"testing"

	"offplumb/plots/motion"
	"offplumb/sim/measure"
)

// TestFilmsTellWhatTheTablesTell holds each film of each shipped scenario against the rows of
// its track's table: places within the error that the film states, speeds too.
func TestFilmsTellWhatTheTablesTell(t *testing.T) {
	for _, name := range []string{"overhead-locker", "hatch-side", "broad-world", "two-cabin-arm", "spoke-fall", "torus-ball", "light-parts-air", "nut-round-the-ring"} {
		for _, set := range []string{"", "negative"} {
			var sets []string
			if set != "" {
				if name != "overhead-locker" {
					continue
				}
				sets = []string{"habitat.spin=-6.14 rpm"}
			}
			j := computed(t, filepath.Join("../../scenarios/shipped", name+".toml"), sets...)
			for i := range j.results {
				if j.tracked(i) {
					filmAgainstTable(t, j, i)
				}
			}
		}
	}
}

func filmAgainstTable(t *testing.T, j *job, i int) {
	t.Helper()
	f, err := j.film(i)
	if err != nil {
		t.Fatal(err)
	}
	p, err := motion.NewPrint(f)
	if err != nil {
		t.Fatal(err)
	}
	if p.End < j.results[i].Landing.Time {
		t.Errorf("%s: the film ends at %g s, before the landing", f.Name, p.End)
	}
	track := j.results[i].Track
	down := track.Start.Phi
	if g := measure.GroundOf(j.model(), track); g.Flat != nil {
		down = g.Flat.Phi
	}
	turn := -math.Pi/2 - down - f.Spin*track.Begin
	// Rounding: of 64 bits in turning places of this radius, and of 32 bits in the time of a
	// knot, which shifts what is there by the speed.
	slack := 1e-15*f.Radius*(10+math.Abs(f.Spin)*p.End) + 1e-12
	// The film is measured at the states given; between them it may err by somewhat more.
	const between = 4
	rows, _ := j.samples(i)
	for _, r := range rows {
		if r.Time > p.End {
			break
		}
		s, phase := p.At(r.Time)
		want := turnedBy(r.Inertial.Pos, turn)
		if d := math.Hypot(math.Hypot(s.Pos[0]-want[0], s.Pos[1]-want[1]), s.Pos[2]-want[2]); d > between*p.PosError+slack {
			t.Fatalf("%s at %g s: %g m from the track, stated are %g m", f.Name, r.Time, d, p.PosError)
		}
		vel := turnedBy(r.Inertial.Vel, turn)
		if d := math.Hypot(math.Hypot(s.Vel[0]-vel[0], s.Vel[1]-vel[1]), s.Vel[2]-vel[2]); d > between*p.VelError+slack*10 {
			t.Fatalf("%s at %g s (%s): speed %g m/s from the track's, stated are %g m/s", f.Name, r.Time, phase, d, p.VelError)
		}
		if phase != r.Phase {
			t.Fatalf("%s at %g s: %s, the table says %s", f.Name, r.Time, phase, r.Phase)
		}
	}
}

// TestMovingPictures draws the pictures of scenarios: well-formed, of the promised size, the
// same each time, without a script.
func TestMovingPictures(t *testing.T) {
	const most, mostPlayer = 100_000, 25_000 // bytes
	for _, name := range []string{"overhead-locker", "broad-world", "two-cabin-arm", "nut-round-the-ring", "adrift"} {
		j := computed(t, filepath.Join("../../scenarios/shipped", name+".toml"))
		for i := range j.results {
			if !j.tracked(i) {
				continue
			}
			first, again := animated(t, j, i), animated(t, j, i)
			if first != again {
				t.Errorf("%s %d: two runs differ", name, i)
			}
			if len(first) > most || strings.Contains(first, "<script") {
				t.Errorf("%s %d: %d bytes", name, i, len(first))
			}
			wellFormed(t, first)
			f, _ := j.film(i)
			p, err := motion.Player(f)
			if err != nil {
				t.Fatal(err)
			}
			wellFormed(t, strings.NewReplacer(" hidden>", ">", "data-film-live>", ">", " data-film-live", "", " data-film-still", "", " checked", "", " selected", "").Replace(unclosed(string(p))))
			if len(p) > mostPlayer || strings.Contains(string(p), "style=") || strings.Contains(string(p), "<script") {
				t.Errorf("%s: the player of %q takes %d bytes", name, f.Name, len(p))
			}
		}
	}
}

func animated(t *testing.T, j *job, i int) string {
	t.Helper()
	f, err := j.film(i)
	if err != nil {
		t.Fatal(err)
	}
	var b strings.Builder
	if err := motion.Animation(&b, f); err != nil {
		t.Fatal(err)
	}
	return b.String()
}

// unclosed closes the one element of HTML that has no end.
func unclosed(s string) string {
	out := ""
	for {
		before, rest, ok := strings.Cut(s, "<input ")
		out += before
		if !ok {
			return out
		}
		tag, after, _ := strings.Cut(rest, ">")
		out += "<input " + strings.TrimSuffix(tag, " checked") + "/>"
		s = after
	}
}

func wellFormed(t *testing.T, s string) {
	t.Helper()
	d := xml.NewDecoder(strings.NewReader(s))
	for {
		if _, err := d.Token(); errors.Is(err, io.EOF) {
			return
		} else if err != nil {
			t.Fatalf("not well formed: %v", err)
		}
	}
}
