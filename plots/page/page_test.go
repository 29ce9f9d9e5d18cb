package page_test

import (
	"bytes"
	"crypto/sha256"
	"encoding/base64"
	"encoding/xml"
	"errors"
	"fmt"
	"html/template"
	"io"
	"math"
	"regexp"
	"slices"
	"strings"
	"testing"

	"offplumb/plots/page"
)

// figure is a small SVG as package plots writes them.
func figure(title string) []byte {
	return []byte(`<?xml version="1.0" encoding="UTF-8"?>
<svg xmlns="http://www.w3.org/2000/svg" role="img" aria-labelledby="a-title a-desc" width="40pt" height="30pt" viewBox="0 0 40 30">
<title id="a-title">` + title + `</title><desc id="a-desc">what it shows</desc>
<style>@media screen{.fill-x{fill:#FFF}}</style>
<clipPath id="c"><path d="M0,0L1,1"></path></clipPath><path clip-path="url(#c)" d="M0,0L1,1"></path><text>1 &lt; 2</text></svg>`)
}

// hostile tries to leave its place in the page.
const hostile = `</script><script>alert(1)</script>"'><img src=x onerror=alert(2)>` + "\x00\x07\u202e&amp;{{.}}"

func sample() *page.Report {
	t := page.Table{Name: "T", Rest: "rest", Columns: []page.Column{{Name: "name"}, {Name: "speed", Unit: "m/s", Meaning: "how fast", Number: true}}}
	t.Rows = [][]page.Cell{
		{{Text: "a", To: "release.a"}, {Text: "-1.5", Value: -1.5}},
		{{Text: "b", To: "release.none"}, {Text: "-", Value: math.NaN()}},
		{{Text: "Broken", Mark: page.Strong}, {Text: "2", Value: 2}},
	}
	return &page.Report{Title: "Ring", Question: "Where?", Notes: "One.\n\nTwo.", Caution: "Take care.", Program: "offplumb 1",
		Block: []page.Fact{{Name: "Spin", Value: "4 rpm"}, {Name: "None"}},
		Sections: []page.Section{
			{Name: "Verdicts", Lead: "1 held", Tables: []page.Table{t}, Figures: []page.Figure{{Name: "Plan", SVG: figure("p"), File: "plan.svg"}}},
			{Name: "Releases", List: []page.Item{{Of: "x", Words: "y"}}, Cards: []page.Card{
				{Key: "release.a", Kind: "Release", Name: "a", Words: []string{"It falls."}, Facts: []page.Group{{Name: "Landing", Facts: []page.Fact{{Name: "After", Value: "1 s"}}}},
					Figures: []page.Figure{{Name: "Side view", SVG: figure("p")}}, Files: []page.File{{Name: "inertial view", Path: "a-inertial.svg"}}, Tables: []page.Table{t}}}},
			{Name: "Scenario", Text: "format = 1\r\n\ttitle = \"<b>\"\n"}}}
}

func written(t *testing.T, r *page.Report) string {
	t.Helper()
	var b bytes.Buffer
	if err := page.Write(&b, r); err != nil {
		t.Fatal(err)
	}
	return b.String()
}

var raw = regexp.MustCompile(`(?s)<(style|script)>(.*?)</(?:style|script)>`)

// elements reads a page as XML: it must be well-formed. Styles and scripts,
// which HTML does not escape, are left out.
func elements(t *testing.T, src string) []xml.StartElement {
	t.Helper()
	var out []xml.StartElement
	dec := xml.NewDecoder(strings.NewReader(raw.ReplaceAllString(src, "<$1></$1>")))
	for {
		tok, err := dec.Token()
		if errors.Is(err, io.EOF) {
			return out
		}
		if err != nil {
			t.Fatalf("not well-formed: %v", err)
		}
		if e, ok := tok.(xml.StartElement); ok {
			out = append(out, e.Copy())
		}
	}
}

func attr(e xml.StartElement, name string) string {
	for _, a := range e.Attr {
		if a.Name.Local == name {
			return a.Value
		}
	}
	return ""
}

