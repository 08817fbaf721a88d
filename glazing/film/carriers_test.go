package film_test

import (
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"panewright/glazing/film"
	"panewright/spectra"
)

// The parameters of a good conducting oxide, typical.
var oxide = film.Carriers{DensityCM3: 1e21, MobilityCM2VS: 40, EffectiveMass: 0.35, EpsInf: 3.9}

// The screened plasma wavelength is where the real part of ε changes its sign; carriers that scatter too often have
// none.
func TestScreenedPlasma(t *testing.T) {
	nm, ok := oxide.ScreenedPlasmaNM()
	eps := film.Oxide(oxide, nil, false).Epsilon(film.PhotonEV(nm))
	if !ok || math.Abs(real(eps)) > 1e-12 || imag(eps) <= 0 {
		t.Errorf("at %.3f nm ε = %g", nm, eps)
	}
	if u := oxide.UndampedPlasmaNM(); !(u < nm) {
		t.Errorf("without damping %.3f nm, with it %.3f", u, nm)
	}
	slow := oxide
	slow.MobilityCM2VS = 2 // ħγ 1.65 eV against 1.01 eV
	if nm, ok := slow.ScreenedPlasmaNM(); ok || nm != 0 {
		t.Errorf("carriers with a mobility of 2 have %g nm", nm)
	}
}

// Any two figures give the rest back.
func TestGivenCarriers(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		c := film.Carriers{DensityCM3: math.Pow(10, rapid.Float64Range(18, 23).Draw(t, "log N")), MobilityCM2VS: rapid.Float64Range(1, 200).Draw(t, "µ"),
			EffectiveMass: rapid.Float64Range(0.1, 2).Draw(t, "m"), EpsInf: rapid.Float64Range(1, 8).Draw(t, "ε"), Persistence: rapid.SampledFrom([]float64{0, -0.6}).Draw(t, "c")}
		d := rapid.Float64Range(5, 1000).Draw(t, "d")
		bare := film.Given{EffectiveMass: c.EffectiveMass, EpsInf: c.EpsInf, Persistence: c.Persistence}
		rho, sheet := c.ResistivityOhmCM(), c.SheetResistance(d)
		for i, add := range []func(*film.Given){
			func(g *film.Given) { g.DensityCM3, g.MobilityCM2VS = c.DensityCM3, c.MobilityCM2VS },
			func(g *film.Given) { g.DensityCM3, g.ResistivityOhmCM = c.DensityCM3, rho },
			func(g *film.Given) { g.MobilityCM2VS, g.ResistivityOhmCM = c.MobilityCM2VS, rho },
			func(g *film.Given) { g.DensityCM3, g.SheetResistanceOhm, g.ThicknessNM = c.DensityCM3, sheet, d },
			func(g *film.Given) { g.MobilityCM2VS, g.SheetResistanceOhm, g.ThicknessNM = c.MobilityCM2VS, sheet, d },
			func(g *film.Given) {
				*g = film.Given{DensityCM3: c.DensityCM3, MobilityCM2VS: c.MobilityCM2VS, ResistivityOhmCM: 1.01 * rho,
					SheetResistanceOhm: sheet, ThicknessNM: d, EffectiveMass: c.EffectiveMass, EpsInf: c.EpsInf, Persistence: c.Persistence}
			},
		} {
			g := bare
			add(&g)
			got, err := g.Carriers()
			if err != nil || math.Abs(got.DensityCM3/c.DensityCM3-1) > 1e-9 || math.Abs(got.MobilityCM2VS/c.MobilityCM2VS-1) > 1e-9 ||
				got.EffectiveMass != c.EffectiveMass || got.EpsInf != c.EpsInf || got.Persistence != c.Persistence {
				t.Fatalf("way %d: %+v, %v; want %+v", i, got, err, c)
			}
		}
	})
}

