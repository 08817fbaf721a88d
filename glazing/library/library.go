// Package library holds the built-in panes: uncoated soda-lime glass computed from published
// optical constants, and a handful of coated and switching panes whose spectra are invented.
//
//	pane := library.Pane("soda-lime-6")
package library

import (
	"fmt"
	"slices"
	"strconv"

	"panewright/glazing"
	"panewright/glazing/film"
)

// thicknessesMM are the usual thicknesses of float glass (EN 572-2, from memory).
var thicknessesMM = []float64{2, 3, 4, 5, 6, 8, 10, 12, 15, 19}

// An Entry is one built-in pane: its id, and what it is in a few words.
type Entry struct {
	ID, About string

	glass string
	mm    float64
	tints []inventedTint // none of uncoated glass
}

// Entries returns the built-in panes in the order in which they are listed.
func Entries() []Entry {
	var list []Entry
	for _, glass := range film.Glasses() {
		for _, mm := range thicknessesMM {
			list = append(list, Entry{ID: glass + "-" + strconv.FormatFloat(mm, 'g', -1, 64),
				About: fmt.Sprintf("%s glass of %g mm, uncoated", glass, mm), glass: glass, mm: mm})
		}
	}
	return append(list, invented()...)
}

// sheet is the glass that the pane is made of.
func (e Entry) sheet() film.Sheet {
	c, ok := film.Glass(e.glass)
	if !ok {
		panic("library: no glass " + e.glass)
	}
	return film.Sheet{Constants: c, ThicknessMM: e.mm}
}

// Pane makes the pane, anew.
func (e Entry) Pane() *glazing.Pane {
	p := Uncoated(e.ID, e.sheet())
	if e.tints != nil {
		e.coat(p)
	}
	return p
}

// Pane returns the built-in pane of an id, made anew, or nil if there is none.
func Pane(id string) *glazing.Pane {
	list := Entries()
	if i := slices.IndexFunc(list, func(e Entry) bool { return e.ID == id }); i >= 0 {
		return list[i].Pane()
	}
	return nil
}

// IDs returns the ids of the built-in panes.
func IDs() []string {
	var ids []string
	for _, e := range Entries() {
		ids = append(ids, e.ID)
	}
	return ids
}

// Uncoated makes a pane of one uncoated sheet. The faces of soda-lime glass have the conventional
// emissivity (EN 673); those of any other what its constants give, if they reach from 5 to 50 µm.
func Uncoated(id string, s film.Sheet) *glazing.Pane {
	m := s.Spectrum(0)
	face := glazing.NoEmissivity()
	if hemispherical, ok := s.HemisphericalEmissivity(); ok {
		face = glazing.ComputedEmissivity(m.InfraredFront, m.InfraredTau, hemispherical)
		if s.Constants.SodaLime {
			face = glazing.ConventionalEmissivity(face.Normal.Number, hemispherical)
		}
	}
	p := modelled(id, s)
	p.Sheet, p.Tints[0].Spectrum, p.Tints[0].Front, p.Tints[0].Back = &s, m, face, face
	return p
}

// modelled is a pane of one sheet that is computed, whose spectrum and faces are still to be told.
func modelled(id string, s film.Sheet) *glazing.Pane {
	return &glazing.Pane{
		ID:            id,
		Plies:         []glazing.Ply{{ThicknessMM: s.ThicknessMM, ConductivityWMK: glazing.GlassWMK, DensityKGM3: glazing.GlassKGM3}},
		HeatTreatment: glazing.UnknownTreatment,
		Origin:        glazing.ModelledOrigin,
		Tints:         []glazing.Tint{{Source: "optical constants of " + s.Constants.Name + " glass: " + s.Constants.Source}},
	}
}
