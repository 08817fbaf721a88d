package colour

// Colour differences: ΔE*ab and CIEDE2000.

import "math"

// Difference returns ΔE*ab, the distance of two colours in L*a*b* (CIE 15:2004, 8.2.1).
func (a Lab) Difference(b Lab) float64 {
	return root(a.L-b.L, a.A-b.A, a.B-b.B)
}

// root returns the square root of the sum of three squares.
func root(x, y, z float64) float64 {
	return math.Sqrt(float64(x*x) + float64(y*y) + float64(z*z))
}

// CIEDE2000 returns ΔE00 of two colours for kL = kC = kH = 1 (CIE 142-2001, ISO/CIE 11664-6): the
// difference ΔE*ab evened out to what the eye sees. It is the same in both directions. Where the
// hues of two colours lie opposite each other the formula has a small step.
func (a Lab) CIEDE2000(b Lab) float64 {
	stretch := 1 + float64(0.5*(1-saturation((math.Hypot(a.A, a.B)+math.Hypot(b.A, b.B))/2)))
	c1, h1 := polar(stretch*a.A, a.B)
	c2, h2 := polar(stretch*b.A, b.B)
	turn, sum := h2-h1, h1+h2
	switch {
	case c1 == 0 || c2 == 0: // a grey has no hue: the other's counts alone
		turn = 0
	case math.Abs(turn) <= 180+opposite:
		sum /= 2
	default: // the mean lies on the shorter arc
		turn -= math.Copysign(360, turn)
		sum = (sum + math.Copysign(360, 360-sum)) / 2
		if sum >= 360 {
			sum -= 360
		}
	}
	dl, dc, dh := b.L-a.L, c2-c1, 2*math.Sqrt(c1*c2)*sin(turn/2)
	l, c, h := (a.L+b.L)/2-50, (c1+c2)/2, sum

	t := 1 - float64(0.17*cos(h-30)) + float64(0.24*cos(2*h)) +
		float64(0.32*cos(float64(3*h)+6)) - float64(0.20*cos(float64(4*h)-63))
	sl := 1 + 0.015*l*l/math.Sqrt(20+float64(l*l))
	sc := 1 + float64(0.045*c)
	sh := 1 + float64(0.015*c*t)
	bend := (h - 275) / 25
	blue := -2 * saturation(c) * sin(60*math.Exp(-bend*bend)) // R_T, of the blues
	x, y, z := dl/sl, dc/sc, dh/sh
	return math.Sqrt(float64(x*x) + float64(y*y) + float64(z*z) + float64(blue*y*z))
}

// opposite is how far from 180 degrees, by binary arithmetic, the hues of two colours may be that
// lie opposite each other; the formula counts them as it does those a little closer.
const opposite = 1e-9

// polar returns chroma, and hue from 0 to 360 degrees, 0 for a grey.
func polar(a, b float64) (chroma, hue float64) {
	if hue = math.Atan2(b, a) * degrees; hue < 0 {
		hue += 360
	}
	return math.Hypot(a, b), hue
}

// saturation is √(C⁷/(C⁷ + 25⁷)), from 0 for a grey to 1 for strong colours.
func saturation(chroma float64) float64 {
	c := chroma * chroma * chroma
	c *= c * chroma
	return math.Sqrt(c / (c + 25*25*25*25*25*25*25))
}

// degrees are those of a radian.
const degrees = 180 / math.Pi

func sin(deg float64) float64 { return math.Sin(deg / degrees) }
func cos(deg float64) float64 { return math.Cos(deg / degrees) }
