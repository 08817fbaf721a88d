package colour

import (
	"math"
	"testing"
)

// The factors of the phases of daylight are those of Wyszecki and Stiles, Color Science, 1982 (from
// memory), for the nominal temperature times 1.4388/1.4380. They come from chromaticities rounded to
// four decimals, which moves M2 by up to 0.006. The chromaticities themselves stand in
// reference/checks.
func TestDaylight(t *testing.T) {
	for _, tt := range []struct {
		name    string
		nominal float64
		m1, m2  float64
	}{
		{"D50", 5000, -1.040, 0.367},
		{"D55", 5500, -0.786, -0.195},
		{"D65", 6500, -0.295, -0.689},
		{"D75", 7500, 0.144, -0.757},
	} {
		kelvin := tt.nominal * 1.4388 / 1.4380
		m1, m2 := daylightFactors(kelvin)
		if math.Abs(m1-tt.m1) > 0.002 || math.Abs(m2-tt.m2) > 0.006 {
			t.Errorf("%s: M1 %.4f, M2 %.4f, want %.3f, %.3f (Wyszecki and Stiles)", tt.name, m1, m2, tt.m1, tt.m2)
		}
		// A phase of daylight is its own reference, a black body below 5000 K likewise.
		if ra, found := Daylight(kelvin).Rendering(); math.Abs(ra-100) > 0.05 || math.Abs(found-kelvin) > 10 {
			t.Errorf("%s: Ra %.3f at %.1f K, want 100 at %.1f K", tt.name, ra, found, kelvin)
		}
	}
	for _, kelvin := range []float64{2856, 4000, 4990} {
		if ra, found := BlackBody(kelvin).Rendering(); math.Abs(ra-100) > 1e-3 || math.Abs(found-kelvin) > 0.1 {
			t.Errorf("black body: Ra %.4f at %.2f K, want 100 at %g K", ra, found, kelvin)
		}
	}
	// Just beyond 5000 K the reference is daylight already.
	if ra, found := Daylight(5030).Rendering(); math.Abs(ra-100) > 0.05 {
		t.Errorf("daylight of 5030 K: Ra %.3f at %.1f K, want 100", ra, found)
	}
}

// The steps of CIE 13.3-1995 (from memory), worked out by hand for one colour.
func TestSteps(t *testing.T) {
	white, p := UV{0.1978, 0.3122}, UV{0.2500, 0.3300}
	// W* = 25·∛30 − 17 = 60.680813; U* = 13·W*·0.0522, V* = 13·W*·0.0178.
	got := space(p, white, 30)
	for _, x := range []struct {
		name      string
		got, want float64
	}{
		{"W*", got.W, 60.680813}, {"U*", got.U, 41.177999}, {"V*", got.V, 14.041540},
	} {
		if math.Abs(x.got-x.want) > 2e-6 {
			t.Errorf("%s is %.6f, by hand %.6f", x.name, x.got, x.want)
		}
	}
	// u = 4 X/(X + 15 Y + 3 Z) = 380.18/1921.685, v = 6 Y/(X + 15 Y + 3 Z) = 600/1921.685.
	if d65 := (XYZ{95.045, 100, 108.88}).UV(); math.Abs(d65.U-0.1978368) > 1e-6 || math.Abs(d65.V-0.3122260) > 1e-6 {
		t.Errorf("D65 is u %.7f, v %.7f, by hand 0.1978368, 0.3122260", d65.U, d65.V)
	}
	// c = (4 − u − 10 v)/v = 0.45/0.33; d = (1.708 v + 0.404 − 1.481 u)/v = 0.59739/0.33.
	cd := p.CD()
	if math.Abs(cd.C-0.45/0.33) > 1e-12 || math.Abs(cd.D-0.59739/0.33) > 1e-12 {
		t.Errorf("c %.9f, d %.9f, by hand %.9f, %.9f", cd.C, cd.D, 0.45/0.33, 0.59739/0.33)
	}
}
