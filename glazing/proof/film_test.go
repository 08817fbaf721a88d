package proof

import (
	"maps"
	"strings"
	"testing"

	"panewright/reference/checks"
)

// What the inputs of the checks of films must not be, with a word that the error must hold.
func TestFilmRefuses(t *testing.T) {
	var m memo
	first := map[string]checks.Check{} // of each kind
	for _, c := range checks.All() {
		if _, ok := first[c.Kind]; !ok {
			first[c.Kind] = c
		}
	}
	for _, tt := range []struct{ kind, key, bad string }{
		{"carriers", "figure", "colour"},
		{"carriers", "mass", "light"},
		{"drude_fit", "figure", "colour"},
		{"tauc_lorentz", "part", "whole"},
		{"element_fraction", "of", "brass"},
		{"metal_mass", "film", "gold"},
		{"metal_film", "figure", "colour"},
		{"stack_share", "polarisation", "round"},
		{"stack_share", "share", "A"},
		{"film_emissivity", "direction", "sideways"},
	} {
		c, ok := first[tt.kind]
		if !ok || c.Inputs[tt.key] == "" {
			t.Fatalf("no check of kind %s has an input %s", tt.kind, tt.key)
		}
		bad := maps.Clone(c.Inputs)
		bad[tt.key] = tt.bad
		if _, err := m.compute(checks.Check{Kind: tt.kind, Inputs: bad}); err == nil || !strings.Contains(err.Error(), tt.bad) {
			t.Errorf("%s with %s %q: error is %v, want one that names it", tt.kind, tt.key, tt.bad, err)
		}
	}
}

// No kind of films is checked by one figure alone, for which a constant would do.
func TestFilmKindsVary(t *testing.T) {
	wants := map[string]map[float64]bool{}
	for _, c := range checks.All() {
		kind := c.Kind + " " + c.Inputs["figure"] + c.Inputs["part"] + c.Inputs["film"]
		if wants[kind] == nil {
			wants[kind] = map[float64]bool{}
		}
		wants[kind][c.Want] = true
	}
	for _, kind := range []string{
		"carriers plasma_ev", "carriers damping_ev", "carriers undamped_plasma_nm", "carriers screened_plasma_nm", "carriers sheet_resistance_ohm",
		"carriers n", "carriers k", "drude_fit plasma_ev", "drude_fit carriers_1e20_cm3", "drude_fit n", "drude_fit k", "burstein_moss ", "tauc_lorentz real",
		"thin_sheet_emissivity ", "linear_emissivity ", "hagen_rubens ", "haacke ", "gordon ", "radio_attenuation ", "element_fraction ",
		"metal_mass ito", "metal_mass silver", "metal_film sheet_resistance_ohm", "metal_film linear_emissivity", "fuchs_sondheimer ", "thin_damping ",
		"graphene ", "stack_share ", "film_emissivity ",
	} {
		if len(wants[kind]) < 2 {
			t.Errorf("%s has %d figures; a constant would do", kind, len(wants[kind]))
		}
	}
}