// What does not fit together, or is no conductor, with a word that the error must hold.
func TestGivenRefuses(t *testing.T) {
	good := film.Given{DensityCM3: 1e21, MobilityCM2VS: 40, EffectiveMass: 0.35, EpsInf: 3.9}
	if _, err := good.Carriers(); err != nil {
		t.Fatal(err)
	}
	for _, x := range []struct {
		why, word string
		change    func(*film.Given)
	}{
		{"only the density", "too few", func(g *film.Given) { g.MobilityCM2VS = 0 }},
		{"nothing", "too few", func(g *film.Given) { g.DensityCM3, g.MobilityCM2VS = 0, 0 }},
		{"resistivities alone", "too few", func(g *film.Given) {
			*g = film.Given{ResistivityOhmCM: 1.5e-4, SheetResistanceOhm: 10, ThicknessNM: 150, EffectiveMass: 0.35, EpsInf: 3.9}
		}},
		{"another resistivity", "not 0.0003", func(g *film.Given) { g.ResistivityOhmCM = 3e-4 }},
		{"a resistivity 1.1 % off", "leave one", func(g *film.Given) { g.ResistivityOhmCM = oxide.ResistivityOhmCM() * 1.0102 }},
		{"another sheet resistance", "not 0.0003", func(g *film.Given) { g.SheetResistanceOhm, g.ThicknessNM = 20, 150 }},
		{"two resistivities", "leave one", func(g *film.Given) {
			g.MobilityCM2VS, g.ResistivityOhmCM, g.SheetResistanceOhm, g.ThicknessNM = 0, 2e-4, 10, 150
		}},
		{"a sheet resistance without thickness", "thickness", func(g *film.Given) { g.SheetResistanceOhm = 10 }},
		{"a negative mobility", "mobility", func(g *film.Given) { g.MobilityCM2VS = -40 }},
		{"no number", "density", func(g *film.Given) { g.DensityCM3 = math.NaN() }},
		{"no end", "density", func(g *film.Given) { g.DensityCM3 = math.Inf(1) }},
		{"density in 1/m³", "density", func(g *film.Given) { g.DensityCM3 = 1e27 }},
		{"no mass", "effective mass", func(g *film.Given) { g.EffectiveMass = 0 }},
		{"ε∞ below that of nothing", "ε∞", func(g *film.Given) { g.EpsInf = 0.9 }},
		{"a surface that gives", "surface", func(g *film.Given) { g.SurfaceScattering = -1 }},
		{"all turn back", "persistence", func(g *film.Given) { g.Persistence = -1 }},
	} {
		g := good
		x.change(&g)
		if _, err := g.Carriers(); err == nil || !strings.Contains(err.Error(), x.word) {
			t.Errorf("%s: error is %v, want one with %q", x.why, err, x.word)
		}
	}
}

// Carriers are accepted up to bounds, and a bound itself is.
func TestCarrierBounds(t *testing.T) {
	c := film.Carriers{DensityCM3: 1e21, MobilityCM2VS: 40, EffectiveMass: 0.35, EpsInf: 3.9}
	for _, x := range []struct {
		value       *float64
		least, most float64
	}{{&c.DensityCM3, 1e15, 1e24}, {&c.MobilityCM2VS, 1e-3, 1e6}, {&c.EffectiveMass, 1e-3, 100}, {&c.EpsInf, 1, 100}, {&c.SurfaceScattering, 0, 10}, {&c.Persistence, -0.99, 0}} {
		was := *x.value
		for v, ok := range map[float64]bool{x.least: true, x.most: true, x.least - 1e-6*math.Abs(x.least) - 1e-9: false, x.most + 1e-6*math.Abs(x.most) + 1e-9: false, math.NaN(): false} {
			*x.value = v
			if err := c.Check(); (err == nil) != ok {
				t.Errorf("%g: %v", v, err)
			}
		}
		*x.value = was
	}
}

// Figures by hand: what surfaces add to the damping of silver, what a band that is not parabolic adds to
// the mass, what persistence adds to the resistance.
func TestCarriersByHand(t *testing.T) {
	silver := film.Carriers{DensityCM3: 5.86e22, MobilityCM2VS: 60, EffectiveMass: 0.96, EpsInf: 4, SurfaceScattering: 0.75}
	// ħ v_F is 6.582119569e-16·1.39e6 = 9.14915e-10 eV·m, three quarters of it over 10 nm 0.0686186 eV.
	if more := silver.InFilm(10).DampingEV() - silver.DampingEV(); math.Abs(more-0.0686186) > 1e-7 {
		t.Errorf("10 nm adds %.7f eV", more)
	}
	ratio := silver.InFilm(10).DampingEV() / silver.DampingEV()
	if got, want := silver.SheetResistance(10), silver.ResistivityOhmCM()*1e6*ratio; math.Abs(got/want-1) > 1e-12 {
		t.Errorf("10 nm has %.5f Ω, want %.5f", got, want)
	}
	if oxide.InFilm(10) != oxide || silver.InFilm(0) != silver {
		t.Error("carriers changed without a reason")
	}
	// C 0.5/eV and a Fermi energy of 1 eV at m₀: √(1 + 2·0.5·2·1) = √3.
	n := math.Pow(1/film.BursteinMossEV(1e20, 0.3), 1.5) * 1e20 // BursteinMossEV(n, 0.3) is 1
	if got := film.NonParabolicMass(n, 0.3, 0.5); math.Abs(got-0.3*math.Sqrt(3)) > 1e-9 {
		t.Errorf("mass %.9f, want 0.3·√3", got)
	}
	grainy := oxide
	grainy.Persistence = -0.75
	if got := grainy.ResistivityOhmCM() / oxide.ResistivityOhmCM(); math.Abs(got-4) > 1e-12 {
		t.Errorf("persistence -0.75 makes %.6f of the resistivity, want 4", got)
	}
}

