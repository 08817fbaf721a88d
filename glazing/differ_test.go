package glazing

import (
	"regexp"
	"slices"
	"strings"
	"testing"

	"panewright/spectra"
)

// Each pair of bases is told apart by what the bases stand on, as the standards print it: he 25 and 23
// (EN 673, ISO 10292), 283 K and 15 K (both), winter and summer of ANSI/NFRC 100 and of ISO 15099, the
// suns of EN 410 and ASTM G173. What two bases have in common is not said to differ.
func TestBasesDiffer(t *testing.T) {
	says := map[string][]string{ // of a basis, where it differs
		"en":       {"under en from fixed surface coefficients, he 25 and hi 3.6 + 4.1 ε/0.837 W/(m²·K)"},
		"iso":      {"under iso from fixed surface coefficients, he 23 and hi 3.6 + 4.4 ε/0.837 W/(m²·K)"},
		"na":       {"under na from heat balances, U at -18 °C with convection 26 W/(m²·K) outdoors, 21 °C with natural convection indoors; g at 32 °C with convection 15 W/(m²·K) outdoors, 24 °C with natural convection indoors, sun 783 W/m²"},
		"iso15099": {"U at 0 °C with convection 20 W/(m²·K) outdoors, 20 °C with convection 3.6 W/(m²·K) indoors; g at 30 °C with convection 8 W/(m²·K) outdoors, 25 °C with convection 2.5 W/(m²·K) indoors, sun 500 W/m²"},
	}
	plain := func(s string) string { return strings.ReplaceAll(s, "\u00a0", " ") }
	weights := []string{"The sun:", "ASTM G173", "EN 410:2011 table 2", "Light:", "CIE 15:2004", "EN 410:2011 table 1"}
	for _, a := range Bases() {
		for _, b := range Bases() {
			got := plain(BasesDiffer([]*Method{NewMethod(a, Options{}), NewMethod(b, Options{})}))
			if a.Name == b.Name {
				if got != "" {
					t.Errorf("%s differs from itself: %s", a.Name, got)
				}
				continue
			}
			for _, want := range slices.Concat(says[a.Name], says[b.Name]) {
				if !strings.Contains(got, want) {
					t.Errorf("%s and %s: %q lacks %q", a.Name, b.Name, got, want)
				}
			}
			if full := "gases at 283 K and 15 K over the gaps, which for g stand upright"; strings.Contains(got, full) != (a.Balances() != b.Balances()) {
				t.Errorf("%s and %s: %q, and what EN 673 takes is said or not", a.Name, b.Name, got)
			}
			for _, x := range weights {
				if apart := (a.Name == "na") != (b.Name == "na"); strings.Contains(got, x) != apart {
					t.Errorf("%s and %s: %q is said to differ is %t", a.Name, b.Name, x, !apart)
				}
			}
			for _, name := range []string{a.Name, b.Name} {
				if !regexp.MustCompile(`under ` + name + ` `).MatchString(got) {
					t.Errorf("%s and %s: %q does not name %s", a.Name, b.Name, got, name)
				}
			}
		}
	}
	// All four, of which two have one sun each with others.
	var all []*Method
	for _, b := range Bases() {
		all = append(all, NewMethod(b, Options{}), NewMethod(b, Options{}))
	}
	if got := BasesDiffer(all); !strings.Contains(got, "The sun: under en, iso and iso15099 that of EN 410:2011 table 2; under na that of ASTM G173-03 global tilt") || strings.Count(got, "under na") != 3 {
		t.Errorf("all four: %q", got)
	}
	// The project's own coefficients and sun.
	sun := &spectra.Weighting{Name: "solar", Source: "the site's sun", NM: []float64{300, 2500}, Weight: []float64{1, 1}}
	got := plain(BasesDiffer([]*Method{NewMethod(EN, Options{Sun: sun, InsideWM2K: 7.7}), NewMethod(NA, Options{Sun: sun})}))
	if strings.Contains(got, "The sun") || !strings.Contains(got, "he 25 and hi 7.7 W/(m²·K)") {
		t.Errorf("with the site's sun: %q", got)
	}
	if got := BasesDiffer([]*Method{NewMethod(EN, Options{OutsideWM2K: 24, InsideWM2K: 8}), NewMethod(ISO, Options{OutsideWM2K: 24, InsideWM2K: 8})}); got != "" {
		t.Errorf("of the same coefficients: %q", got)
	}
}
