package table_test

import (
	"flag"
	"fmt"
	"os"
	"testing"
)

// TestMain gives the random tests a fixed seed, unless one is asked for, and
// keeps them from leaving files.
func TestMain(m *testing.M) {
	flag.Parse()
	settings := [][2]string{{"rapid.nofailfile", "true"}}
	if flag.Lookup("rapid.seed").Value.String() == "0" {
		settings = append(settings, [2]string{"rapid.seed", "7"})
	}
	for _, s := range settings {
		if err := flag.Set(s[0], s[1]); err != nil {
			fmt.Fprintln(os.Stderr, err)
			os.Exit(2)
		}
	}
	os.Exit(m.Run())
}