// TestIdsMeetTheirReferences: ids are unique though two drawings are alike, and
// whatever refers to one finds it.
func TestIdsMeetTheirReferences(t *testing.T) {
	list := elements(t, written(t, sample()))
	ids := map[string]bool{}
	for _, e := range list {
		if id := attr(e, "id"); id != "" {
			if ids[id] {
				t.Errorf("id %q stands twice", id)
			}
			ids[id] = true
		}
	}
	refs := 0
	for _, e := range list {
		wanted := strings.Fields(attr(e, "aria-labelledby"))
		if h, ok := strings.CutPrefix(attr(e, "href"), "#"); ok {
			wanted = append(wanted, h)
		}
		if u, ok := strings.CutPrefix(attr(e, "clip-path"), "url(#"); ok {
			wanted = append(wanted, strings.TrimSuffix(u, ")"))
		}
		for _, w := range wanted {
			if refs++; !ids[w] {
				t.Errorf("<%s> refers to %q, which is nowhere", e.Name.Local, w)
			}
		}
	}
	if refs < 15 {
		t.Errorf("only %d references found", refs)
	}
}

// TestHeadingsStepByOne: no level is left out on the way down.
func TestHeadingsStepByOne(t *testing.T) {
	level, seen := 0, ""
	for _, e := range elements(t, written(t, sample())) {
		if n := e.Name.Local; len(n) == 2 && n[0] == 'h' && n[1] >= '1' && n[1] <= '6' {
			now := int(n[1] - '0')
			if now > level+1 {
				t.Errorf("h%d after h%d", now, level)
			}
			level, seen = now, seen+n+" "
		}
	}
	if want := "h1 h2 h2 h3 h2 "; seen != want {
		t.Errorf("headings %s, want %s", seen, want)
	}
}

// TestEverythingGivenIsEscaped puts the same hostile text everywhere.
func TestEverythingGivenIsEscaped(t *testing.T) {
	plain := elements(t, written(t, sample()))
	r := sample()
	r.Title, r.Question, r.Notes, r.Caution, r.Program = hostile, hostile, hostile+"\n\n"+hostile, hostile, hostile
	r.Block[0] = page.Fact{Name: hostile, Value: hostile}
	for i := range r.Sections {
		s := &r.Sections[i]
		s.Name, s.Text = hostile, s.Text+hostile
		for k := range s.List {
			s.List[k] = page.Item{Of: hostile, Words: hostile}
		}
		for k := range s.Tables {
			tab := &s.Tables[k]
			tab.Name, tab.Rest, tab.Columns[0].Name, tab.Columns[1].Unit, tab.Columns[1].Meaning = hostile, hostile, hostile, hostile, hostile
			for _, row := range tab.Rows {
				row[0].Text, row[1].Text = hostile, hostile
			}
		}
		for k := range s.Figures {
			s.Figures[k].Name = hostile
		}
		for k := range s.Cards {
			c := &s.Cards[k]
			c.Name, c.Kind, c.Words[0], c.Facts[0].Name, c.Facts[0].Facts[0].Value, c.Files[0].Name = hostile, hostile, hostile, hostile, hostile, hostile
		}
	}
	src := written(t, r)
	got := elements(t, src)
	// The scenario's section gained a text, nothing else an element.
	names := func(list []xml.StartElement) (out []string) {
		for _, e := range list {
			out = append(out, e.Name.Local)
		}
		return out
	}
	if a, b := names(got), names(plain); !slices.Equal(slices.DeleteFunc(a, func(s string) bool { return s == "pre" }), slices.DeleteFunc(b, func(s string) bool { return s == "pre" })) {
		t.Errorf("hostile texts change the elements:\n%v\n%v", a, b)
	}
	if strings.ContainsAny(src, "\x00\x07\u202e") {
		t.Error("control characters remain")
	}
	for _, e := range got {
		for _, a := range e.Attr {
			if strings.HasPrefix(a.Name.Local, "on") || a.Name.Local == "style" {
				t.Errorf("<%s> has the attribute %s", e.Name.Local, a.Name.Local)
			}
		}
	}
}

