package thermal_test

// A second evaluation of ISO 15099:2003, written apart from the first: gases, correlations of
// gaps and of the room. It shares constants and the gas table with the first, nothing else.

import (
	"math"
	"testing"

	"panewright/reference"
	"panewright/thermal"
)

// secondBlend holds the mole fractions of the gases of the table, in its order.
type secondBlend [4]float64

// secondTable is the gas table of ISO 15099, by row.
type secondTable struct {
	mass, ka, kb, ma, mb, ca, cb []float64
}

var secondGases = func() secondTable {
	t := reference.GasesISO15099()
	return secondTable{
		t.Column("molar_mass"), t.Column("conductivity_a"), t.Column("conductivity_b"),
		t.Column("viscosity_a"), t.Column("viscosity_b"), t.Column("heat_capacity_a"), t.Column("heat_capacity_b"),
	}
}()

// secondWilke is the weight of gas j beside gas i: (1 + (a_i/a_j)^½ (m)^¼)² / (2√2 (1 + Mi/Mj)^½).
func secondWilke(ratio, quarter, massRatio float64) float64 {
	return math.Pow(1+math.Sqrt(ratio)*math.Pow(quarter, 0.25), 2) / math.Sqrt(8*(1+massRatio))
}

// properties returns λ in W/(m·K), µ in Pa·s, cp in J/(kg·K) and ρ in kg/m³ at a temperature in K,
// by the sums of ISO 15099:2003, annex B (from memory), without any short cut.
func (x secondBlend) properties(t float64) (conductivity, viscosity, capacity, density float64) {
	g := &secondGases
	var mu, inner, outer [4]float64 // µ, λ′, λ″
	var mass, molar float64
	for i, xi := range x {
		mu[i] = g.ma[i] + g.mb[i]*t
		inner[i] = 15 * thermal.GasConstant / (4 * g.mass[i]) * mu[i]
		outer[i] = g.ka[i] + g.kb[i]*t - inner[i]
		mass += xi * g.mass[i]
		molar += xi * (g.ca[i] + g.cb[i]*t) * g.mass[i] // per mole
	}
	for i, xi := range x {
		if xi == 0 {
			continue
		}
		sumMu, sumInner, sumOuter := xi, xi, xi
		for j, xj := range x {
			if j == i || xj == 0 {
				continue
			}
			mi, mj := g.mass[i], g.mass[j]
			sumMu += xj * secondWilke(mu[i]/mu[j], mj/mi, mi/mj)
			phi := secondWilke(inner[i]/inner[j], mi/mj, mi/mj)
			sumOuter += xj * phi
			sumInner += xj * phi * (1 + 2.41*(mi-mj)*(mi-0.142*mj)/math.Pow(mi+mj, 2))
		}
		viscosity += xi * mu[i] / sumMu
		conductivity += xi*inner[i]/sumInner + xi*outer[i]/sumOuter
	}
	return conductivity, viscosity, molar / mass, thermal.Pressure * mass / (thermal.GasConstant * t)
}

// rayleigh returns λ and Ra over a length in m.
func (x secondBlend) rayleigh(length, drop, mean float64) (conductivity, ra float64) {
	k, mu, cp, rho := x.properties(mean)
	expansion, diffusivity, kinematic := 1/mean, k/(rho*cp), mu/rho
	return k, thermal.Gravity * expansion * math.Abs(drop) * math.Pow(length, 3) / (diffusivity * kinematic)
}

// secondVertical is Nu of a vertical gap of aspect ratio a, height over width (Wright 1996, as in
// ISO 15099, from memory).
func secondVertical(ra, a float64) float64 {
	var first float64
	switch {
	case ra <= 1e4:
		first = 1 + 1.7596678e-10*math.Pow(ra, 2.2984755)
	case ra <= 5e4:
		first = 0.028154 * math.Pow(ra, 0.4134)
	default:
		first = 0.0673838 * math.Cbrt(ra)
	}
	return math.Max(first, 0.242*math.Pow(ra/a, 0.272))
}

// secondSixty is Nu at 60° (ElSherbiny and co-workers 1982, from memory).
func secondSixty(ra, a float64) float64 {
	g := 0.5 * math.Pow(1+math.Pow(ra/3160, 20.6), -0.1)
	first := math.Pow(1+math.Pow(0.0936*math.Pow(ra, 0.314)/(1+g), 7), 1.0/7)
	return math.Max(first, (0.104+0.175/a)*math.Pow(ra, 0.283))
}

