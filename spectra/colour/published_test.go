package colour_test

import (
	"slices"
	"testing"

	"panewright/glazing/proof"
	"panewright/reference/checks"
)

// The published figures of colour, which stand in reference/checks with their sources: chromaticities
// of D65 and of daylight, L*a*b* of the primaries of sRGB, rendering of the fluorescent illuminants,
// the pairs of CIEDE2000.
func TestPublished(t *testing.T) {
	kinds := map[string]int{"white_chromaticity": 4, "daylight_chromaticity": 8, "lab": 12, "lamp_rendering": 12, "lamp_temperature": 12,
		"lamp_chromaticity": 24, "colour_difference": 34}
	groups := checks.Groups()
	for i := range groups {
		groups[i].Checks = slices.DeleteFunc(slices.Clone(groups[i].Checks), func(c checks.Check) bool { return kinds[c.Kind] == 0 })
	}
	for _, g := range proof.Run(groups) {
		for _, o := range g.Outcomes {
			kinds[o.Kind]--
			if o.Result == proof.Missed {
				t.Errorf("%s: %.6f, published %s (%s)", o.ID, o.Got, o.Printed, o.Source)
			}
		}
	}
	for kind, left := range kinds {
		if left != 0 {
			t.Errorf("%d checks of kind %s are lacking", left, kind)
		}
	}
}