// Light at ωτ far below 1 and direct current see one conductivity: Im ε = σ/(ε₀ω) = Z₀ λ/(2π ρ).
func TestLightAndCurrentAgree(t *testing.T) {
	for _, c := range []film.Carriers{oxide, {DensityCM3: 5e20, MobilityCM2VS: 10, EffectiveMass: 0.3, EpsInf: 3.8, Persistence: -0.6}} {
		const nm = 1e9
		got := imag(film.Oxide(c, nil, false).Epsilon(film.PhotonEV(nm)))
		want := 376.730313668 * nm * 1e-7 / (2 * math.Pi * c.ResistivityOhmCM())
		if math.Abs(got/want-1) > 1e-5 {
			t.Errorf("%+v: Im ε %.6g at 1 m, by its resistivity %.6g", c, got, want)
		}
	}
}

// Loss that falls above the plasma energy clears the light and leaves the infrared as it is, to the bit.
func TestFallingLoss(t *testing.T) {
	plain, falling := film.Oxide(oxide, nil, false), film.Oxide(oxide, nil, true)
	onset := oxide.UndampedPlasmaNM()
	for _, nm := range []float64{onset * 1.000001, 2500, 5000, 10000, 50000} {
		if plain.Index(nm) != falling.Index(nm) {
			t.Errorf("at %g nm %g and %g", nm, plain.Index(nm), falling.Index(nm))
		}
	}
	// k ∝ γ: at a quarter of the plasma wavelength an eighth of it is left.
	if got := imag(falling.Index(onset/4)) / imag(plain.Index(onset/4)); math.Abs(got-0.125) > 1e-3 {
		t.Errorf("%.5f of the loss is left, want 0.125", got)
	}
}

// An edge like that of oxide of indium and tin; its figures are typical.
var edge = film.Edge{GapEV: film.IndiumOxideGapEV, NarrowingEV: film.AssumedNarrowingEV, AmplitudeEV: 60, AboveGapEV: 1.5, BroadeningEV: 1.5, UrbachEV: 0.3}

// More carriers move the edge into the ultraviolet, and so the tint; the index at 550 nm stays that of the carriers.
func TestEdgeFollowsCarriers(t *testing.T) {
	// The gap by hand: 1e20 carriers of mass 0.35 widen it by 0.74114/6^(2/3) = 0.22446 eV and narrow it by 0.2.
	c := oxide
	c.DensityCM3 = 1e20
	if got := edge.OpticalGapEV(c); math.Abs(got-3.77446) > 2e-5 {
		t.Errorf("gap %.5f eV, want 3.77446", got)
	}
	// About half an eV at 8e20 (I. Hamberg and others, Physical Review B 30 (1984) 3240, from memory).
	c.DensityCM3 = 8e20
	if got := edge.OpticalGapEV(c) - 3.75; math.Abs(got-0.5) > 0.05 {
		t.Errorf("widened by %.3f eV", got)
	}
	heavy := edge
	heavy.ReducedMass = 0.22
	if got, want := heavy.OpticalGapEV(c)-edge.OpticalGapEV(c), film.BursteinMossEV(8e20, 0.22)-film.BursteinMossEV(8e20, 0.35); math.Abs(got-want) > 1e-12 {
		t.Errorf("a reduced mass of 0.22 moves the gap by %.4f eV, want %.4f", got, want)
	}
	last := math.Inf(1)
	for _, n := range []float64{2e20, 4e20, 8e20, 1.2e21} {
		c.DensityCM3 = n
		with, without := film.Oxide(c, &edge, true), film.Oxide(c, nil, true)
		k := imag(with.Index(330))
		if !(k < last) {
			t.Errorf("%g carriers: k %.5f at 330 nm, not below %.5f", n, k, last)
		}
		last = k
		at550 := film.PhotonEV(550)
		if a, b := with.Epsilon(at550), without.Epsilon(at550); math.Abs(real(a-b)) > 1e-12 || math.Abs(imag(a-b)) > 5e-3 {
			t.Errorf("%g carriers: ε at 550 nm %.6f, without the edge %.6f", n, a, b)
		}
		yellow := func(nm float64) float64 { return imag(with.Index(nm)) - imag(without.Index(nm)) }
		if !(yellow(400) > 2*yellow(500) && yellow(500) > 0) || !(real(with.Index(400)) > real(without.Index(400))) {
			t.Errorf("%g carriers: the edge adds to k %.2g at 400 nm and %.2g at 500 nm: no yellow", n, yellow(400), yellow(500))
		}
		// In the thermal infrared the edge is a constant below 0.6, and ε of the carriers above 30.
		if a, b := with.Epsilon(0.124), without.Epsilon(0.124); math.Abs(real(a-b)) > 0.6 || math.Abs(imag(a-b)) > 1e-2 {
			t.Errorf("%g carriers: ε at 10 µm %.4f, without the edge %.4f", n, a, b)
		}
	}
}

