package colour

// The general colour rendering index, step by step as CIE 13.3-1995 has it.

import (
	"math"
)

// UV is a point of the CIE 1960 chromaticity diagram.
type UV struct{ U, V float64 }

// UV returns the chromaticity u = 4 X/(X + 15 Y + 3 Z), v = 6 Y/(X + 15 Y + 3 Z).
func (c XYZ) UV() UV {
	d := c.X + float64(15*c.Y) + float64(3*c.Z)
	return UV{4 * c.X / d, 6 * c.Y / d}
}

// CD are the coefficients of the chromatic adaptation of CIE 13.3-1995, 5.7.
type CD struct{ C, D float64 }

// CD returns c = (4 − u − 10 v)/v and d = (1.708 v + 0.404 − 1.481 u)/v.
func (p UV) CD() CD {
	return CD{(4 - p.U - float64(10*p.V)) / p.V, (float64(1.708*p.V) + 0.404 - float64(1.481*p.U)) / p.V}
}

// UVW is a colour in the CIE 1964 space U*V*W*.
type UVW struct{ U, V, W float64 }

// space returns U*V*W* of a chromaticity and Y against a white (CIE 13.3-1995, 5.8).
func space(p, white UV, y float64) UVW {
	w := float64(25*math.Cbrt(y)) - 17
	return UVW{13 * w * (p.U - white.U), 13 * w * (p.V - white.V), w}
}

// Rendering is a general colour rendering index with all that leads to it, in the order of
// CIE 13.3-1995.
type Rendering struct {
	Test      Illuminant
	Reference Illuminant // its chromaticity is what the test source is adapted to
	Samples   [Samples]Sample
	Ra        float64 // the mean of the eight R
}

// Illuminant is a source of light as CIE 13.3 needs it.
type Illuminant struct {
	XYZ XYZ
	UV  UV
	CD  CD
}

// Sample is one test colour sample.
type Sample struct {
	XYZ       XYZ     // under the test source, where that has Y 100
	UV        UV      // of XYZ
	CD        CD      // of UV
	Adapted   UV      // u′, v′ (CIE 13.3-1995, 5.7)
	Seen      UVW     // under the test source, adapted
	Reference UVW     // under the reference illuminant
	DeltaE    float64 // (CIE 13.3-1995, 5.9)
	R         float64 // the special index (CIE 13.3-1995, 6.1)
}

// reference13 is a reference illuminant of CIE 13.3 with the samples seen under it.
type reference13 struct {
	Illuminant
	samples [Samples]UVW
}

func illuminant(c XYZ) Illuminant {
	p := c.UV()
	return Illuminant{c, p, p.CD()}
}

// newReference13 takes the white of the reference illuminant, Y 100, and its samples.
func newReference13(white XYZ, seen [Samples]XYZ) reference13 {
	r := reference13{Illuminant: illuminant(white)}
	for i, s := range seen {
		r.samples[i] = space(s.UV(), r.UV, s.Y)
	}
	return r
}

// work writes the general index of a test source and the samples under it (CIE 13.3-1995, 5.9,
// 6.1, 6.2), at any common scale, with all that leads to it.
func (r *reference13) work(dst *Rendering, test XYZ, seen *[Samples]XYZ) {
	dst.Test, dst.Reference = illuminant(test), r.Illuminant
	scale := 100 / test.Y
	var sum float64
	for i, c := range seen {
		s := &dst.Samples[i]
		s.XYZ, s.UV, s.Reference = c.times(scale), c.UV(), r.samples[i]
		s.CD = s.UV.CD()
		a, b := float64(r.CD.C/dst.Test.CD.C*s.CD.C), float64(r.CD.D/dst.Test.CD.D*s.CD.D)
		s.Adapted = UV{
			U: (10.872 + float64(0.404*a) - float64(4*b)) / (16.518 + float64(1.481*a) - b),
			V: 5.520 / (16.518 + float64(1.481*a) - b),
		} // CIE 13.3-1995, 5.7
		s.Seen = space(s.Adapted, r.UV, s.XYZ.Y)
		s.DeltaE = root(s.Seen.U-s.Reference.U, s.Seen.V-s.Reference.V, s.Seen.W-s.Reference.W)
		s.R = 100 - float64(4.6*s.DeltaE)
		sum += s.R
	}
	dst.Ra = sum / Samples
}
