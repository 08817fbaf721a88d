package colour

// Light sources, against which the steps of the rendering index are checked: the program itself
// rates glazing under D65 only.

import (
	"math"

	"panewright/reference"
)

// renderingOf returns the general colour rendering index of a light source given at the
// wavelengths of Wavelengths, with its correlated colour temperature in K. The reference
// illuminant has the same temperature: a Planckian radiator below 5000 K, a phase of daylight
// from there on (CIE 13.3-1995, 5.2). A glazing under D65 is rated by Meter.RenderingIndex.
func renderingOf(source []float64) (ra, kelvin float64) {
	t := sums(source, nil)
	kelvin = temperature(t.UV())
	ref := planck(kelvin)
	if kelvin >= 5000 {
		ref = daylight(kelvin)
	}
	under := func(light []float64) (white XYZ, seen [Samples]XYZ) {
		white = sums(light, nil)
		for i := range Samples {
			seen[i] = sums(light, sample(i)).times(100 / white.Y)
		}
		return white.times(100 / white.Y), seen
	}
	r := newReference13(under(ref))
	var out Rendering
	white, seen := under(source)
	r.work(&out, white, &seen)
	return out.Ra, kelvin
}

// sums returns the tristimulus values of a light, reflected by factor if there is one.
func sums(light, factor []float64) XYZ {
	o := reference.Observers()
	x, y, z := o.Column("x2"), o.Column("y2"), o.Column("z2")
	var c XYZ
	for i, p := range light {
		if factor != nil {
			p *= factor[i]
		}
		c.X += float64(p * x[i])
		c.Y += float64(p * y[i])
		c.Z += float64(p * z[i])
	}
	return c
}

// secondRadiation is c2 of Planck's law in nm·K.
const secondRadiation = 1.4388e7

// planck returns the relative spectral power of a black body.
func planck(kelvin float64) []float64 {
	out := make([]float64, len(Wavelengths()))
	for i, nm := range Wavelengths() {
		out[i] = math.Pow(560/nm, 5) / math.Expm1(secondRadiation/(nm*kelvin))
	}
	return out
}

// daylight returns the relative spectral power of a phase of daylight, 4000 to 25 000 K
// (CIE 15:2004, 3.1).
func daylight(kelvin float64) []float64 {
	m1, m2 := daylightFactors(kelvin)
	s0, s1, s2 := onObserver("s0"), onObserver("s1"), onObserver("s2")
	out := make([]float64, len(s0))
	for i := range out {
		out[i] = s0[i] + float64(m1*s1[i]) + float64(m2*s2[i])
	}
	return out
}

// daylightFactors returns M1 and M2 (CIE 15:2004, 3.1).
func daylightFactors(kelvin float64) (m1, m2 float64) {
	t := 1000 / kelvin
	x := 0.244063 + 0.09911*t + 2.9678*t*t - 4.6070*t*t*t
	if kelvin > 7000 {
		x = 0.237040 + 0.24748*t + 1.9018*t*t - 2.0064*t*t*t
	}
	y := -3.000*x*x + 2.870*x - 0.275
	d := 0.0241 + 0.2562*x - 0.7341*y
	return (-1.3515 - 1.7703*x + 5.9114*y) / d, (0.0300 - 31.4424*x + 30.0717*y) / d
}

// temperature returns the correlated colour temperature in K: the black body nearest in the CIE
// 1960 diagram, found by golden section on the reciprocal temperature from 1000 to 25 000 K.
func temperature(p UV) float64 {
	distance := func(mired float64) float64 {
		q := sums(planck(1e6/mired), nil).UV()
		return math.Hypot(q.U-p.U, q.V-p.V)
	}
	const golden = 0.6180339887498949
	lo, hi := 40.0, 1000.0
	a, b := hi-golden*(hi-lo), lo+golden*(hi-lo)
	fa, fb := distance(a), distance(b)
	for hi-lo > 1e-6 {
		if fa < fb {
			hi, b, fb = b, a, fa
			a = hi - golden*(hi-lo)
			fa = distance(a)
		} else {
			lo, a, fa = a, b, fb
			b = lo + golden*(hi-lo)
			fb = distance(b)
		}
	}
	return 1e6 / ((lo + hi) / 2)
}
