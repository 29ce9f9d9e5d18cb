package main

import (
	"errors"
	"fmt"
	"io"
	"io/fs"
	"os"
	"path/filepath"

	"github.com/spf13/cobra"
	"offplumb/scenarios"
	"offplumb/sim/study"
)

// maxScenario is the largest scenario file that is read, in bytes; the reader
// refuses it with its own words. One byte more is asked for to know.
const maxScenario = 1 << 20

// stdinName names standard input to people.
const stdinName = "standard input"

// placed is an error that names a place in a file.
type placed struct{ error }

func (p placed) Unwrap() error { return p.error }

// loading says how a scenario is read.
type loading struct {
	sets         []string
	allowOutside bool
	keepRows     int // of a release list that is not streamed; 0: the usual
}

func (l *loading) flags(cmd *cobra.Command) {
	cmd.Flags().StringArrayVar(&l.sets, "set", nil, "set a key of the scenario: `KEY=VALUE`, repeatable")
	cmd.Flags().BoolVar(&l.allowOutside, "allow-outside", false, "let the scenario name files outside its own folder")
}

// loaded is a scenario ready to run.
type loaded struct {
	*scenarios.Scenario
	*study.Prepared
	src    []byte // of the scenario
	origin *inputs
}

// load reads, checks and prepares a scenario; "-" is standard input.
func (l *loading) load(name string, stdin io.Reader) (*loaded, error) {
	src, err := readScenario(name, stdin)
	if err != nil {
		return nil, wrong(err)
	}
	shown := name
	if name == "-" {
		shown = stdinName
	}
	files := &inputs{folder: filepath.Dir(name), stdin: stdin, beyond: l.allowOutside}
	if name == "-" {
		files.stdin = nil
	}
	return l.source(shown, src, files)
}

// source checks and prepares a scenario.
func (l *loading) source(shown string, src []byte, files *inputs) (*loaded, error) {
	sc, err := scenarios.Load(shown, src, scenarios.Options{
		Sets:         l.sets,
		AllowOutside: l.allowOutside,
		ReadFile:     files.read,
		OpenFile:     files.open,
		KeepRows:     l.keepRows,
	})
	if err != nil {
		return nil, wrong(placed{err})
	}
	p, problems := study.Prepare(sc.Model)
	if len(problems) > 0 {
		return nil, wrong(placed{sc.Problems(problems)})
	}
	return &loaded{sc, p, src, files}, nil
}

func readScenario(name string, stdin io.Reader) ([]byte, error) {
	if name == "-" {
		src, err := io.ReadAll(io.LimitReader(stdin, maxScenario+1))
		if err != nil {
			return nil, fmt.Errorf("standard input: %w", err)
		}
		return src, nil
	}
	info, err := os.Stat(name)
	if err != nil {
		return nil, plainPath(name, err)
	}
	if info.IsDir() {
		return nil, fmt.Errorf("%s: is a folder, wants a scenario file", name)
	}
	src, err := readUpTo(name, maxScenario+1)
	if err != nil {
		return nil, plainPath(name, err)
	}
	return src, nil
}

// readUpTo reads at most the given number of bytes of a file.
func readUpTo(name string, most int64) ([]byte, error) {
	f, err := os.Open(name)
	if err != nil {
		return nil, err
	}
	defer f.Close()
	return io.ReadAll(io.LimitReader(f, most))
}

// plainPath says what is wrong with a file without naming the system call.
func plainPath(name string, err error) error {
	var at *fs.PathError
	if errors.As(err, &at) {
		err = at.Err
	}
	return fmt.Errorf("%s: %w", name, err)
}

func newCheck(s streams) *cobra.Command {
	var l loading
	cmd := &cobra.Command{
		Use: "check SCENARIO.toml", Short: "read and validate a scenario; print all problems",
		Args: exactly(1, "one scenario file, or - for standard input"),
		RunE: func(_ *cobra.Command, args []string) error {
			sc, err := l.load(args[0], s.in)
			if err != nil {
				return err
			}
			m := sc.Prepared.Model
			_, err = fmt.Fprintf(s.out, "%s: no problems: %s, %s, %s\n", calm(args[0]),
				count(len(m.Releases)+sc.rows(), "release"), count(len(m.Paths), "crew path"), count(len(m.Limits), "limit"))
			return incompleteIf(err)
		},
	}
	l.flags(cmd)
	return cmd
}

func count(n int, what string) string {
	if n == 1 {
		return "1 " + what
	}
	return fmt.Sprintf("%d %ss", n, what)
}

// rows is the number of rows of the lists that are too long to be kept.
func (l *loaded) rows() (n int) {
	for _, s := range l.Streams {
		n += s.Rows
	}
	return n
}