// A conductor made anew is the one that would have been made at once; what is not changed stays.
func TestConductor(t *testing.T) {
	made := func(c film.Carriers) *film.Material {
		return &film.Material{ID: "tco", FromNM: 300, ToNM: 50000, Model: film.Oxide(c, &edge, true), Carriers: &c, Edge: &edge, FallingLoss: true, DensityKGM3: 7150, Indium: film.IndiumInITO}
	}
	other := film.Carriers{DensityCM3: 6e20, MobilityCM2VS: 25, EffectiveMass: 0.3, EpsInf: 4.1}
	got, err := film.Conductor(made(oxide), film.Given{DensityCM3: 6e20, MobilityCM2VS: 25, EffectiveMass: 0.3, EpsInf: 4.1})
	if err != nil {
		t.Fatal(err)
	}
	for _, nm := range []float64{310, 400, 550, 1500, 10000} {
		near(t, "made anew", got.Index(nm), made(other).Index(nm), 1e-12)
	}
	if *got.Carriers != other || got.Indium != film.IndiumInITO || got.Edge != &edge {
		t.Errorf("made anew: %+v", got)
	}
	for _, x := range []struct {
		what   string
		change film.Given
		want   film.Carriers
	}{
		{"nothing", film.Given{}, oxide},
		{"the density", film.Given{DensityCM3: 9e20}, film.Carriers{DensityCM3: 9e20, MobilityCM2VS: 40, EffectiveMass: 0.35, EpsInf: 3.9}},
		{"a sheet resistance: the mobility follows", film.Given{SheetResistanceOhm: oxide.SheetResistance(100), ThicknessNM: 200},
			film.Carriers{DensityCM3: 1e21, MobilityCM2VS: 20, EffectiveMass: 0.35, EpsInf: 3.9}},
		{"resistivity and mobility: the density follows", film.Given{ResistivityOhmCM: oxide.ResistivityOhmCM(), MobilityCM2VS: 80},
			film.Carriers{DensityCM3: 5e20, MobilityCM2VS: 80, EffectiveMass: 0.35, EpsInf: 3.9}},
	} {
		m, err := film.Conductor(made(oxide), x.change)
		if err != nil || math.Abs(m.Carriers.DensityCM3/x.want.DensityCM3-1) > 1e-12 || math.Abs(m.Carriers.MobilityCM2VS/x.want.MobilityCM2VS-1) > 1e-12 {
			t.Errorf("%s: %+v, %v; want %+v", x.what, m, err, x.want)
			continue
		}
		near(t, x.what, m.Index(1200), made(x.want).Index(1200), 1e-9)
	}
	if _, err := film.Conductor(made(oxide), film.Given{DensityCM3: 9e20, MobilityCM2VS: 30, ResistivityOhmCM: 1e-4}); err == nil || !strings.Contains(err.Error(), "material tco") {
		t.Errorf("contradicting figures: %v", err)
	}
	if _, err := film.Conductor(&film.Material{ID: "silica", Model: film.Constant(1.46)}, film.Given{DensityCM3: 1e21}); err == nil || !strings.Contains(err.Error(), "silica") {
		t.Errorf("carriers for silica: %v", err)
	}
}

