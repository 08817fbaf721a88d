package proof

// Checks of uncoated glass and of a sheet by its optical constants.

import (
	"math"

	"panewright/glazing"
	"panewright/glazing/film"
	"panewright/glazing/library"
	"panewright/glazing/optics"
	"panewright/spectra"
)

// uncoated is a pane of a built-in glass.
func uncoated(in *inputs, thicknessMM float64) film.Sheet {
	c, ok := film.Glass(in.text("glass"))
	if !ok {
		in.fail("input glass: there is no built-in glass %q", in.text("glass"))
	}
	return film.Sheet{Constants: c, ThicknessMM: thicknessMM}
}

// glassFigure is any figure of one uncoated sheet of a built-in glass.
func glassFigure(in *inputs) (float64, error) {
	s := uncoated(in, in.number("thickness_mm"))
	r, err := rate(in, &glazing.Makeup{ID: "check", Panes: []glazing.Placed{{Pane: library.Uncoated("sheet", s)}}})
	if err != nil {
		return 0, err
	}
	return figure(r, in.text("figure"))
}

// anyMM is a thickness at which glass is opaque to its own heat.
const anyMM = 4

// glassEmissivity is the normal emissivity at 283 K of an uncoated face by its constants.
func glassEmissivity(in *inputs) (float64, error) {
	return number(library.Uncoated("sheet", uncoated(in, anyMM)).Tints[0].Front.ComputedNormal)
}

// glassHemispherical is the same over the half space.
func glassHemispherical(in *inputs) (float64, error) {
	return number(library.Uncoated("sheet", uncoated(in, anyMM)).Tints[0].Front.Hemispherical)
}

// sheetOf is a sheet of a given index and absorption at one wavelength, where k is small.
func sheetOf(in *inputs) (s film.Sheet, wavelengthNM float64) {
	const nm, mm, nmPerMM = 550, 6, 1e6
	k := in.number("alpha_d") * nm / (4 * math.Pi * mm * nmPerMM)
	one := func(v float64) spectra.Curve { return spectra.Curve{NM: []float64{nm}, Value: []float64{v}} }
	return film.Sheet{Constants: film.Constants{N: one(in.number("n")), K: one(k)}, ThicknessMM: mm}, nm
}

func slabShare(in *inputs) (float64, error) {
	s, nm := sheetOf(in)
	return share(in, s.At(nm, in.number("theta_deg")).Unpolarised())
}

func slabHemispherical(in *inputs) (float64, error) {
	s, nm := sheetOf(in)
	return share(in, s.Hemispherical(nm))
}

// slabPair is the transmittance of two equal sheets behind each other, each polarisation by itself
// through both before the mean is taken.
func slabPair(in *inputs) (float64, error) {
	s, nm := sheetOf(in)
	f := s.At(nm, in.number("theta_deg"))
	through := func(one film.Share) float64 {
		pane := optics.Pane{T: []float64{one.T}, Ro: []float64{one.R}, Ri: []float64{one.R}}
		var stack optics.Stack
		stack.Combine([]optics.Pane{pane, pane})
		return stack.T[0]
	}
	return film.Polarised{S: film.Share{T: through(f.S)}, P: film.Share{T: through(f.P)}}.Unpolarised().T, nil
}

func share(in *inputs, f film.Share) (float64, error) {
	switch which := in.text("share"); which {
	case "T":
		return f.T, nil
	case "R":
		return f.R, nil
	default:
		in.fail("input share: %q is neither T nor R", which)
		return 0, nil
	}
}
