package proof

import (
	"maps"
	"strings"
	"testing"

	"panewright/reference/checks"
)

// What the inputs of the checks of balances must not be, with a word that the error must hold.
func TestBalanceRefuses(t *testing.T) {
	var m memo
	first := map[string]checks.Check{} // of each kind
	for _, c := range checks.All() {
		if _, ok := first[c.Kind]; !ok {
			first[c.Kind] = c
		}
	}
	for _, tt := range []struct{ kind, key, bad, word string }{
		{"gas_property", "property", "colour", "colour"},
		{"gas_property", "gas", "sf6:1", "sf6"},
		{"gas_property", "gas", "helium:1", "helium"},
		{"gas_deviation", "temperature_c", "cold", "cold"},
		{"pillar_conductance", "glass_w_mk", "1", "two panes"},
		{"vacuum_u", "panes_mm", "4/4/4", "two panes"},
		{"vacuum_u", "emissivity", "0.03/0.03", "two faces"},
		{"vacuum_u", "basis", "imperial", "imperial"},
		{"radiative_conductance", "emissivity", "0.03", "two faces"},
		{"radiative_conductance", "emissivity", "0.03/1.2", "emissivity"},
		{"infrared_films", "films", "0", "one at least"},
		{"infrared_films", "films", "9", "sheets"},
		{"infrared_films", "transmittance", "0.6", "transmittance"},
		{"pane_temperature", "pane", "3", "neither 1 nor 2"},
		{"dew_point", "humidity", "50", "humidity"},
		{"asymmetry_dissatisfied", "source", "ivy", "ivy"},
		{"downdraught", "author", "anonymous", "anonymous"},
		{"sun_on_person", "posture", "upside down", "upside down"},
		{"sun_on_person", "figure", "tan", "tan"},
		{"sun_on_person", "altitude_deg", "91", "altitude"},
	} {
		c, ok := first[tt.kind]
		if !ok || c.Inputs[tt.key] == "" {
			t.Fatalf("no check of kind %s has an input %s", tt.kind, tt.key)
		}
		bad := maps.Clone(c.Inputs)
		bad[tt.key] = tt.bad
		if _, err := m.compute(checks.Check{Kind: tt.kind, Inputs: bad}); err == nil || !strings.Contains(err.Error(), tt.word) {
			t.Errorf("%s with %s %q: error is %v, want one with %q", tt.kind, tt.key, tt.bad, err, tt.word)
		}
	}
}

// No kind of this field is checked by one figure alone, for which a constant would do.
func TestBalanceKindsVary(t *testing.T) {
	wants := map[string]map[float64]bool{}
	for _, c := range checks.All() {
		if wants[c.Kind] == nil {
			wants[c.Kind] = map[float64]bool{}
		}
		wants[c.Kind][c.Want] = true
	}
	for _, kind := range []string{"gas_property", "gas_deviation", "nusselt_cavity", "nusselt_room", "radiative_conductance", "infrared_films",
		"pane_temperature", "pillar_conductance", "residual_gas_conductance", "vacuum_u", "saturation_pressure", "dew_point", "temperature_factor",
		"inside_surface", "condensing_humidity", "clear_sky", "asymmetry_dissatisfied", "draught_rating", "downdraught", "floor_cooling",
		"view_factor", "radiant_asymmetry", "sun_on_person", "thermal_stress", "stress_guide"} {
		if len(wants[kind]) < 2 {
			t.Errorf("kind %s has %d figures; a constant would do", kind, len(wants[kind]))
		}
	}
}
