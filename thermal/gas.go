package thermal

// The gases of EN 673 and their mixtures.

import (
	"fmt"
	"maps"
	"math"
	"slices"
	"strings"
	"sync"

	"panewright/reference"
)

// A Gas is a filling, or a mixture of fillings, with the properties that EN 673 calculates with,
// at its mean temperature of 283 K.
type Gas struct {
	Name             string
	DensityKGM3      float64
	ViscosityPaS     float64
	ConductivityWMK  float64
	HeatCapacityJKGK float64
}

var gases = sync.OnceValue(func() []Gas {
	t := reference.GasesEN673()
	density, viscosity := t.Column("density"), t.Column("viscosity")
	conductivity, capacity := t.Column("conductivity"), t.Column("heat_capacity")
	out := make([]Gas, len(t.Labels))
	for i, name := range t.Labels {
		out[i] = Gas{Name: name, DensityKGM3: density[i], ViscosityPaS: viscosity[i],
			ConductivityWMK: conductivity[i], HeatCapacityJKGK: capacity[i]}
	}
	return out
})

// Gases returns the gases of EN 673:2011 in the order of its table: air, argon, krypton, xenon
// and sf6 (sulphur hexafluoride).
func Gases() []Gas { return slices.Clone(gases()) }

// GasNames returns the names of the gases, in the same order.
func GasNames() []string {
	var names []string
	for _, g := range gases() {
		names = append(names, g.Name)
	}
	return names
}

// A Share is one gas of a mixture and its fraction by volume, which is its fraction by mole.
type Share struct {
	Gas      string
	Fraction float64
}

// A Mixture is a gas filling: its shares, in the order of the gas table, add to 1.
type Mixture []Share

// FractionTolerance is how far the fractions of a mixture may be from adding to 1.
const FractionTolerance = 1e-6

// Mix makes a mixture from fractions by volume. It is an error if a gas is unknown, a fraction
// is outside 0…1, or the fractions do not add to 1 within FractionTolerance.
func Mix(fractions map[string]float64) (Mixture, error) {
	var m Mixture
	var sum float64
	for _, g := range gases() {
		f, ok := fractions[g.Name]
		if !ok {
			continue
		}
		if !(f >= 0 && f <= 1) {
			return nil, fmt.Errorf("fraction of %s is %g; a fraction lies in 0..1", g.Name, f)
		}
		m = append(m, Share{g.Name, f})
		sum += f
	}
	if len(m) != len(fractions) {
		for _, name := range slices.Sorted(maps.Keys(fractions)) {
			if !slices.Contains(GasNames(), name) {
				return nil, fmt.Errorf("unknown gas %q; known are %s", name, strings.Join(GasNames(), ", "))
			}
		}
	}
	if math.Abs(sum-1) > FractionTolerance {
		return nil, fmt.Errorf("gas fractions add to %.9g; they must add to 1 within %.6f", sum, FractionTolerance)
	}
	return m, nil
}

// Properties returns the properties of the mixture, each linear in the fraction by volume
// (EN 673:2011, 6.2). A mixture that names a gas unknown to the table panics: Mix checks.
func (m Mixture) Properties() Gas {
	out := Gas{Name: m.String()}
	for _, s := range m {
		i := slices.IndexFunc(gases(), func(g Gas) bool { return g.Name == s.Gas })
		if i < 0 {
			panic("thermal: unknown gas " + s.Gas)
		}
		g := gases()[i]
		out.DensityKGM3 += float64(s.Fraction * g.DensityKGM3)
		out.ViscosityPaS += float64(s.Fraction * g.ViscosityPaS)
		out.ConductivityWMK += float64(s.Fraction * g.ConductivityWMK)
		out.HeatCapacityJKGK += float64(s.Fraction * g.HeatCapacityJKGK)
	}
	return out
}

// String returns the mixture as the trade writes it: "argon 90 / air 10", the largest share
// first, or the gas alone.
func (m Mixture) String() string {
	shares := slices.DeleteFunc(slices.Clone(m), func(s Share) bool { return s.Fraction == 0 })
	slices.SortStableFunc(shares, func(a, b Share) int {
		switch {
		case a.Fraction > b.Fraction:
			return -1
		case a.Fraction < b.Fraction:
			return 1
		}
		return 0
	})
	if len(shares) == 1 {
		return shares[0].Gas
	}
	var parts []string
	for _, s := range shares {
		parts = append(parts, fmt.Sprintf("%s %.6g", s.Gas, 100*s.Fraction))
	}
	return strings.Join(parts, " / ")
}
