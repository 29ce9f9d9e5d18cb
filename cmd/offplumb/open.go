package main

import (
	"fmt"
	"io"
	"os/exec"
	"path/filepath"
	"runtime"
)

// openFile shows a file in the system's browser, and does not wait for it to
// be closed. Tests put something else in its place.
var openFile = func(path string) error {
	cmd := opener(runtime.GOOS, path)
	if err := cmd.Start(); err != nil {
		return err
	}
	return cmd.Process.Release()
}

// opener is the command that opens a file as its owner's system does.
func opener(system, path string) *exec.Cmd {
	switch system {
	case "darwin":
		return exec.Command("open", path)
	case "windows":
		return exec.Command("rundll32", "url.dll,FileProtocolHandler", path)
	}
	return exec.Command("xdg-open", path)
}

// openReport opens the report; where that fails it says so, since the results
// are there all the same.
func openReport(folder string, stderr io.Writer) {
	path, err := filepath.Abs(filepath.Join(folder, reportFile))
	if err == nil {
		err = openFile(path)
	}
	if err != nil {
		fmt.Fprintln(stderr, calm(fmt.Sprintf("offplumb: cannot open the report: %v; it is %s", err, path)))
	}
}