// Measured constants take the difference of two models, and lose no less than nothing.
func TestConductorOfMeasured(t *testing.T) {
	model := film.Oxide(oxide, nil, false)
	grid := []float64{500, 1000, 1500, 2000}
	c := film.Constants{N: spectra.Curve{NM: grid}, K: spectra.Curve{NM: grid}}
	for _, nm := range grid { // as if measured: the model and some more loss
		n := model.Index(nm)
		c.N.Value, c.K.Value = append(c.N.Value, real(n)), append(c.K.Value, imag(n)+0.01)
	}
	m := &film.Material{ID: "lab", FromNM: 500, ToNM: 2000, Model: film.Tabulated{Constants: c}, Carriers: &oxide}
	got, err := film.Conductor(m, film.Given{DensityCM3: 5e20})
	if err != nil {
		t.Fatal(err)
	}
	fewer := oxide
	fewer.DensityCM3 = 5e20
	for _, nm := range grid {
		n, want := m.Index(nm), film.Oxide(fewer, nil, false).Epsilon(film.PhotonEV(nm))
		more := n*n - model.Epsilon(film.PhotonEV(nm)) // what was measured beside the model
		near(t, "half the carriers", got.Index(nm)*got.Index(nm), want+more, 1e-9)
	}
	clear := &film.Material{ID: "lab", FromNM: 500, ToNM: 2000, Model: film.Constant(1.9), Carriers: &oxide}
	if got, err := film.Conductor(clear, film.Given{MobilityCM2VS: 80}); err != nil || imag(got.Index(1000)) != 0 {
		t.Errorf("loss %g below 0 in a film with less loss than none, %v", imag(got.Index(1000)), err)
	}
}

// A metal in a film scatters at its surfaces; a mesh spreads over the thickness it is given; others do not care.
func TestMaterialInFilm(t *testing.T) {
	silver := film.Carriers{DensityCM3: 5.86e22, MobilityCM2VS: 60, EffectiveMass: 0.96, EpsInf: 4, SurfaceScattering: 1}
	m := &film.Material{ID: "metal", Model: film.Oxide(silver, nil, false), Carriers: &silver}
	thin := m.InFilm(10)
	near(t, "10 nm", thin.Index(1000), film.Oxide(silver.InFilm(10), nil, false).Index(1000), 1e-12)
	near(t, "10 nm, then 20", thin.InFilm(20).Index(1000), m.InFilm(20).Index(1000), 1e-12)
	if !(imag(thin.Index(1000)*thin.Index(1000)) > imag(m.Index(1000)*m.Index(1000))) {
		t.Error("the film loses no more than bulk")
	}
	plain := &film.Material{Model: film.Oxide(oxide, nil, false), Carriers: &oxide}
	if plain.InFilm(10) != plain {
		t.Error("an oxide changed with its thickness")
	}
	mesh := &film.Material{Model: film.Mesh{OpenArea: 0.9, SheetResistanceOhm: 10, PitchNM: 2000, HostIndex: 1, ThicknessNM: 100}}
	if a, b := inAir(mesh.Model, 100, 1e7).T, inAir(mesh.InFilm(40).Model, 40, 1e7).T; math.Abs(a-b) > 1e-4*a {
		t.Errorf("a mesh of 100 nm passes %g, of 40 nm %g", a, b)
	}
}

// Whatever carriers pass the check, the index is finite and loses nothing below 0.
func TestOxideIsPassive(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		c := film.Carriers{DensityCM3: math.Pow(10, rapid.Float64Range(15, 24).Draw(t, "log N")), MobilityCM2VS: math.Pow(10, rapid.Float64Range(-3, 6).Draw(t, "log µ")),
			EffectiveMass: math.Pow(10, rapid.Float64Range(-3, 2).Draw(t, "log m")), EpsInf: rapid.Float64Range(1, 100).Draw(t, "ε"),
			Persistence: rapid.SampledFrom([]float64{0, -0.99}).Draw(t, "c")}
		if err := c.Check(); err != nil {
			t.Fatal(err)
		}
		nm := rapid.Float64Range(200, 100000).Draw(t, "nm")
		for _, e := range []*film.Edge{nil, &edge} {
			n := film.Oxide(c, e, rapid.Bool().Draw(t, "falling")).Index(nm)
			if !(real(n) >= 0 && imag(n) >= 0 && real(n)+imag(n) < math.Inf(1)) {
				t.Fatalf("N = %g", n)
			}
		}
	})
}

func BenchmarkOxideIndex(b *testing.B) {
	o := film.Oxide(oxide, &edge, true)
	for b.Loop() {
		o.Index(550)
	}
}
