package main

import (
	"bytes"
	"context"
	"os"
	"path/filepath"
	"strings"
	"syscall"
	"testing"
)

// TestInterruptKeepsEarlierResults stops a run before it is done: the folder
// of the run before stays as it was, and what there is lies beside it, marked
// incomplete.
func TestInterruptKeepsEarlierResults(t *testing.T) {
	dir := t.TempDir()
	scenario := filepath.Join(dir, "drop.toml")
	const src = "format = 1\n[habitat]\nfloor_radius = \"18 m\"\nspin = \"5 rpm\"\n[[release]]\nname = \"drop\"\nat = { height = \"1 m\" }\n"
	if err := os.WriteFile(scenario, []byte(src), 0o666); err != nil {
		t.Fatal(err)
	}
	out := filepath.Join(dir, "out")
	var stdout, stderr bytes.Buffer
	if got := run([]string{"run", scenario, "--out", out, "--quiet"}, nil, &stdout, &stderr); got != exitDone {
		t.Fatalf("exit status %d: %s", got, stderr.String())
	}
	before, err := contents(out)
	if err != nil {
		t.Fatal(err)
	}
	for _, c := range []struct {
		signal syscall.Signal
		status int
	}{{syscall.SIGINT, exitInterrupted}, {syscall.SIGTERM, exitTerminated}} {
		ctx, cancel := context.WithCancelCause(context.Background())
		cancel(signalled{c.signal})
		root := newRoot(streams{nil, &stdout, &stderr})
		root.SetArgs([]string{"run", scenario, "--out", out})
		if got := status(root.ExecuteContext(ctx), &stderr); got != c.status {
			t.Errorf("exit status %d, want %d", got, c.status)
		}
		after, err := contents(out)
		if err != nil {
			t.Fatal(err)
		}
		if len(after) != len(before) || !bytes.Equal(after["landings.csv"], before["landings.csv"]) {
			t.Errorf("%v changed the results of the run before", c.signal)
		}
		mark, err := os.ReadFile(filepath.Join(out+".partial", "run.json"))
		if err != nil || !strings.Contains(string(mark), `"complete": false`) {
			t.Errorf("%v: the partial results are not marked: %v %.200s", c.signal, err, mark)
		}
	}
	left, err := filepath.Glob(filepath.Join(dir, ".*"))
	if err != nil || len(left) > 0 {
		t.Errorf("left behind: %v %v", left, err)
	}
}
