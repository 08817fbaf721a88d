// Package colour computes tristimulus values, L*a*b* and the general colour rendering index of
// light that a glazing transmits or reflects (CIE 15:2004, CIE 13.3-1995, EN 410:2011, 5.6).
//
// Spectra are given on the CIE's 5 nm wavelengths from 380 to 780 nm, or on a grid that contains
// them. The illuminant is D65, the white that of the full spectrum of D65 seen by the same
// observer; all sums run over 5 nm.
package colour

import (
	"math"

	"panewright/reference"
	"panewright/spectra"
)

// Lab is a colour in CIE 1976 L*a*b* against the white of D65.
type Lab struct{ L, A, B float64 }

// XYZ are tristimulus values, Y 100 for the perfect white.
type XYZ struct{ X, Y, Z float64 }

// An Observer is one of the two standard observers of the CIE.
type Observer int

// The observers.
const (
	TwoDegree Observer = iota // CIE 1931
	TenDegree                 // CIE 1964
)

// columns of the reference table that hold an observer's colour-matching functions
func (o Observer) columns() [3]string {
	if o == TenDegree {
		return [3]string{"x10", "y10", "z10"}
	}
	return [3]string{"x2", "y2", "z2"}
}

// Samples is the number of test colour samples of the general index.
const Samples = 8

// A Meter measures colours under D65 on one grid. It is made once and may be shared.
type Meter struct {
	observers [2]spectra.Triple
	sums      [2]XYZ // of D65 itself, Σ S·x̄, Σ S·ȳ, Σ S·z̄
	white     [2]XYZ // scaled so that Y is 100
	scale     [2]float64
	samples   [Samples]spectra.Triple // of CIE 13.3, seen by the 2° observer
	rendering reference13
}

// Wavelengths returns those that a grid must hold, in nm: 380 to 780 at 5 nm. They must not be
// written to.
func Wavelengths() []float64 { return reference.Observers().Column("wavelength_nm") }

// NewMeter lays the weights of D65, observers and samples out on a grid.
func NewMeter(g spectra.Grid) *Meter {
	m := &Meter{}
	d65 := d65()
	nm := Wavelengths()
	weigh := func(column string, factor []float64) spectra.Placed {
		w := spectra.Weighting{Name: "colour", NM: nm, Weight: make([]float64, len(nm))}
		for i, f := range reference.Observers().Column(column) {
			w.Weight[i] = float64(d65[i] * f)
			if factor != nil {
				w.Weight[i] *= factor[i]
			}
		}
		return w.On(g)
	}
	triple := func(o Observer, factor []float64) (spectra.Triple, XYZ) {
		c := o.columns()
		x, y, z := weigh(c[0], factor), weigh(c[1], factor), weigh(c[2], factor)
		return spectra.NewTriple(x, y, z), XYZ{x.Total, y.Total, z.Total}
	}
	for _, o := range []Observer{TwoDegree, TenDegree} {
		t, white := triple(o, nil)
		m.observers[o] = t
		m.sums[o] = white
		m.scale[o] = 100 / white.Y
		m.white[o] = white.times(m.scale[o])
	}
	var whites [Samples]XYZ
	for i := range whites {
		var white XYZ
		m.samples[i], white = triple(TwoDegree, sample(i))
		whites[i] = white.times(m.scale[TwoDegree])
	}
	m.rendering = newReference13(m.white[TwoDegree], whites)
	return m
}

// d65 returns D65 at the observers' wavelengths.
func d65() []float64 { return onObserver("d65") }

// onObserver returns a column of the daylight table at the observers' wavelengths.
func onObserver(column string) []float64 {
	nm, v := reference.Daylight().Series(column)
	out := make([]float64, len(Wavelengths()))
	spectra.Curve{NM: nm, Value: v}.Sample(out, Wavelengths())
	return out
}

// sample returns the radiance factors of test colour sample i, from 0.
func sample(i int) []float64 {
	return reference.RenderingSamples().Column("sample" + string(rune('1'+i)))
}

func (c XYZ) times(f float64) XYZ { return XYZ{c.X * f, c.Y * f, c.Z * f} }

