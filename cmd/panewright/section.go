package main

// panewright section: the section through a make-up as a drawing.

import (
	"errors"
	"fmt"
	"strings"

	"github.com/spf13/cobra"

	"panewright/cmd/panewright/internal/draw"
	"panewright/cmd/panewright/internal/table"
	"panewright/glazing"
	"panewright/glazing/project"
)

func newSection(s streams) *cobra.Command {
	var o selection
	var output string
	var conditions []string
	c := &cobra.Command{
		Use:                   "section PROJECT --makeup ID [options]",
		DisableFlagsInUseLine: true,
		Short:                 "Draw the section through a make-up",
		Long: `Draws the section through the centre of a make-up as SVG, outside at the left:
panes and gaps to scale across, numbered surfaces, widths, gases, faces of low
emissivity. Glass has the colour of the daylight that it transmits, as an
indication; frames, spacers and edges are not drawn. A make-up that switches is
drawn once for each tint, at most ` + fmt.Sprint(draw.MaxCurves) + `, or in the tints named.

Where the project has conditions, or its first basis brings some, temperatures
run through the glass as lines, with the figures of the surfaces above: in the
condition of the lowest outdoor temperature, and in that of the most sun.

The drawing is 190 mm wide, in the typeface Source Sans 3 where that is
installed, else in another.`,
		Example: `  panewright section panewright-demo/project.yaml --makeup D1
  panewright section panewright-demo/project.yaml --makeup E1 -o e1.svg
  panewright section panewright-demo/project.yaml --makeup E1 --tint full
  panewright section panewright-demo/project.yaml --makeup D1 --conditions none`,
		Args: oneProject,
		RunE: func(c *cobra.Command, args []string) error {
			return s.drawing(c.Name(), args[0], output, o, func(ratings []*glazing.Rating, h draw.Heading) (*draw.Canvas, error) {
				ids, err := shownConditions(ratings[0], conditions)
				return draw.SectionPicture(ratings, ids, h), err
			})
		},
	}
	o.drawingFlags(c)
	c.Flags().StringSliceVar(&conditions, "conditions", nil, "draw the temperatures in conditions `ID,ID`, or none")
	outputFlag(c, &output)
	return c
}

// shownConditions returns the conditions whose temperatures a section shows, from those asked for.
func shownConditions(r *glazing.Rating, asked []string) ([]string, error) {
	asked = unique(asked)
	switch {
	case len(asked) == 0:
		return draw.ColdAndHot(r), nil
	case len(asked) == 1 && asked[0] == noConditions:
		return nil, nil
	case len(asked) > draw.MaxConditions:
		return nil, fmt.Errorf("--conditions names %d; a section shows at most %d", len(asked), draw.MaxConditions)
	}
	for _, id := range asked {
		if r.Balance(id) != nil {
			continue
		}
		known := glazing.ConditionIDs([]glazing.Rating{*r})
		if known == nil {
			return nil, fmt.Errorf("--conditions %s: the project has no conditions:, and basis %s brings none", short(id), r.Method.Basis.Name)
		}
		return nil, fmt.Errorf("--conditions: no condition %q; %s", short(id), project.Offer(id, append(known, noConditions)))
	}
	return asked, nil
}

// noConditions stands for no lines of temperatures.
const noConditions = "none"

// conditionsToShow lists what --conditions may name.
func conditionsToShow(c *cobra.Command, args []string, _ string) []string {
	return append(conditionIDs(c, args), about(noConditions, "no temperatures"))
}

// drawingFlags are those of what is drawn of one make-up, whatever the basis.
func (o *selection) drawingFlags(c *cobra.Command) {
	c.Flags().StringSliceVar(&o.makeups, "makeup", nil, "draw make-up `ID`; needed where the project has several")
	c.Flags().StringSliceVar(&o.tints, "tint", nil, "draw only tint `NAME` (may be repeated)")
	c.Flags().BoolVar(&o.filesAnywhere, "files-anywhere", false, "let the project name files outside its folder")
}

// oneMakeup rates the one make-up that a drawing shows, under the project's first basis, in the
// tints that were selected.
func oneMakeup(command, path string, o selection) (table.Report, error) {
	r, err := rate(path, o)
	if err != nil {
		return r, err
	}
	all := r.Ratings
	r.Ratings = nil
	for i := range all {
		if all[i].Method.Basis.Name == r.Project.Bases[0].Name {
			r.Ratings = append(r.Ratings, all[i])
		}
	}
	var ids []string
	for i := range r.Ratings {
		ids = append(ids, r.Ratings[i].Makeup.ID)
	}
	switch ids = unique(ids); {
	case len(ids) == 0:
		return r, errors.New("the project has no make-up to draw")
	case len(ids) > 1:
		return r, fmt.Errorf("%s draws one make-up; add --makeup with one of %s", command, short(strings.Join(ids, ", ")))
	case len(r.Ratings) > draw.MaxCurves:
		return r, fmt.Errorf("%s has %d tints, and %s draws at most %d; name those to draw with --tint", ids[0], len(r.Ratings), command, draw.MaxCurves)
	}
	return r, nil
}

// picture writes a drawing of one make-up of a project as SVG.
func (s streams) picture(command, path, output string, o selection, draws func([]*glazing.Rating, draw.Heading) *draw.Canvas) error {
	return s.drawing(command, path, output, o, func(ratings []*glazing.Rating, h draw.Heading) (*draw.Canvas, error) {
		return draws(ratings, h), nil
	})
}

// drawing writes one that may be refused, for what it was asked to show.
func (s streams) drawing(command, path, output string, o selection, draws func([]*glazing.Rating, draw.Heading) (*draw.Canvas, error)) error {
	if err := checkEnding(command, output, "", []string{"svg"}); err != nil {
		return err
	}
	r, err := oneMakeup(command, path, o)
	if err != nil {
		return err
	}
	if err := keepInputs(output, r.Project); err != nil {
		return err
	}
	var ratings []*glazing.Rating
	for i := range r.Ratings {
		ratings = append(ratings, &r.Ratings[i])
	}
	m := ratings[0].Makeup
	title := strings.TrimSpace(m.ID + "  " + m.Title)
	picture, err := draws(ratings, draw.Heading{
		Title: title,
		About: r.Project.Title,
		Foot: fmt.Sprintf("Panewright %s; input SHA-256 %s. Calculated, not a certified rating.",
			version, r.Project.Digest),
	})
	if err != nil {
		return err
	}
	svg, err := draw.SVG(picture, title, m.BuildUp())
	if err != nil {
		return err
	}
	if letters := picture.Replaced(); letters != nil {
		fmt.Fprintf(s.err, "panewright: □ stands for letters that the typeface lacks: %s\n", short(string(letters)))
	}
	return s.write(output, svg)
}
