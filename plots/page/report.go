package page

import "html/template"

// Report is the page. Texts are plain; what is empty is left out.
type Report struct {
	Title    string
	Question string // what is to be answered
	Notes    string // the story behind it
	Block    []Fact // the title block
	Caution  string
	Sections []Section
	Program  string // name and version of what wrote it

	// Styles and Scripts stand after those of the page, each once, in order;
	// what the moving pictures of the cards need.
	Styles  []template.CSS
	Scripts []template.JS
}

// Fact is a name and a value, such as "Spin" and "4 rpm".
type Fact struct{ Name, Value string }

// Group is facts about one thing.
type Group struct {
	Name  string
	Facts []Fact
}

// Section is a numbered part of the report.
type Section struct {
	Name    string
	Lead    string   // what it comes to
	Words   []string // paragraphs
	List    []Item
	Tables  []Table
	Figures []Figure
	Cards   []Card
	Text    string // a file as it is written
	Files   []File // what stands beside the report
}

// Item is an entry of a list: what it is about, and words.
type Item struct{ Of, Words string }

// Card is about one thing: a release, a crew path, a study.
type Card struct {
	Key     string // what cells link to it by, unique in the page; "": none do
	Kind    string // what it is, in a word or two
	Name    string
	Words   []string // sentences, its story first
	Facts   []Group
	Motion  template.HTML // a moving picture, trusted as it is
	Figures []Figure
	Tables  []Table
	Files   []File // what stands beside the report
}

// File is a file beside the report, by its relative path.
type File struct{ Name, Path string }

// Figure is a finished drawing.
type Figure struct {
	Name string // what it is: "side view"
	SVG  []byte // as package plots writes it
	File string // its relative path; "": there is none
}

// Table is a table. Rows have as many cells as there are columns, and the
// first cell names the row.
type Table struct {
	Name    string
	Words   string // a sentence before it
	Columns []Column
	Rows    [][]Cell
	Rest    string // a sentence on what it leaves out
	Fixed   bool   // its order is its meaning: it cannot be sorted
}

// Column heads a table.
type Column struct {
	Name, Unit, Meaning string
	Number              bool // set to the right, sorted by value
}

// Cell is an entry of a table.
type Cell struct {
	Text  string
	Value float64 // what a number is sorted by; NaN: last
	To    string  // key of the card that it leads to
	Mark  Mark
}

// Mark sets off a word, in shape and weight.
type Mark string

// The marks.
const (
	Plain  Mark = ""
	Calm   Mark = "calm"   // as it should be
	Uneasy Mark = "uneasy" // a dashed outline
	Strong Mark = "strong" // a full outline, bold
)
