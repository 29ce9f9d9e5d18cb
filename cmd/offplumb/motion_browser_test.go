package main

import (
	"bytes"
	"fmt"
	"math"
	"os"
	"path/filepath"
	"strconv"
	"strings"
	"testing"
	"time"

	"github.com/chromedp/cdproto/input"
	"github.com/chromedp/chromedp"
	"offplumb/sim/measure"
)

// seekTo shows a moment of player k and gives what it then says it shows, by name.
func seekTo(t *testing.T, b *tab, k int, at float64) map[string][]float64 {
	t.Helper()
	words := result(t, b, chromedp.Evaluate[map[string]string](fmt.Sprintf(
		`(e=>{e.dataset.seek=%v;e.dispatchEvent(new Event("film-seek"));let d={...e.dataset};delete d.film;delete d.phase;return d})(document.querySelectorAll(".film")[%d])`, at, k)))
	out := map[string][]float64{}
	for name, w := range words {
		out[name] = numbers(t, w)
	}
	return out
}

func numbers(t *testing.T, words string) (out []float64) {
	t.Helper()
	for _, w := range strings.Fields(words) {
		v, err := strconv.ParseFloat(w, 64)
		if err != nil {
			t.Fatalf("%q is no list of numbers", words)
		}
		out = append(out, v)
	}
	return out
}

// readOut is what player k says it shows.
func readOut(t *testing.T, b *tab, k int, name string) []float64 {
	t.Helper()
	return numbers(t, result(t, b, chromedp.Evaluate[string](fmt.Sprintf(`document.querySelectorAll(".film")[%d].getAttribute("data-%s")`, k, name))))
}

// TestMotionInBrowser tries players and moving pictures in one browser, whose start takes
// most of the time.
func TestMotionInBrowser(t *testing.T) {
	b := browse(t)
	b.wide(t, 1000)
	t.Run("picture", func(t *testing.T) { pictureMoves(t, b) })
	t.Run("player", func(t *testing.T) { playerPlays(t, b) })
	t.Run("tables", func(t *testing.T) { playersAgree(t, b) })
}

// playersAgree opens players under a strict policy and holds what they show
// against rows of the tables: places in both frames, offset, height, speeds, accelerations.
func playersAgree(t *testing.T, b *tab) {
	for _, c := range []struct {
		scenario string
		sets     []string
	}{
		{"overhead-locker", nil}, {"overhead-locker", []string{"habitat.spin=-6.14 rpm"}}, {"broad-world", nil},
		{"two-cabin-arm", nil}, {"spoke-fall", nil}, {"nut-round-the-ring", nil}, {"adrift", nil},
	} {
		j := computed(t, filepath.Join("../../scenarios/shipped", c.scenario+".toml"), c.sets...)
		var which []int
		for i := range j.results {
			if j.tracked(i) {
				which = append(which, i)
			}
		}
		b.do(t, chromedp.Navigate("file://"+pageOf(t, j, which...)))
		for k, i := range which {
			agrees(t, b, j, k, i)
		}
	}
	b.silent(t)
}

