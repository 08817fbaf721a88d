package colour

// The general colour rendering index, step by step as CIE 13.3-1995 has it.

import (
	"math"
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
