package film_test

import (
	"math"
	"testing"

	"panewright/glazing/film"
)

// absorbedInBulk is one less what bulk of an index reflects at normal incidence.
func absorbedInBulk(n complex128) float64 {
	re, im := real(n), imag(n)
	return 4 * re / ((re+1)*(re+1) + im*im)
}

// The rule of Hagen and Rubens is what bulk comes to at ωτ far below 1.
func TestHagenRubensIsALimit(t *testing.T) {
	c := film.Carriers{DensityCM3: 8.47e22, MobilityCM2VS: 4, EffectiveMass: 1, EpsInf: 1}
	const nm = 1e6 // 1 mm; ωτ 0.004
	got, want := film.HagenRubensEmissivity(c.ResistivityOhmCM(), nm), absorbedInBulk(film.Oxide(c, nil, false).Index(nm))
	if math.Abs(got/want-1) > 0.01 {
		t.Errorf("%.6f, of bulk %.6f", got, want)
	}
}

// The emissivity of a thin sheet is what a thin film comes to at ωτ far below 1, before a space that
// reflects nothing.
func TestThinSheetIsALimit(t *testing.T) {
	c := film.Carriers{DensityCM3: 1e21, MobilityCM2VS: 2, EffectiveMass: 0.35, EpsInf: 3.9}
	const nm, thickness = 1e6, 100.0
	f := inAir(film.Oxide(c, nil, false), thickness, nm)
	if got := film.ThinSheetEmissivity(c.SheetResistance(thickness)); math.Abs(got/(1-f.R)-1) > 0.01 {
		t.Errorf("%.6f, of a film %.6f", got, 1-f.R)
	}
}

// Copper at 1 GHz: 2.06 µm to half a digit more (handbooks, from memory; ρ 1.68 µΩ·cm).
func TestSkinDepthOfCopper(t *testing.T) {
	c, err := film.Given{DensityCM3: 8.47e22, ResistivityOhmCM: 1.68e-6, EffectiveMass: 1, EpsInf: 1}.Carriers()
	if err != nil {
		t.Fatal(err)
	}
	const nm = 2.99792458e8
	if got := film.SkinDepthNM(imag(film.Oxide(c, nil, false).Index(nm)), nm); math.Abs(got-2060) > 10 {
		t.Errorf("%.1f nm", got)
	}
}

// Thick films and carriers that seldom scatter are warned of; thin films of slow carriers are not.
func TestScreeningDoubts(t *testing.T) {
	for _, x := range []struct {
		what      string
		c         film.Carriers
		nm        float64
		thick, wt bool
	}{
		{"60 nm of a good oxide", oxide, 60, false, true},
		{"the same of 1 µm", oxide, 1000, true, true},
		{"slow carriers, 100 nm", film.Carriers{DensityCM3: 1e21, MobilityCM2VS: 5, EffectiveMass: 0.35, EpsInf: 3.9}, 100, false, false},
		{"slow carriers, 2 µm", film.Carriers{DensityCM3: 1e21, MobilityCM2VS: 5, EffectiveMass: 0.35, EpsInf: 3.9}, 2000, true, false},
	} {
		s := x.c.Screening(x.nm)
		want := 0
		if x.thick {
			want++
		}
		if x.wt {
			want++
		}
		if thick := x.nm > s.SkinDepthNM; len(s.Doubts) != want || thick != x.thick || (s.OmegaTau > 0.3) != x.wt {
			t.Errorf("%s: skin depth %.0f nm, ωτ %.2f, %q", x.what, s.SkinDepthNM, s.OmegaTau, s.Doubts)
		}
	}
	for _, x := range []struct {
		omegaTau float64
		doubts   int
	}{{0.299, 0}, {0.301, 1}} { // either side of 0.3
		c := oxide
		c.MobilityCM2VS *= x.omegaTau / oxide.OmegaTau(10000)
		if s := c.Screening(10); len(s.Doubts) != x.doubts {
			t.Errorf("ωτ %g: %q", x.omegaTau, s.Doubts)
		}
	}
	// ωτ at 10 µm: 0.1239842 eV over ħγ 0.0826912 eV (both closed forms) is 1.49936.
	s := oxide.Screening(150)
	if math.Abs(s.OmegaTau-1.49936) > 1e-5 || math.Abs(s.SheetOhm-10.4025) > 5e-5 || math.Abs(s.LinearEmissivity-4*10.4025/376.7303) > 1e-6 ||
		s.ThinSheetEmissivity != film.ThinSheetEmissivity(s.SheetOhm) || s.RadioAttenuationDB != film.RadioAttenuationDB(s.SheetOhm) || s.HagenRubens != film.HagenRubensEmissivity(oxide.ResistivityOhmCM(), 10000) {
		t.Errorf("%+v", s)
	}
}
