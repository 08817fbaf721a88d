package glazing

import (
	"math"
	"testing"
)

func TestLimitInWords(t *testing.T) {
	bound := func(v float64) Value { return Value{Number: v, Known: !math.IsNaN(v)} }
	none := math.NaN()
	for _, tt := range []struct {
		figure                 string
		atLeast, atMost        float64
		change                 func(l *Limit)
		key, text, terms, from string
	}{
		{"u", none, 1.2, func(*Limit) {}, "u_w_m2k", "Ug at most 1.2 W/(m²·K)", "all make-ups; each tint", "typed by the user; source: none given; date: none given"},
		{"u_w_m2k", none, 1.25, func(l *Limit) {
			l.Scope, l.Basis, l.Tint, l.Makeups = CentreScope, "en", "worst", []string{"A1", "B2"}
			l.Source, l.Date, l.TypedBy, l.From = "Brief, clause 4", "2026-01-31", "M. Example", "p.yaml:12"
		}, "u_w_m2k", "Ug at most 1.25 W/(m²·K)", "A1, B2; the worst tint; basis en; centre of the glass",
			"typed by the user (M. Example) in p.yaml:12; source: Brief, clause 4; date: 2026-01-31"},
		{"light", 0.6, 0.8, func(l *Limit) { l.Tint, l.Condition, l.Scope = "clear", "january", WindowScope }, "light.transmittance", "τv at least 0.6 and at most 0.8",
			"all make-ups; tint clear; whole window; condition january", "typed by the user; source: none given; date: none given"},
		{"surfaces.3.emissivity", none, 0.05, func(l *Limit) { l.Tint = "each" }, "surfaces.3.emissivity", "ε3 at most 0.05", "all make-ups; each tint", "typed by the user; source: none given; date: none given"},
		{"absorptance", none, 0.5, func(*Limit) {}, "solar.absorptance.#", "αe at most 0.5", "all make-ups; each tint", "typed by the user; source: none given; date: none given"},
		{"b_outside", -10, none, func(*Limit) {}, "colour.reflected_outside.b", "b*ρ at least -10", "all make-ups; each tint", "typed by the user; source: none given; date: none given"},
	} {
		f, place, ok := FigureNamed(tt.figure)
		if !ok {
			t.Fatalf("no figure %s", tt.figure)
		}
		l := Limit{Figure: f, Place: place, AtLeast: bound(tt.atLeast), AtMost: bound(tt.atMost)}
		tt.change(&l)
		for _, x := range [][2]string{{l.Key(), tt.key}, {l.String(), tt.text}, {l.Terms(), tt.terms}, {l.Origin(), tt.from}} {
			if x[0] != x[1] {
				t.Errorf("%s: %q, want %q", tt.figure, x[0], x[1])
			}
		}
	}
	l := Limit{Makeups: []string{"A"}}
	if !l.For("A") || l.For("B") || !(&Limit{}).For("B") {
		t.Error("a limit is for the make-ups that it names, or for all")
	}
}

func TestFigureNamed(t *testing.T) {
	for _, tt := range []struct {
		name, key string
		place     int
	}{
		{"u", "u_w_m2k", 0}, {"solar.g", "solar.g", 0}, {"emissivity", "surfaces.#.emissivity", 0}, {"surfaces.#.emissivity", "surfaces.#.emissivity", 0},
		{"surfaces.12.emissivity", "surfaces.#.emissivity", 12}, {"solar.absorptance.2", "solar.absorptance.#", 2}, {"uv.damage_weighted_700", "uv.damage_weighted_700", 0},
		{"transmitted10", "", 0}, {"surfaces.0.emissivity", "", 0}, {"surfaces.-1.emissivity", "", 0}, {"surfaces.99999999999999999999.emissivity", "", 0}, {"", "", 0}, {"solar", "solar.transmittance", 0},
	} {
		f, place, ok := FigureNamed(tt.name)
		if f.Key != tt.key || place != tt.place || ok != (tt.key != "") {
			t.Errorf("%q: %q at %d, %t; want %q at %d", tt.name, f.Key, place, ok, tt.key, tt.place)
		}
	}
	for _, name := range []string{"surfaces.1.source", "surfaces.1.number"} {
		if f, _, ok := FigureNamed(name); !ok || f.Limitable() {
			t.Errorf("%s: a limit can be set for it", name)
		}
	}
	for _, f := range Figures() {
		if f.Alias != "" && !f.Limitable() {
			t.Errorf("no limit can be set for %s", f.Alias)
		}
	}
}
