package thermal

// Thermal stress: a screening, no design of the glass.

// The constants of soda-lime glass (EN 572-1, from memory).
const (
	GlassModulusMPa    = 70e3 // E, Young's modulus
	GlassExpansionPerK = 9e-6 // α, mean from 20 to 300 °C
)

// ThermalStressMPa returns σ = k E α ΔT: the tension in the colder edge of a pane whose centre is dropK
// warmer. k is 1 of an edge that is held in full, less for most shadows (EN 572-1 for E and α).
func ThermalStressMPa(k, dropK float64) float64 {
	return k * GlassModulusMPa * GlassExpansionPerK * dropK
}

// The guide values of the temperature difference within a pane, in K, from memory. For
// heat-strengthened glass a French table (NF P 78-201, amendment A1) says 140.
const (
	annealedGuideK         = 40.0  // with worked edges (EN 572-1)
	heatStrengthenedGuideK = 100.0 // EN 1863-1
	toughenedGuideK        = 200.0 // EN 12150-1
)

// StressGuideK returns the guide value of the temperature difference within a pane, in K, by its heat
// treatment: "annealed", "heat-strengthened" or "toughened". Any other, such as "unknown", is taken as
// annealed, which has the lowest. Edges that are not worked or are damaged bear less.
func StressGuideK(treatment string) float64 {
	switch treatment {
	case "toughened":
		return toughenedGuideK
	case "heat-strengthened":
		return heatStrengthenedGuideK
	}
	return annealedGuideK
}

// A GuideWord says how a temperature difference lies to the guide value. It is no verdict.
type GuideWord string

// The words.
const (
	BelowGuide GuideWord = "below"
	NearGuide  GuideWord = "near"
	AboveGuide GuideWord = "above"
)

// NearGuideFrom is the part of the guide value from which a difference is called near it: our own
// choice.
const NearGuideFrom = 0.8

// AgainstGuide returns the word for a temperature difference and a guide value, both in K. A difference
// that equals the guide value is near it; one that is no number is not called below.
func AgainstGuide(dropK, guideK float64) GuideWord {
	switch {
	case dropK < NearGuideFrom*guideK:
		return BelowGuide
	case dropK <= guideK:
		return NearGuide
	}
	return AboveGuide
}
