package scenarios

import (
	"os"
	"testing"
)

func TestTmp(t *testing.T) {
	src, _ := os.ReadFile("shipped/galley-ring.toml")
	_, err := Load("g.toml", src, Options{ReadFile: readShipped})
	if err != nil {
		t.Fatal(err)
	}
}
