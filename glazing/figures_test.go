package glazing

import "testing"

// A figure is named by its short name, its key, and its symbol as headings show it; the number of a
// pane, gap or surface stands in the key or after the symbol.
func TestNamesOfFigures(t *testing.T) {
	for _, tt := range []struct {
		name, key string
		place     int
	}{
		{"light", "light.transmittance", 0}, {"τv", "light.transmittance", 0}, {"light.transmittance", "light.transmittance", 0},
		{"Ug", "u_w_m2k", 0}, {"ρv′", "light.reflectance_inside", 0}, {"τdf,700", "uv.damage_weighted_700", 0},
		{"L*τ", "colour.transmitted.l", 0}, {"b*ρ′,10", "colour.reflected_inside_10deg.b", 0},
		{"αe", "solar.absorptance.#", 0}, {"αe1", "solar.absorptance.#", 1}, {"solar.absorptance.12", "solar.absorptance.#", 12},
		{"ε3", "surfaces.#.emissivity", 3}, {"εn3", "surfaces.#.emissivity_normal", 3}, {"surfaces.#.emissivity", "surfaces.#.emissivity", 0},
		{"hs2", "gaps.#.conductance_w_m2k", 2}, {"Gr·Pr1", "gaps.#.rayleigh", 1},
		{"", "", 0}, {"tv", "", 0}, {"τv1", "", 0}, {"g1", "", 0}, {"ε0", "", 0}, {"ε-1", "", 0}, {"ε3a", "", 0}, {"L*", "", 0}, {"ug", "", 0},
		{"surfaces.0.emissivity", "", 0}, {"surfaces.x.emissivity", "", 0}, {"surfaces.1", "", 0},
	} {
		f, place, ok := FigureNamed(tt.name)
		if f.Key != tt.key || place != tt.place || ok != (tt.key != "") {
			t.Errorf("%q names %q, place %d (%t), want %q, %d", tt.name, f.Key, place, ok, tt.key, tt.place)
		}
	}
	// No name is that of two figures.
	for _, f := range Figures() {
		for _, name := range []string{f.Alias, f.Symbol + f.Mark, f.Key, f.KeyAt(2)} {
			if got, _, ok := FigureNamed(name); name != "" && (!ok || got.Key != f.Key) {
				t.Errorf("%q of %s names %s", name, f.Key, got.Key)
			}
		}
	}
}
