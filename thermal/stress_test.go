package thermal

import (
	"math"
	"testing"
)

// The words at the edges of their ranges: from 0.8 of the guide value to it a difference is near it.
func TestAgainstGuide(t *testing.T) {
	for _, tt := range []struct {
		treatment string
		drop      float64
		want      GuideWord
	}{
		{"annealed", -20, BelowGuide}, {"annealed", 0, BelowGuide}, {"annealed", 31.9, BelowGuide}, {"annealed", 32, NearGuide}, {"annealed", 32.1, NearGuide},
		{"annealed", 40, NearGuide}, {"annealed", 40.1, AboveGuide},
		{"unknown", 31.9, BelowGuide}, {"unknown", 40.1, AboveGuide}, {"", 40.1, AboveGuide},
		{"heat-strengthened", 79.9, BelowGuide}, {"heat-strengthened", 80.1, NearGuide}, {"heat-strengthened", 100.1, AboveGuide},
		{"toughened", 159.9, BelowGuide}, {"toughened", 160.1, NearGuide}, {"toughened", 200, NearGuide}, {"toughened", 200.1, AboveGuide},
		{"annealed", math.NaN(), AboveGuide}, {"annealed", math.Inf(1), AboveGuide},
	} {
		if got := AgainstGuide(tt.drop, StressGuideK(tt.treatment)); got != tt.want {
			t.Errorf("%s, %g K: %s, want %s (EN 572-1, EN 1863-1, EN 12150-1, from memory; near from 0.8 on)", tt.treatment, tt.drop, got, tt.want)
		}
	}
}

// By hand: 70 GPa · 9e-6/K = 0.63 MPa/K, in proportion to factor and difference.
func TestThermalStress(t *testing.T) {
	near(t, "stress", ThermalStressMPa(1, 1), 0.63, 1e-12, "EN 572-1, by hand")
	near(t, "stress", ThermalStressMPa(0.5, -10), -3.15, 1e-12, "EN 572-1, by hand")
}
