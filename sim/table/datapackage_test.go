package table_test

import (
	"bytes"
	"encoding/json"
	"errors"
	"strings"
	"testing"

	"offplumb/sim/table"
)

func TestWriteDataPackage(t *testing.T) {
	var b bytes.Buffer
	err := table.WriteDataPackage(&b, "offplumb-run", "Galley <ring> & \"locker\"", []table.Resource{
		{Name: "landings", Path: "landings.csv", Title: "A row for each release.", Columns: []table.Column{
			{Name: "release", Kind: table.Text, Meaning: "Its name."},
			{Name: "time_s", Unit: "s", Meaning: "Time since the release."},
			{Name: "impacts", Kind: table.Integer, Meaning: "How many."},
		}},
		{Name: "tracks-drop", Path: "tracks/drop.csv"},
	})
	if err != nil {
		t.Fatal(err)
	}
	const want = `{
  "profile": "tabular-data-package",
  "name": "offplumb-run",
  "title": "Galley <ring> & \"locker\"",
  "resources": [
    {
      "profile": "tabular-data-resource",
      "name": "landings",
      "path": "landings.csv",
      "title": "A row for each release.",
      "format": "csv",
      "mediatype": "text/csv",
      "encoding": "utf-8",
      "schema": {
        "fields": [
          {
            "name": "release",
            "type": "string",
            "description": "Its name."
          },
          {
            "name": "time_s",
            "type": "number",
            "unit": "s",
            "description": "Time since the release."
          },
          {
            "name": "impacts",
            "type": "integer",
            "description": "How many."
          }
        ],
        "missingValues": [
          ""
        ]
      }
    },
    {
      "profile": "tabular-data-resource",
      "name": "tracks-drop",
      "path": "tracks/drop.csv",
      "title": "",
      "format": "csv",
      "mediatype": "text/csv",
      "encoding": "utf-8",
      "schema": {
        "fields": [],
        "missingValues": [
          ""
        ]
      }
    }
  ]
}
`
	if got := b.String(); got != want {
		t.Errorf("got\n%s\nwant\n%s", got, want)
	}
}

// TestEmptyDataPackage: no files give a list, not null.
func TestEmptyDataPackage(t *testing.T) {
	var b bytes.Buffer
	if err := table.WriteDataPackage(&b, "n", "t", nil); err != nil {
		t.Fatal(err)
	}
	var pkg struct{ Resources *[]any }
	if err := json.Unmarshal(b.Bytes(), &pkg); err != nil || pkg.Resources == nil {
		t.Errorf("resources are no list (%v): %s", err, strings.TrimSpace(b.String()))
	}
}

func TestDataPackageGivesTheWritersError(t *testing.T) {
	if err := table.WriteDataPackage(&failing{0}, "n", "t", nil); !errors.Is(err, errFull) {
		t.Errorf("got %v, want %v", err, errFull)
	}
}
