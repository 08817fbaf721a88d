package glazing

// The working of thickness and mass.

import "strings"

// workMass writes out the thickness of panes and gaps, and the mass of the plies of panes.
func workMass(r *Rating) Chapter {
	var widths, masses []string
	for k, p := range r.Makeup.Panes {
		if k > 0 {
			widths = append(widths, put(r.Makeup.Gaps[k-1].WidthMM))
		}
		for _, y := range p.Pane.Plies {
			widths = append(widths, put(y.ThicknessMM))
			masses = append(masses, put(y.ThicknessMM/1000)+"·"+put(y.DensityKGM3))
		}
	}
	return Chapter{Title: "Thickness and mass", Steps: []Step{
		{Symbol: "d", Meaning: "thickness", Formula: "Σ d of plies and gaps, from outside", Numbers: strings.Join(widths, " + "),
			Value: r.ThicknessMM, Unit: "mm", Clause: "as put in"},
		{Symbol: "m", Meaning: "mass per area", Formula: "Σ d·ρ of the plies, d in m", Numbers: strings.Join(masses, " + "),
			Value: r.MassKGM2, Unit: "kg/m²", Clause: "EN 572-1"},
	}}
}
