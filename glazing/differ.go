package glazing

// Why figures under several bases differ.

import (
	"fmt"
	"slices"
	"strings"

	"panewright/thermal"
)

// BasesDiffer says why figures of methods of several bases differ, from what is true of these methods;
// "" where it finds nothing.
func BasesDiffer(methods []*Method) string {
	balances := slices.ContainsFunc(methods, func(m *Method) bool { return m.Basis.Balances() })
	var parts []string
	for _, x := range []struct {
		what string
		of   func(m *Method) string
	}{
		{"U and g", func(m *Method) string { return m.heatFrom(balances) }},
		{"The sun", func(m *Method) string { return sourceOf(m.bands[solar]) }},
		{"Light", func(m *Method) string { return sourceOf(m.bands[light]) }},
	} {
		var said []string // each once, with the bases it holds of
		of := map[string][]string{}
		for _, m := range methods {
			s := x.of(m)
			if !slices.Contains(said, s) {
				said = append(said, s)
			}
			if !slices.Contains(of[s], m.Basis.Name) {
				of[s] = append(of[s], m.Basis.Name)
			}
		}
		if len(said) < 2 {
			continue
		}
		for i, s := range said {
			said[i] = "under " + listed(of[s]) + " " + s
		}
		parts = append(parts, x.what+": "+strings.Join(said, "; ")+".")
	}
	if parts == nil {
		return ""
	}
	return "Why the bases differ. " + strings.Join(parts, " ")
}

// listed returns names as a sentence has them: "a", "a and b", "a, b and c".
func listed(names []string) string {
	if n := len(names) - 1; n > 0 {
		return strings.Join(names[:n], ", ") + " and " + names[n]
	}
	return strings.Join(names, "")
}

// sourceOf names the table of a weighting, in one of the standards that have it.
func sourceOf(b band) string {
	source, _, _ := strings.Cut(b.weighting.Source, " = ")
	return "that of " + source
}

// heatFrom says what U and g of the method stand on; in full where bases with balances stand beside it.
func (m *Method) heatFrom(full bool) string {
	if m.Basis.Balances() {
		return "from heat balances, U at " + m.condition(Winter) + "; g at " + m.condition(Summer)
	}
	s := "from fixed surface coefficients, " + m.coefficients(m.Basis.u)
	if m.Basis.u != m.Basis.g {
		s += ", for g " + m.coefficients(m.Basis.g)
	}
	if full {
		s += fmt.Sprintf(", gases at %g K and %g K over the gaps, which for g stand upright", thermal.MeanTemperature, thermal.TotalDrop)
	}
	return s
}

// coefficients returns those of one set of surfaces of a basis without conditions.
func (m *Method) coefficients(s surfaces) string {
	inside := fmt.Sprintf("hi\u00a0%.6g\u00a0+ %.6g\u00a0ε/0.837", s.insideConvection, s.insideRadiation)
	if m.Options.InsideWM2K > 0 {
		inside = fmt.Sprintf("hi\u00a0%.6g", m.Options.InsideWM2K)
	}
	return fmt.Sprintf("he\u00a0%.6g and %s\u00a0W/(m²·K)", m.outside(s), inside)
}

// condition says the condition of an id in words.
func (m *Method) condition(id string) string {
	return m.conditions[slices.IndexFunc(m.conditions, func(c Condition) bool { return c.ID == id })].inWords()
}
