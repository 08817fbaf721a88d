package library_test

import (
	"math"
	"regexp"
	"slices"
	"strings"
	"testing"

	"panewright/glazing"
	"panewright/glazing/film"
	"panewright/glazing/library"
)

// Every built-in pane rates, with every figure known, keeps energy, and says where it comes from.
func TestEveryPaneRates(t *testing.T) {
	id := regexp.MustCompile(`^[a-z][a-z0-9.-]*$`)
	var seen []string
	for _, e := range library.Entries() {
		if !id.MatchString(e.ID) || slices.Contains(seen, e.ID) || e.About == "" || library.Pane(e.ID).Tints[0].Source == "" {
			t.Errorf("%+v: an id is plain and stands once, with what it is and where it comes from", e)
		}
		seen = append(seen, e.ID)
		p := library.Pane(e.ID)
		wantOrigin := glazing.ModelledOrigin
		if strings.HasPrefix(e.ID, "invented-") {
			wantOrigin = glazing.InventedOrigin
		}
		if p.ID != e.ID || p.Origin != wantOrigin {
			t.Errorf("%s: id %s, origin %s", e.ID, p.ID, p.Origin)
		}
		ratings, err := glazing.Rate(&glazing.Makeup{ID: "one", Panes: []glazing.Placed{{Pane: p}}}, glazing.EN)
		if err != nil {
			t.Fatalf("%s: %v", e.ID, err)
		}
		for i := range ratings {
			r := &ratings[i]
			for _, f := range glazing.Figures() {
				for k := range f.Count(r) {
					if f.Value != nil && !f.Value(r, k).Known && !strings.HasSuffix(f.Key, "emissivity_hemispherical") {
						t.Errorf("%s %s: no %s: %s", e.ID, r.Tint, f.Key, f.Value(r, k).Why)
					}
				}
			}
			s := p.Tints[i].Spectrum
			for j, nm := range s.Tau.NM {
				if s.Tau.Value[j]+max(s.RhoFront.Value[j], s.RhoBack.Value[j]) > 1 || s.Tau.Value[j] < 0 {
					t.Errorf("%s %s at %g nm: τ %g, ρ %g and %g", e.ID, r.Tint, nm, s.Tau.Value[j], s.RhoFront.Value[j], s.RhoBack.Value[j])
				}
			}
			switch caution := slices.ContainsFunc(r.Cautions, func(c glazing.Caution) bool { return c.Code == string(wantOrigin) }); {
			case !caution:
				t.Errorf("%s: no caution that it is %s", e.ID, wantOrigin)
			case wantOrigin == glazing.ModelledOrigin && !slices.ContainsFunc(r.Cautions, func(c glazing.Caution) bool { return c.Code == "extended" }):
				t.Errorf("%s: no caution that its constants were held below their first wavelength", e.ID)
			}
		}
	}
	// The nominal thicknesses of EN 572-2 (from memory), of each glass.
	want := strings.Fields("soda-lime-2 soda-lime-3 soda-lime-4 soda-lime-5 soda-lime-6 soda-lime-8 soda-lime-10 soda-lime-12 soda-lime-15 soda-lime-19 " +
		"low-iron-6 soda-grey-6 soda-bronze-6 soda-green-6")
	for _, want := range want {
		if !slices.Contains(seen, want) {
			t.Errorf("no pane %s", want)
		}
	}
	if library.Pane("soda-lime-7.5") != nil {
		t.Error("a pane of a thickness that is not listed")
	}
}

// Uncoated soda-lime faces carry the conventional emissivity of EN 673 and show the computed one
// beside it; another glass carries what its constants give.
func TestEmissivityOfUncoatedFaces(t *testing.T) {
	c, _ := film.Glass("soda-lime")
	s := film.Sheet{Constants: c, ThicknessMM: 6}
	e := library.Uncoated("a", s).Tints[0].Back
	if e.Source != glazing.EmissivityConvention || e.Normal.Number != 0.89 || e.Corrected.Number != 0.837 || math.Abs(e.ComputedNormal.Number-0.893) > 0.0005 {
		t.Errorf("soda-lime: %+v", e)
	}
	s.Constants.SodaLime = false
	// 0.8928 and, between the rows 0.8: 0.95 and 0.89: 0.94 held beyond, 0.94 of it (EN 12898).
	e = library.Uncoated("a", s).Tints[0].Back
	if e.Source != glazing.EmissivityComputed || math.Abs(e.Normal.Number-0.8928) > 5e-5 || math.Abs(e.Corrected.Number-0.94*0.8928) > 5e-5 {
		t.Errorf("the same constants of another glass: %+v", e)
	}
}
