package film_test

import (
	"math"
	"math/cmplx"
	"testing"

	"gonum.org/v1/gonum/integrate/quad"
	"pgregory.net/rapid"

	"panewright/glazing/film"
	"panewright/spectra"
)

func near(t *testing.T, what string, got, want complex128, within float64) {
	t.Helper()
	if !(cmplx.Abs(got-want) <= within) {
		t.Errorf("%s: %.10g, want %.10g within %g", what, got, want, within)
	}
}

// Terms at energies at which they can be put in by hand.
func TestTermsByHand(t *testing.T) {
	for _, x := range []struct {
		what string
		term film.Term
		eV   float64
		want complex128
	}{
		{"Drude: -4/(1 + 0.5i)", film.Drude{PlasmaEV: 2, DampingEV: 0.5}, 1, -3.2 + 1.6i},
		{"below the onset: the same", film.FallingDrude{Drude: film.Drude{PlasmaEV: 2, DampingEV: 0.5}, OnsetEV: 1}, 1, -3.2 + 1.6i},
		{"at four times the onset an eighth of the damping: -4/(16 + 0.25i)", film.FallingDrude{Drude: film.Drude{PlasmaEV: 2, DampingEV: 0.5}, OnsetEV: 1}, 4, -4 / (16 + 0.25i)},
		{"Drude and Smith: (-2 + 2i)(1 - 0.5/(1 - i))", film.DrudeSmith{Drude: film.Drude{PlasmaEV: 2, DampingEV: 1}, Persistence: -0.5}, 1, -1 + 2i},
		{"Lorentz: 0.5·4/(4 - 1 - 0.5i)", film.Lorentz{Strength: 0.5, EnergyEV: 2, BroadeningEV: 0.5}, 1, 2 / (3 - 0.5i)},
		{"Lorentz at its peak: i f E0/Γ", film.Lorentz{Strength: 0.5, EnergyEV: 2, BroadeningEV: 0.5}, 2, 2i},
		{"Sellmeier at twice its wavelength: 0.6·4/3", film.Sellmeier{Strength: 0.6, ResonanceNM: 300}, film.PhotonEV(600), 0.8},
	} {
		near(t, x.what, x.term.Epsilon(x.eV), x.want, 1e-12)
	}
	// A grid at its pitch and at ten times it: w/g 0.1; R□ − iX 10 − 698.815i Ω, then 10 − 69.8815i; the
	// shadow −ln 0.81/2, then /101; worked through apart from this program.
	grid := film.Mesh{OpenArea: 0.81, SheetResistanceOhm: 10, PitchNM: 2000, HostIndex: 1, ThicknessNM: 100}
	near(t, "a mesh at its pitch", grid.Index(2000), 0.20313021+0.88593251i, 1e-7)
	near(t, "a mesh at ten times its pitch", grid.Index(20000), 0.93062564+12.96184320i, 1e-6)
	near(t, "Cauchy at 500 nm: 1.5 + 0.01·4 + 0.001·16", film.Cauchy{A: 1.5, BUM2: 0.01, CUM4: 0.001}.Index(500), 1.556, 1e-12)
	near(t, "a constant", film.Constant(2+0.1i).Index(500), 2+0.1i, 0)
	// 1 eV is 1239.84198 nm (CODATA 2018).
	if got := film.PhotonEV(1239.841984); math.Abs(got-1) > 1e-9 {
		t.Errorf("1239.841984 nm are %.10f eV", got)
	}
}

// Fused silica: I. H. Malitson, Journal of the Optical Society of America 55 (1965) 1205, coefficients and table, from
// memory.
func TestSellmeierSilica(t *testing.T) {
	silica := film.Oscillators{EpsInf: 1, Terms: []film.Term{
		film.Sellmeier{Strength: 0.6961663, ResonanceNM: 68.4043},
		film.Sellmeier{Strength: 0.4079426, ResonanceNM: 116.2414},
		film.Sellmeier{Strength: 0.8974794, ResonanceNM: 9896.161},
	}}
	for _, x := range []struct{ nm, n float64 }{{404.656, 1.46962}, {587.561, 1.45846}, {1060, 1.44968}} {
		near(t, "silica", silica.Index(x.nm), complex(x.n, 0), 1e-5)
	}
}

