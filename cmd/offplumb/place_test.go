package main

import (
	"bytes"
	"fmt"
	"io"
	"maps"
	"math/rand/v2"
	"os"
	"os/exec"
	"path/filepath"
	"slices"
	"strings"
	"sync"
	"testing"
	"time"
)

const dropScenario = "format = 1\n[habitat]\nfloor_radius = \"18 m\"\nspin = \"5 rpm\"\n[[release]]\nname = \"drop\"\nat = { height = \"1 m\" }\n"

// dropped runs a small scenario into dir/out.
func dropped(t *testing.T) (dir, scenario, out string) {
	t.Helper()
	dir = t.TempDir()
	scenario, out = filepath.Join(dir, "drop.toml"), filepath.Join(dir, "out")
	keep(t, scenario, dropScenario)
	if got, words := runFor(runBudget, "run", scenario, "--out", out); got != exitDone {
		t.Fatal(got, words)
	}
	return dir, scenario, out
}

func contentsOf(t *testing.T, dir string) map[string][]byte {
	t.Helper()
	files, err := contents(dir)
	if err != nil {
		t.Fatal(err)
	}
	return files
}

func sameFiles(a, b map[string][]byte) bool { return maps.EqualFunc(a, b, bytes.Equal) }

// asideOf gives the folders aside that are left beside a folder.
func asideOf(t *testing.T, out string) []string {
	t.Helper()
	left, err := filepath.Glob(filepath.Join(filepath.Dir(out), "."+filepath.Base(out)+"-*"))
	if err != nil {
		t.Fatal(err)
	}
	return left
}

// TestKilledRuns kills runs at random moments: whenever one dies, the folder
// holds all of the run before or all of its own. The next run removes what is
// left of them.
func TestKilledRuns(t *testing.T) {
	_, scenario, out := dropped(t)
	self, err := os.Executable()
	if err != nil {
		t.Fatal(err)
	}
	states := []map[string][]byte{contentsOf(t, out)}
	if got, words := runFor(runBudget, "run", scenario, "--out", out, "--seed", "2"); got != exitDone {
		t.Fatal(got, words)
	}
	states = append(states, contentsOf(t, out))
	r := rand.New(rand.NewPCG(20, 1))
	killed := 0
	for i := range 20 {
		cmd := exec.Command(self, "run", scenario, "--out", out, "--quiet", "--seed", fmt.Sprint(1+i%2))
		cmd.Args[0] = "offplumb"
		if err := cmd.Start(); err != nil {
			t.Fatal(err)
		}
		time.Sleep(time.Duration(r.IntN(int(200 * time.Millisecond))))
		cmd.Process.Kill()
		if cmd.Wait() != nil {
			killed++
		}
		if now := contentsOf(t, out); !sameFiles(now, states[0]) && !sameFiles(now, states[1]) {
			t.Fatalf("the folder is neither the one run nor the other after kill %d", i)
		}
	}
	t.Logf("%d of 20 killed, %d folders left", killed, len(asideOf(t, out)))
	if killed == 0 {
		t.Error("no run was killed")
	}
	if got, words := runFor(runBudget, "run", scenario, "--out", out); got != exitDone {
		t.Fatal(got, words)
	}
	if left := asideOf(t, out); len(left) > 0 {
		t.Errorf("left behind: %q", left)
	}
}

// TestRunsAtOnce runs several at once into one folder: all are done, and it
// holds all of one of them.
func TestRunsAtOnce(t *testing.T) {
	_, scenario, out := dropped(t)
	var all sync.WaitGroup
	for i := range 6 {
		all.Go(func() {
			if got, words := runFor(runBudget, "run", scenario, "--out", out, "--no-figures", "--seed", fmt.Sprint(i%3)); got != exitDone {
				t.Error(got, words)
			}
		})
	}
	all.Wait()
	now, found := contentsOf(t, out), false
	for i := range 3 {
		alone := filepath.Join(t.TempDir(), "out")
		if got, words := runFor(runBudget, "run", scenario, "--out", alone, "--no-figures", "--seed", fmt.Sprint(i)); got != exitDone {
			t.Fatal(got, words)
		}
		found = found || sameFiles(now, contentsOf(t, alone))
	}
	if !found {
		t.Errorf("the folder is that of no run: %q", slices.Sorted(maps.Keys(now)))
	}
	if left := asideOf(t, out); len(left) > 0 {
		t.Errorf("left behind: %q", left)
	}
}

