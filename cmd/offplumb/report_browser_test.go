package main

import (
	"bytes"
	"encoding/json"
	"fmt"
	"image"
	_ "image/png"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"testing"

	"github.com/chromedp/cdproto/emulation"
	"github.com/chromedp/chromedp"
	"github.com/chromedp/chromedp/kb"
	"offplumb/scenarios"
)

// widths are those of a phone, a tablet and a desk, px.
var widths = []int64{360, 800, 1400}

func (b *tab) wide(t *testing.T, w int64) {
	t.Helper()
	b.do(t, chromedp.EmulateViewport(w, 900))
}

// fits wants the page not to scroll sideways.
func (b *tab) fits(t *testing.T, w int64) {
	t.Helper()
	b.wide(t, w)
	if got := eval[int64](t, b, `document.documentElement.scrollWidth`); got > w {
		t.Errorf("the page is %d px wide on a screen of %d px", got, w)
	}
}

// reportOf runs a shipped scenario and gives the place of its report.
func reportOf(t *testing.T, name string, args ...string) string {
	t.Helper()
	out := filepath.Join(t.TempDir(), "out")
	var stderr bytes.Buffer
	args = append([]string{"run", "../../scenarios/shipped/" + name + ".toml", "--quiet", "--out", out}, args...)
	if got := run(args, nil, &bytes.Buffer{}, &stderr); got > exitBroken {
		t.Fatalf("exit status %d: %s", got, stderr.String())
	}
	return filepath.Join(out, reportFile)
}

// TestBrowser opens reports in a browser, one for all.
func TestBrowser(t *testing.T) {
	b := browse(t)
	locker, galley := reportOf(t, "overhead-locker"), reportOf(t, "galley-ring")
	t.Run("sorting", func(t *testing.T) { b.sorts(t, locker) })
	t.Run("looks", func(t *testing.T) { b.looks(t, galley) })
	t.Run("without scripts", func(t *testing.T) { b.bare(t, galley) })
	for _, e := range scenarios.Examples() {
		t.Run("clean/"+e.Name, func(t *testing.T) {
			file := map[string]string{"overhead-locker": locker, "galley-ring": galley}[e.Name]
			if file == "" {
				file = reportOf(t, e.Name)
			}
			b.opensClean(t, file)
			if slices.Contains(audited, e.Name) {
				b.audit(t)
			}
		})
	}
}

// audited are the reports that axe-core looks at: among them they have every
// part of the page. It takes a second or two for each.
var audited = []string{"galley-ring", "spoke-descent", "slip-of-the-hand", "hatch-scatter"}

// opensClean: a report opens from disk without a word of complaint, asks for
// nothing, and fits phone, tablet and desk.
func (b *tab) opensClean(t *testing.T, file string) {
	t.Helper()
	b.open(t, file)
	for _, w := range widths {
		b.fits(t, w)
	}
	if n := eval[int](t, b, `document.querySelectorAll("figure.drawing svg").length`); n == 0 {
		t.Error("no figures")
	}
}

// audit runs axe-core, where OFFPLUMB_AXE names its axe.min.js: the rules of
// WCAG 2.1, levels A and AA. With OFFPLUMB_BROWSER=required it must be there.
func (b *tab) audit(t *testing.T) {
	t.Helper()
	path := os.Getenv("OFFPLUMB_AXE")
	if path == "" {
		if os.Getenv("OFFPLUMB_BROWSER") == "required" {
			t.Error("OFFPLUMB_AXE does not name axe.min.js")
		}
		return
	}
	src, err := os.ReadFile(path)
	if err != nil {
		t.Fatal(err)
	}
	eval[int](t, b, string(src)+";0")
	const check = `axe.run({runOnly: ["wcag2a", "wcag2aa", "wcag21a", "wcag21aa"], resultTypes: ["violations"]}).then(
		r => JSON.stringify({passes: r.passes.length, violations: r.violations.map(v => v.id + ": " + v.nodes.slice(0, 3).map(n => n.html.slice(0, 160) + " " + n.failureSummary).join("; "))}))`
	var got struct {
		Passes     int
		Violations []string
	}
	if err := json.Unmarshal([]byte(eval[string](t, b, check)), &got); err != nil {
		t.Fatal(err)
	}
	for _, v := range got.Violations {
		t.Errorf("axe: %s", v)
	}
	if got.Passes < 10 {
		t.Errorf("axe passes only %d rules: did it run?", got.Passes)
	}
}

