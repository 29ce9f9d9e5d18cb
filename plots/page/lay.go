package page

import (
	"fmt"
	"html/template"
	"math"
	"slices"
	"strconv"
)

// What the template is given: texts cleaned, numbers and ids dealt out.
type (
	reportView struct {
		Title, Question, Caution, Program string
		Notes                             []string
		Block                             []Fact
		Sections                          []sectionView
		Style, Script                     template.HTML
		Policy                            string
	}
	sectionView struct {
		ID, Name string
		Number   int
		Lead     string
		Words    []string
		List     []Item
		Tables   []tableView
		Figures  []figureView
		Cards    []cardView
		Text     string
		Files    []File
	}
	cardView struct {
		ID, Kind, Name string
		Words          []string
		Facts          []Group
		Motion         template.HTML
		Figures        []figureView
		Tables         []tableView
		Files          []File
	}
	figureView struct {
		ID, Name, File string
		Number         int
		SVG            template.HTML
		Wide, Light    bool
	}
	tableView struct {
		ID, Name, Words, Rest string
		Number                int
		Columns               []Column
		Rows                  [][]cellView
		Sorts, Meanings       bool
	}
	cellView struct {
		Text, Value, To string
		Number          bool
		Mark            Mark
	}
)

// layer deals out numbers and ids, in the order of the page.
type layer struct {
	ids             map[string]string // of cards, by their keys
	cards           int
	figures, tables int
	styles          []string
}

// cardIDs numbers the cards, so that tables before them can lead to them.
func cardIDs(r *Report) map[string]string {
	out := map[string]string{}
	n := 0
	for i := range r.Sections {
		for k := range r.Sections[i].Cards {
			n++
			if key := r.Sections[i].Cards[k].Key; key != "" {
				out[key] = cardID(n)
			}
		}
	}
	return out
}

func cardID(n int) string { return "card-" + strconv.Itoa(n) }

func (l *layer) report(r *Report) (*reportView, error) {
	v := &reportView{Title: clean(r.Title), Question: clean(r.Question), Notes: paragraphs(r.Notes), Block: facts(r.Block),
		Caution: clean(r.Caution), Program: clean(r.Program)}
	for i := range r.Sections {
		s, err := l.section(&r.Sections[i], i+1)
		if err != nil {
			return nil, err
		}
		v.Sections = append(v.Sections, s)
	}
	return v, nil
}

func (l *layer) section(s *Section, n int) (v sectionView, err error) {
	v = sectionView{ID: "part-" + strconv.Itoa(n), Number: n, Name: clean(s.Name), Lead: clean(s.Lead), Words: cleaned(s.Words), Text: lines(s.Text)}
	v.Files = files(s.Files)
	for _, it := range s.List {
		v.List = append(v.List, Item{clean(it.Of), clean(it.Words)})
	}
	if v.Tables, err = l.tablesOf(s.Tables); err != nil {
		return v, err
	}
	if v.Figures, err = l.figuresOf(s.Figures); err != nil {
		return v, err
	}
	for i := range s.Cards {
		c, err := l.card(&s.Cards[i])
		if err != nil {
			return v, fmt.Errorf("%s %q: %w", s.Cards[i].Kind, s.Cards[i].Name, err)
		}
		v.Cards = append(v.Cards, c)
	}
	return v, nil
}

func (l *layer) card(c *Card) (v cardView, err error) {
	l.cards++
	v = cardView{ID: cardID(l.cards), Kind: clean(c.Kind), Name: clean(c.Name), Words: cleaned(c.Words), Motion: c.Motion}
	for _, g := range c.Facts {
		if list := facts(g.Facts); len(list) > 0 {
			v.Facts = append(v.Facts, Group{clean(g.Name), list})
		}
	}
	v.Files = files(c.Files)
	if v.Tables, err = l.tablesOf(c.Tables); err != nil {
		return v, err
	}
	v.Figures, err = l.figuresOf(c.Figures)
	return v, err
}

func files(list []File) (out []File) {
	for _, f := range list {
		out = append(out, File{clean(f.Name), clean(f.Path)})
	}
	return out
}

func (l *layer) figuresOf(list []Figure) (out []figureView, err error) {
	for _, f := range list {
		l.figures++
		id := "figure-" + strconv.Itoa(l.figures)
		d, err := inline(f.SVG, id+"-")
		if err != nil {
			return nil, fmt.Errorf("figure %q: %w", f.Name, err)
		}
		for _, s := range d.styles {
			if !slices.Contains(l.styles, s) {
				l.styles = append(l.styles, s)
			}
		}
		out = append(out, figureView{ID: id, Name: clean(f.Name), File: clean(f.File), Number: l.figures,
			SVG: template.HTML(d.markup), Wide: d.wide, Light: len(d.styles) == 0})
	}
	return out, nil
}

func (l *layer) tablesOf(list []Table) (out []tableView, err error) {
	for i := range list {
		t := &list[i]
		l.tables++
		v := tableView{ID: "table-" + strconv.Itoa(l.tables), Number: l.tables, Name: clean(t.Name), Words: clean(t.Words), Rest: clean(t.Rest),
			Sorts: !t.Fixed && len(t.Rows) > 1}
		for _, c := range t.Columns {
			c = Column{clean(c.Name), clean(c.Unit), clean(c.Meaning), c.Number}
			v.Columns = append(v.Columns, c)
			v.Meanings = v.Meanings || c.Meaning != ""
		}
		for r, row := range t.Rows {
			if len(row) != len(t.Columns) {
				return nil, fmt.Errorf("table %q: row %d has %d cells for %d columns", t.Name, r+1, len(row), len(t.Columns))
			}
			v.Rows = append(v.Rows, l.row(t, row))
		}
		out = append(out, v)
	}
	return out, nil
}

func (l *layer) row(t *Table, row []Cell) []cellView {
	out := make([]cellView, len(row))
	for i, c := range row {
		out[i] = cellView{Text: clean(c.Text), To: l.ids[c.To], Number: t.Columns[i].Number, Mark: c.Mark}
		if !t.Columns[i].Number {
			continue
		}
		out[i].Text = minus(out[i].Text)
		if !math.IsNaN(c.Value) {
			out[i].Value = strconv.FormatFloat(c.Value, 'g', 9, 64)
		}
	}
	return out
}

// minus sets the sign of a number as figures do: as long as a plus.
func minus(s string) string {
	if len(s) > 1 && s[0] == '-' && s[1] >= '0' && s[1] <= '9' {
		return "\u2212" + s[1:]
	}
	return s
}

func cleaned(list []string) (out []string) {
	for _, s := range list {
		if s = clean(s); s != "" {
			out = append(out, s)
		}
	}
	return out
}

func facts(list []Fact) (out []Fact) {
	for _, f := range list {
		if v := clean(f.Value); v != "" {
			out = append(out, Fact{clean(f.Name), minus(v)})
		}
	}
	return out
}
