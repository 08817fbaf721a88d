package main

// panewright demo: the invented project, written and rated.

import (
	"errors"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"

	"github.com/spf13/cobra"

	"panewright/cmd/panewright/internal/demo"
	"panewright/cmd/panewright/internal/table"
)

func newDemo(s streams) *cobra.Command {
	return &cobra.Command{
		Args:                  cobra.ArbitraryArgs,
		Use:                   "demo [DIR]",
		DisableFlagsInUseLine: true,
		Short:                 "Write the demo project into a folder and rate it",
		Long: `Writes the invented demo project into DIR (panewright-demo when absent), reads
it back like any project, rates it, prints the schedule and makes the data
sheets anew, DIR/sheets.pdf. Files of the project that stand in DIR and differ
are not overwritten.`,
		Example: "  panewright demo\n  panewright demo mill",
		RunE: func(_ *cobra.Command, args []string) error {
			dir := "panewright-demo"
			switch {
			case len(args) > 1:
				return fmt.Errorf("demo writes into one folder; %d were given", len(args))
			case len(args) == 1 && args[0] == "":
				return errors.New("demo needs the name of a folder")
			case len(args) == 1:
				dir = args[0]
			}
			if info, err := os.Stat(dir); err == nil && !info.IsDir() {
				return &outputError{"the demo project", fmt.Errorf("%s is a file and no folder", dir)}
			}
			path, err := demo.Write(dir)
			if changed, ok := errors.AsType[*demo.ChangedError](err); ok {
				return changed
			}
			if at, ok := errors.AsType[*fs.PathError](err); ok {
				return &outputError{at.Path, at.Err}
			}
			if err != nil {
				return &outputError{"the demo project", cause(err)}
			}
			fmt.Fprintf(s.err, "the demo project is %s; rate it again with: panewright rate %s\n", path, path)
			r, err := rate(path, selection{})
			if err != nil {
				return err
			}
			if err := s.write("", table.Schedule(r)); err != nil {
				return err
			}
			sheets := filepath.Join(dir, "sheets.pdf")
			if err := s.sheets(sheets, r, path, selection{}); err != nil {
				return err
			}
			fmt.Fprintf(s.err, "wrote %s, its data sheets; make them again with: panewright sheet %s -o sheets.pdf\n", sheets, path)
			return nil
		},
	}
}