// An index is √ε in the upper half plane, and keeps the digits of a small loss.
func TestIndexOfOscillators(t *testing.T) {
	o := film.Oscillators{EpsInf: 4, Terms: []film.Term{film.Lorentz{Strength: 1, EnergyEV: 8, BroadeningEV: 1e-12}, film.Drude{PlasmaEV: 1, DampingEV: 0.1}}}
	for _, nm := range []float64{300, 550, 3000, 50000} {
		n, eps := o.Index(nm), o.Epsilon(film.PhotonEV(nm))
		near(t, "N²", n*n, eps, 1e-12*cmplx.Abs(eps))
		if imag(n) < 0 || real(n) < 0 {
			t.Errorf("at %g nm N = %g", nm, n)
		}
	}
	small := film.Oscillators{EpsInf: 4, Terms: []film.Term{film.Lorentz{Strength: 1, EnergyEV: 4, BroadeningEV: 1e-13}}}
	eV := film.PhotonEV(600)
	n := small.Index(600)
	if k := 16 * 1e-13 * eV / math.Pow(16-eV*eV, 2) / (2 * real(n)); math.Abs(imag(n)-k) > 1e-9*k {
		t.Errorf("k %g, want %g", imag(n), k)
	}
}

// The sum rule: ∫ E Im ε dE over all energies is π/2 times the squared plasma energy, of an oscillator f E0².
func TestSumRule(t *testing.T) {
	for _, x := range []struct {
		what   string
		term   film.Term
		weight float64
	}{
		{"Drude", film.Drude{PlasmaEV: 1.98, DampingEV: 0.083}, 1.98 * 1.98},
		{"Drude and Smith", film.DrudeSmith{Drude: film.Drude{PlasmaEV: 1.2, DampingEV: 0.3}, Persistence: -0.7}, 1.44},
		{"Lorentz", film.Lorentz{Strength: 0.8, EnergyEV: 3, BroadeningEV: 0.7}, 7.2},
	} {
		sum := quad.Fixed(func(u float64) float64 { // E = tan u, from 0 to ∞
			e := math.Tan(u)
			return e * imag(x.term.Epsilon(e)) * (1 + e*e)
		}, 0, math.Pi/2, 4000, nil, 0)
		if want := math.Pi / 2 * x.weight; math.Abs(sum/want-1) > 1e-6 {
			t.Errorf("%s: %.8f, want %.8f", x.what, sum, want)
		}
	}
}

// kramersKronig is ε₁ from ε₂ by quadrature with the pole subtracted, (2/π) P∫ x ε₂(x)/(x² − E²) dx.
func kramersKronig(term film.Term, eV float64) float64 {
	at := eV * imag(term.Epsilon(eV))
	sum := 0.0
	const pieces = 400
	for i := range pieces { // of u, with x = E u/(1 - u): the pole at u = 1/2 is an end of a piece
		sum += quad.Fixed(func(u float64) float64 {
			x := eV * u / (1 - u)
			return (x*imag(term.Epsilon(x)) - at) / (x*x - eV*eV) * eV / ((1 - u) * (1 - u))
		}, float64(i)/pieces, float64(i+1)/pieces, 10, nil, 0)
	}
	return 2 / math.Pi * sum
}

// What absorbs here bends light there: each term's real part follows from its imaginary part.
func TestKramersKronig(t *testing.T) {
	tauc := film.TaucLorentz{AmplitudeEV: 80, EnergyEV: 5.5, BroadeningEV: 2.5, GapEV: 3.9}
	tail := tauc
	tail.UrbachEV = 0.25
	narrow := film.TaucLorentz{AmplitudeEV: 30, EnergyEV: 4.6, BroadeningEV: 0.6, GapEV: 4.1, UrbachEV: 0.05}
	for _, x := range []struct {
		what string
		term film.Term
	}{
		{"Lorentz", film.Lorentz{Strength: 0.8, EnergyEV: 3, BroadeningEV: 0.7}},
		{"Tauc and Lorentz", tauc}, {"with a tail", tail}, {"with a short tail", narrow},
	} {
		for _, eV := range []float64{0.5, 1.5, 2.3, 3.1, 3.95, 4.4, 5.5, 7} {
			want := kramersKronig(x.term, eV)
			if got := real(x.term.Epsilon(eV)); math.Abs(got-want) > 2e-4 {
				t.Errorf("%s at %g eV: ε₁ %.7f, by quadrature %.7f", x.what, eV, got, want)
			}
		}
	}
}

