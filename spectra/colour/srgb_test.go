package colour_test

import (
	"math"
	"testing"

	"panewright/spectra/colour"
)

// Colours of screens in L*a*b* against D65, as they are commonly published: B. Lindbloom's
// calculator, sRGB, D65 without adaptation (from memory). They are given to more digits; a part of
// 255 is about 0.3 of L*a*b*, so that the nearest part must come out.
func TestSRGBPublished(t *testing.T) {
	for _, tt := range []struct {
		name string
		lab  colour.Lab
		want colour.SRGB
	}{
		{"red", colour.Lab{L: 53.2408, A: 80.0925, B: 67.2032}, colour.SRGB{R: 255}},
		{"green", colour.Lab{L: 87.7347, A: -86.1827, B: 83.1793}, colour.SRGB{G: 255}},
		{"blue", colour.Lab{L: 32.2970, A: 79.1875, B: -107.8602}, colour.SRGB{B: 255}},
		{"cyan", colour.Lab{L: 91.1132, A: -48.0875, B: -14.1312}, colour.SRGB{G: 255, B: 255}},
		{"magenta", colour.Lab{L: 60.3242, A: 98.2343, B: -60.8249}, colour.SRGB{R: 255, B: 255}},
		{"yellow", colour.Lab{L: 97.1393, A: -21.5537, B: 94.4780}, colour.SRGB{R: 255, G: 255}},
		{"white", colour.Lab{L: 100}, colour.SRGB{R: 255, G: 255, B: 255}},
		{"black", colour.Lab{}, colour.SRGB{}},
		{"grey 128", colour.Lab{L: 53.5850}, colour.SRGB{R: 128, G: 128, B: 128}},
	} {
		got, inside := tt.lab.SRGB()
		if off := furthest(got, tt.want); off > 1 {
			t.Errorf("%s %v: sRGB %v, want %v within 1", tt.name, tt.lab, got, tt.want)
		}
		if !inside && furthest(got, tt.want) == 0 && tt.name == "white" {
			t.Errorf("%s is said to lie outside", tt.name)
		}
	}
}

// The white of D65, as CIE 15 gives it for the 2° observer (X 95.04, Z 108.88), is white, and grey
// of reflectance 0.18 has the signal of the formula: 1.055·0.18^(1/2.4) − 0.055 = 0.4613, 117.6.
func TestSRGBGreys(t *testing.T) {
	for _, tt := range []struct {
		y    float64
		want uint8
	}{{1, 255}, {0.18, 118}, {0, 0}, {0.002, 7}} { // 12.92·0.002·255 = 6.6
		got, inside := colour.XYZ{X: 95.04 * tt.y, Y: 100 * tt.y, Z: 108.88 * tt.y}.SRGB()
		if off := furthest(got, colour.SRGB{R: tt.want, G: tt.want, B: tt.want}); off > 1 || !inside {
			t.Errorf("grey %g: sRGB %v inside %v, want %d", tt.y, got, inside, tt.want)
		}
	}
}

// A spectral green lies outside every screen, and that is said; its parts are bounded.
func TestSRGBOutside(t *testing.T) {
	for _, c := range []colour.XYZ{
		{X: 6.3, Y: 71, Z: 7.8}, // 520 nm of the 2° observer, times 100
		{X: 120, Y: 120, Z: 120},
		{X: math.NaN(), Y: 1, Z: 1},
	} {
		if got, inside := c.SRGB(); inside {
			t.Errorf("%v is said to be shown, as %v", c, got)
		}
	}
	if got, _ := (colour.XYZ{X: 6.3, Y: 71, Z: 7.8}).SRGB(); got.R != 0 || got.G < 200 {
		t.Errorf("spectral green is shown as %v", got)
	}
}

// XYZ takes back what Lab makes, on both sides of the straight part.
func TestLabBack(t *testing.T) {
	white := colour.XYZ{X: 95.04, Y: 100, Z: 108.88}
	for _, c := range []colour.XYZ{{X: 40, Y: 50, Z: 20}, {X: 0.3, Y: 0.2, Z: 0.5}, {X: 95.04, Y: 100, Z: 108.88}, {}} {
		back := c.Lab(white).XYZ(white)
		for _, d := range []float64{back.X - c.X, back.Y - c.Y, back.Z - c.Z} {
			if math.Abs(d) > 1e-10 {
				t.Errorf("%v comes back as %v", c, back)
			}
		}
	}
}

// furthest returns the greatest difference of parts.
func furthest(a, b colour.SRGB) (off int) {
	for _, d := range []int{int(a.R) - int(b.R), int(a.G) - int(b.G), int(a.B) - int(b.B)} {
		off = max(off, d, -d)
	}
	return off
}
