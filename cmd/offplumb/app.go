package main

import (
	"context"
	"errors"
	"fmt"
	"io"
	"os"
	"os/signal"
	"strings"
	"syscall"

	"github.com/spf13/cobra"
)

// Exit statuses.
const (
	exitDone        = 0
	exitBroken      = 1 // done, but a limit was broken
	exitWrong       = 2 // the command line or the scenario is wrong
	exitIncomplete  = 3 // the run could not be completed
	exitInterrupted = 130
	exitTerminated  = 143
)

// fail is an error with the exit status that it leads to.
type fail struct {
	status int
	err    error
}

func (f *fail) Error() string { return f.err.Error() }
func (f *fail) Unwrap() error { return f.err }

func wrong(err error) error      { return &fail{exitWrong, err} }
func incomplete(err error) error { return &fail{exitIncomplete, err} }

// errBroken ends a run that is done, but broke a limit; the summary has said so.
var errBroken = &fail{exitBroken, errors.New("a limit is broken")}

// streams are the program's three streams.
type streams struct {
	in       io.Reader
	out, err io.Writer
}

// run is the whole program. It gives the exit status.
func run(args []string, stdin io.Reader, stdout, stderr io.Writer) int {
	ctx, stop := interruptible()
	defer stop()
	root := newRoot(streams{stdin, stdout, stderr})
	root.SetArgs(args)
	return status(root.ExecuteContext(ctx), stderr)
}

// signalled is the cause of a context that a signal ended.
type signalled struct{ os.Signal }

func (s signalled) Error() string { return "interrupted: " + s.String() }

// interruptible gives a context that ends, with its cause, at an interrupt.
func interruptible() (context.Context, func()) {
	ctx, cancel := context.WithCancelCause(context.Background())
	ch := make(chan os.Signal, 1)
	signal.Notify(ch, os.Interrupt, syscall.SIGTERM)
	go func() {
		if s, ok := <-ch; ok {
			signal.Stop(ch) // a second one ends the program at once
			cancel(signalled{s})
		}
	}()
	return ctx, func() {
		signal.Stop(ch)
		close(ch)
		cancel(nil)
	}
}

// status prints an error and gives the exit status that it leads to.
func status(err error, stderr io.Writer) int {
	var f *fail
	var sig signalled
	switch {
	case err == nil:
		return exitDone
	case errors.Is(err, errBroken):
		return exitBroken
	case errors.As(err, &sig):
		fmt.Fprintln(stderr, calm("offplumb: "+err.Error()))
		if sig.Signal == syscall.SIGTERM {
			return exitTerminated
		}
		return exitInterrupted
	case errors.As(err, &f):
		fmt.Fprintln(stderr, calm(prefixed(f.err)))
		return f.status
	}
	fmt.Fprintln(stderr, calm(prefixed(err)))
	return exitWrong
}

// prefixed puts the program's name before an error, unless it names a place
// in a file, which editors want at the start of the line.
func prefixed(err error) string {
	var at placed
	if errors.As(err, &at) {
		return err.Error()
	}
	return "offplumb: " + err.Error()
}

func newRoot(s streams) *cobra.Command {
	root := &cobra.Command{
		Use:   "offplumb",
		Short: "where things go and what people feel inside a spinning habitat",
		Long: strings.TrimSpace(`
offplumb computes where dropped, thrown and released objects go inside a
spinning habitat, and what people feel who walk and climb there. A scenario
file describes the habitat, the objects and the paths; tables, figures and a
summary come out, with the limits of your project checked.`),
		Example: "  offplumb examples overhead-locker > locker.toml\n  offplumb run locker.toml",

		SilenceUsage:  true,
		SilenceErrors: true,
		RunE: func(cmd *cobra.Command, args []string) error {
			if len(args) > 0 {
				return wrong(fmt.Errorf("unknown command %q; see offplumb --help", args[0]))
			}
			return cmd.Help()
		},
		Args: cobra.ArbitraryArgs,
	}
	root.SetIn(s.in)
	root.SetOut(s.out)
	root.SetErr(s.err)
	root.SetFlagErrorFunc(func(_ *cobra.Command, err error) error { return wrong(err) })
	root.AddCommand(newRun(s), newJoin(s), newCheck(s), newExamples(s), newSchema(s), newSelfcheck(s), newVersion(s))
	return root
}

// exactly wants n arguments, named in the error.
func exactly(n int, what string) cobra.PositionalArgs {
	return func(_ *cobra.Command, args []string) error {
		if len(args) != n {
			return wrong(fmt.Errorf("wants %s, got %d arguments", what, len(args)))
		}
		return nil
	}
}
