// Package table prints ratings as text of 80 columns, JSON, CSV, XLSX and Markdown, and compares
// them, all from the list of figures: a figure that stands in the list appears here without another
// edit.
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
	Figures []glazing.Figure // of a rating; those of the balances under its conditions follow from the ratings
	Ratings []glazing.Rating
	Spectra []glazing.Spectra // one a rating, or none
	// Choices are the figures that are shown, in order; nil for what each output shows by itself.
	Choices   []Choice
	InchPound bool // figures and build-ups are printed in inch-pound units; JSON and explain never are
}

// siRemains is printed where figures are in inch-pound units.
const siRemains = "Figures, and the widths of gaps in make-ups, are in inch-pound units. The coefficients of the basis, cautions, why bases differ and what differs in what was put in stay in SI."

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

// named is a basis with its editions and coefficients.
type named struct{ basis, editions string }

// editions returns those of each basis.
func (r Report) editions() (list []named) {
	for i := range r.Ratings {
		m := r.Ratings[i].Method
		x := named{m.Basis.Name, m.Editions()}
		if !slices.ContainsFunc(list, func(y named) bool { return y.basis == x.basis }) {
			list = append(list, x)
		}
	}
	return list
}

// cautions returns those of one rating, with that of a page of several bases where it applies, and why
// figures under conditions that were chosen are not known.
func (r Report) cautions(i int) []glazing.Caution {
	c := r.Ratings[i].Cautions
	for _, l := range r.lacks(r.Choices, func(x *glazing.Rating) bool { return x == &r.Ratings[i] }) {
		c = append(c[:len(c):len(c)], glazing.Caution{Code: "missing_data", Text: "No figure for " + l.heads() + ": " + l.why + "."})
	}
	if len(r.bases()) > 1 {
		c = append(c[:len(c):len(c)], glazing.MixedBasis)
	}
	return c
}
