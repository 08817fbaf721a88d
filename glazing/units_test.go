package glazing

import (
	"math"
	"slices"
	"strings"
	"testing"
)

// The factors are those of the tables of NIST SP 811 (2008), appendix B.8, from memory, which give
// the SI unit of one inch-pound unit.
func TestInchPoundFactors(t *testing.T) {
	for _, tt := range []struct {
		unit     string
		perUnit  float64 // SI units in one inch-pound unit
		halfStep float64 // half of the last printed digit; 0 for an exact factor
	}{
		{"W/(m²·K)", 5.678263, 0.5e-6}, // of 1 Btu_IT/(h·ft²·°F)
		{"kg/m²", 4.882428, 0.5e-6},    // of 1 lb/ft²
		{"mm", 25.4, 0},                // of 1 in
		{"K", 5.0 / 9, 0},              // of 1 °F, a difference
		{"°C", 5.0 / 9, 0},             // of 1 °F, where 0 °C is 32 °F
		{"W/m²", 3.154591, 0.5e-6},     // of 1 Btu_IT/(h·ft²)
		{"m/s", 0.00508, 0},            // of 1 ft/min
		{"MPa", 6.894757e-3, 0.5e-9},   // of 1 psi
	} {
		at := slices.IndexFunc(inchPounds, func(u inchPound) bool { return u.si == tt.unit })
		if at < 0 {
			t.Fatalf("no row of %s", tt.unit)
		}
		if got := 1 / inchPounds[at].factor; math.Abs(got-tt.perUnit) > tt.halfStep+1e-15 {
			t.Errorf("1 %s is %.9g %s, want %.9g (NIST SP 811)", inchPounds[at].ip, got, tt.unit, tt.perUnit)
		}
	}
	// 1 Btu_IT is 1055.055 852 62 J (NIST SP 811, from memory).
	if math.Abs(btuJ-1055.05585262) > 1e-9 {
		t.Errorf("1 Btu is %.12g J", float64(btuJ))
	}
}

// Every unit of the list of figures is converted, or is the same in both systems.
func TestEveryUnitHasInchPound(t *testing.T) {
	same := []string{"", "°", "%"} // fractions, indices, L*a*b*, angles
	all := Figures()
	for _, id := range []string{"summer", "the_k"} { // the end of an id is no unit
		for _, f := range BalanceFigures() {
			all = append(all, f.At(id))
		}
	}
	ip := InchPound(all)
	var keys []string
	for i, f := range all {
		known := slices.ContainsFunc(inchPounds, func(u inchPound) bool { return u.si == f.Unit })
		if !known && !slices.Contains(same, f.Unit) {
			t.Errorf("%s: the unit %q has no row in the table of inch-pound units", f.Key, f.Unit)
		}
		if known == (ip[i].Key == f.Key) {
			t.Errorf("%s in %s is called %s in %s", f.Key, f.Unit, ip[i].Key, ip[i].Unit)
		}
		for _, u := range inchPounds {
			for part := range strings.SplitSeq(strings.TrimPrefix(ip[i].Key, "balances.the_k."), ".") {
				if strings.HasSuffix(part, u.siKey) {
					t.Errorf("%s still names an SI unit", ip[i].Key)
				}
			}
		}
		if slices.Contains(keys, ip[i].Key) {
			t.Errorf("two figures are called %s", ip[i].Key)
		}
		keys = append(keys, ip[i].Key)
		alias := f.Alias
		if f.Condition != "" {
			alias += "@" + f.Condition
		}
		if !ip[i].Named(alias) && f.Alias != "" {
			t.Errorf("%s is not known as %s", ip[i].Key, f.Alias)
		}
	}
	for _, key := range []string{"u_btu_h_ft2_f", "thickness_in", "mass_lb_ft2", "solar.conductances_btu_h_ft2_f.#",
		"gaps.#.temperature_drop_f", "balances.the_k.surface_temperatures_f.#", "balances.the_k.gaps.#.temperature_drop_f",
		"balances.summer.inward_flux_btu_h_ft2", "balances.summer.comfort.downdraught_ft_min", "thermal_stress.#.stress_psi", "outside.coefficient_btu_h_ft2_f", "light.transmittance"} {
		if !slices.Contains(keys, key) {
			t.Errorf("no figure is called %s", key)
		}
	}
}

