package page

import (
	"bytes"
	"encoding/xml"
	"errors"
	"fmt"
	"io"
	"regexp"
	"strings"
)

// drawing is an SVG made fit to stand in the page.
type drawing struct {
	markup string
	styles []string // the texts of its style elements, which the page holds once
	wide   bool     // wider than high
}

// inline takes an SVG document apart and writes it anew: the XML declaration
// and comments go, every id and each reference to one gets a prefix, so that
// drawings do not meet, and style elements are lifted out. An element or
// attribute that could run a script, or load something, is an error: figures
// have none.
func inline(src []byte, prefix string) (drawing, error) {
	in := inliner{prefix: prefix}
	dec := xml.NewDecoder(bytes.NewReader(src))
	for {
		tok, err := dec.RawToken()
		if errors.Is(err, io.EOF) {
			break
		}
		if err != nil {
			return drawing{}, fmt.Errorf("reading an SVG: %w", err)
		}
		if err := in.token(tok); err != nil {
			return drawing{}, err
		}
	}
	if len(in.open) > 0 || !in.root {
		return drawing{}, errors.New("an SVG without an end, or without a root")
	}
	return drawing{in.out.String(), in.styles, in.wide}, nil
}

type inliner struct {
	prefix string
	out    strings.Builder
	open   []string
	styles []string
	root   bool
	wide   bool
}

// barred are the elements that no figure has any use for.
var barred = map[string]bool{"script": true, "foreignObject": true, "iframe": true, "a": true, "use": true, "animate": true, "set": true}

func (in *inliner) token(tok xml.Token) error {
	switch t := tok.(type) {
	case xml.StartElement:
		return in.start(t)
	case xml.EndElement:
		if len(in.open) == 0 || in.open[len(in.open)-1] != t.Name.Local {
			return fmt.Errorf("an SVG whose <%s> ends unopened", t.Name.Local)
		}
		in.open = in.open[:len(in.open)-1]
		if t.Name.Local != "style" {
			in.out.WriteString("</" + t.Name.Local + ">")
		}
	case xml.CharData:
		return in.text(t)
	}
	return nil
}

func (in *inliner) text(t xml.CharData) error {
	if n := len(in.open); n > 0 && in.open[n-1] == "style" {
		in.styles = append(in.styles, strings.TrimSpace(string(t)))
		return nil
	}
	if s := string(t); strings.TrimSpace(s) != "" {
		return xml.EscapeText(&in.out, []byte(s))
	}
	return nil
}

func (in *inliner) start(t xml.StartElement) error {
	name := t.Name.Local
	if len(in.open) == 0 {
		if in.root || name != "svg" {
			return fmt.Errorf("wants one SVG, got <%s>", name)
		}
		in.root, in.wide = true, wider(t.Attr)
	}
	if barred[name] {
		return fmt.Errorf("an SVG with <%s>", name)
	}
	in.open = append(in.open, name)
	if name == "style" {
		return nil
	}
	in.out.WriteString("<" + name)
	for _, a := range t.Attr {
		if err := in.attr(a); err != nil {
			return err
		}
	}
	in.out.WriteString(">")
	return nil
}

var (
	refs   = regexp.MustCompile(`url\(#`)
	viewed = regexp.MustCompile(`^0 0 ([0-9.]+) ([0-9.]+)$`)
)

func (in *inliner) attr(a xml.Attr) error {
	name, v := a.Name.Local, a.Value
	if a.Name.Space != "" {
		name = a.Name.Space + ":" + name
	}
	switch {
	case strings.HasPrefix(name, "on") || name == "style":
		return fmt.Errorf("an SVG with the attribute %s", name)
	case name == "id":
		v = in.prefix + v
	case name == "aria-labelledby" || name == "aria-describedby":
		ids := strings.Fields(v)
		for i := range ids {
			ids[i] = in.prefix + ids[i]
		}
		v = strings.Join(ids, " ")
	case name == "href" || name == "xlink:href":
		if !strings.HasPrefix(v, "data:image/png;base64,") {
			return fmt.Errorf("an SVG that refers to %.40q", v)
		}
	default:
		v = refs.ReplaceAllString(v, "url(#"+in.prefix)
	}
	in.out.WriteString(" " + name + `="`)
	if err := xml.EscapeText(&in.out, []byte(v)); err != nil {
		return err
	}
	in.out.WriteString(`"`)
	return nil
}

// wider says whether the sheet lies across.
func wider(attrs []xml.Attr) bool {
	for _, a := range attrs {
		if m := viewed.FindStringSubmatch(a.Value); a.Name.Local == "viewBox" && m != nil {
			var w, h float64
			fmt.Sscan(m[1], &w)
			fmt.Sscan(m[2], &h)
			return w > h
		}
	}
	return false
}