// secondShallow is Nu below 60° (Hollands and co-workers 1976, from memory).
func secondShallow(ra, gamma float64) float64 {
	effective := ra * secondCos(gamma)
	nu := 1.0
	if effective > 1708 {
		nu += 1.44 * (1 - 1708/effective) * (1 - 1708*math.Pow(secondSin(1.8*gamma), 1.6)/effective)
	}
	if effective > 5830 {
		nu += math.Cbrt(effective/5830) - 1
	}
	return nu
}

func secondSin(deg float64) float64 { return math.Sin(deg * math.Pi / 180) }
func secondCos(deg float64) float64 { return math.Cos(deg * math.Pi / 180) }

// secondNusselt is Nu of a gap whose warm face is below for γ < 90°, above for γ > 90°.
func secondNusselt(ra, a, gamma float64) float64 {
	switch {
	case gamma < 60:
		return secondShallow(ra, gamma)
	case gamma <= 90:
		w := (gamma - 60) / 30
		return (1-w)*secondSixty(ra, a) + w*secondVertical(ra, a)
	}
	return 1 + (secondVertical(ra, a)-1)*secondSin(gamma)
}

// secondRoomNusselt is Nu of the room side over the height of the glazing.
func secondRoomNusselt(ra, gamma float64) float64 {
	sin := secondSin(gamma)
	switch {
	case gamma < 15:
		return 0.13 * math.Cbrt(ra)
	case gamma <= 90:
		critical := 2.5e5 * math.Pow(math.Exp(0.72*gamma)/sin, 0.2)
		if ra <= critical {
			return 0.56 * math.Pow(ra*sin, 0.25)
		}
		return 0.13*(math.Cbrt(ra)-math.Cbrt(critical)) + 0.56*math.Pow(critical*sin, 0.25)
	case gamma <= 179:
		return 0.56 * math.Pow(ra*sin, 0.25)
	}
	return 0.58 * math.Pow(ra, 0.2)
}

// secondAngle turns the tilt round where the warm side is not the inner one.
func secondAngle(tilt float64, innerWarmer bool) float64 {
	if innerWarmer {
		return tilt
	}
	return 180 - tilt
}

// secondRoomConvection is natural convection from the innermost face at ts to the air at ta, in W/m².
func secondRoomConvection(ts, ta, height, tilt float64) float64 {
	k, ra := secondBlend{1}.rayleigh(height, ts-ta, ta+(ts-ta)/4)
	return k / height * secondRoomNusselt(ra, secondAngle(tilt, ts < ta)) * (ts - ta)
}

// Published figures that the second evaluation must meet before it may judge the first.
func TestSecondCorrelationsPublished(t *testing.T) {
	for _, tt := range []struct {
		what           string
		got, want, tol float64
		source         string
	}{
		{"Nu, vertical, Ra 7000, H/s 60", secondNusselt(7000, 60, 90), 1.12114, 0.0005, "Wright 1996 as in ISO 15099, from memory"},
		{"Nu, vertical, Ra 100000, H/s 40", secondNusselt(1e5, 40, 90), 3.12768, 0.0005, "Wright 1996 as in ISO 15099, from memory"},
		{"Nu, 30°, Ra 7000", secondNusselt(7000, 40, 30), 1.83978, 0.0005, "Hollands et al. 1976, from memory"},
		// By hand: (0.9·521.9285·39.948 + 0.1·1006.2247·28.97)/38.8502. Weighed without molar masses it would be 570.36.
		{"cp of argon 90 / air 10 at 283 K", secondCapacity(secondBlend{0.1, 0.9}, 283), 558.04, 0.01, "ISO 15099 annex B, from memory; by hand"},
	} {
		if math.Abs(tt.got-tt.want) > tt.tol {
			t.Errorf("%s = %.7g, want %.7g (%s)", tt.what, tt.got, tt.want, tt.source)
		}
	}
}

func secondCapacity(x secondBlend, t float64) float64 { _, _, c, _ := x.properties(t); return c }

// A mixture of a gas with itself is that gas; one of like gases lies between them.
func TestSecondMixtureLimits(t *testing.T) {
	if g := secondWilke(1, 1, 1); math.Abs(g-1) > 1e-15 {
		t.Errorf("a gas beside itself weighs %g, want 1", g)
	}
	k := func(x secondBlend) float64 { k, _, _, _ := x.properties(283); return k }
	last := k(secondBlend{0, 1})
	for i := 1; i <= 20; i++ {
		f := float64(i) / 20
		next := k(secondBlend{f, 1 - f})
		if next <= last {
			t.Errorf("λ falls from %g to %g where air displaces argon (%g)", last, next, f)
		}
		last = next
	}
}
