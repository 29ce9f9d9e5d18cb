package main

import (
	"fmt"
	"os"
	"path/filepath"
	"runtime"
	"runtime/debug"
	"strings"

	"github.com/spf13/cobra"
	"offplumb/scenarios"
)

// version is the version of the program; it does not depend on how it is
// built.
const version = "0.1.0"

func newVersion(s streams) *cobra.Command {
	return &cobra.Command{
		Use: "version", Short: "print the version, the Go version and the build",
		Args: exactly(0, "no arguments"),
		RunE: func(*cobra.Command, []string) error {
			_, err := fmt.Fprintf(s.out, "offplumb %s %s %s/%s%s\n", version, runtime.Version(), runtime.GOOS, runtime.GOARCH, revision())
			return incompleteIf(err)
		},
	}
}

// revision is the revision that the binary was built from, where it knows.
func revision() string {
	info, ok := debug.ReadBuildInfo()
	if !ok {
		return ""
	}
	for _, s := range info.Settings {
		if s.Key == "vcs.revision" {
			return " " + s.Value[:min(12, len(s.Value))]
		}
	}
	return ""
}

func newSchema(s streams) *cobra.Command {
	return &cobra.Command{
		Use: "schema", Short: "print a JSON Schema of the scenario format, for editors",
		Args: exactly(0, "no arguments"),
		RunE: func(*cobra.Command, []string) error {
			_, err := s.out.Write(scenarios.Schema())
			return incompleteIf(err)
		},
	}
}

func newExamples(s streams) *cobra.Command {
	var into string
	cmd := &cobra.Command{
		Use: "examples [NAME]", Short: "list the shipped scenarios, or write one out",
		Args: cobra.MaximumNArgs(1),
		RunE: func(_ *cobra.Command, args []string) error {
			if len(args) == 0 {
				return listExamples(s)
			}
			return writeExample(s, args[0], into)
		},
	}
	cmd.Flags().StringVar(&into, "into", "", "write the scenario and the files that it names into this `folder`")
	return cmd
}

func listExamples(s streams) error {
	list := scenarios.Examples()
	wide := 0
	for _, e := range list {
		wide = max(wide, len(e.Name))
	}
	for _, e := range list {
		if _, err := fmt.Fprintf(s.out, "%-*s  %s\n", wide, e.Name, e.Title); err != nil {
			return incomplete(err)
		}
	}
	return nil
}

// writeExample prints a scenario, or writes it with the files that it names
// into a folder; what is there already is left alone.
func writeExample(s streams, name, into string) error {
	e, ok := scenarios.ExampleNamed(strings.TrimSuffix(name, ".toml"))
	if !ok {
		return wrong(fmt.Errorf("no shipped scenario named %q; offplumb examples lists them", name))
	}
	if into == "" {
		_, err := s.out.Write(e.Files[0].Data)
		if len(e.Files) > 1 {
			fmt.Fprintf(s.err, "offplumb: this scenario names other files; --into FOLDER writes them too\n")
		}
		return incompleteIf(err)
	}
	if err := os.MkdirAll(into, 0o777); err != nil {
		return incomplete(err)
	}
	for _, f := range e.Files {
		to := filepath.Join(into, f.Name)
		out, err := os.OpenFile(to, os.O_WRONLY|os.O_CREATE|os.O_EXCL, 0o666)
		if err != nil {
			return incomplete(err)
		}
		_, err = out.Write(f.Data)
		if cerr := out.Close(); err == nil {
			err = cerr
		}
		if err != nil {
			return incomplete(err)
		}
		if _, err := fmt.Fprintln(s.out, calm(to)); err != nil {
			return incomplete(err)
		}
	}
	return nil
}

func incompleteIf(err error) error {
	if err != nil {
		return incomplete(err)
	}
	return nil
}
