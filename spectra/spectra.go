// Package spectra holds optical spectra of panes and the weightings that turn them into single
// figures: light, solar, ultraviolet, damage and skin (EN 410:2011, ISO 9050:2003, CIE 89/3,
// ASTM G173-03), and reads measured spectra from CSV.
//
// Wavelengths are vacuum wavelengths in nm, ascending; transmittance, reflectance and
// absorptance are fractions of one at normal incidence. A weighted figure is
// Σ f(λ) W(λ) / Σ W(λ) on the wavelengths of the standard's own table, with the spectrum
// interpolated linearly to them:
//
//	tau := spectra.Curve{NM: []float64{300, 780, 2500}, Value: []float64{0.80, 0.90, 0.85}}
//	fmt.Printf("%.3f\n", spectra.SolarEN410().Mean(tau))
//
// Spectra of several panes are combined wavelength by wavelength on those same wavelengths
// (package glazing/optics) before they are weighted, never after. Left out: angles of
// incidence other than normal, and polarisation.
package spectra

import (
	"slices"
	"sort"
)

// A Curve is a quantity over wavelength: NM ascending in nm, Value of the same length. Gaps are the
// stretches between two points of it in which its source says that values are missing; what is
// interpolated there is a guess, and callers say so.
type Curve struct {
	NM    []float64
	Value []float64
	Gaps  []Span // ascending; each from the last point before to the first after
}

// A Span is a stretch of wavelengths in nm.
type Span struct{ FromNM, ToNM float64 }

// Len returns the number of points.
func (c Curve) Len() int { return len(c.NM) }

// First and Last return the ends of the curve in nm; an empty curve has none and both are 0.
func (c Curve) First() float64 {
	if len(c.NM) == 0 {
		return 0
	}
	return c.NM[0]
}

// Last returns the longest wavelength in nm.
func (c Curve) Last() float64 {
	if len(c.NM) == 0 {
		return 0
	}
	return c.NM[len(c.NM)-1]
}

// At returns the value at a wavelength by linear interpolation; beyond an end it is the value of
// that end. An empty curve is 0 everywhere.
func (c Curve) At(nm float64) float64 {
	if len(c.NM) == 0 {
		return 0
	}
	return c.between(sort.SearchFloat64s(c.NM, nm), nm)
}

// Sample writes the values at the wavelengths of grid, ascending, into dst.
func (c Curve) Sample(dst, grid []float64) {
	i := 0
	for k, nm := range grid {
		if len(c.NM) == 0 {
			dst[k] = 0
			continue
		}
		for i < len(c.NM) && c.NM[i] < nm {
			i++
		}
		dst[k] = c.between(i, nm)
	}
}

// between interpolates where i is the first point at or beyond nm.
func (c Curve) between(i int, nm float64) float64 {
	switch {
	case i == len(c.NM):
		return c.Value[i-1]
	case i == 0 || c.NM[i] == nm:
		return c.Value[i]
	}
	x0, x1, y0, y1 := c.NM[i-1], c.NM[i], c.Value[i-1], c.Value[i]
	return y0 + float64((y1-y0)*((nm-x0)/(x1-x0)))
}

// cut returns the points from lo to hi nm, both included.
func (c Curve) cut(lo, hi float64) Curve {
	i := sort.SearchFloat64s(c.NM, lo)
	j := i
	for j < len(c.NM) && c.NM[j] <= hi {
		j++
	}
	return c.slice(i, j)
}

// InGap reports whether a wavelength lies inside a gap of the curve.
func (c Curve) InGap(nm float64) bool {
	return slices.ContainsFunc(c.Gaps, func(g Span) bool { return g.FromNM < nm && nm < g.ToNM })
}

// slice returns points i to j of the curve, with the gaps that lie between them.
func (c Curve) slice(i, j int) Curve {
	out := Curve{NM: c.NM[i:j], Value: c.Value[i:j]}
	for _, g := range c.Gaps {
		if i < j && g.FromNM >= c.NM[i] && g.ToNM <= c.NM[j-1] {
			out.Gaps = append(out.Gaps, g)
		}
	}
	return out
}

// A Caution is a remark that must travel with every figure it concerns: a short code and a
// sentence.
type Caution struct {
	Code string
	Text string
}