func TestInchPoundValues(t *testing.T) {
	m := &Makeup{ID: "m", Gaps: []Gap{gap(t, 12.7, map[string]float64{"air": 1})},
		Panes: []Placed{{Pane: pane("a", flat(300, 2500, 0.7, 0.1, 0.2), 0.837, 0.837)}, {Pane: pane("b", flat(300, 2500, 0.6, 0.15, 0.3), 0.837, 0.837)}}}
	r := rateOne(t, m, EN, Options{})
	list := InchPound(Figures())
	figure := func(alias string) Figure {
		return list[slices.IndexFunc(list, func(f Figure) bool { return f.Named(alias) })]
	}
	// By hand: 20.7 mm and 20 kg/m² by the factors of NIST SP 811; half of the last digit.
	for _, tt := range []struct {
		alias   string
		want    float64
		printed string
	}{
		{"thickness", 20.7 / 25.4, "0.815"},
		{"mass", 20 / 4.882428, "4.10"},
		{"u", r.U.Number / 5.678263, ""},
		{"he", 25 / 5.678263, "4.40"},
		{"drop", float64(r.Gaps[0].Drop) * 1.8, "27.00"}, // EN 673 takes 15 K
		{"light", r.Light.Transmittance.Number, "0.43"},
	} {
		f := figure(tt.alias)
		near(t, tt.alias, f.Value(r, 0), tt.want, 1e-6*tt.want)
		if got := f.Print(r, 0); tt.printed != "" && got != tt.printed {
			t.Errorf("%s is printed as %s %s, want %s", tt.alias, got, f.Unit, tt.printed)
		}
	}
	// Of a balance: at 10 °C throughout, 50 °F (exact), nothing flows.
	still := rateOne(t, m, EN, Options{Conditions: []Condition{{ID: "still", OutsideC: 10, InsideC: 10}}})
	for _, f := range InchPound(ConditionFigures([]Rating{*still})) {
		for alias, want := range map[string]string{"temperature@still": "50.0 °F", "hottest@still": "50.0 °F", "inward_flux@still": "0.00 Btu/(h·ft²)",
			"drop@still": "0.00 °F (difference)", "downdraught@still": "0 ft/min"} {
			if got := f.Print(still, 0) + " " + f.Unit; f.Named(alias) && got != want {
				t.Errorf("%s is printed as %s, want %s", alias, got, want)
			}
		}
	}
	// U has two decimals under every basis.
	if u := figure("u"); u.Decimals(r, r.U.Number) != 2 || u.Unit != "Btu/(h·ft²·°F)" {
		t.Errorf("U in %s has %d decimals", u.Unit, u.Decimals(r, r.U.Number))
	}
	// What is not known stays so, with its reason.
	na := rateOne(t, &Makeup{ID: "x", Panes: []Placed{{Pane: &Pane{ID: "p", Plies: m.Panes[0].Pane.Plies,
		Tints: []Tint{{Spectrum: flat(300, 2500, 0.7, 0.1, 0.1), Front: NoEmissivity(), Back: NoEmissivity()}}}}}}, EN, Options{})
	if v := figure("u").Value(na, 0); v.Known || v.Why == "" {
		t.Errorf("an unknown U becomes %+v", v)
	}
	if got, want := m.BuildUpInches(), "a\u00a0| 0.5\u00a0in\u00a0air\u00a0| b"; got != want {
		t.Errorf("build-up %q, want %q", got, want)
	}
	if got, want := m.BuildUp(), "a\u00a0| 12.7\u00a0mm\u00a0air\u00a0| b"; got != want {
		t.Errorf("build-up %q, want %q", got, want)
	}
}

// The sixteenths of an inch that gaps come in are told apart.
func TestInches(t *testing.T) {
	for mm, want := range map[float64]string{6.35: "0.25 in", 12.7: "0.5 in", 11.1125: "0.438 in", 25.4: "1 in", 16: "0.63 in", 254: "10 in", 0.2: "0.008 in"} {
		if got := inches(mm); got != want {
			t.Errorf("%g mm is %s, want %s", mm, got, want)
		}
	}
}

// -40 is one temperature on both scales, and water freezes at 32 °F (NIST SP 811, B.9, from memory); a mile
// is 1609.344 m.
func TestToInchPound(t *testing.T) {
	for _, tt := range []struct {
		v, want  float64
		si, unit string
	}{
		{-40, -40, "°C", "°F"}, {0, 32, "°C", "°F"}, {100, 212, "°C", "°F"}, {20, 36, "K", "°F (difference)"}, {0.0508, 10, "m/s", "ft/min"}, {45, 45, "°", "°"},
	} {
		if got, unit := ToInchPound(tt.v, tt.si); math.Abs(got-tt.want) > 1e-12 || unit != tt.unit {
			t.Errorf("%g %s is %g %s, want %g %s", tt.v, tt.si, got, unit, tt.want, tt.unit)
		}
	}
	if got := MilesPerHour(1609.344 / 3600); math.Abs(got-1) > 1e-15 {
		t.Errorf("a mile in an hour is %.17g mph", got)
	}
	for unit, want := range map[string]string{"°C": "K", "°F": "°F (difference)", "W/m²": "W/m²", "": ""} {
		if got := DifferenceUnit(unit); got != want {
			t.Errorf("a difference in %s is one in %s, want %s", unit, got, want)
		}
	}
}
