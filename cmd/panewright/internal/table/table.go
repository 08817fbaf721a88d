// Package table prints ratings as text of 80 columns and as JSON, both from the list of figures:
// a figure that stands in the list appears here without another edit.
package table

import (
	"slices"

	"panewright/glazing"
	"panewright/glazing/project"
)

// A Report is what an output prints: a project's ratings, in order, with the list of figures.
type Report struct {
	Version string
	Project *project.Project
	Figures []glazing.Figure
	Ratings []glazing.Rating
	Spectra []glazing.Spectra // one a rating, or none
}

// bases returns the names of the bases in the order in which they occur.
func (r Report) bases() []string {
	var names []string
	for i := range r.Ratings {
		if name := r.Ratings[i].Method.Basis.Name; !slices.Contains(names, name) {
			names = append(names, name)
		}
	}
	return names
}

// cautions returns those of one rating, with that of a page of several bases where it applies.
func (r Report) cautions(i int) []glazing.Caution {
	c := r.Ratings[i].Cautions
	if len(r.bases()) > 1 {
		c = append(c[:len(c):len(c)], glazing.MixedBasis)
	}
	return c
}
