package proof

import (
	"math"
	"slices"

	"panewright/glazing"
	"panewright/reference"
	"panewright/spectra"
)

// constants returns n and k of a soda-lime glass over the wavelength in nm. Curves hold their
// ends, so that below the first tabulated wavelength the first value stands.
func constants(in *inputs) (n, k spectra.Curve) {
	t, name := reference.SodaLimeGlass(), in.text("glass")
	curve := func(column string) spectra.Curve {
		um, v := t.Series(column)
		nm := make([]float64, len(um))
		for i := range um {
			nm[i] = 1000 * um[i]
		}
		return spectra.Curve{NM: nm, Value: v}
	}
	if !slices.Contains(t.Columns, "n_"+name) {
		in.fail("input glass: the table of soda-lime glasses has no %q", name)
		return n, k
	}
	return curve("n_" + name), curve("k_" + name)
}

// reflectance is that of one face between air and a medium n + ik at normal incidence.
func reflectance(n, k float64) float64 {
	return ((n-1)*(n-1) + k*k) / ((n+1)*(n+1) + k*k) // Fresnel
}

// slab returns transmittance and reflectance at normal incidence of a plane-parallel sheet in
// air that is too thick to interfere. It serves checks only: a rating takes spectra as measured.
//
// Light that has entered crosses the sheet with the share a and meets the far face, where r of
// it turns back. Summing what leaves through either face at each crossing, with s = r²a²:
//
//	T = (1−r)² a (1 + s + s² + …)          = (1−r)² a / (1−s)
//	R = r + (1−r)² r a² (1 + s + s² + …)   = r (1 + a T)
func slab(n, k, wavelengthNM, thicknessMM float64) (transmittance, rho float64) {
	const nmPerMM = 1e6
	r := reflectance(n, k)
	a := math.Exp(-4 * math.Pi * k * thicknessMM * nmPerMM / wavelengthNM) // Beer and Lambert
	t := (1 - r) * (1 - r) * a / (1 - r*r*a*a)
	return t, r * (1 + a*t)
}

// glassFigure is any figure of one uncoated sheet of soda-lime glass, computed from its optical
// constants at the wavelengths of the basis's own tables.
func glassFigure(in *inputs) (float64, error) {
	n, k := constants(in)
	b, err := glazing.BasisNamed(in.text("basis"))
	if err != nil {
		return 0, err
	}
	mm, nm := in.number("thickness_mm"), glazing.NewMethod(b, glazing.Options{}).WavelengthsNM()
	tau, rho := make([]float64, len(nm)), make([]float64, len(nm))
	for i, x := range nm {
		tau[i], rho[i] = slab(n.At(x), k.At(x), x, mm)
	}
	both := spectra.Curve{NM: nm, Value: rho}
	face := glazing.NoEmissivity()
	r, err := rate(in, &glazing.Makeup{ID: "check", Panes: []glazing.Placed{{Pane: &glazing.Pane{
		ID:    "slab",
		Plies: sheet(mm),
		Tints: []glazing.Tint{{
			Spectrum: spectra.Measured{Tau: spectra.Curve{NM: nm, Value: tau}, RhoFront: both, RhoBack: both},
			Front:    face, Back: face,
		}},
	}}}})
	if err != nil {
		return 0, err
	}
	return figure(r, in.text("figure"))
}

// glassEmissivity is the normal emissivity at 283 K of an uncoated face, opaque to its own heat.
func glassEmissivity(in *inputs) (float64, error) {
	n, k := constants(in)
	var c spectra.Curve
	for _, um := range reference.EmissivityWavelengths().Column("wavelength_um") {
		x := 1000 * um
		c.NM, c.Value = append(c.NM, x), append(c.Value, reflectance(n.At(x), k.At(x)))
	}
	return number(glazing.InfraredEmissivity(c, spectra.Curve{}).Normal)
}
