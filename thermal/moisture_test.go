package thermal

import (
	"fmt"
	"math"
	"math/rand/v2"
	"strings"
	"testing"
)

// near fails if a figure is off by more than a tolerance.
func near(t *testing.T, name string, got, want, tolerance float64, source string) {
	t.Helper()
	if !(math.Abs(got-want) <= tolerance) {
		t.Errorf("%s: got %.9g, want %.9g ± %.2g (%s)", name, got, want, tolerance, source)
	}
}

// Air cooled to its dew point is saturated, whether with dew or frost; a surface as cold as that begins
// to condense at the humidity that the air has.
func TestDewPointIsSaturated(t *testing.T) {
	r := rand.New(rand.NewPCG(3, 5))
	frosts := 0
	for range 1000 {
		air, humidity := 233.15+90*r.Float64(), 0.02+0.98*r.Float64()
		dew, frost, err := DewPoint(air, humidity)
		if err != nil {
			t.Fatal(err)
		}
		if dew > air+1e-9 || frost != (dew < ZeroCelsius) {
			t.Errorf("air of %g K and %g: dew point %g K, frost %v", air, humidity, dew, frost)
		}
		near(t, "pressure at the dew point", SaturationPressure(dew), humidity*SaturationPressure(air), 1e-9*SaturationPressure(air), "definition")
		near(t, "humidity of condensation", CondensingHumidity(dew, air), humidity, 1e-12, "definition")
		if frost {
			frosts++
		}
	}
	if frosts < 100 || frosts > 900 {
		t.Errorf("frost in %d of 1000 cases: the test looks at one side alone", frosts)
	}
	if p := SaturationPressure(ZeroCelsius); math.Abs(p-SaturationPressure(ZeroCelsius-1e-9)) > 1e-6 || p != 610.5 {
		t.Errorf("%g Pa at 0 °C, want 610.5 on both sides (EN ISO 13788, from memory)", p)
	}
	if h := CondensingHumidity(295, 293); h <= 1 {
		t.Errorf("a surface warmer than the air condenses at %g, want above 1: never", h)
	}
}

func TestDewPointRefuses(t *testing.T) {
	for _, humidity := range []float64{0, -0.1, 1.005, math.NaN(), math.Inf(1)} {
		if _, _, err := DewPoint(293.15, humidity); err == nil || !strings.Contains(err.Error(), "relative humidity") {
			t.Errorf("humidity %g: error is %v", humidity, err)
		}
	}
	if dew, _, err := DewPoint(293.15, 1); err != nil || math.Abs(dew-293.15) > 1e-9 {
		t.Errorf("saturated air: dew point %g K, error %v", dew, err)
	}
}

func TestTemperatureFactors(t *testing.T) {
	r := rand.New(rand.NewPCG(7, 11))
	for range 1000 {
		f, outside, inside := r.Float64(), 253+20*r.Float64(), 288+10*r.Float64()
		near(t, "factor of the temperature of a factor", TemperatureFactor(FactorTemperature(f, outside, inside), outside, inside), f, 1e-12, "definition")
	}
	if f := TemperatureFactor(290, 293, 293); !math.IsNaN(f) {
		t.Errorf("temperature factor without a difference of airs is %g", f)
	}
	// By hand: 1 − 1.1·0.13; 1 − (1.1 + 0.08/0.05)·0.13; 1 − (1.1 + 0.04/0.05)·0.13; 1 − (0.6 + 0.03/0.1)·0.25.
	near(t, "centre", TemperatureFactorOfU(1.1, InsideResistanceM2KW), 0.857, 1e-12, "by hand")
	near(t, "edge, ψ 0.08", EdgeFactor(1.1, 0.08, EdgeBandM, InsideResistanceM2KW), 0.649, 1e-12, "by hand")
	near(t, "edge, ψ 0.04", EdgeFactor(1.1, 0.04, EdgeBandM, InsideResistanceM2KW), 0.753, 1e-12, "by hand")
	near(t, "edge, other band and resistance", EdgeFactor(0.6, 0.03, 0.1, 0.25), 0.775, 1e-12, "by hand")
	near(t, "edge without extra heat", EdgeFactor(1.1, 0, EdgeBandM, InsideResistanceM2KW), 0.857, 1e-12, "by hand")
}

// The clear sky radiates 5.31e-13 T⁶ W/m² (Swinbank 1963, from memory), which is his other formula for
// the same measurements.
func TestClearSky(t *testing.T) {
	for _, air := range []float64{263.15, 273.15, 283.15, 293.15, 303.15} {
		sky := ClearSky(air)
		if sky >= air {
			t.Errorf("sky of %g K over air of %g K", sky, air)
		}
		got, want := StefanBoltzmann*math.Pow(sky, 4), 5.31e-13*math.Pow(air, 6)
		near(t, fmt.Sprintf("flux of the sky at %g K", air), got, want, 0.01*want, "Swinbank 1963, from memory")
	}
}

func ExampleDewPoint() {
	// A usual room; tables of the trade give 9.3 °C.
	dew, frost, err := DewPoint(ZeroCelsius+20, 0.5)
	fmt.Printf("%.1f °C, frost %v, %v\n", dew-ZeroCelsius, frost, err)
	// Output: 9.3 °C, frost false, <nil>
}