// jellisonModine is ε₁ in the closed form that the paper prints with its erratum (from memory), written
// apart from the program's sum over poles.
func jellisonModine(t film.TaucLorentz, e float64) float64 {
	a, e0, c, eg := t.AmplitudeEV, t.EnergyEV, t.BroadeningEV, t.GapEV
	alpha, gamma2 := math.Sqrt(4*e0*e0-c*c), e0*e0-c*c/2
	zeta4 := math.Pow(e*e-gamma2, 2) + alpha*alpha*c*c/4
	aln := (eg*eg-e0*e0)*e*e + eg*eg*c*c - e0*e0*(e0*e0+3*eg*eg)
	atan := (e*e-e0*e0)*(e0*e0+eg*eg) + eg*eg*c*c
	return a*c/(math.Pi*zeta4)*aln/(2*alpha*e0)*math.Log((e0*e0+eg*eg+alpha*eg)/(e0*e0+eg*eg-alpha*eg)) -
		a/(math.Pi*zeta4)*atan/e0*(math.Pi-math.Atan((2*eg+alpha)/c)+math.Atan((alpha-2*eg)/c)) +
		2*a*e0/(math.Pi*zeta4*alpha)*eg*(e*e-gamma2)*(math.Pi+2*math.Atan(2*(gamma2-eg*eg)/(alpha*c))) -
		a*e0*c/(math.Pi*zeta4)*(e*e+eg*eg)/e*math.Log(math.Abs(e-eg)/(e+eg)) +
		2*a*e0*c/(math.Pi*zeta4)*eg*math.Log(math.Abs(e-eg)*(e+eg)/math.Sqrt(math.Pow(e0*e0-eg*eg, 2)+eg*eg*c*c))
}

func TestTaucLorentzClosedForm(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		x := film.TaucLorentz{AmplitudeEV: rapid.Float64Range(1, 300).Draw(t, "A"), GapEV: rapid.Float64Range(1, 6).Draw(t, "gap")}
		x.EnergyEV = x.GapEV + rapid.Float64Range(0.2, 5).Draw(t, "above")
		x.BroadeningEV = rapid.Float64Range(0.2, 1.9).Draw(t, "C/E0") * x.EnergyEV
		eV := rapid.Float64Range(0.3, 12).Draw(t, "eV")
		if math.Abs(eV-x.GapEV) < 1e-6 {
			t.Skip()
		}
		got, want := real(x.Epsilon(eV)), jellisonModine(x, eV)
		if math.Abs(got-want) > 1e-9*(x.AmplitudeEV+math.Abs(want)) {
			t.Fatalf("%+v at %g eV: %.12g, as printed %.12g", x, eV, got, want)
		}
	})
}

