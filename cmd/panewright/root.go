package main

import (
	"errors"
	"fmt"
	"io"
	"os"
	"path/filepath"
	"strings"

	"github.com/spf13/cobra"

	"panewright/glazing/project"
)

// version is printed by --version and on every output.
const version = "0.1.0"

// The exit codes.
const (
	exitDone   = 0
	exitFailed = 1 // the work failed; an output could not be written
	exitUsage  = 2 // wrong usage or wrong input
)

// streams are where a command prints: results to out, all else to err.
type streams struct{ out, err io.Writer }

// run executes the command line and returns the exit code.
func run(args []string, s streams) int {
	out := &checkedWriter{w: s.out}
	s.out = out
	root := newRoot(s)
	root.SetArgs(args)
	err := root.Execute()
	if failed := out.failure(); failed != nil {
		err = failed // the command library ignores it when it prints help
	}
	if err == nil {
		return exitDone
	}
	report(s.err, err)
	if _, failed := errors.AsType[*outputError](err); failed {
		return exitFailed
	}
	return exitUsage
}

func newRoot(s streams) *cobra.Command {
	root := &cobra.Command{
		Use:   "panewright",
		Short: "Rate glazing make-ups from the spectra of their panes",
		Long: `Panewright computes, for every tint of a make-up, light and solar transmittance
and reflectance, colour, ultraviolet, solar heat gain (g), emissivity and the
U-value of the centre of the glass, and shows its working.

The figures are calculated: they are neither a certified rating nor a maker's
declaration. Local authorities and licensed practitioners decide.`,
		Example: `  panewright demo
  panewright rate panewright-demo/project.yaml
  panewright explain panewright-demo/project.yaml --makeup D1`,
		Version:       version,
		SilenceUsage:  true,
		SilenceErrors: true,
		Args:          cobra.ArbitraryArgs,
		RunE: func(c *cobra.Command, args []string) error {
			if len(args) == 0 {
				return c.Help()
			}
			var known []string
			for _, x := range c.Commands() {
				known = append(known, x.Name())
			}
			return fmt.Errorf("unknown command %q; %s", short(args[0]), project.DidYouMean(project.Nearest(args[0], known), known))
		},
	}
	root.SetVersionTemplate("panewright {{.Version}}\n")
	root.SetOut(s.out)
	root.SetErr(s.err)
	root.CompletionOptions.DisableDefaultCmd = true
	root.AddCommand(newDemo(s), newRate(s), newExplain(s), newSchema(s))
	return root
}

// checkedWriter remembers that a write failed.
type checkedWriter struct {
	w   io.Writer
	err error
}

func (c *checkedWriter) Write(b []byte) (int, error) {
	n, err := c.w.Write(b)
	if err != nil && c.err == nil {
		c.err = err
	}
	return n, err
}

func (c *checkedWriter) failure() error {
	if c.err == nil {
		return nil
	}
	return &outputError{"standard output", c.err}
}

// An outputError says that an output could not be written.
type outputError struct {
	name string
	err  error
}

func (e *outputError) Error() string { return "cannot write " + e.name + ": " + e.err.Error() }
func (e *outputError) Unwrap() error { return e.err }

const (
	errorsPrinted = 10
	errorLength   = 1400
)

// report prints errors, one a line: those of a project as they are, with file and line, others
// after the program's name.
func report(w io.Writer, err error) {
	all, ok := errors.AsType[project.Errors](err)
	if !ok {
		fmt.Fprintln(w, clip("panewright: "+err.Error()))
		return
	}
	for i, e := range all {
		if i == errorsPrinted {
			fmt.Fprintf(w, "… and %d more\n", len(all)-i)
			return
		}
		fmt.Fprintln(w, clip(e.Error()))
	}
}

// clip keeps a message on one line of bounded length.
func clip(s string) string {
	s = strings.ReplaceAll(s, "\n", " ")
	if r := []rune(s); len(r) > errorLength {
		return string(r[:errorLength]) + "…"
	}
	return s
}

// short keeps what the user typed short in a message.
func short(s string) string {
	if r := []rune(s); len(r) > 60 {
		return string(r[:60]) + "…"
	}
	return s
}

// write writes a result to standard output, or, if a path is given, to that file.
func (s streams) write(path string, content []byte) error {
	if path == "" {
		_, err := s.out.Write(content)
		if err != nil {
			return &outputError{"standard output", err}
		}
		return nil
	}
	if err := writeFile(path, content); err != nil {
		return &outputError{path, err}
	}
	return nil
}

// writeFile writes a file under a temporary name in its folder and renames it, so that nothing
// half-written is left. What is no regular file, such as a pipe or a terminal, is written to.
func writeFile(path string, content []byte) (err error) {
	mode := os.FileMode(0o644)
	switch info, err := os.Stat(path); {
	case err != nil:
	case info.IsDir():
		return errors.New("is a folder")
	case !info.Mode().IsRegular():
		return os.WriteFile(path, content, mode)
	default:
		mode = info.Mode().Perm()
		if real, err := filepath.EvalSymlinks(path); err == nil {
			path = real // a link stays, and what it leads to is replaced
		}
	}
	f, err := os.CreateTemp(filepath.Dir(path), ".panewright-*")
	if err != nil {
		return err
	}
	defer func() {
		if err != nil {
			os.Remove(f.Name())
		}
	}()
	_, err = f.Write(content)
	if err == nil {
		err = f.Chmod(mode)
	}
	if err == nil {
		err = f.Sync()
	}
	if closing := f.Close(); err == nil {
		err = closing
	}
	if err == nil {
		err = os.Rename(f.Name(), path)
	}
	return err
}