// XYZ returns the tristimulus values, for an observer, of D65 after a transmittance or
// reflectance given over the whole padded grid: Y is 100 where that is 1.
func (m *Meter) XYZ(o Observer, values []float64) XYZ {
	x, y, z := m.observers[o].Sums(values)
	return XYZ{x, y, z}.times(m.scale[o])
}

// Lab returns the colour of a transmittance or reflectance given over the whole padded grid.
func (m *Meter) Lab(o Observer, values []float64) Lab {
	return m.XYZ(o, values).Lab(m.white[o])
}

// Working is a colour with all that leads to it.
type Working struct {
	Sums      XYZ // Σ f·S·x̄, Σ f·S·ȳ, Σ f·S·z̄
	WhiteSums XYZ // the same of D65 itself
	XYZ       XYZ // Sums·100/WhiteSums.Y
	White     XYZ // of D65, Y 100
	Roots     Roots
	Lab       Lab
}

// Working returns the colour of a transmittance or reflectance given over the whole padded grid,
// with all that leads to it.
func (m *Meter) Working(o Observer, values []float64) Working {
	x, y, z := m.observers[o].Sums(values)
	w := Working{Sums: XYZ{x, y, z}, WhiteSums: m.sums[o], White: m.white[o]}
	w.XYZ = w.Sums.times(m.scale[o])
	w.Roots = w.XYZ.Roots(w.White)
	w.Lab = w.Roots.Lab()
	return w
}

// Roots are f(X/Xn), f(Y/Yn) and f(Z/Zn) of CIE 15:2004, 8.2.1.
type Roots struct{ X, Y, Z float64 }

// Roots returns those of a colour against a white.
func (c XYZ) Roots(white XYZ) Roots {
	return Roots{cubeRoot(c.X / white.X), cubeRoot(c.Y / white.Y), cubeRoot(c.Z / white.Z)}
}

// Lab converts to L*a*b* (CIE 15:2004, 8.2.1).
func (f Roots) Lab() Lab {
	return Lab{L: float64(116*f.Y) - 16, A: 500 * (f.X - f.Y), B: 200 * (f.Y - f.Z)}
}

// Lab converts to L*a*b* against a white (CIE 15:2004, 8.2.1).
func (c XYZ) Lab(white XYZ) Lab { return c.Roots(white).Lab() }

// LinearBelow is the edge of f, (24/116)³: below it f is a straight line.
const LinearBelow = (24.0 / 116) * (24.0 / 116) * (24.0 / 116)

// cubeRoot is f of CIE 15:2004 (8.6): the cube root, continued linearly below (24/116)³.
func cubeRoot(t float64) float64 {
	if t > LinearBelow {
		return math.Cbrt(t)
	}
	return float64(841.0/108*t) + 16.0/116
}

// RenderingIndex returns Ra of D65 after a transmittance given over the whole padded grid, with
// D65 as reference illuminant (EN 410:2011, 5.6; CIE 13.3-1995). It is not clamped: strong
// colours may be below 0. The transmittance must not be 0 everywhere.
func (m *Meter) RenderingIndex(values []float64) float64 {
	var r Rendering
	m.render(&r, values)
	return r.Ra
}

// Rendering returns the same index with all that leads to it.
func (m *Meter) Rendering(values []float64) Rendering {
	var r Rendering
	m.render(&r, values)
	return r
}

func (m *Meter) render(dst *Rendering, values []float64) {
	test := m.XYZ(TwoDegree, values)
	var seen [Samples]XYZ
	for i := range seen {
		x, y, z := m.samples[i].Sums(values)
		seen[i] = XYZ{x, y, z}.times(m.scale[TwoDegree])
	}
	m.rendering.work(dst, test, &seen)
}

// Weighting returns the weight of each wavelength in a colour under D65, D65·(x̄ + ȳ + z̄) of the
// 2° observer: it tells how much of a colour a spectrum that stops early would miss.
func Weighting() spectra.Weighting {
	o := reference.Observers()
	x, y, z := o.Column("x2"), o.Column("y2"), o.Column("z2")
	w := spectra.Weighting{Name: "colour", Source: "CIE 15:2004", NM: Wavelengths(), Weight: d65()}
	for i := range w.Weight {
		w.Weight[i] *= x[i] + y[i] + z[i]
	}
	return w
}
