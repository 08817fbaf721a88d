package library

// Panes of films whose materials are known.

import (
	"fmt"
	"slices"
	"strings"

	"panewright/glazing"
	"panewright/glazing/film"
)

// Coated makes a pane of glass with films on one face or both, which must pass film.Coated.Check. A face
// with films has the emissivity that its films and the glass give, if their constants reach from 5 to 25 µm
// at least; a face without any is that of Uncoated, and so is the pane if no film has a thickness.
func Coated(id string, c film.Coated) *glazing.Pane {
	sheet := film.Sheet{Constants: c.Glass, ThicknessMM: c.ThicknessMM}
	ready := c.Ready()
	if !ready.Films(film.Front) && !ready.Films(film.Back) {
		return Uncoated(id, sheet)
	}
	p := modelled(id, sheet)
	p.Coated = &c
	t := &p.Tints[0]
	t.Spectrum = ready.Spectrum(0)
	t.Source += describe(c)
	front, back, ok := ready.HemisphericalEmissivity()
	if !ok {
		t.Front, t.Back = glazing.UnknownEmissivity(ready.InfraredWhy()), glazing.UnknownEmissivity(ready.InfraredWhy())
		if bare := Uncoated(id, sheet).Tints[0]; bare.Front.Corrected.Known && bare.Spectrum.InfraredTau.Len() == 0 { // behind the glass no film counts
			if !ready.Films(film.Front) {
				t.Front = bare.Front
			}
			if !ready.Films(film.Back) {
				t.Back = bare.Back
			}
		}
		return p
	}
	for _, x := range []struct {
		face          film.Face
		to            *glazing.Emissivity
		hemispherical float64
	}{{film.Front, &t.Front, front}, {film.Back, &t.Back, back}} {
		rho := t.Spectrum.InfraredFront
		if x.face == film.Back {
			rho = t.Spectrum.InfraredBack
		}
		*x.to = glazing.ComputedEmissivity(rho, t.Spectrum.InfraredTau, x.hemispherical)
		if c.Glass.SodaLime && !ready.Films(x.face) {
			*x.to = glazing.ConventionalEmissivity(x.to.Normal.Number, x.hemispherical)
		}
	}
	return p
}

// describe names the films of each face with their thicknesses, and once each the source of what is known of
// their materials.
func describe(c film.Coated) string {
	const most = 12 // films of a face that are named
	var b strings.Builder
	var sources []string
	for _, f := range []struct {
		name  string
		films []film.Film
	}{{"front", c.Front}, {"back", c.Back}} {
		var list []string
		for _, x := range f.films {
			list = append(list, fmt.Sprintf("%s %.6g nm", x.Material.ID, x.ThicknessNM))
			if s := x.Material.ID + ": " + x.Material.Source; x.Material.Source != "" && !slices.Contains(sources, s) {
				sources = append(sources, s)
			}
		}
		if n := len(list); n > most {
			list = append(list[:most], fmt.Sprintf("and %d more", n-most))
		}
		if list != nil {
			fmt.Fprintf(&b, "; films of the %s from the glass outward: %s", f.name, strings.Join(list, ", "))
		}
	}
	for _, s := range sources {
		b.WriteString("; " + s)
	}
	return b.String()
}