// TestPolicyNamesWhatIsThere: each style and script, once, by the hash of its
// very bytes, and nothing from anywhere else.
func TestPolicyNamesWhatIsThere(t *testing.T) {
	r := sample()
	r.Styles = []template.CSS{"b{color:red}\r\n", "b{color:red}\r\n"}
	r.Scripts = []template.JS{"var a = 1 < 2 && true;"}
	src := written(t, r)
	policy := ""
	for _, e := range elements(t, src) {
		if attr(e, "http-equiv") == "Content-Security-Policy" {
			policy = attr(e, "content")
		}
	}
	if !strings.HasPrefix(policy, "default-src 'none'; ") || strings.Contains(policy, "unsafe") {
		t.Fatalf("policy %q", policy)
	}
	count := map[string]int{}
	for _, m := range raw.FindAllStringSubmatch(src, -1) {
		sum := sha256.Sum256([]byte(m[2]))
		if hash := "'sha256-" + base64.StdEncoding.EncodeToString(sum[:]) + "'"; !strings.Contains(policy, hash) {
			t.Errorf("the policy does not name a %s of %d bytes", m[1], len(m[2]))
		}
		count[m[1]]++
	}
	// The page's own, the figures' one, and the given one.
	if count["style"] != 3 || count["script"] != 2 || strings.Count(policy, "sha256-") != 5 {
		t.Errorf("styles and scripts %v, policy %s", count, policy)
	}
	for _, u := range regexp.MustCompile(`(?i)(?:src|href|url)[=(]["']?(https?:|//)[^"')]*`).FindAllString(src, -1) {
		t.Errorf("refers to %s", u)
	}
}

func TestSameReportSameBytes(t *testing.T) {
	if a, b := written(t, sample()), written(t, sample()); a != b {
		t.Error("two pages of the same report differ")
	}
}

// TestWhatIsGivenIsThere: words, numbers, links, marks, moving pictures.
func TestWhatIsGivenIsThere(t *testing.T) {
	r := sample()
	r.Sections[1].Cards[0].Motion = `<div class="film"></div>`
	src := written(t, r)
	for _, want := range []string{
		`<a href="#card-1">a</a>`, `scope="row">b</th>`, `data-value="-1.5">` + "\u2212" + `1.5</td>`, `data-value="">-</td>`, `<span class="mark-strong">Broken</span>`,
		`<b>Figure 1.</b>`, `<b>Figure 2.</b>`, `<b>Table 2.</b>`, `<div class="motion"><div class="film"></div></div>`, `<a href="a-inertial.svg">inertial view</a>`,
		"<pre class=\"text\">format = 1\n\ttitle = &#34;&lt;b&gt;&#34;</pre>", "<p class=\"notes\">Two.</p>", "speed, m/s</dt><dd>how fast</dd>", "1 &lt; 2",
	} {
		if !strings.Contains(src, want) {
			t.Errorf("the page has no %s", want)
		}
	}
	if strings.Contains(src, "<dt>None</dt>") {
		t.Error("an empty fact is shown")
	}
}

// TestRefused: what cannot stand in a page is an error, and nothing is written.
func TestRefused(t *testing.T) {
	svg := func(body string) func(*page.Report) {
		return func(r *page.Report) { r.Sections[0].Figures[0].SVG = []byte(body) }
	}
	for name, c := range map[string]struct {
		change func(*page.Report)
		want   string
	}{
		"no title":      {func(r *page.Report) { r.Title = "\x00 " }, "wants a title"},
		"short row":     {func(r *page.Report) { r.Sections[0].Tables[0].Rows[1] = nil }, "row 2 has 0 cells for 2 columns"},
		"script":        {svg(`<svg><script>x</script></svg>`), "<script>"},
		"handler":       {svg(`<svg onload="x"></svg>`), "attribute onload"},
		"style":         {svg(`<svg style="x"></svg>`), "attribute style"},
		"outside image": {svg(`<svg><image href="https://example.org/x.png"></image></svg>`), "refers to"},
		"no svg":        {svg(`<p></p>`), "wants one SVG"},
		"empty":         {svg(``), "without a root"},
		"cut off":       {svg(`<svg><g>`), "without an end"},
		"crossed":       {svg(`<svg><g></svg>`), "ends unopened"},
		"ends script":   {func(r *page.Report) { r.Scripts = []template.JS{"x</SCRIPT>"} }, "would end its element"},
		"ends style":    {func(r *page.Report) { r.Styles = []template.CSS{"x</style>"} }, "would end its element"},
	} {
		r := sample()
		c.change(r)
		var b bytes.Buffer
		if err := page.Write(&b, r); err == nil || !strings.Contains(err.Error(), c.want) || b.Len() > 0 {
			t.Errorf("%s: error %v, want %q; %d bytes written", name, err, c.want, b.Len())
		}
	}
}

func TestFailingWriter(t *testing.T) {
	want := fmt.Errorf("full")
	if err := page.Write(failing{want}, sample()); !errors.Is(err, want) {
		t.Errorf("error %v", err)
	}
}

type failing struct{ err error }

func (f failing) Write([]byte) (int, error) { return 0, f.err }
