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
		if number := f.Value != nil && f.Alias != ""; number != f.Limitable() {
			t.Errorf("%s: that a limit can be set is %t", f.Key, !number)
		}
	}
	for _, f := range BalanceFigures() {
		if x := f.At(Winter); !x.Limitable() {
			t.Errorf("no limit can be set for %s", x.Key)
		}
	}
}

// Where a rating and a balance have a figure of one short name, it is the same quantity, so that a limit
// with a condition may be held against the balance's.
func TestNamesOfBalances(t *testing.T) {
	same := map[string]string{ // short name, and unit
		"u": "W/(m²·K)", "g": "", "qi": "", "gap_conductance": "W/(m²·K)", "gap_radiative": "W/(m²·K)", "gap_convective": "W/(m²·K)",
		"nusselt": "", "rayleigh": "", "drop": "K",
	}
	for _, f := range Figures() {
		for _, b := range BalanceFigures() {
			if f.Alias == "" || f.Alias != b.Alias {
				continue
			}
			unit, ok := same[f.Alias]
			if !ok || unit != f.Unit || unit != b.Unit || f.Per != b.Per {
				t.Errorf("%s is a figure of a rating in %q and of a balance in %q", f.Alias, f.Unit, b.Unit)
			}
			delete(same, f.Alias)
		}
	}
	if len(same) > 0 {
		t.Errorf("not both have %v", same)
	}
	for _, tt := range []struct {
		figure, condition, key string
		ok                     bool
	}{
		{"u", "", "u_w_m2k", true}, {"u", "a", "balances.a.u_w_m2k", true}, {"solar.g", "a", "balances.a.g", true},
		{"gaps.#.nusselt", "a.b", "balances.a.b.gaps.#.nusselt", true},
		{"light", "a", "light.transmittance", false}, {"he", "a", "outside.coefficient_w_m2k", false}, {"absorptance", "a", "solar.absorptance.#", false},
	} {
		f, _, _ := FigureNamed(tt.figure)
		l := Limit{Figure: f, Condition: tt.condition}
		if got, ok := l.Judged(); ok != tt.ok || got.Key != tt.key || l.Key() != tt.key {
			t.Errorf("%s under %q: %s, %t; want %s, %t", tt.figure, tt.condition, got.Key, ok, tt.key, tt.ok)
		}
	}
}
