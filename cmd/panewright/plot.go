package main

// panewright plot: the spectra of a make-up as curves.

import (
	"fmt"

	"github.com/spf13/cobra"

	"panewright/cmd/panewright/internal/draw"
	"panewright/glazing"
)

func newPlot(s streams) *cobra.Command {
	var o selection
	var output string
	c := &cobra.Command{
		Use:                   "plot PROJECT --makeup ID [options]",
		DisableFlagsInUseLine: true,
		Short:                 "Draw the spectra of a make-up",
		Long: `Draws the spectra of a make-up from 300 to 2500 nm as SVG, at normal incidence:
transmittance and the reflectances on both sides. Of a make-up that switches it
draws the transmittances of its tints, at most ` + fmt.Sprint(draw.MaxCurves) + `, or of the tints named; of
one tint alone, all three curves. What is not known leaves a gap.

panewright rate --as json --spectra all gives the numbers.`,
		Example: `  panewright plot panewright-demo/project.yaml --makeup D1
  panewright plot panewright-demo/project.yaml --makeup E1 -o e1.svg
  panewright plot panewright-demo/project.yaml --makeup E1 --tint full`,
		Args: oneProject,
		RunE: func(c *cobra.Command, args []string) error {
			return s.picture(c.Name(), args[0], output, o, func(ratings []*glazing.Rating, h draw.Heading) *draw.Canvas {
				if len(ratings) > 1 {
					h.About = "Transmittance of the make-up in each tint. " + h.About
					return draw.PlotPicture(draw.TintCurves(ratings), h)
				}
				if tint := ratings[0].Tint; tint != "" {
					h.About = "Tint " + tint + ". " + h.About
				}
				return draw.PlotPicture(draw.MakeupCurves(ratings[0]), h)
			})
		},
	}
	o.drawingFlags(c)
	outputFlag(c, &output)
	return c
}
