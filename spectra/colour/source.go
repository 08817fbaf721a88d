package colour

// Lights other than D65. A rating has none: the published figures of lamps and of daylight are
// computed with them, to check the observers, the samples and the steps of the rendering index.

import (
	"math"

	"panewright/reference"
)

// A Light is the relative spectral power of a source at the wavelengths of Wavelengths.
type Light []float64

// XYZ returns the tristimulus values of a light for the 2° observer, in the scale of the light.
func (l Light) XYZ() XYZ { return sums(l, nil) }

// Chromaticity returns x = X/(X + Y + Z) and y = Y/(X + Y + Z).
func (c XYZ) Chromaticity() (x, y float64) {
	sum := c.X + c.Y + c.Z
	return c.X / sum, c.Y / sum
}

// Rendering returns the general colour rendering index of a light with its correlated colour
// temperature in K. The reference illuminant has the same temperature: a black body below 5000 K, a
// phase of daylight from there on (CIE 13.3-1995, 5.2). A glazing under D65 is rated by
// Meter.RenderingIndex.
func (l Light) Rendering() (ra, kelvin float64) {
	kelvin = l.Temperature()
	ref := BlackBody(kelvin)
	if kelvin >= 5000 {
		ref = Daylight(kelvin)
	}
	under := func(light Light) (white XYZ, seen [Samples]XYZ) {
		white = light.XYZ()
		for i := range Samples {
			seen[i] = sums(light, sample(i)).times(100 / white.Y)
		}
		return white.times(100 / white.Y), seen
	}
	r := newReference13(under(ref))
	var out Rendering
	white, seen := under(l)
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

// secondRadiation is c₂ of Planck's law in nm·K, as the CIE takes it.
const secondRadiation = 1.4388e7

// BlackBody returns the light of a Planckian radiator of a temperature in K.
func BlackBody(kelvin float64) Light {
	const scaleNM = 560 // where the power is of the order of 1
	out := make(Light, len(Wavelengths()))
	for i, nm := range Wavelengths() {
		out[i] = math.Pow(scaleNM/nm, 5) / math.Expm1(secondRadiation/(nm*kelvin))
	}
	return out
}

// Daylight returns a phase of daylight of a temperature from 4000 to 25 000 K (CIE 15:2004, 3.1).
func Daylight(kelvin float64) Light {
	m1, m2 := daylightFactors(kelvin)
	s0, s1, s2 := onObserver("s0"), onObserver("s1"), onObserver("s2")
	out := make(Light, len(s0))
	for i := range out {
		out[i] = s0[i] + float64(m1*s1[i]) + float64(m2*s2[i])
	}
	return out
}

// daylightFactors returns M1 and M2 (CIE 15:2004, 3.1).
func daylightFactors(kelvin float64) (m1, m2 float64) {
	t := 1000 / kelvin
	x := 0.244063 + float64(0.09911*t) + float64(2.9678*t*t) - float64(4.6070*t*t*t)
	if kelvin > 7000 {
		x = 0.237040 + float64(0.24748*t) + float64(1.9018*t*t) - float64(2.0064*t*t*t)
	}
	y := float64(-3.000*x*x) + float64(2.870*x) - 0.275
	d := 0.0241 + float64(0.2562*x) - float64(0.7341*y)
	return (-1.3515 - float64(1.7703*x) + float64(5.9114*y)) / d, (0.0300 - float64(31.4424*x) + float64(30.0717*y)) / d
}

// Temperature returns the correlated colour temperature in K: that of the black body nearest in the
// CIE 1960 diagram, found by golden section on the reciprocal temperature from 1000 to 25 000 K.
func (l Light) Temperature() float64 {
	p := l.XYZ().UV()
	distance := func(mired float64) float64 {
		q := BlackBody(1e6 / mired).XYZ().UV()
		return math.Hypot(q.U-p.U, q.V-p.V)
	}
	golden := (math.Sqrt(5) - 1) / 2
	lo, hi := 40.0, 1000.0
	a, b := hi-float64(golden*(hi-lo)), lo+float64(golden*(hi-lo))
	fa, fb := distance(a), distance(b)
	for hi-lo > 1e-6 {
		if fa < fb {
			hi, b, fb = b, a, fa
			a = hi - float64(golden*(hi-lo))
			fa = distance(a)
		} else {
			lo, a, fa = a, b, fb
			b = lo + float64(golden*(hi-lo))
			fb = distance(b)
		}
	}
	return 1e6 / ((lo + hi) / 2)
}
