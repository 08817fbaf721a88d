package colour

// Colours as a screen shows them: sRGB (IEC 61966-2-1:1999, from memory).

import "math"

// SRGB is a colour of IEC 61966-2-1, each part 0 to 255. It serves as an indication: a screen, and
// more so a printer, shows its own.
type SRGB struct{ R, G, B uint8 }

// screenWhite is the white of sRGB, D65 (IEC 61966-2-1: x 0.3127, y 0.3290).
var screenWhite = XYZ{0.3127 / 0.3290 * 100, 100, (1 - 0.3127 - 0.3290) / 0.3290 * 100}

// SRGB returns the colour on a screen whose white has Y 100. Inside says whether the screen can
// show it; parts beyond its reach are set to the bound.
func (c XYZ) SRGB() (s SRGB, inside bool) {
	inside = true
	for i, row := range toScreen {
		v := (float64(row[0]*c.X) + float64(row[1]*c.Y) + float64(row[2]*c.Z)) / 100
		if v < -screenSlack || v > 1+screenSlack || math.IsNaN(v) {
			inside = false
		}
		*[]*uint8{&s.R, &s.G, &s.B}[i] = uint8(math.Round(255 * screenSignal(min(max(v, 0), 1))))
	}
	return s, inside
}

// screenSlack is half a step of 255 where the steps are finest, at black, of the linear part.
const screenSlack = 0.5 / 255 / screenLinear

// toScreen takes XYZ, Y 1 for white, to the linear parts red, green and blue.
var toScreen = [3][3]float64{
	{3.2406, -1.5372, -0.4986},
	{-0.9689, 1.8758, 0.0415},
	{0.0557, -0.2040, 1.0570},
}

const screenLinear = 12.92

// screenSignal is the signal of a linear part.
func screenSignal(v float64) float64 {
	if v <= 0.0031308 {
		return screenLinear * v
	}
	return float64(1.055*math.Pow(v, 1/2.4)) - 0.055
}

// XYZ returns the tristimulus values of a colour against a white: the inverse of Lab.
func (l Lab) XYZ(white XYZ) XYZ {
	y := (l.L + 16) / 116
	return XYZ{float64(white.X * cube(y+l.A/500)), float64(white.Y * cube(y)), float64(white.Z * cube(y-l.B/200))}
}

// cube is the inverse of f of CIE 15:2004 (8.6).
func cube(f float64) float64 {
	if t := f * f * f; t > LinearBelow {
		return t
	}
	return (f - 16.0/116) * (108.0 / 841)
}

// SRGB returns the colour on a screen, whose white is that of L* 100. Inside says whether the
// screen can show it.
func (l Lab) SRGB() (s SRGB, inside bool) { return l.XYZ(screenWhite).SRGB() }
