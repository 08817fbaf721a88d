package film

// A coated pane of materials.

// A Film is a thin film of a material.
type Film struct {
	Material    *Material
	ThicknessNM float64
}

// Coated is a coated pane in air: glass, and the films of each face from the glass outward.
type Coated struct {
	Glass       Constants
	ThicknessMM float64
	Front, Back []Film
}

// At returns where light ends up at a vacuum wavelength in nm and an angle of incidence in degrees, below
// 90, in both polarisations (see Plate.At). The wavelength must lie in the range of the glass and of every
// material.
func (c Coated) At(wavelengthNM, angleDeg float64) (s, p Light) {
	n, k := c.Glass.At(wavelengthNM)
	layers := func(films []Film) (list []Layer) {
		for _, f := range films {
			list = append(list, Layer{f.Material.Index(wavelengthNM), f.ThicknessNM})
		}
		return list
	}
	plate := Plate{Index: complex(n, k), ThicknessMM: c.ThicknessMM, Front: layers(c.Front), Back: layers(c.Back)}
	return plate.At(wavelengthNM, angleDeg)
}

// Sample takes the indices of glass and films at vacuum wavelengths in nm, each of which must lie in the
// range of the glass and of every material.
func (c Coated) Sample(nm []float64) *Sampled {
	sampled := func(films []Film) (list []SampledLayer) {
		for _, f := range films {
			list = append(list, SampledLayer{indices(nm, f.Material.Index), f.ThicknessNM})
		}
		return list
	}
	glass := indices(nm, func(x float64) complex128 {
		n, k := c.Glass.At(x)
		return complex(n, k)
	})
	return NewSampled(nm, glass, c.ThicknessMM, sampled(c.Front), sampled(c.Back))
}

func indices(nm []float64, at func(nm float64) complex128) []complex128 {
	list := make([]complex128, len(nm))
	for i, x := range nm {
		list[i] = at(x)
	}
	return list
}
