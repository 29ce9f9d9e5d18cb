package plots

import (
	"bytes"
	"encoding/xml"
	"strconv"
	"strings"
	"testing"

	"gonum.org/v1/plot/vg"
)

// render draws a figure as SVG; a failure ends the test.
func render(t *testing.T, f *Figure, err error) string {
	t.Helper()
	if err != nil {
		t.Fatal(err)
	}
	var b bytes.Buffer
	if err := f.Write(&b, "svg"); err != nil {
		t.Fatal(err)
	}
	return b.String()
}

// svgText is a text of an SVG with the paper that it takes, pt, y upward.
type svgText struct {
	s   string
	box vg.Rectangle
}

// elements calls each for every element of the SVG, with the text in it.
func elements(t *testing.T, svg string, each func(e xml.StartElement, attr func(string) string, text string)) {
	t.Helper()
	dec := xml.NewDecoder(strings.NewReader(svg))
	var open []xml.StartElement
	var words strings.Builder
	for {
		tok, err := dec.Token()
		if tok == nil {
			if err.Error() != "EOF" {
				t.Fatal(err)
			}
			return
		}
		switch k := tok.(type) {
		case xml.StartElement:
			open = append(open, k.Copy())
			words.Reset()
		case xml.CharData:
			words.Write(k)
		case xml.EndElement:
			e := open[len(open)-1]
			open = open[:len(open)-1]
			each(e, func(name string) string {
				for _, a := range e.Attr {
					if a.Name.Local == name {
						return a.Value
					}
				}
				return ""
			}, words.String())
			words.Reset()
		}
	}
}

func number(t *testing.T, s string) float64 {
	t.Helper()
	v, err := strconv.ParseFloat(strings.TrimSuffix(s, "px"), 64)
	if err != nil {
		t.Fatal(err)
	}
	return v
}

func texts(t *testing.T, svg string) (out []svgText) {
	t.Helper()
	elements(t, svg, func(e xml.StartElement, attr func(string) string, words string) {
		if e.Name.Local != "text" {
			return
		}
		size := number(t, attr("font-size"))
		w := textWidth(words, size, attr("font-weight") == "bold")
		x, y := number(t, attr("x")), -number(t, attr("y"))
		out = append(out, svgText{words, vg.Rectangle{Min: xy(x, y-tailDepth*size), Max: xy(x+w, y+capHeight*size)}})
	})
	return out
}

func has(list []svgText, part string) bool {
	for _, s := range list {
		if strings.Contains(s.s, part) {
			return true
		}
	}
	return false
}