// The tail joins the curve without step or bend, and below it absorption falls by e each Urbach energy.
func TestUrbachTail(t *testing.T) {
	x := film.TaucLorentz{AmplitudeEV: 80, EnergyEV: 5.5, BroadeningEV: 2.5, GapEV: 3.9, UrbachEV: 0.12}
	whole := x
	whole.UrbachEV = 0
	absorption := func(term film.Term, eV float64) float64 { return math.Log(eV * imag(term.Epsilon(eV))) }
	if fall := absorption(x, 3.6) - absorption(x, 3.6-x.UrbachEV); math.Abs(fall-1) > 1e-9 {
		t.Errorf("the logarithm of the absorption falls by %.10f over the Urbach energy, want 1", fall)
	}
	// The tail goes on as a straight line in this plot, and the curve touches it from below.
	line := func(eV float64) float64 { return absorption(x, 3.6) + (eV-3.6)/x.UrbachEV }
	join, top := 0.0, math.Inf(-1)
	for eV := x.GapEV + 1e-5; eV < 5; eV += 1e-5 {
		if over := absorption(whole, eV) - line(eV); over > top {
			join, top = eV, over
		}
	}
	if math.Abs(top) > 2e-9 || join < 3.9+x.UrbachEV || join > 3.9+3*x.UrbachEV {
		t.Errorf("the curve comes to %.3g of the tail, at %g eV; want to touch it", top, join)
	}
	if got := absorption(x, join-0.01) - line(join-0.01); math.Abs(got) > 1e-9 {
		t.Errorf("%.3g off the tail below %g eV", got, join)
	}
	if x.Epsilon(join+0.01) == whole.Epsilon(join+0.01) || imag(x.Epsilon(join+0.01)) != imag(whole.Epsilon(join+0.01)) {
		t.Errorf("above the tail ε is %g, without it %g", x.Epsilon(join+0.01), whole.Epsilon(join+0.01))
	}
	for eV := join - 2e-4; eV < join+2e-4; eV += 1e-6 { // no spike where logarithms cancel
		if step := cmplx.Abs(x.Epsilon(eV+1e-6) - x.Epsilon(eV)); !(step < 1e-3) {
			t.Fatalf("ε jumps by %g at %.7f eV", step, eV)
		}
	}
	for _, eV := range []float64{x.GapEV, x.GapEV + 1e-15, 0.025, 0.0248, 12} {
		if e := x.Epsilon(eV); cmplx.IsNaN(e) || cmplx.IsInf(e) || imag(e) < 0 {
			t.Errorf("ε(%g eV) = %g", eV, e)
		}
		if e := whole.Epsilon(eV); cmplx.IsNaN(e) || cmplx.IsInf(e) || imag(e) < 0 {
			t.Errorf("without a tail ε(%g eV) = %g", eV, e)
		}
	}
}

// inAir is what a film of a model lets pass and reflects in air, at normal incidence.
func inAir(d film.Dispersion, thicknessNM, nm float64) film.Share {
	s, _ := film.Amplitudes(1, []film.Layer{{Index: d.Index(nm), ThicknessNM: thicknessNM}}, 1, nm, 0)
	return film.Share{T: math.Pow(cmplx.Abs(s.T), 2), R: math.Pow(cmplx.Abs(s.R), 2)}
}

// Graphene without doping takes the same from all light; carriers stop what is below twice the Fermi energy, and
// carry current: R□ = (h/2e²) Γ/E_F.
func TestGraphene(t *testing.T) {
	const fineStructure = 7.2973525693e-3 // CODATA 2018
	layer := film.Graphene{}.LayersNM(1)
	of := func(g film.Graphene) film.Oscillators { return film.Oscillators{EpsInf: 1, Terms: []film.Term{g}} }
	for _, nm := range []float64{400, 550, 700} {
		want := math.Pow(1+math.Pi*fineStructure/2, -2)
		if got := inAir(of(film.Graphene{DampingEV: 0.01}), layer, nm).T; math.Abs(got-want) > 2e-4 {
			t.Errorf("one layer at %g nm: %.5f, want %.5f", nm, got, want)
		}
	}
	doped := film.Graphene{FermiEV: 0.6, DampingEV: 0.01}
	if f := inAir(of(doped), layer, film.PhotonEV(0.7)); 1-f.T-f.R > 0.1*math.Pi*fineStructure {
		t.Errorf("doped to 0.6 eV it takes %.4f at 0.7 eV", 1-f.T-f.R)
	}
	if f := inAir(of(doped), layer, film.PhotonEV(2)); math.Abs(1-f.T-f.R-0.0227) > 0.001 {
		t.Errorf("doped to 0.6 eV it takes %.4f at 2 eV", 1-f.T-f.R)
	}
	const klitzing = 25812.80745 // h/e² in Ω (CODATA 2018)
	if got, want := (film.Graphene{FermiEV: 0.4, DampingEV: 0.01}).SheetResistance(), klitzing/2*0.01/0.4; math.Abs(got/want-1) > 1e-5 {
		t.Errorf("sheet resistance %.3f Ω, want %.3f", got, want)
	}
	// At a wavelength of 1 cm it is a sheet of that resistance: T = (1 + Z₀/2R□)⁻².
	r := doped.SheetResistance()
	if got, want := inAir(of(doped), layer, 1e7).T, math.Pow(1+376.730313668/(2*r), -2); math.Abs(got-want) > 1e-3*want {
		t.Errorf("at 1 cm: %.6f, want %.6f", got, want)
	}
	// Carriers that warmth alone makes: 8 kT ln 2/π = 0.0456 eV at 300 K in place of 4 E_F/π.
	if got, want := (film.Graphene{DampingEV: 0.01}).SheetResistance(), klitzing/2*0.01/(0.025852*2*math.Ln2); math.Abs(got/want-1) > 1e-4 {
		t.Errorf("undoped: %.3f Ω, want %.3f", got, want)
	}
}