// TestReplaceAtOnce lets many folders take one place at once, with and without
// an exchange: one of them stays, whole, and nothing else.
func TestReplaceAtOnce(t *testing.T) {
	inSteps := func(from, to string) (err error) {
		for range mostTries {
			if err = replaceInSteps(from, to); !os.IsExist(err) {
				return err
			}
		}
		return err
	}
	for name, put := range map[string]func(string, string) error{"exchange": replace, "steps": inSteps} {
		t.Run(name, func(t *testing.T) {
			dir := t.TempDir()
			to := filepath.Join(dir, "to")
			var all sync.WaitGroup
			for i := range 24 {
				from := filepath.Join(dir, fmt.Sprintf(".to-%d", i))
				if err := os.Mkdir(from, 0o777); err != nil {
					t.Fatal(err)
				}
				keep(t, filepath.Join(from, "a"), fmt.Sprint(i))
				keep(t, filepath.Join(from, "b"), fmt.Sprint(i))
				all.Go(func() {
					if err := put(from, to); err != nil {
						t.Error(err)
					}
				})
			}
			all.Wait()
			if files := contentsOf(t, to); len(files) != 2 || !bytes.Equal(files["a"], files["b"]) {
				t.Errorf("got %q", files)
			}
			if left := asideOf(t, to); len(left) > 0 {
				t.Errorf("left behind: %q", left)
			}
		})
	}
}

// TestKilledBetweenMoves finds what a program leaves that is killed between
// the two moves, and moves the old folder back.
func TestKilledBetweenMoves(t *testing.T) {
	_, _, out := dropped(t)
	before := contentsOf(t, out)
	aside := filepath.Join(filepath.Dir(out), ".out-77")
	if err := os.Rename(out, aside+oldEnd); err != nil {
		t.Fatal(err)
	}
	if err := os.Mkdir(aside, 0o777); err != nil {
		t.Fatal(err)
	}
	keep(t, filepath.Join(aside, markFile), "{}")
	st, err := newStage(out, false, runFolder)
	if err != nil {
		t.Fatal(err)
	}
	st.discard()
	if !sameFiles(before, contentsOf(t, out)) {
		t.Error("the folder of the run before is not what it was")
	}
	if left := asideOf(t, out); len(left) > 0 {
		t.Errorf("left behind: %q", left)
	}
}

// TestTidyIsCareful: what a living program holds stays, and so does what is not
// ours, whatever its name.
func TestTidyIsCareful(t *testing.T) {
	dir := t.TempDir()
	out := filepath.Join(dir, "out")
	running, err := newStage(out, false, runFolder)
	if err != nil {
		t.Fatal(err)
	}
	defer running.discard()
	if err := os.MkdirAll(filepath.Join(dir, ".out-88"), 0o777); err != nil {
		t.Fatal(err)
	}
	keep(t, filepath.Join(dir, ".out-88", "letter.txt"), "not ours")
	other, err := newStage(out, false, runFolder)
	if err != nil {
		t.Fatal(err)
	}
	other.discard()
	for _, path := range []string{running.aside, filepath.Join(dir, ".out-88", "letter.txt")} {
		if _, err := os.Stat(path); err != nil {
			t.Error(err)
		}
	}
	if isMissing(other.aside) == false {
		t.Error("a folder that was discarded is there")
	}
}

// TestFilesMissedAtCommit: what is put into the folder while a run is under way
// is kept, and so are the results.
func TestFilesMissedAtCommit(t *testing.T) {
	_, _, out := dropped(t)
	st, err := newStage(out, false, runFolder)
	if err != nil {
		t.Fatal(err)
	}
	defer st.discard()
	if err := st.file("landings.csv", func(w io.Writer) error { _, err := io.WriteString(w, "new"); return err }); err != nil {
		t.Fatal(err)
	}
	keep(t, filepath.Join(out, "letter.txt"), "mine")
	if err := st.commit(); err == nil || !strings.Contains(err.Error(), `holds "letter.txt" beside an earlier run`) {
		t.Errorf("got %v", err)
	}
	where := st.keepPartial()
	if src, err := os.ReadFile(filepath.Join(where, "landings.csv")); err != nil || string(src) != "new" {
		t.Errorf("%q %v", src, err)
	}
	if src, err := os.ReadFile(filepath.Join(out, "letter.txt")); err != nil || string(src) != "mine" {
		t.Errorf("%q %v", src, err)
	}
}