func agrees(t *testing.T, b *tab, j *job, k, i int) {
	t.Helper()
	rows, _ := j.samples(i)
	track := j.results[i].Track
	landing := &j.results[i].Landing
	down := track.Start.Phi
	if g := measure.GroundOf(j.model(), track); g.Flat != nil {
		down = g.Flat.Phi
	}
	spin := j.model().Habitat.Spin
	// The film may err by a ten-thousandth of its extent before it leaves out the end; these
	// films state far less. Digits end where a radius in 64 bits is turned.
	extent, quick := 1e-6, 1e-6
	for _, r := range rows {
		extent = math.Max(extent, math.Abs(r.Local.Pos.X-rows[0].Local.Pos.X)+math.Abs(r.Local.Pos.Y-rows[0].Local.Pos.Y))
		quick = math.Max(quick, math.Hypot(r.Local.Vel.X, r.Local.Vel.Y))
	}
	tol := 2e-5*extent + 1e-13*landing.Place.R*(1+math.Abs(spin)*track.End)
	for _, at := range []int{0, len(rows) / 3, len(rows) * 2 / 3, len(rows) - 1} {
		r := rows[at]
		shown := seekTo(t, b, k, r.Time)
		if got := shown["time"][0]; got != r.Time {
			if result(t, b, chromedp.Evaluate[bool](fmt.Sprintf(`/The film ends at/.test(document.querySelectorAll(".film")[%d].textContent)`, k))) {
				continue
			}
			t.Fatalf("%s: shows %g s, wants %g s", landing.Release, got, r.Time)
		}
		near := func(what string, got, want, within float64) {
			t.Helper()
			if !(math.Abs(got-want) <= within) {
				t.Errorf("%s at %g s: %s %g, the table has %g (within %g)", landing.Release, r.Time, what, got, want, within)
			}
		}
		p, q := r.Local.Pos, r.Inertial.Pos
		board := turnedBy(p, -math.Pi/2-down)
		beyond := turnedBy(q, -math.Pi/2-down-spin*track.Begin)
		for n := range 3 {
			near("place on board", shown["habitat"][n], board[n], tol)
			near("place outside", shown["inertial"][n], beyond[n], tol)
		}
		near("offset", shown["offset"][0], r.Offset, tol*math.Max(1, rowRatio(j, track.Start.Deck, r)))
		near("height", shown["height"][0], r.Height, tol)
		speed := math.Sqrt(r.VSpinward*r.VSpinward + r.VAxial*r.VAxial + r.VUp*r.VUp)
		near("speed", shown["speed"][0], speed, 2e-5*quick+1e-9)
		v := r.Inertial.Vel
		near("inertial speed", shown["inertialSpeed"][0], math.Sqrt(v.X*v.X+v.Y*v.Y+v.Z*v.Z), 2e-5*quick+1e-9)
		near("centrifugal", shown["centrifugal"][0], r.Centrifugal, spin*spin*tol+1e-9)
		near("Coriolis", shown["coriolis"][0], r.Coriolis, 4e-5*math.Abs(spin)*quick+1e-9)
	}
}

// rowRatio is by how much an error of a place near the axis is greater on the deck.
func rowRatio(j *job, deck int, r measure.Sample) float64 {
	return j.model().Decks[deck].Radius / math.Max(1e-3, math.Hypot(r.Local.Pos.X, r.Local.Pos.Y))
}

// playerPlays plays, drags, steps and keys one player of several, and holds what its
// numbers say at the landing against the landings table.
func playerPlays(t *testing.T, b *tab) {
	j := computed(t, "../../scenarios/shipped/overhead-locker.toml")
	b.do(t, chromedp.Navigate("file://"+pageOf(t, j, 0, 1)))
	landing := &j.results[0].Landing
	words := func(css string) string {
		return result(t, b, chromedp.Evaluate[string](fmt.Sprintf(`document.querySelector(%q).textContent`, ".film "+css)))
	}

	before := readOut(t, b, 0, "drawn")
	b.do(t, press(".film-play"), chromedp.Sleep(400*time.Millisecond))
	if words(".film-play") != "Pause" {
		t.Errorf("playing, the button says %q", words(".film-play"))
	}
	b.do(t, press(".film-play"))
	after := readOut(t, b, 0, "drawn")
	for n, name := range []string{"x on board", "y on board", "x outside"} {
		if n := []int{0, 1, 2}[n]; before[n] == after[n] {
			t.Errorf("played for 0.4 s, %s stays at %g", name, before[n])
		}
	}
	if other := readOut(t, b, 1, "time")[0]; other != 0 {
		t.Errorf("the second player moved to %g s", other)
	}

	// One step forward is the next multiple of the output step; two back are before it.
	at := readOut(t, b, 0, "time")[0]
	step := j.model().Output.Step
	b.do(t, press(".film-forth"))
	if got, want := readOut(t, b, 0, "time")[0], (math.Floor(at/step+1e-6)+1)*step; math.Abs(got-want) > 1e-9 {
		t.Errorf("a step from %g s leads to %g s, wants %g s", at, got, want)
	}
	b.do(t, press(".film-back"), press(".film-back"))
	if got := readOut(t, b, 0, "time")[0]; got >= at && at > step {
		t.Errorf("steps back from %g s lead to %g s", at, got)
	}

	landed := func(how string) {
		t.Helper()
		if got := readOut(t, b, 0, "time")[0]; got != landing.Time {
			t.Fatalf("%s: shows %v s, wants the landing at %v s", how, got, landing.Time)
		}
		if got, want := words(".film-n-offset"), fmt.Sprintf("%.3f m antispinward", -landing.Offset); got != want {
			t.Errorf("%s: offset %q, wants %q", how, got, want)
		}
		if got, want := words(".film-n-speed"), fmt.Sprintf("%.3f m/s", landing.Speed); got != want {
			t.Errorf("%s: speed %q, wants %q", how, got, want)
		}
	}
	home(t, b)
	drag(t, b)
	landed("dragging to the right end")
	home(t, b)
	key(t, b, "End")
	landed("the key End")
	home(t, b)
	key(t, b, "PageUp")
	landed("the key PageUp")
	home(t, b)
	key(t, b, "ArrowRight")
	if got := readOut(t, b, 0, "time")[0]; math.Abs(got-step) > 1e-12 {
		t.Errorf("an arrow leads to %g s, wants %g s", got, step)
	}
	if got := result(t, b, chromedp.Evaluate[string](`document.querySelector(".film-strip").getAttribute("aria-valuetext")`)); !strings.Contains(got, "flight, offset") {
		t.Errorf("the slider says %q", got)
	}
	b.silent(t)
}

