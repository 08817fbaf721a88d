package film

// Optical constants: those of soda-lime glasses, and what any are asked for.

import (
	"fmt"
	"math"

	"panewright/reference"
	"panewright/spectra"
)

// Constants are the optical constants of a material.
type Constants struct {
	Name   string // as an error or a caution names it
	Source string // the paper or file that they come from
	N, K   spectra.Curve
	// HeldFromNM is the wavelength down to which the first value is held, 0 where it is not.
	HeldFromNM float64
	// SodaLime marks the glass whose uncoated faces carry the conventional emissivity of EN 673.
	SodaLime bool
}

// FirstNM and LastNM are the ends of the range in which the material may be used, in nm.
func (c Constants) FirstNM() float64 {
	first := max(c.N.First(), c.K.First())
	if c.HeldFromNM > 0 {
		return min(first, c.HeldFromNM)
	}
	return first
}

// LastNM returns the longest wavelength in nm.
func (c Constants) LastNM() float64 { return min(c.N.Last(), c.K.Last()) }

// At returns n and k, linear between the points.
func (c Constants) At(wavelengthNM float64) (n, k float64) {
	return c.N.At(wavelengthNM), c.K.At(wavelengthNM)
}

// sodaLime are the glasses of the reference table by name.
var sodaLime = []struct{ name, column string }{
	{"soda-lime", "clear"}, {"low-iron", "low_iron"}, {"soda-grey", "grey"}, {"soda-bronze", "bronze"}, {"soda-green", "green"},
}

// Glasses returns the names of the built-in glasses.
func Glasses() []string {
	var names []string
	for _, g := range sodaLime {
		names = append(names, g.name)
	}
	return names
}

// Glass returns the optical constants of a built-in glass: soda-lime float glass (M. Rubin, Solar
// Energy Materials 12 (1985) 275), from 310 nm (clear, low-iron) or 320 nm (grey, bronze, green),
// with the first value held to 300 nm. There is no data from 4.6 to 5 µm, where no figure looks.
func Glass(name string) (c Constants, ok bool) {
	for _, g := range sodaLime {
		if g.name != name {
			continue
		}
		t := reference.SodaLimeGlass()
		curve := func(column string) spectra.Curve {
			um, values := t.Series(column)
			nm := make([]float64, len(um))
			for i, x := range um {
				nm[i] = toNM(x)
			}
			return spectra.Curve{NM: nm, Value: values}
		}
		return Constants{Name: name, Source: "M. Rubin, Solar Energy Materials 12 (1985) 275",
			N: curve("n_" + g.column), K: curve("k_" + g.column), HeldFromNM: spectra.SolarFirstNM, SodaLime: true}, true
	}
	return Constants{}, false
}

// toNM converts a wavelength of few decimals in µm without a trace of binary rounding.
func toNM(um float64) float64 { return math.Round(um*1e6) / 1e3 }

// infrared reports whether the constants reach far enough for an emissivity.
func (c Constants) infrared() bool {
	return c.FirstNM() <= spectra.InfraredFirstNM && c.LastNM() >= infraredLeastNM
}

// cautions say how far the constants were held beyond their points, and where those are far apart.
func (c Constants) cautions() (list []spectra.Caution) {
	if first := max(c.N.First(), c.K.First()); c.HeldFromNM > 0 && c.HeldFromNM < first {
		list = append(list, spectra.Caution{Code: "extended", Text: fmt.Sprintf(
			"The optical constants of %s glass begin at %.6g nm (%s); their first value was held to %.6g nm.", c.Name, first, c.Source, c.HeldFromNM)})
	}
	if last := c.LastNM(); c.infrared() && last < infraredLastNM {
		list = append(list, spectra.Caution{Code: "extended", Text: fmt.Sprintf(
			"The optical constants of %s stop at %.6g µm; for the emissivity their reflectance was held to 50 µm.", c.Name, last/1000)})
	}
	if text := spectra.CoarseSteps(c.N); text != "" && !c.SodaLime {
		list = append(list, spectra.Caution{Code: "coarse_steps", Text: "The optical constants of " + c.Name + " have " + text})
	}
	return list
}
