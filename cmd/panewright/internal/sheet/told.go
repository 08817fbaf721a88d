package sheet

// What stands beside the figures of a make-up: sources, typed values, cautions.

import (
	"fmt"
	"slices"
	"strconv"
	"strings"

	"panewright/glazing"
)

// told returns the lists of a make-up in all its tints.
func (p *paper) told(ratings []*glazing.Rating) (all []piece) {
	r := p.of(ratings)
	for _, l := range []list{
		{title: "Sources", items: sources(ratings)},
		{title: "Typed by the user, not computed", items: typed(ratings)},
		{title: "Cautions", items: slices.Clip(r.CautionsOnce()), mark: "·"},
	} {
		if l.items != nil {
			all = append(all, p.listed(l))
		}
	}
	return all
}

// sources says where the spectra of panes come from, and the emissivities of surfaces.
func sources(ratings []*glazing.Rating) (items []string) {
	m := ratings[0].Makeup
	var whence []string
	panes := map[string][]string{}
	for k, placed := range m.Panes {
		s := sourceOf(placed.Pane, ratings, k)
		whence = add(whence, s)
		panes[s] = add(panes[s], placed.Pane.ID)
	}
	for _, s := range whence {
		items = append(items, strings.Join(panes[s], ", ")+": "+s)
	}
	var kinds []string
	surfaces := map[string][]int{}
	for i := range ratings[0].Surfaces {
		for _, r := range ratings {
			s := emissivitySources[r.Surfaces[i].Source]
			kinds = add(kinds, s)
			surfaces[s] = add(surfaces[s], i+1)
		}
	}
	var parts []string
	for _, s := range kinds {
		parts = append(parts, surfacesNamed(surfaces[s])+" "+s)
	}
	return append(items, "Emissivities: "+strings.Join(parts, "; ")+".")
}

// surfacesNamed names surfaces by their numbers, which ascend; three and more that follow each other
// by the first and the last.
func surfacesNamed(numbers []int) string {
	var parts []string
	for i := 0; i < len(numbers); {
		k := i + 1
		for k < len(numbers) && numbers[k] == numbers[k-1]+1 {
			k++
		}
		if k-i > 2 {
			parts = append(parts, fmt.Sprintf("%d to %d", numbers[i], numbers[k-1]))
		} else {
			for _, n := range numbers[i:k] {
				parts = append(parts, strconv.Itoa(n))
			}
		}
		i = k
	}
	if len(numbers) == 1 {
		return "surface " + parts[0]
	}
	return "surfaces " + strings.Join(parts, ", ")
}

// sourceOf says where the spectra of a pane come from, in the tints of some ratings.
func sourceOf(pane *glazing.Pane, ratings []*glazing.Rating, k int) string {
	var tints, files []string
	for _, r := range ratings {
		t := pane.Tints[r.Ready.States[r.State].Tints[k]]
		files = add(files, t.Source)
		tints = add(tints, t.Name+": "+t.Source)
	}
	switch {
	case len(files) > 1:
		return string(pane.Origin) + " spectra; " + strings.Join(tints, "; ") + "."
	case files[0] == "":
		return string(pane.Origin) + " spectrum."
	}
	return string(pane.Origin) + " spectrum, " + files[0] + "."
}

// emissivitySources are the sources of emissivities in words.
var emissivitySources = map[string]string{
	glazing.EmissivityGiven:       "typed by the user, corrected",
	glazing.EmissivityGivenNormal: "typed by the user, normal",
	glazing.EmissivityInfrared:    "from infrared rows of the spectrum",
	glazing.EmissivityConvention:  "by convention for uncoated glass (EN 673)",
	glazing.EmissivityComputed:    "from optical constants",
	glazing.EmissivityUnknown:     "not known",
}

// typed lists the values that the user typed in and that nothing here computes.
func typed(ratings []*glazing.Rating) (items []string) {
	m, method := ratings[0].Makeup, ratings[0].Method
	for _, t := range m.Typed {
		items = append(items, t.Name+": "+t.Text)
	}
	for _, placed := range m.Panes {
		if t := placed.Pane.TauInfrared; t > 0 {
			items = add(items, fmt.Sprintf("transmittance in the thermal infrared of %s: %.6g", placed.Pane.ID, t))
		}
	}
	for _, x := range []struct {
		name  string
		value float64
	}{{"outside surface coefficient he", method.Options.OutsideWM2K}, {"inside surface coefficient hi", method.Options.InsideWM2K}} {
		if x.value > 0 {
			items = append(items, fmt.Sprintf("%s: %.6g W/(m²·K)", x.name, x.value))
		}
	}
	return items
}

const differTitle = "Why the bases differ"

// differ says why figures under the bases of the document differ, where there are several.
func (p *paper) differ() []string {
	s := p.r.BasesDiffer()
	if s == "" {
		return nil
	}
	return []string{strings.TrimPrefix(s, differTitle+". ")}
}
