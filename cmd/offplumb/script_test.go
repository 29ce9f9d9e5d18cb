package main

import (
	"bytes"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"
	"strconv"
	"testing"

	"github.com/rogpeppe/go-internal/testscript"
)

func TestMain(m *testing.M) {
	testscript.Main(m, map[string]func(){
		"offplumb": func() { os.Exit(run(os.Args[1:], os.Stdin, os.Stdout, os.Stderr)) },
	})
}

// TestScripts drives the program as its users do.
func TestScripts(t *testing.T) {
	testscript.Run(t, testscript.Params{
		Dir:                 "../../testdata/script",
		RequireUniqueNames:  true,
		RequireExplicitExec: true,
		Cmds: map[string]func(*testscript.TestScript, bool, []string){
			"status":     statusCmd,
			"huge":       hugeCmd,
			"samefolder": sameFolderCmd,
			"long":       longCmd,
			"rows":       rowsCmd,
			"cat2":       cat2Cmd,
		},
	})
}

// statusCmd runs a program and wants its exit status: status N PROGRAM ARG...
func statusCmd(ts *testscript.TestScript, _ bool, args []string) {
	want, err := strconv.Atoi(args[0])
	ts.Check(err)
	err = ts.Exec(args[1], args[2:]...)
	got := 0
	if exit, ok := err.(interface{ ExitCode() int }); ok {
		got = exit.ExitCode()
	} else if err != nil {
		ts.Fatalf("%v", err)
	}
	if got != want {
		ts.Fatalf("exit status %d, want %d", got, want)
	}
}

// hugeCmd writes a file of comments: huge FILE MEGABYTES.
func hugeCmd(ts *testscript.TestScript, _ bool, args []string) {
	mb, err := strconv.Atoi(args[1])
	ts.Check(err)
	line := []byte("# nothing to see here at all ##\n")
	ts.Check(os.WriteFile(ts.MkAbs(args[0]), bytes.Repeat(line, mb<<20/len(line)), 0o666))
}

// sameFolderCmd wants two folders to hold the same files, byte by byte.
func sameFolderCmd(ts *testscript.TestScript, _ bool, args []string) {
	a, err := contents(ts.MkAbs(args[0]))
	ts.Check(err)
	b, err := contents(ts.MkAbs(args[1]))
	ts.Check(err)
	if len(a) == 0 || len(a) != len(b) {
		ts.Fatalf("%d files and %d", len(a), len(b))
	}
	for name, data := range a {
		if !bytes.Equal(data, b[name]) {
			ts.Fatalf("%s differs", name)
		}
	}
}

func contents(dir string) (map[string][]byte, error) {
	out := map[string][]byte{}
	err := filepath.WalkDir(dir, func(path string, d fs.DirEntry, err error) error {
		if err != nil || d.IsDir() {
			return err
		}
		rel, err := filepath.Rel(dir, path)
		if err != nil {
			return err
		}
		out[rel], err = os.ReadFile(path)
		return err
	})
	if err != nil {
		return nil, fmt.Errorf("reading %s: %w", dir, err)
	}
	return out, nil
}
