package table

import (
	"bytes"
	"encoding/csv"
	"testing"
)

// TestFieldsAreQuotedAsByTheStandardLibrary holds the short ways of a field
// against the CSV writer that they spare.
func TestFieldsAreQuotedAsByTheStandardLibrary(t *testing.T) {
	texts := []string{"", "a", " a", "a ", "a,b", " a,b", ",", `say "x"`, `"`, `\.`, "a\nb", "a\r\nb", "a\rb", "\ta", "é", "\u00a0a",
		"é,x", "touches floor at 1.12 s with 3.4 m/s, 0.1 J", "a; b/c_d-e.f", "(1 more)"}
	for _, first := range texts {
		for _, second := range texts {
			var b bytes.Buffer
			w := csv.NewWriter(&b)
			w.UseCRLF = true
			if err := w.Write([]string{first, second}); err != nil {
				t.Fatal(err)
			}
			w.Flush()
			got := append(appendText(appendText(nil, first, true), second, false), lineEnd...)
			if !bytes.Equal(got, b.Bytes()) {
				t.Errorf("%q, %q: got %q, want %q", first, second, got, b.Bytes())
			}
		}
	}
}
