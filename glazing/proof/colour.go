package proof

// Checks of colours and of lights.

import (
	"fmt"
	"math"

	"panewright/reference/checks"
	"panewright/spectra"
	"panewright/spectra/colour"
)

// axis returns the one of x and y that the check asks for.
func axis(in *inputs, c colour.XYZ) float64 {
	x, y := c.Chromaticity()
	switch which := in.text("axis"); which {
	case "x":
		return x
	case "y":
		return y
	default:
		in.fail("input axis: %q is neither x nor y", which)
		return 0
	}
}

// whiteChromaticity is that of D65 itself, as a rating's colours have it.
func whiteChromaticity(in *inputs) (float64, error) {
	observer := colour.TwoDegree
	switch which := in.text("observer"); which {
	case "2":
	case "10":
		observer = colour.TenDegree
	default:
		in.fail("input observer: %q is neither 2 nor 10", which)
	}
	g := spectra.NewGrid(colour.Wavelengths())
	ones := make([]float64, g.Padded())
	for i := range g.Len() {
		ones[i] = 1
	}
	return axis(in, colour.NewMeter(g).XYZ(observer, ones)), nil
}

// daylightChromaticity is that of a phase of daylight by its nominal temperature, which was named
// when the second radiation constant was taken for 1.4380e-2 m·K.
func daylightChromaticity(in *inputs) (float64, error) {
	const now, then = 1.4388, 1.4380
	return axis(in, colour.Daylight(in.number("nominal_k")*now/then).XYZ()), nil
}

func lamp(in *inputs) colour.Light {
	_, power, ok := checks.Lamp(in.text("lamp"))
	if !ok {
		in.fail("input lamp: there is no lamp %q", in.text("lamp"))
		return colour.BlackBody(5000)
	}
	return power
}

func lampRendering(in *inputs) (float64, error) {
	ra, _ := lamp(in).Rendering()
	return ra, nil
}

func lampTemperature(in *inputs) (float64, error) { return lamp(in).Temperature(), nil }

func lampChromaticity(in *inputs) (float64, error) { return axis(in, lamp(in).XYZ()), nil }

// three reads three numbers.
func (in *inputs) three(name string) (x, y, z float64) {
	v := in.numbers(name)
	if len(v) != 3 {
		in.fail("input %s has %d numbers; it must have three", name, len(v))
		return 0, 0, 0
	}
	return v[0], v[1], v[2]
}

func xyz(in *inputs, name string) colour.XYZ {
	x, y, z := in.three(name)
	return colour.XYZ{X: x, Y: y, Z: z}
}

// labOf is L*, a* or b* of tristimulus values against a white.
func labOf(in *inputs) (float64, error) {
	lab := xyz(in, "xyz").Lab(xyz(in, "white"))
	switch which := in.text("axis"); which {
	case "L":
		return lab.L, nil
	case "a":
		return lab.A, nil
	case "b":
		return lab.B, nil
	default:
		in.fail("input axis: %q is none of L, a, b", which)
		return 0, nil
	}
}

// colourDifference is CIEDE2000 of two colours, which must be the same both ways.
func colourDifference(in *inputs) (float64, error) {
	read := func(name string) colour.Lab {
		l, a, b := in.three(name)
		return colour.Lab{L: l, A: a, B: b}
	}
	one, two := read("one"), read("two")
	forth, back := one.CIEDE2000(two), two.CIEDE2000(one)
	if math.Abs(forth-back) > 1e-12 {
		return 0, fmt.Errorf("%.15g one way, %.15g the other", forth, back)
	}
	return forth, nil
}
