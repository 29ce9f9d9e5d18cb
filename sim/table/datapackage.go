package table

import (
	"encoding/json"
	"io"
)

// Resource is a table file, as a data package lists it.
type Resource struct {
	Name    string // unique in the package
	Path    string // with forward slashes, from the package's folder
	Title   string
	Columns []Column
}

// WriteDataPackage writes the description of table files by the Frictionless
// Data Package and Table Schema specifications (version 1; open standards):
// every column with its type, unit and meaning.
func WriteDataPackage(w io.Writer, name, title string, files []Resource) error {
	pkg := dataPackage{Profile: "tabular-data-package", Name: name, Title: title, Resources: []dataResource{}}
	for _, f := range files {
		pkg.Resources = append(pkg.Resources, f.describe())
	}
	enc := json.NewEncoder(w)
	enc.SetIndent("", "  ")
	enc.SetEscapeHTML(false)
	return enc.Encode(pkg)
}

type dataPackage struct {
	Profile   string         `json:"profile"`
	Name      string         `json:"name"`
	Title     string         `json:"title"`
	Resources []dataResource `json:"resources"`
}

type dataResource struct {
	Profile   string     `json:"profile"`
	Name      string     `json:"name"`
	Path      string     `json:"path"`
	Title     string     `json:"title"`
	Format    string     `json:"format"`
	MediaType string     `json:"mediatype"`
	Encoding  string     `json:"encoding"`
	Schema    dataSchema `json:"schema"`
}

type dataSchema struct {
	Fields        []dataField `json:"fields"`
	MissingValues []string    `json:"missingValues"`
}

type dataField struct {
	Name        string `json:"name"`
	Type        string `json:"type"`
	Unit        string `json:"unit,omitempty"`
	Description string `json:"description"`
}

func (r *Resource) describe() dataResource {
	out := dataResource{Profile: "tabular-data-resource", Name: r.Name, Path: r.Path, Title: r.Title,
		Format: "csv", MediaType: "text/csv", Encoding: "utf-8", Schema: dataSchema{Fields: []dataField{}, MissingValues: []string{""}}}
	for i := range r.Columns {
		c := &r.Columns[i]
		out.Schema.Fields = append(out.Schema.Fields, dataField{Name: c.Name, Type: c.jsonType(), Unit: c.Unit, Description: c.Meaning})
	}
	return out
}

func (c *Column) jsonType() string {
	switch c.Kind {
	case Integer:
		return "integer"
	case Text:
		return "string"
	}
	return "number"
}
