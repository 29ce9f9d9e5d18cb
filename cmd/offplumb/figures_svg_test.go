package main

import (
	"bytes"
	"encoding/xml"
	"io"
	"regexp"
	"strconv"
	"strings"
	"testing"

	"gonum.org/v1/plot/font"
	"gonum.org/v1/plot/font/liberation"
)

// svgWords is a text and the paper that it takes, pt, y downward.
type svgWords struct {
	s              string
	x0, y0, x1, y1 float64
}

var roundArc = regexp.MustCompile(`A([0-9.e+-]+),([0-9.e+-]+) `)

// checkFigure holds an SVG to: well formed, a title and a description, arcs round, no
// text on another or off the sheet, none smaller than 7.5 pt, styles scoped.
func checkFigure(t *testing.T, name string, svg []byte) {
	t.Helper()
	list, size, seen := readSVG(t, name, svg)
	for _, tag := range []string{"svg", "title", "desc", "style", "text"} {
		if seen[tag] == 0 {
			t.Errorf("%s: no <%s>", name, tag)
		}
	}
	for _, a := range roundArc.FindAllSubmatch(svg, -1) {
		if !bytes.Equal(a[1], a[2]) {
			t.Errorf("%s: an arc with radii %s and %s", name, a[1], a[2])
		}
	}
	const slack = 0.3 // pt: the box of a text is a little taller than its letters
	for i, a := range list {
		if a.x0 < 0 || a.x1 > size[0] || a.y0 < 0 || a.y1 > size[1] {
			t.Errorf("%s: %q is off the sheet", name, a.s)
		}
		for _, b := range list[:i] {
			if a.x0 < b.x1-slack && b.x0 < a.x1-slack && a.y0 < b.y1-slack && b.y0 < a.y1-slack {
				t.Errorf("%s: %q lies on %q", name, a.s, b.s)
			}
		}
	}
}

func readSVG(t *testing.T, name string, svg []byte) (list []svgWords, size [2]float64, seen map[string]int) {
	t.Helper()
	fonts := font.NewCache(liberation.Collection())
	seen = map[string]int{}
	dec := xml.NewDecoder(bytes.NewReader(svg))
	var open xml.StartElement
	var words strings.Builder
	for {
		tok, err := dec.Token()
		if err == io.EOF {
			return list, size, seen
		}
		if err != nil {
			t.Fatalf("%s: %v", name, err)
		}
		switch k := tok.(type) {
		case xml.StartElement:
			open = k.Copy()
			seen[k.Name.Local]++
			words.Reset()
			if k.Name.Local == "svg" {
				size = [2]float64{attrNumber(t, &open, "width"), attrNumber(t, &open, "height")}
			}
		case xml.CharData:
			words.Write(k)
		case xml.EndElement:
			if k.Name.Local == "text" {
				list = append(list, boxOf(t, fonts, &open, words.String(), size[1]))
			}
			if k.Name.Local == "style" {
				checkScope(t, name, words.String())
			}
		}
	}
}

// checkScope wants each rule to hold within a figure alone.
func checkScope(t *testing.T, name, style string) {
	t.Helper()
	_, rules, _ := strings.Cut(style, "{")
	for _, rule := range strings.Split(strings.TrimSuffix(rules, "}"), "}") {
		if rule != "" && !strings.HasPrefix(rule, ".offplumb-figure ") {
			t.Errorf("%s: the rule %q reaches beyond the figure", name, rule)
		}
	}
}

func boxOf(t *testing.T, fonts *font.Cache, e *xml.StartElement, words string, high float64) svgWords {
	t.Helper()
	const cap, tail, least = 0.73, 0.21, 7.5
	size := attrNumber(t, e, "font-size")
	if size < least {
		t.Errorf("%q has size %g", words, size)
	}
	f := font.Font{Typeface: "Liberation", Variant: "Sans", Size: font.Length(size)}
	if attrOf(e, "font-weight") == "bold" {
		f.Weight = 3
	}
	face := fonts.Lookup(f, f.Size)
	x, y := attrNumber(t, e, "x"), high+attrNumber(t, e, "y")
	return svgWords{words, x, y - cap*size, x + face.Width(words).Points(), y + tail*size}
}

func attrOf(e *xml.StartElement, name string) string {
	for _, a := range e.Attr {
		if a.Name.Local == name {
			return a.Value
		}
	}
	return ""
}

func attrNumber(t *testing.T, e *xml.StartElement, name string) float64 {
	t.Helper()
	v, err := strconv.ParseFloat(strings.TrimRight(attrOf(e, name), "pxt"), 64)
	if err != nil {
		t.Fatal(err)
	}
	return v
}