// press clicks the first element of a class.
func press(css string) chromedp.Action[chromedp.Void] {
	return chromedp.Evaluate[chromedp.Void](fmt.Sprintf(`document.querySelector(%q).click()`, css))
}

func key(t *testing.T, b *tab, name string) {
	t.Helper()
	result(t, b, chromedp.Evaluate[chromedp.Void](fmt.Sprintf(
		`document.querySelector(".film-strip").dispatchEvent(new KeyboardEvent("keydown",{key:%q,bubbles:true,cancelable:true}))`, name)))
}

func home(t *testing.T, b *tab) {
	t.Helper()
	key(t, b, "Home")
	if got := readOut(t, b, 0, "time")[0]; got != 0 {
		t.Fatalf("the key Home leads to %g s", got)
	}
}

// drag presses the mouse on the thumb and pulls it beyond the strip's end.
func drag(t *testing.T, b *tab) {
	t.Helper()
	box := result(t, b, chromedp.Evaluate[[]float64](
		`(e=>{e.scrollIntoView({block:"center"});let r=e.getBoundingClientRect();return [r.left,r.top,r.width,r.height]})(document.querySelector(".film-strip"))`))
	x, y := box[0]+box[2]*0.03, box[1]+box[3]*0.37
	b.do(t, chromedp.MouseEvent(input.DispatchMouseEventTypeMousePressed, x, y, chromedp.ButtonLeft),
		chromedp.MouseEvent(input.DispatchMouseEventTypeMouseMoved, x+box[2]/2, y, chromedp.ButtonLeft))
	if got := readOut(t, b, 0, "time")[0]; got <= 0 {
		t.Error("dragging to the middle shows the release")
	}
	b.do(t, chromedp.MouseEvent(input.DispatchMouseEventTypeMouseMoved, box[0]+box[2]*0.999, y, chromedp.ButtonLeft),
		chromedp.MouseEvent(input.DispatchMouseEventTypeMouseReleased, box[0]+box[2]*0.999, y, chromedp.ButtonLeft))
}

// pictureMoves shows a moving picture as an image, whose document runs no script,
// and looks twice.
func pictureMoves(t *testing.T, b *tab) {
	j := computed(t, "../../scenarios/shipped/overhead-locker.toml")
	dir := t.TempDir()
	page := `<!DOCTYPE html><meta charset="utf-8"><title>Image</title><img width="880" alt="" src="picture.svg">`
	for name, text := range map[string]string{"picture.svg": animated(t, j, 0), "page.html": page} {
		if err := os.WriteFile(filepath.Join(dir, name), []byte(text), 0o666); err != nil {
			t.Fatal(err)
		}
	}
	b.do(t, chromedp.Navigate("file://"+filepath.Join(dir, "page.html")), chromedp.Sleep(700*time.Millisecond))
	first := result(t, b, chromedp.CaptureScreenshot())
	b.do(t, chromedp.Sleep(500*time.Millisecond))
	if bytes.Equal(first, result(t, b, chromedp.CaptureScreenshot())) {
		t.Error("half a second apart the picture is the same")
	}
	b.silent(t)
}
