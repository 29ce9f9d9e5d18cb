package plots

import (
	"bytes"
	"encoding/xml"
	"errors"
	"fmt"
	"hash/fnv"
	"io"
	"strings"
)

// fontStack names what stands in where Liberation Sans is missing: Arial and Helvetica
// share its metrics, so that labels keep their widths.
const fontStack = "'Liberation Sans', Arial, Helvetica, sans-serif"

// finishSVG turns what the SVG canvas wrote into the document that is published:
// styles become presentation attributes, which a strict Content-Security-Policy
// lets pass; each colour gets a class, by which a dark page recolours it; fonts get
// their stand-ins; title, description and role are added for readers that speak.
func finishSVG(raw []byte, title, desc string) ([]byte, error) {
	s := svgWriter{title: title, desc: desc}
	s.out.WriteString(`<?xml version="1.0" encoding="UTF-8"?>` + "\n")
	dec := xml.NewDecoder(bytes.NewReader(raw))
	for {
		tok, err := dec.RawToken()
		if errors.Is(err, io.EOF) {
			return s.out.Bytes(), nil
		}
		if err != nil {
			return nil, fmt.Errorf("svg post-processing: %w", err)
		}
		s.token(tok)
	}
}

type svgWriter struct {
	out         bytes.Buffer
	title, desc string
	inText      bool
}

func (s *svgWriter) token(tok xml.Token) {
	switch t := tok.(type) {
	case xml.StartElement:
		s.start(t)
	case xml.EndElement:
		s.inText = false
		fmt.Fprintf(&s.out, "</%s>\n", t.Name.Local)
	case xml.CharData:
		if s.inText {
			_ = xml.EscapeText(&s.out, t) // a bytes.Buffer does not fail
		}
	}
}

func (s *svgWriter) start(t xml.StartElement) {
	var attrs []xml.Attr
	class, style := "", ""
	for _, a := range t.Attr {
		switch {
		case a.Name.Local == "style":
			style = a.Value
		case a.Name.Local == "xlink" || t.Name.Local == "svg" && a.Name.Local == "xmlns":
		case t.Name.Local == "g" && a.Name.Local == "transform" || a.Name.Local != "":
			attrs = append(attrs, xml.Attr{Name: xml.Name{Local: a.Name.Local}, Value: a.Value})
		}
	}
	styled, class := presentation(style)
	fmt.Fprintf(&s.out, "<%s", t.Name.Local)
	if t.Name.Local == "svg" {
		s.rootAttrs()
	}
	if class != "" {
		s.attr("class", class)
	}
	for _, a := range append(attrs, styled...) {
		s.attr(a.Name.Local, a.Value)
	}
	s.out.WriteString(">")
	s.inText = t.Name.Local == "text"
	if t.Name.Local == "svg" {
		s.rootChildren()
	}
}

func (s *svgWriter) attr(name, value string) {
	fmt.Fprintf(&s.out, ` %s="`, name)
	_ = xml.EscapeText(&s.out, []byte(value))
	s.out.WriteString(`"`)
}

// id makes ids that differ between figures set in one page.
func (s *svgWriter) id(part string) string {
	h := fnv.New32a()
	h.Write([]byte(s.title + "\x00" + s.desc))
	return fmt.Sprintf("fig-%08x-%s", h.Sum32(), part)
}

func (s *svgWriter) rootAttrs() {
	s.attr("xmlns", "http://www.w3.org/2000/svg")
	s.attr("class", rootClass)
	s.attr("role", "img")
	s.attr("aria-labelledby", s.id("title")+" "+s.id("desc"))
	s.attr("font-family", fontStack)
	s.attr("stroke-linejoin", "round")
}

func (s *svgWriter) rootChildren() {
	for _, e := range [][2]string{{"title", s.title}, {"desc", s.desc}} {
		fmt.Fprintf(&s.out, "\n<%s id=\"%s\">", e[0], s.id(e[0]))
		_ = xml.EscapeText(&s.out, []byte(e[1]))
		fmt.Fprintf(&s.out, "</%s>", e[0])
	}
	fmt.Fprintf(&s.out, "\n<style>%s</style>\n", darkStyle())
}

// rootClass keeps the styles of a figure to figures, where one is set into a page.
const rootClass = "offplumb-figure"

// darkStyle recolours the classes on a dark screen. Print keeps the attributes' colours.
// All figures of a page have the same rules, so that it does not matter whose hold.
func darkStyle() string {
	var b strings.Builder
	b.WriteString("@media screen and (prefers-color-scheme:dark){")
	for _, k := range inks {
		dark := fmt.Sprintf("#%02X%02X%02X", k.dark.R, k.dark.G, k.dark.B)
		fmt.Fprintf(&b, ".%[1]s .fill-%[2]s{fill:%[3]s}.%[1]s .line-%[2]s{stroke:%[3]s}", rootClass, k.name, dark)
	}
	b.WriteString("}")
	return b.String()
}

// presentation turns a style into attributes and the classes of its colours.
func presentation(style string) (attrs []xml.Attr, class string) {
	var classes []string
	add := func(k, v string) { attrs = append(attrs, xml.Attr{Name: xml.Name{Local: k}, Value: v}) }
	for _, decl := range strings.Split(style, ";") {
		k, v, ok := strings.Cut(decl, ":")
		switch {
		case !ok || k == "font-family" || k == "font-style" || v == "normal" || v == "none" && k == "font-variant":
		case k == "font-variant" && v == haloVariant:
			paper := hexOf(inkPaper)
			add("stroke", paper)
			add("stroke-width", fmt.Sprint(2*haloWidth))
			add("paint-order", "stroke")
			classes = append(classes, "line-paper")
		default:
			add(k, v)
			if name, known := inkNamed(v); known && k == "fill" {
				classes = append(classes, "fill-"+name)
			} else if known && k == "stroke" {
				classes = append(classes, "line-"+name)
			}
		}
	}
	return attrs, strings.Join(classes, " ")
}

func hexOf(c ink) string {
	v := inks[c].light
	return fmt.Sprintf("#%02X%02X%02X", v.R, v.G, v.B)
}

// inkNamed finds the ink whose light value is the given hexadecimal colour.
func inkNamed(hex string) (string, bool) {
	for i := range inks {
		if hexOf(ink(i)) == hex {
			return inks[i].name, true
		}
	}
	return "", false
}
