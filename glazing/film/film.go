// Package film computes the optics of a pane from what it is made of: the transmittance and
// reflectance of a sheet, with films that interfere on either face or without, at any wavelength and
// angle, in both polarisations; the spectrum that a rating takes; emissivities.
//
// Constants are N = n + ik over the vacuum wavelength, k ≥ 0 for loss, for the time factor exp(−iωt).
// A sheet is plane-parallel, in air, and too thick to interfere: light that crosses it is added by
// power. Angles of incidence are measured from the normal, in air.
//
//	glass, _ := film.Glass("soda-lime")
//	s := film.Sheet{Constants: glass, ThicknessMM: 6}
//	fmt.Printf("%.4f\n", s.At(550, 60).Unpolarised().T)
//
// Films are coherent (stack.go, coated.go); the same sheet with a conducting oxide on its back:
//
//	ito, _ := film.MaterialNamed("ito")
//	c := film.Coated{Glass: glass, ThicknessMM: 6, Back: []film.Film{{Material: ito, ThicknessNM: 150}}}
//
// Materials are rows with a source and a range (materials.go), models of their permittivity
// (dispersion.go), free carriers (carriers.go) and band edges that follow them (bandedge.go). Figures
// of merit and the screening rules of the trade stand in merit.go, beside the exact result and never
// in its place.
package film

import "math"

// A Share is the transmitted and the reflected share of the power that meets a sheet; the rest is
// absorbed. A symmetric sheet reflects the same on both sides.
type Share struct{ T, R float64 }

// Polarised are the shares of both polarisations: the electric field across (S) and in (P) the
// plane of incidence.
type Polarised struct{ S, P Share }

// Unpolarised is the mean of both polarisations. Panes behind each other are combined in each
// polarisation before the mean is taken.
func (p Polarised) Unpolarised() Share {
	return Share{T: (p.S.T + p.P.T) / 2, R: (p.S.R + p.P.R) / 2}
}

// Slab returns the shares of a sheet of the index n + ik in air.
//
// With the refracted q = √(N² − sin²θ), the amplitude reflected by a face (Fresnel) is
//
//	rs = (cos θ − q)/(cos θ + q)    rp = (N² cos θ − q)/(N² cos θ + q)
//
// and the power that survives one crossing a = exp(−4π Im(q) d/λ) (Beer and Lambert along the
// refracted path). The phase of a thick sheet is not defined; powers are added, with r = |rs|² or
// |rp|²:
//
//	T = (1 − r)² a/(1 − r² a²)    R = r (1 + a T)
//
// This is the mean over the phase of the exact solution to the order of k²; where k² counts, a
// sheet thick enough not to interfere transmits nothing.
func Slab(n, k, wavelengthNM, thicknessMM, angleDeg float64) Polarised {
	const nmPerMM = 1e6
	crossing := -4 * math.Pi * thicknessMM * nmPerMM / wavelengthNM
	if angleDeg == 0 { // both polarisations are one
		index := complex(n, k)
		f := slab((1-index)/(1+index), math.Exp(crossing*k))
		return Polarised{f, f}
	}
	sin, cos := math.Sincos(angleDeg * math.Pi / 180)
	square := complex(float64((n-k)*(n+k)), 2*n*k)
	q := root(complex(real(square)-float64(sin*sin), imag(square)))
	a := math.Exp(crossing * imag(q))
	c := complex(cos, 0)
	return Polarised{
		S: slab((c-q)/(c+q), a),
		P: slab((square*c-q)/(square*c+q), a),
	}
}

// slab adds up what crosses a sheet whose faces reflect the amplitude r, and in which the share a
// survives one crossing.
func slab(r complex128, a float64) Share {
	rho := power(r)
	if rho >= 1 { // grazing incidence
		return Share{R: 1}
	}
	t := float64((1-rho)*(1-rho)) * a / (1 - float64(rho*a)*float64(rho*a))
	return Share{T: t, R: rho + float64(rho*float64(a*t))}
}

// power is |z|².
func power(z complex128) float64 {
	return float64(real(z)*real(z)) + float64(imag(z)*imag(z))
}

// root is the square root in the upper half plane. It is taken from the larger part, so that a
// small imaginary part, the absorption of clear glass, keeps its digits.
func root(z complex128) complex128 {
	re, im := real(z), imag(z)
	h := math.Hypot(re, im)
	if re >= 0 {
		x := math.Sqrt((h + re) / 2)
		if x == 0 {
			return 0
		}
		return complex(x, im/(2*x))
	}
	y := math.Sqrt((h - re) / 2)
	return complex(im/(2*y), y)
}
