package table_test

import (
	"path/filepath"
	"regexp"
	"strings"
	"testing"

	"offplumb/sim/table"
)

var (
	plainName  = regexp.MustCompile(`^[a-z0-9]+(-[a-z0-9]+)*$|^-[0-9]+$`)
	deviceName = regexp.MustCompile(`^(con|prn|aux|nul|com[0-9]|lpt[0-9])$`)
)

// FuzzNames gives file names to any names, each split at line ends: they are
// local, short, of plain characters, of no device, and each there once whatever
// the case.
func FuzzNames(f *testing.F) {
	for _, s := range []string{"con\nCON\nCon.", "../../etc\n/x\n..\n.", "a\na\na-2\nA", "\n \n\t", "COM1\ncom¹\nlpt9.txt", "a.\na ", strings.Repeat("x", 300) + "\n" + strings.Repeat("x", 301), "كوب\n杯", "İ\nı\nK"} {
		f.Add(s)
	}
	f.Fuzz(func(t *testing.T, names string) {
		var n table.Namer
		seen := map[string]bool{}
		for thing := range strings.SplitSeq(names, "\n") {
			name := n.Name(thing)
			if !plainName.MatchString(name) || deviceName.MatchString(name) || len(name) > 120 || !filepath.IsLocal(name+".csv") {
				t.Errorf("%q is named %q", thing, name)
			}
			if seen[strings.ToLower(name)] {
				t.Errorf("%q is given twice", name)
			}
			seen[strings.ToLower(name)] = true
		}
	})
}
