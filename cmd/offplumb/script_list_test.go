package main

import (
	"bytes"
	"fmt"
	"os"
	"strconv"

	"github.com/rogpeppe/go-internal/testscript"
)

// longCmd writes a release list: long FILE ROWS.
func longCmd(ts *testscript.TestScript, _ bool, args []string) {
	n, err := strconv.Atoi(args[1])
	ts.Check(err)
	var b bytes.Buffer
	b.WriteString("release,height_m,axial_m\n")
	for i := range n {
		fmt.Fprintf(&b, "row %d,%g,%g\n", i, 0.5+float64(i%97)/50, float64(i%41)/10-2)
	}
	ts.Check(os.WriteFile(ts.MkAbs(args[0]), b.Bytes(), 0o666))
}

// rowsCmd counts the rows of a table below its header: rows FILE N.
func rowsCmd(ts *testscript.TestScript, _ bool, args []string) {
	src, err := os.ReadFile(ts.MkAbs(args[0]))
	ts.Check(err)
	if got := fmt.Sprint(bytes.Count(src, []byte("\n")) - 1); got != args[1] {
		ts.Fatalf("%s has %s rows, want %s", args[0], got, args[1])
	}
}

// cat2Cmd puts files one behind another: cat2 TO FROM...
func cat2Cmd(ts *testscript.TestScript, _ bool, args []string) {
	var all []byte
	for _, name := range args[1:] {
		src, err := os.ReadFile(ts.MkAbs(name))
		ts.Check(err)
		all = append(all, src...)
	}
	ts.Check(os.WriteFile(ts.MkAbs(args[0]), all, 0o666))
}
