package main

// panewright explain: the calculation of a make-up, every number put in.

import (
	"fmt"

	"github.com/spf13/cobra"

	"panewright/cmd/panewright/internal/table"
)

func newExplain(s streams) *cobra.Command {
	var o selection
	var output string
	c := &cobra.Command{
		Use:                   "explain PROJECT --makeup ID [options]",
		DisableFlagsInUseLine: true,
		Short:                 "Show the calculation of a make-up, every number put in",
		Long: `Prints what leads to every figure, in the order of a hand calculation: symbol,
formula, the formula with the numbers put in, value, unit and clause. One
weighted sum is written out row by row; of the others the two sums are given.
Then come U of other gas fills, and how U and g change with emissivities, fills
and widths of gaps; at the end all figures, those of each condition together.
Each condition of the project or the basis has its heat balance, with moisture
and comfort, and each pane its screening for thermal stress.
Without --tint, a make-up that switches is shown in its first tint.`,
		Example: `  panewright explain panewright-demo/project.yaml --makeup D1
  panewright explain panewright-demo/project.yaml --makeup D1 --basis en,iso
  panewright explain panewright-demo/project.yaml --makeup E1 --tint full`,
		Args: oneProject,
		RunE: func(c *cobra.Command, args []string) error {
			if len(o.makeups) == 0 {
				return fmt.Errorf("explain needs the make-up to explain: add --makeup ID")
			}
			if err := checkEnding(c.Name(), output, "", []string{"table"}); err != nil {
				return err
			}
			r, err := rate(args[0], o)
			if err != nil {
				return err
			}
			if len(o.tints) == 0 {
				r = firstTints(r)
			}
			if err := keepInputs(output, r.Project); err != nil {
				return err
			}
			return s.write(output, table.Explain(r))
		},
	}
	o.flags(c)
	outputFlag(c, &output)
	return c
}

// firstTints keeps the first state of each make-up and basis.
func firstTints(r table.Report) table.Report {
	all := r.Ratings
	r.Ratings = nil
	for i := range all {
		if all[i].State == 0 {
			r.Ratings = append(r.Ratings, all[i])
		}
	}
	return r
}
