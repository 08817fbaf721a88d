package film

// A sheet of one material: its spectrum as a rating takes it, its emissivity, its angles.

import (
	"math"
	"slices"
	"sync"

	"gonum.org/v1/gonum/integrate/quad"

	"panewright/reference"
	"panewright/spectra"
)

// A Sheet is an uncoated plane-parallel sheet in air, too thick to interfere.
type Sheet struct {
	Constants   Constants
	ThicknessMM float64
}

// At returns the shares at a vacuum wavelength in nm and an angle of incidence in degrees.
func (s Sheet) At(wavelengthNM, angleDeg float64) Polarised {
	n, k := s.Constants.At(wavelengthNM)
	return Slab(n, k, wavelengthNM, s.ThicknessMM, angleDeg)
}

// Hemispherical returns the shares of unpolarised radiation that comes evenly from the half space,
// 2∫ f(θ) sin θ cos θ dθ.
func (s Sheet) Hemispherical(wavelengthNM float64) Share {
	var sum Share
	h := hemisphere()
	n, k := s.Constants.At(wavelengthNM)
	for i, deg := range h.deg {
		f := Slab(n, k, wavelengthNM, s.ThicknessMM, deg).Unpolarised()
		sum.T += float64(h.weight[i] * f.T)
		sum.R += float64(h.weight[i] * f.R)
	}
	return sum
}

// hemisphere are angles and weights of the mean over the half space: Gauss and Legendre in θ, the
// weights times sin 2θ.
var hemisphere = sync.OnceValue(func() (h struct{ deg, weight []float64 }) {
	const nodes = 16
	theta, weight := make([]float64, nodes), make([]float64, nodes)
	quad.Legendre{}.FixedLocations(theta, weight, 0, math.Pi/2)
	for i, x := range theta {
		h.deg = append(h.deg, x*180/math.Pi)
		h.weight = append(h.weight, float64(weight[i]*math.Sin(2*x)))
	}
	return h
})

// Spectrum returns the spectrum of the sheet at an angle of incidence, in degrees, as a rating takes
// it: at every wavelength of the standards' own tables, so that no weighted figure interpolates,
// and in the infrared at the material's own points. It ends where the constants end.
func (s Sheet) Spectrum(angleDeg float64) spectra.Measured {
	return s.spectrum(func(nm float64) Share { return s.At(nm, angleDeg).Unpolarised() })
}

// HemisphericalSpectrum is Spectrum for radiation that comes evenly from the half space.
func (s Sheet) HemisphericalSpectrum() spectra.Measured {
	return s.spectrum(s.Hemispherical)
}

func (s Sheet) spectrum(at func(nm float64) Share) spectra.Measured {
	first, last := s.Constants.FirstNM(), s.Constants.LastNM()
	within := slices.DeleteFunc(slices.Clone(solarNM()), func(x float64) bool { return x < first || x > last })
	tau, rho := shares(within, at)
	m := spectra.Measured{Tau: tau, RhoFront: rho, RhoBack: rho}
	if s.Constants.infrared() {
		far := slices.DeleteFunc(infraredNM(s.Constants.N.NM), func(x float64) bool { return x > last })
		through, back := shares(far, at)
		m.InfraredFront, m.InfraredBack = back, back
		if slices.Max(through.Value) > opaque {
			m.InfraredTau = through
		}
	}
	m.Cautions = s.Constants.cautions()
	return m
}

// opaque is the transmittance below which a sheet passes nothing.
const opaque = 1e-6

// The end of the infrared that gives emissivity, and where constants may end that are held to it.
const (
	infraredLastNM  = 50000
	infraredLeastNM = 25000
)

// shares samples a function into two curves.
func shares(nm []float64, at func(nm float64) Share) (tau, rho spectra.Curve) {
	tau = spectra.Curve{NM: nm, Value: make([]float64, len(nm))}
	rho = spectra.Curve{NM: nm, Value: make([]float64, len(nm))}
	for i, x := range nm {
		f := at(x)
		tau.Value[i], rho.Value[i] = f.T, f.R
	}
	return tau, rho
}

// solarNM returns every wavelength of the weightings in the solar range.
var solarNM = sync.OnceValue(func() []float64 {
	return spectra.NewGrid(spectra.SolarEN410().NM, spectra.LightEN410().NM, spectra.LightCIE().NM, spectra.UV().NM,
		spectra.Damage700().NM, spectra.Skin().NM, spectra.SolarG173().NM).NM
})

// infraredNM returns the wavelengths of EN 12898, and those given that lie within 5 to 50 µm.
func infraredNM(nm []float64) []float64 {
	list := []float64{spectra.InfraredFirstNM, infraredLastNM}
	for _, um := range reference.EmissivityWavelengths().Column("wavelength_um") {
		list = append(list, toNM(um))
	}
	for _, x := range nm {
		if x >= spectra.InfraredFirstNM && x <= infraredLastNM {
			list = append(list, x)
		}
	}
	return spectra.NewGrid(list).NM
}

// HemisphericalEmissivity returns the emissivity at 283 K of a face over the half space: one less
// the shares reflected and transmitted, weighted by Planck's law from 5 to 50 µm. Constants that
// stop at 25 µm or beyond are held; ok is false where they cover less.
func (s Sheet) HemisphericalEmissivity() (emissivity float64, ok bool) {
	if !s.Constants.infrared() {
		return 0, false
	}
	var sum, weights float64
	nm := infraredNM(s.Constants.N.NM)
	const points = 4 // of Gauss and Legendre between two neighbours, where the constants are linear
	x, bin := make([]float64, points), make([]float64, points)
	for i := 1; i < len(nm); i++ {
		quad.Legendre{}.FixedLocations(x, bin, nm[i-1], nm[i])
		for k := range x {
			f := s.Hemispherical(x[k])
			w := float64(bin[k] * planck(x[k]))
			sum += float64(w * (1 - f.R - f.T))
			weights += w
		}
	}
	return sum / weights, true
}

// planck is the relative power per wavelength of a black body at 283 K (EN 12898), without unit.
func planck(wavelengthNM float64) float64 {
	const (
		secondRadiation = 1.438776877e7 // c₂ = hc/k in nm·K (CODATA 2018)
		kelvin          = 283
	)
	x := secondRadiation / (wavelengthNM * kelvin)
	return math.Pow(x, 5) / math.Expm1(x)
}
