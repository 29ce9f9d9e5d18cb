package main

import (
	"bytes"
	"fmt"
	"os"
	"os/exec"
	"path/filepath"
	"runtime"
	"slices"
	"strings"
	"testing"
)

const tutorial = "../../scenarios/TUTORIAL.md"

// fence is a fenced block of a page: its language, the words behind that, and
// its lines.
type fence struct {
	lang  string
	args  []string
	lines []string
}

// TestTutorial follows the tutorial as a reader would, in an empty folder: it
// writes the files, runs the commands and wants the output that is shown. A
// block is
//
//	toml NAME      a file
//	toml NAME add  lines to be added at its end
//	diff NAME      lines of it that are replaced
//	console        commands behind $, each followed by what it prints
//
// Output is held paragraph by paragraph; one of "..." stands for any others.
func TestTutorial(t *testing.T) {
	if runtime.GOOS == "windows" || runtime.GOARCH != "amd64" {
		t.Skip("the commands are for a shell, and last digits are held for one architecture")
	}
	src, err := os.ReadFile(tutorial)
	if err != nil {
		t.Fatal(err)
	}
	s := session{t: t, dir: t.TempDir()}
	var out []string // the page as it should be
	commands := 0
	lines := strings.Split(string(src), "\n")
	for i := 0; i < len(lines); i++ {
		out = append(out, lines[i])
		info, ok := strings.CutPrefix(lines[i], "```")
		if !ok {
			continue
		}
		n := slices.Index(lines[i+1:], "```")
		if n < 0 {
			t.Fatalf("line %d: a block without an end", i+1)
		}
		words := append(strings.Fields(info), "")
		f := fence{words[0], words[1 : len(words)-1], lines[i+1 : i+1+n]}
		body := f.lines
		if f.lang == "console" {
			body = s.commands(f.lines)
			commands++
		} else if err := s.edit(f); err != nil {
			t.Fatalf("line %d: %v", i+1, err)
		}
		out = append(append(out, body...), "```")
		i += n + 1
	}
	if commands < 5 {
		t.Errorf("only %d blocks of commands", commands)
	}
	if *update && !t.Failed() {
		if err := os.WriteFile(tutorial, []byte(strings.Join(out, "\n")), 0o666); err != nil {
			t.Fatal(err)
		}
	}
}

// session is the reader's folder and shell.
type session struct {
	t      *testing.T
	dir    string
	status int // of the command before
}

// edit writes, adds to or changes a file.
func (s *session) edit(f fence) error {
	if len(f.args) == 0 {
		return fmt.Errorf("the block names no file")
	}
	path := filepath.Join(s.dir, f.args[0])
	text := strings.Join(f.lines, "\n") + "\n"
	if f.lang != "diff" && len(f.args) == 1 {
		return os.WriteFile(path, []byte(text), 0o666)
	}
	old, err := os.ReadFile(path)
	if err != nil {
		return err
	}
	if f.lang != "diff" {
		return os.WriteFile(path, append(old, "\n"+text...), 0o666)
	}
	var was, now string
	for _, line := range f.lines {
		if gone, ok := strings.CutPrefix(line, "-"); ok {
			was += gone + "\n"
		} else {
			now += strings.TrimPrefix(line, "+") + "\n"
		}
	}
	if bytes.Count(old, []byte(was)) != 1 {
		return fmt.Errorf("%s does not have once\n%s", f.args[0], was)
	}
	return os.WriteFile(path, bytes.Replace(old, []byte(was), []byte(now), 1), 0o666)
}

// commands runs those of a block. It gives the block as it should be.
func (s *session) commands(lines []string) (out []string) {
	for i := 0; i < len(lines); {
		command, ok := strings.CutPrefix(lines[i], "$ ")
		if !ok {
			s.t.Fatalf("a line of output without a command: %q", lines[i])
		}
		out = append(out, lines[i])
		n := i + 1
		for n < len(lines) && !strings.HasPrefix(lines[n], "$ ") {
			n++
		}
		shown := strings.Join(lines[i+1:n], "\n")
		out = append(out, s.hold(command, shown, s.shell(command))...)
		i = n
	}
	return out
}

// shell runs a command and gives what it prints.
func (s *session) shell(command string) string {
	cmd := exec.Command("sh", "-c", fmt.Sprintf("(exit %d); %s", s.status, command))
	cmd.Dir, cmd.Env = s.dir, append(os.Environ(), "LC_ALL=C")
	printed, err := cmd.CombinedOutput()
	if err != nil && cmd.ProcessState == nil {
		s.t.Fatal(err)
	}
	s.status = cmd.ProcessState.ExitCode()
	return strings.TrimRight(string(printed), "\n")
}

// hold wants the paragraphs that are shown among those printed, in order, and
// nothing else where no "..." stands. It gives them as they were printed.
func (s *session) hold(command, shown, printed string) []string {
	var out []string
	rest := strings.Split(printed, "\n\n")
	if printed == "" {
		rest = nil
	}
	gap := false
	for _, p := range strings.Split(shown, "\n\n") {
		if p == "..." {
			gap = true
			out = append(out, p)
			continue
		}
		if p == "" {
			continue
		}
		head, _, _ := strings.Cut(p, "\n")
		at := slices.IndexFunc(rest, func(r string) bool { return r == p })
		if at < 0 && *update {
			at = slices.IndexFunc(rest, func(r string) bool { first, _, _ := strings.Cut(r, "\n"); return first == head })
			at = max(at, min(0, len(rest)-1)) // an only paragraph, or the first: its head has changed
		}
		if at < 0 || at > 0 && !gap {
			s.t.Errorf("$ %s\nprints\n%s\n\nwant there\n%s", command, printed, p)
			return nil
		}
		out = append(out, rest[at])
		rest, gap = rest[at+1:], false
	}
	if len(rest) > 0 && !gap {
		s.t.Errorf("$ %s\nprints more than is shown: %q", command, rest)
	}
	if len(out) == 0 {
		return nil
	}
	return strings.Split(strings.Join(out, "\n\n"), "\n")
}
