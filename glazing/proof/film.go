package proof

// Checks of films: free carriers, band edges, stacks, short rules.

import (
	"math"
	"math/cmplx"

	"gonum.org/v1/gonum/integrate/quad"

	"panewright/glazing/film"
	"panewright/spectra"
)

// carrierFigure is a figure of free carriers; each takes the inputs that it depends on.
func carrierFigure(in *inputs) (float64, error) {
	var c film.Carriers
	switch name := in.text("figure"); name {
	case "plasma_ev":
		c.DensityCM3, c.EffectiveMass = in.number("carriers_cm3"), in.number("mass")
		return c.PlasmaEV(), nil
	case "damping_ev":
		c.MobilityCM2VS, c.EffectiveMass = in.number("mobility"), in.number("mass")
		return c.DampingEV(), nil
	case "undamped_plasma_nm":
		c.DensityCM3, c.EffectiveMass, c.EpsInf = in.number("carriers_cm3"), in.number("mass"), in.number("eps_inf")
		return c.UndampedPlasmaNM(), nil
	case "screened_plasma_nm":
		nm, _ := carriers(in).ScreenedPlasmaNM()
		return nm, nil
	case "sheet_resistance_ohm":
		c.DensityCM3, c.MobilityCM2VS = in.number("carriers_cm3"), in.number("mobility")
		return c.SheetResistance(in.number("thickness_nm")), nil
	case "n", "k":
		return part(name, film.Oxide(carriers(in), nil, false).Index(in.number("wavelength_nm"))), nil
	default:
		in.fail("input figure: there is no %q", name)
		return 0, nil
	}
}

// part is n or k of an index.
func part(name string, index complex128) float64 {
	if name == "n" {
		return real(index)
	}
	return imag(index)
}

// carriers are those of a plain Drude film.
func carriers(in *inputs) film.Carriers {
	return film.Carriers{DensityCM3: in.number("carriers_cm3"), MobilityCM2VS: in.number("mobility"),
		EffectiveMass: in.number("mass"), EpsInf: in.number("eps_inf")}
}

// drudeFit is a figure of a Drude term −A B/(E² + iBE) that was fitted to light.
func drudeFit(in *inputs) (float64, error) {
	a, b := in.number("a_ev"), in.number("b_ev")
	plasma := math.Sqrt(a * b)
	switch name := in.text("figure"); name {
	case "plasma_ev":
		return film.OpticalCarriers(plasma, b, 1, 1).PlasmaEV(), nil
	case "carriers_1e20_cm3":
		return film.OpticalCarriers(plasma, b, in.number("mass"), 1).DensityCM3 / 1e20, nil
	case "n", "k":
		c := film.OpticalCarriers(plasma, b, 1, in.number("eps_inf"))
		return part(name, film.Oxide(c, nil, false).Index(in.number("wavelength_nm"))), nil
	default:
		in.fail("input figure: there is no %q", name)
		return 0, nil
	}
}

func bursteinMoss(in *inputs) (float64, error) {
	return film.BursteinMossEV(in.number("carriers_cm3"), in.number("reduced_mass")), nil
}

// taucLorentz is a part of the permittivity of the term of that name.
func taucLorentz(in *inputs) (float64, error) {
	t := film.TaucLorentz{AmplitudeEV: in.number("a_ev"), EnergyEV: in.number("e0_ev"), BroadeningEV: in.number("c_ev"), GapEV: in.number("gap_ev")}
	eps := t.Epsilon(in.number("energy_ev"))
	switch name := in.text("part"); name {
	case "real":
		return real(eps), nil
	case "imaginary":
		return imag(eps), nil
	default:
		in.fail("input part: %q is neither real nor imaginary", name)
		return 0, nil
	}
}

func thinSheetEmissivity(in *inputs) (float64, error) {
	return film.ThinSheetEmissivity(in.number("sheet_ohm")), nil
}

func linearEmissivity(in *inputs) (float64, error) {
	return film.LinearEmissivity(in.number("sheet_ohm")), nil
}

func hagenRubens(in *inputs) (float64, error) {
	return film.HagenRubensEmissivity(in.number("resistivity_ohm_cm"), in.number("wavelength_nm")), nil
}

func haacke(in *inputs) (float64, error) {
	return film.Haacke(in.number("transmittance"), in.number("sheet_ohm")), nil
}

func gordon(in *inputs) (float64, error) {
	return film.Gordon(in.number("transmittance"), in.number("reflectance"), in.number("sheet_ohm")), nil
}

func radioAttenuation(in *inputs) (float64, error) {
	return film.RadioAttenuationDB(in.number("sheet_ohm")), nil
}

// elementFraction is the mass fraction of indium in its oxide, or in that with tin.
func elementFraction(in *inputs) (float64, error) {
	switch name := in.text("of"); name {
	case "in2o3":
		return film.IndiumInOxide, nil
	case "ito":
		return film.IndiumInITO, nil
	default:
		in.fail("input of: there is no %q", name)
		return 0, nil
	}
}

// metalMass is the mass per area of the scarce metal of a film.
func metalMass(in *inputs) (float64, error) {
	d := in.number("thickness_nm")
	switch name := in.text("film"); name {
	case "ito":
		return film.MassGM2(d, film.DensityITO, film.IndiumInITO), nil
	case "silver":
		return film.MassGM2(d, film.DensitySilver, 1), nil
	default:
		in.fail("input film: there is no %q", name)
		return 0, nil
	}
}

// metalFilm is a figure of a metal film of a resistivity.
func metalFilm(in *inputs) (float64, error) {
	sheet := film.SheetResistance(in.number("resistivity_ohm_cm"), in.number("thickness_nm"))
	switch name := in.text("figure"); name {
	case "sheet_resistance_ohm":
		return sheet, nil
	case "linear_emissivity":
		return film.LinearEmissivity(sheet), nil
	default:
		in.fail("input figure: there is no %q", name)
		return 0, nil
	}
}