// sorts: tables sort by a click and by the keyboard, both ways.
func (b *tab) sorts(t *testing.T, file string) {
	b.open(t, file)
	const table = `[...document.querySelectorAll("table")].find(t => t.textContent.includes("of it by the spin"))`
	order := func() string {
		return eval[string](t, b, `[...`+table+`.tBodies[0].rows].map(r => r.cells[0].textContent.split(" ")[0]).join(" ")`)
	}
	sorted := func(column int) string {
		return eval[string](t, b, fmt.Sprintf(`%s.tHead.rows[0].cells[%d].getAttribute("aria-sort") || ""`, table, column))
	}
	if got := order(); got != "wrench cup tablet" {
		t.Fatalf("order %q before any sorting", got)
	}
	eval[int](t, b, table+`.id = "under-test"; 0`)
	b.do(t, chromedp.Click("#under-test thead th:nth-child(7) button"))
	if got, how := order(), sorted(6); got != "tablet cup wrench" || how != "ascending" {
		t.Errorf("by speed: %q, %q", got, how)
	}
	b.do(t, chromedp.Focus("#under-test thead th:nth-child(7) button"), chromedp.KeyEvent(kb.Enter))
	if got, how := order(), sorted(6); got != "wrench cup tablet" || how != "descending" {
		t.Errorf("by speed again, with Enter: %q, %q", got, how)
	}
	b.do(t, chromedp.Focus("#under-test thead th:nth-child(1) button"), chromedp.KeyEvent(" "))
	if got, how := order(), sorted(0)+sorted(6); got != "cup tablet wrench" || how != "ascending" {
		t.Errorf("by name, with the space bar: %q, %q", got, how)
	}
	if got := eval[string](t, b, `document.getElementById("said").textContent`); !strings.Contains(got, "release, ascending") {
		t.Errorf("a reader that speaks is told %q", got)
	}
}

// bare: without scripts all rows, numbers and figures are there, and no button
// that does nothing.
func (b *tab) bare(t *testing.T, file string) {
	disabled := func(v bool) {
		call(t, b, emulation.SetScriptExecutionDisabled, emulation.SetScriptExecutionDisabledParams{Value: v})
	}
	disabled(true)
	defer disabled(false)
	b.open(t, file)
	text, buttons := eval[string](t, b, `document.querySelector("main").innerText`), eval[int](t, b, `[...document.querySelectorAll("button")].filter(b => b.offsetParent).length`)
	for _, want := range []string{"lands on the tray", "Held", "wrench from the locker", "13.2 J", "Clift"} {
		if !strings.Contains(text, want) {
			t.Errorf("no %q without scripts", want)
		}
	}
	if buttons > 0 {
		t.Errorf("%d buttons without scripts", buttons)
	}
}

// leastInk is the least share of a screen that text takes; an empty page has
// none.
const leastInk = 0.004

// looks: screen widths, a dark screen and print show something, and
// each its own thing: dark is dark, print is light and has no contents list.
func (b *tab) looks(t *testing.T, file string) {
	b.open(t, file)
	for _, w := range widths {
		b.wide(t, w)
		if inked, dark := b.look(t); inked < leastInk || dark {
			t.Errorf("at %d px %.3f of the page is inked, dark %v", w, inked, dark)
		}
	}
	dark := []*emulation.MediaFeature{{Name: "prefers-color-scheme", Value: "dark"}}
	call(t, b, emulation.SetEmulatedMedia, emulation.SetEmulatedMediaParams{Features: dark})
	if inked, dark := b.look(t); inked < leastInk || !dark {
		t.Errorf("on a dark screen %.3f is inked, dark %v", inked, dark)
	}
	b.audit(t)
	call(t, b, emulation.SetEmulatedMedia, emulation.SetEmulatedMediaParams{Media: "print", Features: dark})
	if inked, dark := b.look(t); inked < leastInk || dark {
		t.Errorf("in print %.3f is inked, dark %v", inked, dark)
	}
	if shown := eval[string](t, b, `getComputedStyle(document.querySelector("nav")).display`); shown != "none" {
		t.Errorf("the contents list is printed: %s", shown)
	}
	call(t, b, emulation.SetEmulatedMedia, emulation.SetEmulatedMediaParams{})
	pdf := result(t, b, chromedp.PrintToPDF(chromedp.PDFPreferCSSPageSize()))
	if pages := bytes.Count(pdf, []byte("/Type /Page\n")); pages < 3 {
		t.Errorf("%d pages of paper in %d bytes", pages, len(pdf))
	}
}

// look takes a picture of what the screen shows and tells whether it is dark on
// the whole, and what share of it is of the other kind.
func (b *tab) look(t *testing.T) (inked float64, dark bool) {
	t.Helper()
	img, _, err := image.Decode(bytes.NewReader(result(t, b, chromedp.CaptureScreenshot())))
	if err != nil {
		t.Fatal(err)
	}
	size := img.Bounds()
	n := 0
	for y := size.Min.Y; y < size.Max.Y; y++ {
		for x := size.Min.X; x < size.Max.X; x++ {
			if _, g, _, _ := img.At(x, y).RGBA(); g < 0x8000 {
				n++
			}
		}
	}
	share := float64(n) / float64(size.Dx()*size.Dy())
	return min(share, 1-share), share > 0.5
}
