package colour

import (
	"math"

	"panewright/reference"
)

// uv is a point of the CIE 1960 chromaticity diagram.
type uv struct{ u, v float64 }

func (c XYZ) uv() uv {
	d := c.X + float64(15*c.Y) + float64(3*c.Z)
	return uv{4 * c.X / d, 6 * c.Y / d}
}

// cd returns the coefficients of the chromatic adaptation of CIE 13.3-1995, 5.7.
func (p uv) cd() (c, d float64) {
	return (4 - p.u - float64(10*p.v)) / p.v, (float64(1.708*p.v) + 0.404 - float64(1.481*p.u)) / p.v
}

// reference13 is a reference illuminant of CIE 13.3 with the samples seen under it.
type reference13 struct {
	white   uv
	c, d    float64
	samples [samples]uvw
}

// uvw is a colour in the CIE 1964 space U*V*W*.
type uvw struct{ u, v, w float64 }

// space returns U*V*W* of a chromaticity and Y against a white (CIE 13.3-1995, 5.8).
func space(p, white uv, y float64) uvw {
	w := float64(25*math.Cbrt(y)) - 17
	return uvw{13 * w * (p.u - white.u), 13 * w * (p.v - white.v), w}
}

// newReference13 takes the white of the reference illuminant, Y 100, and its samples.
func newReference13(white XYZ, seen [samples]XYZ) reference13 {
	r := reference13{white: white.uv()}
	r.c, r.d = r.white.cd()
	for i, s := range seen {
		r.samples[i] = space(s.uv(), r.white, s.Y)
	}
	return r
}

// index returns the general index of a test source and the samples under it (CIE 13.3-1995,
// 5.9, 6.1, 6.2), at any common scale.
func (r reference13) index(test XYZ, seen [samples]XYZ) float64 {
	scale := 100 / test.Y
	c, d := test.uv().cd()
	var sum float64
	for i, s := range seen {
		ci, di := s.uv().cd()
		a, b := float64(r.c/c*ci), float64(r.d/d*di)
		adapted := uv{
			u: (10.872 + float64(0.404*a) - float64(4*b)) / (16.518 + float64(1.481*a) - b),
			v: 5.520 / (16.518 + float64(1.481*a) - b),
		} // CIE 13.3-1995, 5.7
		k, ref := space(adapted, r.white, s.Y*scale), r.samples[i]
		du, dv, dw := k.u-ref.u, k.v-ref.v, k.w-ref.w
		sum += 100 - float64(4.6*math.Sqrt(float64(du*du)+float64(dv*dv)+float64(dw*dw)))
	}
	return sum / samples
}

// RenderingOf returns the general colour rendering index of a light source given at the
// wavelengths of Wavelengths, with its correlated colour temperature in K. The reference
// illuminant has the same temperature: a Planckian radiator below 5000 K, a phase of daylight
// from there on (CIE 13.3-1995, 5.2). A glazing under D65 is rated by Meter.RenderingIndex.
func RenderingOf(source []float64) (ra, kelvin float64) {
	t := sums(source, nil)
	kelvin = temperature(t.uv())
	ref := planck(kelvin)
	if kelvin >= 5000 {
		ref = daylight(kelvin)
	}
	under := func(light []float64) (white XYZ, seen [samples]XYZ) {
		white = sums(light, nil)
		for i := range samples {
			seen[i] = sums(light, sample(i)).times(100 / white.Y)
		}
		return white.times(100 / white.Y), seen
	}
	r := newReference13(under(ref))
	return r.index(under(source)), kelvin
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
func temperature(p uv) float64 {
	distance := func(mired float64) float64 {
		q := sums(planck(1e6/mired), nil).uv()
		return math.Hypot(q.u-p.u, q.v-p.v)
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
