package main

// panewright schema: the JSON Schema of the project file.

import (
	"fmt"
	"path/filepath"
	"strings"

	"github.com/spf13/cobra"

	"panewright/glazing/project"
)

func newSchema(s streams) *cobra.Command {
	var output string
	c := &cobra.Command{
		Args:                  cobra.ArbitraryArgs,
		Use:                   "schema [options]",
		DisableFlagsInUseLine: true,
		Short:                 "Print the JSON Schema of the project file",
		Long: `Prints the JSON Schema (draft 2020-12) of the project file, for editors that
complete and check as you type. It comes from the same table of keys as the
program's own check.`,
		Example: "  panewright schema -o panewright.schema.json",
		RunE: func(c *cobra.Command, args []string) error {
			if len(args) > 0 {
				return fmt.Errorf("schema takes no argument; %q was given", short(args[0]))
			}
			if err := checkEnding(c.Name(), output, "", []string{"json"}); err != nil {
				return err
			}
			if end := strings.ToLower(filepath.Ext(output)); end == ".yaml" || end == ".yml" { // perhaps a project
				return fmt.Errorf("-o %s: schema writes JSON; end the name in .json", short(output))
			}
			return s.write(output, project.Schema())
		},
	}
	outputFlag(c, &output)
	return c
}