// The conductivity of graphene at 300 K as Falkovsky gives it, worked through apart from this program in SI units.
func TestGrapheneNearItsSteps(t *testing.T) {
	for _, x := range []struct {
		eV, fermi, damping float64
		want               complex128
	}{
		{0.55, 0.3, 0.02, 4.634016738 + 7.382696395i},
		{0.05, 0.03, 0.01, -228.263249 + 151.586744i},
		{0.2, 0.03, 0.05, -5.907773415 + 67.31820782i},
	} {
		near(t, "graphene", film.Graphene{FermiEV: x.fermi, DampingEV: x.damping}.Epsilon(x.eV), x.want, 1e-6*cmplx.Abs(x.want))
	}
	// Graphite's layers repeat after two of them, 0.671 nm (handbooks, from memory).
	if got := (film.Graphene{}).LayersNM(2); math.Abs(got-0.671) > 2e-3 {
		t.Errorf("two layers are %g nm", got)
	}
}

// A mesh lets light pass through its openings, and long waves meet a sheet of its resistance.
func TestMesh(t *testing.T) {
	m := film.Mesh{OpenArea: 0.9, SheetResistanceOhm: 10, PitchNM: 2000, HostIndex: 1, ThicknessNM: 100}
	if f := inAir(m, m.ThicknessNM, 450); math.Abs(f.T-0.9) > 0.02 {
		t.Errorf("light: %+v, want about the open area", f)
	}
	if got, want := inAir(m, m.ThicknessNM, 1e8).T, math.Pow(1+376.730313668/20, -2); math.Abs(got/want-1) > 1e-3 {
		t.Errorf("at 10 cm: %.6f, want %.6f", got, want)
	}
	// Without resistance a grid of a tenth of the wavelength and of wires of a tenth of that lets pass
	// 4X²/(1 + 4X²), X = 0.1 ln csc(0.05π) (Marcuvitz).
	g := film.Mesh{OpenArea: 0.81, SheetResistanceOhm: 1e-9, PitchNM: 2000, HostIndex: 1, ThicknessNM: 1}
	x := 0.1 * math.Log(1/math.Sin(0.05*math.Pi))
	if f, want := inAir(g, 1, 20000), 4*x*x/(1+4*x*x); math.Abs(f.T-want) > 3e-3 || math.Abs(f.R-(1-want)) > 3e-3 {
		t.Errorf("a grid: %+v, want T %.5f", f, want)
	}
}

// A material whose measured constants are used as they are, and where.
func TestMaterialOfConstants(t *testing.T) {
	c := film.Constants{N: spectra.Curve{NM: []float64{400, 800}, Value: []float64{2, 1.8}}, K: spectra.Curve{NM: []float64{400, 800}, Value: []float64{0.1, 0.3}}}
	m := film.Material{ID: "lab", FromNM: 400, ToNM: 800, Model: film.Tabulated{Constants: c}}
	near(t, "half way", m.Index(600), 1.9+0.2i, 1e-12)
	for nm, ok := range map[float64]bool{400: true, 800: true, 399: false, 801: false, math.NaN(): false} {
		if err := m.Check(nm); (err == nil) != ok {
			t.Errorf("at %g nm: %v", nm, err)
		}
	}
}
