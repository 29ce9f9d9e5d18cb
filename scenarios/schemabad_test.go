package scenarios

import (
	"path/filepath"
	"regexp"
	"strings"
	"testing"

	"github.com/pelletier/go-toml/v2"
	"github.com/rogpeppe/go-internal/txtar"
)

// plain are the errors of the reader that a JSON Schema can tell too: those of
// a key by itself, or of the keys beside it. What follows from other tables,
// files or the geometry it cannot, nor the range of a quantity but its sign,
// since units differ.
var plain = regexp.MustCompile(`: unknown key$|wants the key \w+: |wants only one of |^\S+: .* wants one of \w+(, \w+)* or \w+$|` +
	`wants (more than 0 \S+|0 \S+ or more), got "|wants an? [a-z ]+ (in|such as) .*, got "|the bare number|wants a name|wants at least one leg`)

// unplain are errors that read so and still are of another sort: a sweep holds
// keys and values of other tables, a name that may be left out is any text,
// and a deck may be the reference floor, which needs no level.
var unplain = regexp.MustCompile(`: sweep\[\d+\]|\.reaches\[\d+\]\.name: |: a deck wants one of radius or height$`)

// TestSchemaRefusesBadFiles: an editor that has the schema marks every file
// that the reader refuses for a fault that a schema can tell.
func TestSchemaRefusesBadFiles(t *testing.T) {
	s := readSchema(t)
	paths, err := filepath.Glob("testdata/bad*.txtar")
	if err != nil {
		t.Fatal(err)
	}
	files, refused := 0, 0
	for _, path := range paths {
		ar, err := txtar.ParseFile(path)
		if err != nil {
			t.Fatal(err)
		}
		for i := 0; i+1 < len(ar.Files); i += 2 {
			var x map[string]any
			if toml.Unmarshal(ar.Files[i].Data, &x) != nil {
				continue // no editor shows its keys
			}
			var v validator
			v.check("", s, x)
			files++
			if len(v.faults) > 0 {
				refused++
				continue
			}
			for line := range strings.Lines(string(ar.Files[i+1].Data)) {
				if line = strings.TrimSpace(line); plain.MatchString(line) && !unplain.MatchString(line) {
					t.Errorf("the schema takes %s", line)
				}
			}
		}
	}
	t.Logf("of %d refused files the schema refuses %d", files, refused)
	if refused < 100 {
		t.Errorf("only %d of %d", refused, files)
	}
}