func fuchsSondheimer(in *inputs) (float64, error) {
	return film.FuchsSondheimer(in.number("free_path_nm"), in.number("mirrored"), in.number("thickness_nm")), nil
}

func thinDamping(in *inputs) (float64, error) {
	return film.ThinDampingEV(in.number("bulk_ev"), in.number("a"), film.FermiVelocitySilver, in.number("thickness_nm")), nil
}

// grapheneTransmittance is that of layers in air without doping, at normal incidence.
func grapheneTransmittance(in *inputs) (float64, error) {
	const dampingEV = 0.01
	nm := in.number("wavelength_nm")
	g := film.Oscillators{EpsInf: 1, Terms: []film.Term{film.Graphene{DampingEV: dampingEV}}}
	layer := film.Layer{Index: g.Index(nm), ThicknessNM: film.Graphene{}.LayersNM(int(in.number("layers")))}
	s, _ := film.Amplitudes(1, []film.Layer{layer}, 1, nm, 0)
	return sharesOf(s, 1, 0).T, nil
}

// drudeStack are the films of a stack, at one wavelength, as light from the air meets them: either
// one conducting oxide, or silver between two layers of one index.
func drudeStack(in *inputs, nm float64) []film.Layer {
	if !in.has("silver_nm") {
		return []film.Layer{{Index: film.Oxide(carriers(in), nil, false).Index(nm), ThicknessNM: in.number("thickness_nm")}}
	}
	silver := film.Oscillators{EpsInf: in.number("eps_inf"), Terms: []film.Term{film.Drude{PlasmaEV: in.number("plasma_ev"), DampingEV: in.number("damping_ev")}}}
	clear := film.Layer{Index: complex(in.number("clear_n"), 0), ThicknessNM: in.number("clear_nm")}
	return []film.Layer{clear, {Index: silver.Index(nm), ThicknessNM: in.number("silver_nm")}, clear}
}

// stackShare is what a stack reflects, or passes into the half space behind it.
func stackShare(in *inputs) (float64, error) {
	nm, deg, n := in.number("wavelength_nm"), in.number("theta_deg"), in.number("substrate_n")
	s, p := film.Amplitudes(1, drudeStack(in, nm), complex(n, 0), nm, deg)
	f := film.Polarised{S: sharesOf(s, n, deg), P: sharesOf(p, n, deg)}
	switch name := in.text("polarisation"); name {
	case "s":
		return share(in, f.S)
	case "p":
		return share(in, f.P)
	default:
		in.fail("input polarisation: %q is neither s nor p", name)
		return 0, nil
	}
}

// sharesOf are the shares of the power that goes from air into a lossless half space: T = |t|² n cos θ'/cos θ.
func sharesOf(a film.Amplitude, n, deg float64) film.Share {
	sin, cos := math.Sincos(deg * math.Pi / 180)
	inside := math.Sqrt(n*n - float64(sin*sin)) // n cos θ'
	t, r := cmplx.Abs(a.T), cmplx.Abs(a.R)
	return film.Share{T: t * t * inside / cos, R: r * r}
}

// filmEmissivity is one less the reflectance of a conducting oxide on glass too thick to pass anything,
// weighted by Planck's law at 283 K from 5 to 50 µm.
func filmEmissivity(in *inputs) (float64, error) {
	one := func(v float64) spectra.Curve {
		return spectra.Curve{NM: []float64{spectra.InfraredFirstNM}, Value: []float64{v}}
	}
	pane := film.Coated{
		Glass:       film.Constants{N: one(in.number("substrate_n")), K: one(opaqueK)},
		ThicknessMM: opaqueMM,
		Front:       []film.Film{{Material: &film.Material{Model: film.Oxide(carriers(in), nil, false)}, ThicknessNM: in.number("thickness_nm")}},
	}
	absorbed := func(nm, deg float64) float64 {
		s, p := pane.At(nm, deg)
		return 1 - film.Unpolarised(s, p).RFront
	}
	switch name := in.text("direction"); name {
	case "normal":
		return planckMean(func(nm float64) float64 { return absorbed(nm, 0) }), nil
	case "hemispherical":
		return planckMean(func(nm float64) float64 {
			return quad.Fixed(func(theta float64) float64 {
				return absorbed(nm, theta*180/math.Pi) * math.Sin(2*theta)
			}, 0, math.Pi/2, 16, nil, 0)
		}), nil
	default:
		in.fail("input direction: %q is neither normal nor hemispherical", name)
		return 0, nil
	}
}

// Glass of this k and thickness passes less than e⁻¹⁰⁰ at 50 µm, and reflects as if it had no loss.
const (
	opaqueK  = 1e-4
	opaqueMM = 5000
)

// planckMean is the mean of a function of the wavelength by what a black body radiates at 283 K from 5 to 50 µm.
func planckMean(f func(nm float64) float64) float64 {
	const (
		secondRadiation = 1.438776877e7 // c₂ in nm·K (CODATA 2018)
		kelvin          = 283
		lastNM          = 50000
		nodes           = 40
	)
	weight := func(nm float64) float64 {
		x := secondRadiation / (nm * kelvin)
		return math.Pow(x, 5) / math.Expm1(x)
	}
	sum := quad.Fixed(func(nm float64) float64 { return weight(nm) * f(nm) }, spectra.InfraredFirstNM, lastNM, nodes, nil, 0)
	return sum / quad.Fixed(weight, spectra.InfraredFirstNM, lastNM, nodes, nil, 0)
}
