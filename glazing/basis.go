package glazing

// The bases: which standards stand together, and their coefficients.

import (
	"fmt"
	"strings"

	"panewright/spectra"
	"panewright/thermal"
)

// A Basis is a family of standards used together. To add one, add a variable below and name it in
// Bases.
type Basis struct {
	Name     string
	Editions string // as printed on every output
	light    func() spectra.Weighting
	solar    func() spectra.Weighting
	u, g     surfaces // of the U-value and of the secondary heat
	uPlaces  int      // decimals of a printed U-value
	rounding string   // the standard that rounds U so
	// conditions are those of a basis whose U and g come from detailed balances, winter and summer; nil
	// of the others.
	conditions func() []Condition
}

// surfaces are the coefficients of a basis: he, and hi = convection + radiation·ε/0.837, in
// W/(m²·K).
type surfaces struct {
	outside                           float64
	insideConvection, insideRadiation float64
}

// The bases.
var (
	EN = Basis{
		Name: "en", Editions: "EN 410:2011, EN 673:2011, EN 12898",
		light: spectra.LightEN410, solar: spectra.SolarEN410,
		u: surfaces{25, 3.6, 4.1}, g: surfaces{25, 3.6, 4.1}, uPlaces: 1, rounding: "EN 673",
	}
	ISO = Basis{
		Name: "iso", Editions: "ISO 9050:2003, ISO 10292, EN 12898",
		light: spectra.LightEN410, solar: spectra.SolarEN410,
		u: surfaces{23, 3.6, 4.4}, g: surfaces{23, 3.6, 4.4}, uPlaces: 1, rounding: "ISO 10292",
	}
	NA = Basis{
		Name: "na", Editions: "CIE D65 at 5 nm, ASTM G173-03 global tilt (column chosen by Panewright), UV, damage and skin by EN 410:2011, EN 12898, balance of ISO 15099:2003 under conditions of ANSI/NFRC 100 and 200",
		light: spectra.LightCIE, solar: spectra.SolarG173, uPlaces: 2, conditions: conditionsNA,
	}
	ISO15099 = Basis{
		Name: "iso15099", Editions: "ISO 9050:2003, EN 12898, balance of ISO 15099:2003 under its reference conditions",
		light: spectra.LightEN410, solar: spectra.SolarEN410, uPlaces: 2, conditions: conditionsISO15099,
	}
)

// Bases returns all bases.
func Bases() []Basis { return []Basis{EN, ISO, NA, ISO15099} }

// BasisNames returns the names of all bases.
func BasisNames() []string {
	var names []string
	for _, b := range Bases() {
		names = append(names, b.Name)
	}
	return names
}

// BasisNamed returns the basis of a name.
func BasisNamed(name string) (Basis, error) {
	for _, b := range Bases() {
		if b.Name == name {
			return b, nil
		}
	}
	return Basis{}, fmt.Errorf("unknown basis %q; known are %s", name, strings.Join(BasisNames(), ", "))
}

// inside returns hi for a room-side corrected emissivity.
func (s surfaces) inside(emissivity float64) float64 {
	return thermal.Inside(s.insideConvection, s.insideRadiation, emissivity)
}

// Balances reports whether U and g of the basis come from detailed heat balances.
func (b Basis) Balances() bool { return b.conditions != nil }
